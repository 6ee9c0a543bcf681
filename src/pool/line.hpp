// A posterior along one axis that is known only up to a constant: total, expectations, quantiles.
#pragma once

#include <functional>
#include <vector>

namespace steelyard::pool_room {

/// Built once by adaptive quadrature between the first and the last break; the density counts as 0 outside.
class Line {
 public:
  using Function = std::function<double(double)>;

  /// `log_density` may be −infinity; `breaks` rise, and every peak must be wider than about a 30th of
  /// the distance between the breaks around it.
  Line(Function log_density, std::vector<double> breaks);

  /// log of the integral of the density; −infinity when it is 0 everywhere.
  [[nodiscard]] double log_total() const { return log_total_; }
  /// Bound on the relative error of the integral.
  [[nodiscard]] double error() const { return error_; }
  /// Mean of a function under the density, on the nodes of the integral.
  [[nodiscard]] double expectation(const Function& function) const;
  [[nodiscard]] double cdf(double x) const;
  /// The x with cdf p, to 1e-9 in p, 0 < p < 1.
  [[nodiscard]] double quantile(double p) const;

 private:
  struct Panel {
    double low, high, mass, before;  ///< before: the mass below `low`
  };
  [[nodiscard]] double mass_between(double low, double high) const;

  Function log_density_;
  double log_scale_ = 0.0;
  double log_total_ = 0.0;
  double error_ = 0.0;
  double total_ = 0.0;
  std::vector<double> x_, mass_;
  std::vector<Panel> panels_;
};

}  // namespace steelyard::pool_room
