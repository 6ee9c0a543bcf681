// A point-biserial correlation: t = r·√df/√(1−r²).
#include <cmath>

#include "rebuild/routes.hpp"
#include "rebuild/sign.hpp"

namespace steelyard::rebuilding {

namespace {

bool applies(const Numbers& x) { return x.has(Col::r); }

std::optional<Solution> solve(Numbers& x) {
  const auto frame = frame_of(x);
  if (!frame) return std::nullopt;
  const auto r = with_sign(x, Col::r);
  if (!r || std::abs(*r) >= 1.0) return std::nullopt;
  return in_frame(*frame, *r * std::sqrt(frame->df / ((1.0 - *r) * (1.0 + *r))));
}

}  // namespace

Route route_r() {
  return {{"r-and-n", "r (point-biserial), and n1 and n2 (or n, or df)", "T = r·√df/√(1 − r²)",
           "Tate (1954); Borenstein et al. (2009), ch. 7", "study,r,n1,n2\nA,0.28,30,30"},
          "t from the point-biserial r",
          {Col::r},
          applies,
          solve};
}

}  // namespace steelyard::rebuilding
