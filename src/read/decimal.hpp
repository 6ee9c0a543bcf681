// The digits of a printed number: from text to a decimal number to the nearest double.
#pragma once

#include <array>
#include <cstddef>
#include <optional>
#include <string_view>

#include "steelyard/study.hpp"

namespace steelyard::read {

inline constexpr std::size_t longest_number = 64;  ///< characters, far more than any paper prints

[[nodiscard]] inline bool is_digit(char c) { return c >= '0' && c <= '9'; }
[[nodiscard]] inline char lower(char c) {
  return c >= 'A' && c <= 'Z' ? static_cast<char>(c - 'A' + 'a') : c;
}

/// How many digits the text begins, or ends, with.
[[nodiscard]] std::size_t leading_digits(std::string_view text);
[[nodiscard]] std::size_t trailing_digits(std::string_view text);

/// A text in plain ASCII: one kind of minus, of blank, of comparison. Whatever else isn't ASCII is `?`.
struct Plain {
  std::array<char, 2 * longest_number> chars{};
  std::size_t size = 0;
  bool fits = true;  ///< false: too long for a number

  void push(char c);
  [[nodiscard]] std::string_view view() const { return {chars.data(), size}; }
};
[[nodiscard]] Plain plain(std::string_view text);

/// Without ASCII blanks at either end.
[[nodiscard]] std::string_view strip(std::string_view text);

/// A decimal number in its digits: ±digits · 10^-decimals.
struct Decimal {
  bool negative = false;
  std::array<char, longest_number> digits{};
  std::size_t size = 0;
  int decimals = 0;
  bool percent = false;

  [[nodiscard]] bool push(char c);
};

/// Reads `-1 234.5e-3 %`, the whole of `text`; nothing when it is anything else.
[[nodiscard]] std::optional<Decimal> read_decimal(std::string_view text, char mark);

/// The nearest double; nothing when it overflows, or becomes 0 without being 0.
[[nodiscard]] std::optional<double> value_of(const Decimal& decimal);

/// Sets the ends of the rounding band, half a unit of the last digit to either side; false when half a
/// unit is no double. While the digits fit an integer the ends are the doubles nearest to the decimal
/// ends: 2.10 gives exactly 2.095 and 2.105.
[[nodiscard]] bool set_band(const Decimal& decimal, Printed& printed);

}  // namespace steelyard::read
