// Shapes that break fixed grids: the promise of the error must hold, or the status must say otherwise.
#include <catch2/catch.hpp>
#include <cmath>
#include <limits>

#include "pool/helpers.hpp"
#include "steelyard/numeric.hpp"

using namespace steelyard;
using namespace pool_tests;

namespace {

constexpr double infinity = std::numeric_limits<double>::infinity();

void check_kept(const PoolResult& result) {
  for (const ModelResult& model : result.models) {
    if (!model.integral) continue;
    CAPTURE(std::string(id(model.model)), model.integral->log_value, model.integral->abs_error);
    CHECK(model.integral->status == IntegralStatus::ok);
    CHECK(std::isfinite(model.integral->log_value));
  }
}

void check_ordered(const Summary& s) {
  if (!s.median) return;
  CHECK(*s.lower <= *s.median);
  CHECK(*s.median <= *s.upper);
}

}  // namespace

TEST_CASE("one study has no heterogeneity", "[pool][hard]") {
  const PoolResult result = pooled({two_groups(2.4, 30.0)});
  check_kept(result);
  CHECK_FALSE(result.at(Model::random_effect).integral);
  CHECK_FALSE(result.heterogeneity);
  CHECK_FALSE(result.spread.median);
  CHECK(!result.spread.reason.empty());
  CHECK(result.effect->log_bf == Approx(result.effect_fixed->log_bf));
}

TEST_CASE("two studies far apart", "[pool][hard]") {
  const PoolResult result = pooled({two_groups(20.0, 50.0), two_groups(-20.0, 50.0)});
  check_kept(result);
  CHECK(*result.pooled_effect_fixed.mean == Approx(0.0).margin(1e-7));
  CHECK(*result.spread.median > 1.0);
}

TEST_CASE("two unsigned significant results leave two humps", "[pool][hard]") {
  const double c = numeric::student_t_upper_quantile(0.025, 38.0);
  const auto one = band({{-infinity, -c}, {c, infinity}}, 38.0, 10.0);
  const PoolResult result = pooled({one, one});
  check_kept(result);
  CHECK(*result.pooled_effect_fixed.median == Approx(0.0).margin(1e-6));
  CHECK(result.posterior->effect_density(Within::fixed_effect, 0.0) <
        0.5 * result.posterior->effect_density(Within::fixed_effect, 0.8));
  // Nothing bounds the effect: no mean under a Cauchy prior, but quantiles.
  CHECK_FALSE(result.pooled_effect.mean);
  CHECK(!result.pooled_effect.reason.empty());
  check_ordered(result.pooled_effect);
}

TEST_CASE("a narrow prior in conflict with the data", "[pool][hard]") {
  Priors priors;
  priors.effect.family = CauchyPrior{0.0, 0.001};
  priors.spread.family = HalfCauchyPrior{0.01};
  const PoolResult result =
      pooled({two_groups(10.0, 40.0), two_groups(9.0, 30.0), two_groups(0.4, 25.0)}, priors);
  check_kept(result);
  check_ordered(result.pooled_effect);
  check_ordered(result.spread);
}

TEST_CASE("a giant beside a dwarf", "[pool][hard]") {
  const PoolResult result = pooled({two_groups(25.0, 500.0), two_groups(1.0, 2.0), one_sample(0.3, 2.0)});
  check_kept(result);
  for (const StudyResult& study : result.studies) check_ordered(study.shrunken);
}

TEST_CASE("all t exactly zero", "[pool][hard]") {
  std::vector<Study> studies;
  for (int i = 0; i < 8; ++i) studies.push_back(two_groups(0.0, 20.0 + i));
  const PoolResult result = pooled(studies);
  check_kept(result);
  CHECK(*result.pooled_effect.mean == Approx(0.0).margin(1e-9));
  CHECK(result.effect->log_bf < 0.0);
}

TEST_CASE("a uniform prior whose edge cuts the likelihood", "[pool][hard]") {
  Priors priors;
  priors.effect.family = UniformPrior{-0.2, 0.35};
  priors.spread.family = UniformSpreadPrior{0.05, 0.3};
  const PoolResult result = pooled({two_groups(3.0, 60.0), two_groups(2.0, 40.0)}, priors);
  check_kept(result);
  CHECK(*result.pooled_effect.upper <= 0.35);
  CHECK(*result.spread.lower >= 0.05);
  CHECK(*result.spread.upper <= 0.3);
}

TEST_CASE("a direction opposite to the data", "[pool][hard]") {
  Priors priors;
  priors.effect.direction = Direction::less;
  const PoolResult result = pooled({two_groups(9.0, 80.0), two_groups(7.0, 90.0)}, priors);
  check_kept(result);
  CHECK(*result.pooled_effect_fixed.upper <= 0.0);
  CHECK(result.effect_fixed->log_bf < -2.0);
}

TEST_CASE("evidence far beyond the range of doubles", "[pool][hard]") {
  std::vector<Study> studies;
  for (int i = 0; i < 40; ++i) studies.push_back(two_groups(40.0, 5000.0 + i));
  const PoolResult result = pooled(studies, {}, {.shrunken = false});
  check_kept(result);
  CHECK(result.effect_fixed->log_bf > 10000.0);
}

TEST_CASE("extreme but legal rows", "[pool][hard]") {
  check_kept(pooled({two_groups(50.0, 20.0)}));
  check_kept(pooled({exact(2.0, 1.0, 0.9), exact(-3.0, 1.5, 2.0)}));
  check_kept(pooled({exact(2.2, 1e9, 5e8), exact(2.0, 1e6, 5e5)}));
}
