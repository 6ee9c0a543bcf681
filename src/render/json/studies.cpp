// The form of JSON input, from the table of columns: an array of objects, or {"studies": [...]}.
#include <fmt/format.h>

#include <string>

#include "render/json/documents.hpp"
#include "steelyard/base.hpp"

namespace steelyard::json {

namespace {

void put_pair(Writer& w, std::string_view key, std::string_view value) {
  w.key(key);
  w.text(value);
}

// A number may be written as text too ("2.10", "<.05", "n.s."), and a label may be a number.
void put_types(Writer& w) {
  w.key("type");
  w.begin_array();
  w.text("string");
  w.text("number");
  w.text("null");
  w.end_array();
}

void put_columns(Writer& w) {
  for (const Column& column : columns()) {
    w.key(column.name);
    w.begin_object();
    put_pair(w, "description", column.meaning);
    put_types(w);
    w.end_object();
  }
}

void put_reference(Writer& w) {
  w.key("items");
  w.begin_object();
  put_pair(w, "$ref", "#/$defs/study");
  w.end_object();
}

std::string kind_in_words(const Column& column) {
  switch (column.kind) {
    case ColumnKind::text:
      return "text";
    case ColumnKind::number:
      return "number as printed";
    case ColumnKind::count:
      return "whole number";
    case ColumnKind::choice:
      break;
  }
  std::string words;
  for (std::string_view rest = column.choices; !rest.empty();) {
    const std::size_t bar = rest.find('|');
    words += fmt::format("{}`{}`", words.empty() ? "" : ", ", rest.substr(0, bar));
    rest.remove_prefix(bar == std::string_view::npos ? rest.size() : bar + 1);
  }
  return words;
}

}  // namespace

std::string studies_schema(std::string_view title, std::string_view id) {
  std::string out;
  const Sink sink = [&out](std::string_view bytes) { out += bytes; };
  Writer w(sink, 4);
  w.begin_object();
  put_pair(w, "$schema", "https://json-schema.org/draft/2020-12/schema");
  put_pair(w, "$id", id);
  put_pair(w, "title", title);
  w.key("oneOf");
  w.begin_array();
  w.begin_object();
  put_pair(w, "type", "array");
  put_reference(w);
  w.end_object();
  w.begin_object();
  put_pair(w, "type", "object");
  w.key("required");
  w.begin_array();
  w.text("studies");
  w.end_array();
  w.key("properties");
  w.begin_object();
  w.key("studies");
  w.begin_object();
  put_pair(w, "type", "array");
  put_reference(w);
  w.end_object();
  w.end_object();
  w.end_object();
  w.end_array();
  w.key("$defs");
  w.begin_object();
  w.key("study");
  w.begin_object();
  put_pair(w, "description", "One study; other keys are kept as labels");
  put_pair(w, "type", "object");
  w.key("properties");
  w.begin_object();
  put_columns(w);
  w.end_object();
  w.end_object();
  w.end_object();
  w.end_object();
  w.finish();
  return out;
}

std::string studies_fields() {
  std::string text = "| field | type | meaning |\n|---|---|---|\n";
  for (const Column& column : columns()) {
    const std::string unit = column.unit.empty() ? "" : fmt::format(" ({})", column.unit);
    text += fmt::format("| `{}` | {} | {}{} |\n", column.name, kind_in_words(column), column.meaning, unit);
  }
  return text;
}

}  // namespace steelyard::json
