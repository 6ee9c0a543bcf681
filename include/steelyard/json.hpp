// Room "render": results as JSON. One description of the fields gives the bytes, the JSON Schema and
// the table in docs/json.md, so that they can't drift apart.
#pragma once

#include <cstddef>
#include <functional>
#include <span>
#include <string>
#include <string_view>

#include "steelyard/analysis.hpp"

namespace steelyard {

/// The version of the fields; grows when a field changes its meaning or goes away.
inline constexpr int json_schema_version = 1;

/// Takes bytes in the order in which they are made, in pieces of any length.
using Sink = std::function<void(std::string_view)>;

/// Writes one JSON object and a newline. Numbers are the shortest text that reads back to the same
/// double; what is not finite or not known is null; logarithms are natural.
void write_json(const Analysis& analysis, const Sink& sink);
void write_json(const Check& check, const Sink& sink);
void write_json(const WeighAnalysis& analysis, const Sink& sink);
void write_json(const StressAnalysis& analysis, const Sink& sink);
void write_json(const ReplicateAnalysis& analysis, const Sink& sink);

/// The same as one string.
[[nodiscard]] std::string render_json(const Check& check);

/// A JSON string with its quotes; invalid UTF-8 becomes U+FFFD.
[[nodiscard]] std::string quoted_json(std::string_view text);

/// A kind of document that Steelyard writes or reads.
struct JsonDocument {
  std::string_view name;   ///< of the command, or "studies" for input
  std::string_view title;  ///< one line
};
[[nodiscard]] std::span<const JsonDocument> json_documents();

/// JSON Schema (draft 2020-12) of a document; "" when there is no such document.
[[nodiscard]] std::string json_schema(std::string_view document);

/// Its fields as a Markdown table; "" when there is no such document.
[[nodiscard]] std::string json_fields(std::string_view document);

}  // namespace steelyard
