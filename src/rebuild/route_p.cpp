// A printed p value: the t that has it, or the band of t that its digits allow.
#include <fmt/format.h>

#include "rebuild/f_test.hpp"
#include "rebuild/p_value.hpp"
#include "rebuild/routes.hpp"
#include "rebuild/welch.hpp"

namespace steelyard::rebuilding {

namespace {

bool applies(const Numbers& x) { return x.has(Col::p) && !is_welch(x); }

double width(const PBand& p, double df, const PKind& kind) {
  const PKind upward{kind.one_tailed, 1};
  return t_of_p(p.low, df, upward) - t_of_p(p.high, df, upward);
}

void say_coarse(Numbers& x, const PBand& p) {
  if (p.low == 0.0) {
    x.caution(Col::p, "p-of-zero",
              fmt::format("p = {} can only mean that p is below {:g}: all of that is used, not a p of 0.",
                          x.facts().text(Col::p), p.high),
              "Give t, F or more digits of p if the paper has them.");
    return;
  }
  x.caution(Col::p, "p-is-coarse",
            fmt::format("p = {} stands for anything from {:g} to {:g}, so only a band of t is known.",
                        x.facts().text(Col::p), p.low, p.high),
            "Give t, F or more digits of p if the paper has them.");
}

std::optional<Solution> solve(Numbers& x) {
  const auto frame = frame_of(x);
  const auto band = p_band(x);
  const auto kind = p_kind(x);
  if (!is_of_two_means(x)) return std::nullopt;
  if (!frame || !band || !kind) return std::nullopt;
  if (band->low < band->high && width(*band, frame->df, *kind) > coarse_width) {
    say_coarse(x, *band);
    return Solution{BandT{t_bands(*band, frame->df, *kind), frame->df, frame->n_effective}, frame->metric,
                    frame->design, frame->people, std::nullopt};
  }
  return in_frame(*frame, t_of_p(x[Col::p], frame->df, *kind), kind->sign == 0);
}

bool bound_applies(const Numbers& x) { return x.is_bound(Col::p) && !is_welch(x); }

std::optional<Solution> solve_bound(Numbers& x) {
  const auto frame = frame_of(x);
  const auto band = p_band(x);
  const auto kind = p_kind(x);
  if (!is_of_two_means(x)) return std::nullopt;
  if (!frame || !band || !kind) return std::nullopt;
  return Solution{BandT{t_bands(*band, frame->df, *kind), frame->df, frame->n_effective}, frame->metric,
                  frame->design, frame->people, std::nullopt};
}

}  // namespace

Route route_p() {
  return {{"p-and-n", "p (and tails), and n1 and n2 (or n, or df); sign or means, else the sign stays open",
           "|T| = t(1 − p/2; df), one-tailed T = t(1 − p; df); a coarse p is the band of its digits",
           "Student (1908)", "study,p,n1,n2,sign\nA,.036,15,15,+"},
          "t from p",
          {Col::p},
          applies,
          solve};
}

Route route_p_bound() {
  return {{"p-bound", "p as a bound (<.05, >.10, ns), and n1 and n2 (or n, or df)",
           "P(T in the values that the bound allows | δ)", "Heitjan & Rubin (1991), coarsening at random",
           "study,p,n1,n2\nA,<.05,20,20"},
          "band of t from the bound on p",
          {Col::p},
          bound_applies,
          solve_bound};
}

}  // namespace steelyard::rebuilding
