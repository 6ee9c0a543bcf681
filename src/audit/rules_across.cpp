// Rows that look too much alike.
#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <map>
#include <string>

#include "audit/rule.hpp"

namespace steelyard::auditing {

namespace {

std::string row_name(const TableView& view, std::size_t row) {
  const Cell* label = view.table.cell(view.table.rows[row], "study");
  const std::size_t line = view.table.rows[row].line;
  return label == nullptr ? fmt::format("line {}", line) : fmt::format("\"{}\" (line {})", label->text, line);
}

std::string text_of(const TableView& view, std::size_t row, std::string_view column) {
  const Cell* cell = view.table.cell(view.table.rows[row], column);
  return cell == nullptr ? std::string() : cell->text;
}

// Rows by a key; an empty key is none.
using Groups = std::map<std::string, std::vector<std::size_t>>;

template <class Key>
Groups group_by(const TableView& view, Key key) {
  Groups groups;
  for (std::size_t i = 0; i < view.table.rows.size(); ++i) {
    const std::string k = key(i);
    if (!k.empty()) groups[k].push_back(i);
  }
  return groups;
}

template <class Say>
void report_groups(const TableView& view, std::string_view rule, const Groups& groups, Say say,
                   const std::string& remedy) {
  for (const auto& [key, rows] : groups) {
    if (rows.size() < 2) continue;
    const std::vector<std::size_t> others(rows.begin(), rows.end() - 1);
    view.report(rule, rows.back(), others, say(rows.back(), rows.front()), remedy);
  }
}

// A t with at least three digits: fewer coincide too often.
bool telling(const Cell* t) {
  if (t == nullptr || !t->printed.has_value()) return false;
  return t->printed.decimals >= 2 && std::abs(t->printed.value) >= 1.0;
}

std::string test_key(const TableView& view, std::size_t i) {
  const Row& row = view.table.rows[i];
  const Cell* t = view.table.cell(row, "t");
  if (!telling(t)) return "";
  std::string key = fmt::format("{}", t->printed.value);
  bool sized = false;
  for (const std::string_view column : {"n1", "n2", "n", "n_total", "df"}) {
    const std::string text = text_of(view, i, column);
    sized = sized || !text.empty();
    key += "|" + text;
  }
  return sized ? key : "";
}

void check_same_test(const TableView& view) {
  report_groups(
      view, "same-test-twice", group_by(view, [&](std::size_t i) { return test_key(view, i); }),
      [&](std::size_t row, std::size_t other) {
        return fmt::format("t = {} and the sizes are the same as in {}.", text_of(view, row, "t"),
                           row_name(view, other));
      },
      "Check that one result was not entered twice.");
}

void check_same_label(const TableView& view) {
  report_groups(
      view, "same-label-twice", group_by(view, [&](std::size_t i) { return text_of(view, i, "study"); }),
      [&](std::size_t row, std::size_t other) {
        return fmt::format("The label \"{}\" stands in line {} too.", text_of(view, row, "study"),
                           view.table.rows[other].line);
      },
      "If both rows come from the same people their effects depend on each other: keep one, or merge them.");
}

std::string lower(std::string text) {
  for (char& c : text) {
    if (c >= 'A' && c <= 'Z') c = static_cast<char>(c - 'A' + 'a');
  }
  return text;
}

void check_label_case(const TableView& view) {
  // One row for each spelling; groups with several spellings are reported.
  std::map<std::string, std::map<std::string, std::size_t>> spellings;
  for (std::size_t i = 0; i < view.table.rows.size(); ++i) {
    const std::string label = text_of(view, i, "study");
    if (!label.empty()) spellings[lower(label)].emplace(label, i);
  }
  for (const auto& [key, found] : spellings) {
    if (found.size() < 2) continue;
    std::vector<std::size_t> rows;
    for (const auto& [label, row] : found) rows.push_back(row);
    std::sort(rows.begin(), rows.end());
    const std::size_t last = rows.back();
    rows.pop_back();
    view.report("labels-differ-by-case", last, rows,
                fmt::format("The label \"{}\" differs only by case from {}.", text_of(view, last, "study"),
                            row_name(view, rows.front())),
                "Write both alike if they are the same study.");
  }
}

}  // namespace

Rule rule_same_test() {
  return {
      {"same-test-twice", "the same t and sizes in two rows", "common practice"}, nullptr, check_same_test};
}
Rule rule_same_label() {
  return {{"same-label-twice", "the same label in two rows: dependent effects", "common practice"},
          nullptr,
          check_same_label};
}
Rule rule_label_case() {
  return {{"labels-differ-by-case", "labels that differ only by upper and lower case", "common practice"},
          nullptr,
          check_label_case};
}

}  // namespace steelyard::auditing
