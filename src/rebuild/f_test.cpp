#include "rebuild/f_test.hpp"

#include <fmt/format.h>

namespace steelyard::rebuilding {

bool is_of_two_means(Numbers& x) { return !x.has(Col::df1) || has_one_numerator_df(x); }

bool has_one_numerator_df(Numbers& x) {
  if (!x.has(Col::df1)) {
    x.caution(Col::f, "df1-assumed",
              "df1 is empty, and F was taken to have one numerator df, as a test of two means has.",
              "Fill df1 from the paper: F(df1, df).");
    return true;
  }
  const double df1 = x[Col::df1];
  if (df1 == 1.0) return true;
  x.refuse(Col::df1, "f-with-several-df",
           fmt::format("An F with {:g} numerator df compares more than two means at once and can't give a t.",
                       df1),
           "Use the contrast of interest: its t or F(1, df), or the means, SDs and sizes of the two groups.");
  return false;
}

}  // namespace steelyard::rebuilding
