// Man pages and shell completions, from the tables of commands and options.
#pragma once

#include <string>

#include "commands.hpp"

namespace steelyard::cli {

/// steelyard(1), in roff.
[[nodiscard]] std::string manual();
/// steelyard-COMMAND(1).
[[nodiscard]] std::string manual(const CommandInfo& command);

[[nodiscard]] std::string bash_completion();
[[nodiscard]] std::string zsh_completion();
[[nodiscard]] std::string fish_completion();

/// The tables of docs/cli.md: commands, their options, what the exit status means; in Markdown.
[[nodiscard]] std::string markdown_reference();

}  // namespace steelyard::cli
