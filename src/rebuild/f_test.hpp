// Whether an F is the square of a t.
#pragma once

#include "rebuild/facts.hpp"

namespace steelyard::rebuilding {

/// True when the F has one numerator df; says so when that had to be taken from the design, and refuses
/// an F with more: it mixes several contrasts and has no sign.
[[nodiscard]] bool has_one_numerator_df(Numbers& x);

/// False (with the reason) where the row's test is an F with more than one numerator df: then its p is
/// that test's, and says nothing of two means either.
[[nodiscard]] bool is_of_two_means(Numbers& x);

}  // namespace steelyard::rebuilding
