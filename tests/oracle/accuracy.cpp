// Prints what the library and Boost.Math say at the points of the reference tables, one line a point,
// for accuracy.py to compare: oracle_accuracy density | band | marginals TABLE
#include <fmt/format.h>

#include <boost/math/distributions/non_central_t.hpp>
#include <boost/version.hpp>
#include <cmath>
#include <cstdio>
#include <exception>
#include <limits>
#include <string>

#include "pool/reference_case.hpp"
#include "steelyard/numeric.hpp"

namespace {

constexpr double nan = std::numeric_limits<double>::quiet_NaN();

/// Boost's density and tails as they come: the logarithm of a probability, NaN where it refuses.
template <class Function>
double log_of(Function&& function) {
  try {
    return std::log(function());
  } catch (const std::exception&) {
    return nan;
  }
}

void density() {
  fmt::print("# Boost {}.{}.{}\n", BOOST_VERSION / 100000, BOOST_VERSION / 100 % 1000, BOOST_VERSION % 100);
  for (const auto& row : reference::rows("noncentral_t_density.csv")) {
    const double t = reference::number(row.at(1)), df = reference::number(row.at(2)),
                 ncp = reference::number(row.at(3));
    const double ours = steelyard::numeric::log_noncentral_t_density(t, df, ncp);
    const double boost =
        log_of([&] { return boost::math::pdf(boost::math::non_central_t_distribution<double>(df, ncp), t); });
    fmt::print("{:.17g},{:.17g}\n", ours, boost);
  }
}

void band() {
  for (const auto& row : reference::rows("noncentral_t_band.csv")) {
    const double low = reference::number(row.at(1)), high = reference::number(row.at(2)),
                 df = reference::number(row.at(3)), ncp = reference::number(row.at(4));
    const double ours = steelyard::numeric::log_noncentral_t_band(low, high, df, ncp);
    const double boost = log_of([&] {
      const boost::math::non_central_t_distribution<double> law(df, ncp);
      if (std::isinf(low)) return boost::math::cdf(law, high);
      if (std::isinf(high)) return boost::math::cdf(boost::math::complement(law, low));
      return boost::math::cdf(law, high) - boost::math::cdf(law, low);
    });
    fmt::print("{:.17g},{:.17g}\n", ours, boost);
  }
}

void marginals(const std::string& table) {
  for (const reference::Case& c : reference::cases(table)) {
    steelyard::PoolOptions options;
    options.summaries = false;
    const auto result = steelyard::pool(c.studies, c.priors, options);
    if (!result.ok()) continue;
    for (const reference::Marginal& m : c.marginals) {
      for (const steelyard::ModelResult& model : result.value->models) {
        if (steelyard::id(model.model) != m.model || !model.integral) continue;
        fmt::print("{},{},{:.17g},{:.17g},{:.17g},{:.17g},{}\n", c.name, m.model, model.integral->log_value,
                   model.integral->abs_error, m.value, m.error, steelyard::to_text(model.integral->status));
      }
    }
  }
}

}  // namespace

int main(int count, char** arguments) {
  const std::string what = count > 1 ? arguments[1] : "";
  if (what == "density") {
    density();
  } else if (what == "band") {
    band();
  } else if (what == "marginals" && count > 2) {
    marginals(arguments[2]);
  } else {
    std::fputs("usage: oracle_accuracy density | band | marginals TABLE\n", stderr);
    return 2;
  }
  return 0;
}
