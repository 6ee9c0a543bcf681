#include "run.hpp"

#include <fmt/format.h>

#include <algorithm>

#include "messages.hpp"
#include "steelyard/json.hpp"

namespace steelyard::cli {

Outputs::Outputs(std::span<const std::string> names, const std::string& input) {
  for (const std::string& name : names) {
    if (!name.empty() && name != "-" && input != "-" && same_file(name, input)) {
      say_error(fmt::format(
          "\"{}\" is the file that is read; writing there would destroy it. Give another name.", name));
      ok_ = false;
      files_.push_back(std::make_unique<OutputFile>(""));
      continue;
    }
    files_.push_back(std::make_unique<OutputFile>(name));
    standard_output_ = standard_output_ || name == "-";
    if (files_.back()->problem().empty()) continue;
    say_error(files_.back()->problem());
    ok_ = false;
  }
}

bool Outputs::commit() {
  const auto failed = [](const auto& file) { return !file->problem().empty(); };
  if (std::none_of(files_.begin(), files_.end(), failed)) {
    for (const auto& file : files_) file->commit();
  }
  for (const auto& file : files_) {
    if (!failed(file)) continue;
    say_error(file->problem());
    ok_ = false;
  }
  return ok_;
}

std::optional<std::string> input_text(const Options& options) {
  FileText file = read_file(options.file);
  if (file.problem.empty()) return std::move(file.text);
  say_error(file.problem);
  return std::nullopt;
}

namespace {

// A study that is given by options, as JSON input: the reader needs no second way in.
std::string cells_as_json(const Options& options) {
  std::string text = "[{";
  for (const auto& [column, value] : options.cells) {
    text += fmt::format("{}{}: {}", text.size() > 2 ? ", " : "", quoted_json(column), quoted_json(value));
  }
  return text + "}]";
}

// Places in the text made here would mislead.
void forget_places(std::vector<Diagnostic>& diagnostics) {
  for (Diagnostic& d : diagnostics) d.where = Place{"command line", 0, 0};
}

}  // namespace

RowsOrExit gathered_rows(const Options& options) {
  const bool from_options = !options.cells.empty();
  const auto text = from_options ? std::optional<std::string>(cells_as_json(options)) : input_text(options);
  if (!text) return {std::nullopt, Exit::file_trouble};
  const std::string name = from_options ? "command line" : options.file;
  auto table = read_table(*text, name);
  Outcome<Gathered> rows;
  if (table.ok()) {
    rows = gather(Input{name, sha256(*text), std::move(*table.value)}, options.analysis,
                  std::move(table.diagnostics));
  } else {
    rows.diagnostics = std::move(table.diagnostics);
  }
  if (rows.ok()) return {std::move(rows.value), Exit::done};
  if (from_options) forget_places(rows.diagnostics);
  say(rows.diagnostics);
  return {std::nullopt, from_options ? Exit::wrong_usage : Exit::unusable_data};
}

Exit finish(Outputs& outputs, const Options& options, const std::function<std::string()>& text, bool accurate,
            std::span<const Finding> findings) {
  if (!outputs.commit()) return Exit::file_trouble;
  if (!outputs.takes_standard_output()) {
    const Exit printed = print(text());
    if (printed != Exit::done) return printed;
  }
  if (!accurate) {
    say_error("The promised accuracy was not reached; the results say by how much it may be missed.");
    return Exit::not_satisfied;
  }
  return fails_on(options, findings) ? Exit::not_satisfied : Exit::done;
}

Exit print(std::string_view text) {
  const std::string problem = write_standard_output(text);
  if (problem.empty()) return Exit::done;
  say_error(problem);
  return Exit::file_trouble;
}

bool fails_on(const Options& options, std::span<const Finding> findings) {
  if (!options.fail_on) return false;
  return std::any_of(findings.begin(), findings.end(),
                     [&](const Finding& finding) { return finding.grade >= *options.fail_on; });
}

}  // namespace steelyard::cli
