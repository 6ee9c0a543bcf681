// A line as a paper prints it, `t(28) = 2.20, p = .036`, into cells of known columns.
#include <fmt/format.h>

#include "read/text.hpp"
#include "read/words.hpp"

namespace steelyard {

namespace read {

namespace {

constexpr std::size_t longest_words = 4000;  // bytes; a paragraph, not a paper

// In the order in which they are tried at each place. A new form is one function and one line here.
constexpr bool (*phrases[])(Words&) = {t_test,          f_test,          p_value,         tails,
                                       interval,        mean_difference, group_statistic, effect_size,
                                       plain_statistic, total_size,      events,          unusable};

// Marks between phrases, and words that say nothing by themselves.
bool filler(const Words& words) {
  constexpr std::array<std::string_view, 11> empty = {"and",     "with",      "vs",       "versus",
                                                      "while",   "whereas",   "cohen's",  "hedges",
                                                      "hedges'", "student's", "pearson's"};
  if (!words.is(TokenKind::mark)) return one_of(words.word(), empty);
  return std::string_view(",;:.()[]&\"'").find(words.token()->text.front()) != std::string_view::npos;
}

bool any_phrase(Words& words) {
  return std::any_of(std::begin(phrases), std::end(phrases), [&](auto* phrase) { return phrase(words); });
}

}  // namespace

}  // namespace read

Outcome<std::vector<NamedCell>> read_as_printed(std::string_view text, const NumberStyle& style,
                                                const Place& where) {
  using namespace read;
  if (text.size() > longest_words) {
    return {std::nullopt,
            {{Severity::error, "as-printed-too-long", where,
              fmt::format("These words are {} bytes long; at most {} are read.", with_commas(text.size()),
                          with_commas(longest_words)),
              "Copy only the result, not the page."}}};
  }
  Words words(text, style, where);
  while (!words.at_end()) {
    const std::size_t start = words.at();
    if (any_phrase(words)) continue;
    if (!filler(words)) words.leave(start);
    words.skip();
  }
  settle_sizes(words);
  return words.finish();
}

}  // namespace steelyard
