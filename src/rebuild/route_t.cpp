// A printed t with its sizes.
#include <cmath>

#include "rebuild/routes.hpp"
#include "rebuild/sign.hpp"
#include "rebuild/welch.hpp"

namespace steelyard::rebuilding {

namespace {

bool applies(const Numbers& x) { return x.has(Col::t) && !is_welch(x); }

std::optional<Solution> solve(Numbers& x) {
  const auto frame = frame_of(x);
  if (!frame) return std::nullopt;
  const auto t = with_sign(x, Col::t);
  if (!t) return std::nullopt;
  return in_frame(*frame, *t);
}

}  // namespace

Route route_t() {
  return {{"t-and-n", "t, and n1 and n2 (or n, or df)", "T | δ ~ noncentral t(df, δ·√n_effective)",
           "Student (1908); Johnson & Welch (1940)", "study,t,n1,n2\nA,2.10,30,32"},
          "t as printed",
          {Col::t},
          applies,
          solve};
}

}  // namespace steelyard::rebuilding
