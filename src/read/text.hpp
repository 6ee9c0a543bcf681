// Bytes, characters and places.
#pragma once

#include <cstddef>
#include <string>
#include <string_view>
#include <vector>

#include "steelyard/base.hpp"

namespace steelyard::read {

/// No record of a CSV file and no string of a JSON file may be longer: a longer one is a slip (an
/// unclosed quote, a file that isn't a table), and messages about it must stay possible.
inline constexpr std::size_t longest_record = std::size_t{1} << 20;
inline constexpr std::size_t most_columns = 1000;

/// Walks through a text and knows line and column (in characters) of where it stands. Only forwards,
/// so that all places of a file together cost one pass. Line ends: LF, CRLF, CR.
class Locator {
 public:
  explicit Locator(std::string_view text) : text_(text) {}

  void advance_to(std::size_t offset);
  [[nodiscard]] std::size_t line() const { return line_; }
  [[nodiscard]] std::size_t column() const { return column_; }
  [[nodiscard]] Place place(const std::string& file) const { return {file, line_, column_}; }

 private:
  std::string_view text_;
  std::size_t offset_ = 0;
  std::size_t line_ = 1;
  std::size_t column_ = 1;
};

/// The text without a UTF-8 byte order mark.
[[nodiscard]] std::string_view without_bom(std::string_view text);

/// The first thing that keeps the bytes from being UTF-8 text: another encoding, a NUL byte, a broken
/// sequence. Empty when all is well.
[[nodiscard]] std::vector<Diagnostic> problems_with_encoding(std::string_view text, const std::string& file);

/// Bytes of the blank (ASCII, no-break, thin, ...) that `text` begins or ends with; 0 for none.
[[nodiscard]] std::size_t blank_at_front(std::string_view text);
[[nodiscard]] std::size_t blank_at_back(std::string_view text);
/// Without blanks at either end.
[[nodiscard]] std::string_view trim(std::string_view text);

[[nodiscard]] std::size_t count_characters(std::string_view text);

/// One character of valid UTF-8; `length` bytes.
struct Character {
  char32_t code = 0;
  std::size_t length = 0;
};
/// The character that `text` (not empty) begins with; a broken sequence is one byte long, U+FFFD.
[[nodiscard]] Character first_character(std::string_view text);

/// In double quotes, cut to 60 characters, control characters as `?`, for messages.
[[nodiscard]] std::string quoted(std::string_view text);

/// 1234567 as `1,234,567`.
[[nodiscard]] std::string with_commas(std::size_t number);

}  // namespace steelyard::read
