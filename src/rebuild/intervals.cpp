#include "rebuild/intervals.hpp"

namespace steelyard::rebuilding {

namespace {

CiOf from_word(const std::string& word) {
  if (word == "mean-diff") return CiOf::difference;
  if (word == "mean") return CiOf::mean;
  if (word == "d") return CiOf::d;
  if (word == "g") return CiOf::g;
  if (word == "r") return CiOf::r;
  if (word == "estimate") return CiOf::estimate;
  if (word == "odds-ratio") return CiOf::odds_ratio;
  if (word == "correlation") return CiOf::correlation;
  return CiOf::none;
}

}  // namespace

CiOf ci_of(const Numbers& x) {
  if (!x.has_all({Col::ci_low, Col::ci_high})) return CiOf::none;
  if (x.present(Col::ci_of)) return from_word(x.facts().word(Col::ci_of));
  if (x.has(Col::estimate)) return CiOf::estimate;
  if (x.has(Col::odds_ratio)) return CiOf::odds_ratio;
  if (x.has(Col::correlation)) return CiOf::correlation;
  if (x.has(Col::mean_diff)) return CiOf::difference;
  if (x.has(Col::d)) return CiOf::d;
  if (x.has(Col::g)) return CiOf::g;
  if (x.has(Col::r)) return CiOf::r;
  return x.has(Col::mean1) && !x.has(Col::mean2) ? CiOf::mean : CiOf::difference;
}

double ci_level(Numbers& x) {
  if (!x.has(Col::ci_level)) return 0.95;
  const double level = x[Col::ci_level];
  return level > 1.0 ? level / 100.0 : level;
}

}  // namespace steelyard::rebuilding
