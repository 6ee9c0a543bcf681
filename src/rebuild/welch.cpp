#include "rebuild/welch.hpp"

#include <cmath>

namespace steelyard::rebuilding {

bool is_welch(const Numbers& x) {
  const std::string word = x.facts().word(Col::welch);
  if (word == "yes") return true;
  if (word == "no" || !x.has(Col::df)) return false;
  const std::string design = x.facts().word(Col::design);
  const bool two_groups =
      design == "two-groups" || (design.empty() && (x.has_all({Col::n1, Col::n2}) || x.has(Col::n_total)));
  const double df = x.printed(Col::df).value;
  return two_groups && df != std::floor(df);
}

}  // namespace steelyard::rebuilding
