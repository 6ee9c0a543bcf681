// Regions, directions and thresholds.
#include <catch2/catch.hpp>
#include <cmath>
#include <vector>

#include "steelyard/numeric.hpp"
#include "steelyard/weigh.hpp"
#include "weigh/made_up.hpp"

using namespace steelyard;

namespace {

RegionResult region(const std::vector<Study>& studies, const Priors& priors, const RegionOptions& options) {
  const auto pooled = pool(studies, priors);
  REQUIRE(pooled.ok());
  auto result = weigh_region(*pooled.value, priors, studies, options);
  REQUIRE(result.ok());
  return *result.value;
}

Priors same_effect_only(const EffectPrior& effect) {
  Priors priors;
  priors.effect = effect;
  priors.model = {0.5, 0.5, 0.0, 0.0};
  return priors;
}

}  // namespace

TEST_CASE("a Normal estimate under a Normal prior has a closed interval null") {
  // Morey & Rouder (2011): posterior odds of the interval over prior odds. Posterior Normal(m, s²) with
  // 1/s² = 1/v + 1/g, m = s²·x/v.
  const double x = 0.15, v = 0.01, g = 0.25;
  const double s2 = 1.0 / (1.0 / v + 1.0 / g), m = s2 * x / v, s = std::sqrt(s2);
  const std::vector<Study> studies = {made_up::estimate("a", x, 0.1)};
  RegionOptions options{{-0.1, 0.2}, 0.05};
  const RegionResult r = region(studies, same_effect_only({NormalPrior{0.0, 0.5}}), options);
  const double inside = numeric::normal_cdf((0.2 - m) / s) - numeric::normal_cdf((-0.1 - m) / s);
  const double prior = numeric::normal_cdf(0.4) - numeric::normal_cdf(-0.2);
  CHECK(r.mean_effect.inside == Approx(inside).margin(1e-8));
  CHECK(r.prior_inside == Approx(prior).epsilon(1e-12));
  REQUIRE(r.negligible.has_value());
  CHECK(r.negligible->log_bf ==
        Approx(std::log(inside / (1.0 - inside)) - std::log(prior / (1.0 - prior))).margin(1e-6));
  CHECK(std::exp(*r.log_sign_odds) ==
        Approx(numeric::normal_cdf(m / s) / numeric::normal_upper(m / s)).epsilon(1e-6));
  CHECK(r.positive == Approx(numeric::normal_cdf(m / s)).margin(1e-8));
  // One study, the same effect everywhere: a new study's effect is the mean effect.
  CHECK(*r.above_threshold == Approx(numeric::normal_upper((0.05 - m) / s)).margin(1e-8));
  // With the null model, its mass at 0 counts as inside.
  const double log_bf = 0.5 * std::log(v / (v + g)) + 0.5 * x * x * (1.0 / v - 1.0 / (v + g));
  const double p1 = 1.0 / (1.0 + std::exp(-log_bf));
  CHECK(*r.mean_effect.inside_all_models == Approx(p1 * inside + 1.0 - p1).margin(1e-7));
}

TEST_CASE("a region and the two sides of it make up everything") {
  const std::vector<Study> studies = {made_up::two_groups("a", 2.1, 31), made_up::two_groups("b", 0.4, 60),
                                      made_up::two_groups("c", 1.4, 22)};
  const RegionResult r = region(studies, Priors{}, {{-0.1, 0.1}, 0.1});
  const RegionResult above = region(studies, Priors{}, {{0.1, 50.0}, -0.1});
  const RegionResult below = region(studies, Priors{}, {{-50.0, -0.1}, 0.0});
  CHECK(r.mean_effect.inside + above.mean_effect.inside + below.mean_effect.inside ==
        Approx(1.0).margin(1e-3));
  CHECK(*r.new_study.inside_all_models + *above.new_study.inside_all_models +
            *below.new_study.inside_all_models ==
        Approx(1.0).margin(2e-3));
  CHECK(*above.above_threshold - *r.above_threshold == Approx(r.new_study.inside).margin(1e-7));
  CHECK(*above.above_threshold_all_models - *r.above_threshold_all_models ==
        Approx(*r.new_study.inside_all_models).margin(1e-6));
}

TEST_CASE("overwhelming evidence about a region is a bound, its sign stays exact") {
  const std::vector<Study> studies = {made_up::two_groups("a", 25.0, 300)};
  const RegionResult r = region(studies, same_effect_only(EffectPrior{}), {{-0.1, 0.1}, std::nullopt});
  CHECK_FALSE(r.negligible.has_value());
  REQUIRE(r.negligible_limit.has_value());
  CHECK(*r.negligible_limit < -10.0);
  CHECK_FALSE(r.reason.empty());
  CHECK(*r.log_sign_odds > 100.0);
  CHECK_FALSE(r.above_threshold.has_value());
}

TEST_CASE("a direction leaves one sign only") {
  Priors priors = same_effect_only({CauchyPrior{0.0, 0.7}, Direction::greater});
  const RegionResult r = region({made_up::two_groups("a", 0.5, 30)}, priors, {{-0.1, 0.1}, std::nullopt});
  CHECK(r.positive == Approx(1.0).margin(1e-12));
  CHECK_FALSE(r.log_sign_odds.has_value());
}
