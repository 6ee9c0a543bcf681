#include "rebuild/corners.hpp"

#include <cmath>

namespace steelyard::rebuilding {

namespace {

// 2^12 corners are more than any route asks for: the widest reads eight rounded cells.
constexpr std::size_t most_inputs = 12;

std::vector<Col> rounded_inputs(const Numbers& x) {
  std::vector<Col> result;
  for (std::size_t i = 0; i < col_count; ++i) {
    const Col col = static_cast<Col>(i);
    if (!x.used().test(i) || !is_rounded_quantity(col) || !x.has(col)) continue;
    const Printed& printed = x.printed(col);
    if (printed.relation == Relation::rounded && printed.low < printed.high) result.push_back(col);
    if (result.size() == most_inputs) break;
  }
  return result;
}

// What is compared: the test statistic.
double statistic(const Evidence& evidence) {
  if (const auto* exact = std::get_if<ExactT>(&evidence)) return exact->t;
  if (const auto* normal = std::get_if<NormalEstimate>(&evidence)) return normal->estimate / normal->se;
  return std::nan("");
}

Corners ends_of(const BandT& band) {
  Corners result;
  const Interval& outer = band.bands.back();
  const bool folded =
      band.bands.size() > 1 || (outer.low < 0.0 && outer.high > 0.0 && outer.low == -outer.high);
  const double low = folded && band.bands.size() == 1 ? 0.0 : outer.low;
  if (std::isfinite(low)) result.low = ExactT{low, band.df, band.n_effective, folded};
  if (std::isfinite(outer.high)) result.high = ExactT{outer.high, band.df, band.n_effective, folded};
  return result;
}

void take(Corners& found, const Evidence& evidence) {
  const double t = statistic(evidence);
  if (!std::isfinite(t)) return;
  if (!found.low || t < statistic(*found.low)) found.low = evidence;
  if (!found.high || t > statistic(*found.high)) found.high = evidence;
}

}  // namespace

Corners corners(const Route& route, Numbers& x, const Solution& middle) {
  if (const auto* band = std::get_if<BandT>(&middle.evidence)) return ends_of(*band);
  const std::vector<Col> inputs = rounded_inputs(x);
  Corners found;
  if (inputs.empty()) return found;
  x.mute(true);
  for (std::size_t corner = 0; corner < (std::size_t{1} << inputs.size()); ++corner) {
    for (std::size_t i = 0; i < inputs.size(); ++i) {
      const Printed& printed = x.printed(inputs[i]);
      x.move(inputs[i], (corner >> i & 1U) != 0 ? printed.high : printed.low);
    }
    if (const auto solution = route.solve(x)) take(found, solution->evidence);
  }
  for (const Col col : inputs) x.move(col, x.printed(col).value);
  x.mute(false);
  return found;
}

}  // namespace steelyard::rebuilding
