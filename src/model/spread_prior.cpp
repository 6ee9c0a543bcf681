// Priors of the spread τ: densities, distribution functions and quantiles.
#include <algorithm>
#include <cmath>
#include <limits>
#include <numbers>
#include <variant>

#include "model/quantile.hpp"
#include "model/special.hpp"
#include "model/visit.hpp"
#include "steelyard/model.hpp"

namespace steelyard {

namespace {

using model::Kernel;
using model::Overloaded;
using model::Standard;

constexpr double infinity = std::numeric_limits<double>::infinity();
constexpr double not_a_number = std::numeric_limits<double>::quiet_NaN();
constexpr Standard standard_normal = {Kernel::normal, 1.0};

// The positive half of a standard distribution, times a scale.
struct Half {
  Standard standard;
  double scale = 1.0;
};

Half half(const HalfCauchyPrior& f) { return {{Kernel::cauchy, 1.0}, f.scale}; }
Half half(const HalfNormalPrior& f) { return {standard_normal, f.scale}; }
Half half(const HalfStudentTPrior& f) { return {{Kernel::student, f.df}, f.scale}; }

// For x > 0.
double family_log_density(const Half& f, double x) {
  return std::numbers::ln2 + model::log_density(f.standard, x / f.scale) - std::log(f.scale);
}
double family_lower(const Half& f, double x) { return model::central(f.standard, x / f.scale); }
double family_upper(const Half& f, double x) { return 2.0 * model::upper(f.standard, x / f.scale); }
double family_quantile(const Half& f, double p) {
  // For small p the upper tail (1 − p)/2 is close to ½ and carries p with an absolute error of 1e-16;
  // the search on P(|Z| ≤ z) keeps it relative.
  if (p > 0.1) return f.scale * model::upper_quantile(f.standard, 0.5 * (1.0 - p));
  return model::invert([&](double x) { return family_lower(f, x) - p; }, 0.0, infinity, p * f.scale,
                       p * f.scale);
}
PriorShape family_shape(const Half& f) { return {0.0, infinity, 0.0, f.scale, family_log_density(f, 0.0)}; }

double family_log_density(const InverseGammaPrior& f, double x) {
  return f.shape * std::log(f.scale) - model::log_gamma(f.shape) - (f.shape + 1.0) * std::log(x) -
         f.scale / x;
}
double family_lower(const InverseGammaPrior& f, double x) { return model::gamma_q(f.shape, f.scale / x); }
double family_upper(const InverseGammaPrior& f, double x) { return model::gamma_p(f.shape, f.scale / x); }
double family_quantile(const InverseGammaPrior& f, double p) {
  return f.scale / model::gamma_q_inverse(f.shape, p);
}
PriorShape family_shape(const InverseGammaPrior& f) {
  const double mode = f.scale / (f.shape + 1.0);
  return {0.0, infinity, mode, mode / std::sqrt(f.shape + 1.0), family_log_density(f, mode)};
}

double family_log_density(const LogNormalPrior& f, double x) {
  const double log_x = std::log(x);
  return model::log_density(standard_normal, (log_x - f.log_mean) / f.log_sd) - std::log(f.log_sd) - log_x;
}
double family_lower(const LogNormalPrior& f, double x) {
  return model::upper(standard_normal, (f.log_mean - std::log(x)) / f.log_sd);
}
double family_upper(const LogNormalPrior& f, double x) {
  return model::upper(standard_normal, (std::log(x) - f.log_mean) / f.log_sd);
}
double family_quantile(const LogNormalPrior& f, double p) {
  const double z =
      p < 0.5 ? -model::upper_quantile(standard_normal, p) : model::upper_quantile(standard_normal, 1.0 - p);
  return std::exp(f.log_mean + f.log_sd * z);
}
PriorShape family_shape(const LogNormalPrior& f) {
  const double mode = std::exp(f.log_mean - f.log_sd * f.log_sd);
  return {0.0, infinity, mode, f.log_sd * mode, family_log_density(f, mode)};
}

double family_log_density(const ExponentialPrior& f, double x) { return -std::log(f.mean) - x / f.mean; }
double family_lower(const ExponentialPrior& f, double x) { return -std::expm1(-x / f.mean); }
double family_upper(const ExponentialPrior& f, double x) { return std::exp(-x / f.mean); }
double family_quantile(const ExponentialPrior& f, double p) { return -f.mean * std::log1p(-p); }
PriorShape family_shape(const ExponentialPrior& f) { return {0.0, infinity, 0.0, f.mean, -std::log(f.mean)}; }

double family_log_density(const UniformSpreadPrior& f, double x) {
  return x >= f.low && x <= f.high ? -std::log(f.high - f.low) : -infinity;
}
double family_lower(const UniformSpreadPrior& f, double x) {
  return std::clamp((x - f.low) / (f.high - f.low), 0.0, 1.0);
}
double family_upper(const UniformSpreadPrior& f, double x) {
  return std::clamp((f.high - x) / (f.high - f.low), 0.0, 1.0);
}
double family_quantile(const UniformSpreadPrior& f, double p) { return f.low + p * (f.high - f.low); }
PriorShape family_shape(const UniformSpreadPrior& f) {
  return {f.low, f.high, 0.5 * (f.low + f.high), 0.5 * (f.high - f.low), -std::log(f.high - f.low)};
}

// Calls `function` with the family, the half families as a Half.
template <class Function>
auto with_family(const SpreadPrior& prior, Function function) {
  return std::visit(Overloaded{[&](const HalfCauchyPrior& f) { return function(half(f)); },
                               [&](const HalfNormalPrior& f) { return function(half(f)); },
                               [&](const HalfStudentTPrior& f) { return function(half(f)); },
                               [&](const auto& f) { return function(f); }},
                    prior.family);
}

// The density at τ = 0, as a limit: families on log τ or 1/τ vanish there.
bool vanishes_at_zero(const SpreadPrior& prior) {
  return std::holds_alternative<InverseGammaPrior>(prior.family) ||
         std::holds_alternative<LogNormalPrior>(prior.family);
}

}  // namespace

double log_density(const SpreadPrior& prior, double spread) {
  if (std::isnan(spread)) return not_a_number;
  if (spread < 0.0 || std::isinf(spread)) return -infinity;
  if (spread == 0.0 && vanishes_at_zero(prior)) return -infinity;
  return with_family(prior, [spread](const auto& f) { return family_log_density(f, spread); });
}

double cdf(const SpreadPrior& prior, double spread) {
  if (std::isnan(spread)) return not_a_number;
  if (spread <= 0.0) return 0.0;
  if (std::isinf(spread)) return 1.0;
  return with_family(prior, [spread](const auto& f) { return family_lower(f, spread); });
}

double upper_cdf(const SpreadPrior& prior, double spread) {
  if (std::isnan(spread)) return not_a_number;
  if (spread <= 0.0) return 1.0;
  if (std::isinf(spread)) return 0.0;
  return with_family(prior, [spread](const auto& f) { return family_upper(f, spread); });
}

double quantile(const SpreadPrior& prior, double p) {
  if (!(p > 0.0 && p < 1.0)) return not_a_number;
  return with_family(prior, [p](const auto& f) { return family_quantile(f, p); });
}

PriorShape shape(const SpreadPrior& prior) {
  return with_family(prior, [](const auto& f) { return family_shape(f); });
}

double tail_order(const SpreadPrior& prior) {
  return std::visit(
      Overloaded{[](const HalfCauchyPrior&) { return 1.0; }, [](const HalfStudentTPrior& f) { return f.df; },
                 [](const InverseGammaPrior& f) { return f.shape; }, [](const auto&) { return infinity; }},
      prior.family);
}

}  // namespace steelyard
