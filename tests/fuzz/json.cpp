// Any bytes as a JSON file; what we take, an independent parser must take too.
#include <algorithm>
#include <cstddef>
#include <cstdint>
#include <string_view>

#include <nlohmann/json.hpp>

#include "fuzz/table_check.hpp"

namespace {

enum class Verdict { json, not_json, unknown };

// The other parser stops at numbers beyond a double; to us they are texts, which a label may hold.
Verdict other_parser(std::string_view text) {
  try {
    return nlohmann::json::parse(text).is_discarded() ? Verdict::not_json : Verdict::json;
  } catch (const nlohmann::json::out_of_range&) {
    return Verdict::unknown;
  } catch (const nlohmann::json::exception&) {
    return Verdict::not_json;
  }
}

bool is_syntax(const steelyard::Diagnostic& diagnostic) { return diagnostic.code == "json-syntax"; }

}  // namespace

extern "C" int LLVMFuzzerTestOneInput(const std::uint8_t* data, std::size_t size) {
  const std::string_view text(reinterpret_cast<const char*>(data), size);
  const steelyard::Outcome<steelyard::Table> outcome = steelyard::read_json(text, "f");
  steelyard::fuzz::check_table(outcome);
  const auto& said = outcome.diagnostics;
  if (outcome.ok()) {
    STEELYARD_FUZZ_CHECK(other_parser(text) != Verdict::not_json);
    steelyard::fuzz::check_round_trip(*outcome.value);
  } else if (std::any_of(said.begin(), said.end(), is_syntax)) {
    // Anything but an object or an array at the top is JSON, but no table.
    const std::size_t first = text.find_first_not_of(" \t\r\n\xEF\xBB\xBF");
    const bool container = first != std::string_view::npos && (text[first] == '[' || text[first] == '{');
    STEELYARD_FUZZ_CHECK(!container || other_parser(text) != Verdict::json);
  }
  return 0;
}
