// Rows with more than two groups: `compare` names the two that are set against each other, each of one
// group or of several merged.
#pragma once

#include <optional>
#include <vector>

#include "rebuild/facts.hpp"

namespace steelyard::rebuilding {

/// Groups on either side, by number: "1+2-3" is {1, 2} against {3}.
struct Comparison {
  std::vector<int> first, second;
};
[[nodiscard]] std::optional<Comparison> comparison_of(Numbers& x);

/// Size, mean and SD of a side. `merged` also when it is a single group.
struct Group {
  double n = 0.0, mean = 0.0, sd = 0.0;
};

/// Sizes only; nothing (with a reason) when one is missing.
[[nodiscard]] std::optional<double> size_of(Numbers& x, const std::vector<int>& side);
/// The side as one group (Cochrane Handbook 5.1, table 7.7.a); nothing (with a reason) when a cell is
/// missing.
[[nodiscard]] std::optional<Group> merged(Numbers& x, const std::vector<int>& side);
/// Two groups as one.
[[nodiscard]] Group merge(const Group& a, const Group& b);

/// Whether the row prints a third group.
[[nodiscard]] bool has_third_group(const Numbers& x);

}  // namespace steelyard::rebuilding
