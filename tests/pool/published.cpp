// Against published values.
#include <catch2/catch.hpp>
#include <cmath>

#include "pool/helpers.hpp"

using namespace steelyard;
using namespace pool_tests;

TEST_CASE("Bayes factors for the null of two one-sample tests", "[pool][published]") {
  // Rouder, Speckman, Sun, Morey & Iverson (2009), from memory: t(79) = 2.24 and 2.03 under Cauchy(0, 1)
  // give 1.02 and 1.56 for the null.
  Priors priors;
  priors.effect.family = CauchyPrior{0.0, 1.0};
  const auto for_null = [&](double t) {
    return std::exp(-pooled({one_sample(t, 80.0)}, priors).effect_fixed.value().log_bf);
  };
  CHECK(for_null(2.24) == Approx(1.02).margin(0.005));
  CHECK(for_null(2.03) == Approx(1.56).margin(0.005));
}

TEST_CASE("Eight schools: the common mean under a flat prior", "[pool][published]") {
  // Rubin (1981), the estimates as commonly printed; common mean 7.69, standard error 4.07.
  const double y[] = {28, 8, -3, 7, -1, 1, 18, 12};
  const double se[] = {15, 10, 16, 11, 9, 11, 10, 18};
  std::vector<Study> studies;
  for (int i = 0; i < 8; ++i) studies.push_back(estimate(y[i], se[i]));
  Priors priors;
  priors.effect.family = NormalPrior{0.0, 1e5};  // as good as flat
  priors.spread.family = HalfNormalPrior{10.0};
  const PoolResult result = pooled(studies, priors);
  CHECK(*result.pooled_effect_fixed.mean == Approx(7.69).margin(0.005));
  CHECK(*result.pooled_effect_fixed.sd == Approx(4.07).margin(0.005));
}

TEST_CASE("Normal estimates under a Normal prior have a closed form", "[pool][published]") {
  // Conjugate algebra (any textbook): precision adds; log m = log N(y; 0, se² + sd²) for one study.
  Priors priors;
  priors.effect.family = NormalPrior{0.3, 0.8};
  const PoolResult result = pooled({estimate(1.1, 0.5)}, priors);
  const double variance = 0.25 + 0.64;
  const double expected = -0.5 * std::log(2.0 * M_PI * variance) - 0.5 * 0.8 * 0.8 / variance;
  const Integral& integral = *result.at(Model::fixed_effect).integral;
  CHECK(std::fabs(integral.log_value - expected) <= integral.abs_error);
  const double precision = 1.0 / 0.25 + 1.0 / 0.64;
  const double mean = (1.1 / 0.25 + 0.3 / 0.64) / precision;
  CHECK(*result.pooled_effect.mean == Approx(mean).epsilon(1e-10));
  CHECK(*result.pooled_effect.sd == Approx(1.0 / std::sqrt(precision)).epsilon(1e-8));
  // 97.5 % point of the standard Normal, as in any table.
  CHECK(*result.pooled_effect.upper == Approx(mean + 1.959963984540054 / std::sqrt(precision)).epsilon(1e-8));
}
