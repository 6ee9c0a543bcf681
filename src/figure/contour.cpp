#include "figure/contour.hpp"

#include <algorithm>
#include <cstddef>
#include <map>
#include <utility>

namespace steelyard::figure {
namespace {

/// An edge between two neighbouring grid points: (i, j) and the next one along x or along y.
struct Edge {
  std::size_t i, j;
  bool along_x;
  auto operator<=>(const Edge&) const = default;
};
using Segment = std::pair<Edge, Edge>;

Point crossing(const Grid& grid, const Edge& edge, double level) {
  const std::size_t i2 = edge.i + (edge.along_x ? 1 : 0), j2 = edge.j + (edge.along_x ? 0 : 1);
  const double a = grid.at(edge.i, edge.j), b = grid.at(i2, j2);
  const double share = std::clamp((level - a) / (b - a), 0.0, 1.0);
  return {grid.xs[edge.i] + share * (grid.xs[i2] - grid.xs[edge.i]),
          grid.ys[edge.j] + share * (grid.ys[j2] - grid.ys[edge.j])};
}

/// The pieces of the line inside one cell. In a saddle the middle decides which corners belong together.
void add_segments(const Grid& grid, std::size_t i, std::size_t j, double level, std::vector<Segment>& out) {
  const double corners[] = {grid.at(i, j), grid.at(i + 1, j), grid.at(i + 1, j + 1), grid.at(i, j + 1)};
  const Edge edges[] = {{i, j, true}, {i + 1, j, false}, {i, j + 1, true}, {i, j, false}};
  bool above[4];
  std::vector<Edge> crossed;
  for (int k = 0; k < 4; ++k) above[k] = corners[k] > level;
  for (int k = 0; k < 4; ++k)
    if (above[k] != above[(k + 1) % 4]) crossed.push_back(edges[k]);
  if (crossed.size() == 2) out.emplace_back(crossed[0], crossed[1]);
  if (crossed.size() != 4) return;
  const bool middle = (corners[0] + corners[1] + corners[2] + corners[3]) / 4 > level;
  if (middle == above[0]) {
    out.emplace_back(crossed[0], crossed[1]), out.emplace_back(crossed[2], crossed[3]);
  } else {
    out.emplace_back(crossed[3], crossed[0]), out.emplace_back(crossed[1], crossed[2]);
  }
}

/// Segments by each of their two ends.
class Chains {
 public:
  explicit Chains(std::vector<Segment> segments)
      : segments_(std::move(segments)), used_(segments_.size(), false) {
    for (std::size_t k = 0; k < segments_.size(); ++k) {
      by_edge_[segments_[k].first].push_back(k);
      by_edge_[segments_[k].second].push_back(k);
    }
  }

  /// All lines: those with ends first, from their ends, then the rings.
  std::vector<std::vector<Edge>> lines() {
    std::vector<std::vector<Edge>> out;
    for (const auto& [edge, at] : by_edge_)
      if (at.size() == 1 && !used_[at[0]]) out.push_back(follow(edge));
    for (std::size_t k = 0; k < segments_.size(); ++k)
      if (!used_[k]) out.push_back(follow(segments_[k].first));
    return out;
  }

 private:
  std::vector<Edge> follow(Edge edge) {
    std::vector<Edge> line = {edge};
    while (true) {
      const auto& at = by_edge_.at(edge);
      const auto next = std::find_if(at.begin(), at.end(), [&](std::size_t k) { return !used_[k]; });
      if (next == at.end()) return line;
      used_[*next] = true;
      const Segment& segment = segments_[*next];
      edge = segment.first == edge ? segment.second : segment.first;
      line.push_back(edge);
    }
  }

  std::vector<Segment> segments_;
  std::vector<bool> used_;
  std::map<Edge, std::vector<std::size_t>> by_edge_;
};

/// The grid with a rim of its own edge positions and values far below.
Grid rimmed(const Grid& grid, double level) {
  Grid out;
  const auto widen = [](std::vector<double> at) {
    at.insert(at.begin(), at.front());
    at.push_back(at.back());
    return at;
  };
  out.xs = widen(grid.xs);
  out.ys = widen(grid.ys);
  out.values.assign(out.xs.size() * out.ys.size(), level - 1.0);
  for (std::size_t i = 0; i < grid.xs.size(); ++i)
    for (std::size_t j = 0; j < grid.ys.size(); ++j)
      out.values[(i + 1) * out.ys.size() + j + 1] = grid.at(i, j);
  return out;
}

}  // namespace

std::vector<Curve> contour_lines(const Grid& grid, double level) {
  std::vector<Segment> segments;
  for (std::size_t i = 0; i + 1 < grid.xs.size(); ++i)
    for (std::size_t j = 0; j + 1 < grid.ys.size(); ++j) add_segments(grid, i, j, level, segments);
  std::vector<Curve> out;
  for (const auto& line : Chains(std::move(segments)).lines()) {
    out.emplace_back();
    for (const Edge& edge : line) out.back().push_back(crossing(grid, edge, level));
  }
  return out;
}

std::vector<Curve> contour_rings(const Grid& grid, double level) {
  return contour_lines(rimmed(grid, level), level);
}

}  // namespace steelyard::figure
