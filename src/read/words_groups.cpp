// Phrases: what groups have: means, spreads, sizes, medians, counts.
#include <fmt/format.h>

#include "read/words.hpp"

namespace steelyard::read {

namespace {

constexpr char plus_minus = '\x02';  // ± in the tokens

// A quantity of a group by the stem of its columns, and the group, 0 when it isn't named.
struct GroupWord {
  std::string_view stem;
  int group = 0;
};

std::optional<GroupWord> group_word(const Words& words) {
  std::string name = words.word();
  if (name.empty() || words.token()->text == "N") return std::nullopt;
  GroupWord found;
  if (name.size() > 1 && (name.back() == '1' || name.back() == '2')) {
    found.group = name.back() - '0';
    name.pop_back();
  }
  constexpr std::array<std::string_view, 4> means = {"m", "mean", "ms", "means"};
  constexpr std::array<std::string_view, 2> sds = {"sd", "sds"};
  constexpr std::array<std::string_view, 4> ses = {"se", "ses", "sem", "sems"};
  constexpr std::array<std::string_view, 4> medians = {"mdn", "mdns", "median", "medians"};
  using namespace std::string_view_literals;
  found.stem = one_of(name, means)           ? "mean"sv
               : one_of(name, sds)           ? "sd"sv
               : one_of(name, ses)           ? "se"sv
               : one_of(name, medians)       ? "median"sv
               : name == "n" || name == "ns" ? "n"sv
                                             : ""sv;
  return found.stem.empty() ? std::nullopt : std::optional<GroupWord>(found);
}

bool is_spread(std::string_view stem) { return stem == "sd" || stem == "se"; }
bool is_center(std::string_view stem) { return stem == "mean" || stem == "median"; }

std::string column(std::string_view stem, int group) { return fmt::format("{}{}", stem, group); }

// `vs. 4.4`, `and 4.4`: the second group's value. Eats up to the number.
bool second_value(Words& words) {
  const std::size_t start = words.at();
  const bool joined =
      words.eat_word("vs") || words.eat_word("versus") || words.eat_word("and") || words.eat_mark('&');
  words.eat_mark('.');
  const bool bare = joined && words.is(TokenKind::number) && words.token()->text.back() != '%' &&
                    !words.is_mark('%', 1) && !words.is_mark('/', 1);
  return bare ? true : words.back_to(start);
}

bool second_value_ahead(Words& words) {
  const std::size_t start = words.at();
  const bool ahead = second_value(words);
  words.back_to(start);
  return ahead;
}

// `30 per group`, `30 in each condition`
bool eat_each(Words& words) {
  constexpr std::array<std::string_view, 6> things = {"group", "groups", "condition",
                                                      "arm",   "cell",   "sample"};
  const std::size_t start = words.at();
  if (words.eat_word("in") || words.eat_word("for")) {
    if (!words.eat_word("each")) return words.back_to(start);
  } else if (!words.eat_word("per") && !words.eat_word("each")) {
    return false;
  }
  if (one_of(words.word(), things)) words.skip();
  return true;
}

void take_for_each(Words& words, const Value& number) {
  words.take("n1", number);
  words.take("n2", number);
}

void detail(Words& words, const GroupWord& named, const Value& number) {
  if (is_spread(named.stem)) words.spread = named.stem;
  if (named.stem == "n" && named.group == 0) words.size_in_brackets = true;
  words.take(column(named.stem, named.group != 0 ? named.group : words.group), number);
}

// One item in the brackets behind a mean; false when it is something else.
bool mean_detail(Words& words, int& bare) {
  const std::size_t from = words.at();
  if (words.is(TokenKind::number)) {
    if (bare == 0 && words.spread.empty()) {
      words.skip();
      words.not_used(from, "it can be a standard deviation or a standard error",
                     "Write it as (SD = …) or (SE = …).");
      ++bare;
      return true;
    }
    if (bare > 1) return false;
    const std::string_view stem = bare++ == 0 ? words.spread : "n";
    if (const auto number = words.number()) detail(words, {stem, 0}, *number);
    return true;
  }
  const auto named = group_word(words);
  if (!named || is_center(named->stem)) return false;
  words.skip();
  if (!words.relation_here()) return words.back_to(from);
  if (const auto number = words.value(from)) detail(words, *named, *number);
  return true;
}

// `(SD = 1.2, n = 30)`, `(1.2)`, `(1.2, 30)`. Brackets with anything else are left to the main loop.
void mean_details(Words& words) {
  const std::size_t start = words.at();
  if (words.is_mark(plus_minus) && words.is(TokenKind::number, 1)) {
    words.skip(2);
    return words.not_used(start, "± can mean a standard deviation or a standard error",
                          "Write it as (SD = …) or (SE = …).");
  }
  if (!words.eat_mark('(')) return;
  int bare = 0;
  while (mean_detail(words, bare)) {
    if (!words.eat_mark(',')) words.eat_mark(';');
  }
  words.eat_mark(')');
}

// `(IQR = 3 to 7)`, `(range 1-9)`, `[Q1-Q3 3, 7]` behind a median.
void median_details(Words& words) {
  const std::size_t start = words.at();
  const bool bracket = words.eat_mark('(') || words.eat_mark('[');
  const bool range = words.eat_word("range");
  const bool quartiles =
      !range &&
      (words.eat_word("iqr") || (words.eat_word("interquartile") && words.eat_word("range")) ||
       (words.eat_word("q1") && (words.eat_mark(',') || words.eat_mark('-')) && words.eat_word("q3")));
  words.eat_relations();
  const auto ends = range || quartiles ? words.pair() : std::nullopt;
  if (!ends) {
    words.back_to(start);
    return;
  }
  if (bracket && !words.eat_mark(')')) words.eat_mark(']');
  words.take(column(range ? "min" : "q1_", words.group), (*ends)[0]);
  words.take(column(range ? "max" : "q3_", words.group), (*ends)[1]);
}

void take_center(Words& words, const GroupWord& named, const Value& number) {
  const bool first = !words.has(column(named.stem, 1));
  words.group = named.group != 0 ? named.group : first ? 1 : 2;
  if (named.group == 0 && !first && words.has(column(named.stem, 2))) {
    return words.fail("as-printed-groups", *number.token,
                      "These words print the means of more than two groups.",
                      "Keep the two groups that are compared.");
  }
  words.take(column(named.stem, words.group), number);
  words.last = named.stem;
  return named.stem == "mean" ? mean_details(words) : median_details(words);
}

void take_spread(Words& words, const GroupWord& named, const Value& number) {
  if (named.group == 0 && words.last == "mean_diff")
    return words.take(fmt::format("{}_diff", named.stem), number);
  const bool of_effect = words.last == "d" || words.last == "g";
  if (named.group == 0 && named.stem == "se" && of_effect) return words.take("se", number);
  int group = named.group != 0 ? named.group : std::max(words.group, 1);
  if (named.group == 0 && words.has(column(named.stem, group))) group = 2;
  words.spread = named.stem;
  words.take(column(named.stem, group), number);
}

void take_size(Words& words, const GroupWord& named, const Value& number) {
  if (named.group != 0) return words.take(column("n", named.group), number);
  if (eat_each(words)) return take_for_each(words, number);
  words.loose_n.push_back(number);
}

void take_statistic(Words& words, const GroupWord& named, const Value& number) {
  if (is_center(named.stem)) return take_center(words, named, number);
  return is_spread(named.stem) ? take_spread(words, named, number) : take_size(words, named, number);
}

// `M (SD) = 5.1 (1.2)`: says beforehand what the brackets hold.
void announced_spread(Words& words) {
  if (!words.is_mark('(') || !words.is_mark(')', 2)) return;
  const std::string name = words.word(1);
  const bool se = name == "se" || name == "sem";
  if (!se && name != "sd") return;
  words.spread = se ? "se" : "sd";
  words.skip(3);
}

}  // namespace

bool group_statistic(Words& words) {
  const std::size_t start = words.at();
  const auto named = group_word(words);
  if (!named) return false;
  const std::string_view spread = words.spread;
  words.skip();
  if (named->stem == "mean") announced_spread(words);
  if (!words.relation_here()) {
    words.spread = spread;
    return words.back_to(start);
  }
  const auto number = words.value(start);
  if (!number) return true;
  // `SDs = 1.2 and 1.1` name both groups even behind both means.
  const bool two = named->group == 0 && !is_center(named->stem) && second_value_ahead(words);
  take_statistic(words, two ? GroupWord{named->stem, 1} : *named, *number);
  if (named->group != 0 || !second_value(words)) return true;
  if (const auto other = words.number()) {
    take_statistic(words, two ? GroupWord{named->stem, 2} : *named, *other);
  }
  return true;
}

bool total_size(Words& words) {
  const std::size_t start = words.at();
  if (words.word() != "n" || words.token()->text != "N" || !words.relation_here(1)) return false;
  words.skip();
  const auto number = words.value(start);
  if (!number) return true;
  if (eat_each(words)) {
    take_for_each(words, *number);
  } else {
    words.take("n_total", *number);
  }
  return true;
}

bool events(Words& words) {
  const bool fraction = words.is(TokenKind::number) && (words.is_mark('/', 1) || words.word(1) == "of");
  if (!fraction || !words.is(TokenKind::number, 2)) return false;
  const int group = words.has("events1") ? 2 : 1;
  if (group == 2 && words.has("events2")) return false;
  words.take(column("events", group), {words.token()->text, words.token()});
  words.take(column("n", group), {words.token(2)->text, words.token(2)});
  words.skip(3);
  return true;
}

void settle_sizes(Words& words) {
  const std::vector<Value>& sizes = words.loose_n;
  if (sizes.size() > 2) {
    words.fail("as-printed-groups", *sizes[2].token, "These words print the sizes of more than two groups.",
               "Keep the two groups that are compared.");
  } else if (sizes.size() == 2) {
    words.take("n1", sizes[0]);
    words.take("n2", sizes[1]);
  } else if (sizes.size() == 1) {
    words.take(words.has("n2") ? "n1" : "n", sizes[0]);
  } else if (words.size_in_brackets && words.has("n1") && !words.has("mean2") && !words.has("n2")) {
    words.rename("n1", "n");  // in the brackets of the only mean: the one sample's size
  }
}

}  // namespace steelyard::read
