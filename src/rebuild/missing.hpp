#pragma once

#include "rebuild/facts.hpp"

namespace steelyard::rebuilding {

/// The error of a row that no route fits: what it has, and which columns would make it possible.
[[nodiscard]] Diagnostic what_is_missing(const Numbers& x);

}  // namespace steelyard::rebuilding
