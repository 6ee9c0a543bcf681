#include "pool/kernels.hpp"

#include <cmath>

#include "numeric/multiversion.hpp"
#include "numeric/vector_math.hpp"

namespace steelyard::pool_room {

namespace {

STEELYARD_MULTIVERSION
void log_sums(const double* __restrict a, const double* __restrict b, double* __restrict out,
              std::size_t count) {
  for (std::size_t j = 0; j < count; ++j) {
    const double top = a[j] > b[j] ? a[j] : b[j];
    const double rest = a[j] > b[j] ? b[j] : a[j];
    const double e = numeric::vector_exp(rest - top);
    out[j] += top + numeric::vector_log_minus(1.0 + e, e).log;
  }
}

STEELYARD_MULTIVERSION
void normal(double estimate, double precision_half, double constant, const double* __restrict means,
            double* __restrict out, std::size_t count) {
  for (std::size_t j = 0; j < count; ++j) {
    const double miss = estimate - means[j];
    out[j] += constant - precision_half * (miss * miss);
  }
}

STEELYARD_MULTIVERSION
void log_power(double location, double inv_scale, double inv_df, double power, double constant,
               const double* __restrict x, double* __restrict out, std::size_t count) {
  for (std::size_t j = 0; j < count; ++j) {
    const double z = (x[j] - location) * inv_scale;
    const double e = z * z * inv_df;
    out[j] += constant - power * numeric::vector_log_minus(1.0 + e, e).log;
  }
}

STEELYARD_MULTIVERSION
void mixture(const double* __restrict centre, const double* __restrict weight, std::size_t parts,
             double inv_sd, const double* __restrict x, double* __restrict out, std::size_t count) {
  for (std::size_t b = 0; b < parts; ++b) {
    const double c = centre[b];
    const double w = weight[b];
    for (std::size_t j = 0; j < count; ++j) {
      const double z = (x[j] - c) * inv_sd;
      out[j] += w * numeric::vector_exp(-0.5 * (z * z));
    }
  }
}

}  // namespace

void add_log_sums(const double* a, const double* b, double* out, std::size_t count) {
  log_sums(a, b, out, count);
}

void add_normal(double estimate, double precision_half, double constant, const double* means, double* out,
                std::size_t count) {
  normal(estimate, precision_half, constant, means, out, count);
}

void add_log_power(double location, double inv_scale, double inv_df, double power, double constant,
                   const double* x, double* out, std::size_t count) {
  log_power(location, inv_scale, inv_df, power, constant, x, out, count);
}

void add_mixture(const double* centre, const double* weight, std::size_t parts, double inv_sd,
                 const double* x, double* out, std::size_t count) {
  mixture(centre, weight, parts, inv_sd, x, out, count);
}

}  // namespace steelyard::pool_room
