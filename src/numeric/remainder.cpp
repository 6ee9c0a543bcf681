#include "numeric/remainder.hpp"

#include <algorithm>
#include <cmath>
#include <cstddef>
#include <iterator>
#include <memory>
#include <utility>

#include "numeric/vector_math.hpp"

namespace steelyard::numeric {

namespace {

#include "numeric/remainder_table.inc"

constexpr double smallest_large_df = 16.0;

/// Coefficients in theta of a patch at x: Clenshaw over the outer index.
template <std::size_t NX, std::size_t NT>
std::array<double, NT> at_x(const double (&table)[NX][NT], double low, double high, double x) {
  const double s = (2.0 * x - (low + high)) / (high - low);
  std::array<double, NT> out{};
  for (std::size_t q = 0; q < NT; ++q) {
    double b1 = 0.0;
    double b2 = 0.0;
    for (std::size_t p = NX - 1; p > 0; --p) {
      const double b0 = 2.0 * s * b1 - b2 + table[p][q];
      b2 = b1;
      b1 = b0;
    }
    out[q] = s * b1 - b2 + table[0][q];
  }
  return out;
}

/// Powers of s from Chebyshev coefficients. Harmless here: the coefficients fall faster than the
/// entries of the conversion grow.
template <std::size_t N>
std::array<double, N> to_powers(const std::array<double, N>& chebyshev) {
  std::array<double, N> out{};
  std::array<double, N> before{};   // T_{k-1}
  std::array<double, N> current{};  // T_k
  before[0] = 1.0;
  current[1] = 1.0;
  out[0] = chebyshev[0];
  out[1] = chebyshev[1];
  for (std::size_t k = 2; k < N; ++k) {
    std::array<double, N> next{};
    next[0] = -before[0];
    for (std::size_t j = 1; j <= k; ++j) next[j] = 2.0 * current[j - 1] - before[j];
    for (std::size_t j = 0; j <= k; ++j) out[j] += chebyshev[k] * next[j];
    before = current;
    current = next;
  }
  return out;
}

RemainderPolynomial large_df(double df) {
  RemainderPolynomial out;
  std::array<double, RemainderPolynomial::large_terms> c =
      at_x(large_df_table[0][0], large_df_x_edges[0], large_df_x_edges[1], 1.0 / df);
  // The table runs in 2·theta − 1 = −c: flip the odd terms, and fold the division by df in.
  double tail = 0.0;
  int terms = RemainderPolynomial::large_terms;
  for (std::size_t q = 0; q < c.size(); ++q) c[q] *= (q % 2 == 0 ? 1.0 : -1.0) / df;
  for (std::size_t q = c.size(); q-- > 2;) {
    tail += std::fabs(c[q]);
    if (tail > 2e-15) break;
    c[q] = 0.0;
    terms = static_cast<int>(q);
  }
  out.single = to_powers(c);
  out.terms = terms;
  return out;
}

RemainderPolynomial small_df(double df) {
  RemainderPolynomial out;
  out.terms = RemainderPolynomial::small_terms;
  auto local = std::make_shared<RemainderPolynomial::Local>();
  const double x = 1.0 / df;
  std::size_t patch = 0;
  while (patch + 2 < std::size(small_df_x_edges) && x > small_df_x_edges[patch + 1]) ++patch;
  for (std::size_t piece = 0; piece < local->size(); ++piece) {
    auto c = at_x(small_df_table[patch][piece], small_df_x_edges[patch], small_df_x_edges[patch + 1], x);
    for (double& value : c) value *= x;
    (*local)[piece] = to_powers(c);
  }
  out.local = std::move(local);
  return out;
}

static_assert(std::size(small_df_theta_edges) == RemainderPolynomial::pieces + 1);

}  // namespace

RemainderPolynomial remainder_polynomial(double df) {
  return df >= smallest_large_df ? large_df(df) : small_df(df);
}

const double* remainder_theta_edges() { return small_df_theta_edges; }

double stirling_remainder(double x) {
  // S(x) − S(x+1) = (x+½)·log1p(1/x) − 1: up to where ten terms of the series suffice.
  double shift = 0.0;
  while (x < 10.0) {
    const double u = 1.0 / x;
    shift += (x + 0.5) * vector_log_minus(1.0 + u, u).log_minus + 0.5 * u;
    x += 1.0;
  }
  const double r = 1.0 / x;
  const double r2 = r * r;
  return shift + r * (1.0 / 12 -
                      r2 * (1.0 / 360 -
                            r2 * (1.0 / 1260 -
                                  r2 * (1.0 / 1680 - r2 * (1.0 / 1188 - r2 * (691.0 / 360360 - r2 / 156))))));
}

}  // namespace steelyard::numeric
