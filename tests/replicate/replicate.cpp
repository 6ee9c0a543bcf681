// Originals against replications: definitions, identities, selection, prediction.
#include <catch2/catch.hpp>
#include <cmath>
#include <limits>
#include <string>
#include <vector>

#include "steelyard/numeric.hpp"
#include "steelyard/replicate.hpp"
#include "weigh/made_up.hpp"

using namespace steelyard;

namespace {

constexpr double infinity = std::numeric_limits<double>::infinity();

Study as(const std::string& role, Study study) {
  study.role = role;
  return study;
}

ReplicateResult replicated(const std::vector<Study>& studies, const Priors& priors = {},
                           const ReplicateOptions& options = {}) {
  auto result = replicate(studies, priors, options);
  INFO((result.diagnostics.empty() ? "" : result.diagnostics.front().what));
  REQUIRE(result.ok());
  return *result.value;
}

Priors normal_prior(double sd) {
  Priors priors;
  priors.effect = {NormalPrior{0.0, sd}, Direction::either};
  return priors;
}

double log_normal(double x, double mean, double variance) {
  return -0.5 * (x - mean) * (x - mean) / variance - 0.5 * std::log(2.0 * 3.14159265358979323846 * variance);
}

}  // namespace

TEST_CASE("Normal estimates have closed replication Bayes factors") {
  const double xo = 0.6, vo = 0.04, xr = 0.25, vr = 0.01, g = 0.25;
  const ReplicateResult r = replicated(
      {as("original", made_up::estimate("o", xo, 0.2)), as("replication", made_up::estimate("r", xr, 0.1))},
      normal_prior(0.5));
  // Verhagen & Wagenmakers (2014): the flat-prior posterior of the original is Normal(xo, vo).
  CHECK(r.flat.fixed->log_bf == Approx(log_normal(xr, xo, vr + vo) - log_normal(xr, 0.0, vr)).margin(1e-8));
  // Ly et al. (2019): the posterior from the default prior instead.
  const double s2 = 1.0 / (1.0 / vo + 1.0 / g), m = s2 * xo / vo;
  CHECK(r.carried.fixed->log_bf == Approx(log_normal(xr, m, vr + s2) - log_normal(xr, 0.0, vr)).margin(1e-8));
  // The originals predict Normal(xo, vr + vo).
  REQUIRE(r.predictions.size() == 1);
  const double z = numeric::normal_upper_quantile(0.025) * std::sqrt(vr + vo);
  CHECK(r.predictions[0].effect->low == Approx(xo - z).margin(1e-6));
  CHECK(r.predictions[0].effect->high == Approx(xo + z).margin(1e-6));
  CHECK(*r.predictions[0].below == Approx(numeric::normal_cdf((xr - xo) / std::sqrt(vr + vo))).margin(1e-7));
  CHECK(*r.predictions[0].inside);
  // Shrinkage under one shared effect only.
  Priors same = normal_prior(0.5);
  same.model = {0.5, 0.5, 0.0, 0.0};
  const ReplicateResult one = replicated(
      {as("original", made_up::estimate("o", xo, 0.2)), as("replication", made_up::estimate("r", xr, 0.1))},
      same);
  const double pooled = (xo / vo + xr / vr) / (1.0 / vo + 1.0 / vr + 1.0 / g);
  CHECK(*one.shrinkage == Approx(pooled / m).margin(1e-6));
}

TEST_CASE("the evidence multiplies: originals times replications given them") {
  const std::vector<Study> studies = {as("original", made_up::two_groups("o", 2.9, 20)),
                                      as("replication", made_up::two_groups("r", 1.1, 60)),
                                      as("replication", made_up::two_groups("s", 0.2, 80))};
  const ReplicateResult r = replicated(studies);
  CHECK(r.originals_alone.fixed->log_bf + r.carried.fixed->log_bf ==
        Approx(r.all.fixed->log_bf).margin(1e-8));
  CHECK(r.originals_alone.random->log_bf + r.carried.random->log_bf ==
        Approx(r.all.random->log_bf).margin(1e-8));
  CHECK(r.originals_alone.averaged->log_bf + r.carried.averaged->log_bf ==
        Approx(r.all.averaged->log_bf).margin(1e-8));
  CHECK(r.all.averaged->log_bf == Approx(pool(studies, Priors{}).value->effect->log_bf).margin(1e-8));
  CHECK(r.all.random->log_bf == Approx(pool(studies, Priors{}).value->effect_random->log_bf).margin(1e-8));
  // Not the mean of the two: the originals change how much each counts.
  const double mean = numeric::log_add(r.carried.fixed->log_bf, r.carried.random->log_bf) - std::log(2.0);
  CHECK(std::abs(r.carried.averaged->log_bf - mean) > 1e-3);
  CHECK(r.accurate);
  CHECK(r.originals == std::vector<std::size_t>{0});
  CHECK(r.replications == std::vector<std::size_t>{1, 2});
}

TEST_CASE("the originals' weight runs from the replications alone to all") {
  const ReplicateResult r = replicated({as("replication", made_up::two_groups("r", 1.1, 60)),
                                        as("original", made_up::two_groups("o", 2.9, 20)),
                                        as("replication", made_up::two_groups("s", 1.9, 40))});
  REQUIRE(r.discounted.size() == 11);
  CHECK(r.discounted.front().weight == 0.0);
  CHECK(r.discounted.back().weight == 1.0);
  CHECK(r.discounted.front().effect.averaged->log_bf ==
        Approx(r.replications_alone.averaged->log_bf).margin(1e-9));
  CHECK(r.discounted.back().effect.averaged->log_bf == Approx(r.all.averaged->log_bf).margin(1e-8));
  for (std::size_t i = 1; i < 11; ++i) {
    CHECK(r.discounted[i].effect.fixed->log_bf > r.discounted[i - 1].effect.fixed->log_bf);
  }
}

TEST_CASE("an original read as selected for significance says less") {
  const ReplicateResult r = replicated({as("original", made_up::two_groups("o", 2.3, 20)),
                                        as("replication", made_up::two_groups("r", 1.6, 60))});
  CHECK(r.selected_all.fixed->log_bf < r.all.fixed->log_bf);
  CHECK(r.effect_selected.median.value() < r.effect_originals.median.value());
  CHECK(r.effect_selected.lower.value() < r.effect_selected.median.value());
  // By hand: the integral of likelihood over probability of significance, for a Normal prior.
  Priors priors = normal_prior(0.5);
  const ReplicateResult n = replicated({as("original", made_up::two_groups("o", 2.3, 20)),
                                        as("replication", made_up::two_groups("r", 1.6, 60))},
                                       priors);
  const double c = numeric::student_t_upper_quantile(0.025, 38.0);
  double with = 0.0, mean = 0.0;
  for (int i = -4000; i <= 4000; ++i) {
    const double d = i * 1e-3;
    const double lambda = d * std::sqrt(10.0);
    const double seen = std::exp(numeric::log_noncentral_t_cdf(-c, 38.0, lambda)) +
                        std::exp(numeric::log_noncentral_t_upper(c, 38.0, lambda));
    const double mass =
        std::exp(log_density(priors.effect, d) + numeric::log_noncentral_t_density(2.3, 38.0, lambda)) / seen;
    with += 1e-3 * mass;
    mean += 1e-3 * mass * d;
  }
  const double none = numeric::log_noncentral_t_density(2.3, 38.0, 0.0) - std::log(0.05);
  CHECK(n.selected_all.fixed->log_bf - n.selected_carried.fixed->log_bf ==
        Approx(std::log(with) - none).margin(1e-7));
  CHECK(n.effect_selected.mean.value() == Approx(mean / with).margin(1e-7));
  // Not significant, not selected.
  const ReplicateResult no = replicated({as("original", made_up::two_groups("o", 1.3, 20)),
                                         as("replication", made_up::two_groups("r", 1.6, 60))});
  CHECK_FALSE(no.selected_all.fixed.has_value());
  CHECK(no.selected_all.reason.find("not significant at 0.05") != std::string::npos);
  CHECK(no.all.fixed.has_value());
}

TEST_CASE("predictions follow from the originals by simulation-free arithmetic") {
  // P(T ≤ t | original) = ∫ F(t; ν, δ√n) p(δ | original, flat) dδ by a plain sum.
  const ReplicateResult r = replicated({as("original", made_up::two_groups("o", 2.3, 20)),
                                        as("replication", made_up::two_groups("r", -0.6, 45))});
  double total = 0.0, below = 0.0;
  for (int i = -3000; i <= 5000; ++i) {
    const double d = i * 1e-3;
    const double mass = std::exp(numeric::log_noncentral_t_density(2.3, 38.0, d * std::sqrt(10.0)));
    total += mass;
    below += mass * std::exp(numeric::log_noncentral_t_cdf(-0.6, 88.0, d * std::sqrt(22.5)));
  }
  const Prediction& p = r.predictions.at(0);
  CHECK(*p.below == Approx(below / total).margin(1e-8));
  CHECK_FALSE(*p.inside);
  CHECK(p.statistic->low > -0.6);
  CHECK(p.effect->low == Approx(p.statistic->low / std::sqrt(22.5)).epsilon(1e-12));
  CHECK(p.error < 1e-6);
}

TEST_CASE("an unsigned replication is predicted by its size") {
  const ReplicateResult r = replicated({as("original", made_up::two_groups("o", 2.3, 20)),
                                        as("replication", made_up::two_groups("r", 1.0, 45, true))});
  CHECK(r.predictions[0].statistic->low >= 0.0);
  CHECK(r.predictions[0].below.has_value());
}

TEST_CASE("a replication known as a range has a probability, no place") {
  const double c = numeric::student_t_upper_quantile(0.025, 88.0);
  const std::vector<Study> studies = {as("original", made_up::two_groups("o", 2.9, 20)),
                                      as("replication", made_up::study("r", BandT{{{-c, c}}, 88.0, 22.5}))};
  const ReplicateResult r = replicated(studies, normal_prior(0.5));
  CHECK(r.predictions[0].band.value() > 0.01);
  CHECK(r.predictions[0].band.value() < 0.5);
  CHECK_FALSE(r.predictions[0].inside.has_value());
  CHECK_FALSE(r.predictions[0].reason.empty());
}

TEST_CASE("originals without bounds leave no flat posterior") {
  const double c = numeric::student_t_upper_quantile(0.025, 38.0);
  const ReplicateResult r =
      replicated({as("original", made_up::study("o", BandT{{{c, infinity}}, 38.0, 10.0})),
                  as("replication", made_up::two_groups("r", 1.0, 45))},
                 normal_prior(0.5));
  CHECK_FALSE(r.flat.fixed.has_value());
  CHECK_FALSE(r.flat.reason.empty());
  CHECK(r.carried.fixed.has_value());
  REQUIRE_FALSE(r.cautions.empty());
  CHECK(r.cautions[0].code == "flat-improper");
  CHECK(r.predictions[0].below.has_value());
}

TEST_CASE("roles must be there") {
  const auto codes = [](const std::vector<Study>& studies) {
    std::string all;
    for (const Diagnostic& d : replicate(studies, Priors{}).diagnostics) all += d.code + " ";
    return all;
  };
  CHECK(codes({made_up::two_groups("a", 1.0, 20)}) == "role-missing no-original no-replication ");
  CHECK(codes({as("original", made_up::two_groups("a", 1.0, 20))}) == "no-replication ");
  CHECK(codes({as("replication", made_up::two_groups("a", 1.0, 20))}) == "no-original ");
  ReplicateOptions options;
  options.alpha = 0.0;
  options.weights = 1;
  const std::vector<Study> good = {as("original", made_up::two_groups("a", 1.0, 20)),
                                   as("replication", made_up::two_groups("b", 1.0, 20))};
  const auto refused = replicate(good, Priors{}, options);
  REQUIRE(refused.diagnostics.size() == 2);
  CHECK(refused.diagnostics[0].code == "alpha-out-of-range");
  CHECK(refused.diagnostics[1].code == "weights-out-of-range");
  auto mixed = good;
  mixed[1].metric = "points";
  CHECK_FALSE(replicate(mixed, Priors{}).ok());
}
