// Statistics that papers print and that give no t, with what to give instead.
#pragma once

#include <string_view>

namespace steelyard::read {

struct Unusable {
  std::string_view word;    ///< as the tokens have it, lower case
  std::string_view name;    ///< for people
  std::string_view remedy;  ///< what to give instead
};

/// Null when `word` (lower case) is none of them.
[[nodiscard]] const Unusable* find_unusable(std::string_view word);

}  // namespace steelyard::read
