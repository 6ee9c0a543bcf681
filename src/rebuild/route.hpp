// What a route is. One file per route (or per small family); the registry lists them in order.
#pragma once

#include <optional>
#include <span>
#include <string>
#include <vector>

#include "rebuild/facts.hpp"
#include "rebuild/frame.hpp"
#include "steelyard/rebuild.hpp"

namespace steelyard::rebuilding {

/// What a route makes of a row.
struct Solution {
  Evidence evidence;
  std::string metric = "smd";
  Design design = Design::two_groups;
  double people = 0.0;           ///< all observations, for the standard error of d; 0: not known
  std::optional<double> raw_sd;  ///< SD of the metric in raw units
};

struct Route {
  RouteInfo info;
  std::string_view says;  ///< how the evidence was rebuilt, to stand before the cells used
  std::vector<Col> core;  ///< without these the route can't be taken; named when a row can't be rebuilt
  bool (*applies)(const Numbers&);  ///< whether the row has what the route asks for (sizes aside)
  std::optional<Solution> (*solve)(Numbers&);
};

/// All routes in the order in which they are tried.
[[nodiscard]] std::span<const Route> registry();

/// A solution with an exact t in a frame.
[[nodiscard]] inline Solution in_frame(const Frame& frame, double t, bool folded = false) {
  return {exact(frame, t, folded), frame.metric, frame.design, frame.people, std::nullopt};
}

}  // namespace steelyard::rebuilding
