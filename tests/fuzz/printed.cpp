// Any bytes as one printed number, with either decimal mark.
#include <cstddef>
#include <cstdint>
#include <string>
#include <string_view>

#include <fmt/format.h>

#include "fuzz/table_check.hpp"

namespace {

using steelyard::Printed;
using steelyard::Relation;

// A number written with its own decimals is read as the same number.
void check_round_trip(const Printed& printed) {
  const bool plain =
      printed.decimals >= 0 && printed.decimals <= 15 && printed.value < 1e15 && printed.value > -1e15;
  if (printed.relation != Relation::rounded || !plain) return;
  const std::string text = fmt::format("{:.{}f}", printed.value, printed.decimals);
  if (text.size() > 17) return;  // more digits than a double keeps
  const auto again = steelyard::parse_printed(text, {}, {});
  STEELYARD_FUZZ_CHECK(again.ok());
  STEELYARD_FUZZ_CHECK(again.value->value == printed.value);
  STEELYARD_FUZZ_CHECK(again.value->low == printed.low && again.value->high == printed.high);
}

}  // namespace

extern "C" int LLVMFuzzerTestOneInput(const std::uint8_t* data, std::size_t size) {
  const std::string_view text(reinterpret_cast<const char*>(data), size);
  for (const bool comma : {false, true}) {
    const auto outcome = steelyard::parse_printed(text, {comma}, {"f", 1, 1});
    steelyard::fuzz::check_outcome(outcome);
    if (!outcome.ok()) continue;
    steelyard::fuzz::check_number(*outcome.value);
    check_round_trip(*outcome.value);
  }
  return 0;
}
