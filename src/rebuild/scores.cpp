#include "rebuild/scores.hpp"

#include <fmt/format.h>

#include <cmath>

#include "rebuild/sign.hpp"

namespace steelyard::rebuilding {

namespace {

bool one_sample(const Numbers& x) {
  return x.facts().word(Col::design) == "one-sample" || !x.has(Col::mean2);
}

// Means carry their own sign: a direction that says otherwise is a contradiction, not a correction.
bool agrees_with_direction(Numbers& x, double difference) {
  if (one_tailed(x)) return true;
  const int sign = stated_sign(x);
  if (sign == 0 || difference == 0.0 || (difference > 0.0) == (sign > 0)) return true;
  x.refuse(x.present(Col::sign) ? Col::sign : Col::favours, "sign-contradicts",
           fmt::format("The means differ by {:g}, but the row's direction says otherwise.", difference),
           "Correct the one that is wrong; `sign` is the sign of group 1 minus group 2, before `reverse`.");
  return false;
}

}  // namespace

bool has_difference(const Numbers& x) {
  if (x.present(Col::compare)) return x.has(Col::mean_diff);
  return x.has(Col::mean_diff) || (x.has(Col::mean1) && (x.has(Col::mean2) || one_sample(x)));
}

std::optional<double> difference(Numbers& x) {
  if (x.has(Col::mean_diff)) return with_sign(x, Col::mean_diff);
  const double other = one_sample(x) ? (x.has(Col::mu0) ? x[Col::mu0] : 0.0) : x[Col::mean2];
  const double printed_other = one_sample(x) ? other : x.printed(Col::mean2).value;
  if (!agrees_with_direction(x, x.printed(Col::mean1).value - printed_other)) return std::nullopt;
  return x[Col::mean1] - other;
}

double pooled_sd(double sd1, double n1, double sd2, double n2) {
  return std::sqrt(((n1 - 1.0) * sd1 * sd1 + (n2 - 1.0) * sd2 * sd2) / (n1 + n2 - 2.0));
}

double sd_of_differences(double sd1, double sd2, double r) {
  return std::sqrt(sd1 * sd1 + sd2 * sd2 - 2.0 * r * sd1 * sd2);
}

std::optional<Frame> score_frame(Numbers& x) { return frame_of(x, FrameFrom::scores); }

}  // namespace steelyard::rebuilding
