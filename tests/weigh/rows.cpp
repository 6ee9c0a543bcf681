// What must hold for a single study.
#include <catch2/catch.hpp>
#include <cmath>
#include <limits>
#include <vector>

#include "steelyard/numeric.hpp"
#include "steelyard/weigh.hpp"
#include "weigh/made_up.hpp"

using namespace steelyard;

namespace {

constexpr double infinity = std::numeric_limits<double>::infinity();

Weighing one(const Study& study, const EffectPrior& prior = {}, const WeighOptions& options = {}) {
  auto result = weigh({&study, 1}, prior, options);
  REQUIRE(result.ok());
  CHECK(result.value->accurate);
  return result.value->rows[0];
}

}  // namespace

TEST_CASE("the two directions average to either, by their prior mass") {
  // For a prior symmetric around 0: BF = ½·BF(greater) + ½·BF(less).
  const Weighing w = one(made_up::two_groups("a", 2.1, 31));
  CHECK(w.bf.log_bf == w.either->log_bf);
  CHECK(numeric::log_add(w.greater->log_bf, w.less->log_bf) - std::log(2.0) ==
        Approx(w.bf.log_bf).margin(1e-9));
  CHECK(w.greater->log_bf > w.bf.log_bf);
  CHECK(w.bf.abs_error <= 2e-8);
}

TEST_CASE("swapping the groups mirrors everything") {
  const EffectPrior up{StudentTPrior{0.35, 0.102, 3.0}, Direction::greater};
  const EffectPrior down{StudentTPrior{-0.35, 0.102, 3.0}, Direction::less};
  const Weighing a = one(made_up::two_groups("a", 2.1, 31), up);
  const Weighing b = one(made_up::two_groups("a", -2.1, 31), down);
  CHECK(a.bf.log_bf == Approx(b.bf.log_bf).margin(1e-9));
  CHECK(a.effect.median.value() == Approx(-b.effect.median.value()).margin(1e-7));
  CHECK(a.enthusiast->log_bf == Approx(b.enthusiast->log_bf).margin(1e-9));
  CHECK(a.enthusiast_side == "greater");
  CHECK(b.enthusiast_side == "less");
  CHECK(a.bound.log_bf == Approx(b.bound.log_bf).margin(1e-10));
  CHECK(a.superiority->median == Approx(1.0 - b.superiority->median).margin(1e-7));
}

TEST_CASE("no prior makes more of a study than the likelihood's maximum") {
  for (const double t : {0.0, 0.7, 2.1, -3.0, 8.0}) {
    const Study study = made_up::two_groups("a", t, 12);
    const Weighing w = one(study);
    for (const LogBayesFactor& bf : {w.bf, *w.greater, *w.less, *w.sceptic, *w.enthusiast}) {
      CHECK(bf.log_bf <= w.bound.log_bf + 1e-8);
    }
    // Ring the maximum: the likelihood is no larger a little to either side.
    const Likelihood l = likelihood(study);
    const double best = log_likelihood(l, w.bound.effect.value(), 0.0);
    CHECK(log_likelihood(l, *w.bound.effect + 0.01, 0.0) <= best);
    CHECK(log_likelihood(l, *w.bound.effect - 0.01, 0.0) <= best);
  }
  // A direction against the data: the best effect it allows is none.
  const EffectPrior against{CauchyPrior{0.0, 0.7}, Direction::less};
  CHECK(one(made_up::two_groups("a", 3.0, 20), against).bound.log_bf == 0.0);
  // "p < .05" without a sign becomes certain for large effects: 1/.05 bounds it, reached by no effect.
  const double c = numeric::student_t_upper_quantile(0.025, 28.0);
  const Study band = made_up::study("b", BandT{{{-infinity, -c}, {c, infinity}}, 28.0, 7.5});
  CHECK(one(band).bound.log_bf == Approx(std::log(20.0)).margin(1e-9));
  CHECK_FALSE(one(band).bound.effect.has_value());
}

TEST_CASE("the evidence turns at the turning width") {
  const Study study = made_up::two_groups("a", 2.4, 31);
  const EffectPrior prior{CauchyPrior{0.0, 0.7}, Direction::either};
  const Weighing w = one(study, prior);
  REQUIRE(w.turning_factor.has_value());
  CHECK(*w.turning_factor > 1.0);
  CHECK(*w.turning_width == Approx(0.7 * *w.turning_factor).epsilon(1e-12));
  CHECK(one(study, with_width(prior, *w.turning_factor)).bf.log_bf == Approx(0.0).margin(1e-6));
  // t = 0 speaks for no effect whatever the width.
  CHECK_FALSE(one(made_up::two_groups("b", 0.0, 31), prior).turning_factor.has_value());
  // Evidence for none under a wide prior turns when it gets narrower.
  const Weighing wide = one(study, with_width(prior, 40.0));
  CHECK(wide.bf.log_bf < 0.0);
  CHECK(*wide.turning_width == Approx(*w.turning_width).epsilon(1e-5));
}

TEST_CASE("rounding moves the Bayes factor between its corners") {
  Study study = made_up::two_groups("a", 2.1, 31);
  study.at_low = ExactT{2.05, 60.0, 15.5, false};
  study.at_high = ExactT{2.15, 60.0, 15.5, false};
  const Weighing w = one(study);
  REQUIRE(w.rounding.has_value());
  CHECK(*w.rounding->low == Approx(one(made_up::two_groups("l", 2.05, 31)).bf.log_bf).margin(1e-9));
  CHECK(*w.rounding->high == Approx(one(made_up::two_groups("h", 2.15, 31)).bf.log_bf).margin(1e-9));
  // A t printed as 0.0 has its smallest Bayes factor inside the band, at t = 0 (a symmetric prior).
  Study zero = made_up::two_groups("z", 0.02, 31);
  zero.at_low = ExactT{-0.05, 60.0, 15.5, false};
  zero.at_high = ExactT{0.06, 60.0, 15.5, false};
  CHECK(*one(zero).rounding->low == Approx(one(made_up::two_groups("0", 0.0, 31)).bf.log_bf).margin(1e-8));
  CHECK_FALSE(one(made_up::two_groups("a", 2.1, 31)).rounding.has_value());
}

TEST_CASE("a bound allows all evidence beyond its edge") {
  const Study band = made_up::study("b", BandT{{{2.0484, infinity}}, 28.0, 7.5});
  const Weighing w = one(band);
  CHECK(*w.rounding->low ==
        Approx(one(made_up::study("e", ExactT{2.0484, 28.0, 7.5, false})).bf.log_bf).margin(1e-8));
  CHECK_FALSE(w.rounding->high.has_value());
  CHECK_FALSE(w.p.has_value());
  CHECK_FALSE(w.log_p_bound.has_value());
}

TEST_CASE("readers' units follow from the effect") {
  Study study = made_up::two_groups("a", 2.1, 31);
  study.raw_sd = 12.0;
  const Weighing w = one(study);
  CHECK(w.superiority->lower == numeric::normal_cdf(*w.effect.lower / std::sqrt(2.0)));
  CHECK(w.raw->upper == 12.0 * *w.effect.upper);
  const Weighing single = one(made_up::one_sample("s", 2.1, 31));
  CHECK(single.superiority->median == numeric::normal_cdf(*single.effect.median));
  const Weighing points = one(made_up::estimate("e", 3.0, 1.0, "points"), {NormalPrior{0.0, 4.0}});
  CHECK_FALSE(points.superiority.has_value());
  CHECK_FALSE(points.sceptic.has_value());
  WeighOptions expected;
  expected.expected = 4.0;
  CHECK(
      one(made_up::estimate("e", 3.0, 1.0, "points"), {NormalPrior{0.0, 4.0}}, expected).sceptic.has_value());
}

TEST_CASE("the rows' evidence is summed up in decibans") {
  const std::vector<Study> studies = {made_up::two_groups("a", 4.5, 40), made_up::two_groups("b", 0.0, 200),
                                      made_up::two_groups("c", 1.0, 20), made_up::two_groups("d", 0.2, 30),
                                      made_up::two_groups("e", 2.2, 30)};
  const auto result = weigh(studies, EffectPrior{});
  REQUIRE(result.ok());
  const WeighSpread& s = result.value->spread;
  CHECK(s.count == 5);
  CHECK(s.most == Approx(10.0 / std::log(10.0) * result.value->rows[0].bf.log_bf));
  CHECK(s.least == Approx(10.0 / std::log(10.0) * result.value->rows[1].bf.log_bf));
  CHECK(s.median == Approx(10.0 / std::log(10.0) * result.value->rows[2].bf.log_bf));
  CHECK(s.for_effect == 2);
  CHECK(s.for_none == 3);
  CHECK(s.clearly_for_effect == 1);
  CHECK(s.clearly_for_none == (result.value->rows[1].bf.log_bf < -std::log(10.0) ? 1U : 0U));
}

TEST_CASE("weighing refuses what it can't answer") {
  const Study study = made_up::two_groups("a", 2.1, 31);
  CHECK(weigh({}, EffectPrior{}).diagnostics[0].code == "no-studies");
  WeighOptions level;
  level.level = 1.0;
  CHECK(weigh({&study, 1}, EffectPrior{}, level).diagnostics[0].code == "level-out-of-range");
  WeighOptions expected;
  expected.expected = -1.0;
  CHECK(weigh({&study, 1}, EffectPrior{}, expected).diagnostics[0].code == "expected-out-of-range");
  CHECK(weigh({&study, 1}, {UniformPrior{-1.0, -0.5}, Direction::greater}).diagnostics[0].code ==
        "prior-without-mass");
  WeighOptions region;
  region.region = RegionOptions{{0.1, -0.1}, std::nullopt};
  CHECK(weigh({&study, 1}, EffectPrior{}, region).diagnostics[0].code == "region-empty");
}
