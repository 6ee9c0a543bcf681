// What must hold between the functions of one prior: quantiles invert, halves mirror, the density
// integrates to the distribution function, the shape tells the truth.
#include <catch2/catch.hpp>
#include <cmath>
#include <limits>
#include <string>
#include <vector>

#include "steelyard/model.hpp"

using namespace steelyard;

namespace {

constexpr double infinity = std::numeric_limits<double>::infinity();

std::vector<EffectPrior> effect_priors() {
  std::vector<EffectPrior> priors;
  for (const char* text :
       {"cauchy(0, 1/sqrt(2))", "cauchy(-2, 0.1)", "normal(0, 1)", "normal(-5, 0.1)", "normal(0.3, 0.001)",
        "student-t(0.35, 0.102, 3)", "student-t(0, 100, 0.5)", "student-t(-1, 0.01, 30)", "uniform(-1, 2)"}) {
    for (const Direction direction : {Direction::either, Direction::greater, Direction::less}) {
      priors.push_back(parse_effect_prior(text).value.value());
      priors.back().direction = direction;
    }
  }
  return priors;
}

std::vector<SpreadPrior> spread_priors() {
  std::vector<SpreadPrior> priors;
  for (const char* text :
       {"half-cauchy(0.5)", "half-normal(0.01)", "half-student-t(1, 4)", "half-student-t(0.3, 0.5)",
        "inverse-gamma(1, 0.15)", "inverse-gamma(0.2, 3)", "inverse-gamma(40, 20)", "log-normal(-1.28, 0.87)",
        "log-normal(0, 5)", "exponential(0.3)", "uniform(0, 1)", "uniform(0.2, 0.4)"}) {
    priors.push_back(parse_spread_prior(text).value.value());
  }
  return priors;
}

const std::vector<double> probabilities = {1e-12, 1e-6, 0.001, 0.025, 0.3,
                                           0.5,   0.7,  0.975, 0.999, 1.0 - 1e-9};

template <class Prior>
void check_quantiles(const Prior& prior) {
  for (const double p : probabilities) {
    const double x = quantile(prior, p);
    INFO(to_text(prior) << " p " << p << " x " << x);
    CHECK(std::abs(cdf(prior, x) - p) <= 1e-12);
    CHECK(std::abs(cdf(prior, x) + upper_cdf(prior, x) - 1.0) <= 1e-12);
  }
  CHECK(std::isnan(quantile(prior, 0.0)));
  CHECK(std::isnan(quantile(prior, 1.0)));
  CHECK(std::isnan(cdf(prior, std::nan(""))));
}

template <class Prior>
void check_shape(const Prior& prior) {
  const PriorShape s = shape(prior);
  INFO(to_text(prior) << " center " << s.center << " scale " << s.scale);
  CHECK(s.low < s.high);
  CHECK(s.center >= s.low);
  CHECK(s.center <= s.high);
  CHECK(s.scale > 0.0);
  CHECK(log_density(prior, std::nextafter(s.low, -infinity)) == -infinity);
  CHECK(log_density(prior, std::nextafter(s.high, infinity)) == -infinity);
  for (int i = 1; i < 200; ++i) {
    CHECK(log_density(prior, quantile(prior, i / 200.0)) <= s.log_peak + 1e-12);
  }
  CHECK(log_density(prior, s.center) == Approx(s.log_peak).margin(1e-12));
}

}  // namespace

TEST_CASE("quantiles invert the distribution function") {
  for (const EffectPrior& prior : effect_priors()) check_quantiles(prior);
  for (const SpreadPrior& prior : spread_priors()) check_quantiles(prior);
}

TEST_CASE("the shape of a prior holds its support and its peak") {
  for (const EffectPrior& prior : effect_priors()) check_shape(prior);
  for (const SpreadPrior& prior : spread_priors()) check_shape(prior);
}

TEST_CASE("a cut to less is the mirror image of a cut to greater") {
  const EffectPrior less{StudentTPrior{0.35, 0.102, 3.0}, Direction::less};
  const EffectPrior greater{StudentTPrior{-0.35, 0.102, 3.0}, Direction::greater};
  for (const double x : {1e-9, 0.01, 0.3, 2.0, 1e6}) {
    CHECK(log_density(less, -x) == log_density(greater, x));
    CHECK(cdf(less, -x) == upper_cdf(greater, x));
    CHECK(upper_cdf(less, -x) == cdf(greater, x));
  }
  CHECK(quantile(less, 0.25) == Approx(-quantile(greater, 0.75)).epsilon(1e-13));
}

TEST_CASE("a cut renormalizes by the mass it leaves") {
  // P(X > 0) = ½ by symmetry: the density doubles.
  const EffectPrior whole{CauchyPrior{0.0, 0.7}, Direction::either};
  const EffectPrior half{CauchyPrior{0.0, 0.7}, Direction::greater};
  CHECK(log_density(half, 0.4) == Approx(log_density(whole, 0.4) + std::log(2.0)).epsilon(1e-15));
  CHECK(log_density(half, -0.4) == -infinity);
  const EffectPrior uniform{UniformPrior{-1.0, 3.0}, Direction::greater};
  CHECK(log_density(uniform, 1.0) == -std::log(3.0));
  CHECK(log_density(EffectPrior{FlatPrior{}, Direction::greater}, 12.0) == 0.0);
  CHECK(log_density(EffectPrior{FlatPrior{}, Direction::greater}, -12.0) == -infinity);
}

TEST_CASE("a cut far out in the tail is renormalized in logarithms") {
  // Normal(-5, 0.1) leaves e^-1255 above 0, where it is close to an exponential of rate 5/0.1² = 500;
  // Gordon (1941): the Mills ratio at 50 is 1/50·(1 − 1/50² + 3/50⁴ − 15/50⁶ + ...).
  const EffectPrior prior{NormalPrior{-5.0, 0.1}, Direction::greater};
  CHECK_FALSE(problem_with(prior).has_value());
  const double mills = (1.0 - 1.0 / 2500.0 + 3.0 / 6.25e6 - 15.0 / 1.5625e10) / 50.0;
  CHECK(log_density(prior, 0.0) == Approx(-std::log(0.1 * mills)).epsilon(1e-11));
  CHECK(shape(prior).center == 0.0);
  CHECK(shape(prior).scale < 0.005);
  CHECK(upper_cdf(prior, 0.002) == Approx(std::exp(-1.0)).epsilon(0.002));
}

TEST_CASE("tail orders say which moments exist") {
  CHECK(tail_order(EffectPrior{CauchyPrior{}}) == 1.0);
  CHECK(tail_order(EffectPrior{StudentTPrior{0.0, 1.0, 3.0}}) == 3.0);
  CHECK(tail_order(EffectPrior{NormalPrior{}}) == infinity);
  CHECK(tail_order(EffectPrior{FlatPrior{}}) < 0.0);
  CHECK(tail_order(SpreadPrior{InverseGammaPrior{1.7, 0.7}}) == 1.7);
  CHECK(tail_order(SpreadPrior{HalfCauchyPrior{}}) == 1.0);
  CHECK(tail_order(SpreadPrior{HalfStudentTPrior{1.0, 4.0}}) == 4.0);
  CHECK(tail_order(SpreadPrior{LogNormalPrior{}}) == infinity);
}
