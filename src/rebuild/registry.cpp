// The order of the routes: fewest rounded inputs first, bounds last.
#include <algorithm>
#include <iterator>

#include "rebuild/routes.hpp"

namespace steelyard {

namespace rebuilding {

std::span<const Route> registry() {
  static const std::vector<Route> all = {
      route_t(),
      route_f(),
      route_p(),
      route_r(),
      route_d(),
      route_g(),
      route_mean_diff_se(),
      route_mean_sd(),
      route_mean_se(),
      route_mean_diff_sd(),
      route_mean_diff_ci(),
      route_means_sds(),
      route_means_ses(),
      route_paired_means(),
      route_estimate_se(),
      route_estimate_ci(),
      route_t_bound(),
      route_f_bound(),
      route_p_bound(),
  };
  return all;
}

}  // namespace rebuilding

std::span<const RouteInfo> routes() {
  static const std::vector<RouteInfo> all = [] {
    std::vector<RouteInfo> infos;
    const auto registered = rebuilding::registry();
    std::transform(registered.begin(), registered.end(), std::back_inserter(infos),
                   [](const rebuilding::Route& route) { return route.info; });
    return infos;
  }();
  return all;
}

}  // namespace steelyard
