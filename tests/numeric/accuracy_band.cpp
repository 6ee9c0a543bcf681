// Band probabilities of the noncentral t against the table of tests/oracle/noncentral_t_band.py.
#include <algorithm>
#include <catch2/catch.hpp>
#include <cmath>
#include <limits>
#include <map>
#include <string>
#include <vector>

#include "reference/table.hpp"
#include "steelyard/numeric.hpp"

using namespace steelyard::numeric;

namespace {

struct Band {
  std::string kind;
  double low, high, df, ncp, log_probability;
};

std::vector<Band> bands() {
  std::vector<Band> result;
  for (const auto& row : reference::rows("noncentral_t_band.csv")) {
    result.push_back({row.at(0), reference::number(row.at(1)), reference::number(row.at(2)),
                      reference::number(row.at(3)), reference::number(row.at(4)),
                      reference::number(row.at(5))});
  }
  return result;
}

std::string describe(const Band& b, double ours) {
  std::ostringstream out;
  out.precision(17);
  out << b.kind << " low=" << b.low << " high=" << b.high << " df=" << b.df << " ncp=" << b.ncp << " gives "
      << ours << ", reference " << b.log_probability;
  return out.str();
}

double allowed(const Band& b) { return 1e-10 * std::max(1.0, std::fabs(b.log_probability)); }

}  // namespace

TEST_CASE("log band probabilities keep ten digits", "[accuracy]") {
  std::map<std::string, reference::Worst> kinds;
  for (const Band& b : bands()) {
    const double ours = log_noncentral_t_band(b.low, b.high, b.df, b.ncp);
    kinds[b.kind].see(std::fabs(ours - b.log_probability), allowed(b), [&] { return describe(b, ours); });
  }
  std::size_t seen = 0;
  for (const auto& [kind, worst] : kinds) {
    INFO(kind << ": " << worst.report());
    CHECK(worst.beyond() == 0);
    seen += worst.seen();
  }
  CHECK(seen >= 2000);
}

TEST_CASE("both log tails keep ten digits", "[accuracy]") {
  reference::Worst worst;
  for (const Band& b : bands()) {
    const bool lower = std::isinf(b.low);
    if (!lower && !std::isinf(b.high)) {
      continue;
    }
    const double ours =
        lower ? log_noncentral_t_cdf(b.high, b.df, b.ncp) : log_noncentral_t_upper(b.low, b.df, b.ncp);
    worst.see(std::fabs(ours - b.log_probability), allowed(b), [&] { return describe(b, ours); });
  }
  INFO(worst.report());
  CHECK(worst.seen() >= 1000);
  CHECK(worst.beyond() == 0);
}

TEST_CASE("swapping the sides of a band mirrors it", "[accuracy]") {
  reference::Worst worst;
  for (const Band& b : bands()) {
    const double ours = log_noncentral_t_band(b.low, b.high, b.df, b.ncp);
    const double mirrored = log_noncentral_t_band(-b.high, -b.low, b.df, -b.ncp);
    worst.see(std::fabs(ours - mirrored), 2.0 * allowed(b), [&] { return describe(b, mirrored); });
  }
  INFO(worst.report());
  CHECK(worst.beyond() == 0);
}

TEST_CASE("ends of a band that leave nothing or everything", "[accuracy]") {
  const double inf = std::numeric_limits<double>::infinity();
  CHECK(log_noncentral_t_band(2.0, 2.0, 10.0, 1.0) == -inf);
  CHECK(log_noncentral_t_band(3.0, 2.0, 10.0, 1.0) == -inf);
  CHECK(log_noncentral_t_band(-inf, inf, 10.0, 1.0) == 0.0);
  CHECK(log_noncentral_t_cdf(inf, 10.0, 1.0) == 0.0);
  CHECK(log_noncentral_t_cdf(-inf, 10.0, 1.0) == -inf);
  CHECK(log_noncentral_t_upper(inf, 10.0, 1.0) == -inf);
}
