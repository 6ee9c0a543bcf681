// The p values that a test statistic may have been printed with.
#pragma once

#include <optional>
#include <string>

#include "audit/statistic.hpp"

namespace steelyard::auditing {

/// What p is set against, and the p that follow from it.
struct ImpliedP {
  std::string words;  ///< "t = 2.20 with 28 df"
  Range two_tailed;
  Range one_tailed;  ///< in the direction of the result (or of the hypothesis, when the row states one)
};
[[nodiscard]] std::optional<ImpliedP> implied_p(const RowView& row);

/// The printed p (value or bound) as a range within [0, 1].
[[nodiscard]] std::optional<Range> printed_p(const RowView& row);

/// Whether the row says that its p is one-tailed.
[[nodiscard]] bool says_one_tailed(const RowView& row);

/// "<.05", ".036": the cell, or for ns what it means.
[[nodiscard]] std::string words_of_p(const RowView& row);
/// 0.0366 as ".0366".
[[nodiscard]] std::string short_p(double p);

}  // namespace steelyard::auditing
