// The remainder of the saddle-point form of the noncentral t density, as a polynomial for one df.
#pragma once

#include <array>
#include <memory>

namespace steelyard::numeric {

/// rho(df, theta) = theta²/df · R(1/df, theta), where theta in [0, 1] says how far the noncentrality
/// pulls the saddle from its central place (theta = ½ at ncp·t = 0). R is a table over both arguments
/// (tests/oracle/numeric_remainder.py); `RemainderPolynomial` is that table at one df:
///
///  - df ≥ 16: one polynomial in c = 1 − 2·theta, cut where its terms no longer matter;
///  - df < 16: one polynomial for each of nine pieces of theta, in a local variable on [−1, 1],
///    because R has essential singularities at theta = 0 and 1 that come close at small df.
///
/// Error of rho: below 1e-13 absolute for every df ≥ 1.
struct RemainderPolynomial {
  static constexpr int pieces = 9;
  static constexpr int large_terms = 22;
  static constexpr int small_terms = 16;

  using Local = std::array<std::array<double, small_terms>, pieces>;

  int terms = large_terms;
  std::array<double, large_terms> single{};  ///< df ≥ 16: powers of c, ascending, already divided by df
  std::shared_ptr<const Local> local;        ///< df < 16 only: it is large, and few studies are so small
};

/// The table at one df ≥ 1; +infinity gives zero.
[[nodiscard]] RemainderPolynomial remainder_polynomial(double df);

/// Piece edges of theta for df < 16.
[[nodiscard]] const double* remainder_theta_edges();

/// The Stirling remainder S(x) = logΓ(x) − ((x − ½)·log x − x + ½·log 2π), x ≥ ½; absolute error
/// below 1e-15 (Abramowitz & Stegun 6.1.41 for large x).
[[nodiscard]] double stirling_remainder(double x);

}  // namespace steelyard::numeric
