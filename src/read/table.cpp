#include <algorithm>

#include "read/text.hpp"
#include "steelyard/read.hpp"

namespace steelyard {

int Table::index_of(std::string_view name) const {
  const auto found = std::find(names.begin(), names.end(), name);
  return found == names.end() ? -1 : static_cast<int>(found - names.begin());
}

const Cell* Table::own_cell(const Row& row, std::string_view name) const {
  const int index = index_of(name);
  if (index < 0 || static_cast<std::size_t>(index) >= row.cells.size()) return nullptr;
  const Cell& cell = row.cells[static_cast<std::size_t>(index)];
  return cell.empty() ? nullptr : &cell;
}

const Cell* Table::word_cell(const Row& row, std::string_view name) {
  const auto found = std::find_if(row.words.begin(), row.words.end(),
                                  [&](const NamedCell& word) { return word.name == name; });
  return found == row.words.end() ? nullptr : &found->cell;
}

const Cell* Table::cell(const Row& row, std::string_view name) const {
  const Cell* own = own_cell(row, name);
  return own != nullptr ? own : word_cell(row, name);
}

Outcome<Table> read_table(std::string_view text, const std::string& file) {
  std::string_view rest = read::without_bom(text);
  while (!rest.empty() &&
         (rest.front() == ' ' || rest.front() == '\t' || rest.front() == '\n' || rest.front() == '\r')) {
    rest.remove_prefix(1);
  }
  const bool json = !rest.empty() && (rest.front() == '[' || rest.front() == '{');
  return json ? read_json(text, file) : read_csv(text, file);
}

}  // namespace steelyard
