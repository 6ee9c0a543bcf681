// Phrases: effect sizes, differences and intervals.
#include <fmt/format.h>

#include "read/words.hpp"

namespace steelyard::read {

bool statistic_with_df(Words& words, std::string_view letter);  // in words_tests.cpp

namespace {

bool ends_in_digits(const std::string& word, std::size_t from) {
  return word.size() > from && word.find_first_not_of("0123456789", from) == std::string::npos;
}

// `95%` or `95 %` before its `CI`.
std::optional<Value> level_here(Words& words) {
  if (!words.is(TokenKind::number)) return std::nullopt;
  const Value level{words.token()->text, words.token()};
  if (level.text.back() == '%') {
    words.skip();
    return level;
  }
  if (!words.is_mark('%', 1)) return std::nullopt;
  words.skip(2);
  return Value{level.text + "%", level.token};
}

// `CI`, `CI95%`, `CI 95%`, `confidence interval`; finds a level that stands behind.
bool name_of_interval(Words& words, std::optional<Value>& level) {
  const std::string name = words.word();
  if (name == "confidence" && (words.word(1) == "interval" || words.word(1) == "intervals")) {
    words.skip(2);
  } else if (name.substr(0, 2) == "ci" && ends_in_digits(name, 2)) {
    level = Value{name.substr(2) + "%", words.token()};
    words.skip();
    words.eat_mark('%');
  } else if (name == "ci" || name == "cis") {
    words.skip();
    if (!level) level = level_here(words);
  } else {
    return false;
  }
  return true;
}

void take_interval(Words& words, std::size_t start, const std::optional<Value>& level,
                   const std::array<Value, 2>& ends) {
  const bool of_mean = words.last == "mean" && words.group > 0;
  const std::string suffix = of_mean ? fmt::format("{}", words.group) : "";
  if (of_mean && words.group == 2 && !words.has("ci_low1")) {
    return words.not_used(start, "it may enclose the second mean or the difference of the means",
                          "Say which just before it, as in: mean difference = 0.7, 95% CI [0.1, 1.3].");
  }
  if (words.has("ci_low" + suffix)) {
    return words.not_used(start, "a confidence interval stands before it",
                          "Leave out the one that this row does not need.");
  }
  words.take("ci_low" + suffix, ends[0]);
  words.take("ci_high" + suffix, ends[1]);
  if (level) words.take("ci_level", *level);
  constexpr std::array<std::string_view, 5> effects = {"d", "g", "r", "odds_ratio", "mean_diff"};
  if (one_of(words.last, effects)) words.take("ci_of", {std::string(words.last), ends[0].token});
}

}  // namespace

bool interval(Words& words) {
  const std::size_t start = words.at();
  std::optional<Value> level = level_here(words);
  if (level) words.eat_mark('-');
  if (!name_of_interval(words, level)) return words.back_to(start);
  words.eat_relations();
  const auto ends = words.pair();
  if (!ends) return words.back_to(start);
  take_interval(words, start, level, *ends);
  return true;
}

bool mean_difference(Words& words) {
  constexpr std::array<std::string_view, 8> names = {"md",   "mdiff",      "mdifference", "mean-difference",
                                                     "diff", "difference", "deltam",      "meandiff"};
  constexpr std::array<std::string_view, 3> joins = {"in", "of", "between"};
  const std::size_t start = words.at();
  const std::string name = words.word();
  const std::string next = words.word(1);
  const bool two_words = (name == "mean" || name == "m") && (next == "difference" || next == "diff");
  const bool of_means = name == "difference" && one_of(next, joins) && words.word(2) == "means";
  const bool subtraction = (name == "m1" || name == "mean1") && words.is_mark('-', 1) &&
                           (words.word(2) == "m2" || words.word(2) == "mean2");
  if (!two_words && !of_means && !subtraction && !one_of(name, names)) return false;
  words.skip(of_means || subtraction ? 3 : two_words ? 2 : 1);
  if (!words.relation_here()) return words.back_to(start);
  if (const auto number = words.value(start)) words.take("mean_diff", *number);
  words.last = "mean_diff";
  return true;
}

bool effect_size(Words& words) {
  const std::size_t start = words.at();
  const std::string name = words.word();
  if (name == "r") return statistic_with_df(words, "r");
  std::string_view column;
  if (name == "d" || name == "ds" || name == "dz") column = "d";
  if (name == "g" || name == "gs") column = "g";
  if (name == "or" && words.token()->text == "OR") column = "odds_ratio";
  const bool spelled_out = name == "odds" && words.word(1) == "ratio";
  if (spelled_out) column = "odds_ratio";
  words.skip(spelled_out ? 2 : 1);
  if (column.empty() || !words.relation_here()) return words.back_to(start);
  words.last = column;
  if (const auto number = words.value(start)) words.take(std::string(column), *number);
  return true;
}

}  // namespace steelyard::read
