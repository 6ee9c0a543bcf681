// docs/formats.md says what the code does.
#include <catch2/catch.hpp>

#include <charconv>
#include <cmath>
#include <fstream>
#include <iterator>
#include <limits>
#include <string>
#include <vector>

#include "read/helpers.hpp"
#include "steelyard/read.hpp"

using namespace steelyard;

namespace {

std::vector<std::string> lines_of(const std::string& file) {
  std::ifstream stream(file);
  REQUIRE(stream.good());
  std::vector<std::string> lines;
  for (std::string line; std::getline(stream, line);) lines.push_back(line);
  return lines;
}

const std::vector<std::string>& page() {
  static const std::vector<std::string> lines = lines_of(STEELYARD_TEST_DIR "/../docs/formats.md");
  return lines;
}

// The lines between the first that equals `from` and the next that begins with `to`.
std::vector<std::string> between(const std::string& from, const std::string& to) {
  std::vector<std::string> found;
  bool inside = false;
  for (const std::string& line : page()) {
    if (inside && line.rfind(to, 0) == 0) break;
    if (inside) found.push_back(line);
    inside = inside || line == from;
  }
  return found;
}

std::vector<std::string> split(const std::string& line, const std::string& mark) {
  std::vector<std::string> parts;
  std::size_t start = 0;
  while (true) {
    const std::size_t end = line.find(mark, start);
    parts.push_back(line.substr(start, end - start));
    if (end == std::string::npos) return parts;
    start = end + mark.size();
  }
}

std::string trimmed(const std::string& text) {
  const std::size_t first = text.find_first_not_of(' ');
  if (first == std::string::npos) return "";
  return text.substr(first, text.find_last_not_of(' ') - first + 1);
}

double number(const std::string& text, double when_empty) {
  if (text.empty()) return when_empty;
  double value = 0.0;
  const auto [end, error] = std::from_chars(text.data(), text.data() + text.size(), value);
  REQUIRE(end == text.data() + text.size());
  return value;
}

std::string holds(const Column& column) {
  switch (column.kind) {
    case ColumnKind::text:
      return "text";
    case ColumnKind::number:
      return "number";
    case ColumnKind::count:
      return "count";
    case ColumnKind::choice:
      break;
  }
  std::string list = "`";
  for (const char c : column.choices) list += c == '|' ? std::string("` `") : std::string(1, c);
  return list + "`";
}

}  // namespace

TEST_CASE("the page's table of columns is the table of columns") {
  std::string page_table;
  for (const std::string& line : between("## Columns", "Words")) {
    if (line.rfind("| `", 0) == 0) page_table += line + "\n";
  }
  std::string table;
  for (const Column& column : columns()) {
    table += "| `" + std::string(column.name) + "` | " + holds(column) + " | " + std::string(column.meaning) +
             " |\n";
  }
  CHECK(page_table == table);
}

TEST_CASE("the page's numbers are read as it says") {
  constexpr double inf = std::numeric_limits<double>::infinity();
  std::size_t examples = 0;
  for (const std::string& line : between("## Numbers as printed", "An empty cell")) {
    if (line.rfind("| `", 0) != 0) continue;
    INFO(line);
    const std::vector<std::string> parts = split(line, "|");
    REQUIRE(parts.size() == 7);
    const std::string cell = trimmed(parts[1]);
    const Outcome<Printed> outcome = parse_printed(cell.substr(1, cell.size() - 2), {}, {});
    REQUIRE(outcome.ok());
    CHECK(outcome.value->low == number(trimmed(parts[2]), -inf));
    CHECK(outcome.value->high == number(trimmed(parts[4]), inf));
    CHECK(outcome.value->has_value() == !trimmed(parts[3]).empty());
    if (outcome.value->has_value()) CHECK(outcome.value->value == number(trimmed(parts[3]), 0.0));
    ++examples;
  }
  CHECK(examples >= 15);
}

TEST_CASE("the page's words are taken apart as it says") {
  std::size_t examples = 0;
  for (const std::string& line : between("```words", "```")) {
    INFO(line);
    const std::vector<std::string> sides = split(line, " -> ");
    REQUIRE(sides.size() == 2);
    const auto outcome = read_as_printed(sides[0], {}, {"", 1, 1});
    CHECK(test::messages(outcome) == "");
    REQUIRE(outcome.ok());
    std::string cells;
    for (const NamedCell& named : *outcome.value) {
      cells += (cells.empty() ? "" : ", ") + named.name + " " + named.cell.text;
    }
    CHECK(cells == sides[1]);
    ++examples;
  }
  CHECK(examples >= 20);
}
