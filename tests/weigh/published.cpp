// Numbers that others printed.
#include <catch2/catch.hpp>
#include <cmath>
#include <utility>
#include <vector>

#include "steelyard/weigh.hpp"
#include "weigh/made_up.hpp"

using namespace steelyard;

namespace {

WeighResult weighed(const Study& study, const EffectPrior& prior = {}, const WeighOptions& options = {}) {
  auto result = weigh({&study, 1}, prior, options);
  REQUIRE(result.ok());
  return *result.value;
}

}  // namespace

TEST_CASE("the bound from a p value: Sellke, Bayarri & Berger (2001), table 1") {
  // Lower bounds on the Bayes factor for the null, −e·p·log p, as printed.
  const std::vector<std::pair<double, double>> table = {{.2, .875},  {.1, .626},   {.05, .407},
                                                        {.01, .125}, {.005, .072}, {.001, .0188}};
  const std::vector<double> half_unit = {.0005, .0005, .0005, .0005, .0005, .00005};
  for (std::size_t i = 0; i < table.size(); ++i) {
    const auto bound = log_sellke_bound(table[i].first);
    REQUIRE(bound.has_value());
    CHECK(std::abs(std::exp(-*bound) - table[i].second) <= half_unit[i] * 1.001);
  }
  CHECK_FALSE(log_sellke_bound(0.4).has_value());
  CHECK_FALSE(log_sellke_bound(0.0).has_value());
}

TEST_CASE("the likelihood's maximum: Berger & Sellke (1987), all priors") {
  // inf P(H0 | x) with prior probability one half, as printed, is 1/(1 + the largest likelihood ratio).
  const std::vector<std::pair<double, double>> table = {
      {1.645, .205}, {1.960, .128}, {2.576, .035}, {3.291, .0044}};
  const std::vector<double> half_unit = {.0005, .0005, .0005, .00005};
  for (std::size_t i = 0; i < table.size(); ++i) {
    const auto result = weighed(made_up::estimate("z", table[i].first, 1.0));
    const double p0 = 1.0 / (1.0 + std::exp(result.rows[0].bound.log_bf));
    CHECK(std::abs(p0 - table[i].second) <= half_unit[i] * 1.001);
    CHECK(result.rows[0].bound.effect.value() == Approx(table[i].first).epsilon(1e-6));
  }
}

TEST_CASE("t tests of Rouder, Speckman, Sun, Morey & Iverson (2009)") {
  // One-sample t(79) = 2.24 and 2.03, Cauchy(0, 1): Bayes factors for the null 1.02 and 1.56 (from memory).
  const EffectPrior unit{CauchyPrior{0.0, 1.0}, Direction::either};
  CHECK(std::exp(-weighed(made_up::one_sample("a", 2.24, 80), unit).rows[0].bf.log_bf) ==
        Approx(1.02).margin(0.005));
  CHECK(std::exp(-weighed(made_up::one_sample("b", 2.03, 80), unit).rows[0].bf.log_bf) ==
        Approx(1.56).margin(0.005));
}

TEST_CASE("a Normal estimate under a Normal prior has a closed Bayes factor") {
  // Textbook: x ~ N(δ, v), δ ~ N(0, g): BF = √(v/(v+g))·exp(x²/2·(1/v − 1/(v+g))).
  const double x = 0.42, v = 0.04, g = 0.25;
  const EffectPrior prior{NormalPrior{0.0, 0.5}, Direction::either};
  const auto result = weighed(made_up::estimate("x", x, 0.2), prior);
  const double closed = 0.5 * std::log(v / (v + g)) + 0.5 * x * x * (1.0 / v - 1.0 / (v + g));
  CHECK(result.rows[0].bf.log_bf == Approx(closed).margin(1e-8));
  // The width at which it passes 1 solves the same formula with g free.
  const double width = result.rows[0].turning_width.value();
  const double wide = width * width;
  CHECK(0.5 * std::log(v / (v + wide)) + 0.5 * x * x * (1.0 / v - 1.0 / (v + wide)) ==
        Approx(0.0).margin(1e-7));
  CHECK(width > 0.5);
}

TEST_CASE("sceptic and enthusiast: Spiegelhalter, Freedman & Parmar (1994)") {
  // 5 % beyond the expected effect for the sceptic, 5 % on the wrong side of zero for the enthusiast.
  CHECK(upper_cdf(sceptical_prior(0.5), 0.5) == Approx(0.05).epsilon(1e-12));
  CHECK(cdf(enthusiastic_prior(0.5), 0.0) == Approx(0.05).epsilon(1e-12));
  CHECK(upper_cdf(enthusiastic_prior(-0.5), 0.0) == Approx(0.05).epsilon(1e-12));
}
