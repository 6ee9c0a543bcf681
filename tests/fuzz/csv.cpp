// Any bytes as a CSV file.
#include <algorithm>
#include <cstddef>
#include <cstdint>
#include <string_view>

#include "fuzz/table_check.hpp"

extern "C" int LLVMFuzzerTestOneInput(const std::uint8_t* data, std::size_t size) {
  const std::string_view text(reinterpret_cast<const char*>(data), size);
  const steelyard::Outcome<steelyard::Table> outcome = steelyard::read_csv(text, "f");
  steelyard::fuzz::check_table(outcome);
  if (outcome.ok()) steelyard::fuzz::check_round_trip(*outcome.value);
  return 0;
}
