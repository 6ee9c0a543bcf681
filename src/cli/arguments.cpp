// The only file that sees CLI11. It splits the command line; meaning and messages come from the
// tables of commands and options.
#include "arguments.hpp"

#include <fmt/format.h>
#include <unistd.h>
#include <CLI/CLI.hpp>

#include <algorithm>
#include <string>
#include <utility>

namespace steelyard::cli {

namespace {

constexpr std::string_view help_name = "--help";

bool asks_for_help(const std::string& word) { return word == "--help" || word == "-h"; }
bool asks_for_version(const std::string& word) { return word == "--version" || word == "-V"; }

std::string unknown_command(const std::string& word) {
  std::vector<std::string_view> names;
  for (const CommandInfo& command : command_table()) names.push_back(command.name);
  const std::string_view near = nearest_word(word, names);
  if (!near.empty()) return fmt::format("There is no command \"{}\". Did you mean \"{}\"?", word, near);
  return fmt::format("There is no command \"{}\". steelyard --help lists the commands.", word);
}

std::string unknown_option(const CommandInfo& command, const std::string& word) {
  const std::string name = word.substr(0, word.find('='));
  std::vector<std::string_view> names = {help_name};
  for (const OptionInfo* option : options_of(command.id)) names.push_back(option->name);
  const std::vector<std::string> columns = column_options(command.id);
  names.insert(names.end(), columns.begin(), columns.end());
  const std::string_view near = nearest_word(name, names);
  if (!near.empty()) {
    return fmt::format("steelyard {} has no option \"{}\". Did you mean \"{}\"?", command.name, name, near);
  }
  for (const OptionInfo& option : option_table()) {
    if (option.name != name) continue;
    return fmt::format(
        "steelyard {} has no option \"{}\"; it belongs to other commands. See steelyard {} --help.",
        command.name, name, command.name);
  }
  return fmt::format("steelyard {} has no option \"{}\". steelyard {} --help lists those it has.",
                     command.name, name, command.name);
}

std::string value_missing(const std::string& name, std::string_view value) {
  return fmt::format("{} needs a value: {} {}.", name, name, value);
}

// What CLI11 knows of one option; of a column's option, `info` is null.
struct Bound {
  const OptionInfo* info;
  std::string name;
  CLI::Option* option;
};

std::vector<Bound> bind(CLI::App& app, Command command) {
  std::vector<Bound> bound;
  const auto add = [&](const OptionInfo* info, const std::string& name, bool takes_value) {
    const std::string names =
        info == nullptr || info->brief.empty() ? name : fmt::format("{},{}", info->brief, name);
    CLI::Option* option = takes_value ? app.add_option(names) : app.add_flag(names);
    if (takes_value) option->expected(1)->allow_extra_args(false);
    option->multi_option_policy(CLI::MultiOptionPolicy::TakeAll);
    bound.push_back({info, name, option});
  };
  for (const OptionInfo* info : options_of(command))
    add(info, std::string(info->name), info->kind != ValueKind::none);
  for (const std::string& name : column_options(command)) add(nullptr, name, true);
  return bound;
}

// The option at the very end whose value is missing, or null. CLI11's own message would not say
// what the value is.
const Bound* lacks_value(const std::vector<Bound>& bound, const std::vector<std::string>& words) {
  for (std::size_t i = 0; i < words.size(); ++i) {
    if (words[i] == "--") return nullptr;
    const auto is_this = [&](const Bound& b) {
      const bool named =
          b.name == words[i] || (b.info != nullptr && !b.info->brief.empty() && b.info->brief == words[i]);
      return named && (b.info == nullptr || b.info->kind != ValueKind::none);
    };
    const auto found = std::find_if(bound.begin(), bound.end(), is_this);
    if (found == bound.end()) continue;
    ++i;  // the value, whatever it looks like
    if (i == words.size()) return &*found;
  }
  return nullptr;
}

void apply(const Bound& bound, Request& request) {
  const auto values = bound.option->results();
  if (values.size() > 1 && (bound.info == nullptr || !bound.info->repeatable)) {
    request.problems.push_back(fmt::format("{} is given {} times. Give it once.", bound.name, values.size()));
    return;
  }
  for (const std::string& value : values) {
    if (bound.info == nullptr) {
      request.options.cells.emplace_back(bound.name.substr(2), value);
      continue;
    }
    request.options.given.emplace_back(bound.info, value);
    const std::string wrong = bound.info->apply(request.options, value);
    if (!wrong.empty()) request.problems.push_back(fmt::format("{}: {}", bound.name, wrong));
  }
}

void take_file(const std::vector<std::string>& words, Request& request) {
  if (request.options.from_result) {
    if (!words.empty()) {
      request.problems.push_back(fmt::format(
          "--from names what is read, so \"{}\" is one file too many. Leave one of them away.", words[0]));
    }
    return;
  }
  if (words.size() > 1) {
    request.problems.push_back(
        fmt::format("Only one file can be read at a time, but \"{}\" and \"{}\" are given. Put a value with "
                    "blanks in quotes.",
                    words[0], words[1]));
  }
  if (!request.options.cells.empty()) {
    if (!words.empty()) {
      request.problems.push_back(fmt::format(
          "A study is given by options, so the file \"{}\" is too much. Leave one of them away.", words[0]));
    }
    return;
  }
  if (!words.empty()) {
    request.options.file = words[0];
  } else if (isatty(STDIN_FILENO) == 0) {
    request.options.file = "-";
  } else {
    request.problems.emplace_back("No file is given. Give the name of a file, or - for standard input.");
  }
}

// The first word of a command that has kinds names one.
void take_kind(const CommandInfo& command, std::vector<std::string>& words, Request& request) {
  if (command.kinds.empty()) return;
  const auto kinds = words_of(command.kinds);
  std::string list;
  for (const std::string_view kind : kinds) list += fmt::format("{}{}", list.empty() ? "" : ", ", kind);
  if (words.empty()) {
    request.problems.push_back(
        fmt::format("steelyard {} needs a kind before the file: {}.", command.name, list));
    return;
  }
  if (std::find(kinds.begin(), kinds.end(), words.front()) == kinds.end()) {
    const std::string_view near = nearest_word(words.front(), kinds);
    request.problems.push_back(fmt::format(
        "\"{}\" is not a kind that steelyard {} knows. {}", words.front(), command.name,
        near.empty() ? fmt::format("It knows {}.", list) : fmt::format("Did you mean \"{}\"?", near)));
    return;
  }
  request.options.kind = words.front();
  words.erase(words.begin());
}

// Words that CLI11 could not place: unknown options, and files.
void sort_rest(const CommandInfo& command, const std::vector<std::string>& rest, Request& request) {
  std::vector<std::string> files;
  bool only_files = false;
  for (const std::string& word : rest) {
    if (word == "--" && !only_files) {
      only_files = true;
    } else if (!only_files && word.size() > 1 && word[0] == '-') {
      request.problems.push_back(unknown_option(command, word));
    } else {
      files.push_back(word);
    }
  }
  // After an unknown option, a word may be its value: the one problem is enough.
  if (request.problems.empty()) take_kind(command, files, request);
  if (request.problems.empty()) take_file(files, request);
}

void read_options(const CommandInfo& command, std::vector<std::string> words, Request& request) {
  CLI::App app;
  app.set_help_flag();
  app.allow_extras();
  const std::vector<Bound> bound = bind(app, command.id);
  if (const Bound* one = lacks_value(bound, words)) {
    request.problems.push_back(value_missing(one->name, one->info == nullptr ? "VALUE" : one->info->value));
    return;
  }
  std::reverse(words.begin(), words.end());  // CLI11 takes them from the back
  try {
    app.parse(std::move(words));
  } catch (const CLI::ParseError& error) {
    request.problems.push_back(fmt::format("The command line can't be read: {}.", error.what()));
    return;
  }
  for (const Bound& one : bound) apply(one, request);
  sort_rest(command, app.remaining(), request);
  for (std::string& problem : settle(request.options)) request.problems.push_back(std::move(problem));
}

// The command line as a shell would read it again.
std::string as_typed(const std::vector<std::string>& arguments) {
  constexpr std::string_view plain =
      "abcdefghijklmnopqrstuvwxyzABCDEFGHIJKLMNOPQRSTUVWXYZ0123456789-_./,:=+@%";
  std::string line = "steelyard";
  for (const std::string& argument : arguments) {
    line += ' ';
    if (!argument.empty() && argument.find_first_not_of(plain) == std::string::npos) {
      line += argument;
      continue;
    }
    line += '\'';
    for (const char c : argument) line += c == '\'' ? std::string("'\\''") : std::string(1, c);
    line += '\'';
  }
  return line;
}

}  // namespace

Request read_arguments(const std::vector<std::string>& arguments) {
  Request request;
  if (arguments.empty()) {
    request.problems.emplace_back("No command is given. steelyard --help lists the commands.");
    return request;
  }
  const std::string& first = arguments.front();
  if (asks_for_help(first) || asks_for_version(first) || first == "help") {
    request.kind = asks_for_version(first) ? Request::Kind::version : Request::Kind::help;
    if (arguments.size() > 1) request.command = find_command(arguments[1]);
    return request;
  }
  if (first.size() > 1 && first[0] == '-') {
    request.problems.push_back(fmt::format(
        "\"{}\" stands before the command. The form is steelyard COMMAND [FILE] [OPTIONS].", first));
    return request;
  }
  request.command = find_command(first);
  if (request.command == nullptr) {
    request.problems.push_back(unknown_command(first));
    return request;
  }
  std::vector<std::string> rest(arguments.begin() + 1, arguments.end());
  request.options.typed = as_typed(arguments);
  if (std::any_of(rest.begin(), std::find(rest.begin(), rest.end(), "--"), asks_for_help)) {
    request.kind = Request::Kind::help;
    return request;
  }
  read_options(*request.command, std::move(rest), request);
  return request;
}

}  // namespace steelyard::cli
