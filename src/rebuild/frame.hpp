// The sizes behind a test: what turns a t into evidence about a standardized effect.
#pragma once

#include <optional>
#include <string>

#include "rebuild/facts.hpp"

namespace steelyard::rebuilding {

/// With t the test statistic: T | δ ~ noncentral t(df, δ√n_effective), δ in the units of `metric`.
/// Cohen's d of the test's own scores is t/√n_scores, and δ = ratio·(t/√n_scores).
struct Frame {
  Design design = Design::two_groups;
  std::string metric = "smd";
  double df = 0.0;           ///< ≥ 1
  double n_scores = 0.0;     ///< n1·n2/(n1+n2), or n
  double n_effective = 0.0;  ///< n_scores/ratio²
  double ratio = 1.0;        ///< SD of the scores tested ÷ SD of the metric
  double people = 0.0;       ///< all observations: n1+n2, or n
};

/// The row's design, from its cell or from the sizes given; nothing (with a reason) when neither tells.
[[nodiscard]] std::optional<Design> design_of(Numbers& x);

/// What the frame is for. `test`: a printed statistic, whose printed df and covariates count. `scores`: a
/// test made from the scores' own means and SDs, whose df follow from the sizes.
enum class FrameFrom { test, scores };

/// The frame of the row; nothing (with a reason) when sizes are missing or leave no df.
[[nodiscard]] std::optional<Frame> frame_of(Numbers& x, FrameFrom from = FrameFrom::test);

/// The correlation of paired scores that holds for the row: its own cell or the one the user states for all.
[[nodiscard]] std::optional<double> pair_correlation(Numbers& x);

/// The evidence of a signed (or, when `folded`, absolute) t in this frame.
[[nodiscard]] ExactT exact(const Frame& frame, double t, bool folded = false);

/// Sizes of the two groups as stated or, from a total, split evenly; n only.
struct Sizes {
  double n1 = 0.0, n2 = 0.0;
};
[[nodiscard]] std::optional<Sizes> two_group_sizes(Numbers& x);
/// n of one sample or of pairs.
[[nodiscard]] std::optional<double> single_size(Numbers& x);

}  // namespace steelyard::rebuilding
