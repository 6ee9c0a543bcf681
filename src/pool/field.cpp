#include "pool/field.hpp"

#include <algorithm>
#include <array>
#include <cmath>
#include <limits>
#include <numbers>
#include <numeric>
#include <tuple>
#include <variant>

#include "pool/kernels.hpp"
#include "steelyard/numeric.hpp"

namespace steelyard::pool_room {

namespace {

constexpr double infinity = std::numeric_limits<double>::infinity();
/// Noncentralities beyond this are left to the room model, which follows the limit.
constexpr double farthest_ncp = 1e6;
constexpr std::size_t block = 64;  // nodes that are worked on at once

/// What the canonical order of the studies sorts by. The size of t comes before its sign, so that
/// mirrored data keep their order.
using Key = std::tuple<std::size_t, double, double, double, double, double>;

Key key(const Likelihood& study) {
  const double power = study.power;
  return std::visit(
      [power](const auto& e) -> Key {
        using E = std::decay_t<decltype(e)>;
        if constexpr (std::is_same_v<E, ExactT>) {
          return {e.folded ? 1U : 0U, e.df, e.n_effective, std::fabs(e.t), e.t, power};
        } else if constexpr (std::is_same_v<E, BandT>) {
          const double low = e.bands.empty() ? 0.0 : e.bands.front().low;
          const double high = e.bands.empty() ? 0.0 : e.bands.back().high;
          return {2U, e.df, e.n_effective, std::min(std::fabs(low), std::fabs(high)), low, power};
        } else {
          return {e.folded ? 4U : 3U, e.se, 0.0, std::fabs(e.estimate), e.estimate, power};
        }
      },
      study.evidence);
}

bool is_plain(const Likelihood& study) { return study.power == 1.0 && !study.selected_above; }

/// Whether all of a band's mass of effects is bounded on both sides.
bool is_bounding(const Likelihood& study) {
  if (!(study.power > 0.0) || study.selected_above) return false;
  const auto* band = std::get_if<BandT>(&study.evidence);
  if (band == nullptr) return true;
  return std::all_of(band->bands.begin(), band->bands.end(),
                     [](const Interval& b) { return std::isfinite(b.low) && std::isfinite(b.high); });
}

}  // namespace

Field::Field(std::span<const Likelihood> studies) {
  entries_.reserve(studies.size());
  for (const Likelihood& study : studies) add(study);
  order_.resize(studies.size());
  std::iota(order_.begin(), order_.end(), std::size_t{0});
  std::vector<Key> keys;
  keys.reserve(studies.size());
  for (const Likelihood& study : studies) keys.push_back(key(study));
  std::stable_sort(order_.begin(), order_.end(),
                   [&keys](std::size_t a, std::size_t b) { return keys[a] < keys[b]; });
  smallest_se_ = infinity;
  double low = 0.0;
  double high = 0.0;
  for (const Approximation& a : approximations_) {
    if (std::isfinite(a.variance)) smallest_se_ = std::min(smallest_se_, std::sqrt(a.variance));
    low = std::min(low, folded_ ? -std::fabs(a.estimate) : a.estimate);
    high = std::max(high, folded_ ? std::fabs(a.estimate) : a.estimate);
  }
  if (!std::isfinite(smallest_se_)) smallest_se_ = 1.0;
  largest_estimate_ = high - low;
}

void Field::add(const Likelihood& study) {
  bounding_ += is_bounding(study) ? 1U : 0U;
  const double weight = std::max(study.power, 1e-3);
  Approximation approximation{0.0, infinity};
  Entry entry{Kind::general, general_.size()};
  if (const auto* e = std::get_if<ExactT>(&study.evidence)) {
    const double shrink = e->df > 2.0 ? 1.0 - 0.75 / e->df : 0.8;
    approximation = {e->t / std::sqrt(e->n_effective) * shrink,
                     (1.0 + 0.5 * e->t * e->t / e->df) / e->n_effective / weight};
    folded_ = folded_ || e->folded;
    if (is_plain(study)) {
      entry = {e->folded ? Kind::folded : Kind::exact, exact_.size()};
      exact_.push_back({numeric::DensityKernel(e->df), e->t, e->n_effective, std::sqrt(e->n_effective)});
    }
  } else if (const auto* b = std::get_if<BandT>(&study.evidence)) {
    // A band's nearest end to zero says where it turns; only bounded bands pull towards their middle.
    double nearest = infinity;
    double low = infinity;
    double high = -infinity;
    for (const Interval& band : b->bands) {
      low = std::min(low, band.low);
      high = std::max(high, band.high);
      for (const double end : {band.low, band.high})
        if (std::fabs(end) < std::fabs(nearest)) nearest = end;
    }
    folded_ = folded_ || (low < 0.0 && high > 0.0);
    const double root = std::sqrt(b->n_effective);
    if (std::isfinite(low) && std::isfinite(high))
      approximation = {0.5 * (low + high) / root,
                       (1.0 + 0.1 * (high - low) * (high - low)) / b->n_effective / weight};
    else if (std::isfinite(nearest))
      approximation = {nearest / root, 100.0 / b->n_effective / weight};
    if (is_plain(study)) {
      entry = {Kind::band, bands_.size()};
      bands_.push_back({numeric::DensityKernel(b->df), b->df, b->n_effective, root, b->bands});
    }
  } else if (const auto* n = std::get_if<NormalEstimate>(&study.evidence)) {
    approximation = {n->estimate, n->se * n->se / weight};
    folded_ = folded_ || n->folded;
    if (is_plain(study) && !n->folded) {
      entry = {Kind::normal, estimates_.size()};
      estimates_.push_back({n->estimate, n->se * n->se});
    }
  }
  if (entry.kind == Kind::general) general_.push_back(study);
  entries_.push_back(entry);
  approximations_.push_back(approximation);
}

void Field::evaluate_entry(const Entry& entry, double spread, std::span<const double> means,
                           std::span<double> out) const {
  switch (entry.kind) {
    case Kind::exact:
    case Kind::folded: {
      const Exact& e = exact_[entry.index];
      const double s = std::sqrt(1.0 + e.n_effective * spread * spread);
      const double log_s = std::log(s);
      if (entry.kind == Kind::exact) {
        e.kernel.add(e.t / s, e.root_n / s, means, out, -log_s);
        return;
      }
      std::array<double, block> a;
      std::array<double, block> b;
      std::fill(a.begin(), a.end(), 0.0);
      std::fill(b.begin(), b.end(), 0.0);
      e.kernel.add(e.t / s, e.root_n / s, means, {a.data(), means.size()}, -log_s);
      e.kernel.add(-e.t / s, e.root_n / s, means, {b.data(), means.size()}, -log_s);
      add_log_sums(a.data(), b.data(), out.data(), means.size());
      return;
    }
    case Kind::band: {
      const Band& b = bands_[entry.index];
      const double s = std::sqrt(1.0 + b.n_effective * spread * spread);
      for (std::size_t j = 0; j < means.size(); ++j) {
        if (std::fabs(means[j] * b.root_n / s) > farthest_ncp) {
          out[j] += log_likelihood({BandT{b.bands, b.df, b.n_effective}, 1.0, {}, false}, means[j], spread);
          continue;
        }
        // From the side of the mean: once all probability is found the rest can't add any.
        double sum = -infinity;
        for (std::size_t i = 0; i < b.bands.size() && sum < 0.0; ++i) {
          const Interval& band = b.bands[means[j] > 0.0 ? b.bands.size() - 1 - i : i];
          sum =
              numeric::log_add(sum, b.kernel.log_band(band.low / s, band.high / s, means[j] * b.root_n / s));
        }
        out[j] += sum;
      }
      return;
    }
    case Kind::normal: {
      const Estimate& e = estimates_[entry.index];
      const double variance = e.variance + spread * spread;
      add_normal(e.estimate, 0.5 / variance, -0.5 * std::log(2.0 * std::numbers::pi * variance), means.data(),
                 out.data(), means.size());
      return;
    }
    case Kind::general:
      add_log_likelihood(general_[entry.index], spread, means, out);
      return;
  }
}

void Field::evaluate(double spread, std::span<const double> means, std::span<double> out) const {
  // Partial sums over groups of studies keep the rounding of long sums small.
  constexpr std::size_t group = 128;
  for (std::size_t first = 0; first < means.size(); first += block) {
    const std::size_t count = std::min(block, means.size() - first);
    // Filled up to whole vectors: a loop's scalar remainder costs more than the vectors before it.
    constexpr std::size_t lanes = 8;
    const std::size_t padded = (count + lanes - 1) / lanes * lanes;
    std::array<double, block> some;
    std::copy_n(means.begin() + static_cast<std::ptrdiff_t>(first), count, some.begin());
    std::fill(some.begin() + static_cast<std::ptrdiff_t>(count),
              some.begin() + static_cast<std::ptrdiff_t>(padded), some[count - 1]);
    std::array<double, block> total{};
    for (std::size_t start = 0; start < order_.size(); start += group) {
      std::array<double, block> partial{};
      const std::size_t stop = std::min(order_.size(), start + group);
      for (std::size_t i = start; i < stop; ++i)
        evaluate_entry(entries_[order_[i]], spread, {some.data(), padded}, {partial.data(), padded});
      for (std::size_t j = 0; j < padded; ++j) total[j] += partial[j];
    }
    std::copy_n(total.begin(), count, out.begin() + static_cast<std::ptrdiff_t>(first));
  }
}

double Field::at(double spread, double mean) const {
  double out = 0.0;
  evaluate(spread, {&mean, 1}, {&out, 1});
  return out;
}

void Field::evaluate_one(std::size_t study, double spread, std::span<const double> means,
                         std::span<double> out) const {
  for (std::size_t first = 0; first < means.size(); first += block) {
    const std::size_t count = std::min(block, means.size() - first);
    const std::span<double> some = out.subspan(first, count);
    std::fill(some.begin(), some.end(), 0.0);
    evaluate_entry(entries_[study], spread, means.subspan(first, count), some);
  }
}

double Field::rounding(double spread, double mean) const {
  double sum = 0.0;
  for (const std::size_t i : order_) {
    double value = 0.0;
    evaluate_entry(entries_[i], spread, {&mean, 1}, {&value, 1});
    const double variance = approximations_[i].variance + spread * spread;
    const double lambda2 = std::isfinite(variance) ? mean * mean / variance : 0.0;
    sum += std::fabs(value) + lambda2;
  }
  // The density's own error may have one sign in many studies: the table's bound for each.
  constexpr double density_error = 4e-14;
  return 4.0 * std::numeric_limits<double>::epsilon() * sum + density_error * static_cast<double>(size());
}

Guess Field::guess(double spread) const {
  double weights = 0.0;
  double sum = 0.0;
  for (const std::size_t i : order_) {
    const Approximation& a = approximations_[i];
    const double w = 1.0 / (a.variance + spread * spread);
    weights += w;
    sum += w * (folded_ ? std::fabs(a.estimate) : a.estimate);
  }
  if (!(weights > 0.0)) return {0.0, 1.0 + spread};
  return {sum / weights, 1.0 / std::sqrt(weights)};
}

bool Field::bounds(std::size_t study) const {
  const Entry& entry = entries_[study];
  if (entry.kind == Kind::general) return is_bounding(general_[entry.index]);
  if (entry.kind != Kind::band) return true;
  const Band& b = bands_[entry.index];
  return std::all_of(b.bands.begin(), b.bands.end(), [](const Interval& band) {
    return std::isfinite(band.low) && std::isfinite(band.high);
  });
}

std::vector<double> Field::variances() const {
  std::vector<double> out;
  out.reserve(entries_.size());
  for (const std::size_t i : order_) {
    const Entry& entry = entries_[i];
    if (entry.kind == Kind::exact || entry.kind == Kind::folded)
      out.push_back(1.0 / exact_[entry.index].n_effective);
    else if (entry.kind == Kind::band)
      out.push_back(1.0 / bands_[entry.index].n_effective);
    else
      out.push_back(approximations_[i].variance);
  }
  return out;
}

}  // namespace steelyard::pool_room
