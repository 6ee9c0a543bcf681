// One row taken through all routes; also what the audit needs to know about a row.
#pragma once

#include <vector>

#include "rebuild/route.hpp"

namespace steelyard::rebuilding {

/// A route that could be taken, with what it used and what must be said about it.
struct Candidate {
  const Route* route = nullptr;
  Solution solution;
  ColSet used;
  std::vector<Diagnostic> cautions;
};

/// All routes that a row allows, in registry order. Reasons for routes refused stay in `x.refusals()`.
[[nodiscard]] std::vector<Candidate> candidates_of(Numbers& x);

[[nodiscard]] Outcome<Study> rebuild_row(const Table& table, const Header& header, std::size_t row,
                                         const RebuildOptions& options);

}  // namespace steelyard::rebuilding
