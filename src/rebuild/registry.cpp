// The order of the routes: fewest rounded inputs first, bounds last.
#include <algorithm>
#include <iterator>

#include "rebuild/routes.hpp"

namespace steelyard {

namespace rebuilding {

std::span<const Route> registry() {
  static const std::vector<Route> all = {
      // one rounded input
      route_t(), route_welch_equal(), route_f(), route_p(), route_r(), route_d(), route_g(),
      // two or three
      route_mean_diff_se(), route_mean_sd(), route_mean_se(), route_mean_diff_sd(), route_mean_diff_ci(),
      route_welch_sds(),
      // four and more
      route_means_sds(), route_means_ses(), route_paired_means(), route_means_spreads(), route_compare(),
      route_change(),
      // guesses of the moments
      route_medians_quartiles(), route_medians_range(),
      // Normal likelihoods
      route_estimate_se(), route_estimate_ci(), route_correlation(), route_odds_ratio(), route_counts(),
      route_d_se(), route_g_se(), route_d_ci(), route_g_ci(), route_welch_normal(),
      // bounds
      route_t_bound(), route_f_bound(), route_p_bound()};
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
