#include "pool/line.hpp"

#include <algorithm>
#include <cmath>
#include <limits>
#include <numeric>
#include <span>
#include <utility>

#include "numeric/quadrature.hpp"

namespace steelyard::pool_room {

namespace {

// Largest log density on a scan of 32 points between each two breaks.
double highest(const Line::Function& log_density, const std::vector<double>& breaks) {
  double best = -std::numeric_limits<double>::infinity();
  for (std::size_t i = 1; i < breaks.size(); ++i) {
    for (int j = 0; j <= 32; ++j) {
      best = std::max(best, log_density(breaks[i - 1] + (breaks[i] - breaks[i - 1]) * j / 32.0));
    }
  }
  return best;
}

}  // namespace

Line::Line(Function log_density, std::vector<double> breaks) : log_density_(std::move(log_density)) {
  log_scale_ = highest(log_density_, breaks);
  if (!std::isfinite(log_scale_)) {
    log_total_ = -std::numeric_limits<double>::infinity();
    return;
  }
  const auto log_integrand = [this](std::size_t, const numeric::KronrodArray& x, numeric::KronrodArray& out) {
    for (std::size_t j = 0; j < x.size(); ++j) out[j] = log_density_(x[j]);
  };
  const auto accept = [this](std::size_t, const numeric::KronrodArray& x, const numeric::KronrodArray& mass) {
    // The rule's end nodes lie inside the panel by a known part of it.
    const double outer = numeric::kronrod_rule().x.back();
    const double middle = x[numeric::kronrod_points / 2];
    const double half = (x.back() - middle) / outer;
    panels_.push_back({middle - half, middle + half, std::accumulate(mass.begin(), mass.end(), 0.0), total_});
    total_ += panels_.back().mass;
    x_.insert(x_.end(), x.begin(), x.end());
    mass_.insert(mass_.end(), mass.begin(), mass.end());
  };
  const numeric::Quadrature result = numeric::integrate_log(breaks, log_scale_, 1e-11, log_integrand, accept);
  log_total_ = log_scale_ + std::log(total_);
  error_ = result.error / total_;
}

double Line::expectation(const Function& function) const {
  double sum = 0.0;
  for (std::size_t j = 0; j < x_.size(); ++j) {
    if (mass_[j] > 0.0) sum += mass_[j] * function(x_[j]);
  }
  return sum / total_;
}

double Line::mass_between(double low, double high) const {
  const numeric::KronrodRule& rule = numeric::kronrod_rule();
  const double middle = 0.5 * (low + high);
  const double half = 0.5 * (high - low);
  double sum = 0.0;
  for (std::size_t j = 0; j < numeric::kronrod_points; ++j) {
    sum += rule.weight[j] * std::exp(log_density_(middle + half * rule.x[j]) - log_scale_);
  }
  return half * sum;
}

double Line::cdf(double x) const {
  if (panels_.empty() || x <= panels_.front().low) return 0.0;
  if (x >= panels_.back().high) return 1.0;
  const auto panel = std::upper_bound(panels_.begin(), panels_.end(), x,
                                      [](double at, const Panel& p) { return at < p.high; });
  return std::min(1.0, (panel->before + mass_between(panel->low, x)) / total_);
}

double Line::quantile(double p) const {
  const double wanted = p * total_;
  const auto panel = std::upper_bound(panels_.begin(), panels_.end(), wanted,
                                      [](double mass, const Panel& q) { return mass < q.before + q.mass; });
  if (panel == panels_.end()) return panels_.back().high;
  double low = panel->low;
  double high = panel->high;
  for (int i = 0; i < 60 && high - low > 1e-13 * (std::abs(low) + std::abs(high)); ++i) {
    const double middle = 0.5 * (low + high);
    (panel->before + mass_between(panel->low, middle) < wanted ? low : high) = middle;
  }
  return 0.5 * (low + high);
}

}  // namespace steelyard::pool_room
