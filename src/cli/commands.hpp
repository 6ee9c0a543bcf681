// The table of commands.
#pragma once

#include <span>
#include <string_view>

#include "exit_codes.hpp"

namespace steelyard::cli {

struct Options;

enum class Command : unsigned {
  pool = 1,
  check = 2,
  weigh = 4,
  stress = 8,
  replicate = 16,
  draw = 32,
  report = 64
};

/// Several commands.
class CommandSet {
 public:
  constexpr CommandSet(Command command) : bits_(static_cast<unsigned>(command)) {}
  constexpr CommandSet operator|(CommandSet other) const { return CommandSet(bits_ | other.bits_); }
  [[nodiscard]] constexpr bool has(Command command) const {
    return (bits_ & static_cast<unsigned>(command)) != 0;
  }

 private:
  constexpr explicit CommandSet(unsigned bits) : bits_(bits) {}
  unsigned bits_;
};
constexpr CommandSet operator|(Command a, Command b) { return CommandSet(a) | CommandSet(b); }

struct Example {
  std::string_view line;     ///< as it is typed
  std::string_view purpose;  ///< what it does, one line without full stop
};

struct CommandInfo {
  Command id;
  std::string_view name;
  std::string_view summary;      ///< one line without full stop
  std::string_view description;  ///< a paragraph
  std::span<const Example> examples;
  std::string_view kinds;  ///< words separated by '|', of which the first argument is one; "" when none
  Exit (*run)(const Options& options);
};

[[nodiscard]] std::span<const CommandInfo> command_table();

/// The command of that name, or null.
[[nodiscard]] const CommandInfo* find_command(std::string_view name);

Exit run_pool(const Options& options);
Exit run_check(const Options& options);
Exit run_weigh(const Options& options);
Exit run_stress(const Options& options);
Exit run_replicate(const Options& options);
Exit run_draw(const Options& options);
Exit run_report(const Options& options);

}  // namespace steelyard::cli
