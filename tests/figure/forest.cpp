#include <algorithm>
#include <cmath>

#include <catch2/catch.hpp>

#include "figure/made_up.hpp"
#include "steelyard/figure.hpp"

using namespace steelyard;

TEST_CASE("a forest shows every study with its likelihood", "[forest]") {
  const Analysis analysis = made_up::analysis(12);
  const figure::Forest forest = figure::forest(analysis);
  REQUIRE(forest.studies.size() == 12);
  REQUIRE(forest.pooled.size() == 4);
  for (std::size_t i = 0; i < 12; ++i) {
    const auto& row = forest.studies[i];
    CHECK(row.index == i);
    REQUIRE(row.likelihood.size() > 100);
    const auto peak = std::max_element(row.likelihood.begin(), row.likelihood.end(),
                                       [](const auto& a, const auto& b) { return a.y < b.y; });
    CHECK(peak->y == 1.0);
    // The likelihood of an exact t peaks close to d.
    CHECK(peak->x == Approx(*analysis.studies[i].effect.d).margin(0.05));
    // And is the exact one: the ratio of two points is the ratio of likelihoods.
    const auto& a = row.likelihood[row.likelihood.size() / 3];
    const double log_ratio = log_likelihood(likelihood(analysis.studies[i]), a.x, 0) -
                             log_likelihood(likelihood(analysis.studies[i]), peak->x, 0);
    CHECK(a.y == Approx(std::exp(log_ratio)).epsilon(1e-9));
  }
}

TEST_CASE("one wild study does not squash the others", "[forest]") {
  Analysis analysis = made_up::analysis(12);
  analysis.studies[3].evidence = ExactT{400.0, 58, 15, false};
  const figure::Forest forest = figure::forest(analysis);
  CHECK(forest.effect.high < 10.0);
  CHECK(forest.studies[3].likelihood.empty());
  const bool said = std::any_of(forest.notes.begin(), forest.notes.end(), [](const std::string& note) {
    return note.find("outside the frame") != std::string::npos;
  });
  CHECK(said);
}

TEST_CASE("a very sharp likelihood still reaches its peak", "[forest]") {
  Analysis analysis = made_up::analysis(5);
  analysis.studies[2].evidence = ExactT{300.0, 2e6 - 2, 5e5, false};
  const figure::Forest forest = figure::forest(analysis);
  double peak = 0;
  for (const auto& point : forest.studies[2].likelihood)
    if (std::fabs(point.x - 300.0 / std::sqrt(5e5)) < 1e-3) peak = std::max(peak, point.y);
  CHECK(peak == 1.0);
}

TEST_CASE("an unknown sign shows both sides, a bound its slope", "[forest]") {
  Analysis analysis = made_up::analysis(4);
  analysis.studies[0].evidence = ExactT{2.5, 58, 15, true};
  analysis.studies[1].evidence = BandT{{{-HUGE_VAL, -2.0}, {2.0, HUGE_VAL}}, 58, 15};
  const figure::Forest forest = figure::forest(analysis);
  CHECK(forest.studies[0].mark == "sign unknown");
  CHECK(forest.studies[1].mark == "bound only");
  const auto at = [&](std::size_t i, double x) {
    const auto& curve = forest.studies[i].likelihood;
    return std::min_element(
               curve.begin(), curve.end(),
               [&](const auto& a, const auto& b) { return std::fabs(a.x - x) < std::fabs(b.x - x); })
        ->y;
  };
  CHECK(at(0, 0.64) == Approx(at(0, -0.64)).epsilon(0.1));
  CHECK(at(1, 0.0) < 0.5 * at(1, forest.effect.high));
}

TEST_CASE("too many studies: a stated excerpt of those that weigh most", "[forest]") {
  const Analysis analysis = made_up::analysis(500);
  const figure::Forest forest = figure::forest(analysis, {40});
  REQUIRE(forest.studies.size() == 40);
  CHECK(forest.of == 500);
  CHECK(forest.notes.front() ==
        "Shown: the 40 studies whose evidence weighs most, of 500, in file order. All 500 are pooled.");
  double least = 1e9;
  for (const auto& row : forest.studies) least = std::min(least, std::fabs(row.log_bf));
  std::size_t heavier = 0;
  for (const auto& study : analysis.result.studies) heavier += std::fabs(study.log_bf) > least ? 1 : 0;
  CHECK(heavier <= 40);
  CHECK(std::is_sorted(forest.studies.begin(), forest.studies.end(),
                       [](const auto& a, const auto& b) { return a.index < b.index; }));
}

TEST_CASE("one study: no row for varying effects", "[forest]") {
  const figure::Forest forest = figure::forest(made_up::analysis(1));
  REQUIRE(forest.pooled.size() == 2);
  CHECK(forest.words.title == "Forest of 1 study");
}
