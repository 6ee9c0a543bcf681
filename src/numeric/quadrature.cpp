#include "numeric/quadrature.hpp"

namespace steelyard::numeric {

namespace {

KronrodRule make_rule() {
  using Kronrod = boost::math::quadrature::gauss_kronrod<double, kronrod_points>;
  using Gauss = boost::math::quadrature::gauss<double, kronrod_points / 2>;
  constexpr std::size_t middle = kronrod_points / 2;
  KronrodRule rule{};
  for (std::size_t i = 0; i <= middle; ++i) {
    const double x = Kronrod::abscissa()[i];
    const double w = Kronrod::weights()[i];
    // The Gauss nodes are every second Kronrod node, counted from the middle one.
    const double g = i % 2 == 0 ? Gauss::weights()[i / 2] : 0.0;
    rule.x[middle + i] = x;
    rule.x[middle - i] = -x;
    rule.weight[middle + i] = rule.weight[middle - i] = w;
    rule.gauss_weight[middle + i] = rule.gauss_weight[middle - i] = g;
  }
  return rule;
}

}  // namespace

const KronrodRule& kronrod_rule() {
  static const KronrodRule rule = make_rule();
  return rule;
}

}  // namespace steelyard::numeric
