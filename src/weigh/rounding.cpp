#include "weigh/rounding.hpp"

#include <algorithm>
#include <cmath>
#include <limits>
#include <variant>
#include <vector>

#include "weigh/search.hpp"

namespace steelyard::weighing {

namespace {

using LogBf = std::function<double(const Evidence&)>;

double between(double a, double b, double part) { return a + (b - a) * part; }

// A point on the line between two corners of the same kind of evidence.
std::optional<Evidence> between(const Evidence& low, const Evidence& high, double part) {
  if (const auto* a = std::get_if<ExactT>(&low), *b = std::get_if<ExactT>(&high); a && b) {
    return ExactT{between(a->t, b->t, part), between(a->df, b->df, part),
                  between(a->n_effective, b->n_effective, part), a->folded};
  }
  if (const auto* a = std::get_if<NormalEstimate>(&low), *b = std::get_if<NormalEstimate>(&high); a && b) {
    return NormalEstimate{between(a->estimate, b->estimate, part), between(a->se, b->se, part), a->folded};
  }
  return std::nullopt;
}

void include(LogRange& range, double value) {
  if (range.low) range.low = std::min(*range.low, value);
  if (range.high) range.high = std::max(*range.high, value);
}

// The extremes of `f` on [0, 1]. A rounding band is narrow: five points see whether there is a stationary
// point inside, and only then it is looked for.
void include_line(LogRange& range, const std::function<double(double)>& f, int steps) {
  std::vector<double> values;
  for (int i = 0; i <= steps; ++i) {
    values.push_back(f(static_cast<double>(i) / steps));
    include(range, values.back());
  }
  for (int i = 1; i < steps; ++i) {
    const auto at = static_cast<std::size_t>(i);
    const double low = static_cast<double>(i - 1) / steps;
    const double high = static_cast<double>(i + 1) / steps;
    if (values[at] < values[at - 1] && values[at] < values[at + 1]) {
      include(range, -largest([&f](double x) { return -f(x); }, low, high, 2, 18).value);
    }
    if (values[at] > values[at - 1] && values[at] > values[at + 1]) {
      include(range, largest(f, low, high, 2, 18).value);
    }
  }
}

LogRange over_bands(const BandT& e, Direction direction, const LogBf& log_bf) {
  constexpr double infinity = std::numeric_limits<double>::infinity();
  LogRange range{infinity, -infinity};
  const auto at = [&](double t) { return log_bf(ExactT{t, e.df, e.n_effective, false}); };
  for (const Interval& band : e.bands) {
    // Without an upper end the evidence grows without end on a side that the prior allows, and falls
    // without end on the other; eight units of t show what lies before that.
    const double low = std::isfinite(band.low) ? band.low : std::min(band.high, 0.0) - 8.0;
    const double high = std::isfinite(band.high) ? band.high : std::max(band.low, 0.0) + 8.0;
    include_line(
        range, [&](double part) { return at(between(low, high, part)); }, 16);
    if (std::isinf(band.high)) (direction == Direction::less ? range.low : range.high).reset();
    if (std::isinf(band.low)) (direction == Direction::greater ? range.low : range.high).reset();
  }
  return range;
}

}  // namespace

std::optional<LogRange> rounding_range(const Study& study, Direction direction, const LogBf& log_bf) {
  if (const auto* band = std::get_if<BandT>(&study.evidence)) return over_bands(*band, direction, log_bf);
  if (!study.at_low || !study.at_high) return std::nullopt;
  const double middle = log_bf(study.evidence);
  LogRange range{middle, middle};
  if (between(*study.at_low, *study.at_high, 0.5)) {
    include_line(
        range, [&](double part) { return log_bf(*between(*study.at_low, *study.at_high, part)); }, 4);
  } else {
    include(range, log_bf(*study.at_low));
    include(range, log_bf(*study.at_high));
  }
  return range;
}

}  // namespace steelyard::weighing
