#include "figure/likelihood_curve.hpp"

#include <algorithm>
#include <cmath>
#include <cstddef>
#include <variant>
#include <vector>

namespace steelyard::figure {
namespace {

constexpr int even_points = 160;
constexpr int close_points = 16;  // each side of a centre, out to four widths

Extent around(double centre, double width, bool folded) {
  Extent out{centre - 2 * width, centre + 2 * width, {centre}, width};
  if (folded) {
    const double far = std::fabs(centre) + 2 * width;
    out = {-far, far, {-centre, centre}, width};
  }
  return out;
}

Extent of_bands(const BandT& band) {
  const double width = 1.0 / std::sqrt(band.n_effective);
  Extent out{HUGE_VAL, -HUGE_VAL, {}, width};
  for (const Interval& interval : band.bands) {
    for (const double end : {interval.low, interval.high}) {
      if (!std::isfinite(end)) continue;
      out.centres.push_back(end * width);
      out.low = std::min(out.low, (end - 2) * width);
      out.high = std::max(out.high, (end + 2) * width);
    }
  }
  if (out.centres.empty()) out = {-2 * width, 2 * width, {0.0}, width};
  return out;
}

}  // namespace

Extent extent(const Evidence& evidence) {
  if (const auto* t = std::get_if<ExactT>(&evidence)) {
    const double width = std::sqrt((1.0 + t->t * t->t / (2.0 * t->df)) / t->n_effective);
    return around(t->t / std::sqrt(t->n_effective), width, t->folded);
  }
  if (const auto* normal = std::get_if<NormalEstimate>(&evidence))
    return around(normal->estimate, normal->se, normal->folded);
  return of_bands(std::get<BandT>(evidence));
}

std::vector<double> sample_points(double low, double high, const std::vector<double>& centres, double width) {
  std::vector<double> out;
  for (int i = 0; i <= even_points; ++i) out.push_back(low + (high - low) * i / even_points);
  if (width < (high - low) / 20) {
    for (const double centre : centres)
      for (int i = -close_points; i <= close_points; ++i)
        out.push_back(centre + 4.0 * width * i / close_points);
  }
  std::sort(out.begin(), out.end());
  out.erase(std::unique(out.begin(), out.end()), out.end());
  const auto outside = [&](double x) { return x < low || x > high; };
  out.erase(std::remove_if(out.begin(), out.end(), outside), out.end());
  return out;
}

Curve likelihood_curve(const Study& study, double low, double high) {
  const Extent where = extent(study.evidence);
  const std::vector<double> at = sample_points(low, high, where.centres, where.width);
  std::vector<double> logs(at.size(), 0.0);
  add_log_likelihood(likelihood(study), 0.0, at, logs);
  const double peak = *std::max_element(logs.begin(), logs.end());
  Curve out;
  // Far outside the frame the highest value in it is no peak of the study: then nothing is drawn.
  const bool in_frame = where.high + 4 * where.width >= low && where.low - 4 * where.width <= high;
  if (!std::isfinite(peak) || !in_frame) return out;
  for (std::size_t i = 0; i < at.size(); ++i) out.push_back({at[i], std::exp(logs[i] - peak)});
  return out;
}

}  // namespace steelyard::figure
