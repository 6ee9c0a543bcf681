// Probabilities of the noncentral t distribution, as integrals of its density: every term is positive,
// so nothing cancels, in whatever tail the band lies.
#include <algorithm>
#include <array>
#include <boost/math/quadrature/gauss.hpp>
#include <cmath>
#include <cstddef>
#include <limits>
#include <vector>

#include "numeric/chebyshev.hpp"
#include "numeric/kernel.hpp"
#include "numeric/multiversion.hpp"
#include "numeric/vector_math.hpp"
#include "steelyard/numeric.hpp"

namespace steelyard::numeric {

namespace {

constexpr double infinity = std::numeric_limits<double>::infinity();

/// What is dropped below the largest value of the integrand, in nats.
constexpr double negligible = 42.0;

/// t = scale·sinh w and log dt/dw.
STEELYARD_MULTIVERSION
void sinh_block(const double* __restrict w, double scale, double* __restrict t, double* __restrict log_slope,
                std::size_t count) {
  for (std::size_t j = 0; j < count; ++j) {
    const double up = vector_exp(w[j]);
    const double down = 1.0 / up;
    t[j] = 0.5 * scale * (up - down);
    log_slope[j] = vector_log(0.5 * scale * (up + down));
  }
}

/// The integrand in a coordinate w that suits the band. Usually t = √df·sinh w, which turns the algebraic
/// tails in t into exponential ones. Narrow bands: t = low + w, because the difference of two hyperbolic
/// sines would lose the digits of a short interval. Large df: t = w, there are no algebraic tails left.
class Integrand {
 public:
  Integrand(const DensityKernel& kernel, double low, double high, double df, double ncp)
      : kernel_(kernel), origin_(low), root_df_(std::sqrt(df)), ncp_(ncp) {
    const bool narrow = high - low < 0.05 * (root_df_ + std::min(std::fabs(low), std::fabs(high)));
    linear_ = narrow || df > 1e4;
    if (!narrow) origin_ = 0.0;
    const double spread = std::sqrt(1.0 + 0.5 * ncp * ncp / df);
    width_ = linear_ ? spread : spread / std::sqrt(df + ncp * ncp);
  }

  template <std::size_t N>
  void log_values(const std::array<double, N>& w, std::array<double, N>& out) const {
    std::array<double, N> t;
    if (linear_) {
      for (std::size_t j = 0; j < N; ++j) t[j] = origin_ + w[j];
      kernel_.over_t(t, ncp_, out);
      return;
    }
    std::array<double, N> log_slope;
    sinh_block(w.data(), root_df_, t.data(), log_slope.data(), N);
    kernel_.over_t(t, ncp_, out);
    for (std::size_t j = 0; j < N; ++j) out[j] += log_slope[j];
  }

  [[nodiscard]] double log_value(double w) const {
    if (linear_) return kernel_.at(origin_ + w, ncp_);
    const double up = vector_exp(w);
    const double down = 1.0 / up;
    return kernel_.at(0.5 * root_df_ * (up - down), ncp_) + vector_log(0.5 * root_df_ * (up + down));
  }

  [[nodiscard]] double to_w(double t) const { return linear_ ? t - origin_ : std::asinh(t / root_df_); }

  /// A first guess of where the mass lies and how wide it is, in w.
  [[nodiscard]] double centre() const { return to_w(ncp_); }
  [[nodiscard]] double width() const { return width_; }

 private:
  const DensityKernel& kernel_;
  double origin_;
  double root_df_;
  double ncp_;
  double width_;
  bool linear_;
};

struct Peak {
  double w;
  double log_value;
  double step;  ///< the comb spacing at which it was found
};

/// The (only) maximum within [low, high], to a fraction of its width, by combs that widen while the best
/// tooth is at the edge and narrow otherwise.
Peak find_peak(const Integrand& g, double low, double high) {
  constexpr std::size_t teeth = 8;
  double step = g.width();
  double at = std::clamp(g.centre(), low, high);
  Peak best{at, g.log_value(at), step};
  for (int round = 0; round < 60; ++round) {
    std::array<double, teeth> w;
    std::array<double, teeth> value;
    for (std::size_t j = 0; j < teeth; ++j) {
      const double offset =
          static_cast<double>(j) < 4.0 ? static_cast<double>(j) - 4.0 : static_cast<double>(j) - 3.0;
      w[j] = std::clamp(at + offset * step, low, high);
    }
    g.log_values(w, value);
    const std::size_t top =
        static_cast<std::size_t>(std::max_element(value.begin(), value.end()) - value.begin());
    const bool better = value[top] > best.log_value;
    if (better) best = {w[top], value[top], step};
    const bool at_edge = better && (top == 0 || top == teeth - 1) && w[top] > low && w[top] < high;
    const double moved = std::fabs(best.w - at);
    at = best.w;
    if (at_edge)
      step *= 4.0;
    else if (moved > 1.5 * step)
      continue;
    else if (step > 0.3 * g.width())
      step *= 0.25;
    else
      break;
  }
  best.step = step;
  return best;
}

/// ∫ exp(g − top) over [from, to] by 25 Gauss-Legendre points.
double integrate_panel(const Integrand& g, double from, double to, double top) {
  using Rule = boost::math::quadrature::gauss<double, 25>;
  const auto& x = Rule::abscissa();  // 0 and the positive nodes
  const auto& weight = Rule::weights();
  const double half = 0.5 * (to - from);
  const double middle = from + half;
  // 25 points filled up to whole vectors.
  std::array<double, 32> w;
  std::array<double, 32> value;
  std::fill(w.begin(), w.end(), middle);
  for (std::size_t j = 1; j < x.size(); ++j) {
    w[2 * j - 1] = middle + half * x[j];
    w[2 * j] = middle - half * x[j];
  }
  g.log_values(w, value);
  exp_shifted(value.data(), top, value.size());
  double sum = weight[0] * value[0];
  for (std::size_t j = 1; j < x.size(); ++j) sum += weight[j] * (value[2 * j - 1] + value[2 * j]);
  return half * sum;
}

/// ∫ exp(g − top) from the peak towards `end`. The first panel is as long as it takes to fall by a few
/// nats; each further one doubles the distance, because a steep start may turn into a slow tail.
double integrate_side(const Integrand& g, const Peak& peak, double end) {
  constexpr double first_drop = 8.0;
  const double room = std::fabs(end - peak.w);
  const double direction = end > peak.w ? 1.0 : -1.0;
  const auto drop = [&](double d) { return peak.log_value - g.log_value(peak.w + direction * d); };
  double far = std::min(room, peak.step);
  while (far < room && drop(far) < 0.5 * first_drop) far = std::min(room, 2.0 * far);
  while (drop(far) > first_drop) far *= 0.6;
  double near = 0.0;
  double total = 0.0;
  for (;;) {
    const double a = peak.w + direction * near;
    const double b = far == room ? end : peak.w + direction * far;
    total += integrate_panel(g, std::min(a, b), std::max(a, b), peak.log_value);
    if (far == room || drop(far) > negligible) return total;
    near = far;
    far = std::min(room, 2.0 * far);
  }
}

double log_band(const DensityKernel& kernel, double low, double high, double df, double ncp) {
  const Integrand g(kernel, low, high, df, ncp);
  const double w_low = g.to_w(low);
  const double w_high = g.to_w(high);
  const Peak peak = find_peak(g, w_low, w_high);
  double sum = 0.0;
  if (peak.w > w_low) sum += integrate_side(g, peak, w_low);
  if (peak.w < w_high) sum += integrate_side(g, peak, w_high);
  return peak.log_value + std::log(sum);
}

/// Whether P(T ≤ t) is below 1e-17, for certain. T = (Z + ncp)/S: either Z < −9, or S exceeds (ncp − 9)/t,
/// and P(S > x) ≤ exp(−(df/2)·(x² − 1 − log x²)) for x > 1 (the Chernoff bound of the chi-squared tail).
bool hardly_ever_below(double t, double df, double ncp) {
  constexpr double z = 9.0;
  if (!(ncp > z)) return false;
  if (t <= 0.0) return true;
  const double x = (ncp - z) / t;
  return x > 1.0 && 0.5 * df * (x * x - 1.0 - 2.0 * std::log(x)) > 40.0;
}

bool in_domain(double df, double ncp) { return df >= 1.0 && std::fabs(ncp) <= 1e6; }

}  // namespace

double DensityKernel::log_band(double low, double high, double ncp) const {
  if (!(low < high)) return -infinity;
  if (low == -infinity && high == infinity) return 0.0;
  if (high == infinity && hardly_ever_below(low, constants_.df, ncp)) return 0.0;
  if (low == -infinity && hardly_ever_below(-high, constants_.df, -ncp)) return 0.0;
  return numeric::log_band(*this, low, high, constants_.df, ncp);
}

double log_noncentral_t_band(double low, double high, double df, double ncp) {
  if (!in_domain(df, ncp) || std::isnan(low) || std::isnan(high))
    return std::numeric_limits<double>::quiet_NaN();
  return DensityKernel(df).log_band(low, high, ncp);
}

double log_noncentral_t_cdf(double t, double df, double ncp) {
  return t == infinity ? 0.0 : log_noncentral_t_band(-infinity, t, df, ncp);
}

double log_noncentral_t_upper(double t, double df, double ncp) {
  return t == -infinity ? 0.0 : log_noncentral_t_band(t, infinity, df, ncp);
}

}  // namespace steelyard::numeric
