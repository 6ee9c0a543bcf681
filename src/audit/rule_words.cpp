// The paper's own words (as_printed) against the row's cells.
#include <fmt/format.h>

#include "audit/rule.hpp"

namespace steelyard::auditing {

namespace {

constexpr std::string_view id = "words-against-cells";

bool same(const Cell& own, const Cell& words) {
  if (!own.printed.present() || !words.printed.present()) return own.text == words.text;
  if (own.printed.relation == Relation::not_significant ||
      words.printed.relation == Relation::not_significant)
    return true;
  return meet(honest(own.printed), honest(words.printed));
}

// p is never negative, but a size printed without its sign is common for the others.
bool same_size(const Cell& own, const Cell& words) {
  return own.printed.has_value() && words.printed.has_value() &&
         meet(size(honest(own.printed)), size(honest(words.printed)));
}

void check(const RowView& row) {
  for (std::size_t i = 0; i < rebuilding::col_count; ++i) {
    const Col col = static_cast<Col>(i);
    const Cell* own = row.x.facts().own(col);
    const Cell* words = row.x.facts().words(col);
    if (own == nullptr || words == nullptr || same(*own, *words)) continue;
    const bool sign_only = same_size(*own, *words);
    row.report(id, sign_only ? Grade::changes_the_verdict : Grade::impossible,
               fmt::format("The paper's words give {} = {}, but the cell says {}.", name(col), words->text,
                           own->text),
               "Correct the one that was copied wrongly.");
  }
}

}  // namespace

Rule rule_words() { return {{id, "cells agree with as_printed", "arithmetic"}, check}; }

}  // namespace steelyard::auditing
