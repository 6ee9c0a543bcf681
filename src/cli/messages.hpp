// What is said on standard error.
#pragma once

#include <span>
#include <string>
#include <string_view>
#include <vector>

#include "steelyard/base.hpp"

namespace steelyard::cli {

/// The most problems that are listed; beyond it only their number is said.
inline constexpr std::size_t most_listed = 100;

/// `steelyard: error: SENTENCE`, on standard error.
void say_error(std::string_view sentence);

/// Each diagnostic on its line, on standard error. Control characters and what is not UTF-8 are shown
/// escaped: a message must not be able to drive the terminal.
void say(std::span<const Diagnostic> diagnostics);

/// Text that is safe to show in a terminal.
[[nodiscard]] std::string harmless(std::string_view text);

}  // namespace steelyard::cli
