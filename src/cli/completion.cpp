// Completions for three shells.
#include <fmt/format.h>

#include <string>
#include <string_view>
#include <vector>

#include "manual.hpp"
#include "options.hpp"

namespace steelyard::cli {

namespace {

std::string joined(const std::vector<std::string_view>& words) {
  std::string text;
  for (const std::string_view word : words) {
    if (!text.empty()) text += ' ';
    text += word;
  }
  return text;
}

std::string command_names() {
  std::vector<std::string_view> names;
  for (const CommandInfo& command : command_table()) names.push_back(command.name);
  return joined(names);
}

std::string option_names(const CommandInfo& command) {
  std::vector<std::string_view> names;
  for (const OptionInfo* option : options_of(command.id)) names.push_back(option->name);
  const std::vector<std::string> columns = column_options(command.id);
  names.insert(names.end(), columns.begin(), columns.end());
  return joined(names) + " --help";
}

// The first sentence, for lists in which each entry has one line.
std::string first_sentence(std::string_view text) {
  const std::size_t end = text.find(". ");
  std::string sentence(text.substr(0, end));
  if (!sentence.empty() && sentence.back() == '.') sentence.pop_back();
  return sentence;
}

// Inside single quotes, for the shells where '' is no escape.
std::string in_single_quotes(std::string_view text, std::string_view escape) {
  std::string out = "'";
  for (const char c : text) {
    if (c == '\'') {
      out += escape;
    } else {
      out += c;
    }
  }
  return out + "'";
}

// In a specification of zsh's _arguments, these characters have a meaning of their own.
std::string zsh_text(std::string_view text) {
  std::string out;
  for (const char c : text) {
    if (c == '[' || c == ']' || c == ':' || c == '\\') out += '\\';
    out += c;
  }
  return out;
}

std::string bash_values() {
  std::string text;
  for (const OptionInfo& option : option_table()) {
    if (option.kind == ValueKind::choice) {
      text += fmt::format("    {}) COMPREPLY=($(compgen -W \"{}\" -- \"$current\")); return ;;\n",
                          option.name, joined(words_of(option.choices)));
    } else if (option.kind == ValueKind::file) {
      text +=
          fmt::format("    {}) compopt -o filenames; COMPREPLY=($(compgen -f -- \"$current\")); return ;;\n",
                      option.name);
    } else if (option.kind != ValueKind::none) {
      text += fmt::format("    {}) return ;;\n", option.name);
    }
  }
  return text;
}

std::string zsh_value(const OptionInfo& option) {
  if (option.kind == ValueKind::none) return "";
  const std::string name = zsh_text(option.value);
  if (option.kind == ValueKind::file) return fmt::format(":{}:_files", name);
  if (option.kind == ValueKind::choice)
    return fmt::format(":{}:({})", name, joined(words_of(option.choices)));
  return fmt::format(":{}: ", name);
}

std::string fish_value(const OptionInfo& option) {
  if (option.kind == ValueKind::none) return "";
  if (option.kind == ValueKind::file) return " -r -F";
  if (option.kind == ValueKind::choice) return fmt::format(" -x -a '{}'", joined(words_of(option.choices)));
  return " -x";
}

}  // namespace

std::string bash_completion() {
  std::string text =
      "# Completion of steelyard for bash.\n"
      "_steelyard() {\n"
      "  local current=\"${COMP_WORDS[COMP_CWORD]}\" previous=\"${COMP_WORDS[COMP_CWORD-1]}\"\n"
      "  COMPREPLY=()\n"
      "  if [ \"$COMP_CWORD\" -eq 1 ]; then\n";
  text +=
      fmt::format("    COMPREPLY=($(compgen -W \"{} --help --version\" -- \"$current\"))\n", command_names());
  text += "    return\n  fi\n  case \"$previous\" in\n" + bash_values() + "  esac\n";
  text += "  if [ \"${current:0:1}\" = - ]; then\n    case \"${COMP_WORDS[1]}\" in\n";
  for (const CommandInfo& command : command_table()) {
    text += fmt::format("    {}) COMPREPLY=($(compgen -W \"{}\" -- \"$current\")) ;;\n", command.name,
                        option_names(command));
  }
  text += "    esac\n    return\n  fi\n";
  text +=
      "  compopt -o filenames\n  COMPREPLY=($(compgen -f -- \"$current\"))\n}\ncomplete -F _steelyard "
      "steelyard\n";
  return text;
}

std::string zsh_completion() {
  std::string text =
      "#compdef steelyard\n"
      "# Completion of steelyard for zsh.\n"
      "_steelyard() {\n"
      "  local curcontext=\"$curcontext\" state line\n"
      "  typeset -A opt_args\n"
      "  local -a commands\n"
      "  commands=(\n";
  for (const CommandInfo& command : command_table()) {
    text += "    " + in_single_quotes(fmt::format("{}:{}", command.name, command.summary), "'\\''") + '\n';
  }
  text +=
      "  )\n"
      "  _arguments -C '(- *)--help[help]' '(- *)--version[version]' '1:command:->command' "
      "'*::argument:->argument'\n"
      "  case $state in\n"
      "    command) _describe -t commands 'command' commands ;;\n"
      "    argument)\n"
      "      case $words[1] in\n";
  for (const CommandInfo& command : command_table()) {
    text += fmt::format("        {})\n          _arguments \\\n", command.name);
    for (const OptionInfo* option : options_of(command.id)) {
      const std::string specification =
          fmt::format("{}{}{}[{}]{}", option->repeatable ? "*" : "", option->name,
                      option->kind == ValueKind::none ? "" : "=", zsh_text(first_sentence(option->meaning)),
                      zsh_value(*option));
      text += fmt::format("            {} \\\n", in_single_quotes(specification, "'\\''"));
    }
    text += "            '--help[help]' \\\n";
    text += command.kinds.empty() ? "            '1:file:_files' ;;\n"
                                  : fmt::format("            '1:kind:({})' '2:file:_files' ;;\n",
                                                joined(words_of(command.kinds)));
  }
  return text + "      esac ;;\n  esac\n}\n_steelyard \"$@\"\n";
}

std::string fish_completion() {
  std::string text = "# Completion of steelyard for fish.\n";
  for (const CommandInfo& command : command_table()) {
    text += fmt::format("complete -c steelyard -f -n __fish_use_subcommand -a {} -d {}\n", command.name,
                        in_single_quotes(command.summary, "\\'"));
  }
  text += "complete -c steelyard -n __fish_use_subcommand -l help -d 'help'\n";
  text += "complete -c steelyard -n __fish_use_subcommand -l version -d 'version'\n";
  for (const CommandInfo& command : command_table()) {
    const std::string seen =
        fmt::format("complete -c steelyard -n '__fish_seen_subcommand_from {}'", command.name);
    for (const OptionInfo* option : options_of(command.id)) {
      text += fmt::format("{} -l {}{} -d {}\n", seen, option->name.substr(2), fish_value(*option),
                          in_single_quotes(first_sentence(option->meaning), "\\'"));
    }
    if (!command.kinds.empty()) text += fmt::format("{} -a '{}'\n", seen, joined(words_of(command.kinds)));
    text += fmt::format("{} -l help -d 'help'\n", seen);
  }
  return text;
}

}  // namespace steelyard::cli
