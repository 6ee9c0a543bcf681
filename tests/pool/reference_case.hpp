// One meta-analysis of a reference table (written by tests/oracle/case.py) as the library takes it.
#pragma once

#include <map>
#include <string>
#include <vector>

#include "reference/table.hpp"
#include "steelyard/pool.hpp"

namespace reference {

struct Marginal {
  std::string model;
  double value = 0.0;
  double error = 0.0;  ///< of the reference itself
};
struct Moments {
  std::string which;  ///< effect_fixed, effect_random, effect, spread
  double mean = 0.0, sd = 0.0;
};
struct Quantile {
  std::string which;
  double p = 0.5, value = 0.0, density = 0.0;
};
struct Probability {
  std::string which;  ///< as above, and new_study
  double place = 0.0, below = 0.0;
};
struct Shrunken {
  std::size_t study = 0;
  double mean = 0.0, sd = 0.0, lower = 0.0, lower_density = 0.0, upper = 0.0, upper_density = 0.0;
};

struct Case {
  std::string name;
  std::vector<steelyard::Study> studies;
  steelyard::Priors priors;
  std::vector<Marginal> marginals;
  std::vector<Moments> moments;
  std::vector<Quantile> quantiles;
  std::vector<Probability> probabilities;
  std::vector<Shrunken> shrunken;
};

/// All cases of a table.
std::vector<Case> cases(const std::string& table);

}  // namespace reference
