// Likelihoods of one study: closed forms against integrals done here, limits, identities.
#include <catch2/catch.hpp>
#include <cmath>
#include <limits>
#include <vector>

#include "steelyard/model.hpp"
#include "steelyard/numeric.hpp"

using namespace steelyard;

namespace {

constexpr double infinity = std::numeric_limits<double>::infinity();

Likelihood exact(double t, double df, double n, bool folded = false) {
  return {ExactT{t, df, n, folded}, 1.0, std::nullopt, false};
}
Likelihood band(std::vector<Interval> bands, double df, double n) {
  return {BandT{std::move(bands), df, n}, 1.0, std::nullopt, false};
}
Likelihood estimate(double value, double se, bool folded = false) {
  return {NormalEstimate{value, se, folded}, 1.0, std::nullopt, false};
}

// ∫ Normal(δ; mean, spread²) L(δ, 0) dδ by the trapezoid rule: 801 nodes over ±10 spreads.
double integrated(const Likelihood& likelihood, double mean, double spread) {
  double sum = 0.0;
  for (int i = -400; i <= 400; ++i) {
    const double z = i / 40.0;
    sum += std::exp(-0.5 * z * z + log_likelihood(likelihood, mean + spread * z, 0.0));
  }
  return std::log(sum / 40.0 / std::sqrt(2.0 * 3.14159265358979323846));
}

}  // namespace

TEST_CASE("the study's own effect integrates out in closed form") {
  const std::vector<Likelihood> studies = {
      exact(2.2, 28.0, 7.5),
      exact(-0.7, 1.0, 2.0),
      exact(2.2, 28.0, 7.5, true),
      band({{2.048, infinity}}, 28.0, 7.5),
      band({{-infinity, -2.0}, {2.0, infinity}}, 40.0, 10.5),
      band({{-1.0, 1.0}}, 5.0, 3.0),
      estimate(0.4, 0.2),
      estimate(0.4, 0.2, true),
  };
  for (const Likelihood& study : studies) {
    for (const double mean : {0.0, 0.5, -1.2}) {
      for (const double spread : {0.05, 0.3, 1.1}) {
        CHECK(log_likelihood(study, mean, spread) == Approx(integrated(study, mean, spread)).margin(1e-11));
      }
    }
  }
}

TEST_CASE("many means at once agree with one by one") {
  std::vector<double> means;
  for (int i = 0; i < 600; ++i) means.push_back(-6.0 + 0.02 * i + 1e-3 * (i % 7));
  means.push_back(3e7);  // beyond the domain of the fast kernel
  std::vector<Likelihood> studies = {exact(2.2, 28.0, 7.5), exact(2.2, 28.0, 7.5, true), estimate(0.4, 0.2),
                                     estimate(0.4, 0.2, true), band({{1.0, 2.0}}, 12.0, 4.0)};
  studies.push_back(exact(2.2, 28.0, 7.5));
  studies.back().power = 0.5;
  studies.push_back(exact(2.2, 28.0, 7.5));
  studies.back().selected_above = 2.0;
  for (const Likelihood& study : studies) {
    for (const std::size_t count : {means.size(), means.size() - 1}) {
      std::vector<double> out(count, 1.5);
      add_log_likelihood(study, 0.25, std::span(means).first(count), out);
      for (std::size_t j = 0; j < count; ++j) {
        const double one = log_likelihood(study, means[j], 0.25);
        CHECK(out[j] - 1.5 == Approx(one).epsilon(1e-12).margin(1e-12));
      }
    }
  }
}

TEST_CASE("bands add up to certainty") {
  const double c = 2.048;
  for (const double mean : {0.0, 0.4, -2.0}) {
    for (const double spread : {0.0, 0.5}) {
      const double inside = log_likelihood(band({{-c, c}}, 28.0, 7.5), mean, spread);
      const double outside = log_likelihood(band({{-infinity, -c}, {c, infinity}}, 28.0, 7.5), mean, spread);
      CHECK(numeric::log_add(inside, outside) == Approx(0.0).margin(1e-10));
    }
  }
}

TEST_CASE("a folded likelihood is even in the mean and the sum of both signs") {
  CHECK(log_likelihood(exact(1.3, 20.0, 6.0, true), 0.4, 0.2) ==
        Approx(log_likelihood(exact(1.3, 20.0, 6.0, true), -0.4, 0.2)).epsilon(1e-14));
  CHECK(log_likelihood(exact(1.3, 20.0, 6.0, true), 0.4, 0.2) ==
        Approx(numeric::log_add(log_likelihood(exact(1.3, 20.0, 6.0), 0.4, 0.2),
                                log_likelihood(exact(-1.3, 20.0, 6.0), 0.4, 0.2)))
            .epsilon(1e-14));
}

TEST_CASE("a power multiplies the log likelihood") {
  Likelihood study = exact(1.3, 20.0, 6.0);
  const double full = log_likelihood(study, 0.4, 0.2);
  study.power = 0.25;
  CHECK(log_likelihood(study, 0.4, 0.2) == 0.25 * full);
  study.power = 0.0;
  CHECK(log_likelihood(study, 0.4, 0.2) == 0.0);
}

TEST_CASE("selection divides by the probability of being seen") {
  for (const double mean : {0.0, 0.3}) {
    for (const double spread : {0.0, 0.4}) {
      Likelihood study = exact(2.6, 20.0, 6.0);
      const double plain = log_likelihood(study, mean, spread);
      study.selected_above = 2.086;
      const double seen =
          log_likelihood(band({{-infinity, -2.086}, {2.086, infinity}}, 20.0, 6.0), mean, spread);
      CHECK(log_likelihood(study, mean, spread) == Approx(plain - seen).epsilon(1e-13));
      study.selected_upper_only = true;
      const double above = log_likelihood(band({{2.086, infinity}}, 20.0, 6.0), mean, spread);
      CHECK(log_likelihood(study, mean, spread) == Approx(plain - above).epsilon(1e-13));
    }
  }
  // At no effect a two-sided selection at the 5 % point divides by .05 (t(.975; 20) = 2.086, any table).
  Likelihood study = exact(2.6, 20.0, 6.0);
  const double plain = log_likelihood(study, 0.0, 0.0);
  study.selected_above = 2.086;
  CHECK(std::exp(plain - log_likelihood(study, 0.0, 0.0)) == Approx(0.05).epsilon(1e-3));
}

TEST_CASE("what selection hides has no likelihood") {
  Likelihood study = exact(1.0, 20.0, 6.0);
  study.selected_above = 2.086;
  CHECK(log_likelihood(study, 0.2, 0.0) == -infinity);
  // Only the positive sign of a folded t can have been seen under upper selection.
  Likelihood folded = exact(2.6, 20.0, 6.0, true);
  folded.selected_above = 2.086;
  folded.selected_upper_only = true;
  Likelihood signed_t = exact(2.6, 20.0, 6.0);
  signed_t.selected_above = 2.086;
  signed_t.selected_upper_only = true;
  CHECK(log_likelihood(folded, 0.2, 0.1) == log_likelihood(signed_t, 0.2, 0.1));
}

TEST_CASE("selection of an estimate divides by the Normal probability") {
  Likelihood study = estimate(0.5, 0.2);
  const double plain = log_likelihood(study, 0.0, 0.0);
  study.selected_above = 1.9599639845400545;
  CHECK(std::exp(plain - log_likelihood(study, 0.0, 0.0)) == Approx(0.05).epsilon(1e-12));
  CHECK(log_likelihood(estimate(0.5, 0.3), 0.1, 0.4) ==
        Approx(-0.5 * 0.16 / 0.25 - std::log(0.5) - 0.5 * std::log(2.0 * 3.14159265358979323846))
            .epsilon(1e-14));
}

TEST_CASE("the likelihood goes on falling far from the data") {
  const Likelihood study = exact(2.0, 30.0, 8.0);
  double last = log_likelihood(study, 1e5, 0.0);
  for (double mean = 2e5; mean < 1e9; mean *= 2.0) {
    const double value = log_likelihood(study, mean, 0.0);
    CHECK(value < last);
    CHECK(std::isfinite(value));
    last = value;
  }
  // Continuous where the room numeric hands over, at a noncentrality of 1e6.
  const double edge = 1e6 / std::sqrt(8.0);
  const double before = log_likelihood(study, edge * (1.0 - 1e-9), 0.0);
  CHECK(log_likelihood(study, edge * (1.0 + 1e-9), 0.0) == Approx(before).epsilon(1e-8));
}
