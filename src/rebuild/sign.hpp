// Which way a result points. A sign is read, never assumed.
#pragma once

#include <optional>

#include "rebuild/facts.hpp"

namespace steelyard::rebuilding {

/// +1 or −1 as `sign` or `favours` state it (before `reverse` is applied), 0 when neither does.
[[nodiscard]] int stated_sign(Numbers& x);

/// The sign of group 1 minus group 2: stated, or that of a signed number printed in the same row (means
/// whose rounding leaves no doubt, a mean difference, t, d, g, r, an estimate); 0 when nothing tells.
[[nodiscard]] int sign_of(Numbers& x);

/// A printed signed number with what `sign` says about it: papers print |t| and name the direction in
/// words. Nothing (with a reason) when the number is negative and the sign column says +. One-tailed
/// rows keep their number: there `sign` is the hypothesised direction.
[[nodiscard]] std::optional<double> with_sign(Numbers& x, Col col);

/// Whether the row is one-tailed.
[[nodiscard]] bool one_tailed(const Numbers& x);

/// Whether `reverse` asks to turn the result round.
[[nodiscard]] bool reversed(const Numbers& x);

}  // namespace steelyard::rebuilding
