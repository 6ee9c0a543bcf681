#include "rebuild/facts.hpp"

#include <limits>
#include <utility>

namespace steelyard::rebuilding {

namespace {

int col_of(std::string_view wanted) {
  for (std::size_t i = 0; i < col_count; ++i) {
    if (col_names[i] == wanted) return static_cast<int>(i);
  }
  return -1;
}

}  // namespace

Header::Header(const Table& table) {
  cols.reserve(table.names.size());
  for (const std::string& column : table.names) cols.push_back(col_of(column));
}

Facts::Facts(const Table& table, const Header& header, const Row& row) : table_(table), row_(row) {
  for (std::size_t i = 0; i < row.cells.size() && i < header.cols.size(); ++i) {
    if (header.cols[i] >= 0 && !row.cells[i].empty()) {
      own_[static_cast<std::size_t>(header.cols[i])] = &row.cells[i];
    }
  }
  cells_ = own_;
  for (const NamedCell& word : row.words) {
    const int found = col_of(word.name);
    if (found < 0 || word.cell.empty()) continue;
    const auto col = static_cast<std::size_t>(found);
    words_[col] = &word.cell;
    if (cells_[col] == nullptr) cells_[col] = &word.cell;
  }
}

std::string_view Facts::text(Col col) const {
  const Cell* found = cell(col);
  return found == nullptr ? std::string_view() : std::string_view(found->text);
}

std::string Facts::word(Col col) const {
  std::string result(text(col));
  for (char& c : result) {
    if (c == '_' || c == ' ') c = '-';
    if (c >= 'A' && c <= 'Z') c = static_cast<char>(c - 'A' + 'a');
  }
  return result;
}

Place Facts::place(Col col) const {
  const Cell* found = cell(col);
  return found == nullptr ? row_place() : Place{table_.file, found->line, found->column};
}

Place Facts::row_place() const {
  const std::size_t column = row_.cells.empty() ? 1 : row_.cells.front().column;
  return Place{table_.file, row_.line, column};
}

bool is_rounded_quantity(Col col) {
  switch (col) {
    case Col::n1:
    case Col::n2:
    case Col::n:
    case Col::n3:
    case Col::n4:
    case Col::n5:
    case Col::n6:
    case Col::n_total:
    case Col::df:
    case Col::df1:
    case Col::tails:
    case Col::ci_level:
    case Col::alpha:
    case Col::covariates:
    case Col::mu0:
    case Col::events1:
    case Col::events2:
    case Col::year:
    case Col::items:
    case Col::scale_min:
    case Col::scale_max:
      return false;
    default:
      return true;
  }
}

Numbers::Numbers(const Facts& facts, const RebuildOptions& options) : facts_(facts), options_(options) {
  for (std::size_t i = 0; i < col_count; ++i) {
    const Cell* cell = facts.cell(static_cast<Col>(i));
    values_[i] = cell != nullptr && cell->printed.has_value() ? cell->printed.value
                                                              : std::numeric_limits<double>::quiet_NaN();
  }
}

bool Numbers::has(Col col) const {
  const Cell* cell = facts_.cell(col);
  return cell != nullptr && cell->printed.has_value();
}

bool Numbers::has_all(std::initializer_list<Col> cols) const {
  for (const Col col : cols) {
    if (!has(col)) return false;
  }
  return true;
}

bool Numbers::is_bound(Col col) const {
  const Cell* cell = facts_.cell(col);
  return cell != nullptr && cell->printed.is_bound();
}

const Printed& Numbers::printed(Col col) const {
  static const Printed nothing;
  const Cell* cell = facts_.cell(col);
  return cell == nullptr ? nothing : cell->printed;
}

double Numbers::operator[](Col col) {
  mark(col);
  return values_[index(col)];
}

void Numbers::caution(Col col, std::string_view code, std::string what, std::string remedy) {
  if (muted_) return;
  cautions_.push_back(
      {Severity::caution, std::string(code), facts_.place(col), std::move(what), std::move(remedy)});
}

void Numbers::refuse(Col col, std::string_view code, std::string what, std::string remedy) {
  if (muted_) return;
  refusals_.push_back(
      {Severity::error, std::string(code), facts_.place(col), std::move(what), std::move(remedy)});
}

}  // namespace steelyard::rebuilding
