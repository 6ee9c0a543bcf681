#include <algorithm>
#include <cmath>

#include <catch2/catch.hpp>

#include "figure/made_up.hpp"
#include "steelyard/figure.hpp"
#include "steelyard/numeric.hpp"

using namespace steelyard;

TEST_CASE("the surface holds its mass where the posterior is", "[surface]") {
  const Analysis analysis = made_up::analysis(12);
  const auto surface = figure::surface(analysis);
  REQUIRE(surface.ok());
  REQUIRE(surface.value->regions.size() == 4);
  CHECK(surface.value->regions[0].mass == 0.99);
  // Each region contains the peak and lies inside the wider one.
  double last_high = HUGE_VAL;
  for (const auto& region : surface.value->regions) {
    REQUIRE(region.rings.size() == 1);
    double low = HUGE_VAL, high = -HUGE_VAL;
    for (const auto& point : region.rings[0]) low = std::min(low, point.y), high = std::max(high, point.y);
    CHECK(low <= surface.value->peak.y);
    CHECK(high >= surface.value->peak.y);
    CHECK(high <= last_high);
    last_high = high;
  }
  CHECK_FALSE(figure::surface(made_up::analysis(1)).ok());
  CHECK(figure::surface(made_up::analysis(1)).diagnostics[0].what ==
        "The surface shows the spread of effects, which one study can't tell.");
}

TEST_CASE("belief narrows from prior to posterior", "[belief]") {
  const Analysis analysis = made_up::analysis(12);
  const auto belief = figure::belief(analysis);
  REQUIRE(belief.ok());
  REQUIRE(belief.value->stages.size() == 3);
  const auto width = [](const figure::BeliefStage& stage) {
    return stage.quantiles.back() - stage.quantiles.front();
  };
  CHECK(width(belief.value->stages[0]) > width(belief.value->stages[2]));
  CHECK(width(belief.value->stages[2]) > width(belief.value->stages[1]));
  CHECK(belief.value->stages[0].above_zero == Approx(0.5));
  for (const auto& stage : belief.value->stages)
    CHECK(std::is_sorted(stage.quantiles.begin(), stage.quantiles.end()));
}

TEST_CASE("the density ratio at zero is shown only where it is the Bayes factor", "[belief]") {
  Analysis analysis = made_up::analysis(3);
  CHECK(figure::belief(analysis).value->log_ratio_at_zero.has_value());
  analysis.options.priors.model = {0.4, 0.1, 0.1, 0.4};
  const auto tied = figure::belief(analysis);
  CHECK_FALSE(tied.value->log_ratio_at_zero.has_value());
  CHECK(tied.value->ratio_note.find("tie the two questions together") != std::string::npos);
  analysis.options.priors.model = {0.4, 0.4, 0.1, 0.1};
  CHECK(figure::belief(analysis).value->log_ratio_at_zero.has_value());
  analysis.options.priors.effect.family = UniformPrior{0.5, 2.0};
  const auto none = figure::belief(analysis);
  CHECK_FALSE(none.value->log_ratio_at_zero.has_value());
  CHECK(none.value->ratio_note.find("no density at 0") != std::string::npos);
}

TEST_CASE("the funnel's region holds 95% by the noncentral t itself", "[funnel]") {
  const Analysis analysis = made_up::analysis(30);
  const auto funnel = figure::funnel(analysis);
  REQUIRE(funnel.ok());
  for (const std::size_t i : {10U, 40U, 80U}) {
    const double se = funnel.value->same_low[i].y, n = 1 / (se * se), df = 4 * n - 2;
    const double ncp = funnel.value->centre * std::sqrt(n);
    const double low = funnel.value->same_low[i].x * std::sqrt(n),
                 high = funnel.value->same_high[i].x * std::sqrt(n);
    CHECK(std::exp(numeric::log_noncentral_t_cdf(low, df, ncp)) == Approx(0.025).epsilon(1e-5));
    CHECK(std::exp(numeric::log_noncentral_t_upper(high, df, ncp)) == Approx(0.025).epsilon(1e-5));
    CHECK(funnel.value->varying_high[i].x > funnel.value->same_high[i].x);
  }
  for (const auto& study : funnel.value->studies)
    if (study.outside_varying) CHECK(study.outside_same);
}

TEST_CASE("a study far off stands outside the funnel, a bound is not placed", "[funnel]") {
  Analysis analysis = made_up::analysis(10);
  analysis.studies[4].evidence = ExactT{9.0, 98, 25, false};
  analysis.studies[5].evidence = BandT{{{-2, 2}}, 58, 15};
  const auto funnel = figure::funnel(analysis);
  REQUIRE(funnel.value->studies.size() == 9);
  CHECK(funnel.value->studies[4].outside_same);
  CHECK(funnel.value->notes[0] == "Not shown: 1 study whose sign or size is not printed.");
  for (auto& study : analysis.studies) study.evidence = BandT{{{-2, 2}}, 58, 15};
  CHECK_FALSE(figure::funnel(analysis).ok());
}

TEST_CASE("the ladder says when the evidence turned", "[ladder]") {
  const auto step = [](const char* label, double db) {
    return figure::Answer{label, 2001.0, db / 10 * std::log(10.0), {}};
  };
  const std::vector<figure::Answer> answers = {step("A", 3), step("B", -1), step("C", 2), step("D", 8)};
  const auto ladder = figure::ladder(answers);
  CHECK(ladder.rungs[0].label == "A, 2001");
  CHECK(ladder.words.finding ==
        "The weight of evidence went from 3.0 decibans after A, 2001 to 8.0 after all 4 studies, for an "
        "effect. It has "
        "been on that side since C, 2001.");
}

TEST_CASE("sway lists the largest change first and counts turned verdicts", "[sway]") {
  const auto without = [](const char* label, double db) {
    return figure::Answer{label, {}, db / 10 * std::log(10.0), {0.3, 0.1, 0.5, ""}};
  };
  const std::vector<figure::Answer> answers = {without("A", 9), without("B", -4), without("C", 14)};
  const auto sway = figure::sway(std::log(10.0), answers);
  CHECK(sway.rows[0].label == "B");
  CHECK(sway.rows[2].label == "A");
  CHECK(sway.words.finding ==
        "Leaving out B changes the evidence most: from 10.0 to −4.0 decibans. One removal makes it change "
        "sides.");
  CHECK(figure::sway(std::log(10.0), answers, 2).rows.size() == 2);
}

TEST_CASE("the map of priors draws the line where the Bayes factor is 1", "[priors]") {
  const auto grid = made_up::grid(9, 7);
  const auto map = figure::prior_map(grid);
  REQUIRE(map.ok());
  CHECK(map.value->width_edges.size() == 10);
  CHECK(map.value->scale_edges.size() == 8);
  REQUIRE(map.value->turns.size() == 1);
  for (const auto& point : map.value->turns[0]) {
    const double log_bf = 4.0 - 3.5 * std::log(1 + point.x) - 2.0 * std::sqrt(point.y);
    CHECK(log_bf == Approx(0).margin(0.1));
  }
  figure::PriorGrid bad = grid;
  bad.log_bf.pop_back();
  CHECK_FALSE(figure::prior_map(bad).ok());
}
