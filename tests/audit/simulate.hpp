// Honest rows: scores are drawn, tested as authors do, and printed as papers do.
#pragma once

#include <cstdint>
#include <random>
#include <string>
#include <utility>
#include <vector>

namespace simulate {

using Random = std::mt19937_64;

/// A row as column and cell.
struct Row {
  std::string form;
  std::vector<std::pair<std::string, std::string>> cells;

  [[nodiscard]] const std::string* cell(const std::string& column) const;
  void set(const std::string& column, const std::string& text);
};

/// How the author prints: half up, half to even, or cut off; `plain` authors use Student's test, pooled SDs,
/// t intervals and round half up.
struct Author {
  bool plain = false;
  int rounding = 0;
};

[[nodiscard]] std::string print(double value, int decimals, int rounding);

/// The number of forms, and one honest row of a form.
[[nodiscard]] std::size_t forms();
[[nodiscard]] Row honest_row(std::size_t form, Random& random, bool plain);

/// Header and row as CSV.
[[nodiscard]] std::string csv(const Row& row);

}  // namespace simulate
