// The one table of options. Parsing, --help, man pages and completions all read it.
#pragma once

#include <cstddef>
#include <optional>
#include <span>
#include <string>
#include <string_view>
#include <utility>
#include <vector>

#include "commands.hpp"
#include "steelyard/analysis.hpp"

namespace steelyard::cli {

/// Whether something is done: by looking at the terminal, or as the user says.
enum class When { automatic, always, never };

struct OptionInfo;

/// Everything a command line can ask for.
struct Options {
  std::string file;  ///< "-": standard input
  AnalysisOptions analysis;
  std::optional<Direction> direction;
  std::optional<Grade> fail_on;
  bool effect_prior_given = false;
  bool spread_prior_given = false;
  std::string svg, json, html, markdown;  ///< "": not asked for; "-": standard output
  bool from_result = false;               ///< `file` is a result to repeat
  /// What was given, in order, for a run that starts from recorded options.
  std::vector<std::pair<const OptionInfo*, std::string>> given;
  std::string typed;  ///< the whole command line, for the record
  std::string kind;   ///< of figure
  bool one_column = false;
  /// Cells given as options, by column: one row without a file.
  std::vector<std::pair<std::string, std::string>> cells;
  std::optional<Interval> region;
  std::optional<double> threshold;
  std::optional<double> expected;
  std::string by;
  double verdict = 3.0;
  double selection_alpha = 0.05;
  unsigned threads = 1;
  std::optional<std::size_t> width;
  When colour = When::automatic;
  When utf8 = When::automatic;
};

/// What the value of an option is, for completions.
enum class ValueKind { none, text, number, file, choice };

struct OptionInfo {
  std::string_view name;  ///< with its dashes
  ValueKind kind;
  std::string_view value;     ///< how the value is called in the help, "" for a switch
  std::string_view choices;   ///< words separated by '|', for ValueKind::choice
  std::string_view meaning;   ///< whole sentences
  std::string_view fallback;  ///< what holds when it is not given, "" when nothing
  bool repeatable;
  CommandSet commands;  ///< those that take it
  /// Puts the value into the options; gives "" or a sentence that says what is wrong with it.
  std::string (*apply)(Options& options, std::string_view value);
  std::string_view brief = "";  ///< a second name of one letter, with its dash
};

/// All options, in the order of the help.
[[nodiscard]] std::span<const OptionInfo> option_table();

/// Those that a command takes.
[[nodiscard]] std::vector<const OptionInfo*> options_of(Command command);

/// The options that carry the names of columns ("--t", "--n1", ...), for commands that take a study
/// straight from the command line.
[[nodiscard]] std::vector<std::string> column_options(Command command);

/// What only all options together can tell: a prior without mass in the direction asked, two outputs
/// on standard output, ... One sentence each.
[[nodiscard]] std::vector<std::string> settle(Options& options);

/// The options of a recorded run with what was given on top; complains as `settle` does.
[[nodiscard]] std::vector<std::string> build_on(const AnalysisOptions& recorded, Options& options);

/// The words of a list like "either|greater|less".
[[nodiscard]] std::vector<std::string_view> words_of(std::string_view choices);

}  // namespace steelyard::cli
