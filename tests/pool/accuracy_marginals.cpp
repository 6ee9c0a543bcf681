// Log marginal likelihoods against the oracle: true error ≤ stated error, stated error ≤ promise.
#include <algorithm>
#include <catch2/catch.hpp>
#include <cmath>
#include <limits>
#include <string>

#include "pool/reference_case.hpp"

using namespace steelyard;

namespace {

/// Σ(λ² + |log L|) of the promise at one mean; only its size matters.
double cancelling_terms(const std::vector<Study>& studies, double mean) {
  double sum = 0.0;
  for (const Study& s : studies) {
    const double n = effective_n(s).value_or(0.0);
    sum += n * mean * mean + std::fabs(log_likelihood(likelihood(s), mean, 0.0));
  }
  return sum;
}

/// The promise of docs/pool.md, at the least favourable of the means that the posterior may sit on.
double promise(const reference::Case& c) {
  double largest = cancelling_terms(c.studies, 0.0);
  for (const Study& s : c.studies) {
    const std::optional<double> t = t_value(s);
    if (t) largest = std::max(largest, cancelling_terms(c.studies, *t / std::sqrt(*effective_n(s))));
  }
  return std::max(1e-8, 8.0 * std::numeric_limits<double>::epsilon() * largest);
}

struct Tally {
  reference::Worst against_stated, against_promise;
  std::size_t integrals = 0, unkept = 0;
};

void see(Tally& tally, const reference::Case& c) {
  PoolOptions options;
  options.summaries = false;
  const Outcome<PoolResult> result = pool(c.studies, c.priors, options);
  INFO("case " << c.name);
  REQUIRE(result.ok());
  for (const reference::Marginal& m : c.marginals) {
    for (const ModelResult& model : result.value->models) {
      if (id(model.model) != m.model) continue;
      REQUIRE(model.integral);
      const Integral& ours = *model.integral;
      const auto where = [&] {
        std::ostringstream out;
        out.precision(17);
        out << "case " << c.name << " " << m.model << " gives " << ours.log_value << " ± " << ours.abs_error
            << ", reference " << m.value << " ± " << m.error << " (" << to_text(ours.status) << ")";
        return out.str();
      };
      // The reference is a double here: half a unit in its last place belongs to its error.
      const double rounded = 0.5 * std::numeric_limits<double>::epsilon() * std::fabs(m.value);
      ++tally.integrals;
      tally.against_stated.see(std::fabs(ours.log_value - m.value), ours.abs_error + m.error + rounded,
                               where);
      if (ours.status == IntegralStatus::ok) {
        tally.against_promise.see(ours.abs_error, promise(c), where);
      } else {
        ++tally.unkept;
      }
    }
  }
}

void check(const std::string& table, std::size_t fewest) {
  Tally tally;
  const auto all = reference::cases(table);
  CHECK(all.size() >= fewest);
  for (const reference::Case& c : all) see(tally, c);
  INFO("true against stated error: " << tally.against_stated.report());
  CHECK(tally.against_stated.beyond() == 0);
  INFO("stated error against the promise: " << tally.against_promise.report());
  CHECK(tally.against_promise.beyond() == 0);
  // The status may say that the promise wasn't kept, but not as a way out.
  INFO(tally.unkept << " of " << tally.integrals << " integrals say the promise was not kept");
  CHECK(tally.unkept * 100 <= tally.integrals);
}

}  // namespace

TEST_CASE("marginal likelihoods of random meta-analyses keep their stated error", "[accuracy]") {
  check("meta_analyses.csv", 400);
}
