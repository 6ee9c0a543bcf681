// The families of the grammar: one line each. The reader and the writer of priors both walk this table.
#pragma once

#include <array>
#include <cstddef>
#include <span>
#include <string_view>

#include "steelyard/model.hpp"

namespace steelyard::model {

template <class Family>
struct GrammarFamily {
  std::string_view name;
  std::string_view alias;      ///< another spelling, or ""
  std::string_view signature;  ///< as shown in messages
  std::size_t arguments;
  Family (*make)(std::span<const double> arguments);
};

/// The families that can be written as text, in the order of the documentation.
[[nodiscard]] std::span<const GrammarFamily<EffectFamily>> effect_families();
[[nodiscard]] std::span<const GrammarFamily<SpreadFamily>> spread_families();

}  // namespace steelyard::model
