// Student's t as routes need it: quantiles of p values, in the tail where p is small.
#pragma once

namespace steelyard::rebuilding {

/// The t with P(T > t) = q; +infinity at q = 0, -infinity at q = 1. Domain: df > 0, 0 ≤ q ≤ 1.
[[nodiscard]] double upper_t(double q, double df);
/// The t ≥ 0 with P(|T| > t) = p; +infinity at p = 0, 0 at p = 1.
[[nodiscard]] double two_sided_t(double p, double df);
/// P(T > t) and P(|T| > |t|).
[[nodiscard]] double upper_p(double t, double df);
[[nodiscard]] double two_sided_p(double t, double df);
/// The z with P(Z > z) = q, and P(|Z| > |z|).
[[nodiscard]] double upper_z(double q);
[[nodiscard]] double two_sided_p_normal(double z);
/// P(F > f) with df1 and df2.
[[nodiscard]] double upper_f(double f, double df1, double df2);

}  // namespace steelyard::rebuilding
