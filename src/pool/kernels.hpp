// Inner loops of the room: plain pointers, no branches, the same bits on every instruction set.
#pragma once

#include <cstddef>

namespace steelyard::pool_room {

/// out[j] += log(exp(a[j]) + exp(b[j])).
void add_log_sums(const double* a, const double* b, double* out, std::size_t count);

/// out[j] += constant − precision_half·(estimate − means[j])².
void add_normal(double estimate, double precision_half, double constant, const double* means, double* out,
                std::size_t count);

/// out[j] += constant − power·log1p(((x[j] − location)·inv_scale)²·inv_df): a Student-t shape.
void add_log_power(double location, double inv_scale, double inv_df, double power, double constant,
                   const double* x, double* out, std::size_t count);

/// out[j] += Σ_b weight[b]·exp(−½((x[j] − centre[b])·inv_sd)²): a mixture of Normal shapes of one width.
void add_mixture(const double* centre, const double* weight, std::size_t parts, double inv_sd,
                 const double* x, double* out, std::size_t count);

}  // namespace steelyard::pool_room
