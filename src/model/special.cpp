#include "model/special.hpp"

#include <algorithm>
#include <array>
#include <boost/math/special_functions/beta.hpp>
#include <boost/math/special_functions/erf.hpp>
#include <boost/math/special_functions/gamma.hpp>
#include <cmath>
#include <limits>
#include <numbers>

#include "steelyard/numeric.hpp"

namespace steelyard::model {

namespace {

// Users' errors are reported long before numbers get here; Boost is asked for NaN and infinity
// instead of exceptions.
namespace policies = boost::math::policies;
using Quiet = policies::policy<
    policies::domain_error<policies::ignore_error>, policies::pole_error<policies::ignore_error>,
    policies::overflow_error<policies::ignore_error>, policies::evaluation_error<policies::ignore_error>>;

// Below this a probability is near underflow and only its logarithm is of use.
constexpr double tiny = 1e-290;

double log_density_normal(double z) { return -0.5 * z * z - 0.5 * std::log(2.0 * std::numbers::pi); }

double log_density_cauchy(double z) {
  // z² overflows beyond 1e154; there log(1 + z²) is 2·log|z|.
  const double log_term = std::abs(z) < 1e150 ? std::log1p(z * z) : 2.0 * std::log(std::abs(z));
  return -std::log(std::numbers::pi) - log_term;
}

double log_density_student(double z, double df) {
  const double log_constant = -std::log(boost::math::tgamma_delta_ratio(0.5 * df, 0.5, Quiet())) -
                              0.5 * std::log(df * std::numbers::pi);
  const double ratio = z / std::sqrt(df);
  const double log_term =
      std::abs(ratio) < 1e150 ? std::log1p(ratio * ratio) : 2.0 * std::log(std::abs(ratio));
  return log_constant - 0.5 * (df + 1.0) * log_term;
}

// log of ½·I_x(df/2, ½), x = df/(df + z²), by the continued fraction of the incomplete beta function
// (NIST Handbook 8.17.22, modified Lentz). Only used far out in the tail, where it converges quickly.
double log_student_tail(double z, double df) {
  const double a = 0.5 * df;
  const double b = 0.5;
  const double square = (z / df) * z;  // z²/df
  const double x = 1.0 / (1.0 + square);
  const double log_front = -a * std::log1p(square) + b * std::log(square / (1.0 + square)) - std::log(a) -
                           std::log(boost::math::beta(a, b, Quiet()));
  double c = 1.0;
  double d = 1.0 / (1.0 - (a + b) * x / (a + 1.0));
  double value = d;
  for (int m = 1; m < 20000; ++m) {
    const double even = m * (b - m) * x / ((a + 2.0 * m - 1.0) * (a + 2.0 * m));
    d = 1.0 / (1.0 + even * d);
    c = 1.0 + even / c;
    value *= d * c;
    const double odd = -(a + m) * (a + b + m) * x / ((a + 2.0 * m) * (a + 2.0 * m + 1.0));
    d = 1.0 / (1.0 + odd * d);
    c = 1.0 + odd / c;
    const double change = d * c;
    value *= change;
    if (std::abs(change - 1.0) < 1e-16) break;
  }
  return log_front + std::log(value) - std::numbers::ln2;
}

// Where the Normal tail is written as density times Mills ratio.
constexpr double far_out = 6.0;

// P(Z > z)/φ(z) for z ≥ 6: Laplace's continued fraction 1/(z + 1/(z + 2/(z + 3/(z + ...)))); 60 terms
// leave less than 1e-17 there.
double mills_ratio(double z) {
  double tail = z;
  for (int k = 60; k >= 1; --k) tail = z + k / tail;
  return 1.0 / tail;
}

}  // namespace

double log_density(const Standard& standard, double z) {
  switch (standard.kernel) {
    case Kernel::normal:
      return log_density_normal(z);
    case Kernel::cauchy:
      return log_density_cauchy(z);
    case Kernel::student:
      break;
  }
  return log_density_student(z, standard.df);
}

double upper(const Standard& standard, double z) {
  switch (standard.kernel) {
    case Kernel::normal:
      return numeric::normal_upper(z);
    case Kernel::cauchy:
      // The angle of the point (z, 1): no cancellation in either tail.
      return std::atan2(1.0, z) / std::numbers::pi;
    case Kernel::student:
      break;
  }
  return numeric::student_t_upper(z, standard.df);
}

double log_upper(const Standard& standard, double z) {
  if (standard.kernel == Kernel::normal) return numeric::log_normal_upper(z);
  if (std::isinf(z)) return z > 0.0 ? -std::numeric_limits<double>::infinity() : 0.0;
  if (z < 0.0) return std::log1p(-upper(standard, -z));
  const double probability = upper(standard, z);
  if (probability > tiny || standard.kernel == Kernel::cauchy) return std::log(probability);
  return log_student_tail(z, standard.df);
}

double log_upper_beyond(const Standard& standard, double from, double width) {
  if (standard.kernel == Kernel::normal && from > far_out) {
    if (std::isinf(width)) return -width;
    return -width * (from + 0.5 * width) + std::log(mills_ratio(from + width) / mills_ratio(from));
  }
  return std::min(0.0, log_upper(standard, from + width) - log_upper(standard, from));
}

double log_density_beyond(const Standard& standard, double from, double width) {
  if (standard.kernel == Kernel::normal && from > far_out) {
    return -width * (from + 0.5 * width) - std::log(mills_ratio(from));
  }
  return log_density(standard, from + width) - log_upper(standard, from);
}

double central(const Standard& standard, double z) {
  switch (standard.kernel) {
    case Kernel::normal:
      return boost::math::erf(z / std::numbers::sqrt2, Quiet());
    case Kernel::cauchy:
      return 2.0 * std::atan(z) / std::numbers::pi;
    case Kernel::student:
      break;
  }
  const double square = (z / standard.df) * z;
  if (std::isinf(square)) return 1.0;
  if (square < 1.0) return boost::math::ibeta(0.5, 0.5 * standard.df, square / (1.0 + square), Quiet());
  return boost::math::ibetac(0.5 * standard.df, 0.5, 1.0 / (1.0 + square), Quiet());
}

double upper_quantile(const Standard& standard, double q) {
  switch (standard.kernel) {
    case Kernel::normal:
      return numeric::normal_upper_quantile(q);
    case Kernel::cauchy:
      // cot(πq); near q = ½ the cotangent is taken as a tangent of the small angle.
      return std::abs(q - 0.5) < 0.25 ? std::tan(std::numbers::pi * (0.5 - q))
             : q < 0.5                ? 1.0 / std::tan(std::numbers::pi * q)
                                      : -1.0 / std::tan(std::numbers::pi * (1.0 - q));
    case Kernel::student:
      break;
  }
  return numeric::student_t_upper_quantile(q, standard.df);
}

double narrow_interval(const Standard& standard, double from, double width) {
  // Five-point Gauss-Legendre rule (Abramowitz & Stegun 25.4.30).
  constexpr std::array<double, 5> node = {0.0, 0.53846931010568309104, -0.53846931010568309104,
                                          0.90617984593866399280, -0.90617984593866399280};
  constexpr std::array<double, 5> weight = {0.56888888888888888889, 0.47862867049936646804,
                                            0.47862867049936646804, 0.23692688505618908751,
                                            0.23692688505618908751};
  double sum = 0.0;
  for (std::size_t i = 0; i < node.size(); ++i) {
    sum += weight[i] * std::exp(log_density_beyond(standard, from, 0.5 * width * (1.0 + node[i])));
  }
  return 0.5 * width * sum;
}

double gamma_p(double a, double x) { return boost::math::gamma_p(a, x, Quiet()); }
double gamma_q(double a, double x) { return boost::math::gamma_q(a, x, Quiet()); }
double gamma_q_inverse(double a, double q) { return boost::math::gamma_q_inv(a, q, Quiet()); }
double log_gamma(double a) { return boost::math::lgamma(a, Quiet()); }

}  // namespace steelyard::model
