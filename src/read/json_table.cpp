// A JSON file into a table: an array of objects, {"studies": [...]}, or a result document of the
// command, whose input is read back.
#include <charconv>
#include <map>
#include <string>
#include <vector>

#include <fmt/format.h>

#include "read/cells.hpp"
#include "read/json.hpp"

namespace steelyard {

namespace read {

namespace {

class TableBuilder {
 public:
  TableBuilder(std::string_view text, const std::string& file, Problems& problems)
      : json_(text, file, problems), problems_(problems), most_cells_(1'000'000 + text.size()) {
    table_.file = file;
  }

  /// False after a syntax error.
  bool read() {
    if (json_.peek() == '[') return rows() && json_.end();
    return document() && json_.end();
  }

  /// Brings all rows to the same width and hands everything over.
  Table take() {
    for (Row& row : table_.rows) row.cells.resize(table_.names.size());
    return std::move(table_);
  }
  [[nodiscard]] const std::vector<Place>& places() const { return places_; }
  /// True when a result document says that its numbers have points, so that nothing need be guessed.
  [[nodiscard]] bool has_points() const { return has_points_; }

 private:
  bool rows() {
    found_rows_ = true;
    return json_.array([&] { return json_.peek() == '{' ? row() : not_a_row("an object"); });
  }

  bool not_a_row(const char* expected) {
    problems_.error("json-row", json_.place(),
                    fmt::format("A study must be {} with the columns as names.", expected),
                    "Write it like {\"study\": \"A\", \"t\": 2.1, \"n1\": 20, \"n2\": 20}.");
    return json_.skip_value(2);
  }

  bool row() {
    Row& row = table_.rows.emplace_back();
    row.line = json_.place().line;
    return cells(row, false);
  }

  // `keep_line`: the cells say where they stood in the file that they first came from.
  bool cells(Row& row, bool keep_line) {
    if (!widen(row, last_width_)) return false;
    const bool whole = json_.object([&](const std::string& name, const Place& where) {
      const std::string key(trim(name));
      const int index = column(key, where);
      if (index < 0) return false;
      const auto i = static_cast<std::size_t>(index);
      if (!widen(row, i + 1)) return false;
      Cell& cell = row.cells[i];
      if (cell.line != 0) {
        problems_.error("duplicate-column", where,
                        fmt::format("The name {} stands twice in this object.", quoted(key)),
                        "Rename or remove one of them.");
      }
      const Place at = json_.place();
      cell.line = narrow(keep_line ? row.line : at.line);
      cell.column = keep_line ? 0 : narrow(at.column);
      return value(cell, key, at);
    });
    last_width_ = row.cells.size();
    return whole;
  }

  bool widen(Row& row, std::size_t width) {
    if (width <= row.cells.size()) return true;
    cells_ += width - row.cells.size();
    if (cells_ > most_cells_) {
      problems_.error(
          "json-too-sparse", json_.place(),
          fmt::format("The objects have {} different names between them and hardly any in common.",
                      with_commas(table_.names.size())),
          "Use the same names in every object.");
      return false;
    }
    row.cells.resize(width);
    return true;
  }

  bool value(Cell& cell, const std::string& key, const Place& where) {
    std::string_view word;
    switch (json_.peek()) {
      case '"': {
        std::string text;
        if (!json_.string(text)) return false;
        cell.text = std::string(trim(text));
        return true;
      }
      case '[':
      case '{':
        problems_.error(
            "json-nested", where,
            fmt::format("The value of {} is an object or an array, but a cell holds one thing.", quoted(key)),
            "Write a number or a text.");
        return json_.skip_value(3);
      default:
        if (!json_.scalar(word)) return false;
        if (word != "null") cell.text = std::string(word);
        return true;
    }
  }

  int column(const std::string& key, const Place& where) {
    const auto known = index_.find(key);
    if (known != index_.end()) return known->second;
    if (table_.names.size() >= most_columns) {
      problems_.error(
          "too-many-columns", where,
          fmt::format("The objects have more than {} different names.", with_commas(most_columns)),
          "Check that every object is one study.");
      return -1;
    }
    const int index = static_cast<int>(table_.names.size());
    index_.emplace(key, index);
    table_.names.push_back(key);
    places_.push_back(where);
    if (key.empty()) {
      problems_.error("column-without-name", where, "This name is blank.", "Name the column.");
    }
    return index;
  }

  // {"studies": [...]}, or a result document, which begins with "steelyard" and carries its input.
  bool document() {
    bool is_result = false;
    const bool whole = json_.object([&](const std::string& key, const Place& where) {
      is_result = is_result || key == "steelyard";
      if (is_result) return key == "input" && json_.peek() == '{' ? input() : json_.skip_value(1);
      if (key == "studies" && json_.peek() == '[') return found_rows_ ? twice(where) : rows();
      if (json_.peek() == '[' || json_.peek() == '{') {
        problems_.caution("json-member", where, fmt::format("The member {} is not read.", quoted(key)),
                          "Studies stand in an array called \"studies\".");
      }
      return json_.skip_value(1);
    });
    if (whole && !found_rows_) {
      problems_.error("json-no-studies", {table_.file, 1, 1},
                      is_result ? "This result document does not carry the rows that it was made from."
                                : "This JSON object has no array \"studies\".",
                      "Write an array of objects, [{\"study\": \"A\", \"t\": 2.1, ...}, ...], or put it in "
                      "{\"studies\": [...]}.");
    }
    return whole;
  }

  bool twice(const Place& where) {
    problems_.error("json-member", where, "The member \"studies\" stands twice.",
                    "Put all studies in one array.");
    return json_.skip_value(1);
  }

  bool input() {
    return json_.object([&](const std::string& key, const Place&) {
      if (key == "decimal_comma") return decimal_comma();
      if (key == "columns" && json_.peek() == '[') return column_order();
      if (key != "rows" || json_.peek() != '[') return json_.skip_value(2);
      found_rows_ = true;
      return json_.array([&] { return json_.peek() == '{' ? result_row() : not_a_row("an object"); });
    });
  }

  // The columns of the original file, in its order.
  bool column_order() {
    return json_.array([&] {
      const Place at = json_.place();
      std::string name;
      return json_.peek() == '"' ? json_.string(name) && column(name, at) >= 0 : json_.skip_value(3);
    });
  }

  // How the numbers of the original file were written.
  bool decimal_comma() {
    std::string_view word;
    if (!json_.scalar(word)) return false;
    has_points_ = word == "false";
    return true;
  }

  // {"line": 3, "cells": {"t": "2.10", ...}}
  bool result_row() {
    Row& row = table_.rows.emplace_back();
    row.line = json_.place().line;
    return json_.object([&](const std::string& key, const Place&) {
      if (key == "cells" && json_.peek() == '{') return cells(row, true);
      if (key != "line") return json_.skip_value(4);
      std::string_view line;
      if (!json_.scalar(line)) return false;
      std::from_chars(line.data(), line.data() + line.size(), row.line);
      return true;
    });
  }

  JsonReader json_;
  Problems& problems_;
  Table table_;
  std::map<std::string, int, std::less<>> index_;
  std::vector<Place> places_;
  std::size_t cells_ = 0;
  std::size_t last_width_ = 0;  // of the row before: most objects have the same names
  std::size_t most_cells_;
  bool found_rows_ = false;
  bool has_points_ = false;
};

}  // namespace

}  // namespace read

Outcome<Table> read_json(std::string_view text, const std::string& file) {
  using namespace read;
  Problems problems;
  text = without_bom(text);
  for (Diagnostic& problem : problems_with_encoding(text, file)) problems.add(std::move(problem));
  if (problems.has_errors()) return finish({}, problems);
  TableBuilder builder(text, file, problems);
  const bool whole = builder.read();
  const std::vector<Place> places = builder.places();
  Table table = builder.take();
  if (whole && table.rows.empty() && !problems.has_errors()) {
    problems.error("no-rows", {file, 1, 1}, "There are no studies in this file.",
                   "Write an object for each study into the array.");
  }
  if (whole && !table.rows.empty() && table.names.empty()) {
    problems.error("json-row", {file, table.rows[0].line, 0}, "The objects of the studies have no members.",
                   "Write each study like {\"study\": \"A\", \"t\": 2.1, \"n1\": 20, \"n2\": 20}.");
  }
  if (whole && !table.names.empty()) check_names(table.names, places, problems);
  read_cells(table, builder.has_points(), problems);
  return finish(std::move(table), problems);
}

}  // namespace steelyard
