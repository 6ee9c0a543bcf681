// One study's likelihood with its own effect integrated out, against that integral done explicitly.
#include <algorithm>
#include <catch2/catch.hpp>
#include <cmath>
#include <limits>
#include <map>
#include <string>

#include "reference/table.hpp"
#include "steelyard/model.hpp"

using namespace steelyard;

namespace {

struct Point {
  std::string kind;
  double t, df, n, low, high, mean, spread, log_likelihood;
};

double number_or_zero(const std::string& text) { return text.empty() ? 0.0 : reference::number(text); }

std::vector<Point> points() {
  std::vector<Point> result;
  for (const auto& row : reference::rows("closed_form.csv")) {
    result.push_back({row.at(0), number_or_zero(row.at(1)), number_or_zero(row.at(2)),
                      number_or_zero(row.at(3)), number_or_zero(row.at(4)), number_or_zero(row.at(5)),
                      number_or_zero(row.at(6)), number_or_zero(row.at(7)), number_or_zero(row.at(8))});
  }
  return result;
}

Evidence evidence_of(const Point& p) {
  if (p.kind == "band") return BandT{{{p.low, p.high}}, p.df, p.n};
  if (p.kind == "normal" || p.kind == "folded_normal") return NormalEstimate{p.t, p.df, p.kind != "normal"};
  return ExactT{p.t, p.df, p.n, p.kind == "folded"};
}

/// Twelve digits (bands ten), and the rounding of the terms that cancel: 8ε(λ² + |log L|).
double allowed(const Point& p) {
  const double digits = p.kind == "band" ? 1e-10 : 1e-12;
  const double size = p.n * p.mean * p.mean / (1.0 + p.n * p.spread * p.spread) + std::fabs(p.log_likelihood);
  return std::max(digits * std::max(1.0, std::fabs(p.log_likelihood)),
                  8.0 * std::numeric_limits<double>::epsilon() * size);
}

std::string describe(const Point& p, double ours) {
  std::ostringstream out;
  out.precision(17);
  out << p.kind << " t=" << p.t << " df=" << p.df << " n=" << p.n << " low=" << p.low << " high=" << p.high
      << " mean=" << p.mean << " spread=" << p.spread << " gives " << ours << ", reference "
      << p.log_likelihood;
  return out.str();
}

}  // namespace

TEST_CASE("the closed form equals the integral over the study's own effect", "[accuracy]") {
  std::map<std::string, reference::Worst> kinds;
  for (const Point& p : points()) {
    Likelihood study;
    study.evidence = evidence_of(p);
    const double one = log_likelihood(study, p.mean, p.spread);
    kinds[p.kind].see(std::fabs(one - p.log_likelihood), allowed(p), [&] { return describe(p, one); });
    // And as the pool asks for it: many means at once.
    const std::vector<double> means(7, p.mean);
    std::vector<double> sums(means.size(), 0.0);
    add_log_likelihood(study, p.spread, means, sums);
    for (const double many : sums) {
      kinds[p.kind].see(std::fabs(many - p.log_likelihood), allowed(p), [&] { return describe(p, many); });
    }
  }
  std::size_t seen = 0;
  for (const auto& [kind, worst] : kinds) {
    INFO(kind << ": " << worst.report());
    CHECK(worst.beyond() == 0);
    seen += worst.seen();
  }
  CHECK(kinds.size() == 5);
  CHECK(seen >= 8 * 2000);
}
