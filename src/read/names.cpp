#include <algorithm>
#include <map>
#include <string>
#include <vector>

#include <fmt/format.h>

#include "read/cells.hpp"

namespace steelyard::read {

namespace {

void check_twice(const std::vector<std::string>& names, const std::vector<Place>& places,
                 Problems& problems) {
  std::map<std::string_view, std::size_t> first;
  for (std::size_t i = 0; i < names.size(); ++i) {
    const auto [seen, is_new] = first.emplace(names[i], i);
    if (is_new || names[i].empty()) continue;
    problems.error("duplicate-column", places[i],
                   fmt::format("The column {} stands twice in the header, as columns {} and {}.",
                               quoted(names[i]), seen->second + 1, i + 1),
                   "Rename or remove one of them.");
  }
}

void check_near(const std::string& name, const Place& place, Problems& problems) {
  const Column* near = near_column(name);
  if (near == nullptr) return;
  problems.caution(
      "near-column", place,
      fmt::format("The column {} is kept as a label, but it looks like \"{}\".", quoted(name), near->name),
      fmt::format("Call it \"{}\" if it holds the {}.", near->name, near->meaning));
}

std::string list_of(const std::vector<std::string>& names) {
  std::string list;
  for (std::size_t i = 0; i < std::min<std::size_t>(names.size(), 6); ++i) {
    list += (i == 0 ? "" : ", ") + quoted(names[i]);
  }
  return names.size() > 6 ? list + ", …" : list;
}

}  // namespace

void check_names(const std::vector<std::string>& names, const std::vector<Place>& places,
                 Problems& problems) {
  const bool any_known = std::any_of(names.begin(), names.end(),
                                     [](const std::string& name) { return find_column(name) != nullptr; });
  if (!any_known) {
    problems.error(
        "no-known-column", places.empty() ? Place{} : places.front(),
        fmt::format("None of the columns is known: {}.", list_of(names)),
        "The first line must name the columns, for example study,t,n1,n2; docs/formats.md lists them.");
  }
  check_twice(names, places, problems);
  for (std::size_t i = 0; i < names.size(); ++i) check_near(names[i], places[i], problems);
}

}  // namespace steelyard::read
