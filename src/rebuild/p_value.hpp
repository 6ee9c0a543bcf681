// What a printed p says about t.
#pragma once

#include <optional>
#include <vector>

#include "rebuild/facts.hpp"
#include "rebuild/frame.hpp"

namespace steelyard::rebuilding {

/// The values of p that the cell allows, within [0, 1]: the rounding band, the bound, or above alpha.
struct PBand {
  double low = 0.0;
  double high = 1.0;
};
[[nodiscard]] std::optional<PBand> p_band(Numbers& x);

/// Tails and direction of the row's p. `sign` 0: open (two-tailed only).
struct PKind {
  bool one_tailed = false;
  int sign = 0;
};
/// Nothing (with a reason) for a one-tailed p without a stated direction.
[[nodiscard]] std::optional<PKind> p_kind(Numbers& x);

/// The t (the |t| when the sign is open) that has this p.
[[nodiscard]] double t_of_p(double p, double df, const PKind& kind);

/// The t values that the band allows: one interval, or a mirrored pair (joined where it touches at 0).
[[nodiscard]] std::vector<Interval> t_bands(const PBand& p, double df, const PKind& kind);

/// |T| in [low, high], with the sign if it is known.
[[nodiscard]] std::vector<Interval> size_bands(double low, double high, int sign);

/// A p is coarse when its rounding band covers more than this much of t: the likelihood of the band and
/// that of the middle then differ in the second digit of a Bayes factor.
inline constexpr double coarse_width = 0.075;

}  // namespace steelyard::rebuilding
