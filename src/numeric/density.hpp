// The noncentral t log density: what depends on (t, df) only, and one node of it.
#pragma once

#include <cmath>
#include <cstddef>

#include "numeric/remainder.hpp"
#include "numeric/vector_math.hpp"

namespace steelyard::numeric {

/// Everything about (t, df) that the nodes share. Mirrored so that t ≥ 0: f(−t; −ncp) = f(t; ncp).
struct DensityConstants {
  double t = 0.0;     ///< |t|
  double sign = 1.0;  ///< of t; multiplies the noncentrality
  double df = 1.0;
  double four_df_a = 0.0;  ///< 4·df·A, A = df + t²
  double inv_two_a = 0.0;
  double two_df = 0.0;
  double half_df = 0.0;
  double constant = 0.0;  ///< −½ log π − S(df/2) + ½ log df
};

/// How the part of the constants that depends on t is filled in; the rest belongs to df alone.
inline void set_t(DensityConstants& c, double t) {
  c.t = std::fabs(t);
  c.sign = t < 0.0 ? -1.0 : 1.0;
  const double a = c.df + t * t;
  c.four_df_a = 4.0 * c.df * a;
  c.inv_two_a = 0.5 / a;
}

inline DensityConstants density_constants(double t, double df) {
  constexpr double half_log_pi = 0.57236494292470008707;
  DensityConstants c;
  c.df = df;
  c.two_df = 2.0 * df;
  c.half_df = 0.5 * df;
  c.constant = -half_log_pi - stirling_remainder(0.5 * df) + 0.5 * std::log(df);
  set_t(c, t);
  return c;
}

/// The saddle of one node. With S = χ_df/√df the density is an integral over S of
/// exp(−(tS − ncp)²/2 + (df/2)(log S² − S² + 1)); its largest value lies at the positive root s of
/// A s² − t·ncp·s − df = 0. There d = s² − 1 and r = ncp − t·s.
struct Saddle {
  double smooth;  ///< log density without the remainder
  double c;       ///< t·ncp/√(t²ncp² + 4 df A) in (−1, 1)
};

[[gnu::always_inline]] inline Saddle saddle(const DensityConstants& k, double ncp) {
  const double tl = k.t * ncp;
  const double root2 = tl * tl + k.four_df_a;
  const double root = std::sqrt(root2);
  const double sum = root + std::fabs(tl);
  // The root of either sign without cancellation.
  const double s = tl >= 0.0 ? sum * k.inv_two_a : k.two_df / sum;
  const double d = (s - 1.0) * (s + 1.0);
  const double r = ncp - k.t * s;
  // s is taken as exact from here: the exponent is stationary in s, so its rounding counts twice squared.
  const LogPair l = vector_log_minus(s * s, d);
  const double exponent = k.half_df * l.log_minus - 0.5 * (r * r);
  const double curvature = 0.25 * (l.log - vector_log(root2));
  return {exponent + (curvature + k.constant), tl / root};
}

/// Horner's rule with a fixed number of terms, unrolled by recursion: a loop in here would keep the
/// loop around it from becoming vector code.
template <int Terms, int From = 0>
[[gnu::always_inline]] inline double horner(const double* coefficients, double x) {
  if constexpr (From + 1 == Terms)
    return coefficients[From];
  else
    return horner<Terms, From + 1>(coefficients, x) * x + coefficients[From];
}

/// Remainder for df ≥ 16.
template <int Terms>
[[gnu::always_inline]] inline double remainder_large(const double* coefficients, double c) {
  const double p = horner<Terms>(coefficients, c);
  const double theta = 0.5 - 0.5 * c;
  return theta * theta * p;
}

/// How many of edges[1..Last] lie below theta.
template <int Last>
[[gnu::always_inline]] inline std::size_t count_above(const double* edges, double theta) {
  if constexpr (Last == 0)
    return 0;
  else
    return count_above<Last - 1>(edges, theta) + (theta > edges[Last] ? 1U : 0U);
}

/// Remainder for df < 16.
[[gnu::always_inline]] inline double remainder_small(const RemainderPolynomial::Local& local,
                                                     const double* edges, double c) {
  // 1 − c rounds to an absolute error of one ulp, which is all that the remainder needs.
  const double theta = 0.5 - 0.5 * c;
  const std::size_t piece = count_above<RemainderPolynomial::pieces - 1>(edges, theta);
  const double low = edges[piece];
  const double high = edges[piece + 1];
  const double u = (2.0 * theta - (low + high)) / (high - low);
  const double p = horner<RemainderPolynomial::small_terms>(local[piece].data(), u);
  return theta * theta * p;
}

}  // namespace steelyard::numeric
