// Room "read": text into rows of printed numbers.
#pragma once

#include <cstdint>
#include <string>
#include <string_view>
#include <vector>

#include "steelyard/base.hpp"
#include "steelyard/study.hpp"

namespace steelyard {

/// One cell: its text as it stood (without quoting and outer blanks), where it stood, and, in a
/// column of numbers, the number it prints. An empty cell has empty text.
struct Cell {
  std::string text;
  std::uint32_t line = 0;
  std::uint32_t column = 0;
  Printed printed;

  [[nodiscard]] bool empty() const { return text.empty(); }
};

/// A cell of a known column that doesn't stand in that column.
struct NamedCell {
  std::string name;
  Cell cell;
};

/// One row; `cells` are parallel to `Table::names`. `words` is what its `as_printed` cell says, taken
/// apart, whether or not the row's own cells say the same.
struct Row {
  std::size_t line = 0;
  std::vector<Cell> cells;
  std::vector<NamedCell> words;
};

/// How numbers are written in a file.
struct NumberStyle {
  bool decimal_comma = false;  ///< `1,5` is one and a half
};

/// A file's rows. `names` are the column names in file order: known ones as in `columns()`, the
/// others (labels of the user's own) as they stand.
struct Table {
  std::string file;
  std::vector<std::string> names;
  std::vector<Row> rows;
  NumberStyle style;

  /// Index of a column, or -1.
  [[nodiscard]] int index_of(std::string_view name) const;
  /// The row's own cell or, when the column is absent or the cell empty, what the row's `as_printed`
  /// words say; null when neither says anything.
  [[nodiscard]] const Cell* cell(const Row& row, std::string_view name) const;
  /// The same without the words: null when the column is absent or the cell empty.
  [[nodiscard]] const Cell* own_cell(const Row& row, std::string_view name) const;
  /// What the words alone say, or null.
  [[nodiscard]] static const Cell* word_cell(const Row& row, std::string_view name);
};

/// Reads one printed number. Grammar and examples: docs/formats.md.
/// Errors quote the text and show accepted forms.
[[nodiscard]] Outcome<Printed> parse_printed(std::string_view text, const NumberStyle& style,
                                             const Place& where);

/// Reads a whole file's text: CSV (RFC 4180, with `,` `;` or tab, found from the header) or JSON (when the
/// first character that isn't blank is `[` or `{`). All problems of the file are reported at once.
[[nodiscard]] Outcome<Table> read_table(std::string_view text, const std::string& file);

/// Reads CSV / JSON text when the form is known.
[[nodiscard]] Outcome<Table> read_csv(std::string_view text, const std::string& file);
[[nodiscard]] Outcome<Table> read_json(std::string_view text, const std::string& file);

/// Takes a line as a paper prints it, `t(28) = 2.20, p = .036`, apart into cells of known columns
/// (`t`, `df`, `p`, ...), each with its place in the file; `where` is the place of the line's first
/// character. Words that are not understood are a caution that quotes them.
[[nodiscard]] Outcome<std::vector<NamedCell>> read_as_printed(std::string_view text, const NumberStyle& style,
                                                              const Place& where);

}  // namespace steelyard
