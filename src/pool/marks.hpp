// Ends of quadrature panels.
#pragma once

#include <algorithm>
#include <vector>

namespace steelyard::pool_room {

/// All edges (ascending, kept as they are: the integrand may have another form on either side), and those
/// of the wanted marks that lie inside and no nearer than `shortest` to an edge or to each other.
[[nodiscard]] inline std::vector<double> merge_marks(const std::vector<double>& edges,
                                                     std::vector<double> wanted, double shortest) {
  std::sort(wanted.begin(), wanted.end());
  std::vector<double> out{edges.front()};
  auto mark = wanted.begin();
  for (std::size_t i = 1; i < edges.size(); ++i) {
    for (; mark != wanted.end() && *mark < edges[i]; ++mark)
      if (*mark - out.back() > shortest && edges[i] - *mark > shortest) out.push_back(*mark);
    out.push_back(edges[i]);
  }
  return out;
}

}  // namespace steelyard::pool_room
