// The noncentral t density against the fifty-digit table of tests/oracle/noncentral_t_density.py.
#include <algorithm>
#include <catch2/catch.hpp>
#include <cmath>
#include <limits>
#include <map>
#include <string>
#include <vector>

#include "reference/table.hpp"
#include "steelyard/numeric.hpp"

using steelyard::numeric::add_log_noncentral_t;
using steelyard::numeric::log_noncentral_t_density;

namespace {

struct Point {
  std::string kind;
  double t, df, ncp, log_density;
};

std::vector<Point> points() {
  std::vector<Point> result;
  for (const auto& row : reference::rows("noncentral_t_density.csv")) {
    result.push_back({row.at(0), reference::number(row.at(1)), reference::number(row.at(2)),
                      reference::number(row.at(3)), reference::number(row.at(4))});
  }
  return result;
}

std::string describe(const Point& p, double ours) {
  std::ostringstream out;
  out.precision(17);
  out << p.kind << " t=" << p.t << " df=" << p.df << " ncp=" << p.ncp << " gives " << ours << ", reference "
      << p.log_density;
  return out.str();
}

double ulp(double x) {
  return std::nextafter(std::fabs(x), std::numeric_limits<double>::infinity()) - std::fabs(x);
}

}  // namespace

TEST_CASE("log density keeps twelve digits", "[accuracy]") {
  std::map<std::string, reference::Worst> kinds;
  for (const Point& p : points()) {
    if (p.kind == "wide") {
      continue;
    }
    const double ours = log_noncentral_t_density(p.t, p.df, p.ncp);
    kinds[p.kind].see(std::fabs(ours - p.log_density), 1e-12 * std::max(1.0, std::fabs(p.log_density)),
                      [&] { return describe(p, ours); });
  }
  std::size_t seen = 0;
  for (const auto& [kind, worst] : kinds) {
    INFO(kind << ": " << worst.report());
    CHECK(worst.beyond() == 0);
    seen += worst.seen();
  }
  CHECK(seen >= 3000);
}

TEST_CASE("log density without an effect is right to a few units in the last place", "[accuracy]") {
  reference::Worst worst;
  for (const Point& p : points()) {
    if (p.ncp != 0.0) {
      continue;
    }
    const double ours = log_noncentral_t_density(p.t, p.df, p.ncp);
    worst.see(std::fabs(ours - p.log_density), 4.0 * ulp(p.log_density), [&] { return describe(p, ours); });
  }
  INFO(worst.report());
  CHECK(worst.seen() > 200);
  CHECK(worst.beyond() == 0);
}

TEST_CASE("log density stays finite up to a noncentrality of a million", "[accuracy]") {
  // The stated error beyond the promised range: eight roundings of the terms that cancel.
  reference::Worst worst;
  for (const Point& p : points()) {
    if (p.kind != "wide") {
      continue;
    }
    const double ours = log_noncentral_t_density(p.t, p.df, p.ncp);
    REQUIRE(std::isfinite(ours));
    const double scale = p.ncp * p.ncp + std::fabs(p.log_density);
    worst.see(std::fabs(ours - p.log_density), 8.0 * std::numeric_limits<double>::epsilon() * scale,
              [&] { return describe(p, ours); });
  }
  INFO(worst.report());
  CHECK(worst.seen() >= 300);
  CHECK(worst.beyond() == 0);
}

TEST_CASE("the kernel over many means agrees with the table", "[accuracy]") {
  // One mean at a time and in a block, through the noncentrality as a multiple of the mean.
  reference::Worst worst;
  for (const Point& p : points()) {
    if (p.kind == "wide") {
      continue;
    }
    const double root_n = 4.0;
    const std::vector<double> means(9, p.ncp / root_n);  // exact: a power of two
    std::vector<double> sums(means.size(), 0.0);
    add_log_noncentral_t(p.t, p.df, root_n, means, sums);
    for (const double ours : sums) {
      worst.see(std::fabs(ours - p.log_density), 1e-12 * std::max(1.0, std::fabs(p.log_density)),
                [&] { return describe(p, ours); });
    }
  }
  INFO(worst.report());
  CHECK(worst.beyond() == 0);
}
