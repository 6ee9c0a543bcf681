// The inner loops: plain pointers, no branches, no calls.
#include "numeric/kernel.hpp"

#include <cstddef>

#include "numeric/multiversion.hpp"

namespace steelyard::numeric {

namespace {

template <int Terms>
[[gnu::always_inline]] inline void add_terms(const DensityConstants& k, const double* __restrict polynomial,
                                             double scale, const double* __restrict means,
                                             double* __restrict out, std::size_t count) {
  for (std::size_t j = 0; j < count; ++j) {
    const Saddle node = saddle(k, scale * means[j]);
    out[j] += node.smooth + remainder_large<Terms>(polynomial, node.c);
  }
}

STEELYARD_MULTIVERSION
void add_large(const DensityConstants& shared, const double* polynomial, int terms, double ncp_per_mean,
               const double* __restrict means, double* __restrict out, std::size_t count) {
  const DensityConstants k = shared;
  const double scale = k.sign * ncp_per_mean;
  if (terms <= 6)
    add_terms<6>(k, polynomial, scale, means, out, count);
  else if (terms <= 10)
    add_terms<10>(k, polynomial, scale, means, out, count);
  else if (terms <= 14)
    add_terms<14>(k, polynomial, scale, means, out, count);
  else
    add_terms<RemainderPolynomial::large_terms>(k, polynomial, scale, means, out, count);
}

STEELYARD_MULTIVERSION
void add_small(const DensityConstants& shared, const RemainderPolynomial::Local& remainder,
               double ncp_per_mean, const double* __restrict means, double* __restrict out,
               std::size_t count) {
  const DensityConstants k = shared;
  const double scale = k.sign * ncp_per_mean;
  const double* edges = remainder_theta_edges();
  for (std::size_t j = 0; j < count; ++j) {
    const Saddle node = saddle(k, scale * means[j]);
    out[j] += node.smooth + remainder_small(remainder, edges, node.c);
  }
}

STEELYARD_MULTIVERSION
void over_t_large(const DensityConstants& shared, const double* polynomial, double ncp,
                  const double* __restrict ts, double* __restrict out, std::size_t count) {
  DensityConstants k = shared;
  for (std::size_t j = 0; j < count; ++j) {
    set_t(k, ts[j]);
    const Saddle node = saddle(k, k.sign * ncp);
    out[j] = node.smooth + remainder_large<RemainderPolynomial::large_terms>(polynomial, node.c);
  }
}

STEELYARD_MULTIVERSION
void over_t_small(const DensityConstants& shared, const RemainderPolynomial::Local& remainder, double ncp,
                  const double* __restrict ts, double* __restrict out, std::size_t count) {
  DensityConstants k = shared;
  const double* edges = remainder_theta_edges();
  for (std::size_t j = 0; j < count; ++j) {
    set_t(k, ts[j]);
    const Saddle node = saddle(k, k.sign * ncp);
    out[j] = node.smooth + remainder_small(remainder, edges, node.c);
  }
}

}  // namespace

DensityKernel::DensityKernel(double df)
    : constants_(density_constants(0.0, df)), remainder_(remainder_polynomial(df)) {}

double DensityKernel::at(double t, double ncp) const {
  DensityConstants k = constants_;
  set_t(k, t);
  const Saddle node = saddle(k, k.sign * ncp);
  return node.smooth +
         (!remainder_.local
              ? remainder_large<RemainderPolynomial::large_terms>(remainder_.single.data(), node.c)
              : remainder_small(*remainder_.local, remainder_theta_edges(), node.c));
}

void DensityKernel::add(double t, double ncp_per_mean, std::span<const double> means, std::span<double> out,
                        double shift) const {
  DensityConstants k = constants_;
  set_t(k, t);
  k.constant += shift;
  if (!remainder_.local)
    add_large(k, remainder_.single.data(), remainder_.terms, ncp_per_mean, means.data(), out.data(),
              means.size());
  else
    add_small(k, *remainder_.local, ncp_per_mean, means.data(), out.data(), means.size());
}

void DensityKernel::over_t(std::span<const double> ts, double ncp, std::span<double> out) const {
  if (!remainder_.local)
    over_t_large(constants_, remainder_.single.data(), ncp, ts.data(), out.data(), ts.size());
  else
    over_t_small(constants_, *remainder_.local, ncp, ts.data(), out.data(), ts.size());
}

}  // namespace steelyard::numeric
