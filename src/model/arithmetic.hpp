// The small arithmetic that arguments of priors may use.
#pragma once

#include <cstddef>
#include <optional>
#include <string>
#include <string_view>

namespace steelyard::model {

/// Where and why a text can't be read: `at` counts bytes from 0, `expected` completes "expected ...".
struct Misread {
  std::size_t at = 0;
  std::string expected;
};

/// A reading position in a text; the first misreading stays.
struct Cursor {
  std::string_view text;
  std::size_t at = 0;
  std::optional<Misread> misread;

  void skip_space();
  /// Takes `c` (after space) when it comes next.
  bool take(char c);
  void fail(std::string expected);
  [[nodiscard]] bool failed() const { return misread.has_value(); }
};

/// Letters, digits and hyphens from here on, lower-cased, `_` read as `-`; empty when none.
[[nodiscard]] std::string take_word(Cursor& cursor);

/// Reads one expression: numbers, `pi`, + - * / ( ), `sqrt(x)`, `exp(x)`, `log(x)` (natural).
/// It is computed in long double and rounded once, so that `1/sqrt(2)` is the double nearest to 1/√2;
/// a number alone is the double nearest to it. At most 64 levels deep.
[[nodiscard]] double read_expression(Cursor& cursor);

}  // namespace steelyard::model
