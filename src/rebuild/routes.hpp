// The makers of all routes, one declaration each; the order of trying them is the registry's.
#pragma once

#include "rebuild/route.hpp"

namespace steelyard::rebuilding {

Route route_t();
Route route_f();
Route route_p();
Route route_r();
Route route_d();
Route route_g();
Route route_mean_diff_se();
Route route_mean_diff_sd();
Route route_mean_diff_ci();
Route route_means_sds();
Route route_means_ses();
Route route_mean_sd();
Route route_mean_se();
Route route_paired_means();
Route route_estimate_se();
Route route_estimate_ci();
Route route_means_spreads();
Route route_compare();
Route route_change();
Route route_welch_equal();
Route route_welch_sds();
Route route_welch_normal();
Route route_d_se();
Route route_d_ci();
Route route_g_se();
Route route_g_ci();
Route route_counts();
Route route_odds_ratio();
Route route_correlation();
Route route_medians_quartiles();
Route route_medians_range();
Route route_t_bound();
Route route_f_bound();
Route route_p_bound();

}  // namespace steelyard::rebuilding
