// Whether a row's test is Welch's (unequal variances).
#pragma once

#include "rebuild/facts.hpp"

namespace steelyard::rebuilding {

/// `welch` says so, or two groups are tested with a fractional df (which only Welch's test has).
[[nodiscard]] bool is_welch(const Numbers& x);

}  // namespace steelyard::rebuilding
