// The command line, taken apart.
#pragma once

#include <string>
#include <vector>

#include "options.hpp"

namespace steelyard::cli {

/// What the command line asks for: help or the version, or a command, or what is wrong with it.
struct Request {
  enum class Kind { run, help, version };
  Kind kind = Kind::run;
  const CommandInfo* command = nullptr;  ///< null with help: the general help
  Options options;
  std::vector<std::string> problems;  ///< sentences; not empty: exit status 2
};

/// `arguments` without the program's own name.
[[nodiscard]] Request read_arguments(const std::vector<std::string>& arguments);

}  // namespace steelyard::cli
