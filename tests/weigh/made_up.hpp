// Invented studies for tests.
#pragma once

#include <cmath>
#include <string>
#include <utility>

#include "steelyard/study.hpp"

namespace made_up {

inline steelyard::Study study(std::string label, steelyard::Evidence evidence) {
  steelyard::Study s;
  s.label = std::move(label);
  s.evidence = std::move(evidence);
  return s;
}

/// Two groups of this size with this t.
inline steelyard::Study two_groups(std::string label, double t, double per_group, bool folded = false) {
  return study(std::move(label), steelyard::ExactT{t, 2.0 * per_group - 2.0, per_group / 2.0, folded});
}

inline steelyard::Study one_sample(std::string label, double t, double n) {
  steelyard::Study s = study(std::move(label), steelyard::ExactT{t, n - 1.0, n, false});
  s.design = steelyard::Design::one_sample;
  return s;
}

inline steelyard::Study estimate(std::string label, double value, double se, std::string metric = "smd") {
  steelyard::Study s = study(std::move(label), steelyard::NormalEstimate{value, se, false});
  s.metric = std::move(metric);
  return s;
}

}  // namespace made_up
