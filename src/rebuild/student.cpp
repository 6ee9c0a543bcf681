#include "rebuild/student.hpp"

#include <boost/math/distributions/fisher_f.hpp>
#include <boost/math/distributions/normal.hpp>
#include <boost/math/distributions/students_t.hpp>
#include <cmath>
#include <limits>

namespace steelyard::rebuilding {

namespace {

// Errors come back as values: the callers check their input and never see an exception.
using Quiet = boost::math::policies::policy<
    boost::math::policies::domain_error<boost::math::policies::ignore_error>,
    boost::math::policies::overflow_error<boost::math::policies::ignore_error>,
    boost::math::policies::pole_error<boost::math::policies::ignore_error>,
    boost::math::policies::evaluation_error<boost::math::policies::ignore_error>,
    boost::math::policies::promote_double<false>>;
using Student = boost::math::students_t_distribution<double, Quiet>;
using Normal = boost::math::normal_distribution<double, Quiet>;
using FisherF = boost::math::fisher_f_distribution<double, Quiet>;

constexpr double infinity = std::numeric_limits<double>::infinity();

}  // namespace

double upper_t(double q, double df) {
  if (q <= 0.0) return infinity;
  if (q >= 1.0) return -infinity;
  return boost::math::quantile(boost::math::complement(Student(df), q));
}

double two_sided_t(double p, double df) {
  if (p >= 1.0) return 0.0;
  return upper_t(p / 2.0, df);
}

double upper_p(double t, double df) {
  if (std::isinf(t)) return t > 0.0 ? 0.0 : 1.0;
  return boost::math::cdf(boost::math::complement(Student(df), t));
}

double two_sided_p(double t, double df) { return 2.0 * upper_p(std::abs(t), df); }

double upper_z(double q) {
  if (q <= 0.0) return infinity;
  if (q >= 1.0) return -infinity;
  return boost::math::quantile(boost::math::complement(Normal(0.0, 1.0), q));
}

double two_sided_p_normal(double z) { return std::erfc(std::abs(z) / std::sqrt(2.0)); }

double upper_f(double f, double df1, double df2) {
  if (std::isinf(f)) return 0.0;
  if (f <= 0.0) return 1.0;
  return boost::math::cdf(boost::math::complement(FisherF(df1, df2), f));
}

}  // namespace steelyard::rebuilding
