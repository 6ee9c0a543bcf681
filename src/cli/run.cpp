#include "run.hpp"

#include <fmt/format.h>

#include <algorithm>

#include "messages.hpp"

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
