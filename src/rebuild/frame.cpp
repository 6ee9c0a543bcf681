#include "rebuild/frame.hpp"

#include <fmt/format.h>

#include <cmath>

#include "rebuild/groups.hpp"

namespace steelyard::rebuilding {

namespace {

bool asks_for_pairs(const Numbers& x) {
  return x.present(Col::r_pair) || x.present(Col::sd_diff) ||
         (x.present(Col::mean1) && x.present(Col::mean2));
}

void say_split(Numbers& x, Col col, double total) {
  x.caution(
      col, "split-assumed",
      fmt::format(
          "Only the total of {:g} is printed, so two equal groups of {:g} are assumed; a 1:2 split would "
          "put d 6 % further from zero.",
          total, total / 2.0),
      "Give n1 and n2 if the paper prints them.");
}

void say_df_only(Numbers& x, double df, double total, std::string_view whom) {
  x.caution(Col::df, "size-from-df",
            fmt::format("No group size is printed; {:g} {} follow from df = {:g}.", total, whom, df),
            "Give the sizes if the paper prints them.");
}

void say_small_group(Numbers& x, Col col) {
  if (!x.has(col) || x[col] != 1.0) return;
  x.caution(col, "group-of-one",
            fmt::format("{} is 1: all of the spread comes from the other group.", name(col)),
            "Check that this is a size and not a group number.");
}

void say_residual_units(Numbers& x, double printed, double expected, std::string_view rule) {
  x.caution(
      Col::df, "residual-units",
      fmt::format("The printed df of {:g} is not {} = {:g}; it is used, and the effect is in units of the "
                  "residual SD of the analysis that it belongs to.",
                  printed, rule, expected),
      "Check the sizes and the df; give `covariates` if the analysis was adjusted.");
}

bool df_is_usable(Numbers& x, const Frame& frame) {
  if (frame.df >= 1.0) return true;
  const Col where = x.has(Col::df) ? Col::df : x.has(Col::n1) ? Col::n1 : Col::n;
  x.refuse(where, "no-df-left",
           fmt::format("The sizes leave {:g} degrees of freedom, and at least 1 is needed.", frame.df),
           "Check the sizes: two groups need n1 + n2 of at least 3, one sample or pairs an n of at least 2.");
  return false;
}

// Adjusted analyses: the residual SD is σ√(1−R²), and each covariate takes one df.
bool adjust(Numbers& x, Frame& frame) {
  if (!x.has(Col::covariates) && !x.has(Col::covariate_r)) return true;
  const double covariates = x.has(Col::covariates) ? x[Col::covariates] : 1.0;
  if (!x.has(Col::df)) frame.df -= covariates;
  if (!x.has(Col::covariate_r)) {
    if (covariates > 0.0) frame.metric = "smd-adjusted";
    return true;
  }
  const double r = x[Col::covariate_r];
  frame.ratio = std::sqrt((1.0 - r) * (1.0 + r));
  return true;
}

double expected_df(Numbers& x, double df) {
  if (x.has(Col::covariates)) return df - x[Col::covariates];
  return x.has(Col::covariate_r) ? df - 1.0 : df;
}

std::optional<Frame> two_group_frame(Numbers& x, FrameFrom from) {
  Frame frame;
  const auto sizes = two_group_sizes(x);
  if (!sizes) return std::nullopt;
  frame.people = sizes->n1 + sizes->n2;
  frame.n_scores = sizes->n1 * (sizes->n2 / frame.people);
  frame.df = frame.people - 2.0;
  if (from == FrameFrom::scores) return frame;
  if (x.has(Col::df)) {
    const double expected = expected_df(x, frame.df);
    frame.df = x[Col::df];
    if (frame.df != expected) say_residual_units(x, frame.df, expected, "n1 + n2 − 2");
  }
  if (!adjust(x, frame)) return std::nullopt;
  return frame;
}

// Paired scores on the scale of the single scores: c² = (s1²+s2²−2r·s1·s2)/((s1²+s2²)/2).
bool put_on_score_scale(Numbers& x, Frame& frame) {
  const auto r = pair_correlation(x);
  if (!r) {
    frame.metric = "smd-paired";
    return true;
  }
  double square = 2.0 * (1.0 - *r);
  if (x.has_all({Col::sd1, Col::sd2})) {
    const double a = x[Col::sd1];
    const double b = x[Col::sd2];
    square = 2.0 * (a * a + b * b - 2.0 * *r * a * b) / (a * a + b * b);
  }
  frame.ratio = std::sqrt(square);
  return square > 0.0;
}

std::optional<Frame> single_frame(Numbers& x, Design design, FrameFrom from) {
  Frame frame;
  frame.design = design;
  const auto n = single_size(x);
  if (!n) return std::nullopt;
  frame.people = frame.n_scores = *n;
  frame.df = *n - 1.0;
  if (from == FrameFrom::test && x.has(Col::df)) {
    const double expected = expected_df(x, frame.df);
    frame.df = x[Col::df];
    if (frame.df != expected) say_residual_units(x, frame.df, expected, "n − 1");
  }
  if (design == Design::paired && !put_on_score_scale(x, frame)) return std::nullopt;
  return frame;
}

}  // namespace

std::optional<Design> design_of(Numbers& x) {
  if (has_third_group(x) && !x.present(Col::compare)) {
    x.refuse(x.present(Col::n3) ? Col::n3 : Col::mean3, "groups-not-chosen",
             "The row has more than two groups and does not say which of them to compare.",
             "Fill `compare`: 1-3 sets group 1 against group 3, 1+2-3 merges groups 1 and 2 first.");
    return std::nullopt;
  }
  if (x.present(Col::correlation) && !x.present(Col::design)) {
    x.refuse(Col::correlation, "test-of-correlation",
             "The row prints a correlation, so its test is not one of a mean difference.",
             "Leave the test out, or say in `design` what it compares.");
    return std::nullopt;
  }
  if (x.present(Col::compare)) return Design::two_groups;
  const std::string word = x.facts().word(Col::design);
  if (word == "two-groups") return Design::two_groups;
  if (word == "one-sample") return Design::one_sample;
  if (word == "paired") return Design::paired;
  if (x.has(Col::n1) && (x.has(Col::n2) || x.has(Col::n3))) return Design::two_groups;
  if (x.has(Col::n_total)) return Design::two_groups;
  if (x.has(Col::n1) != x.has(Col::n2)) {
    const Col given = x.has(Col::n1) ? Col::n1 : Col::n2;
    const Col wanted = x.has(Col::n1) ? Col::n2 : Col::n1;
    x.refuse(given, "group-size-missing",
             fmt::format("{} is given but {} is empty.", name(given), name(wanted)),
             fmt::format("Fill {}, or give n and say in `design` whether it is one_sample or paired.",
                         name(wanted)));
    return std::nullopt;
  }
  if (x.has(Col::n) && x.present(Col::r_pair)) return Design::paired;
  if (x.has(Col::n) && !asks_for_pairs(x)) return Design::one_sample;
  if (x.has(Col::n) && x.present(Col::sd_diff)) return Design::paired;
  x.refuse(x.has(Col::n) ? Col::n : Col::df, "design-unknown",
           "The sizes do not tell whether this is a test of two groups, of one sample or of pairs.",
           "Fill `design` with two_groups, one_sample or paired, or give n1 and n2 for two groups.");
  return std::nullopt;
}

std::optional<Sizes> two_group_sizes(Numbers& x) {
  if (x.present(Col::compare)) {
    const auto sides = comparison_of(x);
    if (!sides) return std::nullopt;
    const auto first = size_of(x, sides->first);
    const auto second = size_of(x, sides->second);
    return first && second ? std::optional(Sizes{*first, *second}) : std::nullopt;
  }
  if (x.has_all({Col::n1, Col::n2})) {
    say_small_group(x, Col::n1);
    say_small_group(x, Col::n2);
    return Sizes{x[Col::n1], x[Col::n2]};
  }
  for (const Col col : {Col::n_total, Col::n}) {
    if (!x.has(col)) continue;
    const double total = x[col];
    say_split(x, col, total);
    return Sizes{total / 2.0, total / 2.0};
  }
  if (x.has(Col::df) && !x.has(Col::n1) && !x.has(Col::n2)) {
    const double total = x[Col::df] + 2.0;
    say_df_only(x, x[Col::df], total, "people");
    say_split(x, Col::df, total);
    return Sizes{total / 2.0, total / 2.0};
  }
  x.refuse(Col::n1, "no-sample-size", "The row has no sizes for its two groups.",
           "Fill n1 and n2 (or n_total, or df).");
  return std::nullopt;
}

std::optional<double> single_size(Numbers& x) {
  if (x.has(Col::n)) return x[Col::n];
  if (x.has(Col::n1) && (!x.has(Col::n2) || x[Col::n1] == x[Col::n2])) return x[Col::n1];
  if (x.has(Col::df)) {
    const double n = x[Col::df] + 1.0;
    say_df_only(x, x[Col::df], n, "scores");
    return n;
  }
  x.refuse(Col::n, "no-sample-size", "The row has no size for its sample.", "Fill n (or df).");
  return std::nullopt;
}

std::optional<double> pair_correlation(Numbers& x) {
  if (x.has(Col::r_pair)) return x[Col::r_pair];
  return x.options().r_pair;
}

std::optional<Frame> frame_of(Numbers& x, FrameFrom from) {
  const auto design = design_of(x);
  if (!design) return std::nullopt;
  auto frame = *design == Design::two_groups ? two_group_frame(x, from) : single_frame(x, *design, from);
  if (!frame || !df_is_usable(x, *frame)) return std::nullopt;
  frame->n_effective = frame->n_scores / (frame->ratio * frame->ratio);
  return frame;
}

ExactT exact(const Frame& frame, double t, bool folded) {
  return {folded ? std::abs(t) : t, frame.df, frame.n_effective, folded};
}

}  // namespace steelyard::rebuilding
