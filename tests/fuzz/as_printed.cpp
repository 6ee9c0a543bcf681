// Any bytes as a paper's own words, with either decimal mark.
#include <cstddef>
#include <cstdint>
#include <set>
#include <string>
#include <string_view>

#include "fuzz/table_check.hpp"

namespace {

void check_cell(const steelyard::NamedCell& named, const steelyard::NumberStyle& style, std::size_t size) {
  const steelyard::Column* column = steelyard::find_column(named.name);
  STEELYARD_FUZZ_CHECK(column != nullptr);
  STEELYARD_FUZZ_CHECK(!named.cell.empty());
  STEELYARD_FUZZ_CHECK(named.cell.line == 1);
  STEELYARD_FUZZ_CHECK(named.cell.column >= 1 && named.cell.column <= size);
  const bool numeric =
      column->kind == steelyard::ColumnKind::number || column->kind == steelyard::ColumnKind::count;
  STEELYARD_FUZZ_CHECK(named.cell.printed.present() == numeric);
  if (!numeric) return;
  const auto alone = steelyard::parse_printed(named.cell.text, style, {});
  STEELYARD_FUZZ_CHECK(alone.ok());
  steelyard::fuzz::check_number(named.cell.printed);
}

}  // namespace

extern "C" int LLVMFuzzerTestOneInput(const std::uint8_t* data, std::size_t size) {
  const std::string_view text(reinterpret_cast<const char*>(data), size);
  for (const bool comma : {false, true}) {
    const auto outcome = steelyard::read_as_printed(text, {comma}, {"f", 1, 1});
    steelyard::fuzz::check_outcome(outcome);
    if (!outcome.ok()) continue;
    std::set<std::string> names;
    for (const steelyard::NamedCell& named : *outcome.value) {
      STEELYARD_FUZZ_CHECK(names.insert(named.name).second);
      check_cell(named, {comma}, size);
    }
  }
  return 0;
}
