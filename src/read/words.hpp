// What the phrases of a paper's line have in common: looking at tokens, taking cells, complaining.
#pragma once

#include <algorithm>
#include <array>
#include <cstddef>
#include <optional>
#include <string>
#include <string_view>
#include <utility>
#include <vector>

#include "read/problems.hpp"
#include "read/tokens.hpp"
#include "steelyard/read.hpp"

namespace steelyard::read {

/// A number with its relation, `2.20` or `<.05`, and the token that carries it.
struct Value {
  std::string text;
  const Token* token = nullptr;
};

template <std::size_t N>
bool one_of(std::string_view word, const std::array<std::string_view, N>& words) {
  return std::find(words.begin(), words.end(), word) != words.end();
}

/// A line on its way into cells: a cursor over its tokens and what was found so far.
class Words {
 public:
  Words(std::string_view source, const NumberStyle& style, const Place& where);

  // -- looking; `ahead` counts tokens from the cursor
  [[nodiscard]] bool at_end() const { return at_ >= tokens_.size(); }
  [[nodiscard]] std::size_t at() const { return at_; }
  [[nodiscard]] const Token* token(std::size_t ahead = 0) const;
  [[nodiscard]] bool is(TokenKind kind, std::size_t ahead = 0) const;
  [[nodiscard]] bool is_mark(char mark, std::size_t ahead = 0) const;
  [[nodiscard]] std::string word(std::size_t ahead = 0) const;  ///< lower case, "" for another token
  /// `= 2.20`, `< .05`, `of 0.61`
  [[nodiscard]] bool relation_here(std::size_t ahead = 0) const;
  /// The source from a token to before another, for messages.
  [[nodiscard]] std::string_view slice(std::size_t from, std::size_t to) const;

  // -- moving
  void skip(std::size_t count = 1) { at_ += count; }
  /// Puts the cursor back and returns false: "these words are something else".
  bool back_to(std::size_t start);
  bool eat_mark(char mark);
  bool eat_word(std::string_view text);
  /// Relation signs, colons and commas, as between `CI` and its limits.
  void eat_relations();
  /// A number here. Where its comma may stand between thousands it is asked about.
  std::optional<Value> number();
  /// A relation and the number behind it; complains when that isn't a number. `start` is where the
  /// phrase began.
  std::optional<Value> value(std::size_t start);
  /// `[a, b]`, `(a; b)`, `a to b`, `a - b`
  std::optional<std::array<Value, 2>> pair();

  // -- taking
  /// Text as it stands goes into a cell of that column; the same text twice is taken once.
  void take(std::string column, const Value& value);
  [[nodiscard]] bool has(std::string_view column) const { return find(column) != nullptr; }
  void rename(std::string_view from, std::string_view to);
  void fail(const char* code, const Token& token, std::string what, std::string remedy);
  /// A caution that quotes the tokens from `start` to the cursor.
  void not_used(std::size_t start, std::string_view why, std::string remedy);
  /// The token at `index` was not understood.
  void leave(std::size_t index);
  Outcome<std::vector<NamedCell>> finish();

  // -- what later phrases need to know of earlier ones
  std::string_view last;          ///< the statistic before: an interval or a standard error belongs to it
  int group = 0;                  ///< the group whose mean came last
  std::string_view spread;        ///< "sd" or "se": what a bare number in brackets after a mean is
  bool size_in_brackets = false;  ///< a size stood in the brackets behind a mean, without a number
  std::vector<Value> loose_n;     ///< sizes that name no group

 private:
  [[nodiscard]] const NamedCell* find(std::string_view column) const;
  [[nodiscard]] Place place_of(const Token& token) const;
  bool set_number(NamedCell& cell, const Column& column, const Token& token);
  void report_left();

  std::string_view source_;
  NumberStyle style_;
  Place where_;
  std::vector<Token> tokens_;
  std::size_t at_ = 0;
  Problems problems_;
  std::vector<NamedCell> cells_;
  std::vector<std::pair<std::size_t, std::size_t>> left_;
};

// Each phrase returns false, with the cursor where it was, when the words are something else.

bool t_test(Words& words);           ///< `t(28) = 2.20`, `t28 = 2.20`
bool f_test(Words& words);           ///< `F(1, 58) = 4.41`
bool p_value(Words& words);          ///< `p = .036`, `p < .05`, `n.s.`
bool tails(Words& words);            ///< `one-tailed`, `1-tailed`
bool plain_statistic(Words& words);  ///< `df = 28`, `alpha = .01`, `Welch's`
bool unusable(Words& words);         ///< `χ²(1) = 3.9`

bool interval(Words& words);         ///< `95% CI [0.1, 1.1]`
bool mean_difference(Words& words);  ///< `mean difference = 0.7`
bool effect_size(Words& words);      ///< `d = 0.61`, `g`, `r(28) = .45`, `OR = 2.1`

bool group_statistic(Words& words);  ///< `M = 5.1 (SD = 1.2) vs. 4.4 (1.1)`, `n1 = 30`
bool total_size(Words& words);       ///< `N = 60`
bool events(Words& words);           ///< `12/30 vs. 20/31`
/// At the end: to whom the sizes belong that named no group.
void settle_sizes(Words& words);

}  // namespace steelyard::read
