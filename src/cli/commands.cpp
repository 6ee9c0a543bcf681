#include "commands.hpp"

#include <array>

namespace steelyard::cli {

namespace {

constexpr std::array pool_examples = {
    Example{"steelyard pool studies.csv", "verdict, forest and estimates in the terminal"},
    Example{"steelyard pool studies.csv --svg forest.svg --json result.json",
            "the same, with a figure and all numbers"},
    Example{"steelyard pool studies.csv --direction greater --effect-prior \"normal(0, 0.5)\"",
            "another prior of the mean effect, and only effects above zero"},
    Example{"steelyard pool studies.csv --without \"Miller 1998\"",
            "leave one study out, and say so in every output"},
    Example{"steelyard pool --from result.json", "repeat a run from its own result"},
};

constexpr std::array check_examples = {
    Example{"steelyard check studies.csv", "how each row is read, and what does not agree"},
    Example{"steelyard check studies.csv --fail-on impossible", "exit status 4 when numbers can't be true"},
    Example{"steelyard check studies.csv --json -", "the same for another program"},
};

constexpr std::array commands = {
    CommandInfo{
        Command::pool, "pool", "weigh the printed evidence of several studies together",
        "Reads a table of published results, rebuilds each study's test statistic from what is printed, and "
        "answers two questions: is there an effect, and does it vary from study to study? Shows how strong "
        "the "
        "evidence is, how large the effect is, and what does not agree in the printed numbers.",
        pool_examples, run_pool},
    CommandInfo{Command::check, "check", "see how each row is read and whether its numbers agree",
                "Rebuilds every row of a table of published results and compares the printed numbers with "
                "each other. "
                "A disagreement is listed only when rounding can't explain it. Nothing is pooled.",
                check_examples, run_check},
};

}  // namespace

std::span<const CommandInfo> command_table() { return commands; }

const CommandInfo* find_command(std::string_view name) {
  for (const CommandInfo& command : commands) {
    if (command.name == name) return &command;
  }
  return nullptr;
}

}  // namespace steelyard::cli
