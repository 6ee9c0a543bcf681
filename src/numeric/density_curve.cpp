// Densities, their distribution functions and quantiles from piecewise polynomials.
#include <algorithm>
#include <cmath>
#include <utility>

#include "numeric/chebyshev.hpp"

namespace steelyard::numeric {

namespace {

constexpr std::size_t N = chebyshev_points;

/// Σ_k c_k T_k(u), any number of terms.
template <std::size_t M>
double clenshaw(const std::array<double, M>& c, double u) {
  double b1 = 0.0;
  double b2 = 0.0;
  for (std::size_t k = M - 1; k > 0; --k) {
    const double b0 = 2.0 * u * b1 - b2 + c[k];
    b2 = b1;
    b1 = b0;
  }
  return u * b1 - b2 + c[0];
}

/// Chebyshev coefficients of the integral from −1.
std::array<double, N + 1> integrate(const ChebyshevArray& c) {
  std::array<double, N + 1> out{};
  const auto at = [&c](std::size_t k) { return k < N ? c[k] : 0.0; };
  out[1] = c[0] - 0.5 * c[2];
  for (std::size_t k = 2; k <= N; ++k) out[k] = (at(k - 1) - at(k + 1)) / (2.0 * static_cast<double>(k));
  double at_left = 0.0;
  for (std::size_t k = 1; k <= N; ++k) at_left += (k % 2 == 0 ? out[k] : -out[k]);
  out[0] = -at_left;
  return out;
}

/// ∫_{−1}^{1} of the interpolant.
double integral(const ChebyshevArray& c) {
  double sum = 0.0;
  for (std::size_t k = 0; k < N; k += 2) {
    const double d = static_cast<double>(k);
    sum += 2.0 * c[k] / (1.0 - d * d);
  }
  return sum;
}

double to_unit(double x, double low, double high) {
  return std::clamp(2.0 * (x - low) / (high - low) - 1.0, -1.0, 1.0);
}

}  // namespace

DensityCurve::DensityCurve(const BlockFunction& density, std::span<const double> breaks, double tolerance) {
  struct Waiting {
    double low, high;
    ChebyshevArray coefficients;
    double mass, error;
  };
  const auto sample = [&density](double low, double high) {
    const double middle = low + 0.5 * (high - low);
    const double half = 0.5 * (high - low);
    ChebyshevArray x{};
    ChebyshevArray values{};
    for (std::size_t j = 0; j < N; ++j) x[j] = middle + half * chebyshev_nodes()[j];
    density(x, values);
    Waiting w{low, high, chebyshev_fit(values), 0.0, 0.0};
    w.mass = half * integral(w.coefficients);
    w.error = 2.0 * half * chebyshev_tail(w.coefficients);
    return w;
  };
  std::vector<Waiting> waiting;
  double guess = 0.0;  // of the whole mass, for the tolerance
  for (std::size_t i = breaks.size() - 1; i > 0; --i) {
    waiting.push_back(sample(breaks[i - 1], breaks[i]));
    guess += std::fabs(waiting.back().mass);
  }
  constexpr std::size_t most_panels = 400;
  while (!waiting.empty()) {
    const Waiting w = waiting.back();
    waiting.pop_back();
    if (w.error > tolerance * guess && panels_.size() + waiting.size() < most_panels &&
        w.high - w.low > 1e-13 * (std::fabs(w.low) + std::fabs(w.high))) {
      const double middle = w.low + 0.5 * (w.high - w.low);
      waiting.push_back(sample(middle, w.high));
      waiting.push_back(sample(w.low, middle));
      // The first guess may have missed a narrow peak.
      guess = std::max(guess, std::fabs(waiting.back().mass) + std::fabs(waiting[waiting.size() - 2].mass));
      continue;
    }
    panels_.push_back(Panel{w.low, w.high, total_, w.mass, w.coefficients, {}});
    total_ += w.mass;
  }
  for (Panel& panel : panels_) {
    panel.before /= total_;
    panel.mass /= total_;
    for (double& c : panel.coefficients) c /= total_;
    panel.integral = integrate(panel.coefficients);
    for (double& c : panel.integral) c *= 0.5 * (panel.high - panel.low);
  }
}

std::size_t DensityCurve::index_at(double x) const {
  const auto after = std::upper_bound(panels_.begin(), panels_.end(), x,
                                      [](double value, const Panel& panel) { return value < panel.high; });
  return after == panels_.end() ? panels_.size() - 1 : static_cast<std::size_t>(after - panels_.begin());
}

double DensityCurve::density(double x) const {
  if (!(x >= low() && x <= high())) return 0.0;
  const Panel& panel = panels_[index_at(x)];
  return std::max(0.0, chebyshev_evaluate(panel.coefficients, to_unit(x, panel.low, panel.high)));
}

double DensityCurve::cdf(double x) const {
  if (x <= low()) return 0.0;
  if (x >= high()) return 1.0;
  const Panel& panel = panels_[index_at(x)];
  return std::clamp(panel.before + clenshaw(panel.integral, to_unit(x, panel.low, panel.high)), 0.0, 1.0);
}

double DensityCurve::quantile(double p) const {
  const auto after = std::upper_bound(panels_.begin(), panels_.end(), p,
                                      [](double value, const Panel& panel) { return value < panel.before; });
  const Panel& panel = after == panels_.begin() ? panels_.front() : *(after - 1);
  double low = -1.0;
  double high = 1.0;
  double u = panel.mass > 0.0 ? std::clamp(2.0 * (p - panel.before) / panel.mass - 1.0, -1.0, 1.0) : 0.0;
  // Newton, kept inside a shrinking bracket.
  for (int round = 0; round < 80; ++round) {
    const double miss = panel.before + clenshaw(panel.integral, u) - p;
    (miss > 0.0 ? high : low) = u;
    const double slope = chebyshev_evaluate(panel.coefficients, u) * 0.5 * (panel.high - panel.low);
    double next = slope > 0.0 ? u - miss / slope : 0.5 * (low + high);
    if (!(next > low && next < high)) next = 0.5 * (low + high);
    if (std::fabs(miss) < 1e-15 || std::fabs(next - u) < 1e-15) break;
    u = next;
  }
  return panel.low + 0.5 * (u + 1.0) * (panel.high - panel.low);
}

double DensityCurve::expectation(const std::function<double(double)>& h) const {
  // 16-point interpolation of h·density on each panel, integrated exactly.
  double sum = 0.0;
  for (const Panel& panel : panels_) {
    const double middle = panel.low + 0.5 * (panel.high - panel.low);
    const double half = 0.5 * (panel.high - panel.low);
    ChebyshevArray values{};
    chebyshev_evaluate(panel.coefficients, chebyshev_nodes().data(), values.data(), N);
    for (std::size_t j = 0; j < N; ++j) values[j] *= h(middle + half * chebyshev_nodes()[j]);
    sum += half * integral(chebyshev_fit(values));
  }
  return sum;
}

double DensityCurve::mean() const {
  return expectation([](double x) { return x; });
}

double DensityCurve::variance(double mean) const {
  return expectation([mean](double x) { return (x - mean) * (x - mean); });
}

}  // namespace steelyard::numeric
