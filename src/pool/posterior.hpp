// Everything after the integrals: curves made when they are first needed, and summaries of them.
#pragma once

#include <array>
#include <memory>
#include <mutex>
#include <optional>
#include <span>
#include <string>

#include "pool/densities.hpp"
#include "pool/existence.hpp"
#include "pool/marginal.hpp"
#include "steelyard/pool.hpp"

namespace steelyard::pool_room {

/// What a pooling has computed; owned by the posterior that it hands out.
struct Pooled {
  explicit Pooled(std::span<const Likelihood> studies, const Priors& with)
      : field(studies), prior(with.effect), priors(with) {}

  Field field;
  PriorBlock prior;
  Priors priors;
  FixedMarginal fixed;
  std::optional<RandomMarginal> random;  ///< absent for a single study
  double share_fixed = 1.0;              ///< posterior probability of the same-effect model given an effect
  double share_random = 0.0;             ///< of the varying-effects model given an effect
  MomentOrders orders{};
};

/// The curves are made once, on demand; making them is guarded, so that threads may share the object.
class PooledPosterior final : public Posterior {
 public:
  explicit PooledPosterior(std::unique_ptr<Pooled> pooled);

  [[nodiscard]] double effect_density(Within within, double x) const override;
  [[nodiscard]] double effect_cdf(Within within, double x) const override;
  [[nodiscard]] double effect_quantile(Within within, double p) const override;
  [[nodiscard]] double spread_density(double x) const override;
  [[nodiscard]] double spread_cdf(double x) const override;
  [[nodiscard]] double spread_quantile(double p) const override;
  [[nodiscard]] double new_study_density(Within within, double x) const override;
  [[nodiscard]] double new_study_cdf(Within within, double x) const override;
  [[nodiscard]] double new_study_quantile(Within within, double p) const override;
  [[nodiscard]] double joint_log_density(double effect, double spread) const override;

  [[nodiscard]] Summary effect_summary(Within within, double level) const;
  [[nodiscard]] Summary spread_summary(double level) const;
  [[nodiscard]] Summary new_study_summary(double level) const;
  [[nodiscard]] Summary i2_summary(double level) const;
  [[nodiscard]] Summary shrunken_summary(std::size_t study, double level) const;

  [[nodiscard]] const Pooled& pooled() const { return *pooled_; }

 private:
  struct Moments {
    double mean;
    double variance;
  };
  [[nodiscard]] Moments effect_moments(Within within) const;
  [[nodiscard]] const numeric::DensityCurve* fixed_curve() const;
  [[nodiscard]] const numeric::DensityCurve* random_curve() const;
  [[nodiscard]] const numeric::DensityCurve* spread_curve() const;
  [[nodiscard]] const numeric::DensityCurve* new_study_curve() const;
  [[nodiscard]] Mixture effect_mixture(Within within) const;
  [[nodiscard]] Mixture new_study_mixture(Within within) const;

  std::unique_ptr<Pooled> pooled_;
  mutable std::once_flag once_fixed_, once_random_, once_spread_, once_new_;
  mutable numeric::DensityCurve fixed_, random_, spread_, new_;
};

}  // namespace steelyard::pool_room
