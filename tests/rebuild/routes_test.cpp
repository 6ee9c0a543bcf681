// Each route against its formula, and the example line of every route.
#include <cmath>
#include <set>

#include "help.hpp"
#include "rebuild/col.hpp"
#include "rebuild/student.hpp"

using help::band;
using help::exact;
using help::normal;
using help::study;
using steelyard::rebuilding::two_sided_t;
using steelyard::rebuilding::upper_t;

TEST_CASE("the example of every route is rebuilt by that route") {
  std::set<std::string_view> ids;
  for (const auto& route : steelyard::routes()) {
    INFO(route.id);
    CHECK(ids.insert(route.id).second);
    CHECK(study(route.example).route == route.id);
    CHECK_FALSE(route.needs.empty());
    CHECK_FALSE(route.formula.empty());
    CHECK_FALSE(route.source.empty());
  }
}

TEST_CASE("every column that a route reads is in the table of columns") {
  for (const auto name : steelyard::rebuilding::col_names) {
    INFO(name);
    CHECK(steelyard::find_column(name) != nullptr);
  }
}

TEST_CASE("two groups: t and sizes") {
  const auto s = study("study,t,n1,n2\nA,2.10,30,32");
  const auto e = exact(s);
  CHECK(e.t == 2.10);
  CHECK(e.df == 60.0);
  CHECK(e.n_effective == Approx(30.0 * 32.0 / 62.0));
  CHECK_FALSE(e.folded);
  CHECK(*s.effect.d == Approx(2.10 * std::sqrt(1.0 / 30 + 1.0 / 32)));
  CHECK(s.how == "t as printed (n1 = 30, n2 = 32, t = 2.10): t = 2.1, df 60, effective n 15.48.");
  CHECK(s.label == "A");
  CHECK(s.line == 2);
}

TEST_CASE("one sample: t and n") {
  const auto e = exact(study("study,t,n\nA,2.2,40"));
  CHECK(e.df == 39.0);
  CHECK(e.n_effective == 40.0);
}

TEST_CASE("pairs keep a metric of their own without a correlation") {
  const auto without = study("study,design,t,n\nA,paired,2.2,40");
  CHECK(without.metric == "smd-paired");
  CHECK(exact(without).n_effective == 40.0);
  const auto with = study("study,design,t,n,r_pair\nA,paired,2.2,40,.75");
  CHECK(with.metric == "smd");
  CHECK(exact(with).n_effective == Approx(80.0));  // c² = 2(1 − .75)
  steelyard::RebuildOptions stated;
  stated.r_pair = 0.75;
  CHECK(exact(study("study,design,t,n\nA,paired,2.2,40", stated)).n_effective == Approx(80.0));
  // with both SDs c² = (s1² + s2² − 2·r·s1·s2)/((s1² + s2²)/2)
  const auto sds = study("study,design,t,n,r_pair,sd1,sd2\nA,paired,2.2,40,.75,2,3");
  CHECK(exact(sds).n_effective == Approx(40.0 / ((4 + 9 - 2 * .75 * 6) / 6.5)));
}

TEST_CASE("the printed df is used when it differs, and says so") {
  const auto s = study("study,t,df,n1,n2\nA,2.10,56,30,30");
  CHECK(exact(s).df == 56.0);
  CHECK(exact(s).n_effective == 15.0);
  REQUIRE(s.cautions.size() == 1);
  CHECK(s.cautions[0].find("residual SD") != std::string::npos);
}

TEST_CASE("F with one numerator df") {
  const auto open = study("study,f,df1,n1,n2\nA,4.41,1,30,30");
  CHECK(exact(open).folded);
  CHECK(exact(open).t == Approx(2.1));
  CHECK(steelyard::is_folded(open.evidence));
  CHECK(exact(study("study,f,df1,n1,n2,sign\nA,4.41,1,30,30,-")).t == Approx(-2.1));
  const auto means = study("study,f,df1,n1,n2,mean1,mean2\nA,4.41,1,30,30,4.1,5.2");
  CHECK(exact(means).t == Approx(-2.1));
  CHECK_FALSE(exact(means).folded);
  // means that may be equal within their rounding tell no sign
  CHECK(exact(study("study,f,df1,n1,n2,mean1,mean2\nA,4.41,1,30,30,5,5")).folded);
  const auto several = help::rebuilt("study,f,df1,df,n1,n2\nA,4.41,2,57,30,30");
  CHECK_FALSE(several.ok());
  CHECK(help::says(several.diagnostics, "f-with-several-df"));
  // nor does the p of such an F speak of two means
  CHECK_FALSE(help::rebuilt("study,f,df1,df,p,n1,n2\nA,3.2,2,57,.048,20,20").ok());
  CHECK_FALSE(help::rebuilt("study,f,df1,df,p,n1,n2\nA,3.2,2,57,<.05,20,20").ok());
}

TEST_CASE("exact p") {
  const auto open = study("study,p,n1,n2\nA,.036,15,15");
  CHECK(exact(open).folded);
  CHECK(exact(open).t == Approx(two_sided_t(.036, 28)));
  CHECK(exact(study("study,p,n1,n2,sign\nA,.036,15,15,-")).t == Approx(-two_sided_t(.036, 28)));
  CHECK(exact(study("study,p,n1,n2,sign,tails\nA,.036,15,15,+,1")).t == Approx(upper_t(.036, 28)));
  CHECK(exact(study("study,p,n1,n2,sign,tails\nA,.836,15,15,+,1")).t == Approx(upper_t(.836, 28)));
  const auto blind = help::rebuilt("study,p,n1,n2,tails\nA,.036,15,15,1");
  CHECK_FALSE(blind.ok());
  CHECK(help::says(blind.diagnostics, "one-tailed-without-direction"));
}

TEST_CASE("a coarse p is the band of its digits") {
  const auto b = band(study("study,p,n1,n2,sign\nA,.04,20,20,+"));
  REQUIRE(b.bands.size() == 1);
  CHECK(b.bands[0].low == Approx(two_sided_t(.045, 38)));
  CHECK(b.bands[0].high == Approx(two_sided_t(.035, 38)));
  const auto open = band(study("study,p,n1,n2\nA,.001,20,20"));
  REQUIRE(open.bands.size() == 2);
  CHECK(open.bands[0].low == -open.bands[1].high);
  CHECK(open.bands[1].high == Approx(two_sided_t(.0005, 38)));
  const auto zero = study("study,p,n1,n2,sign\nA,.000,20,20,+");
  CHECK(band(zero).bands[0].low == Approx(two_sided_t(.0005, 38)));
  CHECK(std::isinf(band(zero).bands[0].high));
  CHECK_FALSE(zero.cautions.empty());
}

TEST_CASE("d, g and r with sizes") {
  const double root = std::sqrt(25.0 * 27.0 / 52.0);
  CHECK(exact(study("study,d,n1,n2\nA,0.61,25,27")).t == Approx(0.61 * root));
  CHECK(exact(study("study,g,n1,n2\nA,0.61,25,27")).t == Approx(0.61 / steelyard::hedges_j(50.0) * root));
  CHECK(*study("study,g,n1,n2\nA,0.61,25,27").effect.g == Approx(0.61));
  CHECK(exact(study("study,r,n1,n2\nA,.28,30,30")).t == Approx(.28 * std::sqrt(58.0 / (1 - .28 * .28))));
}

TEST_CASE("mean difference with SE, SD, interval") {
  CHECK(exact(study("study,mean_diff,se_diff,n1,n2\nA,3.8,1.37,25,22")).t == Approx(3.8 / 1.37));
  const auto ci = study("study,mean_diff,ci_low,ci_high,n1,n2\nA,3.8,1.0,6.6,25,22");
  CHECK(exact(ci).t == Approx(3.8 / (2.8 / two_sided_t(.05, 45))));
  const auto wide = study("study,mean_diff,ci_low,ci_high,ci_level,n1,n2\nA,3.8,1.0,6.6,99,25,22");
  CHECK(exact(wide).t == Approx(3.8 / (2.8 / two_sided_t(.01, 45))));
  const auto only = study("study,ci_low,ci_high,n1,n2\nA,1.0,6.6,25,22");
  CHECK(exact(only).t == Approx(exact(ci).t));
  CHECK(exact(study("study,mean_diff,sd_diff,n1,n2\nA,3,5,20,20")).t == Approx(3.0 / 5.0 * std::sqrt(10.0)));
}

TEST_CASE("means with SDs or SEs") {
  const double pooled = std::sqrt((19 * 4.0 + 29 * 9.0) / 48.0);
  const double t = 1.5 / pooled * std::sqrt(20.0 * 30.0 / 50.0);
  CHECK(exact(study("study,mean1,sd1,n1,mean2,sd2,n2\nA,6.5,2,20,5,3,30")).t == Approx(t));
  CHECK(exact(study("study,mean1,se1,n1,mean2,se2,n2\nA,6.5,=0.447213595499958!,20,5,=0.547722557505166!,30"))
            .t == Approx(t));
  CHECK(exact(study("study,mean1,sd1,n,mu0\nA,103,15,36,100")).t == Approx(3.0 / 15.0 * 6.0));
  CHECK(exact(study("study,mean1,se1,n\nA,103,2.5,36")).t == Approx(103 / 2.5));
}

TEST_CASE("an estimate with its SE is Normal in its own metric") {
  const auto s = study("study,estimate,se,metric\nA,28.4,14.9,points");
  CHECK(normal(s).estimate == 28.4);
  CHECK(normal(s).se == 14.9);
  CHECK(s.metric == "points");
  CHECK(study("study,estimate,se\nA,28.4,14.9").metric == "unnamed");
  const auto ci = study("study,estimate,ci_low,ci_high\nA,0.30,0.10,0.50");
  CHECK(normal(ci).se == Approx(0.2 / 1.959963984540054));
}

TEST_CASE("bounds of t and F speak of the size of t") {
  CHECK(band(study("study,t,n1,n2\nA,<1,20,20")).bands[0].low == -1.0);
  const auto up = band(study("study,t,n1,n2,sign\nA,<1,20,20,+"));
  CHECK(up.bands[0].low == 0.0);
  CHECK(up.bands[0].high == 1.0);
  const auto down = band(study("study,t,n1,n2,sign\nA,<1,20,20,-"));
  CHECK(down.bands[0].low == -1.0);
  CHECK(down.bands[0].high == 0.0);
  CHECK(band(study("study,t,n1,n2\nA,>2,20,20")).bands.size() == 2);
  CHECK(band(study("study,t,n1,n2\nA,2.1..2.4,20,20")).bands[0].high == 2.4);
  CHECK(band(study("study,f,df1,n1,n2\nA,<1,1,20,20")).bands[0].high == 1.0);
}

TEST_CASE("bounds of p") {
  const double c = two_sided_t(.05, 38);
  const auto check = [](const steelyard::BandT& b, std::vector<steelyard::Interval> expected) {
    REQUIRE(b.bands.size() == expected.size());
    for (std::size_t i = 0; i < expected.size(); ++i) {
      CHECK(b.bands[i].low == Approx(expected[i].low));
      CHECK(b.bands[i].high == Approx(expected[i].high));
    }
  };
  constexpr double inf = std::numeric_limits<double>::infinity();
  check(band(study("study,p,n1,n2\nA,<.05,20,20")), {{-inf, -c}, {c, inf}});
  check(band(study("study,p,n1,n2,sign\nA,<.05,20,20,+")), {{c, inf}});
  check(band(study("study,p,n1,n2,sign\nA,<.05,20,20,-")), {{-inf, -c}});
  check(band(study("study,p,n1,n2\nA,ns,20,20")), {{-c, c}});
  check(band(study("study,p,n1,n2,sign\nA,n.s.,20,20,+")), {{0.0, c}});
  check(band(study("study,p,n1,n2,sign\nA,ns,20,20,-")), {{-c, 0.0}});
  check(band(study("study,p,n1,n2,alpha\nA,ns,20,20,.01")), {{-two_sided_t(.01, 38), two_sided_t(.01, 38)}});
  check(band(study("study,p,n1,n2,sign,tails\nA,ns,20,20,+,1")), {{-inf, upper_t(.05, 38)}});
  check(band(study("study,p,n1,n2,sign,tails\nA,ns,20,20,-,1")), {{-upper_t(.05, 38), inf}});
  check(band(study("study,p,n1,n2,sign,tails\nA,<.05,20,20,+,1")), {{upper_t(.05, 38), inf}});
  check(band(study("study,p,n1,n2,sign\nA,.01...05,20,20,+")), {{c, two_sided_t(.01, 38)}});
  CHECK_FALSE(help::rebuilt("study,p,n1,n2,tails\nA,ns,20,20,1").ok());
}

TEST_CASE("the route with the fewest rounded inputs wins, the others are kept") {
  const auto s = study("study,t,p,d,mean1,sd1,n1,mean2,sd2,n2\nA,2.98,.004,0.60,103,5.5,50,100,4.5,50");
  CHECK(s.route == "t-and-n");
  REQUIRE(s.alternatives.size() == 2);
  CHECK(s.alternatives[0].route == "d-and-n");
  CHECK(s.alternatives[1].route == "means-and-sds");
  CHECK(s.alternatives[1].t == Approx(2.985).margin(0.001));
  // a route that leaves the sign open or gives a band yields to one that doesn't
  CHECK(study("study,p,d,n1,n2\nA,<.05,0.60,50,50").route == "d-and-n");
  CHECK(study("study,f,df1,d,n1,n2\nA,9.1,1,0.60,50,50").route == "f-and-n");
}

TEST_CASE("sign, favours and reverse") {
  CHECK(exact(study("study,t,n1,n2,sign\nA,2.1,20,20,-")).t == -2.1);
  CHECK(exact(study("study,t,n1,n2,favours\nA,2.1,20,20,2")).t == -2.1);
  CHECK(exact(study("study,t,n1,n2,reverse\nA,-2.1,20,20,yes")).t == 2.1);
  // lower is better and group 1 is favoured: its mean is smaller, and turned round it points upward
  CHECK(exact(study("study,f,df1,n1,n2,favours,reverse\nA,4.41,1,20,20,1,yes")).t == Approx(2.1));
  CHECK_FALSE(help::rebuilt("study,t,n1,n2,sign\nA,-2.1,20,20,+").ok());
  CHECK_FALSE(help::rebuilt("study,mean1,sd1,n1,mean2,sd2,n2,sign\nA,5,1,20,6,1,20,+").ok());
  const auto turned = band(study("study,p,n1,n2,sign,reverse\nA,<.05,20,20,+,yes"));
  CHECK(std::isinf(turned.bands[0].low));
}

TEST_CASE("corners of the rounding bands") {
  const auto t = study("study,t,n1,n2\nA,2.10,30,32");
  CHECK(std::get<steelyard::ExactT>(*t.at_low).t == 2.095);
  CHECK(std::get<steelyard::ExactT>(*t.at_high).t == 2.105);
  const auto means = study("study,mean1,sd1,n1,mean2,sd2,n2\nA,103,5.5,50,100,4.5,50");
  const double high = 4.0 / std::sqrt((5.45 * 5.45 + 4.45 * 4.45) / 2) * 5.0;
  const double low = 2.0 / std::sqrt((5.55 * 5.55 + 4.55 * 4.55) / 2) * 5.0;
  CHECK(std::get<steelyard::ExactT>(*means.at_high).t == Approx(high));
  CHECK(std::get<steelyard::ExactT>(*means.at_low).t == Approx(low));
  CHECK_FALSE(study("study,t,n1,n2\nA,=2.1!,30,32").at_low.has_value());
  const auto turned = study("study,t,n1,n2,reverse\nA,2.10,30,32,yes");
  CHECK(std::get<steelyard::ExactT>(*turned.at_low).t == -2.105);
  CHECK(std::get<steelyard::ExactT>(*turned.at_high).t == -2.095);
}
