// A description of fields as JSON Schema and as a Markdown table.
#include <string>
#include <utility>
#include <vector>

#include <fmt/format.h>

#include "render/json/fields.hpp"

namespace steelyard::json {

namespace {

const char* type_name(Shape::Kind kind) {
  switch (kind) {
    case Shape::Kind::text:
      return "string";
    case Shape::Kind::number:
      return "number";
    case Shape::Kind::integer:
      return "integer";
    case Shape::Kind::boolean:
      return "boolean";
    case Shape::Kind::array:
      return "array";
    case Shape::Kind::object:
    case Shape::Kind::map:
      return "object";
  }
  return "";
}

using Definitions = std::vector<std::pair<std::string, const Shape*>>;

void collect(const Shape& shape, Definitions& found) {
  if (shape.element) collect(*shape.element, found);
  for (const Member& member : shape.members) collect(member.shape, found);
  if (shape.name.empty()) return;
  for (const auto& [name, known] : found) {
    if (name == shape.name) return;
  }
  found.emplace_back(shape.name, &shape);
}

void put_shape(Writer& w, const Shape& shape);

void put_reference(Writer& w, const Shape& shape) {
  const std::string target = "#/$defs/" + shape.name;
  if (!shape.nullable) {
    w.key("$ref");
    w.text(target);
    return;
  }
  w.key("anyOf");
  w.begin_array();
  w.begin_object();
  w.key("$ref");
  w.text(target);
  w.end_object();
  w.begin_object();
  w.key("type");
  w.text("null");
  w.end_object();
  w.end_array();
}

void put_type(Writer& w, const Shape& shape) {
  w.key("type");
  if (!shape.nullable) return w.text(type_name(shape.kind));
  w.begin_array();
  w.text(type_name(shape.kind));
  w.text("null");
  w.end_array();
}

void put_members(Writer& w, const Shape& shape) {
  w.key("required");
  w.begin_array();
  for (const Member& member : shape.members) w.text(member.name);
  w.end_array();
  w.key("additionalProperties");
  w.boolean(false);
  w.key("properties");
  w.begin_object();
  for (const Member& member : shape.members) {
    w.key(member.name);
    w.begin_object();
    w.key("description");
    w.text(member.meaning);
    put_shape(w, member.shape);
    w.end_object();
  }
  w.end_object();
}

void put_choices(Writer& w, const Shape& shape) {
  if (shape.choices.empty()) return;
  w.key("enum");
  w.begin_array();
  for (const std::string& choice : shape.choices) w.text(choice);
  if (shape.nullable) w.null();
  w.end_array();
}

void put_body(Writer& w, const Shape& shape) {
  put_type(w, shape);
  put_choices(w, shape);
  if (shape.kind == Shape::Kind::integer) {
    w.key("minimum");
    w.integer(0);
  }
  if (shape.kind == Shape::Kind::object) put_members(w, shape);
  if (shape.element) {
    w.key(shape.kind == Shape::Kind::array ? "items" : "additionalProperties");
    w.begin_object();
    put_shape(w, *shape.element);
    w.end_object();
  }
}

void put_shape(Writer& w, const Shape& shape) {
  if (shape.name.empty()) {
    put_body(w, shape);
  } else {
    put_reference(w, shape);
  }
}

std::string type_in_words(const Shape& shape) {
  std::string words = type_name(shape.kind);
  if (!shape.choices.empty()) {
    words.clear();
    for (const std::string& choice : shape.choices) {
      if (!words.empty()) words += ", ";
      words += fmt::format("`{}`", choice);
    }
  }
  if (shape.kind == Shape::Kind::array) words = fmt::format("array of {}", type_in_words(*shape.element));
  return shape.nullable ? words + " or null" : words;
}

// An object that occurs again (a summary, a Bayes factor) is spelled out the first time only.
void put_rows(std::string& out, const Shape& shape, const std::string& prefix,
              std::vector<std::string>& seen) {
  const Shape* inner = &shape;
  while (inner->element && inner->kind == Shape::Kind::array) inner = inner->element.get();
  for (const std::string& name : seen) {
    if (!inner->name.empty() && name == inner->name) return;
  }
  if (!inner->name.empty()) seen.push_back(inner->name);
  for (const Member& member : inner->members) {
    const std::string path = prefix + std::string(member.name);
    const bool repeated = member.shape.kind == Shape::Kind::array;
    out += fmt::format("| `{}{}` | {} | {} |\n", path, repeated ? "[]" : "", type_in_words(member.shape),
                       member.meaning);
    put_rows(out, member.shape, path + (repeated ? "[]." : "."), seen);
  }
}

}  // namespace

std::string schema(const Shape& shape, std::string_view title, std::string_view id) {
  std::string out;
  const Sink sink = [&out](std::string_view bytes) { out += bytes; };
  Writer w(sink, 5);
  w.begin_object();
  w.key("$schema");
  w.text("https://json-schema.org/draft/2020-12/schema");
  w.key("$id");
  w.text(id);
  w.key("title");
  w.text(title);
  put_body(w, shape);
  Definitions definitions;
  for (const Member& member : shape.members) collect(member.shape, definitions);
  if (shape.element) collect(*shape.element, definitions);
  w.key("$defs");
  w.begin_object();
  for (const auto& [name, definition] : definitions) {
    w.key(name);
    w.begin_object();
    Shape plain = *definition;
    plain.nullable = false;
    put_body(w, plain);
    w.end_object();
  }
  w.end_object();
  w.end_object();
  w.finish();
  return out;
}

std::string fields_table(const Shape& shape) {
  std::string out = "| field | type | meaning |\n|---|---|---|\n";
  std::vector<std::string> seen;
  put_rows(out, shape, "", seen);
  return out;
}

}  // namespace steelyard::json
