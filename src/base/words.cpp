// Slips of the keyboard: how far two words are apart, and which known word was probably meant.
#include <algorithm>
#include <string>
#include <vector>

#include "steelyard/base.hpp"

namespace steelyard {

namespace {

// Words longer than this are never slips of ours; it also bounds the work on hostile input.
constexpr std::size_t longest_word = 64;

// What is left of a name when case, blanks and joining marks are ignored: `Mean 1`, `mean-1` and
// `MEAN_1` become `mean1`.
std::string skeleton(std::string_view name) {
  std::string bare;
  for (const char c : name) {
    if (c == ' ' || c == '_' || c == '-' || c == '.' || c == '\t') continue;
    bare += (c >= 'A' && c <= 'Z') ? static_cast<char>(c - 'A' + 'a') : c;
  }
  return bare;
}

bool swapped_pair(std::string_view a, std::string_view b) {
  if (a.size() != b.size()) return false;
  const auto differ = std::mismatch(a.begin(), a.end(), b.begin());
  if (differ.first == a.end() || std::next(differ.first) == a.end()) return false;
  return *differ.first == *std::next(differ.second) && *std::next(differ.first) == *differ.second &&
         std::equal(std::next(differ.first, 2), a.end(), std::next(differ.second, 2));
}

// Short names are one edit away from too many honest labels (`sex` from `se1`), so an edit counts
// only from four letters on; a swapped pair (`ds1`) from three.
bool is_slip(std::string_view bare, std::string_view known) {
  if (bare == known) return true;
  if (known.size() >= 4 && bare.size() >= 4) return edit_distance(bare, known) <= 1;
  return known.size() == 3 && swapped_pair(bare, known);
}

}  // namespace

std::size_t edit_distance(std::string_view a, std::string_view b) {
  const std::size_t width = b.size() + 1;
  std::vector<std::size_t> before(width), last(width), now(width);
  for (std::size_t j = 0; j < width; ++j) last[j] = j;
  for (std::size_t i = 1; i <= a.size(); ++i) {
    now[0] = i;
    for (std::size_t j = 1; j < width; ++j) {
      const std::size_t change = a[i - 1] == b[j - 1] ? 0 : 1;
      now[j] = std::min({last[j] + 1, now[j - 1] + 1, last[j - 1] + change});
      const bool swap = i > 1 && j > 1 && a[i - 1] == b[j - 2] && a[i - 2] == b[j - 1];
      if (swap) now[j] = std::min(now[j], before[j - 2] + 1);
    }
    before.swap(last);
    last.swap(now);
  }
  return last[b.size()];
}

const Column* near_column(std::string_view name) {
  if (name.size() > longest_word || find_column(name) != nullptr) return nullptr;
  const std::string bare = skeleton(name);
  const Column* slip = nullptr;
  for (const Column& column : columns()) {
    const std::string known = skeleton(column.name);
    if (bare == known) return &column;
    if (slip == nullptr && is_slip(bare, known)) slip = &column;
  }
  return slip;
}

std::string_view nearest_word(std::string_view word, std::span<const std::string_view> words) {
  if (word.size() > longest_word) return {};
  std::string_view best;
  std::size_t least = (word.size() <= 4 ? 1 : 2) + 1;
  for (const std::string_view candidate : words) {
    const std::size_t distance = edit_distance(word, candidate);
    if (distance < least) {
      least = distance;
      best = candidate;
    }
  }
  return best;
}

}  // namespace steelyard
