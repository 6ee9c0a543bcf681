// Pearson's correlation on Fisher's z scale, a metric of its own.
#include <cmath>

#include "rebuild/routes.hpp"
#include "rebuild/sign.hpp"

namespace steelyard::rebuilding {

namespace {

bool applies(const Numbers& x) { return x.has(Col::correlation); }

std::optional<double> pairs_of_scores(Numbers& x) {
  if (x.has(Col::n)) return x[Col::n];
  if (x.has(Col::n_total)) return x[Col::n_total];
  if (x.has_all({Col::n1, Col::n2})) return x[Col::n1] + x[Col::n2];
  if (x.has(Col::df)) return x[Col::df] + 2.0;
  return std::nullopt;
}

std::optional<Solution> solve(Numbers& x) {
  const auto n = pairs_of_scores(x);
  if (!n || *n <= 3.0) {
    x.refuse(n ? Col::n : Col::correlation, "no-sample-size",
             "Fisher's z of a correlation needs more than 3 people.", "Fill n (or df).");
    return std::nullopt;
  }
  const auto r = with_sign(x, Col::correlation);
  if (!r) return std::nullopt;
  return Solution{NormalEstimate{std::atanh(*r), 1.0 / std::sqrt(*n - 3.0)}, "fisher-z", Design::one_sample,
                  0.0, std::nullopt};
}

}  // namespace

Route route_correlation() {
  return {{"correlation-and-n", "correlation, and n (or df)", "z = atanh(r), SE = 1/√(n − 3), Normal",
           "Fisher (1921)", "study,correlation,n\nA,.50,100"},
          "Fisher's z of the correlation",
          {Col::correlation},
          applies,
          solve};
}

}  // namespace steelyard::rebuilding
