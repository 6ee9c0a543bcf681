#include "help.hpp"

#include <fmt/format.h>
#include <array>

#include "options.hpp"

namespace steelyard::cli {

namespace {

constexpr std::array meanings = {
    ExitMeaning{Exit::done, "done"},
    ExitMeaning{Exit::unusable_data, "the data can't be used; the messages say where and what to do"},
    ExitMeaning{Exit::wrong_usage, "the command line is wrong"},
    ExitMeaning{Exit::file_trouble, "a file can't be read or written"},
    ExitMeaning{Exit::not_satisfied, "computed, but the accuracy was not reached or --fail-on was hit"},
};

constexpr std::string_view about =
    "Steelyard weighs the evidence that papers print. It reads what publications report (a t value, group "
    "sizes, means "
    "and SDs, a confidence interval, a p value) and says how strongly it speaks, taken together, for an "
    "effect, for no "
    "effect, or for an effect that varies from study to study.";

constexpr std::string_view file_meaning =
    "Table of studies, one row a study, as CSV or JSON; - reads standard input. docs/formats.md describes "
    "the columns.";

std::string option_help(const OptionInfo& option, std::size_t width) {
  return fmt::format("  {}{}{}{}{}\n", option.brief, option.brief.empty() ? "" : ", ", option.name,
                     option.value.empty() ? "" : " ", option.value) +
         wrapped(option_meaning(option), 6, width);
}

std::string exit_help(std::size_t width) {
  std::string text = "Exit status:\n";
  for (const ExitMeaning& one : meanings) {
    text += wrapped(fmt::format("{}  {}", static_cast<int>(one.exit), one.meaning), 2, width);
  }
  return text;
}

}  // namespace

std::string_view about_text() { return about; }
std::string_view file_text() { return file_meaning; }

std::string_view column_text() {
  return "Any column of docs/formats.md (--t, --n1, --mean1, ...): one study without a file.";
}

std::string kind_text(const CommandInfo& command) {
  std::string text = "One of ";
  const auto kinds = words_of(command.kinds);
  for (std::size_t i = 0; i < kinds.size(); ++i) {
    if (i > 0) text += i + 1 == kinds.size() ? " or " : ", ";
    text += kinds[i];
  }
  return text + '.';
}

std::string option_meaning(const OptionInfo& option, bool with_default) {
  std::string meaning(option.meaning);
  const auto words = words_of(option.choices);
  for (std::size_t i = 0; i < words.size(); ++i) {
    meaning += i == 0 ? " One of " : i + 1 == words.size() ? " or " : ", ";
    meaning += words[i];
  }
  if (!words.empty()) meaning += '.';
  if (with_default && !option.fallback.empty()) meaning += fmt::format(" Default: {}.", option.fallback);
  return meaning;
}

std::span<const ExitMeaning> exit_meanings() { return meanings; }

std::string wrapped(std::string_view text, std::size_t indent, std::size_t width) {
  const std::size_t room = width > indent + 20 ? width - indent : 20;
  std::string out;
  while (!text.empty()) {
    std::size_t end = text.size();
    if (end > room) {
      end = text.rfind(' ', room);
      if (end == std::string_view::npos || end == 0) end = text.find(' ', room);
      if (end == std::string_view::npos) end = text.size();
    }
    out.append(indent, ' ');
    out += text.substr(0, end);
    out += '\n';
    text.remove_prefix(end);
    while (!text.empty() && text.front() == ' ') text.remove_prefix(1);
  }
  return out;
}

std::string general_help(std::size_t width) {
  std::string text = wrapped(about, 0, width) + "\nUsage: steelyard COMMAND [FILE] [OPTIONS]\n\nCommands:\n";
  for (const CommandInfo& command : command_table()) {
    text += wrapped(fmt::format("{:<10}{}", command.name, command.summary), 2, width);
  }
  text += "\nOptions:\n";
  text += wrapped("--help     this text, or with a command the command's own", 2, width);
  text += wrapped("--version  the version", 2, width);
  text += "\nExamples:\n";
  for (const CommandInfo& command : command_table()) {
    text += fmt::format("  {}\n", command.examples.front().line);
    text += wrapped(command.examples.front().purpose, 6, width);
  }
  return text + '\n' + exit_help(width) +
         wrapped("\nResults go to standard output, everything else to standard error.", 0, width);
}

std::string command_help(const CommandInfo& command, std::size_t width) {
  std::string text = wrapped(fmt::format("steelyard {}: {}", command.name, command.summary), 0, width) +
                     fmt::format("\nUsage: steelyard {} {}[FILE] [OPTIONS]\n\n", command.name,
                                 command.kinds.empty() ? "" : "KIND ");
  text += wrapped(command.description, 0, width);
  if (!command.kinds.empty()) text += "\n  KIND\n" + wrapped(kind_text(command), 6, width);
  text += "\n  FILE\n" + wrapped(file_meaning, 6, width) + "\nOptions:\n";
  for (const OptionInfo* option : options_of(command.id)) text += option_help(*option, width);
  if (!column_options(command.id).empty()) text += "  --COLUMN VALUE\n" + wrapped(column_text(), 6, width);
  text += "  --help\n      This text.\n\nExamples:\n";
  for (const Example& example : command.examples) {
    text += fmt::format("  {}\n", example.line);
    text += wrapped(example.purpose, 6, width);
  }
  return text + '\n' + exit_help(width);
}

}  // namespace steelyard::cli
