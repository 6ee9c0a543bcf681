// Small makers of studies for the tests of the room.
#pragma once

#include <cmath>
#include <vector>

#include "steelyard/pool.hpp"

namespace pool_tests {

inline steelyard::Study exact(double t, double df, double n_effective, bool folded = false) {
  steelyard::Study study;
  study.evidence = steelyard::ExactT{t, df, n_effective, folded};
  return study;
}

/// Two independent groups of n each.
inline steelyard::Study two_groups(double t, double n) { return exact(t, 2.0 * n - 2.0, 0.5 * n); }

/// A one-sample test of n scores.
inline steelyard::Study one_sample(double t, double n) { return exact(t, n - 1.0, n); }

inline steelyard::Study estimate(double value, double se) {
  steelyard::Study study;
  study.evidence = steelyard::NormalEstimate{value, se, false};
  study.metric = "score";
  return study;
}

inline steelyard::Study band(std::vector<steelyard::Interval> bands, double df, double n_effective) {
  steelyard::Study study;
  study.evidence = steelyard::BandT{std::move(bands), df, n_effective};
  return study;
}

inline std::vector<steelyard::Likelihood> likelihoods(const std::vector<steelyard::Study>& studies) {
  std::vector<steelyard::Likelihood> out;
  for (const auto& study : studies) out.push_back(steelyard::likelihood(study));
  return out;
}

inline steelyard::PoolResult pooled(const std::vector<steelyard::Study>& studies,
                                    const steelyard::Priors& priors = {},
                                    const steelyard::PoolOptions& options = {}) {
  return steelyard::pool(studies, priors, options).value.value();
}

}  // namespace pool_tests
