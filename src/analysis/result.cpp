// The JSON of `pool` back into what it takes to repeat the run.
#include <fmt/format.h>

#include <array>
#include <nlohmann/json.hpp>
#include <string>
#include <utility>

#include "steelyard/analysis.hpp"
#include "steelyard/json.hpp"

namespace steelyard {

namespace {

using nlohmann::json;

Diagnostic problem(const std::string& file, const char* code, std::string what, std::string remedy) {
  Diagnostic d;
  d.code = code;
  d.where.file = file;
  d.what = std::move(what);
  d.remedy = std::move(remedy);
  return d;
}

constexpr const char* expected = "Give a file that steelyard pool --json wrote.";

// Everything but the long lists, which read_json takes: a result of 100,000 studies stays small here.
json parse_head(std::string_view text) {
  const auto keep = [](int depth, json::parse_event_t event, json& parsed) {
    if (event != json::parse_event_t::key) return true;
    const bool list = (depth == 1 && (parsed == "studies" || parsed == "models" || parsed == "cautions")) ||
                      (depth == 2 && parsed == "rows");
    return !list;
  };
  return json::parse(text, keep, false);
}

// The text at a place, or "" when there is none.
std::string text_at(const json& from, const char* group, const char* name) {
  const auto object = from.find(group);
  if (object == from.end() || !object->is_object()) return "";
  const auto value = object->find(name);
  return value != object->end() && value->is_string() ? value->get<std::string>() : "";
}

std::optional<double> number_at(const json& object, const char* name) {
  if (!object.is_object()) return std::nullopt;
  const auto value = object.find(name);
  return value != object.end() && value->is_number() ? std::optional<double>(value->get<double>())
                                                     : std::nullopt;
}

json object_at(const json& from, const char* name) {
  const auto value = from.find(name);
  return value != from.end() && value->is_object() ? *value : json::object();
}

std::optional<Diagnostic> wrong_kind(const json& head, const std::string& file) {
  if (!head.is_object() || !head.contains("steelyard")) {
    return problem(file, "result-kind", "This is not a result of steelyard.", expected);
  }
  if (head.value("command", json()) != "pool") {
    return problem(file, "result-kind",
                   "This result was not written by steelyard pool, so it can't be repeated.", expected);
  }
  const auto version = number_at(head, "schema");
  if (!version || *version > json_schema_version) {
    return problem(file, "result-version", "This result was written by a newer steelyard.",
                   "Repeat it with that version or a later one.");
  }
  return std::nullopt;
}

void read_priors(const json& head, const std::string& file, AnalysisOptions& options,
                 std::vector<Diagnostic>& problems) {
  const auto take = [&](auto&& outcome, auto& target) {
    for (Diagnostic& d : outcome.diagnostics) {
      d.where.file = file;
      if (d.severity == Severity::error) problems.push_back(std::move(d));
    }
    if (outcome.ok()) target = *outcome.value;
  };
  take(parse_effect_prior(text_at(head, "priors", "effect")), options.priors.effect);
  take(parse_spread_prior(text_at(head, "priors", "spread")), options.priors.spread);
  const std::string direction = text_at(head, "priors", "direction");
  for (const Direction one : {Direction::either, Direction::greater, Direction::less}) {
    if (direction == to_text(one)) options.priors.effect.direction = one;
  }
  const json models = object_at(object_at(head, "priors"), "models");
  for (std::size_t i = 0; i < model_count; ++i) {
    const std::string name(id(static_cast<Model>(i)));
    const auto weight = number_at(models, name.c_str());
    if (!weight) {
      problems.push_back(problem(file, "result-incomplete",
                                 fmt::format("The prior probability of {} is missing in this result.", name),
                                 expected));
      continue;
    }
    options.priors.model[i] = *weight;
  }
}

void read_options(const json& head, AnalysisOptions& options) {
  const json recorded = object_at(head, "options");
  options.pool.level = number_at(recorded, "level").value_or(options.pool.level);
  options.rebuild.alpha = number_at(recorded, "alpha").value_or(options.rebuild.alpha);
  options.explicit_priors = recorded.value("explicit_priors", json()) == true;
  for (const json& label : recorded.value("without", json::array())) {
    if (label.is_string()) options.without.push_back(label.get<std::string>());
  }
}

}  // namespace

Outcome<RecordedRun> read_result(std::string_view text, const std::string& file) {
  const json head = parse_head(text);
  if (auto wrong = wrong_kind(head, file)) return {std::nullopt, {std::move(*wrong)}};
  auto table = read_json(text, file);
  Outcome<RecordedRun> outcome;
  if (!table.ok()) {
    outcome.diagnostics = std::move(table.diagnostics);
    return outcome;
  }
  RecordedRun run;
  run.input.file = text_at(head, "input", "file");
  run.input.sha256 = text_at(head, "input", "sha256");
  run.input.table = std::move(*table.value);
  run.input.table.file = run.input.file;
  read_priors(head, file, run.options, outcome.diagnostics);
  read_options(head, run.options);
  if (outcome.diagnostics.empty()) outcome.value = std::move(run);
  return outcome;
}

}  // namespace steelyard
