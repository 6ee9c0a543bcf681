#include "rebuild/groups.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <cmath>

namespace steelyard::rebuilding {

namespace {

constexpr std::array<Col, 6> sizes = {Col::n1, Col::n2, Col::n3, Col::n4, Col::n5, Col::n6};
constexpr std::array<Col, 6> means = {Col::mean1, Col::mean2, Col::mean3, Col::mean4, Col::mean5, Col::mean6};
constexpr std::array<Col, 6> sds = {Col::sd1, Col::sd2, Col::sd3, Col::sd4, Col::sd5, Col::sd6};
constexpr std::array<Col, 6> ses = {Col::se1, Col::se2, Col::se3, Col::se4, Col::se5, Col::se6};

// "1+2" as {1, 2}; nothing for anything else.
std::optional<std::vector<int>> side(std::string_view text) {
  std::vector<int> groups;
  bool number_next = true;
  for (const char c : text) {
    if (c == ' ') continue;
    if (number_next ? c < '1' || c > '6' : c != '+') return std::nullopt;
    if (number_next) groups.push_back(c - '0');
    number_next = !number_next;
  }
  if (number_next) return std::nullopt;
  return groups;
}

bool disjoint(const Comparison& c) {
  std::vector<int> all = c.first;
  all.insert(all.end(), c.second.begin(), c.second.end());
  std::sort(all.begin(), all.end());
  return std::adjacent_find(all.begin(), all.end()) == all.end();
}

bool need(Numbers& x, Col col, int group) {
  if (x.has(col)) return true;
  x.refuse(Col::compare, "group-incomplete",
           fmt::format("`compare` asks for group {}, but {} is empty.", group, name(col)),
           fmt::format("Fill {}.", name(col)));
  return false;
}

std::optional<Group> single(Numbers& x, int number) {
  const auto i = static_cast<std::size_t>(number - 1);
  if (!need(x, sizes[i], number) || !need(x, means[i], number)) return std::nullopt;
  Group group{x[sizes[i]], x[means[i]], 0.0};
  if (!x.has(sds[i]) && x.has(ses[i])) {
    group.sd = x[ses[i]] * std::sqrt(group.n);
    return group;
  }
  if (!need(x, sds[i], number)) return std::nullopt;
  group.sd = x[sds[i]];
  return group;
}

}  // namespace

std::optional<Comparison> comparison_of(Numbers& x) {
  x.mark(Col::compare);
  const std::string_view text = x.facts().text(Col::compare);
  const std::size_t dash = text.find('-');
  Comparison result;
  if (dash != std::string_view::npos) {
    auto first = side(text.substr(0, dash));
    auto second = side(text.substr(dash + 1));
    if (first && second) result = {std::move(*first), std::move(*second)};
  }
  if (!result.first.empty() && disjoint(result)) return result;
  x.refuse(Col::compare, "comparison-unreadable",
           fmt::format("\"{}\" does not say which groups to compare.", text),
           "Write 1-3 to set group 1 against group 3, or 1+2-3 to merge groups 1 and 2 first.");
  return std::nullopt;
}

std::optional<double> size_of(Numbers& x, const std::vector<int>& groups) {
  double total = 0.0;
  for (const int group : groups) {
    const Col col = sizes[static_cast<std::size_t>(group - 1)];
    if (!need(x, col, group)) return std::nullopt;
    total += x[col];
  }
  return total;
}

Group merge(const Group& a, const Group& b) {
  const double n = a.n + b.n;
  const double between = a.n * (b.n / n) * (a.mean - b.mean) * (a.mean - b.mean);
  return {n, (a.n * a.mean + b.n * b.mean) / n,
          std::sqrt(((a.n - 1.0) * a.sd * a.sd + (b.n - 1.0) * b.sd * b.sd + between) / (n - 1.0))};
}

std::optional<Group> merged(Numbers& x, const std::vector<int>& groups) {
  std::optional<Group> result;
  for (const int number : groups) {
    const auto next = single(x, number);
    if (!next) return std::nullopt;
    result = result ? merge(*result, *next) : *next;
  }
  return result;
}

bool has_third_group(const Numbers& x) { return x.present(Col::n3) || x.present(Col::mean3); }

}  // namespace steelyard::rebuilding
