#include "options.hpp"

#include <fmt/format.h>
#include <algorithm>
#include <array>
#include <charconv>
#include <cmath>

#include "steelyard/model.hpp"

namespace steelyard::cli {

namespace {

constexpr CommandSet pooling = Command::pool | Command::stress | Command::replicate |
                               CommandSet(Command::draw) | CommandSet(Command::report);
constexpr CommandSet with_effect_prior = pooling | CommandSet(Command::weigh);
constexpr CommandSet all_commands = with_effect_prior | CommandSet(Command::check);
constexpr CommandSet with_numbers = Command::pool | Command::check | CommandSet(Command::weigh) |
                                    CommandSet(Command::stress) | CommandSet(Command::replicate);

std::optional<double> read_number(std::string_view text) {
  double value = 0.0;
  const auto [end, error] = std::from_chars(text.data(), text.data() + text.size(), value);
  if (error != std::errc() || end != text.data() + text.size() || !std::isfinite(value)) return std::nullopt;
  return value;
}

// A number strictly between 0 and 1.
std::string put_fraction(double& target, std::string_view value, std::string_view example) {
  const auto number = read_number(value);
  if (!number || *number <= 0.0 || *number >= 1.0) {
    return fmt::format("\"{}\" is not a number between 0 and 1. Give one like {}.", value, example);
  }
  target = *number;
  return "";
}

std::string put_file(std::string& target, std::string_view value) {
  if (value.empty()) return "the name of a file can't be empty. Give a name, or - for standard output.";
  target = value;
  return "";
}

std::string one_of(std::string_view value, std::string_view choices) {
  const auto words = words_of(choices);
  const std::string_view near = nearest_word(value, words);
  std::string list;
  for (std::size_t i = 0; i < words.size(); ++i) {
    if (i > 0) list += i + 1 == words.size() ? " or " : ", ";
    list += words[i];
  }
  return fmt::format("\"{}\" is not one of {}.{}", value, list,
                     near.empty() ? "" : fmt::format(" Did you mean \"{}\"?", near));
}

std::string in_one_line(const std::vector<Diagnostic>& diagnostics) {
  std::string line;
  for (const Diagnostic& d : diagnostics) {
    if (!line.empty()) line += ' ';
    line += d.what;
    if (!d.remedy.empty()) line += ' ' + d.remedy;
  }
  return line;
}

std::string put_effect_prior(Options& o, std::string_view value) {
  auto prior = parse_effect_prior(value);
  if (!prior.ok()) return in_one_line(prior.diagnostics);
  o.analysis.priors.effect = *prior.value;
  o.effect_prior_given = true;
  return "";
}

std::string put_spread_prior(Options& o, std::string_view value) {
  auto prior = parse_spread_prior(value);
  if (!prior.ok()) return in_one_line(prior.diagnostics);
  o.analysis.priors.spread = *prior.value;
  o.spread_prior_given = true;
  return "";
}

constexpr std::string_view directions = "either|greater|less";

std::string put_direction(Options& o, std::string_view value) {
  for (const Direction direction : {Direction::either, Direction::greater, Direction::less}) {
    if (value == to_text(direction)) {
      o.direction = direction;
      return "";
    }
  }
  return one_of(value, directions);
}

std::string put_model_priors(Options& o, std::string_view value) {
  std::array<double, model_count> weights{};
  double sum = 0.0;
  std::size_t count = 0;
  for (std::string_view rest = value; count <= model_count;) {
    const std::size_t comma = rest.find(',');
    const auto weight = read_number(rest.substr(0, comma));
    if (!weight || *weight < 0.0 || count == model_count) {
      count = 0;
      break;
    }
    weights[count++] = *weight;
    sum += *weight;
    if (comma == std::string_view::npos) break;
    rest.remove_prefix(comma + 1);
  }
  if (count != model_count || !(sum > 0.0) || !std::isfinite(sum)) {
    return fmt::format(
        "\"{}\" is not four weights, none negative and not all zero. Give them in the order no effect, same "
        "effect, "
        "varying without a mean effect, varying effect, for instance 1,1,1,1 or 0.5,0.5,0,0.",
        value);
  }
  for (std::size_t i = 0; i < model_count; ++i) o.analysis.priors.model[i] = weights[i] / sum;
  return "";
}

constexpr std::string_view grades = "worth-a-look|changes-the-verdict|impossible";

std::string put_fail_on(Options& o, std::string_view value) {
  const auto words = words_of(grades);
  constexpr std::array values = {Grade::worth_a_look, Grade::changes_the_verdict, Grade::impossible};
  for (std::size_t i = 0; i < values.size(); ++i) {
    if (value == words[i]) {
      o.fail_on = values[i];
      return "";
    }
  }
  return one_of(value, grades);
}

constexpr std::string_view whens = "auto|always|never";

std::string put_when(When& target, std::string_view value) {
  const auto words = words_of(whens);
  constexpr std::array values = {When::automatic, When::always, When::never};
  for (std::size_t i = 0; i < values.size(); ++i) {
    if (value == words[i]) {
      target = values[i];
      return "";
    }
  }
  return one_of(value, whens);
}

constexpr std::string_view glyphs = "auto|unicode|ascii";

std::string put_glyphs(Options& o, std::string_view value) {
  if (value == "auto")
    o.utf8 = When::automatic;
  else if (value == "unicode")
    o.utf8 = When::always;
  else if (value == "ascii")
    o.utf8 = When::never;
  else
    return one_of(value, glyphs);
  return "";
}

std::string put_width(Options& o, std::string_view value) {
  std::size_t width = 0;
  const auto [end, error] = std::from_chars(value.data(), value.data() + value.size(), width);
  if (error != std::errc() || end != value.data() + value.size() || width < 40 || width > 1000) {
    return fmt::format("\"{}\" is not a whole number from 40 to 1000.", value);
  }
  o.width = width;
  return "";
}

std::string put_without(Options& o, std::string_view value) {
  if (value.empty())
    return "an empty label names no study. Give a label from the study column, or \"row 3\".";
  o.analysis.without.emplace_back(value);
  return "";
}

std::string put_from(Options& o, std::string_view value) {
  if (value.empty()) return "the name of a file can't be empty.";
  o.file = value;
  o.from_result = true;
  return "";
}

std::string put_finite(std::optional<double>& target, std::string_view value, bool positive) {
  const auto number = read_number(value);
  if (!number || (positive && *number <= 0.0)) {
    return fmt::format("\"{}\" is not a {}number. Give one like 0.5.", value, positive ? "positive " : "");
  }
  target = number;
  return "";
}

std::string put_region(Options& o, std::string_view value) {
  const std::size_t colon = std::min(value.find(':'), value.size());
  const auto low = read_number(value.substr(0, colon));
  const auto high = read_number(value.substr(std::min(colon + 1, value.size())));
  if (!low || !high || *low >= *high) {
    return fmt::format("\"{}\" is not two numbers, the lower first. Give them like -0.1:0.1.", value);
  }
  o.region = Interval{*low, *high};
  return "";
}

std::string put_by(Options& o, std::string_view value) {
  if (value.empty()) return "the name of a column can't be empty.";
  o.by = value;
  return "";
}

std::string put_verdict(Options& o, std::string_view value) {
  const auto number = read_number(value);
  if (!number || *number <= 1.0)
    return fmt::format("\"{}\" is not a number above 1. Give one like 3 or 10.", value);
  o.verdict = *number;
  return "";
}

std::string put_threads(Options& o, std::string_view value) {
  unsigned count = 0;
  const auto [end, error] = std::from_chars(value.data(), value.data() + value.size(), count);
  if (error != std::errc() || end != value.data() + value.size() || count < 1 || count > 1024) {
    return fmt::format("\"{}\" is not a whole number from 1 to 1024.", value);
  }
  o.threads = count;
  return "";
}

constexpr std::string_view sizes = "one-column|two-columns";

std::string put_size(Options& o, std::string_view value) {
  if (value != "one-column" && value != "two-columns") return one_of(value, sizes);
  o.one_column = value == "one-column";
  return "";
}

constexpr std::array table = {
    OptionInfo{"--effect-prior", ValueKind::text, "PRIOR", "",
               "Prior of the mean effect, in SD units: cauchy(location, scale), normal(mean, sd), "
               "student-t(location, scale, df), uniform(low, high), or the name of a published prior.",
               "cauchy(0, 1/sqrt(2))", false, with_effect_prior, put_effect_prior},
    OptionInfo{
        "--spread-prior", ValueKind::text, "PRIOR", "",
        "Prior of the spread, the SD of effects among studies: inverse-gamma(shape, scale), "
        "half-cauchy(scale), "
        "half-normal(scale), half-student-t(scale, df), log-normal(log mean, log sd), exponential(mean), "
        "uniform(low, high), or the name of a published prior.",
        "inverse-gamma(1, 0.15)", false, pooling, put_spread_prior},
    OptionInfo{
        "--direction", ValueKind::choice, "SIDE", directions,
        "Mean effects that the prior allows. It restricts the mean effect, not the effect of each study.",
        "either", false, with_effect_prior, put_direction},
    OptionInfo{"--model-priors", ValueKind::text, "A,B,C,D", "",
               "Weights of the four models before the data: no effect; the same effect everywhere; effects "
               "that vary "
               "around zero; effects that vary around a mean effect. They are divided by their sum.",
               "1,1,1,1", false, pooling, put_model_priors},
    OptionInfo{"--level", ValueKind::number, "PROBABILITY", "", "Probability inside the credible intervals.",
               "0.95", false, with_effect_prior,
               [](Options& o, std::string_view v) { return put_fraction(o.analysis.pool.level, v, "0.9"); }},
    OptionInfo{
        "--alpha", ValueKind::number, "PROBABILITY", "",
        "What \"n.s.\" means where the file has no alpha column: p above this.", "0.05", false, all_commands,
        [](Options& o, std::string_view v) { return put_fraction(o.analysis.rebuild.alpha, v, "0.01"); }},
    OptionInfo{"--without", ValueKind::text, "LABEL", "",
               "Leaves a study out, by its label or as \"row 3\". Every output says so. May be given again.",
               "", true, all_commands, put_without},
    OptionInfo{
        "--fail-on", ValueKind::choice, "GRADE", grades,
        "Exit status 4 when the audit finds something of this grade or worse. The result is written all the "
        "same.",
        "", false, with_numbers, put_fail_on},
    OptionInfo{"--region", ValueKind::text, "LOW:HIGH", "",
               "Asks about effects that are practically negligible: evidence for an effect inside the "
               "region, and its "
               "probability.",
               "", false, Command::pool | Command::weigh, put_region},
    OptionInfo{"--threshold", ValueKind::number, "EFFECT", "",
               "Asks for the probability that the effect in a new study exceeds this.", "", false,
               Command::pool | Command::weigh,
               [](Options& o, std::string_view v) { return put_finite(o.threshold, v, false); }},
    OptionInfo{"--expected", ValueKind::number, "EFFECT", "",
               "The effect that a sceptic doubts and an enthusiast expects.", "0.5", false, Command::weigh,
               [](Options& o, std::string_view v) { return put_finite(o.expected, v, true); }},
    OptionInfo{
        "--by", ValueKind::text, "COLUMN", "",
        "A column of labels: each group alone and left out, and evidence for a difference among groups.", "",
        false, Command::stress, put_by},
    OptionInfo{"--verdict-at", ValueKind::number, "RATIO", "",
               "A Bayes factor of at least this, either way, counts as a verdict; less is undecided.", "3",
               false, Command::stress, put_verdict},
    OptionInfo{"--selection-alpha", ValueKind::number, "PROBABILITY", "",
               "Two-sided level at which originals are read as selected for significance.", "0.05", false,
               Command::replicate,
               [](Options& o, std::string_view v) { return put_fraction(o.selection_alpha, v, "0.05"); }},
    OptionInfo{"--threads", ValueKind::number, "COUNT", "",
               "Threads to compute with. The result is the same for any number.", "1", false,
               Command::stress | Command::draw | CommandSet(Command::report), put_threads},
    OptionInfo{"--size", ValueKind::choice, "SIZE", sizes,
               "Width of the figure: one column of a journal (85 mm) or two "
               "(180 mm).",
               "two-columns", false, Command::draw, put_size},
    OptionInfo{"--html", ValueKind::file, "FILE", "", "Writes the report as one self-contained HTML file.",
               "", false, Command::report, [](Options& o, std::string_view v) { return put_file(o.html, v); },
               "-o"},
    OptionInfo{"--markdown", ValueKind::file, "FILE", "", "Writes the report as Markdown, without figures.",
               "", false, Command::report,
               [](Options& o, std::string_view v) { return put_file(o.markdown, v); }},
    OptionInfo{"--svg", ValueKind::file, "FILE", "", "Writes the figure (of pool: the forest) as SVG.", "",
               false, Command::pool | Command::draw,
               [](Options& o, std::string_view v) { return put_file(o.svg, v); }},
    OptionInfo{"--json", ValueKind::file, "FILE", "",
               "Writes all results as JSON. With - it goes to standard output, and nothing else does.", "",
               false, with_numbers, [](Options& o, std::string_view v) { return put_file(o.json, v); }},
    OptionInfo{"--from", ValueKind::file, "RESULT", "",
               "Repeats the run that wrote this JSON result: its rows, priors and options. Other options "
               "given beside "
               "it replace the recorded ones.",
               "", false, Command::pool, put_from},
    OptionInfo{"--width", ValueKind::number, "COLUMNS", "", "Width of the text.",
               "that of the terminal, else 80", false, with_numbers, put_width},
    OptionInfo{"--colour", ValueKind::choice, "WHEN", whens,
               "Colour in the text. auto: on a terminal, and not when NO_COLOR is set.", "auto", false,
               with_numbers, [](Options& o, std::string_view v) { return put_when(o.colour, v); }},
    OptionInfo{"--glyphs", ValueKind::choice, "SET", glyphs,
               "Characters of the text. auto: unicode when the locale is UTF-8.", "auto", false, all_commands,
               put_glyphs},
};

}  // namespace

std::vector<std::string_view> words_of(std::string_view choices) {
  std::vector<std::string_view> words;
  while (!choices.empty()) {
    const std::size_t bar = choices.find('|');
    words.push_back(choices.substr(0, bar));
    choices.remove_prefix(bar == std::string_view::npos ? choices.size() : bar + 1);
  }
  return words;
}

std::span<const OptionInfo> option_table() { return table; }

std::vector<const OptionInfo*> options_of(Command command) {
  std::vector<const OptionInfo*> found;
  for (const OptionInfo& option : table) {
    if (option.commands.has(command)) found.push_back(&option);
  }
  return found;
}

std::vector<std::string> column_options(Command command) {
  std::vector<std::string> names;
  if (command != Command::weigh) return names;
  for (const Column& column : columns()) {
    std::string name = fmt::format("--{}", column.name);
    const auto same = [&](const OptionInfo& option) {
      return option.name == name && option.commands.has(command);
    };
    if (std::none_of(table.begin(), table.end(), same)) names.push_back(std::move(name));
  }
  return names;
}

std::vector<std::string> settle(Options& o) {
  std::vector<std::string> problems;
  EffectPrior& effect = o.analysis.priors.effect;
  if (o.direction) effect.direction = *o.direction;
  o.analysis.explicit_priors = o.analysis.explicit_priors || (o.effect_prior_given && o.spread_prior_given);
  if (auto problem = problem_with(effect)) {
    problems.push_back("--effect-prior: " + in_one_line({*problem}));
  }
  if (auto problem = problem_with(o.analysis.priors.spread)) {
    problems.push_back("--spread-prior: " + in_one_line({*problem}));
  }
  if (o.threshold && !o.region) o.region = Interval{-0.1, 0.1};
  const std::pair<std::string_view, const std::string*> targets[] = {
      {"--svg", &o.svg}, {"--json", &o.json}, {"--html", &o.html}, {"--markdown", &o.markdown}};
  for (const auto& [first, a] : targets) {
    for (const auto& [second, b] : targets) {
      if (first >= second || a->empty() || *a != *b) continue;
      problems.push_back(
          *a == "-"
              ? fmt::format(
                    "{} - and {} - can't both go to standard output. Give one of them the name of a file.",
                    second, first)
              : fmt::format("{} and {} name the same file \"{}\". Give them different names.", second, first,
                            *a));
    }
  }
  return problems;
}

std::vector<std::string> build_on(const AnalysisOptions& recorded, Options& o) {
  o.analysis = recorded;
  if (!o.direction) o.direction = recorded.priors.effect.direction;
  for (const auto& [option, value] : o.given) {
    if (option->apply != put_from) option->apply(o, value);
  }
  return settle(o);
}

}  // namespace steelyard::cli
