// CSV text into records, by RFC 4180: nothing is repaired, every offence is reported where it stands.
#pragma once

#include <cstddef>
#include <string>
#include <string_view>
#include <vector>

#include "read/problems.hpp"
#include "read/text.hpp"

namespace steelyard::read {

/// One field of a record: its text without quotes and outer blanks, still with doubled quotes.
struct Field {
  std::string_view text;
  std::size_t line = 0;
  std::size_t column = 0;
  bool doubled = false;  ///< holds `""` for a quote
};

/// The text of a field as it was meant.
[[nodiscard]] std::string unescape(const Field& field);

/// Which of `,` `;` tab separates the columns: the one that makes the most known names of the header.
[[nodiscard]] char find_separator(std::string_view text);

class Records {
 public:
  Records(std::string_view text, std::size_t start, char separator, const std::string& file,
          Problems& problems)
      : text_(text), separator_(separator), at_(start), locator_(text), file_(file), problems_(problems) {}

  /// The next record that isn't blank; false at the end, or when nothing more can be made of the text.
  bool next(std::vector<Field>& fields);
  /// Whether the last record was broken (then its number of fields means nothing).
  [[nodiscard]] bool broken() const { return broken_; }

 private:
  void record(std::vector<Field>& fields);
  Field quoted_field();
  Field plain_field();
  Field make(std::string_view text);
  bool at_line_end(std::size_t at) const;
  void skip_line_end();
  bool too_long(std::size_t start, std::size_t line);
  void error(std::size_t at, const char* code, std::string what, std::string remedy);
  std::size_t find_field_end(std::size_t from) const;

  std::string_view text_;
  char separator_;
  std::size_t at_;
  Locator locator_;
  const std::string& file_;
  Problems& problems_;
  bool broken_ = false;
  bool stopped_ = false;
};

}  // namespace steelyard::read
