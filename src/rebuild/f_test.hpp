// Whether an F is the square of a t.
#pragma once

#include "rebuild/facts.hpp"

namespace steelyard::rebuilding {

/// True when the F has one numerator df; says so when that had to be taken from the design, and refuses
/// an F with more: it mixes several contrasts and has no sign.
[[nodiscard]] bool has_one_numerator_df(Numbers& x);

}  // namespace steelyard::rebuilding
