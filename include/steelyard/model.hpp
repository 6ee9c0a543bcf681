// Room "model": priors and their grammar, likelihoods.
#pragma once

#include <limits>
#include <optional>
#include <span>
#include <string>
#include <string_view>
#include <variant>
#include <vector>

#include "steelyard/base.hpp"
#include "steelyard/study.hpp"

namespace steelyard {

// ---- priors of the mean effect ------------------------------------------------------------------

struct CauchyPrior {
  double location = 0.0, scale = 1.0;
};  ///< scale > 0
struct NormalPrior {
  double mean = 0.0, sd = 1.0;
};  ///< sd > 0
struct StudentTPrior {
  double location = 0.0, scale = 1.0, df = 1.0;
};  ///< scale > 0, df > 0
struct UniformPrior {
  double low = -1.0, high = 1.0;
};  ///< low < high
/// Density 1 everywhere. Improper: only ratios of marginal likelihoods under it mean anything.
/// Not in the grammar; used where a published definition starts from it.
struct FlatPrior {};

using EffectFamily = std::variant<CauchyPrior, NormalPrior, StudentTPrior, UniformPrior, FlatPrior>;

/// Which mean effects the prior allows.
enum class Direction { either, greater, less };

struct EffectPrior {
  EffectFamily family = CauchyPrior{0.0, 0.70710678118654752440};
  Direction direction = Direction::either;
};

// ---- priors of the spread τ (not τ²) -------------------------------------------------------------

struct HalfCauchyPrior {
  double scale = 1.0;
};
struct HalfNormalPrior {
  double scale = 1.0;
};
struct HalfStudentTPrior {
  double scale = 1.0, df = 1.0;
};
struct InverseGammaPrior {
  double shape = 1.0, scale = 0.15;
};
struct LogNormalPrior {
  double log_mean = 0.0, log_sd = 1.0;
};
struct ExponentialPrior {
  double mean = 1.0;
};
struct UniformSpreadPrior {
  double low = 0.0, high = 1.0;
};  ///< 0 ≤ low < high

using SpreadFamily = std::variant<HalfCauchyPrior, HalfNormalPrior, HalfStudentTPrior, InverseGammaPrior,
                                  LogNormalPrior, ExponentialPrior, UniformSpreadPrior>;

struct SpreadPrior {
  SpreadFamily family = InverseGammaPrior{};
};

/// Natural log of the prior density, renormalized for the direction; -infinity outside the support.
[[nodiscard]] double log_density(const EffectPrior& prior, double effect);
[[nodiscard]] double log_density(const SpreadPrior& prior, double spread);
/// P(effect ≤ x) and P(effect > x) under the prior as cut; each computed directly, never as 1 − the other.
[[nodiscard]] double cdf(const EffectPrior& prior, double effect);
[[nodiscard]] double upper_cdf(const EffectPrior& prior, double effect);
[[nodiscard]] double cdf(const SpreadPrior& prior, double spread);
[[nodiscard]] double upper_cdf(const SpreadPrior& prior, double spread);
/// The value below which probability p lies, 0 < p < 1; |cdf(quantile(p)) − p| ≤ 1e-12.
[[nodiscard]] double quantile(const EffectPrior& prior, double p);
[[nodiscard]] double quantile(const SpreadPrior& prior, double p);

/// Where the density lives and where a quadrature rule should look closely.
struct PriorShape {
  double low = -std::numeric_limits<double>::infinity();  ///< support
  double high = std::numeric_limits<double>::infinity();
  double center = 0.0;    ///< the mode; where a cut has removed it, the edge that is left
  double scale = 1.0;     ///< its width; at an edge, the length over which the density falls by e
  double log_peak = 0.0;  ///< largest log density inside the support
};
[[nodiscard]] PriorShape shape(const EffectPrior& prior);
[[nodiscard]] PriorShape shape(const SpreadPrior& prior);

/// The k-th absolute moment exists when k < this (infinity for light tails). For spread priors: the
/// order of their own upper tail.
[[nodiscard]] double tail_order(const EffectPrior& prior);
[[nodiscard]] double tail_order(const SpreadPrior& prior);

/// Error when the direction leaves no prior mass (a log mass below −1e6 counts as none) or a parameter
/// is out of its domain.
[[nodiscard]] std::optional<Diagnostic> problem_with(const EffectPrior& prior);
[[nodiscard]] std::optional<Diagnostic> problem_with(const SpreadPrior& prior);

/// Grammar: docs/model.md. Accepts families with positional arithmetic arguments, `cauchy(0, 1/sqrt(2))`,
/// and the names of published priors. Messages point at the character.
[[nodiscard]] Outcome<EffectPrior> parse_effect_prior(std::string_view text);
[[nodiscard]] Outcome<SpreadPrior> parse_spread_prior(std::string_view text);
/// Shortest text that parses back to the same prior (direction not included).
[[nodiscard]] std::string to_text(const EffectPrior& prior);
[[nodiscard]] std::string to_text(const SpreadPrior& prior);
[[nodiscard]] std::string_view to_text(Direction direction);

/// A prior from the literature that can be used by name.
struct PublishedPrior {
  std::string_view name;        ///< kebab-case
  std::string_view definition;  ///< in the grammar
  std::string_view where;       ///< what it was made for
  std::string_view source;      ///< reference
};
[[nodiscard]] std::span<const PublishedPrior> published_effect_priors();
[[nodiscard]] std::span<const PublishedPrior> published_spread_priors();

// ---- likelihoods ----------------------------------------------------------------------------------

/// What one study says about its effect, with the changes that some analyses make to it.
struct Likelihood {
  Evidence evidence;
  double power = 1.0;  ///< 0 ≤ power: the log likelihood is multiplied by it
  /// The study was seen only because |T| exceeded this (signed selection: T itself, when
  /// `selected_upper_only`): its likelihood is divided by that probability.
  std::optional<double> selected_above;
  bool selected_upper_only = false;
};

/// The likelihood of a study as it stands.
[[nodiscard]] Likelihood likelihood(const Study& study);

/// log L(mean, spread): the study's own effect δ ~ Normal(mean, spread²) integrated out in closed form.
/// Any finite mean, spread ≥ 0. Accuracy: docs/numeric.md.
[[nodiscard]] double log_likelihood(const Likelihood& likelihood, double mean, double spread);

/// The same for many means at one spread: out[j] += log L(means[j], spread).
void add_log_likelihood(const Likelihood& likelihood, double spread, std::span<const double> means,
                        std::span<double> out);

}  // namespace steelyard
