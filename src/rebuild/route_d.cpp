// A printed Cohen's d or Hedges' g with its sizes.
#include <fmt/format.h>

#include <cmath>

#include "rebuild/routes.hpp"
#include "rebuild/sign.hpp"

namespace steelyard::rebuilding {

namespace {

bool d_applies(const Numbers& x) { return x.has(Col::d); }
bool g_applies(const Numbers& x) { return x.has(Col::g); }

void say_pairs(Numbers& x, const Frame& frame, Col col) {
  if (frame.design != Design::paired) return;
  x.caution(
      col, "d-of-differences",
      fmt::format("{} of pairs was taken as the mean difference over the SD of the differences.", name(col)),
      "Give t instead if the paper standardized by another SD.");
}

std::optional<Solution> solve_d(Numbers& x) {
  const auto frame = frame_of(x);
  if (!frame) return std::nullopt;
  const auto d = with_sign(x, Col::d);
  if (!d) return std::nullopt;
  say_pairs(x, *frame, Col::d);
  return in_frame(*frame, *d * std::sqrt(frame->n_scores));
}

std::optional<Solution> solve_g(Numbers& x) {
  const auto frame = frame_of(x);
  if (!frame) return std::nullopt;
  if (frame->df <= 1.0) {
    x.refuse(Col::g, "no-hedges-factor",
             "Hedges' g needs more than one degree of freedom, and the sizes leave 1.",
             "Give t, or Cohen's d as d.");
    return std::nullopt;
  }
  const auto g = with_sign(x, Col::g);
  if (!g) return std::nullopt;
  say_pairs(x, *frame, Col::g);
  return in_frame(*frame, *g / hedges_j(frame->df) * std::sqrt(frame->n_scores));
}

}  // namespace

Route route_d() {
  return {{"d-and-n", "d, and n1 and n2 (or n, or df)", "T = d·√(n1·n2/(n1+n2)), or d·√n",
           "Cohen (1988); Borenstein et al. (2009), ch. 4", "study,d,n1,n2\nA,0.61,25,27"},
          "t from Cohen's d",
          {Col::d},
          d_applies,
          solve_d};
}

Route route_g() {
  return {{"g-and-n", "g, and n1 and n2 (or n, or df)", "d = g/J(df), then as for d", "Hedges (1981)",
           "study,g,n1,n2\nA,0.60,25,27"},
          "t from Hedges' g",
          {Col::g},
          g_applies,
          solve_g};
}

}  // namespace steelyard::rebuilding
