#include "manual.hpp"

#include <fmt/format.h>

#include <string_view>

#include "help.hpp"
#include "options.hpp"
#include "steelyard/version.hpp"

namespace steelyard::cli {

namespace {

// Text in roff: hyphens that can be copied, backslashes, and no line that looks like a request.
std::string roff(std::string_view text) {
  std::string out;
  if (!text.empty() && (text.front() == '.' || text.front() == '\'')) out += "\\&";
  for (const char c : text) {
    if (c == '-') {
      out += "\\-";
    } else if (c == '\\') {
      out += "\\e";
    } else {
      out += c;
    }
  }
  return out;
}

std::string upper(std::string_view text) {
  std::string out(text);
  for (char& c : out) c = c >= 'a' && c <= 'z' ? static_cast<char>(c - 'a' + 'A') : c;
  return out;
}

std::string title(std::string_view name, std::string_view summary) {
  return fmt::format(".TH {} 1 \"\" \"steelyard {}\" \"User Commands\"\n.SH NAME\n{} \\- {}\n",
                     upper(roff(name)), STEELYARD_VERSION, roff(name), roff(summary));
}

std::string exit_status() {
  std::string text = ".SH EXIT STATUS\n";
  for (const ExitMeaning& one : exit_meanings()) {
    text += fmt::format(".TP\n.B {}\n{}\n", static_cast<int>(one.exit), roff(one.meaning));
  }
  return text;
}

std::string examples(const CommandInfo& command) {
  std::string text;
  for (const Example& example : command.examples) {
    text += fmt::format(".TP\n.B {}\n{}\n", roff(example.line), roff(example.purpose));
  }
  return text;
}

std::string option_entry(const OptionInfo& option) {
  std::string text = fmt::format(".TP\n.B {}{}\n{}\n", roff(option.name),
                                 option.value.empty() ? "" : fmt::format(" \\fI{}\\fR", roff(option.value)),
                                 roff(option_meaning(option)));
  return text;
}

std::string other_pages(const CommandInfo* self) {
  std::string text = ".SH SEE ALSO\n";
  text += self == nullptr ? "" : ".BR steelyard (1)";
  for (const CommandInfo& command : command_table()) {
    if (&command == self) continue;
    if (text.back() != '\n') text += ",\n";
    text += fmt::format(".BR steelyard\\-{} (1)", command.name);
  }
  return text + '\n';
}

}  // namespace

std::string manual() {
  std::string text = title("steelyard", "weigh the evidence that papers print");
  text += ".SH SYNOPSIS\n.B steelyard\n.I COMMAND\n.RI [ FILE ]\n.RI [ OPTIONS ]\n";
  text += fmt::format(".SH DESCRIPTION\n{}\n.SH COMMANDS\n", roff(about_text()));
  for (const CommandInfo& command : command_table()) {
    text += fmt::format(".TP\n.B {}\n{}\n", command.name, roff(command.summary));
  }
  text += ".SH OPTIONS\n.TP\n.B \\-\\-help\nHelp; after a command, the command's own.\n";
  text += ".TP\n.B \\-\\-version\nThe version.\n.SH EXAMPLES\n";
  for (const CommandInfo& command : command_table()) text += examples(command);
  return text + exit_status() + other_pages(nullptr);
}

std::string manual(const CommandInfo& command) {
  std::string text = title(fmt::format("steelyard-{}", command.name), command.summary);
  text += fmt::format(".SH SYNOPSIS\n.B steelyard {}\n{}.RI [ FILE ]\n.RI [ OPTIONS ]\n", command.name,
                      command.kinds.empty() ? "" : ".I KIND\n");
  text += fmt::format(".SH DESCRIPTION\n{}\n", roff(command.description));
  if (!command.kinds.empty()) text += fmt::format(".TP\n.I KIND\n{}\n", roff(kind_text(command)));
  text += fmt::format(".TP\n.I FILE\n{}\n.SH OPTIONS\n", roff(file_text()));
  for (const OptionInfo* option : options_of(command.id)) text += option_entry(*option);
  if (!column_options(command.id).empty()) {
    text += fmt::format(".TP\n.B \\-\\-\\fICOLUMN\\fR \\fIVALUE\\fR\n{}\n", roff(column_text()));
  }
  text += ".TP\n.B \\-\\-help\nHelp for this command.\n.SH EXAMPLES\n" + examples(command);
  return text + exit_status() + other_pages(&command);
}

std::string markdown_reference() {
  std::string text;
  for (const CommandInfo& command : command_table()) {
    text += fmt::format("### `steelyard {}`\n\n{}\n\n| option | meaning | default |\n|---|---|---|\n",
                        command.name, command.description);
    for (const OptionInfo* option : options_of(command.id)) {
      std::string meaning = option_meaning(*option, false);
      for (std::size_t at = 0; (at = meaning.find('|', at)) != std::string::npos; at += 2)
        meaning.insert(at, "\\");
      text += fmt::format("| `{}{}{}` | {} | {} |\n", option->name, option->value.empty() ? "" : " ",
                          option->value, meaning,
                          option->fallback.empty() ? "" : fmt::format("{}", option->fallback));
    }
    if (!column_options(command.id).empty())
      text += fmt::format("| `--COLUMN VALUE` | {} | |\n", column_text());
    text += "\nExamples:\n\n```\n";
    for (const Example& example : command.examples)
      text += fmt::format("# {}\n{}\n", example.purpose, example.line);
    text += "```\n\n";
  }
  text += "### Exit status\n\n| status | meaning |\n|---|---|\n";
  for (const ExitMeaning& one : exit_meanings()) {
    text += fmt::format("| {} | {} |\n", static_cast<int>(one.exit), one.meaning);
  }
  return text;
}

}  // namespace steelyard::cli
