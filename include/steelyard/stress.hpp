// Room "stress": the pooled answer again under changes, and what would turn it.
#pragma once

#include <array>
#include <cstddef>
#include <functional>
#include <optional>
#include <span>
#include <string>
#include <vector>

#include "steelyard/base.hpp"
#include "steelyard/pool.hpp"
#include "steelyard/study.hpp"

namespace steelyard {

struct StressOptions {
  PoolOptions pool;  ///< level of the intervals; shrunken effects are never computed here
  /// A Bayes factor of at least this, either way, is a verdict; less is "undecided". > 1.
  double verdict = 3.0;
  /// Factors on the width of the effect prior and on the scale of the spread prior, > 0, rising. Empty:
  /// 20 of each from 1/8 to 8 (a geometric series, so 1 lies between the middle two).
  std::vector<double> widths, scales;
  /// A label of each study (parallel to the studies) for subsets; empty: none.
  std::vector<std::string> groups;
  bool grid = true;                ///< priors over the two-way grid
  bool shares = true;              ///< the evidence each study carries
  std::size_t exact_shares = 12;   ///< up to that many studies over all orders; at most 16
  std::size_t most_shares = 1000;  ///< beyond that many studies no shares
  unsigned threads = 1;            ///< ≥ 1; the result is the same for any number
  /// Called with (steps done, steps in all) now and then, from one thread at a time; false stops. May be
  /// empty.
  std::function<bool(std::size_t, std::size_t)> progress;
};

/// The side on which an answer comes down.
enum class Stand { effect, undecided, no_effect };
[[nodiscard]] std::string_view to_text(Stand stand);  ///< "an effect", "undecided", "no effect"

/// The pooled answer under one change.
struct Answer {
  std::optional<LogBayesFactor> effect, effect_fixed, effect_random, heterogeneity;
  Summary pooled_effect;  ///< averaged; empty where only the evidence was asked for
  bool accurate = true;
  std::string refused;  ///< why there is no answer (for instance no mass in the direction), or ""
};

struct SubsetAnswer {
  std::string group;
  std::size_t count = 0;  ///< studies in the group
  Answer only, without;   ///< `without` is refused when no study is left
};

/// Evidence for an effect over prior width × spread scale.
struct PriorGrid {
  std::vector<double> widths, scales;  ///< factors
  std::vector<LogBayesFactor> effect;  ///< averaged; [width index · scales.size() + scale index]
  std::vector<LogBayesFactor> heterogeneity;
  double lowest = 0.0, highest = 0.0;  ///< over the grid, log Bayes factor of an effect
};

/// The evidence a study carries: its mean contribution to the averaged log Bayes factor of an effect over
/// orders of arrival (Shapley's value); the shares add up to the whole.
struct Share {
  double log_bf = 0.0;
  double error = 0.0;  ///< numerical, and, where only some orders were taken, their spread
};

/// A family of changes.
enum class Change { study, order, width, scale, direction, model, group };

/// The smallest change of its kind that turns the verdict.
struct Turn {
  Change kind = Change::study;
  /// study: the one left out; order: how many had arrived, from 1; direction: as in `Direction`; model: 0 the
  /// same effect, 1 varying effects; group: into `subsets`. 0 for width and scale.
  std::size_t index = 0;
  bool left_out = true;         ///< group: left out, or alone
  double factor = 1.0;          ///< on the width or scale: beyond it the verdict turns
  double from = 0.0, to = 0.0;  ///< log Bayes factor of an effect as it stands and after the change
  Stand before = Stand::undecided, after = Stand::undecided;
};

/// Over all changes of a kind: between what the log Bayes factor of an effect stays.
struct Firmness {
  Change kind = Change::study;  ///< width: the whole two-way grid
  std::size_t count = 0;        ///< changes made
  double lowest = 0.0, highest = 0.0;
  bool same_stand = true;  ///< the verdict never turns
};

struct StressResult {
  Answer base;
  Stand stand = Stand::undecided;
  std::vector<Answer> without;     ///< leave one out, by study; empty for a single study
  std::vector<std::size_t> order;  ///< studies as they arrive: by year when all have one, else by row
  bool by_year = false;
  std::vector<Answer> cumulative;     ///< after the first, the first two, ...
  std::vector<SubsetAnswer> subsets;  ///< groups in the order of their first study
  std::array<Answer, 3> directions;   ///< either, greater, less
  std::optional<PriorGrid> grid;
  std::vector<Share> shares;       ///< by study; empty when not asked for
  bool shares_exact = true;        ///< over all orders
  std::size_t shares_orders = 0;   ///< orders taken when not
  std::vector<Turn> turns;         ///< of each kind at most one, studies first; none: nothing turned it
  std::vector<Firmness> firmness;  ///< of each kind that was tried
  bool accurate = true;
  bool stopped = false;  ///< `progress` asked to stop; what is there is incomplete
};

/// Error when pooling as it stands is refused, or an option is out of range. Pure.
[[nodiscard]] Outcome<StressResult> stress(std::span<const Study> studies, const Priors& priors,
                                           const StressOptions& options = {});

// ---- differences among groups ---------------------------------------------------------------------

struct GroupOptions {
  double level = 0.95;
  /// Prior of each group's deviation from the common mean, independent; symmetric around 0. The default
  /// makes the difference between any two groups Cauchy(0, 1/√2), the default prior of an effect.
  EffectFamily deviation = CauchyPrior{0.0, 0.35355339059327376220};
  bool shared_spread = true;  ///< one spread for all groups, or each its own under the same prior
};

struct GroupAnswer {
  std::string name;
  std::vector<std::size_t> studies;
  PoolResult pooled;  ///< the group alone
};

/// A common mean against a common mean with group deviations; formulas in docs/methods.md.
struct GroupResult {
  GroupOptions options;
  std::vector<GroupAnswer> groups;  ///< in the order of their first study
  /// Evidence for a difference among groups: with one effect within each group, with effects that vary
  /// within groups, and both together by the model probabilities.
  LogBayesFactor fixed;
  std::optional<LogBayesFactor> random, averaged;
  bool accurate = true;
};

/// `labels` is parallel to the studies. Error when there are fewer than two groups, a label is empty, the
/// deviation isn't centred at 0, or pooling a group is refused.
[[nodiscard]] Outcome<GroupResult> compare_groups(std::span<const Study> studies,
                                                  std::span<const std::string> labels, const Priors& priors,
                                                  const GroupOptions& options = {});

}  // namespace steelyard
