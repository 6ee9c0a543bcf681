#include "rebuild/missing.hpp"

#include <fmt/format.h>
#include <fmt/ranges.h>

#include <algorithm>

#include "rebuild/route.hpp"

namespace steelyard::rebuilding {

namespace {

constexpr std::size_t most_offers = 5;

std::string joined(const std::vector<std::string>& words, std::string_view last) {
  if (words.size() < 2) return words.empty() ? "" : words.front();
  const std::vector<std::string> head(words.begin(), words.end() - 1);
  return fmt::format("{} {} {}", fmt::join(head, ", "), last, words.back());
}

std::vector<std::string> missing_of(const Route& route, const Numbers& x) {
  std::vector<std::string> result;
  for (const Col col : route.core) {
    if (!x.has(col)) result.emplace_back(name(col));
  }
  return result;
}

std::vector<std::string> given(const Numbers& x) {
  std::vector<std::string> result;
  for (std::size_t i = 0; i < col_count; ++i) {
    const Col col = static_cast<Col>(i);
    if (x.has(col) && col != Col::year) result.emplace_back(name(col));
  }
  return result;
}

bool within(const std::vector<std::string>& part, const std::vector<std::string>& whole) {
  return std::all_of(part.begin(), part.end(), [&](const std::string& word) {
    return std::find(whole.begin(), whole.end(), word) != whole.end();
  });
}

// Routes that nobody would fill cells for: of one sample where two groups are given, or variants of a plainer
// route.
bool worth_offering(const Route& route, const Numbers& x) {
  const auto has = [&](Col col) {
    return std::find(route.core.begin(), route.core.end(), col) != route.core.end();
  };
  if (has(Col::compare) || has(Col::welch)) return false;
  return !(x.has(Col::n2) && has(Col::mean1) && !has(Col::mean2));
}

// The smallest additions that open a route, those that build on what the row has first.
std::vector<std::string> offers(const Numbers& x) {
  struct Offer {
    bool builds_on;
    std::vector<std::string> missing;
  };
  std::vector<Offer> all;
  for (const Route& route : registry()) {
    auto missing = missing_of(route, x);
    if (missing.empty() || !worth_offering(route, x)) continue;
    const bool builds_on = missing.size() < route.core.size();
    const bool known =
        std::any_of(all.begin(), all.end(), [&](const Offer& o) { return within(o.missing, missing); });
    if (!known) all.push_back({builds_on, std::move(missing)});
  }
  std::stable_sort(all.begin(), all.end(), [](const Offer& a, const Offer& b) {
    if (a.builds_on != b.builds_on) return a.builds_on;
    return a.builds_on && a.missing.size() < b.missing.size();
  });
  std::vector<std::string> result;
  for (std::size_t i = 0; i < std::min(all.size(), most_offers); ++i)
    result.push_back(joined(all[i].missing, "and"));
  return result;
}

}  // namespace

Diagnostic what_is_missing(const Numbers& x) {
  const auto has = given(x);
  std::string what =
      has.empty() ? "The row has no numbers to rebuild a test from."
                  : fmt::format("The row has {}, and no test can be rebuilt from that.", joined(has, "and"));
  const bool sizes = x.has(Col::n1) || x.has(Col::n) || x.has(Col::df);
  std::string remedy =
      fmt::format("Any of these would do: {}{}; docs/formats.md lists all routes.",
                  fmt::join(offers(x), "; "), sizes ? "" : ", each with n1 and n2 (or n, or df)");
  return {Severity::error, "cannot-rebuild", x.facts().row_place(), std::move(what), std::move(remedy)};
}

}  // namespace steelyard::rebuilding
