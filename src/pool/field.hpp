// The log likelihood of a set of studies over (mean, spread): the prior-free half of every integral.
#pragma once

#include <cstddef>
#include <span>
#include <vector>

#include "numeric/kernel.hpp"
#include "steelyard/model.hpp"

namespace steelyard::pool_room {

/// Where a set of studies seems to put the mean, from Normal approximations: good enough to start a search.
struct Guess {
  double mean = 0.0;
  double sd = 1.0;
};

/// Immutable. Studies are kept in an order of their own, so that the order in which they were given
/// changes no bit of any result.
class Field {
 public:
  explicit Field(std::span<const Likelihood> studies);

  /// out[j] = Σ_i log L_i(means[j], spread).
  void evaluate(double spread, std::span<const double> means, std::span<double> out) const;
  [[nodiscard]] double at(double spread, double mean) const;

  /// log L of one study (in the order given to the constructor), out[j] = log L_i(means[j], spread).
  void evaluate_one(std::size_t study, double spread, std::span<const double> means,
                    std::span<double> out) const;

  /// Bound on the rounding error of the sum at a node: 4ε·Σ(λ² + |log L|), see docs/pool.md.
  [[nodiscard]] double rounding(double spread, double mean) const;

  [[nodiscard]] Guess guess(double spread) const;

  [[nodiscard]] std::size_t size() const { return order_.size(); }
  /// Some study leaves its sign open: the likelihood may have two humps, mirrored.
  [[nodiscard]] bool folded() const { return folded_; }
  /// How many studies bound their effect on both sides; what the tails of the posterior depend on.
  [[nodiscard]] std::size_t bounding() const { return bounding_; }
  [[nodiscard]] bool bounds(std::size_t study) const;
  /// The smallest standard error among the studies: the scale below which a spread can't be seen.
  [[nodiscard]] double smallest_se() const { return smallest_se_; }
  /// The largest distance of an estimate from zero or of two from each other.
  [[nodiscard]] double largest_estimate() const { return largest_estimate_; }
  /// Variances of the studies' estimates about their own effects.
  [[nodiscard]] std::vector<double> variances() const;

 private:
  enum class Kind { exact, folded, band, normal, general };
  struct Entry {
    Kind kind;
    std::size_t index;  ///< into the kind's own list
  };
  struct Exact {
    numeric::DensityKernel kernel;
    double t, n_effective, root_n;
  };
  struct Band {
    numeric::DensityKernel kernel;
    double df, n_effective, root_n;
    std::vector<Interval> bands;
  };
  struct Estimate {
    double estimate, variance;
  };
  struct Approximation {
    double estimate, variance;  ///< variance infinite: says nothing in this form
  };

  void add(const Likelihood& study);
  void evaluate_entry(const Entry& entry, double spread, std::span<const double> means,
                      std::span<double> out) const;

  std::vector<Entry> entries_;      ///< parallel to the constructor's input
  std::vector<std::size_t> order_;  ///< canonical order of the entries
  std::vector<Exact> exact_;        ///< folded ones too
  std::vector<Band> bands_;
  std::vector<Estimate> estimates_;
  std::vector<Likelihood> general_;  ///< powers and selection
  std::vector<Approximation> approximations_;
  bool folded_ = false;
  std::size_t bounding_ = 0;
  double smallest_se_ = 1.0;
  double largest_estimate_ = 0.0;
};

}  // namespace steelyard::pool_room
