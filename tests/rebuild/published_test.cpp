// Rows whose right answer stands in a book or a paper. Values marked "from memory" were not looked up again.
#include <boost/math/special_functions/gamma.hpp>
#include <cmath>
#include <numbers>

#include "help.hpp"
#include "rebuild/student.hpp"

using help::exact;
using help::printed;
using help::study;

// Borenstein, Hedges, Higgins & Rothstein (2009), Introduction to Meta-Analysis, ch. 4 (from memory). They
// round J; the exact J(98) is 0.9923241.
TEST_CASE("Borenstein et al.: two groups from means and SDs") {
  const auto s = study("study,mean1,sd1,n1,mean2,sd2,n2\nA,103,5.5,50,100,4.5,50");
  CHECK(s.route == "means-and-sds");
  CHECK(s.metric == "smd");
  CHECK(*s.effect.d == printed(0.5970, 4));
  CHECK(*s.effect.g == printed(0.5924, 4));
  const double j = steelyard::hedges_j(98.0);
  CHECK(j == printed(0.9923241, 7));
  const double variance_of_g = *s.effect.se * *s.effect.se;
  CHECK(variance_of_g == printed(0.0411, 4));
  CHECK(variance_of_g / (j * j) == printed(0.0418, 4));
  CHECK(*s.raw_sd == printed(5.0249, 4));
}

TEST_CASE("Borenstein et al.: pairs from the difference and the SD of differences") {
  const auto s = study("study,design,mean_diff,sd_diff,n,r_pair\nA,paired,3,5.5,50,.7");
  CHECK(s.route == "mean-difference-and-sd");
  CHECK(s.metric == "smd");
  CHECK(*s.raw_sd == printed(7.1005, 4));
  CHECK(*s.effect.d == printed(0.4225, 4));
  CHECK(*s.effect.g == printed(0.4160, 4));
}

// Cochrane Handbook 5.1, section 7.7.3.3 (from memory): t = 2.78, SE = 1.37, within-group SD 4.68.
TEST_CASE("Cochrane Handbook: SD from a mean difference and an exact p") {
  const auto s = study("study,mean_diff,p,n1,n2\nA,3.8,0.008,25,22");
  CHECK(s.route == "p-and-n");
  const auto e = exact(s);
  CHECK_FALSE(e.folded);
  CHECK(e.t == printed(2.78, 2));
  CHECK(3.8 / e.t == printed(1.37, 2));
  CHECK(*s.raw_sd == printed(4.68, 2).margin(0.01));
}

// Cochrane Handbook 5.1, section 16.4.6.4 (from memory).
TEST_CASE("Cochrane Handbook: pairs from means, SDs and their correlation") {
  const auto s = study("study,design,mean1,sd1,mean2,sd2,n,r_pair\nA,paired,7.0,2.38,6.5,2.21,10,.68");
  CHECK(s.route == "paired-means-and-sds");
  CHECK(0.5 / exact(s).t == printed(0.583, 3));
  CHECK(*s.effect.d == printed(0.218, 3));
}

// Hedges (1981), table of the exact correction factor.
TEST_CASE("Hedges: exact J") {
  const std::vector<std::pair<double, double>> table = {{2, .5642},  {3, .7236},  {4, .7979}, {5, .8407},
                                                        {10, .9227}, {20, .9619}, {50, .9849}};
  for (const auto& [df, j] : table) CHECK(steelyard::hedges_j(df) == printed(j, 4));
  CHECK(steelyard::hedges_j(1.0) == 0.0);
  // Γ at whole and half numbers in closed form: J(3) = Γ(3/2)/(√(3/2)·Γ(1)), J(2) = 1/√π
  CHECK(steelyard::hedges_j(2.0) == Approx(1.0 / std::sqrt(std::numbers::pi)).epsilon(1e-15));
  CHECK(steelyard::hedges_j(3.0) == Approx(std::sqrt(std::numbers::pi) / 2 / std::sqrt(1.5)).epsilon(1e-15));
  for (const double df : {1.01, 1.7, 5.0, 33.0, 34.0, 98.0, 1e4}) {
    const double expected = boost::math::tgamma_ratio(df / 2, (df - 1) / 2) / std::sqrt(df / 2);
    CHECK(steelyard::hedges_j(df) == Approx(expected).epsilon(1e-13));
  }
  // J → 1 − 3/(4ν) as ν grows; separate log gammas would miss this by 1e-7.
  CHECK(1.0 - steelyard::hedges_j(1e9) == Approx(0.75e-9).epsilon(1e-6));
}

// Critical values of Student's t as printed in textbook tables (Fisher & Yates 1963, table III).
TEST_CASE("critical values of Student's t") {
  using steelyard::rebuilding::two_sided_t;
  CHECK(two_sided_t(.05, 1) == printed(12.706, 3));
  CHECK(two_sided_t(.05, 5) == printed(2.571, 3));
  CHECK(two_sided_t(.05, 10) == printed(2.228, 3));
  CHECK(two_sided_t(.05, 30) == printed(2.042, 3));
  CHECK(two_sided_t(.01, 20) == printed(2.845, 3));
  CHECK(two_sided_t(.001, 60) == printed(3.460, 3));
  CHECK(two_sided_t(.10, 120) == printed(1.658, 3));
}

// Student (1908), The probable error of a mean, table I: extra hours of sleep; in R's base data sets as
// `sleep`. The two tests are R's t.test(extra ~ group) with equal variances, and paired.
TEST_CASE("Student's sleep data") {
  const std::vector<double> a = {0.7, -1.6, -0.2, -1.2, -0.1, 3.4, 3.7, 0.8, 0.0, 2.0};
  const std::vector<double> b = {1.9, 0.8, 1.1, 0.1, -0.1, 4.4, 5.5, 1.6, 4.6, 3.4};
  const auto mean = [](const std::vector<double>& x) {
    double sum = 0.0;
    for (const double v : x) sum += v;
    return sum / static_cast<double>(x.size());
  };
  const auto sd = [&](const std::vector<double>& x) {
    double sum = 0.0;
    for (const double v : x) sum += (v - mean(x)) * (v - mean(x));
    return std::sqrt(sum / (static_cast<double>(x.size()) - 1.0));
  };
  std::vector<double> differences;
  for (std::size_t i = 0; i < a.size(); ++i) differences.push_back(a[i] - b[i]);
  const std::string means = help::exactly(mean(a)) + "," + help::exactly(sd(a)) + "," +
                            help::exactly(mean(b)) + "," + help::exactly(sd(b));
  CHECK(exact(study("study,mean1,sd1,mean2,sd2,n1,n2\nA," + means + ",10,10")).t == printed(-1.8608, 4));
  CHECK(exact(study("study,design,mean_diff,sd_diff,n\nA,paired," + help::exactly(mean(differences)) + "," +
                    help::exactly(sd(differences)) + ",10"))
            .t == printed(-4.0621, 4));
}

// R's t.test(extra ~ group, data = sleep) prints Welch's t = -1.8608, df = 17.776, p-value = 0.07939. With
// ten in each group that t is the pooled one.
TEST_CASE("Student's sleep data by Welch's test") {
  const auto t = study("study,t,df,n1,n2\nA,-1.8608,17.776,10,10");
  CHECK(t.route == "welch-equal-sizes");
  CHECK(exact(t).t == -1.8608);
  CHECK(exact(t).df == 18.0);
  const auto p = study("study,p,df,n1,n2,sign\nA,0.07939,17.776,10,10,-");
  CHECK(exact(p).t == printed(-1.8608, 4));
  const auto ci = study("study,mean_diff,ci_low,ci_high,df,n1,n2\nA,-1.58,-3.3654832,0.2054832,17.776,10,10");
  CHECK(exact(ci).t == printed(-1.8608, 4));
}
