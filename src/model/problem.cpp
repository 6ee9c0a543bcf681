// Which priors can't be used, and what to say about them.
#include <fmt/format.h>

#include <cmath>
#include <optional>
#include <string>
#include <string_view>
#include <variant>

#include "model/special.hpp"
#include "model/visit.hpp"
#include "steelyard/model.hpp"

namespace steelyard {

namespace {

using model::Overloaded;

// Beyond these, squares and ratios of parameters leave the range of doubles.
constexpr double largest = 1e100;
constexpr double smallest = 1e-100;
// More degrees of freedom than this can't be told from a Normal distribution.
constexpr double most_df = 1e9;
// A cut that leaves less than e^-1000000 leaves nothing: a t family with many degrees of freedom would lose
// digits beyond, and nobody means it.
constexpr double least_log_mass = -1e6;

using Problem = std::optional<Diagnostic>;

Diagnostic problem(std::string code, std::string what, std::string remedy) {
  return {Severity::error, std::move(code), {}, std::move(what), std::move(remedy)};
}

Problem check_positive(double value, std::string_view name, std::string_view family) {
  if (value >= smallest && value <= largest) return std::nullopt;
  return problem("prior-parameter", fmt::format("The {} of {} prior is {}.", name, family, value),
                 fmt::format("It must be a positive number{}.",
                             value > 0.0 ? ", not smaller than 1e-100 and not larger than 1e100" : ""));
}

Problem check_finite(double value, std::string_view name, std::string_view family) {
  if (std::abs(value) <= largest) return std::nullopt;
  return problem("prior-parameter", fmt::format("The {} of {} prior is {}.", name, family, value),
                 "It must be a number between -1e100 and 1e100.");
}

Problem check_df(double df, std::string_view name, std::string_view family) {
  if (df > most_df) {
    return problem("prior-parameter", fmt::format("The {} of {} prior is {}.", name, family, df),
                   "It must not be larger than 1e9; use a Normal prior instead.");
  }
  return check_positive(df, name, family);
}

Problem check_order(double low, double high) {
  if (low < high) return std::nullopt;
  return problem("prior-parameter", fmt::format("A uniform prior from {} to {} has no width.", low, high),
                 "Give the lower end first and a larger upper end second, for instance uniform(0, 1).");
}

Problem first(Problem a, Problem b) { return a ? a : b; }

Problem parameters(const CauchyPrior& f) {
  return first(check_finite(f.location, "location", "a Cauchy"),
               check_positive(f.scale, "scale", "a Cauchy"));
}
Problem parameters(const NormalPrior& f) {
  return first(check_finite(f.mean, "mean", "a Normal"),
               check_positive(f.sd, "standard deviation", "a Normal"));
}
Problem parameters(const StudentTPrior& f) {
  return first(first(check_finite(f.location, "location", "a Student t"),
                     check_positive(f.scale, "scale", "a Student t")),
               check_df(f.df, "number of degrees of freedom", "a Student t"));
}
Problem parameters(const UniformPrior& f) {
  return first(
      first(check_finite(f.low, "lower end", "a uniform"), check_finite(f.high, "upper end", "a uniform")),
      check_order(f.low, f.high));
}
Problem parameters(const FlatPrior&) { return std::nullopt; }

Problem parameters(const HalfCauchyPrior& f) { return check_positive(f.scale, "scale", "a half-Cauchy"); }
Problem parameters(const HalfNormalPrior& f) { return check_positive(f.scale, "scale", "a half-Normal"); }
Problem parameters(const HalfStudentTPrior& f) {
  return first(check_positive(f.scale, "scale", "a half-Student-t"),
               check_df(f.df, "number of degrees of freedom", "a half-Student-t"));
}
Problem parameters(const InverseGammaPrior& f) {
  return first(check_df(f.shape, "shape", "an inverse-gamma"),
               check_positive(f.scale, "scale", "an inverse-gamma"));
}
Problem parameters(const LogNormalPrior& f) {
  if (!(std::abs(f.log_mean) <= 200.0)) {
    return problem("prior-parameter",
                   fmt::format("The mean of the logarithm in a log-Normal prior is {}.", f.log_mean),
                   "It must lie between -200 and 200; it is the logarithm of the median spread.");
  }
  if (!(f.log_sd > 0.0 && f.log_sd <= 20.0)) {
    return problem(
        "prior-parameter",
        fmt::format("The standard deviation of the logarithm in a log-Normal prior is {}.", f.log_sd),
        "It must be positive and not larger than 20.");
  }
  return std::nullopt;
}
Problem parameters(const ExponentialPrior& f) { return check_positive(f.mean, "mean", "an exponential"); }
Problem parameters(const UniformSpreadPrior& f) {
  if (f.low < 0.0) {
    return problem("prior-parameter", fmt::format("A uniform prior of the spread starts at {}.", f.low),
                   "A spread can't be negative; start at 0 or above.");
  }
  return first(
      first(check_finite(f.low, "lower end", "a uniform"), check_finite(f.high, "upper end", "a uniform")),
      check_order(f.low, f.high));
}

// log of the mass that the direction leaves.
double log_mass_left(const EffectPrior& prior) {
  const double sign = prior.direction == Direction::greater ? 1.0 : -1.0;
  return std::visit(
      Overloaded{[&](const CauchyPrior& f) {
                   return model::log_upper({model::Kernel::cauchy, 1.0}, -sign * f.location / f.scale);
                 },
                 [&](const NormalPrior& f) {
                   return model::log_upper({model::Kernel::normal, 1.0}, -sign * f.mean / f.sd);
                 },
                 [&](const StudentTPrior& f) {
                   return model::log_upper({model::Kernel::student, f.df}, -sign * f.location / f.scale);
                 },
                 [&](const UniformPrior& f) {
                   const double reach = sign > 0.0 ? f.high : -f.low;
                   return reach > 0.0 ? 0.0 : 2.0 * least_log_mass;
                 },
                 [](const FlatPrior&) { return 0.0; }},
      prior.family);
}

}  // namespace

std::optional<Diagnostic> problem_with(const EffectPrior& prior) {
  if (auto found = std::visit([](const auto& family) { return parameters(family); }, prior.family))
    return found;
  if (prior.direction == Direction::either || log_mass_left(prior) >= least_log_mass) return std::nullopt;
  const bool greater = prior.direction == Direction::greater;
  return problem(
      "prior-without-mass",
      fmt::format("The effect prior {} leaves no probability for effects {} than 0.", to_text(prior),
                  greater ? "greater" : "less"),
      fmt::format("Ask for the direction `{}`, allow either direction, or use a prior that reaches {} 0.",
                  greater ? "less" : "greater", greater ? "above" : "below"));
}

std::optional<Diagnostic> problem_with(const SpreadPrior& prior) {
  return std::visit([](const auto& family) { return parameters(family); }, prior.family);
}

}  // namespace steelyard
