// Priors into the shortest text that reads back as the same prior.
#include <fmt/format.h>

#include <cmath>
#include <string>
#include <variant>

#include "model/visit.hpp"
#include "steelyard/model.hpp"

namespace steelyard {

namespace {

using model::Overloaded;

// A number that needs many digits may be a simple root or fraction; then that is shorter and says more.
// Each candidate is formed as the grammar would: in long double, rounded once.
std::string number(double value) {
  std::string literal = fmt::format("{}", value);
  if (literal.size() <= 9 || !std::isfinite(value)) return literal;
  const double size = std::abs(value);
  const char* sign = value < 0.0 ? "-" : "";
  for (int n = 2; n <= 12; ++n) {
    const long double root = std::sqrt(static_cast<long double>(n));
    if (size == static_cast<double>(1.0L / root)) return fmt::format("{}1/sqrt({})", sign, n);
    if (size == static_cast<double>(root)) return fmt::format("{}sqrt({})", sign, n);
    if (size == static_cast<double>(root / 2.0L)) return fmt::format("{}sqrt({})/2", sign, n);
    for (int m = 1; m <= 12; ++m) {
      if (size == static_cast<double>(static_cast<long double>(m) / n))
        return fmt::format("{}{}/{}", sign, m, n);
    }
  }
  return literal;
}

template <class... Numbers>
std::string call(const char* name, double first, Numbers... rest) {
  std::string text = fmt::format("{}({}", name, number(first));
  ((text += ", " + number(rest)), ...);
  return text + ")";
}

}  // namespace

std::string to_text(const EffectPrior& prior) {
  return std::visit(
      Overloaded{[](const CauchyPrior& f) { return call("cauchy", f.location, f.scale); },
                 [](const NormalPrior& f) { return call("normal", f.mean, f.sd); },
                 [](const StudentTPrior& f) { return call("student-t", f.location, f.scale, f.df); },
                 [](const UniformPrior& f) { return call("uniform", f.low, f.high); },
                 [](const FlatPrior&) { return std::string("flat"); }},
      prior.family);
}

std::string to_text(const SpreadPrior& prior) {
  return std::visit(
      Overloaded{[](const HalfCauchyPrior& f) { return call("half-cauchy", f.scale); },
                 [](const HalfNormalPrior& f) { return call("half-normal", f.scale); },
                 [](const HalfStudentTPrior& f) { return call("half-student-t", f.scale, f.df); },
                 [](const InverseGammaPrior& f) { return call("inverse-gamma", f.shape, f.scale); },
                 [](const LogNormalPrior& f) { return call("log-normal", f.log_mean, f.log_sd); },
                 [](const ExponentialPrior& f) { return call("exponential", f.mean); },
                 [](const UniformSpreadPrior& f) { return call("uniform", f.low, f.high); }},
      prior.family);
}

std::string_view to_text(Direction direction) {
  switch (direction) {
    case Direction::greater:
      return "greater";
    case Direction::less:
      return "less";
    case Direction::either:
      break;
  }
  return "either";
}

}  // namespace steelyard
