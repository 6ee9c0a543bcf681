// Priors against the table of tests/oracle/priors.py (numerical integrals of the densities, mpmath).
#include <algorithm>
#include <catch2/catch.hpp>
#include <cmath>
#include <map>
#include <string>
#include <vector>

#include "reference/table.hpp"
#include "steelyard/model.hpp"

using namespace steelyard;

namespace {

// "0.375 0.125 3" as written in the grammar.
std::string call(const std::string& family, std::string parameters) {
  for (std::size_t at = 0; (at = parameters.find(' ', at)) != std::string::npos; at += 2) {
    parameters.replace(at, 1, ", ");
  }
  return family + "(" + parameters + ")";
}

Direction direction(const std::string& text) {
  if (text == "greater") return Direction::greater;
  return text == "less" ? Direction::less : Direction::either;
}

template <class Prior>
void see(std::map<std::string, reference::Worst>& worst, const Prior& prior,
         const std::vector<std::string>& row) {
  const double x = reference::number(row.at(4));
  const auto where = [&] { return call(row.at(1), row.at(2)) + " " + row.at(3) + " at " + row.at(4); };
  const double expected = reference::number(row.at(5));
  const double deep = 1e-15 * std::abs(expected);
  worst["log density"].see(std::abs(log_density(prior, x) - expected), 4e-15 + 4.0 * deep, where);
  const double lower = reference::number(row.at(6));
  const double upper = reference::number(row.at(7));
  worst["lower, absolute"].see(std::abs(cdf(prior, x) - lower), 2e-14, where);
  worst["upper, absolute"].see(std::abs(upper_cdf(prior, x) - upper), 2e-14, where);
  // The smaller tail keeps its relative accuracy.
  if (lower > 0.0) worst["lower, relative"].see(std::abs(cdf(prior, x) / lower - 1.0), 1e-10, where);
  if (upper > 0.0) worst["upper, relative"].see(std::abs(upper_cdf(prior, x) / upper - 1.0), 1e-10, where);
}

}  // namespace

TEST_CASE("priors agree with integrals of their densities", "[accuracy]") {
  std::map<std::string, reference::Worst> worst;
  std::size_t cut_rows = 0;
  for (const auto& row : reference::rows("priors.csv")) {
    const std::string text = call(row.at(1), row.at(2));
    if (row.at(0) == "effect") {
      auto prior = parse_effect_prior(text);
      REQUIRE(prior.ok());
      prior.value->direction = direction(row.at(3));
      cut_rows += prior.value->direction != Direction::either ? 1 : 0;
      see(worst, *prior.value, row);
    } else {
      const auto prior = parse_spread_prior(text);
      REQUIRE(prior.ok());
      see(worst, *prior.value, row);
    }
  }
  for (const auto& [what, result] : worst) {
    INFO(what << ": " << result.report());
    CHECK(result.beyond() == 0);
  }
  CHECK(worst["log density"].seen() >= 390);
  CHECK(cut_rows >= 100);
}
