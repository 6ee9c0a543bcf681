// Posterior means, quantiles, probabilities and shrunken effects against the oracle.
#include <algorithm>
#include <catch2/catch.hpp>
#include <cmath>
#include <map>
#include <string>

#include "pool/reference_case.hpp"

using namespace steelyard;

namespace {

const Summary& summary(const PoolResult& r, const std::string& which) {
  if (which == "effect_fixed") return r.pooled_effect_fixed;
  if (which == "effect_random") return r.pooled_effect_random;
  if (which == "spread") return r.spread;
  return r.pooled_effect;
}

Within within(const std::string& which) {
  if (which == "effect_fixed") return Within::fixed_effect;
  if (which == "effect_random") return Within::random_effect;
  return Within::average;
}

double cdf_of(const Posterior& p, const std::string& which, double x) {
  if (which == "spread") return p.spread_cdf(x);
  if (which == "new_study") return p.new_study_cdf(Within::average, x);
  return p.effect_cdf(within(which), x);
}

double quantile_of(const Posterior& p, const std::string& which, double q) {
  return which == "spread" ? p.spread_quantile(q) : p.effect_quantile(within(which), q);
}

std::string describe(const reference::Case& c, const std::string& what, double ours, double truth) {
  std::ostringstream out;
  out.precision(17);
  out << "case " << c.name << " " << what << " gives " << ours << ", reference " << truth;
  return out.str();
}

struct Tally {
  reference::Worst means, sds, quantiles, probabilities, shrunken;
};

/// Errors of a mean count in units of the posterior's own scale when that is large.
double scale(double mean, double sd) { return std::max({1.0, std::fabs(mean), sd}); }

void see_moments(Tally& tally, const reference::Case& c, const PoolResult& r) {
  for (const reference::Moments& m : c.moments) {
    const Summary& ours = summary(r, m.which);
    INFO("case " << c.name << " " << m.which << ": " << ours.reason);
    if (ours.mean) {
      tally.means.see(std::fabs(*ours.mean - m.mean), 1e-7 * scale(m.mean, 0.0),
                      [&] { return describe(c, m.which + " mean", *ours.mean, m.mean); });
    }
    if (ours.sd) {
      tally.sds.see(std::fabs(*ours.sd - m.sd), 1e-6 * scale(m.mean, m.sd),
                    [&] { return describe(c, m.which + " sd", *ours.sd, m.sd); });
    }
  }
}

void see_distribution(Tally& tally, const reference::Case& c, const PoolResult& r) {
  for (const reference::Quantile& q : c.quantiles) {
    const double ours = quantile_of(*r.posterior, q.which, q.p);
    // So close to the true quantile, |F(ours) − p| is the distance times the density.
    tally.quantiles.see(std::fabs(ours - q.value) * q.density, 1e-7,
                        [&] { return describe(c, q.which + " quantile", ours, q.value); });
    const Summary& s = summary(r, q.which);
    const std::optional<double> shown = q.p < 0.5 ? s.lower : q.p > 0.5 ? s.upper : s.median;
    REQUIRE(shown);
    tally.quantiles.see(std::fabs(*shown - q.value) * q.density, 1e-7,
                        [&] { return describe(c, q.which + " interval", *shown, q.value); });
  }
  for (const reference::Probability& p : c.probabilities) {
    const double ours = cdf_of(*r.posterior, p.which, p.place);
    // A new study's effect goes through one convolution more, whose rules are good to 1e-7.
    tally.probabilities.see(std::fabs(ours - p.below), p.which == "new_study" ? 1e-7 : 1e-8,
                            [&] { return describe(c, p.which + " probability", ours, p.below); });
  }
}

void see_shrunken(Tally& tally, const reference::Case& c, const PoolResult& r) {
  for (const reference::Shrunken& s : c.shrunken) {
    const Summary& ours = r.studies.at(s.study).shrunken;
    INFO("case " << c.name << " study " << s.study << ": " << ours.reason);
    REQUIRE((ours.mean && ours.sd && ours.lower && ours.upper));
    const auto say = [&](double number, double truth) {
      return [&, number, truth] { return describe(c, "shrunken", number, truth); };
    };
    tally.shrunken.see(std::fabs(*ours.mean - s.mean), 1e-7 * scale(s.mean, 0.0), say(*ours.mean, s.mean));
    tally.shrunken.see(std::fabs(*ours.sd - s.sd), 1e-6 * scale(s.mean, s.sd), say(*ours.sd, s.sd));
    // The reference's own interval ends are good to about 2e-6 in probability.
    tally.shrunken.see(std::fabs(*ours.lower - s.lower) * s.lower_density, 2e-6, say(*ours.lower, s.lower));
    tally.shrunken.see(std::fabs(*ours.upper - s.upper) * s.upper_density, 2e-6, say(*ours.upper, s.upper));
  }
}

void check(const reference::Worst& worst, const char* what, std::size_t fewest) {
  INFO(what << ": " << worst.report());
  CHECK(worst.beyond() == 0);
  CHECK(worst.seen() >= fewest);
}

Tally tally_of(const std::string& table) {
  Tally tally;
  for (const reference::Case& c : reference::cases(table)) {
    if (c.moments.empty()) continue;
    PoolOptions options;
    options.shrunken = !c.shrunken.empty();
    const Outcome<PoolResult> result = pool(c.studies, c.priors, options);
    REQUIRE(result.ok());
    see_moments(tally, c, *result.value);
    see_distribution(tally, c, *result.value);
    see_shrunken(tally, c, *result.value);
  }
  return tally;
}

}  // namespace

TEST_CASE("posteriors of random meta-analyses keep the promised accuracy", "[accuracy]") {
  const Tally tally = tally_of("meta_analyses.csv");
  check(tally.means, "means", 100);
  check(tally.sds, "standard deviations", 100);
  check(tally.quantiles, "quantiles", 300);
  check(tally.probabilities, "probabilities", 400);
}

TEST_CASE("posteriors of hard shapes keep the promised accuracy", "[accuracy]") {
  const Tally tally = tally_of("hard_shapes.csv");
  check(tally.means, "means", 30);
  check(tally.sds, "standard deviations", 30);
  check(tally.quantiles, "quantiles", 100);
  check(tally.probabilities, "probabilities", 100);
  check(tally.shrunken, "shrunken effects", 12);
}
