// What must hold of any table that a reader gives, and of any refusal.
#pragma once

#include <algorithm>
#include <string>

#include "fuzz/check.hpp"
#include "steelyard/read.hpp"

namespace steelyard::fuzz {

inline void check_number(const Printed& printed) {
  if (printed.has_value()) {
    STEELYARD_FUZZ_CHECK(printed.low <= printed.value && printed.value <= printed.high);
    STEELYARD_FUZZ_CHECK(printed.value - printed.value == 0.0);  // finite
  } else if (printed.present()) {
    STEELYARD_FUZZ_CHECK(printed.low < printed.high);
  }
}

template <class T>
void check_outcome(const Outcome<T>& outcome) {
  std::size_t errors = 0;
  for (const Diagnostic& diagnostic : outcome.diagnostics) {
    errors += diagnostic.severity == Severity::error ? 1 : 0;
    STEELYARD_FUZZ_CHECK(!diagnostic.code.empty() && !diagnostic.what.empty() && !diagnostic.remedy.empty());
  }
  STEELYARD_FUZZ_CHECK(outcome.ok() == (errors == 0));
  STEELYARD_FUZZ_CHECK(outcome.diagnostics.size() <= 100);
}

inline void check_table(const Outcome<Table>& outcome) {
  check_outcome(outcome);
  if (!outcome.ok()) return;
  const Table& table = *outcome.value;
  STEELYARD_FUZZ_CHECK(!table.rows.empty());
  for (const Row& row : table.rows) {
    STEELYARD_FUZZ_CHECK(row.cells.size() == table.names.size());
    for (const Cell& cell : row.cells) check_number(cell.printed);
    for (const NamedCell& word : row.words) {
      STEELYARD_FUZZ_CHECK(find_column(word.name) != nullptr);
      check_number(word.cell.printed);
    }
  }
}

/// The table as CSV, every cell in quotes.
inline std::string to_csv(const Table& table) {
  std::string text = "sep=;\n";
  const auto put = [&](const std::string& cell, bool last) {
    text += '"';
    for (const char c : cell) text += c == '"' ? std::string("\"\"") : std::string(1, c);
    text += last ? "\"\n" : "\";";
  };
  for (std::size_t i = 0; i < table.names.size(); ++i) put(table.names[i], i + 1 == table.names.size());
  for (const Row& row : table.rows) {
    for (std::size_t i = 0; i < row.cells.size(); ++i) put(row.cells[i].text, i + 1 == row.cells.size());
  }
  return text;
}

/// Writing a table and reading it again changes nothing.
inline void check_round_trip(const Table& table) {
  const Outcome<Table> again = read_csv(to_csv(table), "again");
  check_table(again);
  STEELYARD_FUZZ_CHECK(again.ok());
  STEELYARD_FUZZ_CHECK(again.value->names == table.names);
  std::size_t at = 0;
  for (const Row& row : table.rows) {
    const bool blank =
        std::all_of(row.cells.begin(), row.cells.end(), [](const Cell& c) { return c.empty(); });
    if (blank) continue;  // says nothing, so CSV skips it
    STEELYARD_FUZZ_CHECK(at < again.value->rows.size());
    const Row& other = again.value->rows[at++];
    for (std::size_t i = 0; i < row.cells.size(); ++i) {
      STEELYARD_FUZZ_CHECK(row.cells[i].text == other.cells[i].text);
      STEELYARD_FUZZ_CHECK(row.cells[i].printed.relation == other.cells[i].printed.relation);
      STEELYARD_FUZZ_CHECK(row.cells[i].printed.low == other.cells[i].printed.low);
      STEELYARD_FUZZ_CHECK(row.cells[i].printed.high == other.cells[i].printed.high);
    }
  }
  STEELYARD_FUZZ_CHECK(at == again.value->rows.size());
}

}  // namespace steelyard::fuzz
