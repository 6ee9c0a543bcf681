// Piecewise Chebyshev interpolation on 16 nodes a panel, and the loops that evaluate it.
#pragma once

#include <array>
#include <cstddef>
#include <functional>
#include <span>
#include <vector>

namespace steelyard::numeric {

inline constexpr std::size_t chebyshev_points = 16;
using ChebyshevArray = std::array<double, chebyshev_points>;

/// x_j = cos(π(j+½)/16), falling from nearly 1 to nearly −1.
[[nodiscard]] const ChebyshevArray& chebyshev_nodes();

/// T_k(x_j) at the nodes, [k][j].
[[nodiscard]] const std::array<ChebyshevArray, chebyshev_points>& chebyshev_basis();

/// Coefficients of the interpolating polynomial through values at the nodes.
[[nodiscard]] ChebyshevArray chebyshev_fit(const ChebyshevArray& values);

/// out[j] = Σ_k c_k T_k(x_j); x in [−1, 1]. Same bits on every instruction set.
void chebyshev_evaluate(const ChebyshevArray& coefficients, const double* x, double* out, std::size_t count);
[[nodiscard]] double chebyshev_evaluate(const ChebyshevArray& coefficients, double x);

/// values[j] = exp(values[j] − shift).
void exp_shifted(double* values, double shift, std::size_t count);

/// What the last coefficients say about those left out. For a geometric decay by a factor of two or more
/// the sum of the last three bounds the interpolation error.
[[nodiscard]] double chebyshev_tail(const ChebyshevArray& coefficients);

/// Evaluates a function at many points at once.
using BlockFunction = std::function<void(std::span<const double> x, std::span<double> out)>;

/// A smooth function (of the kind that one takes the exponential of) on an interval, as polynomials on
/// panels.
class LogCurve {
 public:
  struct Panel {
    double low;
    double high;
    ChebyshevArray coefficients;
    double error;        ///< bound on |interpolant − function| in the panel
    std::size_t sample;  ///< which call of the function gave its values, counted from 0
  };

  /// How exact the curve must be. The error allowed in a panel grows where exp(function + weight) is
  /// far below its largest value, because it is integrals of that which count.
  struct Need {
    double tolerance = 1e-12;               ///< absolute, where the integrand is largest
    double noise = 0.0;                     ///< rounding noise of the function: no use going below
    double log_peak = 0.0;                  ///< largest value of function + weight, about
    const BlockFunction* weight = nullptr;  ///< log of what exp(function) will be multiplied with
    double loosest = 1e-5;                  ///< largest error allowed anywhere, however small the integrand
    std::size_t most_panels = 200;
  };

  LogCurve() = default;

  /// Interpolates between the first and the last break, panels split at the breaks (ascending, at least
  /// two) and wherever `need` asks for it.
  LogCurve(const BlockFunction& function, std::span<const double> breaks, const Need& need);

  [[nodiscard]] const std::vector<Panel>& panels() const { return panels_; }
  [[nodiscard]] double low() const { return panels_.front().low; }
  [[nodiscard]] double high() const { return panels_.back().high; }
  [[nodiscard]] std::size_t evaluations() const { return evaluations_; }

  /// Subtracts another function, interpolated on the same panels.
  void subtract(const BlockFunction& function);

  /// The panel that holds x (the nearest one outside).
  [[nodiscard]] const Panel& panel_at(double x) const;
  /// Value at x in [low, high]; −infinity outside.
  [[nodiscard]] double operator()(double x) const;
  /// Values at points that all lie in one panel.
  static void evaluate(const Panel& panel, const double* x, double* out, std::size_t count);

 private:
  std::vector<Panel> panels_;
  std::size_t evaluations_ = 0;
};

/// A density on an interval as polynomials on panels, with its distribution function and quantiles.
class DensityCurve {
 public:
  DensityCurve() = default;

  /// `density` ≥ 0 need not be normalized. Panels are split at the breaks and until the interpolation
  /// error, times the panel's length, is below `tolerance` of the whole.
  DensityCurve(const BlockFunction& density, std::span<const double> breaks, double tolerance = 1e-10);

  [[nodiscard]] bool empty() const { return panels_.empty(); }
  [[nodiscard]] double total() const { return total_; }  ///< ∫ density, before normalization
  [[nodiscard]] double low() const { return panels_.front().low; }
  [[nodiscard]] double high() const { return panels_.back().high; }
  /// Normalized density; 0 outside.
  [[nodiscard]] double density(double x) const;
  [[nodiscard]] double cdf(double x) const;
  /// |cdf(quantile(p)) − p| ≤ 1e-12, 0 < p < 1.
  [[nodiscard]] double quantile(double p) const;
  /// ∫ h(x) density(x) dx, h smooth on each panel.
  [[nodiscard]] double expectation(const std::function<double(double)>& h) const;
  [[nodiscard]] double mean() const;
  [[nodiscard]] double variance(double mean) const;

 private:
  struct Panel {
    double low;
    double high;
    double before;  ///< mass to the left
    double mass;
    ChebyshevArray coefficients;                        ///< of the normalized density
    std::array<double, chebyshev_points + 1> integral;  ///< of the mass from the left end
  };
  [[nodiscard]] std::size_t index_at(double x) const;

  std::vector<Panel> panels_;
  double total_ = 0.0;
};

}  // namespace steelyard::numeric
