// The command: arguments, then the one command they name. Only this folder prints or exits.
#include <unistd.h>

#include <fmt/format.h>
#include <exception>
#include <new>
#include <string>
#include <string_view>
#include <vector>

#include "arguments.hpp"
#include "files.hpp"
#include "help.hpp"
#include "messages.hpp"
#include "run.hpp"
#include "terminal.hpp"

namespace {

using namespace steelyard;
using cli::Exit;

Exit answer(const std::vector<std::string>& arguments) {
  const cli::Request request = cli::read_arguments(arguments);
  for (const std::string& problem : request.problems) cli::say_error(problem);
  if (!request.problems.empty()) return Exit::wrong_usage;
  switch (request.kind) {
    case cli::Request::Kind::version:
      return cli::print("steelyard " STEELYARD_VERSION "\n");
    case cli::Request::Kind::help: {
      const std::size_t width = cli::terminal_width();
      return cli::print(request.command == nullptr ? cli::general_help(width)
                                                   : cli::command_help(*request.command, width));
    }
    case cli::Request::Kind::run:
      break;
  }
  return request.command->run(request.options);
}

// Needs no memory: there is none.
Exit out_of_memory() {
  constexpr std::string_view text =
      "steelyard: error: There is not enough memory for this input. Split the file, or allow more memory.\n";
  [[maybe_unused]] const auto written = write(STDERR_FILENO, text.data(), text.size());
  return Exit::unusable_data;
}

}  // namespace

int main(int argc, char** argv) {
  cli::watch_signals();
  Exit exit = Exit::unusable_data;
  try {
    exit = answer(std::vector<std::string>(argv + (argc > 0 ? 1 : 0), argv + argc));
  } catch (const std::bad_alloc&) {
    exit = out_of_memory();
  } catch (const std::exception& error) {
    cli::say_error(fmt::format("This is a fault of steelyard itself: {}. Please report it with the input.",
                               error.what()));
  }
  return static_cast<int>(exit);
}
