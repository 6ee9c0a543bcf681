// Room "figure": a finished analysis turned into the numbers of a drawing. No bytes are made here.
#pragma once

#include <cstddef>
#include <optional>
#include <span>
#include <string>
#include <vector>

#include "steelyard/analysis.hpp"

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

}  // namespace steelyard::figure
