// Identities that hold whatever the numbers.
#include <algorithm>
#include <array>
#include <catch2/catch.hpp>
#include <cmath>
#include <random>

#include "numeric/quadrature.hpp"
#include "pool/helpers.hpp"
#include "steelyard/numeric.hpp"

using namespace steelyard;
using namespace pool_tests;

namespace {

/// Invented studies of mixed sizes; the same for a given seed.
std::vector<Study> made_up(std::size_t count, unsigned seed) {
  std::mt19937 engine(seed);
  const auto uniform = [&engine] { return static_cast<double>(engine() >> 8) / 16777216.0; };
  std::vector<Study> out;
  for (std::size_t i = 0; i < count; ++i) {
    const double n = std::floor(5.0 + 100.0 * uniform());
    out.push_back(two_groups(6.0 * uniform() - 2.0, n));
  }
  return out;
}

Study mirrored(Study study) {
  std::get<ExactT>(study.evidence).t *= -1.0;
  return study;
}

double log_bf(const std::optional<LogBayesFactor>& bf) { return bf.value().log_bf; }

}  // namespace

TEST_CASE("swapping the groups mirrors everything", "[pool][identity]") {
  const auto studies = made_up(7, 1);
  std::vector<Study> swapped;
  std::transform(studies.begin(), studies.end(), std::back_inserter(swapped), mirrored);
  Priors priors;
  Priors other;
  for (const Direction direction : {Direction::either, Direction::greater}) {
    priors.effect.direction = direction;
    other.effect.direction = direction == Direction::either ? direction : Direction::less;
    const PoolResult a = pooled(studies, priors);
    const PoolResult b = pooled(swapped, other);
    for (std::size_t m = 0; m < model_count; ++m)
      CHECK(a.models[m].integral->log_value == Approx(b.models[m].integral->log_value).epsilon(1e-11));
    CHECK(*a.pooled_effect.mean == Approx(-*b.pooled_effect.mean).epsilon(1e-8));
    CHECK(*a.pooled_effect.lower == Approx(-*b.pooled_effect.upper).epsilon(1e-7));
    CHECK(*a.new_study.upper == Approx(-*b.new_study.lower).epsilon(1e-6));
    CHECK(*a.spread.mean == Approx(*b.spread.mean).epsilon(1e-8));
  }
}

TEST_CASE("the order of studies changes nothing", "[pool][identity]") {
  auto studies = made_up(9, 2);
  const PoolResult a = pooled(studies);
  std::reverse(studies.begin(), studies.end());
  const PoolResult b = pooled(studies);
  for (std::size_t m = 0; m < model_count; ++m) {
    CHECK(a.models[m].integral->log_value == b.models[m].integral->log_value);
    CHECK(a.models[m].posterior_probability == b.models[m].posterior_probability);
  }
  CHECK(*a.pooled_effect.mean == *b.pooled_effect.mean);
  CHECK(*a.studies[0].shrunken.median == *b.studies[8].shrunken.median);
}

TEST_CASE("splitting an estimate leaves the same-effect answers", "[pool][identity]") {
  Priors priors;
  priors.effect.family = NormalPrior{0.0, 2.0};
  priors.spread.family = HalfNormalPrior{1.0};
  const double halved = 0.4 * std::sqrt(2.0);
  const PoolResult whole = pooled({estimate(0.9, 0.4), estimate(0.2, 0.6)}, priors);
  const PoolResult split = pooled({estimate(0.9, halved), estimate(0.9, halved), estimate(0.2, 0.6)}, priors);
  CHECK(log_bf(whole.effect_fixed) == Approx(log_bf(split.effect_fixed)).epsilon(1e-10));
  CHECK(*whole.pooled_effect_fixed.mean == Approx(*split.pooled_effect_fixed.mean).epsilon(1e-9));
  CHECK(*whole.pooled_effect_fixed.upper == Approx(*split.pooled_effect_fixed.upper).epsilon(1e-7));
  // Two studies that agree say more about heterogeneity than one: the varying-effects answers do change.
  CHECK(std::fabs(log_bf(whole.effect_random) - log_bf(split.effect_random)) > 1e-3);
}

TEST_CASE("varying effects tend to one effect as the spread prior shrinks", "[pool][identity]") {
  const auto studies = made_up(6, 3);
  double before = 1e9;
  for (const double scale : {0.1, 0.01, 0.001, 0.0001}) {
    Priors priors;
    priors.spread.family = HalfNormalPrior{scale};
    const PoolResult result = pooled(studies, priors, {.summaries = false});
    const double gap = std::fabs(log_bf(result.effect_random) - log_bf(result.effect_fixed));
    CHECK(gap < before);
    before = gap;
  }
  CHECK(before < 1e-5);
}

TEST_CASE("the chain rule needs the carried-over posterior", "[pool][identity]") {
  // Marginal likelihoods of all studies = first × second given first: by construction of ratios. The plain
  // product of single Bayes factors is something else.
  const auto studies = made_up(4, 4);
  const auto all = likelihoods(studies);
  const EffectPrior prior;
  double product = 0.0;
  for (const Likelihood& one : all)
    product +=
        log_marginal_fixed({&one, 1}, prior).log_value - log_marginal_fixed_at({&one, 1}, 0.0).log_value;
  const double total = log_marginal_fixed(all, prior).log_value - log_marginal_fixed_at(all, 0.0).log_value;
  CHECK(std::fabs(product - total) > 0.05);
  // Second study given the first, by an integral over the first one's posterior.
  const PoolResult first = pooled({studies[0]});
  const auto& rule = numeric::kronrod_rule();
  double predictive = 0.0;
  const double low = *first.pooled_effect_fixed.mean - 9.0 * *first.pooled_effect_fixed.sd;
  const double high = *first.pooled_effect_fixed.mean + 9.0 * *first.pooled_effect_fixed.sd;
  constexpr int panels = 24;
  for (int p = 0; p < panels; ++p)
    for (std::size_t j = 0; j < rule.x.size(); ++j) {
      const double half = 0.5 * (high - low) / panels;
      const double x = low + (2.0 * p + 1.0) * half + half * rule.x[j];
      predictive += half * rule.weight[j] * first.posterior->effect_density(Within::fixed_effect, x) *
                    std::exp(log_likelihood(all[1], x, 0.0));
    }
  const double both = log_marginal_fixed({all.data(), 2}, prior).log_value;
  CHECK(std::log(predictive) ==
        Approx(both - log_marginal_fixed({all.data(), 1}, prior).log_value).epsilon(1e-7));
}

TEST_CASE("the expected Bayes factor under the null is one", "[pool][identity]") {
  // ∫ BF(t)·f(t | no effect) dt = 1, for the effect prior in each direction.
  for (const Direction direction : {Direction::either, Direction::greater}) {
    EffectPrior prior;
    prior.direction = direction;
    const auto& rule = numeric::kronrod_rule();
    double sum = 0.0;
    constexpr int panels = 60;
    constexpr double reach = 9.0;  // in asinh(t)
    for (int p = 0; p < panels; ++p)
      for (std::size_t j = 0; j < rule.x.size(); ++j) {
        const double half = reach / panels;
        const double w = -reach + (2.0 * p + 1.0) * half + half * rule.x[j];
        const auto one = likelihoods({one_sample(std::sinh(w), 12.0)});
        sum += half * rule.weight[j] * std::exp(log_marginal_fixed(one, prior).log_value) * std::cosh(w);
      }
    // What lies beyond sinh(9) under a Cauchy prior: about 2·(1/√2)·√12/(π·4052) in each tail.
    CHECK(sum == Approx(1.0).margin(1e-3));
  }
}

TEST_CASE("the density ratio at zero is the Bayes factor", "[pool][identity]") {
  const auto studies = made_up(5, 6);
  const PoolResult result = pooled(studies);
  const double prior = std::exp(log_density(EffectPrior{}, 0.0));
  CHECK(std::log(prior / result.posterior->effect_density(Within::fixed_effect, 0.0)) ==
        Approx(log_bf(result.effect_fixed)).epsilon(1e-7));
  CHECK(std::log(prior / result.posterior->effect_density(Within::random_effect, 0.0)) ==
        Approx(log_bf(result.effect_random)).epsilon(1e-6));
}
