// Priors made from other priors, and the bound that needs nothing but a p value.
#include <cmath>
#include <variant>

#include "steelyard/weigh.hpp"

namespace steelyard {

namespace {

constexpr double normal_upper_05 = 1.6448536269514722;  // upper 5 % point of the standard Normal

EffectFamily wider(CauchyPrior f, double factor) {
  f.scale *= factor;
  return f;
}
EffectFamily wider(NormalPrior f, double factor) {
  f.sd *= factor;
  return f;
}
EffectFamily wider(StudentTPrior f, double factor) {
  f.scale *= factor;
  return f;
}
EffectFamily wider(UniformPrior f, double factor) {
  const double middle = 0.5 * (f.low + f.high);
  const double half = 0.5 * (f.high - f.low) * factor;
  return UniformPrior{middle - half, middle + half};
}
EffectFamily wider(FlatPrior f, double) { return f; }

SpreadFamily larger(HalfCauchyPrior f, double factor) {
  f.scale *= factor;
  return f;
}
SpreadFamily larger(HalfNormalPrior f, double factor) {
  f.scale *= factor;
  return f;
}
SpreadFamily larger(HalfStudentTPrior f, double factor) {
  f.scale *= factor;
  return f;
}
SpreadFamily larger(InverseGammaPrior f, double factor) {
  f.scale *= factor;
  return f;
}
SpreadFamily larger(LogNormalPrior f, double factor) {
  f.log_mean += std::log(factor);
  return f;
}
SpreadFamily larger(ExponentialPrior f, double factor) {
  f.mean *= factor;
  return f;
}
SpreadFamily larger(UniformSpreadPrior f, double factor) {
  f.low *= factor;
  f.high *= factor;
  return f;
}

std::optional<double> width(const CauchyPrior& f) { return f.scale; }
std::optional<double> width(const NormalPrior& f) { return f.sd; }
std::optional<double> width(const StudentTPrior& f) { return f.scale; }
std::optional<double> width(const UniformPrior& f) { return 0.5 * (f.high - f.low); }
std::optional<double> width(const FlatPrior&) { return std::nullopt; }

}  // namespace

EffectPrior with_width(const EffectPrior& prior, double factor) {
  return {std::visit([factor](const auto& f) { return wider(f, factor); }, prior.family), prior.direction};
}

SpreadPrior with_scale(const SpreadPrior& prior, double factor) {
  return {std::visit([factor](const auto& f) { return larger(f, factor); }, prior.family)};
}

std::optional<double> width_of(const EffectPrior& prior) {
  return std::visit([](const auto& f) { return width(f); }, prior.family);
}

EffectPrior sceptical_prior(double expected) {
  return {NormalPrior{0.0, std::abs(expected) / normal_upper_05}, Direction::either};
}

EffectPrior enthusiastic_prior(double expected) {
  return {NormalPrior{expected, std::abs(expected) / normal_upper_05}, Direction::either};
}

std::optional<double> log_sellke_bound(double p) {
  if (!(p > 0.0 && std::log(p) < -1.0)) return std::nullopt;
  return -1.0 - std::log(p) - std::log(-std::log(p));
}

}  // namespace steelyard
