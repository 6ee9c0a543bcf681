#include "read/cells.hpp"

#include <array>
#include <cmath>
#include <limits>

#include <fmt/format.h>

namespace steelyard::read {

namespace {

Place place_of(const Table& table, const Cell& cell) { return {table.file, cell.line, cell.column}; }

bool takes_percent(const Column& column) { return column.unit == "probability"; }

// ---- the decimal mark of a file -------------------------------------------------------------------

struct Marks {
  std::size_t commas = 0;
  std::size_t points = 0;
};

bool holds_numbers(const Column* column) {
  return column != nullptr && (column->kind == ColumnKind::number || column->kind == ColumnKind::count);
}

Marks count_marks(const Table& table, const std::vector<const Column*>& known) {
  Marks marks;
  for (const Row& row : table.rows) {
    for (std::size_t i = 0; i < row.cells.size(); ++i) {
      if (!holds_numbers(known[i]) || row.cells[i].empty()) continue;
      const Mark mark = decimal_mark(row.cells[i].text);
      marks.commas += mark == Mark::comma ? 1 : 0;
      marks.points += mark == Mark::point ? 1 : 0;
    }
  }
  return marks;
}

const char* broken_count(const Printed& printed) {
  if (!printed.has_value()) return "is not one number";
  if (printed.value < 0.0) return "is negative";
  return printed.value != std::floor(printed.value) ? "is not a whole number" : nullptr;
}

// ---- one cell ---------------------------------------------------------------------------------------

class CellReader {
 public:
  CellReader(const Table& table, bool ask, Problems& problems)
      : table_(table), ask_(ask), problems_(problems) {}

  void read(Cell& cell, const Column& column) {
    if (cell.empty()) return;
    if (column.kind == ColumnKind::choice) {
      choose(cell, column);
    } else if (column.kind != ColumnKind::text) {
      number(cell, column);
    }
  }

 private:
  void number(Cell& cell, const Column& column) {
    const Scan scan = scan_printed(cell.text, table_.style);
    if (scan.fault != Fault::none) return fault(cell, scan.fault);
    if (auto problem = set_printed(cell, column, scan, place_of(table_, cell)))
      problems_.add(std::move(*problem));
  }

  void fault(const Cell& cell, Fault fault) {
    if (problems_.enough_errors()) return problems_.count_error();
    const bool ambiguous = ask_ && fault == Fault::comma && decimal_mark(cell.text) == Mark::either;
    problems_.add(ambiguous ? describe_ambiguous(cell.text, place_of(table_, cell))
                            : describe(fault, cell.text, place_of(table_, cell)));
  }

  void choose(Cell& cell, const Column& column);

  template <class What>
  void error(const Cell& cell, const char* code, What what, const std::string& remedy) {
    if (problems_.enough_errors()) return problems_.count_error();
    problems_.error(code, place_of(table_, cell), what(), remedy);
  }

  const Table& table_;
  bool ask_;
  Problems& problems_;
};

std::vector<std::string_view> split_choices(std::string_view choices) {
  std::vector<std::string_view> words;
  while (true) {
    const std::size_t bar = choices.find('|');
    words.push_back(choices.substr(0, bar));
    if (bar == std::string_view::npos) return words;
    choices.remove_prefix(bar + 1);
  }
}

// One spelling for what people write alike: case, blank or hyphen for underscore, typographic minus,
// JSON's true and false.
std::string spelling(std::string_view text) {
  std::string word;
  while (!text.empty()) {
    const Character c = first_character(text);
    const bool minus = c.code == 0x2212 || c.code == 0x2013;
    if (c.code >= 'A' && c.code <= 'Z') {
      word += static_cast<char>(c.code - 'A' + 'a');
    } else if (minus) {
      word += '-';
    } else {
      word += text.substr(0, c.length);
    }
    text.remove_prefix(c.length);
  }
  for (std::size_t i = 1; i + 1 < word.size(); ++i) {
    if (word[i] == ' ' || word[i] == '-') word[i] = '_';
  }
  if (word == "true") return "yes";
  if (word == "false") return "no";
  return word;
}

void CellReader::choose(Cell& cell, const Column& column) {
  const std::vector<std::string_view> words = split_choices(column.choices);
  std::string word = spelling(cell.text);
  for (const std::string_view choice : words) {
    if (word == choice) {
      cell.text = std::move(word);
      return;
    }
  }
  error(
      cell, "unknown-choice",
      [&] {
        std::string list;
        for (std::size_t i = 0; i < words.size(); ++i) {
          list += (i == 0 ? "" : i + 1 == words.size() ? " or " : ", ") + quoted(words[i]);
        }
        return fmt::format("{} is not a word that the column \"{}\" knows; it takes {}.", quoted(cell.text),
                           column.name, list);
      },
      [&]() -> std::string {
        const std::string_view near = nearest_word(word, words);
        if (near.empty()) return "Use one of them, or leave the cell empty.";
        return fmt::format("Did you mean \"{}\"?", near);
      }());
}

// ---- the paper's own words --------------------------------------------------------------------------

// The words' `n_total` is the size of the sample where the row says that there is one sample only.
void settle_total(const Table& table, const Row& row, std::vector<NamedCell>& words) {
  const Cell* design = table.own_cell(row, "design");
  if (design == nullptr || design->text == "two_groups") return;
  for (NamedCell& word : words) {
    if (word.name == "n_total") word.name = "n";
  }
}

void read_words(Table& table, Problems& problems) {
  const int index = table.index_of("as_printed");
  if (index < 0) return;
  for (Row& row : table.rows) {
    const Cell& cell = row.cells[static_cast<std::size_t>(index)];
    if (cell.empty()) continue;
    Outcome<std::vector<NamedCell>> words = read_as_printed(cell.text, table.style, place_of(table, cell));
    for (Diagnostic& diagnostic : words.diagnostics) problems.add(std::move(diagnostic));
    if (!words.ok()) continue;
    settle_total(table, row, *words.value);
    row.words = std::move(*words.value);
    row.words.shrink_to_fit();
  }
}

}  // namespace

std::optional<Diagnostic> set_printed(Cell& cell, const Column& column, const Scan& scan,
                                      const Place& where) {
  const auto error = [&](const char* code, std::string what, const char* remedy) {
    return Diagnostic{Severity::error, code, where, std::move(what), remedy};
  };
  Printed printed = scan.printed;
  if (scan.percent && !takes_percent(column)) {
    return error("percent-outside-p",
                 fmt::format("{} is a percentage, but the column \"{}\" does not hold probabilities.",
                             quoted(cell.text), column.name),
                 "Write the number itself.");
  }
  if (column.kind == ColumnKind::count) {
    if (const char* rule = broken_count(printed)) {
      return error("not-a-count",
                   fmt::format("{} {}, but the column \"{}\" counts {}.", quoted(cell.text), rule,
                               column.name, column.unit == "year" ? "years" : column.unit),
                   "Write a whole number, 0 or more, or leave the cell empty.");
    }
    printed.relation = Relation::exact;
    printed.low = printed.high = printed.value;
  }
  cell.printed = printed;
  return std::nullopt;
}

std::uint32_t narrow(std::size_t number) {
  constexpr std::size_t largest = std::numeric_limits<std::uint32_t>::max();
  return static_cast<std::uint32_t>(number < largest ? number : largest);
}

void read_cells(Table& table, bool comma_separates, Problems& problems) {
  std::vector<const Column*> known;
  for (const std::string& name : table.names) known.push_back(find_column(name));
  const Marks marks = comma_separates ? Marks{} : count_marks(table, known);
  table.style.decimal_comma = marks.commas > marks.points;
  const bool ask = !comma_separates && marks.commas == 0 && marks.points == 0;
  CellReader reader(table, ask, problems);
  for (Row& row : table.rows) {
    for (std::size_t i = 0; i < row.cells.size(); ++i) {
      if (known[i] != nullptr) reader.read(row.cells[i], *known[i]);
    }
  }
  read_words(table, problems);
}

Outcome<Table> finish(Table table, Problems& problems) {
  const bool failed = problems.has_errors();
  Outcome<Table> outcome{std::nullopt, problems.take()};
  if (!failed) outcome.value = std::move(table);
  return outcome;
}

}  // namespace steelyard::read
