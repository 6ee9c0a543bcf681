// Room "numeric": the noncentral t distribution in log space, and quadrature.
#pragma once

#include <cstddef>
#include <span>

namespace steelyard::numeric {

/// log f(t; df, ncp), density of the noncentral t. Domain: df ≥ 1, t and ncp finite, |ncp| ≤ 1e6,
/// |t| ≤ 1e6 (NaN outside). Accuracy: 1e-12 relative, absolute where |log f| < 1, for df ≤ 1e9,
/// |ncp| ≤ 1e3, |t| ≤ 1e4; a few ulp at ncp = 0. See docs/numeric.md.
[[nodiscard]] double log_noncentral_t_density(double t, double df, double ncp);

/// log P(T ≤ t) and log P(T > t); each accurate where it is small. t may be infinite.
[[nodiscard]] double log_noncentral_t_cdf(double t, double df, double ncp);
[[nodiscard]] double log_noncentral_t_upper(double t, double df, double ncp);

/// log P(low < T ≤ high) without cancellation; ends may be infinite; -infinity when low ≥ high.
[[nodiscard]] double log_noncentral_t_band(double low, double high, double df, double ncp);

/// out[j] += log f(t; df, ncp_per_mean·means[j]); the fast inner kernel, same bits on every
/// instruction set. df ≥ 1.
void add_log_noncentral_t(double t, double df, double ncp_per_mean, std::span<const double> means,
                          std::span<double> out);

/// Student's t (central): P(T ≤ t), P(T > t), two-sided p, and the t with upper tail probability q.
/// Thin wrappers around Boost.Math with these domains: df > 0, 0 < q < 1.
[[nodiscard]] double student_t_cdf(double t, double df);
[[nodiscard]] double student_t_upper(double t, double df);
[[nodiscard]] double student_t_two_sided(double t, double df);
[[nodiscard]] double student_t_upper_quantile(double q, double df);
/// Standard Normal: P(Z ≤ z), P(Z > z), upper quantile, log density, log P(Z > z).
[[nodiscard]] double normal_cdf(double z);
[[nodiscard]] double normal_upper(double z);
[[nodiscard]] double normal_upper_quantile(double q);
[[nodiscard]] double log_normal_upper(double z);

/// log(exp(a) + exp(b)), exact at infinities.
[[nodiscard]] double log_add(double a, double b);
/// log(exp(a) − exp(b)) for a ≥ b.
[[nodiscard]] double log_subtract(double a, double b);

}  // namespace steelyard::numeric
