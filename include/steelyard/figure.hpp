// Room "figure": a finished analysis turned into the numbers of a drawing. No bytes are made here.
#pragma once

#include <cstddef>
#include <optional>
#include <span>
#include <string>
#include <vector>

#include "steelyard/analysis.hpp"
#include "steelyard/stress.hpp"

namespace steelyard::figure {

// ---- scales ------------------------------------------------------------------------------------

/// A range of numbers along one direction of a figure.
struct Scale {
  double low = 0.0;
  double high = 1.0;  ///< low < high; both positive when logarithmic
  bool logarithmic = false;
  std::string title;

  /// Where a value lies: 0 at `low`, 1 at `high`, outside [0, 1] beyond them.
  [[nodiscard]] double at(double value) const;
  /// The value at a fraction of the way; the inverse of `at`.
  [[nodiscard]] double value_at(double fraction) const;
};

struct Tick {
  double value = 0.0;
  std::string text;  ///< with U+2212 as minus sign
};

/// Round tick values inside the scale, at most `at_most` (≥ 2) of them: multiples of 1, 2 or 5 times
/// a power of ten; on a logarithmic scale 1, 2, 5 times powers of ten, thinned to whole decades.
[[nodiscard]] std::vector<Tick> ticks(const Scale& scale, std::size_t at_most);

/// Decimals that show two figures or so of numbers that fill a range of this width.
[[nodiscard]] int decimals_for(double width);
/// A number with that many decimals, U+2212 as minus, never "−0"; beyond 1e7 as a power of ten.
[[nodiscard]] std::string number_text(double value, int decimals);

/// A probability in per cent: "97.5%", "<0.1%", ">99.9%".
[[nodiscard]] std::string percent_text(double share);

struct Point {
  double x = 0.0;
  double y = 0.0;
};
using Curve = std::vector<Point>;

/// A centre with its interval. What is absent has its reason.
struct Estimate {
  std::optional<double> centre, lower, upper;
  std::string reason;
};

/// What a figure says in words: its title and its finding, for titles, descriptions and captions.
struct Words {
  std::string title;
  std::string finding;
};

// ---- forest ------------------------------------------------------------------------------------

struct ForestStudy {
  std::size_t index = 0;  ///< into Analysis::studies
  std::string label;
  Curve likelihood;  ///< of the study alone against its effect, 1 at its highest point in the frame
  Estimate own;      ///< the study's effect after pooling
  double log_bf = 0.0;
  std::string mark;  ///< "", or what is unusual about the likelihood: "sign unknown", "bound only"
};

struct ForestPooled {
  std::string label;
  Curve density;  ///< posterior density, 1 at its highest point in the frame; empty when not known
  Estimate estimate;
  std::optional<double> log_bf;  ///< absent where there is no such Bayes factor
  std::string no_bf;             ///< the reason why, in a few words
};

struct Forest {
  Words words;
  Verdict verdict;
  Scale effect;
  Scale weight;  ///< decibans; symmetrical around 0
  std::vector<ForestStudy> studies;
  std::vector<ForestPooled> pooled;  ///< same effect, varying effects, averaged, new study
  double level = 0.95;
  int decimals = 2;
  std::size_t of = 0;              ///< number of studies in the analysis; more than shown: an excerpt
  std::vector<std::string> notes;  ///< sentences that must stand below: excerpt, cut bars, reasons
};

struct ForestOptions {
  std::size_t most_rows = 400;  ///< ≥ 1; beyond it the studies that carry most evidence, in file order
};

[[nodiscard]] Forest forest(const Analysis& analysis, const ForestOptions& options = {});

/// The name of the effect for axes: "standardized mean difference", or the metric as named.
[[nodiscard]] std::string effect_name(std::span<const Study> studies);
/// Effect of the study as printed figures show it: g, else d, else nothing (a bound has none).
[[nodiscard]] std::optional<double> printed_effect(const Study& study);

// ---- surface -----------------------------------------------------------------------------------

/// The smallest region that holds a share of the posterior mass: closed rings, filled by the even-odd rule.
struct Region {
  double mass = 0.0;
  std::vector<Curve> rings;
};

/// Joint posterior of mean effect (x) and spread (y) if effects vary.
struct Surface {
  Words words;
  Scale effect, spread;
  std::vector<Region> regions;  ///< 99, 95, 80 and 50%, widest first
  Point peak;
};

/// Error when the spread is not identified or summaries were not asked for.
[[nodiscard]] Outcome<Surface> surface(const Analysis& analysis);

// ---- belief ------------------------------------------------------------------------------------

/// Belief about an effect at one stage, as quantiles.
struct BeliefStage {
  std::string label;
  std::vector<double> quantiles;  ///< parallel to Belief::probabilities; may lie outside the frame
  double above_zero = 0.5;        ///< probability of an effect above 0
};

/// How the data moved belief: before, after (the mean effect), and for a new study.
struct Belief {
  Words words;
  Scale effect;
  std::vector<double> probabilities;  ///< ascending and symmetrical around the median
  std::vector<BeliefStage> stages;
  /// The prior density over the posterior density at 0, as natural log, only where that is the Bayes factor;
  /// `ratio_note` says in a sentence what it is or why there is none.
  std::optional<double> log_ratio_at_zero;
  std::string ratio_note;
};

/// Error when summaries were not asked for.
[[nodiscard]] Outcome<Belief> belief(const Analysis& analysis);

// ---- funnel ------------------------------------------------------------------------------------

struct FunnelStudy {
  std::size_t index = 0;
  std::string label;
  double effect = 0.0;        ///< d (the estimate in another metric)
  double error = 0.0;         ///< standard error of the effect if there were none: 1/sqrt(n effective), or se
  bool outside_same = false;  ///< outside its own exact region around one shared effect
  bool outside_varying = false;  ///< and outside the one that allows for the spread
};

/// Effect against standard error with the exact regions in which 95% of the printed effects would lie.
struct Funnel {
  Words words;
  Scale effect, error;              ///< error: 0 at `low`, drawn upward
  double centre = 0.0;              ///< the shared effect
  Curve same_low, same_high;        ///< x effect, y error; one shared effect
  Curve varying_low, varying_high;  ///< with the spread at its posterior median; empty when not identified
  std::vector<FunnelStudy> studies;
  std::vector<std::string> notes;
};

/// Error when no study prints an effect (bounds only) or there is no pooled estimate.
[[nodiscard]] Outcome<Funnel> funnel(const Analysis& analysis);

// ---- what pooling again gives: ladder, sway, priors ------------------------------------------------

/// One pooled answer under a change: studies up to this one, or all but this one.
struct Answer {
  std::string label;  ///< of the study added or left out
  std::optional<double> year;
  std::optional<double> log_bf;  ///< effect against no effect, averaged; absent when not identified
  Estimate effect;               ///< mean effect, averaged
};

struct Rung {
  std::string label;
  std::optional<double> decibans;
};

/// Weight of evidence as studies arrive.
struct Ladder {
  Words words;
  Scale weight;
  std::vector<Rung> rungs;  ///< in order of arrival
};
/// `answers` in order of arrival; the last one holds all studies. At least one.
[[nodiscard]] Ladder ladder(std::span<const Answer> answers);

struct SwayRow {
  std::string label;
  std::optional<double> decibans;  ///< without this study
  Estimate effect;
};

/// What each study's removal does.
struct Sway {
  Words words;
  Scale weight;
  std::optional<double> decibans;  ///< with all studies
  std::vector<SwayRow> rows;       ///< the largest change first
  int decimals = 2;
  std::size_t of = 0;  ///< number of studies; more than rows: an excerpt
};
[[nodiscard]] Sway sway(std::optional<double> log_bf, std::span<const Answer> without,
                        std::size_t most_rows = 60);

/// Pooled evidence over a grid of priors.
struct PriorGrid {
  std::string width_name = "prior width of the effect";
  std::string scale_name = "prior scale of the spread";
  std::vector<double> widths;                 ///< ascending, positive
  std::vector<double> scales;                 ///< ascending, positive
  std::vector<std::optional<double>> log_bf;  ///< widths.size() × scales.size(), the scale runs fastest
  double width_used = 0.0;                    ///< of the analysis
  double scale_used = 0.0;
};

/// The answers and the grid of a stress analysis, for the figures above. `studies` and `priors` are those it
/// was made from; the grid's factors become widths and scales in the units of the priors.
[[nodiscard]] std::vector<Answer> arrivals(const StressResult& stress, std::span<const Study> studies);
[[nodiscard]] std::vector<Answer> removals(const StressResult& stress, std::span<const Study> studies);
[[nodiscard]] std::optional<PriorGrid> prior_grid(const StressResult& stress, const Priors& priors);

/// The grid as cells, with the line where the evidence changes sides.
struct PriorMap {
  Words words;
  Scale width, scale;                            ///< logarithmic
  std::vector<double> width_edges, scale_edges;  ///< of the cells, one more than cells
  std::vector<std::optional<double>> decibans;   ///< as in the grid
  std::vector<Curve> turns;                      ///< where the Bayes factor is 1
  Point used;
};
/// Error when the grid has fewer than two values a side or its sizes don't agree.
[[nodiscard]] Outcome<PriorMap> prior_map(const PriorGrid& grid);

}  // namespace steelyard::figure
