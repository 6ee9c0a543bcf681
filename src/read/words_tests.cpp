// Phrases: test statistics and p values.
#include <fmt/format.h>

#include "read/unusable.hpp"
#include "read/words.hpp"

namespace steelyard::read {

namespace {

// `t28`: a letter with its degrees of freedom as a subscript.
bool has_subscript(const std::string& word, char letter) {
  return word.size() > 1 && word.front() == letter &&
         word.find_first_not_of("0123456789", 1) == std::string::npos;
}

// With a decimal comma `(1,58)` arrives as one number.
void split_pair(Words& words, std::vector<Value>& df) {
  const Token& number = *words.token();
  words.skip();
  const std::size_t comma = number.text.find(',', 1);
  df.push_back({number.text.substr(0, comma), &number});
  if (comma != std::string::npos) df.push_back({number.text.substr(comma + 1), &number});
}

// The two degrees of freedom of F, in brackets or as subscripts.
bool two_df(Words& words, std::vector<Value>& df) {
  const bool bracket = df.empty() && words.eat_mark('(');
  if (!bracket && df.empty()) return true;
  while (df.size() < 2) {
    if (words.is(TokenKind::number)) {
      split_pair(words, df);
    } else if (!words.eat_mark(',') && !words.eat_mark(';')) {
      return false;
    }
  }
  return df.size() == 2 && (!bracket || words.eat_mark(')'));
}

// What stands in the brackets of t or r: the degrees of freedom, perhaps the sample size.
struct InBrackets {
  std::optional<Value> df, total;
};

std::optional<InBrackets> in_brackets(Words& words) {
  InBrackets found;
  if (words.eat_word("df") && words.is(TokenKind::relation)) words.skip();
  found.df = words.number();
  if (!found.df) return std::nullopt;
  if (words.is_mark(',') && words.word(1) == "n" && words.is(TokenKind::relation, 2)) {
    words.skip(3);
    found.total = words.number();
  }
  if (!words.eat_mark(')')) return std::nullopt;
  return found;
}

}  // namespace

// `t(28) = 2.20`, `t28 = 2.20`, `t(28, N = 30) = 2.20`; the same for r.
bool statistic_with_df(Words& words, std::string_view letter) {
  const std::size_t start = words.at();
  const std::string name = words.word();
  std::optional<InBrackets> brackets = InBrackets{};
  if (has_subscript(name, letter.front())) {
    brackets->df = Value{name.substr(1), words.token()};
  } else if (name != letter) {
    return false;
  }
  words.skip();
  if (!brackets->df && words.eat_mark('(')) brackets = in_brackets(words);
  if (!brackets || !words.relation_here()) return words.back_to(start);
  if (brackets->df) words.take("df", *brackets->df);
  if (brackets->total) words.take("n_total", *brackets->total);
  if (const auto number = words.value(start)) words.take(std::string(letter), *number);
  words.last = letter;
  return true;
}

bool t_test(Words& words) { return statistic_with_df(words, "t"); }

bool f_test(Words& words) {
  const std::size_t start = words.at();
  const std::string name = words.word();
  std::vector<Value> df;
  if (has_subscript(name, 'f')) {
    df.push_back({name.substr(1), words.token()});
  } else if (name != "f") {
    return false;
  }
  words.skip();
  if (!two_df(words, df) || !words.relation_here()) return words.back_to(start);
  if (df.size() == 2) {
    words.take("df1", df[0]);
    words.take("df", df[1]);
  }
  if (const auto number = words.value(start)) words.take("f", *number);
  words.last = "f";
  return true;
}

bool p_value(Words& words) {
  const std::size_t start = words.at();
  if (words.word() == "ns" && !words.is(TokenKind::relation, 1)) {
    words.take("p", {"ns", words.token()});
    words.skip();
    return true;
  }
  constexpr std::array<std::string_view, 4> names = {"p", "p-value", "p-values", "ps"};
  if (!one_of(words.word(), names)) return false;
  words.skip();
  if (!words.eat_word("value")) words.eat_word("values");
  const std::size_t ns = words.is(TokenKind::relation) ? 1 : 0;
  if (words.word(ns) == "ns") {
    words.take("p", {"ns", words.token(ns)});
    words.skip(ns + 1);
    return true;
  }
  if (!words.relation_here()) return words.back_to(start);
  if (const auto number = words.value(start)) words.take("p", *number);
  return true;
}

bool tails(Words& words) {
  constexpr std::array<std::string_view, 2> kinds = {"tailed", "sided"};
  const auto take = [&](const char* how_many, std::size_t tokens) {
    words.take("tails", {how_many, words.token()});
    words.skip(tokens);
    return true;
  };
  if (words.is(TokenKind::number)) {  // `1-tailed`
    const std::string& digits = words.token()->text;
    const bool said =
        (digits == "1" || digits == "2") && words.is_mark('-', 1) && one_of(words.word(2), kinds);
    return said && take(digits == "1" ? "1" : "2", 3);
  }
  const std::string name = words.word();
  if (name == "one-tailed" || name == "one-sided") return take("1", 1);
  if (name == "two-tailed" || name == "two-sided") return take("2", 1);
  if ((name == "one" || name == "two") && one_of(words.word(1), kinds))
    return take(name == "one" ? "1" : "2", 2);
  return false;
}

bool plain_statistic(Words& words) {
  constexpr std::array<std::string_view, 3> welch = {"welch", "welch's", "welchs"};
  const std::size_t start = words.at();
  const std::string name = words.word();
  if (one_of(name, welch)) {
    words.take("welch", {"yes", words.token()});
    words.skip();
    return true;
  }
  if ((name != "df" && name != "alpha") || !words.relation_here(1)) return false;
  words.skip();
  if (const auto number = words.value(start)) words.take(name, *number);
  return true;
}

bool unusable(Words& words) {
  const std::size_t start = words.at();
  const Unusable* entry = find_unusable(words.word());
  if (entry == nullptr) return false;
  words.skip();
  if (words.eat_mark('(')) {
    while (!words.at_end() && !words.is_mark(')')) words.skip();
    words.eat_mark(')');
  }
  if (!words.is(TokenKind::relation)) return words.back_to(start);
  words.skip();
  if (words.is(TokenKind::number) || words.is(TokenKind::broken)) words.skip();
  words.not_used(start, fmt::format("{} gives no t by itself", entry->name), std::string(entry->remedy));
  words.last = {};
  return true;
}

}  // namespace steelyard::read
