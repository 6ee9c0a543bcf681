// Adaptive interpolation of a log function.
#include <algorithm>
#include <cmath>
#include <limits>
#include <utility>

#include "numeric/chebyshev.hpp"

namespace steelyard::numeric {

namespace {

constexpr std::size_t N = chebyshev_points;

double allowed_error(const LogCurve::Need& need, const ChebyshevArray& x, const ChebyshevArray& values) {
  ChebyshevArray weighted = values;
  if (need.weight != nullptr) {
    ChebyshevArray weight{};
    (*need.weight)(x, weight);
    for (std::size_t j = 0; j < N; ++j) weighted[j] += weight[j];
  }
  const double top = *std::max_element(weighted.begin(), weighted.end());
  const double slack = std::exp(std::clamp(need.log_peak - top, 0.0, 60.0));
  return std::max(need.noise, std::min(need.loosest, need.tolerance * slack));
}

}  // namespace

LogCurve::LogCurve(const BlockFunction& function, std::span<const double> breaks, const Need& need) {
  std::vector<std::pair<double, double>> waiting;  // the leftmost is at the back
  for (std::size_t i = breaks.size() - 1; i > 0; --i) waiting.emplace_back(breaks[i - 1], breaks[i]);
  while (!waiting.empty()) {
    const auto [low, high] = waiting.back();
    waiting.pop_back();
    const double middle = low + 0.5 * (high - low);
    const double half = 0.5 * (high - low);
    ChebyshevArray x{};
    ChebyshevArray values{};
    for (std::size_t j = 0; j < N; ++j) x[j] = middle + half * chebyshev_nodes()[j];
    function(x, values);
    evaluations_ += N;
    Panel panel{low, high, chebyshev_fit(values), 0.0, evaluations_ / N - 1};
    panel.error = chebyshev_tail(panel.coefficients);
    const bool good = panel.error <= allowed_error(need, x, values);
    if (!good && high - low > 1e-12 * (std::fabs(low) + std::fabs(high)) &&
        panels_.size() + waiting.size() < need.most_panels) {
      waiting.emplace_back(middle, high);
      waiting.emplace_back(low, middle);
    } else {
      panels_.push_back(panel);
    }
  }
}

void LogCurve::subtract(const BlockFunction& function) {
  for (Panel& panel : panels_) {
    const double middle = panel.low + 0.5 * (panel.high - panel.low);
    const double half = 0.5 * (panel.high - panel.low);
    ChebyshevArray x{};
    ChebyshevArray values{};
    for (std::size_t j = 0; j < N; ++j) x[j] = middle + half * chebyshev_nodes()[j];
    function(x, values);
    const ChebyshevArray other = chebyshev_fit(values);
    for (std::size_t k = 0; k < N; ++k) panel.coefficients[k] -= other[k];
    panel.error += chebyshev_tail(other);
  }
}

const LogCurve::Panel& LogCurve::panel_at(double x) const {
  const auto after = std::upper_bound(panels_.begin(), panels_.end(), x,
                                      [](double value, const Panel& panel) { return value < panel.high; });
  return after == panels_.end() ? panels_.back() : *after;
}

double LogCurve::operator()(double x) const {
  if (!(x >= low() && x <= high())) return -std::numeric_limits<double>::infinity();
  double out = 0.0;
  evaluate(panel_at(x), &x, &out, 1);
  return out;
}

void LogCurve::evaluate(const Panel& panel, const double* x, double* out, std::size_t count) {
  constexpr std::size_t block = 64;
  const double scale = 2.0 / (panel.high - panel.low);
  double u[block];
  while (count > 0) {
    const std::size_t n = std::min(count, block);
    for (std::size_t j = 0; j < n; ++j) u[j] = std::clamp((x[j] - panel.low) * scale - 1.0, -1.0, 1.0);
    chebyshev_evaluate(panel.coefficients, u, out, n);
    x += n;
    out += n;
    count -= n;
  }
}

}  // namespace steelyard::numeric
