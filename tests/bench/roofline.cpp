// Frozen: do not tune. Times of other benchmarks are given as multiples of this one's.
#include "roofline.hpp"

#include <array>
#include <cstddef>
#include <vector>

#include "numeric/multiversion.hpp"

namespace {

constexpr std::size_t nodes = 4096;
constexpr std::size_t degree = 20;

STEELYARD_MULTIVERSION
void horner(const double* __restrict c, const double* __restrict x, double* __restrict out) {
  for (std::size_t j = 0; j < nodes; ++j) {
    const double u = x[j];
    double p = c[20];
    p = p * u + c[19];
    p = p * u + c[18];
    p = p * u + c[17];
    p = p * u + c[16];
    p = p * u + c[15];
    p = p * u + c[14];
    p = p * u + c[13];
    p = p * u + c[12];
    p = p * u + c[11];
    p = p * u + c[10];
    p = p * u + c[9];
    p = p * u + c[8];
    p = p * u + c[7];
    p = p * u + c[6];
    p = p * u + c[5];
    p = p * u + c[4];
    p = p * u + c[3];
    p = p * u + c[2];
    p = p * u + c[1];
    p = p * u + c[0];
    out[j] += p;
  }
}

}  // namespace

double roofline(int studies) {
  static const std::vector<double> x = [] {
    std::vector<double> v(nodes);
    for (std::size_t j = 0; j < nodes; ++j) v[j] = -1.0 + 2.0 * static_cast<double>(j) / nodes;
    return v;
  }();
  std::vector<double> out(nodes, 0.0);
  std::array<double, degree + 1> c{};
  for (int i = 0; i < studies; ++i) {
    for (std::size_t k = 0; k <= degree; ++k)
      c[k] = 1.0 / static_cast<double>(1 + k + static_cast<std::size_t>(i));
    horner(c.data(), x.data(), out.data());
  }
  double sum = 0.0;
  for (const double value : out) sum += value;
  return sum;
}
