// A printed F with one numerator df: |t| = √F.
#include <fmt/format.h>

#include <cmath>

#include "rebuild/f_test.hpp"
#include "rebuild/routes.hpp"
#include "rebuild/sign.hpp"

namespace steelyard::rebuilding {

namespace {

bool applies(const Numbers& x) { return x.has(Col::f); }

std::optional<Solution> solve(Numbers& x) {
  const auto frame = frame_of(x);
  if (!frame || !has_one_numerator_df(x)) return std::nullopt;
  const double root = std::sqrt(std::max(x[Col::f], 0.0));
  const int sign = sign_of(x);
  return in_frame(*frame, sign == 0 ? root : sign * root, sign == 0);
}

}  // namespace

Route route_f() {
  return {{"f-and-n", "f with df1 = 1, and n1 and n2 (or n, or df); sign or means, else the sign stays open",
           "|T| = √F", "Fisher (1925)", "study,f,df1,df,n1,n2,sign\nA,4.41,1,58,30,30,+"},
          "t from the root of F",
          {Col::f},
          applies,
          solve};
}

}  // namespace steelyard::rebuilding
