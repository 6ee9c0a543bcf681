// The documents against their descriptions: every field of the schema is written, and nothing else.
#include <catch2/catch.hpp>

#include <nlohmann/json.hpp>
#include <string>

#include "steelyard/json.hpp"
#include "steelyard/render.hpp"

using nlohmann::json;
using namespace steelyard;

namespace {

const std::string studies =
    "study,year,n1,n2,t,p,sign\n"
    "\"A \"\"quoted\"\" one\",2001,20,22,2.10,,\n"
    "B,2004,30,30,,.04,\n"
    "C,2010,15,15,,n.s.,\n";

Analysis analysed(const std::string& text) {
  auto outcome = analyse_pool(text, "studies.csv");
  for (const Diagnostic& d : outcome.diagnostics) UNSCOPED_INFO(to_text(d));
  REQUIRE(outcome.ok());
  return std::move(*outcome.value);
}

// A small reader of the schemas that are written here: types, required, properties, items, $ref.
bool allows(const json& schema, const json& root, const json& value, std::string& where) {
  if (schema.contains("$ref")) {
    const std::string name = schema["$ref"].get<std::string>().substr(std::string("#/$defs/").size());
    return allows(root["$defs"][name], root, value, where);
  }
  if (schema.contains("anyOf")) {
    for (const json& one : schema["anyOf"]) {
      std::string ignored;
      if (allows(one, root, value, ignored)) return true;
    }
    return false;
  }
  const auto is = [&](const std::string& type) {
    return (type == "string" && value.is_string()) || (type == "number" && value.is_number()) ||
           (type == "integer" && value.is_number_integer()) || (type == "boolean" && value.is_boolean()) ||
           (type == "null" && value.is_null()) || (type == "array" && value.is_array()) ||
           (type == "object" && value.is_object());
  };
  const json& type = schema["type"];
  bool fits = type.is_string() && is(type);
  if (type.is_array()) {
    for (const json& one : type) fits = fits || is(one);
  }
  if (!fits) return false;
  if (schema.contains("enum")) {
    bool known = false;
    for (const json& one : schema["enum"]) known = known || one == value;
    if (!known) return false;
  }
  if (value.is_object() && schema.contains("properties")) {
    if (value.size() != schema["properties"].size()) return false;
    for (const auto& [name, member] : value.items()) {
      where += "." + name;
      if (!schema["properties"].contains(name)) return false;
      if (!allows(schema["properties"][name], root, member, where)) return false;
      where.resize(where.size() - name.size() - 1);
    }
  }
  if (value.is_array()) {
    for (const json& element : value) {
      if (!allows(schema["items"], root, element, where)) return false;
    }
  }
  return true;
}

}  // namespace

TEST_CASE("the result of pool is what its schema says", "[json]") {
  const json schema = json::parse(json_schema("pool"));
  const json result = json::parse(render_json(analysed(studies)));
  std::string where;
  INFO("at " << where);
  CHECK(allows(schema, schema, result, where));
}

TEST_CASE("the result of pool carries the input, the priors and both answers", "[json]") {
  const Analysis analysis = analysed(studies);
  const json result = json::parse(render_json(analysis));
  CHECK(result["steelyard"] == STEELYARD_VERSION);
  CHECK(result["command"] == "pool");
  CHECK(result["input"]["sha256"] == sha256(studies));
  CHECK(result["input"]["rows"].size() == 3);
  CHECK(result["input"]["rows"][0]["line"] == 2);
  CHECK(result["input"]["rows"][0]["cells"]["t"] == "2.10");
  CHECK(result["input"]["rows"][0]["cells"]["study"] == "A \"quoted\" one");
  CHECK_FALSE(result["input"]["rows"][0]["cells"].contains("p"));
  CHECK(result["priors"]["models"]["fixed_null"] == 0.25);
  CHECK(result["studies"][0]["t"] == 2.1);
  CHECK(result["studies"][0]["df"] == 40);
  CHECK(result["studies"][2]["t"].is_null());
  CHECK(result["studies"][2]["likelihood"] == "t_band");
  CHECK(result["studies"][2]["bands"].size() >= 1);
  CHECK(result["models"].size() == 4);
  CHECK(result["evidence"]["effect"]["log_bf"] == analysis.result.effect->log_bf);
  CHECK(result["pooled"]["effect"]["mean"] == *analysis.result.pooled_effect.mean);
}

TEST_CASE("with one study, heterogeneity is null", "[json]") {
  const json result = json::parse(render_json(analysed("study,n1,n2,t\nA,20,20,2.1\n")));
  CHECK(result["evidence"]["heterogeneity"].is_null());
  CHECK(result["evidence"]["effect_random"].is_null());
  CHECK(result["models"][2]["status"] == "not_identified");
  CHECK(result["models"][2]["log_marginal_likelihood"].is_null());
  const json schema = json::parse(json_schema("pool"));
  std::string where;
  CHECK(allows(schema, schema, result, where));
}

TEST_CASE("the result of check is what its schema says", "[json]") {
  const json schema = json::parse(json_schema("check"));
  auto outcome = analyse_check("study,n1,n2,t,p\nA,20,20,2.1,.003\nB,,,1.0,\n", "studies.csv");
  REQUIRE(outcome.ok());
  const json result = json::parse(render_json(*outcome.value));
  std::string where;
  CHECK(allows(schema, schema, result, where));
  CHECK(result["counts"]["not_rebuilt"] == 1);
  CHECK(result["problems"].size() >= 1);
  CHECK(result["findings"].size() >= 1);
}

TEST_CASE("bytes arrive in the same order whether as a string or in pieces", "[json]") {
  const Analysis analysis = analysed(studies);
  std::string pieces;
  write_json(analysis, [&pieces](std::string_view bytes) { pieces += bytes; });
  CHECK(pieces == render_json(analysis));
  CHECK(pieces.back() == '\n');
}

TEST_CASE("every document has a schema and a table of fields", "[json]") {
  for (const JsonDocument& document : json_documents()) {
    INFO(document.name);
    CHECK(json::parse(json_schema(document.name))["title"] == std::string(document.title));
    CHECK(json_fields(document.name).rfind("| field |", 0) == 0);
  }
  CHECK(json_schema("nothing").empty());
  CHECK(json_fields("nothing").empty());
}

