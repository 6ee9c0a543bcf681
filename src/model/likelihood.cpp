// log L(mean, spread) of one study, its own effect integrated out in closed form (docs/model.md):
//   exact t:  (1/s)·f(t/s; ν, μ√n/s)        with s = √(1 + nτ²)
//   band:     P(a/s < T ≤ b/s; ν, μ√n/s)    summed over the bands
//   estimate: Normal(estimate; μ, se² + τ²)
// folded: the sum over both signs; selected: divided by the probability of being seen; power: times a weight.
#include <algorithm>
#include <array>
#include <cmath>
#include <cstddef>
#include <limits>
#include <numbers>
#include <span>
#include <variant>

#include "model/visit.hpp"
#include "steelyard/model.hpp"
#include "steelyard/numeric.hpp"

namespace steelyard {

namespace {

using model::Overloaded;

constexpr double infinity = std::numeric_limits<double>::infinity();
// Noncentralities to which the room numeric answers.
constexpr double largest_noncentrality = 1e6;
constexpr std::size_t block = 256;

const double log_sqrt_two_pi = 0.5 * std::log(2.0 * std::numbers::pi);

// The density of t, with a tail for noncentralities beyond 1e6: the Gaussian factor and the leading power
// of the noncentrality are followed exactly, what they multiply is held at its value at 1e6.
double log_density_t(double t, double df, double ncp) {
  if (std::abs(ncp) <= largest_noncentrality) return numeric::log_noncentral_t_density(t, df, ncp);
  const double edge = std::copysign(largest_noncentrality, ncp);
  const double growth = std::log(std::abs(ncp) / largest_noncentrality);
  const bool same_side = t * ncp > 0.0;
  const double exponent = same_side ? df / (2.0 * (df + t * t)) : 0.5;
  const double power = t == 0.0 ? 0.0 : same_side ? df : -(df + 1.0);
  return numeric::log_noncentral_t_density(t, df, edge) - exponent * (ncp - edge) * (ncp + edge) +
         power * growth;
}

// The same for a band: beyond 1e6 nothing but the end nearer to the noncentrality matters.
double log_band_t(const Interval& band, double df, double ncp) {
  if (std::abs(ncp) <= largest_noncentrality) {
    return numeric::log_noncentral_t_band(band.low, band.high, df, ncp);
  }
  const double edge = std::copysign(largest_noncentrality, ncp);
  const double held = numeric::log_noncentral_t_band(band.low, band.high, df, edge);
  const double near_end = ncp > 0.0 ? band.high : band.low;
  if (std::isinf(near_end)) return held;
  const bool same_side = near_end * ncp > 0.0;
  const double exponent = same_side ? df / (2.0 * (df + near_end * near_end)) : 0.5;
  return held - exponent * (ncp - edge) * (ncp + edge);
}

double inflation(double n_effective, double spread) { return std::sqrt(1.0 + n_effective * spread * spread); }

double log_normal_density(double z, double sd) { return -0.5 * z * z - std::log(sd) - log_sqrt_two_pi; }

double log_normal_band(double low, double high) {
  if (low > 0.0) {
    return numeric::log_subtract(numeric::log_normal_upper(low), numeric::log_normal_upper(high));
  }
  if (high < 0.0) {
    return numeric::log_subtract(numeric::log_normal_upper(-high), numeric::log_normal_upper(-low));
  }
  return std::log1p(-(numeric::normal_upper(high) + numeric::normal_upper(-low)));
}

// The region of T in which a study is seen; one interval, or two that mirror each other.
struct Seen {
  std::array<Interval, 2> parts;
  std::size_t count = 0;

  [[nodiscard]] std::span<const Interval> all() const { return {parts.data(), count}; }
  [[nodiscard]] bool contains(double t) const {
    return std::any_of(parts.begin(), parts.begin() + static_cast<std::ptrdiff_t>(count),
                       [t](const Interval& part) { return t >= part.low && t <= part.high; });
  }
};

constexpr Seen everything = {{Interval{-infinity, infinity}, {}}, 1};

Seen seen(const Likelihood& likelihood) {
  if (!likelihood.selected_above) return everything;
  const double c = *likelihood.selected_above;
  if (likelihood.selected_upper_only) return {{Interval{c, infinity}, {}}, 1};
  if (c <= 0.0) return everything;
  return {{Interval{-infinity, -c}, Interval{c, infinity}}, 2};
}

// The three kinds of evidence before selection and power: the log likelihood restricted to a region
// of T, and the log probability of that region.
double log_part(const ExactT& e, double mean, double spread, const Seen& region) {
  const double s = inflation(e.n_effective, spread);
  const double ncp = mean * std::sqrt(e.n_effective) / s;
  double sum = region.contains(e.t) ? log_density_t(e.t / s, e.df, ncp) : -infinity;
  if (e.folded && region.contains(-e.t)) sum = numeric::log_add(sum, log_density_t(-e.t / s, e.df, ncp));
  return sum - std::log(s);
}

double log_part(const BandT& e, double mean, double spread, const Seen& region) {
  const double s = inflation(e.n_effective, spread);
  const double ncp = mean * std::sqrt(e.n_effective) / s;
  double sum = -infinity;
  for (const Interval& band : e.bands) {
    for (const Interval& part : region.all()) {
      const Interval both = {std::max(band.low, part.low) / s, std::min(band.high, part.high) / s};
      if (both.low < both.high) sum = numeric::log_add(sum, log_band_t(both, e.df, ncp));
    }
  }
  return sum;
}

double log_part(const NormalEstimate& e, double mean, double spread, const Seen& region) {
  const double sd = std::hypot(e.se, spread);
  const double z = e.estimate / e.se;
  double sum = region.contains(z) ? log_normal_density((e.estimate - mean) / sd, sd) : -infinity;
  if (e.folded && region.contains(-z)) {
    sum = numeric::log_add(sum, log_normal_density((-e.estimate - mean) / sd, sd));
  }
  return sum;
}

double log_region_t(double df, double n_effective, double mean, double spread, const Seen& region) {
  const double s = inflation(n_effective, spread);
  const double ncp = mean * std::sqrt(n_effective) / s;
  double sum = -infinity;
  for (const Interval& part : region.all()) {
    sum = numeric::log_add(sum, log_band_t({part.low / s, part.high / s}, df, ncp));
  }
  return sum;
}

double log_region(const ExactT& e, double mean, double spread, const Seen& region) {
  return log_region_t(e.df, e.n_effective, mean, spread, region);
}
double log_region(const BandT& e, double mean, double spread, const Seen& region) {
  return log_region_t(e.df, e.n_effective, mean, spread, region);
}
double log_region(const NormalEstimate& e, double mean, double spread, const Seen& region) {
  const double sd = std::hypot(e.se, spread);
  double sum = -infinity;
  for (const Interval& part : region.all()) {
    sum =
        numeric::log_add(sum, log_normal_band((part.low * e.se - mean) / sd, (part.high * e.se - mean) / sd));
  }
  return sum;
}

// Exact t, signed: the fast kernel of the room numeric.
void add_exact(const ExactT& e, double sign, double spread, std::span<const double> means,
               std::span<double> out) {
  const double s = inflation(e.n_effective, spread);
  const double per_mean = std::sqrt(e.n_effective) / s;
  const double log_s = std::log(s);
  const auto inside = [per_mean](double mean) { return std::abs(mean * per_mean) <= largest_noncentrality; };
  // Runs of means inside the kernel's domain go to it at once, the others one by one.
  for (std::size_t j = 0; j < means.size();) {
    std::size_t end = j;
    while (end < means.size() && inside(means[end])) ++end;
    if (end > j) {
      numeric::add_log_noncentral_t(sign * e.t / s, e.df, per_mean, means.subspan(j, end - j),
                                    out.subspan(j, end - j));
      j = end;
    } else {
      out[j] += log_density_t(sign * e.t / s, e.df, means[j] * per_mean);
      ++j;
    }
  }
  for (double& value : out) value -= log_s;
}

void add_folded(const ExactT& e, double spread, std::span<const double> means, std::span<double> out) {
  for (std::size_t start = 0; start < means.size(); start += block) {
    const std::size_t count = std::min(block, means.size() - start);
    std::array<double, block> positive{};
    std::array<double, block> negative{};
    add_exact(e, 1.0, spread, means.subspan(start, count), {positive.data(), count});
    add_exact(e, -1.0, spread, means.subspan(start, count), {negative.data(), count});
    for (std::size_t j = 0; j < count; ++j) out[start + j] += numeric::log_add(positive[j], negative[j]);
  }
}

void add_estimate(const NormalEstimate& e, double spread, std::span<const double> means,
                  std::span<double> out) {
  const double sd = std::hypot(e.se, spread);
  const double constant = -std::log(sd) - log_sqrt_two_pi;
  for (std::size_t j = 0; j < means.size(); ++j) {
    const double z = (e.estimate - means[j]) / sd;
    out[j] += constant - 0.5 * z * z;
  }
}

// Without power and selection.
void add_plain(const Evidence& evidence, double spread, std::span<const double> means,
               std::span<double> out) {
  std::visit(Overloaded{[&](const ExactT& e) {
                          if (e.folded) {
                            add_folded(e, spread, means, out);
                          } else {
                            add_exact(e, 1.0, spread, means, out);
                          }
                        },
                        [&](const BandT& e) {
                          for (std::size_t j = 0; j < means.size(); ++j) {
                            out[j] += log_part(e, means[j], spread, everything);
                          }
                        },
                        [&](const NormalEstimate& e) {
                          if (!e.folded) {
                            add_estimate(e, spread, means, out);
                            return;
                          }
                          for (std::size_t j = 0; j < means.size(); ++j) {
                            out[j] += log_part(e, means[j], spread, everything);
                          }
                        }},
             evidence);
}

// Whether nothing that the evidence allows was hidden by the selection.
bool wholly_seen(const Evidence& evidence, const Seen& region) {
  const auto* exact = std::get_if<ExactT>(&evidence);
  return exact != nullptr && region.contains(exact->t) && (!exact->folded || region.contains(-exact->t));
}

// With power or selection: what is plain about it goes through the fast kernels, block by block.
void add_changed(const Likelihood& likelihood, double spread, std::span<const double> means,
                 std::span<double> out) {
  if (likelihood.power == 0.0) return;
  const Seen region = seen(likelihood);
  const bool split = !likelihood.selected_above || wholly_seen(likelihood.evidence, region);
  for (std::size_t start = 0; start < means.size(); start += block) {
    const std::size_t count = std::min(block, means.size() - start);
    const std::span<const double> some = means.subspan(start, count);
    std::array<double, block> values{};
    if (split) add_plain(likelihood.evidence, spread, some, {values.data(), count});
    for (std::size_t j = 0; j < count; ++j) {
      values[j] += std::visit(
          [&](const auto& e) {
            const double part = split ? 0.0 : log_part(e, some[j], spread, region);
            return likelihood.selected_above ? part - log_region(e, some[j], spread, region) : part;
          },
          likelihood.evidence);
      out[start + j] += likelihood.power * values[j];
    }
  }
}

}  // namespace

Likelihood likelihood(const Study& study) { return {study.evidence, 1.0, std::nullopt, false}; }

double log_likelihood(const Likelihood& likelihood, double mean, double spread) {
  // A study of weight 0 says nothing, even where its likelihood is 0.
  if (likelihood.power == 0.0) return 0.0;
  const Seen region = seen(likelihood);
  return std::visit(
      [&](const auto& evidence) {
        double value = log_part(evidence, mean, spread, region);
        if (likelihood.selected_above) value -= log_region(evidence, mean, spread, region);
        return likelihood.power * value;
      },
      likelihood.evidence);
}

void add_log_likelihood(const Likelihood& likelihood, double spread, std::span<const double> means,
                        std::span<double> out) {
  if (likelihood.power == 1.0 && !likelihood.selected_above) {
    add_plain(likelihood.evidence, spread, means, out);
  } else {
    add_changed(likelihood, spread, means, out);
  }
}

}  // namespace steelyard
