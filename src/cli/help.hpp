// Help for people, from the tables of commands and options.
#pragma once

#include <cstddef>
#include <span>
#include <string>
#include <string_view>

#include "commands.hpp"

namespace steelyard::cli {

/// `steelyard --help`.
[[nodiscard]] std::string general_help(std::size_t width);
/// `steelyard COMMAND --help`.
[[nodiscard]] std::string command_help(const CommandInfo& command, std::size_t width);

/// What the exit status means, for help and man pages.
struct ExitMeaning {
  Exit exit;
  std::string_view meaning;
};
[[nodiscard]] std::span<const ExitMeaning> exit_meanings();

/// What the program is for, a paragraph.
[[nodiscard]] std::string_view about_text();
/// What FILE stands for.
[[nodiscard]] std::string_view file_text();

/// What --COLUMN stands for.
[[nodiscard]] std::string_view column_text();
/// What KIND stands for.
[[nodiscard]] std::string kind_text(const CommandInfo& command);

struct OptionInfo;
/// Meaning, choices and (if wanted) default of an option, in sentences.
[[nodiscard]] std::string option_meaning(const OptionInfo& option, bool with_default = true);

/// Text in lines of at most `width` columns, each behind `indent` blanks; ends with a newline.
[[nodiscard]] std::string wrapped(std::string_view text, std::size_t indent, std::size_t width);

}  // namespace steelyard::cli
