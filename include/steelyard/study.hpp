// Room "study": the value types of a printed number and of a rebuilt study.
#pragma once

#include <cstddef>
#include <limits>
#include <optional>
#include <string>
#include <variant>
#include <vector>

namespace steelyard {

/// How a printed cell relates to the quantity it reports.
enum class Relation {
  none,             ///< no number in this cell
  rounded,          ///< `2.10`: the value lies in the rounding band [low, high]
  exact,            ///< `=2.1!`: the value is exact, low == high == value
  bounded,          ///< `<.05`, `>.10`, `.01..05`: anywhere in [low, high]; no value
  not_significant,  ///< `ns`, `n.s.`: p above alpha; no value and no bounds of its own
};

/// A number as printed. `value` is NaN unless `has_value()`. An open end is ±infinity.
struct Printed {
  double value = std::numeric_limits<double>::quiet_NaN();
  double low = -std::numeric_limits<double>::infinity();
  double high = std::numeric_limits<double>::infinity();
  Relation relation = Relation::none;
  int decimals = 0;  ///< digits after the point as printed (after scaling by 1/100 for a percentage)

  [[nodiscard]] bool has_value() const {
    return relation == Relation::rounded || relation == Relation::exact;
  }
  [[nodiscard]] bool is_bound() const {
    return relation == Relation::bounded || relation == Relation::not_significant;
  }
  [[nodiscard]] bool present() const { return relation != Relation::none; }
};

/// How the scores were gathered.
enum class Design { two_groups, one_sample, paired };

/// A closed interval of t values, low < high; ends may be infinite.
struct Interval {
  double low = 0.0;
  double high = 0.0;
};

/// A t value known to its printed digits: T | effect ~ noncentral t with `df` degrees of freedom and
/// noncentrality effect·√n_effective. `folded`: only |t| is known.
struct ExactT {
  double t = 0.0;
  double df = 1.0;           ///< ≥ 1
  double n_effective = 1.0;  ///< > 0
  bool folded = false;
};

/// Only known: t lies in the union of these disjoint intervals.
struct BandT {
  std::vector<Interval> bands;
  double df = 1.0;
  double n_effective = 1.0;
};

/// An estimate and its standard error, both in the metric's units: estimate | effect ~
/// Normal(effect, se²). `folded`: only |estimate| is known.
struct NormalEstimate {
  double estimate = 0.0;
  double se = 1.0;  ///< > 0
  bool folded = false;
};

/// What a row says about its study's effect, in the form the likelihood needs.
using Evidence = std::variant<ExactT, BandT, NormalEstimate>;

/// The effect as it is usually printed; d and g are null outside the `smd` metric, g and its se
/// where Hedges' J does not exist (df ≤ 1, df ≤ 2), all of them where only a band is known.
struct EffectSize {
  std::optional<double> d;   ///< Cohen's d (or the estimate itself in another metric)
  std::optional<double> g;   ///< Hedges' g = J·d
  std::optional<double> se;  ///< standard error of g (of the estimate in another metric)
};

/// Another way in which the same row gives the test statistic, kept for checking.
struct AlternativeRoute {
  std::string route;
  double t = 0.0;
};

/// One rebuilt study.
struct Study {
  std::string label;     ///< the `study` cell, or "row N"
  std::size_t row = 0;   ///< index into Table::rows
  std::size_t line = 0;  ///< line in the file, from 1
  std::string route;     ///< id of the route, for instance "t-and-n"
  std::string how;       ///< one sentence: how the evidence was rebuilt from which cells
  Design design = Design::two_groups;
  std::string metric = "smd";
  Evidence evidence;
  EffectSize effect;
  std::optional<double> year;
  std::string role;              ///< "", "original" or "replication"
  std::optional<double> raw_sd;  ///< the SD in raw units that turns d into a raw difference
  /// What the same cells say at the corners of their rounding bands: the evidence of the smallest
  /// and the largest effect that rounding allows; absent when nothing is rounded.
  std::optional<Evidence> at_low;
  std::optional<Evidence> at_high;
  std::vector<AlternativeRoute> alternatives;
  std::vector<std::string> cautions;  ///< sentences that must stand beside the study
};

/// The t value, or nothing when only a band or an estimate is known.
[[nodiscard]] std::optional<double> t_value(const Study& study);
/// Degrees of freedom, or nothing for an estimate with its standard error.
[[nodiscard]] std::optional<double> degrees_of_freedom(const Study& study);
/// Effective sample size, or nothing for an estimate with its standard error.
[[nodiscard]] std::optional<double> effective_n(const Study& study);
/// "exact_t", "t_band" or "normal".
[[nodiscard]] const char* likelihood_name(const Evidence& evidence);
/// Whether the evidence leaves the sign of the effect open.
[[nodiscard]] bool is_folded(const Evidence& evidence);

}  // namespace steelyard
