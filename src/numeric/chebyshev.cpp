#include "numeric/chebyshev.hpp"

#include <algorithm>
#include <cmath>
#include <numbers>

#include "numeric/multiversion.hpp"
#include "numeric/vector_math.hpp"

namespace steelyard::numeric {

namespace {

constexpr std::size_t N = chebyshev_points;

/// cos(π·m/32) with the argument reduced to the first quadrant, so that symmetries hold exactly.
double cosine(std::size_t m) {
  m %= 64;
  if (m > 32) m = 64 - m;
  const double sign = m > 16 ? -1.0 : 1.0;
  if (m > 16) m = 32 - m;
  return sign * (m == 16 ? 0.0 : std::cos(std::numbers::pi * static_cast<double>(m) / 32.0));
}

ChebyshevArray make_nodes() {
  ChebyshevArray x{};
  for (std::size_t j = 0; j < N; ++j) x[j] = cosine(2 * j + 1);
  return x;
}

std::array<ChebyshevArray, N> make_basis() {
  std::array<ChebyshevArray, N> basis{};
  for (std::size_t k = 0; k < N; ++k)
    for (std::size_t j = 0; j < N; ++j) basis[k][j] = cosine(k * (2 * j + 1));
  return basis;
}

STEELYARD_MULTIVERSION
void clenshaw(const double* __restrict c, const double* __restrict x, double* __restrict out,
              std::size_t count) {
  for (std::size_t j = 0; j < count; ++j) {
    const double two_x = 2.0 * x[j];
    double b1 = c[15];
    double b2 = 0.0;
    double b0;
#define STEELYARD_STEP(k)      \
  b0 = two_x * b1 - b2 + c[k]; \
  b2 = b1;                     \
  b1 = b0;
    STEELYARD_STEP(14)
    STEELYARD_STEP(13)
    STEELYARD_STEP(12)
    STEELYARD_STEP(11)
    STEELYARD_STEP(10)
    STEELYARD_STEP(9)
    STEELYARD_STEP(8)
    STEELYARD_STEP(7)
    STEELYARD_STEP(6)
    STEELYARD_STEP(5)
    STEELYARD_STEP(4)
    STEELYARD_STEP(3)
    STEELYARD_STEP(2)
    STEELYARD_STEP(1)
#undef STEELYARD_STEP
    out[j] = x[j] * b1 - b2 + c[0];
  }
}

STEELYARD_MULTIVERSION
void exp_shifted_block(double* __restrict values, double shift, std::size_t count) {
  for (std::size_t j = 0; j < count; ++j) values[j] = vector_exp(values[j] - shift);
}

/// The matrix from values at the nodes to coefficients, [node][coefficient].
std::array<ChebyshevArray, N> make_fit_matrix() {
  std::array<ChebyshevArray, N> matrix{};
  for (std::size_t j = 0; j < N; ++j)
    for (std::size_t k = 0; k < N; ++k)
      matrix[j][k] = chebyshev_basis()[k][j] * (k == 0 ? 1.0 : 2.0) / static_cast<double>(N);
  return matrix;
}

STEELYARD_MULTIVERSION
void fit(const double* __restrict matrix, const double* __restrict values, double* __restrict out) {
  // Node by node: the inner loop runs over the coefficients, so that each keeps its order of summation.
  for (std::size_t k = 0; k < N; ++k) out[k] = 0.0;
  for (std::size_t j = 0; j < N; ++j)
    for (std::size_t k = 0; k < N; ++k) out[k] += matrix[j * N + k] * values[j];
}

}  // namespace

const ChebyshevArray& chebyshev_nodes() {
  static const ChebyshevArray nodes = make_nodes();
  return nodes;
}

const std::array<ChebyshevArray, N>& chebyshev_basis() {
  static const std::array<ChebyshevArray, N> basis = make_basis();
  return basis;
}

ChebyshevArray chebyshev_fit(const ChebyshevArray& values) {
  static const std::array<ChebyshevArray, N> matrix = make_fit_matrix();
  // A large common part would leave its rounding in every coefficient.
  const double common = values[N / 2];
  ChebyshevArray rest;
  for (std::size_t j = 0; j < N; ++j) rest[j] = values[j] - common;
  ChebyshevArray c;
  fit(matrix[0].data(), rest.data(), c.data());
  c[0] += common;
  return c;
}

void chebyshev_evaluate(const ChebyshevArray& coefficients, const double* x, double* out, std::size_t count) {
  clenshaw(coefficients.data(), x, out, count);
}

double chebyshev_evaluate(const ChebyshevArray& coefficients, double x) {
  double out = 0.0;
  clenshaw(coefficients.data(), &x, &out, 1);
  return out;
}

void exp_shifted(double* values, double shift, std::size_t count) { exp_shifted_block(values, shift, count); }

double chebyshev_tail(const ChebyshevArray& c) {
  return std::fabs(c[N - 3]) + std::fabs(c[N - 2]) + std::fabs(c[N - 1]);
}

}  // namespace steelyard::numeric
