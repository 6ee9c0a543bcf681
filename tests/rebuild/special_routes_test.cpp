// Welch, adjusted analyses, changes, medians, counts, correlations, several groups.
#include <cmath>
#include <fstream>
#include <numbers>
#include <random>

#include "help.hpp"
#include "rebuild/groups.hpp"
#include "rebuild/student.hpp"

using help::exact;
using help::normal;
using help::printed;
using help::rebuilt;
using help::study;
using steelyard::rebuilding::two_sided_t;

TEST_CASE("Welch's t with equal sizes is the pooled t") {
  const auto s = study("study,t,df,n1,n2,welch\nA,2.10,51.3,30,30,yes");
  CHECK(s.route == "welch-equal-sizes");
  CHECK(exact(s).t == 2.10);
  CHECK(exact(s).df == 58.0);
  // a fractional df tells Welch's test by itself, and its p too
  const auto p = study("study,p,df,n1,n2,sign\nA,.041,51.3,30,30,+");
  CHECK(exact(p).t == Approx(two_sided_t(.041, 51.3)));
  CHECK(exact(p).df == 58.0);
}

TEST_CASE("Welch's t with SDs becomes the pooled t of the means") {
  // invented groups: mean difference 3, SDs 4 and 6, sizes 20 and 35
  const double welch = 3.0 / std::sqrt(16.0 / 20 + 36.0 / 35);
  const double pooled = 3.0 / (std::sqrt((19 * 16.0 + 34 * 36.0) / 53) * std::sqrt(1.0 / 20 + 1.0 / 35));
  const auto s = study("study,t,df,n1,n2,sd1,sd2,welch\nA," + help::exactly(welch) + ",51.5,20,35,4,6,yes");
  CHECK(s.route == "welch-and-sds");
  CHECK(exact(s).t == Approx(pooled).epsilon(1e-6));
  CHECK(exact(s).df == 53.0);
}

TEST_CASE("Welch's t of unequal groups without SDs is only approximate") {
  const auto s = study("study,t,df,n1,n2\nA,2.10,35.6,20,32");
  CHECK(s.route == "welch-approximate");
  CHECK(normal(s).estimate == Approx(2.10 * std::sqrt(1.0 / 20 + 1.0 / 32)));
  CHECK_FALSE(s.cautions.empty());
}

TEST_CASE("an adjusted analysis with its R is on the scale of the scores") {
  const auto s = study("study,t,n1,n2,covariates,covariate_r\nA,2.10,30,30,2,.6");
  CHECK(s.metric == "smd");
  CHECK(exact(s).df == 56.0);
  CHECK(exact(s).n_effective == Approx(15.0 / 0.64));
  const auto without = study("study,t,n1,n2,covariates\nA,2.10,30,30,2");
  CHECK(without.metric == "smd-adjusted");
  CHECK(exact(without).n_effective == 15.0);
  // a printed df that the covariates explain needs no caution
  CHECK(study("study,t,df,n1,n2,covariates,covariate_r\nA,2.10,57,30,30,1,.6").cautions.empty());
}

// The variance of an adjusted difference is (1−R²) of the unadjusted: Borenstein (2009), in The Handbook of
// Research Synthesis, ch. 12, table 12.3 (from memory): d of means adjusted by R, V = (1−R²)/ñ + d²/2N.
TEST_CASE("the information of an adjusted analysis") {
  const auto s = study("study,t,n1,n2,covariate_r\nA,=2!,50,50,.7");
  CHECK(1.0 / exact(s).n_effective == Approx((1 - .49) / 25));
}

TEST_CASE("d or g without sizes is Normal") {
  const auto se = study("study,d,se\nA,0.61,0.28");
  CHECK(se.metric == "smd");
  CHECK(normal(se).se == 0.28);
  CHECK(normal(study("study,g,se\nA,0.61,0.28")).estimate == 0.61);
  CHECK(normal(study("study,d,ci_low,ci_high\nA,0.6,0.1,1.1")).se == Approx(0.5 / 1.959963984540054));
  CHECK(study("study,d,se,n1,n2\nA,0.61,0.28,30,30").route == "d-and-n");
}

// Cochrane Handbook 5.1, section 16.1.3.2: SD of changes √(before² + after² − 2·r·before·after).
TEST_CASE("change from baseline") {
  const std::string rows =
      "study,baseline_mean1,baseline_sd1,mean1,sd1,n1,baseline_mean2,baseline_sd2,mean2,sd2,n2";
  const auto s = study(rows + ",r_pair\nA,20,4,15,5,25,20,4,18,5,25,.6");
  const double sd = std::sqrt(16 + 25 - 2 * .6 * 20);
  CHECK(exact(s).t == Approx(-3.0 / sd * std::sqrt(12.5)));
  CHECK(*s.raw_sd == Approx(std::sqrt(20.5)));
  CHECK(*s.effect.d == Approx(-3.0 / std::sqrt(20.5)));
  const auto without = rebuilt(rows + "\nA,20,4,15,5,25,20,4,18,5,25");
  CHECK_FALSE(without.ok());
  CHECK(help::says(without.diagnostics, "baseline-without-correlation"));
}

TEST_CASE("only a total or only df: an equal split is stated") {
  CHECK(exact(study("study,t,n_total\nA,2.10,60")).n_effective == 15.0);
  const auto s = study("study,design,t,df\nA,two_groups,2.10,58");
  CHECK(exact(s).n_effective == 15.0);
  CHECK(s.cautions.size() == 2);
  CHECK(exact(study("study,design,t,df\nA,one_sample,2.10,58")).n_effective == 59.0);
}

// Borenstein et al. (2009), ch. 5 and 7 (from memory): 5 of 100 against 10 of 100: log OR −0.7472, V 0.3216;
// log OR 0.9069 with V 0.0676 gives d 0.5000, V 0.0205.
TEST_CASE("counts and odds ratios") {
  const auto log_odds = study("study,metric,events1,n1,events2,n2\nA,log-odds-ratio,5,100,10,100");
  CHECK(normal(log_odds).estimate == printed(-0.7472, 4));
  CHECK(normal(log_odds).se * normal(log_odds).se == printed(0.3216, 4));
  const auto d = study("study,events1,n1,events2,n2\nA,5,100,10,100");
  CHECK(normal(d).estimate == Approx(normal(log_odds).estimate * std::sqrt(3.0) / std::numbers::pi));
  const double z = 1.959963984540054;
  const double half = z * std::sqrt(0.0676);
  const auto ratio =
      study("study,odds_ratio,ci_low,ci_high\nA," + help::exactly(std::exp(.9069)) + "," +
            help::exactly(std::exp(.9069 - half)) + "," + help::exactly(std::exp(.9069 + half)));
  CHECK(normal(ratio).estimate == printed(0.5000, 4));
  CHECK(normal(ratio).se * normal(ratio).se == printed(0.0205, 4));
  for (const char* row : {"0,100,10,100", "5,100,100,100"}) {
    const auto empty = rebuilt(std::string("study,events1,n1,events2,n2\nA,") + row);
    CHECK_FALSE(empty.ok());
    CHECK(help::says(empty.diagnostics, "empty-cell"));
  }
}

// Borenstein et al. (2009), ch. 6 (from memory): r = .50, n = 100: z = 0.5493, V = 0.0103.
TEST_CASE("Pearson's correlation as Fisher's z") {
  const auto s = study("study,correlation,n\nA,.50,100");
  CHECK(s.metric == "fisher-z");
  CHECK(normal(s).estimate == printed(0.5493, 4));
  CHECK(normal(s).se * normal(s).se == printed(0.0103, 4));
  // the test of a correlation is not one of a mean difference
  CHECK(study("study,correlation,n,t\nA,.50,100,5.7").route == "correlation-and-n");
}

TEST_CASE("SDs from intervals of the means") {
  const double half = two_sided_t(.05, 24) * 5.0 / 5.0;
  const auto s = study("study,mean1,ci_low1,ci_high1,n1,mean2,sd2,n2\nA,32," + help::exactly(32 - half) +
                       "," + help::exactly(32 + half) + ",25,29,5,25");
  CHECK(s.route == "means-and-spreads");
  CHECK(*s.raw_sd == Approx(5.0).epsilon(1e-6));
}

TEST_CASE("merging two groups gives the mean and SD of all scores") {
  std::mt19937_64 random(11);
  std::normal_distribution<double> noise;
  std::vector<double> a, b;
  for (int i = 0; i < 13; ++i) a.push_back(3.0 + noise(random));
  for (int i = 0; i < 29; ++i) b.push_back(5.0 + 2.0 * noise(random));
  const auto group = [](const std::vector<double>& x) {
    steelyard::rebuilding::Group g;
    g.n = static_cast<double>(x.size());
    for (const double v : x) g.mean += v / g.n;
    for (const double v : x) g.sd += (v - g.mean) * (v - g.mean) / (g.n - 1.0);
    g.sd = std::sqrt(g.sd);
    return g;
  };
  std::vector<double> all = a;
  all.insert(all.end(), b.begin(), b.end());
  const auto expected = group(all);
  const auto merged = steelyard::rebuilding::merge(group(a), group(b));
  CHECK(merged.n == 42.0);
  CHECK(merged.mean == Approx(expected.mean));
  CHECK(merged.sd == Approx(expected.sd));
}

TEST_CASE("several groups: two are chosen or merged, never guessed") {
  const std::string head = "study,compare,mean1,sd1,n1,mean2,sd2,n2,mean3,sd3,n3\nA,";
  const std::string row = ",5,1,20,6,1,20,4,1,20";
  CHECK(exact(study(head + "1-3" + row)).t == Approx(std::sqrt(10.0)));
  CHECK(exact(study(head + "3-2" + row)).t == Approx(-2 * std::sqrt(10.0)));
  const auto merged = exact(study(head + "1+2-3" + row));
  CHECK(merged.df == 58.0);
  CHECK(merged.n_effective == Approx(40.0 * 20.0 / 60.0));
  const auto open = rebuilt(head + row);
  CHECK_FALSE(open.ok());
  CHECK(help::says(open.diagnostics, "groups-not-chosen"));
  CHECK(help::says(rebuilt(head + "1+2-2" + row).diagnostics, "comparison-unreadable"));
  CHECK(help::says(rebuilt(head + "1-4" + row).diagnostics, "group-incomplete"));
}

// Normal quartiles lie 0.6745 SDs from the mean; Wan et al. (2014), table 2 give the divisor 2·Φ⁻¹(...) of
// n = 50 as 1.301 (from memory 1.30).
TEST_CASE("medians with quartiles or range") {
  const auto s = study("study,median1,q1_1,q3_1,n1,median2,q1_2,q3_2,n2\nA,12,9,15,50,10,7,13,50");
  CHECK(*s.raw_sd == Approx(6.0 / (2 * steelyard::rebuilding::upper_z(12.875 / 50.25))));
  CHECK(6.0 / *s.raw_sd == printed(1.30, 2).margin(0.02));
  CHECK(*s.effect.d == Approx(2.0 / *s.raw_sd));
  CHECK(exact(s).n_effective == Approx(25.0 / 1.120));
  CHECK(exact(s).df == Approx(98.0 * 0.381));
  const auto range = study("study,median1,min1,max1,n1,median2,min2,max2,n2\nA,12,5,19,10,10,3,17,10");
  CHECK(*range.raw_sd == Approx(14.0 / (2 * steelyard::rebuilding::upper_z(0.625 / 10.25))));
  const auto many = rebuilt("study,median1,min1,max1,n1,median2,min2,max2,n2\nA,12,5,19,30,10,3,17,30");
  CHECK_FALSE(many.ok());
  CHECK(help::says(many.diagnostics, "range-of-many"));
  CHECK(help::says(
      rebuilt("study,median1,q1_1,q3_1,n1,median2,q1_2,q3_2,n2\nA,12,9,15,4,10,7,13,50").diagnostics,
      "medians-of-few"));
  CHECK(help::says(
      rebuilt("study,median1,q1_1,q3_1,n1,median2,q1_2,q3_2,n2\nA,12,13,15,40,10,7,13,50").diagnostics,
      "quantiles-out-of-order"));
}

TEST_CASE("the table of lost information is the simulation's") {
  std::ifstream file(STEELYARD_TEST_DIR "/reference/medians.csv");
  std::string kind, n, inflation, share, rest;
  std::getline(file, rest);
  int rows = 0;
  while (std::getline(file, kind, ',') && std::getline(file, n, ',') && std::getline(file, inflation, ',') &&
         std::getline(file, share, ',') && std::getline(file, rest)) {
    const double size = std::stod(n);
    const bool quartiles = kind == "quartiles";
    if (!quartiles && size > 20.0) continue;
    const std::string sizes = n + "," + n;
    const auto s =
        quartiles ? study("study,n1,n2,median1,q1_1,q3_1,median2,q1_2,q3_2\nA," + sizes + ",12,9,15,10,7,13")
                  : study("study,n1,n2,median1,min1,max1,median2,min2,max2\nA," + sizes + ",12,5,19,10,3,17");
    INFO(kind << " " << n);
    CHECK(exact(s).n_effective == Approx(size / 2 / std::max(std::stod(inflation), 1.0)));
    CHECK(exact(s).df == Approx((2 * size - 2) * std::stod(share)));
    ++rows;
  }
  CHECK(rows == 15);
}

TEST_CASE("a metric cell chooses among the ways to rebuild a row") {
  CHECK(study("study,metric,t,n1,n2\nA,smd,2,20,20").route == "t-and-n");
  CHECK(study("study,metric,estimate,se,t,n1,n2\nA,mmHg,4.1,2.0,2,20,20").route == "estimate-and-se");
  const auto wrong = rebuilt("study,metric,t,n1,n2\nA,mmHg,2,20,20");
  CHECK_FALSE(wrong.ok());
  CHECK(help::says(wrong.diagnostics, "metric-does-not-fit"));
}

TEST_CASE("the paper's own words fill what the row leaves empty") {
  const auto s = study("study,as_printed,n1,n2\nA,\"t(28) = 2.20, p = .036\",15,15");
  CHECK(s.route == "t-and-n");
  CHECK(exact(s).t == 2.20);
  CHECK(exact(s).df == 28.0);
  REQUIRE(s.alternatives.size() == 1);
  CHECK(s.alternatives[0].route == "p-and-n");
  CHECK(exact(study("study,design,as_printed,sign\nA,two_groups,\"F(1, 58) = 4.41, p < .05\",+")).t ==
        Approx(2.1));
}
