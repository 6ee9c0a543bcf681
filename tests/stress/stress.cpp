// The pooled answer under changes.
#include <algorithm>
#include <catch2/catch.hpp>
#include <cmath>
#include <numeric>
#include <vector>

#include "steelyard/stress.hpp"
#include "steelyard/weigh.hpp"
#include "stress/grid.hpp"
#include "weigh/made_up.hpp"

using namespace steelyard;

namespace {

// Invented: four studies that agree, one that carries most.
std::vector<Study> five() {
  std::vector<Study> studies = {made_up::two_groups("Adler", 1.2, 20), made_up::two_groups("Brandt", 1.9, 25),
                                made_up::two_groups("Celik", 4.2, 60), made_up::two_groups("Dahl", 0.3, 30),
                                made_up::two_groups("Ekman", 1.4, 18)};
  const std::vector<double> years = {2004, 1999, 2010, 2007, 2001};
  for (std::size_t i = 0; i < studies.size(); ++i) studies[i].year = years[i];
  return studies;
}

StressOptions quick() {
  StressOptions options;
  options.grid = false;
  options.shares = false;
  return options;
}

StressResult stressed(const std::vector<Study>& studies, const StressOptions& options,
                      const Priors& priors = {}) {
  auto result = stress(studies, priors, options);
  REQUIRE(result.ok());
  return *result.value;
}

const Turn* turn(const StressResult& result, Change kind) {
  const auto at = std::find_if(result.turns.begin(), result.turns.end(),
                               [kind](const Turn& t) { return t.kind == kind; });
  return at == result.turns.end() ? nullptr : &*at;
}

}  // namespace

TEST_CASE("each leave-one-out is the pooling of the rest") {
  const auto studies = five();
  const StressResult r = stressed(studies, quick());
  REQUIRE(r.without.size() == 5);
  for (std::size_t out = 0; out < 5; ++out) {
    std::vector<Study> rest = studies;
    rest.erase(rest.begin() + static_cast<std::ptrdiff_t>(out));
    const auto pooled = pool(rest, Priors{});
    CHECK(r.without[out].effect->log_bf == pooled.value->effect->log_bf);
    CHECK(r.without[out].pooled_effect.mean == pooled.value->pooled_effect.mean);
  }
}

TEST_CASE("studies arrive by year and the last answer is the answer") {
  const StressResult r = stressed(five(), quick());
  CHECK(r.by_year);
  CHECK(r.order == std::vector<std::size_t>{1, 4, 0, 3, 2});
  CHECK(r.cumulative.back().effect->log_bf == r.base.effect->log_bf);
  const std::vector<Study> first = {five()[1]};
  CHECK(r.cumulative.front().effect->log_bf == pool(first, Priors{}).value->effect->log_bf);
  auto undated = five();
  undated[2].year.reset();
  const StressResult rows = stressed(undated, quick());
  CHECK_FALSE(rows.by_year);
  CHECK(rows.order == std::vector<std::size_t>{0, 1, 2, 3, 4});
}

TEST_CASE("the study that carries the verdict is named") {
  StressOptions options = quick();
  const StressResult r = stressed(five(), options);
  REQUIRE(r.stand == Stand::effect);
  const Turn* t = turn(r, Change::study);
  REQUIRE(t != nullptr);
  CHECK(t->index == 2);
  CHECK(t->from == r.base.effect->log_bf);
  CHECK(t->to == r.without[2].effect->log_bf);
  CHECK(t->after != Stand::effect);
  CHECK(r.turns.front().kind == Change::study);
  // With a milder idea of a verdict fewer changes turn it.
  options.verdict = 1.0001;
  const StressResult mild = stressed(five(), options);
  const auto firm = std::find_if(mild.firmness.begin(), mild.firmness.end(),
                                 [](const Firmness& f) { return f.kind == Change::study; });
  REQUIRE(firm != mild.firmness.end());
  CHECK(firm->count == 5);
  CHECK(firm->lowest == mild.without[2].effect->log_bf);
}

TEST_CASE("beyond the turning width the verdict is another one") {
  const auto studies = five();
  const StressResult r = stressed(studies, quick());
  const Turn* t = turn(r, Change::width);
  REQUIRE(t != nullptr);
  CHECK(t->factor > 1.0);
  Priors wider;
  wider.effect = with_width(wider.effect, t->factor);
  CHECK(pool(studies, wider).value->effect->log_bf == Approx(std::log(3.0)).margin(1e-6));
  wider.effect = with_width(EffectPrior{}, t->factor * 1.01);
  CHECK(pool(studies, wider).value->effect->log_bf < std::log(3.0));
}

TEST_CASE("the grid holds the pooled evidence of each pair of priors") {
  const auto studies = five();
  StressOptions options;
  options.shares = false;
  options.widths = {0.5, 1.0, 3.0};
  options.scales = {0.25, 1.0};
  const StressResult r = stressed(studies, options);
  REQUIRE(r.grid.has_value());
  REQUIRE(r.grid->effect.size() == 6);
  for (std::size_t w = 0; w < 3; ++w) {
    for (std::size_t s = 0; s < 2; ++s) {
      Priors priors;
      priors.effect = with_width(priors.effect, options.widths[w]);
      priors.spread = with_scale(priors.spread, options.scales[s]);
      const auto pooled = pool(studies, priors);
      CHECK(r.grid->effect[w * 2 + s].log_bf == Approx(pooled.value->effect->log_bf).margin(1e-8));
      CHECK(r.grid->heterogeneity[w * 2 + s].log_bf ==
            Approx(pooled.value->heterogeneity->log_bf).margin(1e-8));
    }
  }
  CHECK(r.grid->lowest <= r.base.effect->log_bf);
  CHECK(r.grid->highest >= r.base.effect->log_bf);
}

TEST_CASE("groups are pooled alone and left out") {
  StressOptions options = quick();
  options.groups = {"lab", "field", "lab", "lab", "field"};
  const auto studies = five();
  const StressResult r = stressed(studies, options);
  REQUIRE(r.subsets.size() == 2);
  CHECK(r.subsets[0].group == "lab");
  CHECK(r.subsets[0].count == 3);
  CHECK(r.subsets[0].only.effect->log_bf == r.subsets[1].without.effect->log_bf);
  const std::vector<Study> field = {studies[1], studies[4]};
  CHECK(r.subsets[1].only.effect->log_bf == pool(field, Priors{}).value->effect->log_bf);
  options.groups.assign(5, "all");
  CHECK_FALSE(stressed(studies, options).subsets[0].without.refused.empty());
}

TEST_CASE("directions are answered, and refused where the prior has no mass") {
  const StressResult r = stressed(five(), quick());
  CHECK(r.directions[0].effect->log_bf == r.base.effect->log_bf);
  CHECK(r.directions[1].effect->log_bf > r.directions[2].effect->log_bf);
  Priors positive;
  positive.effect = {UniformPrior{0.0, 1.0}, Direction::either};
  const StressResult p = stressed(five(), quick(), positive);
  CHECK_FALSE(p.directions[2].refused.empty());
  CHECK_FALSE(p.directions[2].effect.has_value());
}

TEST_CASE("the same answer for any number of threads") {
  StressOptions options;
  options.widths = {0.5, 1.0, 2.0};
  options.scales = {0.5, 1.0};
  const StressResult one = stressed(five(), options);
  options.threads = 4;
  const StressResult four = stressed(five(), options);
  for (std::size_t i = 0; i < 5; ++i) {
    CHECK(one.without[i].effect->log_bf == four.without[i].effect->log_bf);
    CHECK(one.shares[i].log_bf == four.shares[i].log_bf);
  }
  for (std::size_t i = 0; i < 6; ++i) CHECK(one.grid->effect[i].log_bf == four.grid->effect[i].log_bf);
}

TEST_CASE("a caller can stop it") {
  StressOptions options;
  std::size_t calls = 0;
  options.progress = [&calls](std::size_t done, std::size_t all) {
    CHECK(done <= all);
    return ++calls < 4;
  };
  const StressResult r = stressed(five(), options);
  CHECK(r.stopped);
  CHECK(r.turns.empty());
}

TEST_CASE("a single study can be stressed too") {
  const StressResult r = stressed({made_up::two_groups("one", 2.6, 30)}, StressOptions{});
  CHECK(r.without.empty());
  CHECK(r.grid.has_value());
  CHECK(r.grid->heterogeneity.empty());
  REQUIRE(r.shares.size() == 1);
  CHECK(r.shares[0].log_bf == Approx(r.base.effect->log_bf).margin(1e-8));
}

TEST_CASE("stress refuses what it can't answer") {
  const auto studies = five();
  CHECK_FALSE(stress({}, Priors{}).ok());
  const auto code = [&](const StressOptions& options) {
    return stress(studies, Priors{}, options).diagnostics.at(0).code;
  };
  StressOptions options;
  options.verdict = 1.0;
  CHECK(code(options) == "verdict-out-of-range");
  options = {};
  options.threads = 0;
  CHECK(code(options) == "threads-out-of-range");
  options = {};
  options.groups = {"a"};
  CHECK(code(options) == "groups-do-not-match");
  options = {};
  options.widths = {1.0, 0.5};
  CHECK(code(options) == "factors-out-of-range");
  options = {};
  options.exact_shares = 30;
  CHECK(code(options) == "exact-shares-out-of-range");
}

TEST_CASE("a large grid from one evaluation agrees with pooling anew, within its error") {
  auto studies = five();
  studies.push_back(made_up::study("Fischer", BandT{{{-2.03, 2.03}}, 34.0, 9.0}));
  studies.push_back(made_up::two_groups("Gruber", 1.1, 14, true));
  const std::vector<Priors> all = [] {
    std::vector<Priors> some(4);
    some[1].effect = {NormalPrior{0.2, 0.3}, Direction::greater};
    some[1].spread = {HalfCauchyPrior{0.3}};
    some[2].effect = {UniformPrior{-0.5, 1.0}, Direction::either};
    some[2].spread = {UniformSpreadPrior{0.0, 0.5}};
    some[3].effect = {StudentTPrior{0.35, 0.102, 3.0}, Direction::less};
    some[3].spread = {LogNormalPrior{-1.0, 1.0}};
    return some;
  }();
  for (const Priors& priors : all) {
    bool accurate = true;
    const auto grid = stressing::prior_grid(studies, priors, StressOptions{}, accurate, [] { return true; });
    REQUIRE(grid.has_value());
    REQUIRE(grid->effect.size() == 400);
    CHECK(accurate);
    for (const std::size_t cell : {7UL, 163UL, 244UL, 391UL}) {
      Priors changed = priors;
      changed.effect = with_width(priors.effect, grid->widths[cell / 20]);
      changed.spread = with_scale(priors.spread, grid->scales[cell % 20]);
      const auto pooled = pool(studies, changed);
      INFO(to_text(changed.effect) << " " << to_text(changed.spread) << " error "
                                   << grid->effect[cell].abs_error);
      CHECK(std::abs(grid->effect[cell].log_bf - pooled.value->effect->log_bf) <=
            grid->effect[cell].abs_error + pooled.value->effect->abs_error);
      CHECK(grid->effect[cell].abs_error <= 1e-5);
    }
  }
}
