#include <cmath>
#include <string>

#include <catch2/catch.hpp>

#include "figure/made_up.hpp"

using namespace steelyard;

TEST_CASE("ratios to three figures", "[words]") {
  CHECK(ratio_text(std::log(34.24)) == "34.2");
  CHECK(ratio_text(std::log(9.996)) == "10.0");
  CHECK(ratio_text(std::log(999.7)) == "1,000");
  CHECK(ratio_text(std::log(1234567.0)) == "1.23×10⁶");
  CHECK(ratio_text(std::log(12345.0)) == "12,300");
  CHECK(ratio_text(std::log(0.01234)) == "0.0123");
  CHECK(ratio_text(std::log(2.5e-7)) == "2.50×10⁻⁷");
  CHECK(ratio_text(100000 * std::log(10.0) + std::log(3.0)) == "3.00×10¹⁰⁰⁰⁰⁰");
  CHECK(ratio_text(-100000 * std::log(10.0) + std::log(3.0)) == "3.00×10⁻¹⁰⁰⁰⁰⁰");
}

TEST_CASE("decibans with their sign", "[words]") {
  CHECK(decibans(std::log(10.0)) == Approx(10.0).epsilon(1e-14));
  CHECK(decibans_text(std::log(33.9)) == "+15.3");
  CHECK(decibans_text(-std::log(2.5)) == "−4.0");
  CHECK(decibans_text(1e-4) == "0.0");
  CHECK(decibans_text(100000 * std::log(10.0)) == "+1,000,000");
}

TEST_CASE("odds stand the right way round", "[words]") {
  CHECK(odds_text(0) == "1 to 1");
  CHECK(odds_text(std::log(3.0)) == "3 to 1");
  CHECK(odds_text(-std::log(3.0)) == "1 to 3");
  CHECK(odds_text(-std::log(34.2)) == "1 to 34.2");
}

TEST_CASE("the verdict says what the data favour, and from which prior odds", "[verdict]") {
  Analysis a = made_up::analysis(8);
  a.result.effect = LogBayesFactor{std::log(34.2), 0};
  a.result.heterogeneity = LogBayesFactor{-std::log(5.2), 0};
  Verdict v = verdict(a.result, a.options.priors, a.studies);
  CHECK(v.effect ==
        "The data favour an effect: they are 34.2 times as probable if there is an effect as if there is "
        "none (+15.3 "
        "decibans), so assumed prior odds of 1 to 1 become 34.2 to 1 for an effect.");
  CHECK(v.heterogeneity ==
        "The data favour one effect shared by all studies: they are 5.20 times as probable if all share one "
        "effect as "
        "if effects vary (−7.2 decibans), so assumed prior odds of 1 to 1 become 5.20 to 1 for one shared "
        "effect.");

  a.result.effect = LogBayesFactor{-std::log(7.0), 0};
  a.options.priors.effect.direction = Direction::greater;
  v = verdict(a.result, a.options.priors, a.studies);
  CHECK(v.effect ==
        "The data favour no effect: they are 7.00 times as probable if there is none as if there is a "
        "positive effect "
        "(−8.5 decibans), so assumed prior odds of 1 to 1 become 7 to 1 for no effect.");
}

TEST_CASE("prior odds that outweigh the data are not hidden", "[verdict]") {
  Analysis a = made_up::analysis(8);
  a.options.priors.model = {0.45, 0.025, 0.5, 0.025};
  a.result.effect = LogBayesFactor{std::log(4.0), 0};
  const Verdict v = verdict(a.result, a.options.priors, a.studies);
  CHECK(v.effect ==
        "The data favour an effect: they are 4.00 times as probable if there is an effect as if there is "
        "none (+6.0 "
        "decibans), so assumed prior odds of 1 to 19 for an effect become 4.75 to 1, still for no effect.");
}

TEST_CASE("evidence that tells nothing, or was not asked for, is said to", "[verdict]") {
  Analysis a = made_up::analysis(8);
  a.result.effect = LogBayesFactor{0.001, 0};
  Verdict v = verdict(a.result, a.options.priors, a.studies);
  CHECK(v.effect ==
        "The data do not tell an effect from no effect: they are equally probable under both (0.0 decibans), "
        "so the "
        "assumed prior odds of 1 to 1 stand.");
  a.result.effect.reset();
  a.options.priors.model = {0, 0.5, 0, 0.5};
  v = verdict(a.result, a.options.priors, a.studies);
  CHECK(v.effect ==
        "Whether there is an effect was not weighed: the assumed model probabilities leave room for one "
        "answer only.");
  const Analysis one = made_up::analysis(1);
  CHECK(verdict(one.result, one.options.priors, one.studies).heterogeneity ==
        "Whether the effect varies from study to study can't be told from one study.");
}
