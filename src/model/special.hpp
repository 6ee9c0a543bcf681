// The standard (location 0, scale 1) distributions that the prior families are made of. The only
// file of this room that includes Boost is special.cpp.
#pragma once

namespace steelyard::model {

enum class Kernel { normal, cauchy, student };

/// A symmetric standard distribution; `df` counts for Kernel::student only (df > 0).
struct Standard {
  Kernel kernel = Kernel::normal;
  double df = 1.0;
};

/// log density at z; a few ulp, for any finite z.
[[nodiscard]] double log_density(const Standard& standard, double z);

/// P(Z > z) and its logarithm. The logarithm goes on where the probability itself underflows; it is
/// right to about 1e-14 relative there.
[[nodiscard]] double upper(const Standard& standard, double z);
[[nodiscard]] double log_upper(const Standard& standard, double z);

/// log P(Z > from + width | Z > from), width ≥ 0, and the log density at from + width given Z > from. Far out
/// in a Normal tail both are formed without the large logarithms that would cancel.
[[nodiscard]] double log_upper_beyond(const Standard& standard, double from, double width);
[[nodiscard]] double log_density_beyond(const Standard& standard, double from, double width);

/// P(|Z| ≤ z) for z ≥ 0, not computed as a complement where it is small.
[[nodiscard]] double central(const Standard& standard, double z);

/// z with P(Z > z) = q, 0 < q < 1.
[[nodiscard]] double upper_quantile(const Standard& standard, double q);

/// P(Z ≤ from + width | Z > from) for a narrow interval: a Gauss-Legendre rule on the density, so that a
/// small probability keeps its relative accuracy. Good to 1e-14 relative for width·(1 + |from|) <
/// 0.02·√min(1, df).
[[nodiscard]] double narrow_interval(const Standard& standard, double from, double width);

/// Regularized incomplete gamma functions P(a, x) and Q(a, x), and x with P(a, x) = p or Q(a, x) = q.
[[nodiscard]] double gamma_p(double a, double x);
[[nodiscard]] double gamma_q(double a, double x);
[[nodiscard]] double gamma_q_inverse(double a, double q);
/// log Γ(a), a > 0, without the process-wide sign variable of the C library.
[[nodiscard]] double log_gamma(double a);

}  // namespace steelyard::model
