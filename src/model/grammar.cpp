// Text into priors: `family(argument, ...)` or the name of a published prior. Grammar: docs/model.md.
#include <fmt/format.h>
#include <fmt/ranges.h>

#include <algorithm>
#include <string>
#include <string_view>
#include <utility>
#include <vector>

#include "model/arithmetic.hpp"
#include "model/families.hpp"
#include "steelyard/model.hpp"

namespace steelyard {

namespace {

using model::Cursor;
using model::GrammarFamily;

constexpr std::size_t longest_text = 1000;

// What differs between priors of the effect and of the spread.
template <class Prior, class Family>
struct Dialect {
  std::string_view noun;  // "effect prior"
  std::span<const GrammarFamily<Family>> families;
  std::span<const PublishedPrior> published;
};

Dialect<EffectPrior, EffectFamily> effect_dialect() {
  return {"effect prior", model::effect_families(), published_effect_priors()};
}
Dialect<SpreadPrior, SpreadFamily> spread_dialect() {
  return {"spread prior", model::spread_families(), published_spread_priors()};
}

// Characters before byte `at`, counted as code points, plus one.
std::size_t character(std::string_view text, std::size_t at) {
  const auto starts = [](char c) { return (static_cast<unsigned char>(c) & 0xC0U) != 0x80U; };
  const std::string_view before = text.substr(0, at);
  return static_cast<std::size_t>(std::count_if(before.begin(), before.end(), starts)) + 1;
}

// The text as it can be quoted in a message.
std::string quoted(std::string_view text) {
  if (text.size() <= 80) return std::string(text);
  std::size_t end = 77;
  while (end > 0 && (static_cast<unsigned char>(text[end]) & 0xC0U) == 0x80U) --end;
  return std::string(text.substr(0, end)) + "...";
}

Diagnostic misread(std::string_view noun, std::string_view text, const model::Misread& misread,
                   std::string remedy) {
  const std::size_t position = character(text, misread.at);
  Diagnostic d;
  d.code = "prior-grammar";
  d.where.column = position;
  d.what = misread.at >= text.size()
               ? fmt::format("The {} \"{}\" ends at character {} where {} was expected.", noun, quoted(text),
                             position, misread.expected)
               : fmt::format("The {} \"{}\" can't be read from character {} on, where {} was expected.", noun,
                             quoted(text), position, misread.expected);
  d.remedy = std::move(remedy);
  return d;
}

template <class D>
std::string known_forms(const D& dialect) {
  std::vector<std::string_view> forms;
  for (const auto& family : dialect.families) forms.push_back(family.signature);
  return fmt::format("Known are {}, and the published priors listed by name in docs/model.md.",
                     fmt::join(forms, ", "));
}

template <class D>
Diagnostic unknown_name(const D& dialect, std::string_view text, std::size_t at, const std::string& word) {
  std::vector<std::string_view> words;
  for (const auto& family : dialect.families) words.push_back(family.name);
  for (const auto& prior : dialect.published) words.push_back(prior.name);
  const std::string_view close = word.empty() ? std::string_view() : nearest_word(word, words);
  Diagnostic d;
  d.code = "prior-unknown";
  d.where.column = character(text, at);
  d.what =
      word.empty()
          ? fmt::format("The {} \"{}\" does not begin with the name of a prior.", dialect.noun, quoted(text))
          : fmt::format("The {} \"{}\" names \"{}\" at character {}, which is not a known prior.",
                        dialect.noun, quoted(text), quoted(word), d.where.column);
  d.remedy = close.empty() ? known_forms(dialect) : fmt::format("Did you mean \"{}\"?", close);
  return d;
}

template <class Prior, class Family>
Outcome<Prior> parse(const Dialect<Prior, Family>& dialect, std::string_view text);

template <class Prior>
Outcome<Prior> failed(Diagnostic diagnostic) {
  return {std::nullopt, {std::move(diagnostic)}};
}

// The arguments between the parentheses.
std::vector<double> read_arguments(Cursor& cursor) {
  std::vector<double> arguments;
  if (!cursor.take('(')) {
    cursor.fail("`(`");
    return arguments;
  }
  if (cursor.take(')')) return arguments;
  do {
    arguments.push_back(model::read_expression(cursor));
  } while (!cursor.failed() && cursor.take(','));
  if (!cursor.failed() && !cursor.take(')')) cursor.fail("`,` or `)`");
  return arguments;
}

template <class Prior, class Family>
Outcome<Prior> parse_family(const Dialect<Prior, Family>& dialect, const GrammarFamily<Family>& family,
                            Cursor& cursor) {
  const std::vector<double> arguments = read_arguments(cursor);
  cursor.skip_space();
  if (!cursor.failed() && cursor.at < cursor.text.size()) cursor.fail("the end of the text");
  if (cursor.failed()) {
    return failed<Prior>(misread(dialect.noun, cursor.text, *cursor.misread,
                                 fmt::format("Write it as {}; arguments may use + - * / ( ), sqrt, exp, log "
                                             "and pi, for instance 1/sqrt(2).",
                                             family.signature)));
  }
  if (arguments.size() != family.arguments) {
    Diagnostic d;
    d.code = "prior-arguments";
    d.where.column = 1;
    d.what = fmt::format("The {} \"{}\" has {} argument{} where {} {} expected.", dialect.noun,
                         quoted(cursor.text), arguments.size(), arguments.size() == 1 ? "" : "s",
                         family.arguments, family.arguments == 1 ? "was" : "were");
    d.remedy = fmt::format("Write it as {}, with points for decimals and commas between arguments.",
                           family.signature);
    return failed<Prior>(std::move(d));
  }
  Prior prior;
  prior.family = family.make(arguments);
  if (auto problem = problem_with(prior)) return failed<Prior>(std::move(*problem));
  return {prior, {}};
}

template <class Prior, class Family>
Outcome<Prior> parse(const Dialect<Prior, Family>& dialect, std::string_view text) {
  if (text.size() > longest_text) {
    Diagnostic d;
    d.code = "prior-grammar";
    d.what = fmt::format("The {} \"{}\" is {} bytes long; at most {} are read.", dialect.noun, quoted(text),
                         text.size(), longest_text);
    d.remedy = known_forms(dialect);
    return failed<Prior>(std::move(d));
  }
  Cursor cursor{text, 0, {}};
  cursor.skip_space();
  const std::size_t at = cursor.at;
  const std::string word = model::take_word(cursor);
  for (const auto& family : dialect.families) {
    if (word == family.name || (!word.empty() && word == family.alias)) {
      return parse_family(dialect, family, cursor);
    }
  }
  cursor.skip_space();
  for (const auto& prior : dialect.published) {
    if (word != prior.name) continue;
    if (cursor.at >= text.size()) return parse(dialect, prior.definition);
    return failed<Prior>(misread(dialect.noun, text, {cursor.at, "the end of the text"},
                                 fmt::format("The published prior {} takes no arguments; it stands for {}.",
                                             prior.name, prior.definition)));
  }
  return failed<Prior>(unknown_name(dialect, text, at, word));
}

}  // namespace

Outcome<EffectPrior> parse_effect_prior(std::string_view text) { return parse(effect_dialect(), text); }
Outcome<SpreadPrior> parse_spread_prior(std::string_view text) { return parse(spread_dialect(), text); }

}  // namespace steelyard
