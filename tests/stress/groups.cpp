// Differences among groups.
#include <catch2/catch.hpp>
#include <cmath>
#include <string>
#include <vector>

#include "steelyard/stress.hpp"
#include "weigh/made_up.hpp"

using namespace steelyard;

namespace {

GroupResult compared(const std::vector<Study>& studies, const std::vector<std::string>& labels,
                     const Priors& priors = {}, const GroupOptions& options = {}) {
  auto result = compare_groups(studies, labels, priors, options);
  REQUIRE(result.ok());
  return *result.value;
}

double log_normal(double x, double variance) {
  return -0.5 * x * x / variance - 0.5 * std::log(2.0 * 3.14159265358979323846 * variance);
}

}  // namespace

TEST_CASE("two Normal estimates under Normal priors have a closed answer") {
  // x_g ~ N(μ + γ_g, v), μ ~ N(0, a), γ_g ~ N(0, b): sums and differences are independent Normal.
  //   common: variances of (x1 ± x2)/√2 are v + 2a and v;  deviating: v + b + 2a and v + b.
  const double v = 0.02, a = 0.25, b = 0.09;
  const double x1 = 0.7, x2 = 0.1;
  Priors priors;
  priors.effect = {NormalPrior{0.0, 0.5}, Direction::either};
  GroupOptions options;
  options.deviation = NormalPrior{0.0, 0.3};
  const GroupResult r =
      compared({made_up::estimate("a", x1, std::sqrt(v)), made_up::estimate("b", x2, std::sqrt(v))},
               {"one", "two"}, priors, options);
  const double sum = (x1 + x2) / std::sqrt(2.0), difference = (x1 - x2) / std::sqrt(2.0);
  const double closed = log_normal(sum, v + b + 2.0 * a) + log_normal(difference, v + b) -
                        log_normal(sum, v + 2.0 * a) - log_normal(difference, v);
  CHECK(r.fixed.log_bf == Approx(closed).margin(1e-7));
  CHECK(std::abs(r.fixed.log_bf - closed) <= r.fixed.abs_error + 1e-9);
  CHECK(r.accurate);
}

TEST_CASE("the comparison of groups agrees with plain sums on a fine grid") {
  // The same integrals, same effect within groups, by brute force: μ and both deviations on a lattice.
  const Study first = made_up::two_groups("a", 2.8, 20), second = made_up::two_groups("b", 0.2, 26);
  const Likelihood one = likelihood(first), two = likelihood(second);
  const EffectPrior mean{CauchyPrior{0.0, 0.70710678118654752440}, Direction::either};
  const EffectPrior deviation{NormalPrior{0.0, 0.3}, Direction::either};
  const double h = 0.02;
  const int reach = 300;
  std::vector<double> l1, l2;
  for (int m = -2 * reach; m <= 2 * reach; ++m) {
    l1.push_back(std::exp(log_likelihood(one, m * h, 0.0)));
    l2.push_back(std::exp(log_likelihood(two, m * h, 0.0)));
  }
  double common = 0.0, deviating = 0.0;
  for (int m = -reach; m <= reach; ++m) {
    const double prior = std::exp(log_density(mean, m * h)) * h;
    const auto at = static_cast<std::size_t>(m + 2 * reach);
    common += prior * l1[at] * l2[at];
    double a = 0.0, b = 0.0;
    for (int g = -100; g <= 100; ++g) {
      const double w = std::exp(log_density(deviation, g * h)) * h;
      a += w * l1[static_cast<std::size_t>(m + g + 2 * reach)];
      b += w * l2[static_cast<std::size_t>(m + g + 2 * reach)];
    }
    deviating += prior * a * b;
  }
  Priors priors;
  priors.effect = mean;
  GroupOptions options;
  options.deviation = NormalPrior{0.0, 0.3};
  const GroupResult r = compared({first, second}, {"x", "y"}, priors, options);
  CHECK(r.fixed.log_bf == Approx(std::log(deviating / common)).margin(1e-6));
}

TEST_CASE("clear differences count for, equal groups against") {
  std::vector<Study> studies;
  std::vector<std::string> labels;
  for (int i = 0; i < 5; ++i) {
    studies.push_back(made_up::two_groups("a", 5.0 + 0.3 * i, 40));
    labels.emplace_back("large");
    studies.push_back(made_up::two_groups("b", 0.2 * i - 0.4, 40));
    labels.emplace_back("none");
  }
  const GroupResult apart = compared(studies, labels);
  CHECK(apart.fixed.log_bf > 10.0);
  CHECK(apart.random->log_bf > 2.0);
  CHECK(apart.groups.size() == 2);
  CHECK(apart.groups[0].name == "large");
  CHECK(apart.groups[0].studies == std::vector<std::size_t>{0, 2, 4, 6, 8});
  CHECK(apart.groups[0].pooled.pooled_effect.median.value() > 0.8);
  // The groups exchanged say the same.
  std::vector<std::string> other = labels;
  for (std::string& label : other) label = label == "large" ? "none" : "large";
  CHECK(compared(studies, other).random->log_bf == Approx(apart.random->log_bf).margin(1e-9));
  // Mixed at random there is no difference.
  std::vector<std::string> mixed;
  for (int i = 0; i < 10; ++i) mixed.emplace_back(i % 4 < 2 ? "p" : "q");
  CHECK(compared(studies, mixed).random->log_bf < 0.0);
  CHECK(apart.averaged->log_bf >= std::min(apart.fixed.log_bf, apart.random->log_bf) - 1e-9);
}

TEST_CASE("each group may have its own spread") {
  std::vector<Study> studies;
  std::vector<std::string> labels;
  for (int i = 0; i < 4; ++i) {
    studies.push_back(made_up::two_groups("a", 2.0 + 0.1 * i, 30));
    labels.emplace_back("tight");
    studies.push_back(made_up::two_groups("b", 2.0 + (i % 2 == 0 ? -4.0 : 4.0), 30));
    labels.emplace_back("loose");
  }
  GroupOptions own;
  own.shared_spread = false;
  const GroupResult shared = compared(studies, labels);
  const GroupResult apart = compared(studies, labels, {}, own);
  CHECK(shared.fixed.log_bf == apart.fixed.log_bf);
  CHECK(std::abs(shared.random->log_bf - apart.random->log_bf) > 1e-3);
  CHECK(apart.accurate);
}

TEST_CASE("groups are refused with a reason") {
  const std::vector<Study> studies = {made_up::two_groups("a", 2.0, 30), made_up::two_groups("b", 1.0, 30)};
  const auto code = [&](const std::vector<std::string>& labels, const GroupOptions& options = {}) {
    return compare_groups(studies, labels, Priors{}, options).diagnostics.at(0).code;
  };
  CHECK(code({"x"}) == "groups-do-not-match");
  CHECK(code({"x", ""}) == "group-missing");
  CHECK(code({"x", "x"}) == "one-group");
  GroupOptions shifted;
  shifted.deviation = NormalPrior{0.1, 1.0};
  CHECK(code({"x", "y"}, shifted) == "deviation-not-centred");
}
