// A CSV file into a table.
#include <algorithm>
#include <string>
#include <vector>

#include <fmt/format.h>

#include "read/cells.hpp"
#include "read/records.hpp"

namespace steelyard {

namespace read {

namespace {

std::size_t line_length(std::string_view text) { return std::min(text.find_first_of("\r\n"), text.size()); }

// Lines that begin with # before the header are remarks; blank lines there mean nothing.
std::size_t skip_remarks(std::string_view text) {
  std::size_t at = 0;
  while (at < text.size()) {
    const std::string_view line = text.substr(at, line_length(text.substr(at)));
    if (!line.empty() && line.front() != '#') break;
    at = std::min(at + line.size() + 1, text.size());
  }
  return at;
}

// A first line `sep=;` names the separator, as some spreadsheets write it.
char named_separator(std::string_view text) {
  const bool named = text.size() >= 5 && text.substr(0, 4) == "sep=" && line_length(text) == 5;
  const bool one_of_ours = named && (text[4] == ',' || text[4] == ';' || text[4] == '\t');
  return one_of_ours ? text[4] : '\0';
}

void check_width(const Place& place, std::size_t fields, const Table& table, char separator,
                 Problems& problems) {
  if (problems.enough_errors()) return problems.count_error();
  const char* remedy = fields < table.names.size()
                           ? "Every row needs as many cells as the header, empty ones included."
                           : "Put cells that contain the separator in quotes.";
  const char* comma = separator == ',' && fields > table.names.size()
                          ? " Numbers with a decimal comma need \";\" or tabs between the columns."
                          : "";
  problems.error("ragged-row", place,
                 fmt::format("This row has {} cell{}, but the header names {} column{}.", fields,
                             fields == 1 ? "" : "s", table.names.size(), table.names.size() == 1 ? "" : "s"),
                 std::string(remedy) + comma);
}

// Spreadsheets leave empty columns behind: without a name and without content they are nothing.
void drop_empty_columns(Table& table, std::vector<Place>& places, Problems& problems) {
  for (std::size_t i = table.names.size(); i-- > 0;) {
    if (!table.names[i].empty()) continue;
    const bool empty = std::all_of(table.rows.begin(), table.rows.end(),
                                   [&](const Row& row) { return row.cells[i].empty(); });
    if (!empty) {
      problems.error("column-without-name", places[i], fmt::format("Column {} has cells but no name.", i + 1),
                     "Name it in the header, or empty it.");
      continue;
    }
    const auto offset = static_cast<std::ptrdiff_t>(i);
    table.names.erase(table.names.begin() + offset);
    places.erase(places.begin() + offset);
    for (Row& row : table.rows) row.cells.erase(row.cells.begin() + offset);
  }
}

bool read_header(Records& records, Table& table, std::vector<Place>& places, Problems& problems) {
  std::vector<Field> fields;
  if (!records.next(fields)) {
    if (!problems.has_errors()) {
      problems.error("empty-file", {table.file, 1, 1}, "The file is empty.",
                     "It needs a header line that names the columns, and a line for each study.");
    }
    return false;
  }
  if (fields.size() > most_columns) {
    problems.error("too-many-columns", {table.file, fields[0].line, 0},
                   fmt::format("The header names {} columns; at most {} are read.",
                               with_commas(fields.size()), with_commas(most_columns)),
                   "Check that the file is a table with one study a line.");
    return false;
  }
  for (const Field& field : fields) {
    table.names.push_back(unescape(field));
    places.push_back({table.file, field.line, field.column});
  }
  return true;
}

void read_rows(Records& records, Table& table, char separator, Problems& problems) {
  std::vector<Field> fields;
  while (records.next(fields)) {
    if (records.broken()) continue;
    if (fields.size() != table.names.size()) {
      check_width({table.file, fields[0].line, 1}, fields.size(), table, separator, problems);
      continue;
    }
    Row& row = table.rows.emplace_back();
    row.line = fields[0].line;
    row.cells.resize(fields.size());
    for (std::size_t i = 0; i < fields.size(); ++i) {
      row.cells[i].text = unescape(fields[i]);
      row.cells[i].line = narrow(fields[i].line);
      row.cells[i].column = narrow(fields[i].column);
    }
  }
}

}  // namespace

}  // namespace read

Outcome<Table> read_csv(std::string_view text, const std::string& file) {
  using namespace read;
  Problems problems;
  Table table;
  table.file = file;
  text = without_bom(text);
  for (Diagnostic& problem : problems_with_encoding(text, file)) problems.add(std::move(problem));
  if (problems.has_errors()) return finish({}, problems);
  std::size_t start = skip_remarks(text);
  char separator = named_separator(text.substr(start));
  if (separator != '\0') {
    start += 5;
  } else {
    separator = find_separator(text.substr(start));
  }
  Records records(text, start, separator, table.file, problems);
  std::vector<Place> places;
  if (!read_header(records, table, places, problems)) return finish({}, problems);
  read_rows(records, table, separator, problems);
  drop_empty_columns(table, places, problems);
  check_names(table.names, places, problems);
  if (table.rows.empty() && !problems.has_errors()) {
    problems.error("no-rows", {file, places.empty() ? 0 : places[0].line, 0},
                   "The file has a header but no rows.", "Add a line for each study.");
  }
  read_cells(table, separator == ',', problems);
  return finish(std::move(table), problems);
}

}  // namespace steelyard
