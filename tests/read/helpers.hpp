// What the tests of this room share.
#pragma once

#include <string>
#include <string_view>
#include <vector>

#include "steelyard/read.hpp"

namespace steelyard::test {

/// All diagnostics as they are printed, one a line.
template <class T>
std::string messages(const Outcome<T>& outcome) {
  std::string text;
  for (const Diagnostic& diagnostic : outcome.diagnostics) text += to_text(diagnostic) + "\n";
  return text;
}

/// `name=text@line:column` of every cell that isn't empty, rows separated by `|`.
inline std::string cells_of(const Table& table) {
  std::string text;
  for (const Row& row : table.rows) {
    if (&row != &table.rows.front()) text += " | ";
    text += "line " + std::to_string(row.line);
    for (std::size_t i = 0; i < row.cells.size(); ++i) {
      const Cell& cell = row.cells[i];
      if (cell.empty()) continue;
      text += " " + table.names[i] + "=" + cell.text + "@" + std::to_string(cell.line) + ":" +
              std::to_string(cell.column);
    }
  }
  return text;
}

/// `name=text@column` of every cell.
inline std::string cells_of(const std::vector<NamedCell>& cells) {
  std::string text;
  for (const NamedCell& named : cells) {
    text += (text.empty() ? "" : " ") + named.name + "=" + named.cell.text + "@" +
            std::to_string(named.cell.column);
  }
  return text;
}

}  // namespace steelyard::test
