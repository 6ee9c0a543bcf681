// Each rule on a row that breaks it and on one that doesn't. Rows are invented unless a source is named.
#include <algorithm>
#include <catch2/catch.hpp>
#include <set>
#include <string>

#include "audit/range.hpp"
#include "steelyard/audit.hpp"

using steelyard::Finding;
using steelyard::Grade;

namespace {

std::vector<Finding> findings(const std::string& csv) {
  const auto read = steelyard::read_csv(csv, "rows.csv");
  for (const auto& d : read.diagnostics) UNSCOPED_INFO(steelyard::to_text(d));
  REQUIRE(read.ok());
  const auto studies = steelyard::rebuild_all(*read.value);
  const std::vector<steelyard::Study> none;
  return steelyard::audit(*read.value, studies.ok() ? *studies.value : none);
}

struct Case {
  const char* rule;
  Grade grade;
  const char* broken;
  const char* sound;
};

constexpr Grade look = Grade::worth_a_look;
constexpr Grade verdict = Grade::changes_the_verdict;
constexpr Grade impossible = Grade::impossible;

const std::vector<Case>& cases() {
  static const std::vector<Case> all = {
      {"p-against-test", impossible, "t,df,n1,n2,p\n2.20,28,15,15,.136", "t,df,n1,n2,p\n2.20,28,15,15,.036"},
      {"p-against-test", impossible, "f,df1,df,p\n4.41,1,58,<.01", "f,df1,df,p\n4.41,1,58,<.05"},
      {"p-against-test", impossible, "f,df1,df,p\n3.20,2,57,.148", "f,df1,df,p\n3.20,2,57,.048"},
      {"signs-disagree", look, "t,df,n1,n2,d\n-2.10,58,30,30,0.54", "t,df,n1,n2,d\n-2.10,58,30,30,-0.54"},
      {"one-tailed-p", look, "t,df,n1,n2,p\n2.20,28,15,15,.018",
       "t,df,n1,n2,p,tails,sign\n2.20,28,15,15,.018,1,+"},
      {"p-changes-side", verdict, "t,df,n1,n2,p\n1.80,28,15,15,.04", "t,df,n1,n2,p\n1.80,28,15,15,.08"},
      {"p-changes-side", verdict, "t,df,n1,n2,p\n2.80,28,15,15,ns", "t,df,n1,n2,p\n1.80,28,15,15,ns"},
      {"t-against-f", impossible, "t,f,df1,df\n2.10,4.14,1,58", "t,f,df1,df\n2.10,4.41,1,58"},
      {"test-against-means", impossible, "t,df,mean1,sd1,n1,mean2,sd2,n2\n1.98,98,103,5.52,50,100.2,4.51,50",
       "t,df,mean1,sd1,n1,mean2,sd2,n2\n2.78,98,103.0,5.52,50,100.2,4.51,50"},
      {"difference-against-means", impossible, "mean_diff,mean1,mean2\n3.5,5.1,2.6",
       "mean_diff,mean1,mean2\n2.5,5.1,2.6"},
      {"d-against-test", look, "t,df,n1,n2,d\n2.10,58,30,30,0.45", "t,df,n1,n2,d\n2.10,58,30,30,0.54"},
      {"d-against-means", impossible, "mean1,sd1,n1,mean2,sd2,n2,d\n5.10,1.20,30,4.40,1.10,30,0.16",
       "mean1,sd1,n1,mean2,sd2,n2,g\n5.10,1.20,30,4.40,1.10,30,0.60"},
      {"r-against-test", impossible, "t,df,n1,n2,r\n2.10,58,30,30,.62", "t,df,n1,n2,r\n2.10,58,30,30,.27"},
      {"interval-against-test", impossible,
       "t,df,n1,n2,mean_diff,ci_low,ci_high\n2.10,58,30,30,2.10,1.10,3.10",
       "t,df,n1,n2,mean_diff,ci_low,ci_high\n2.10,58,30,30,2.10,0.10,4.10"},
      {"estimate-against-interval", impossible, "estimate,ci_low,ci_high\n4.1,1.0,3.0",
       "estimate,ci_low,ci_high\n2.1,1.0,3.0"},
      {"estimate-against-interval", look, "mean_diff,ci_low,ci_high\n2.90,1.00,3.00",
       "mean_diff,ci_low,ci_high\n2.00,1.00,3.00"},
      {"df-against-sizes", impossible, "t,df,n1,n2\n2.10,85,30,30", "t,df,n1,n2\n2.10,56,30,30"},
      {"df-against-sizes", impossible, "t,df,n1,n2\n2.10,12.4,30,30", "t,df,n1,n2\n2.10,42.4,30,30"},
      {"welch-df-against-sds", impossible, "t,df,n1,n2,sd1,sd2\n2.10,42.4,30,30,1.20,1.10",
       "t,df,n1,n2,sd1,sd2\n2.10,57.6,30,30,1.20,1.10"},
      {"signs-disagree", verdict, "t,df,n1,n2,mean1,mean2\n2.10,58,30,30,4.1,5.1",
       "t,df,n1,n2,mean1,mean2\n-2.10,58,30,30,4.1,5.1"},
      // Brown & Heathers (2017): a mean of 5.19 is impossible at n = 28.
      {"grim", impossible, "mean1,n,items\n5.19,28,1", "mean1,n,items\n5.18,28,1"},
      // three whole scores with a mean of 2: Σx² is even and at least 12, so SDs are 0, 1, 1.73, ...
      {"sd-of-integers", impossible, "mean1,sd1,n,items\n2.00,1.35,3,1", "mean1,sd1,n,items\n2.00,1.00,3,1"},
      {"beyond-scale", impossible, "mean1,sd1,n,scale_min,scale_max\n4.0,3.2,20,1,7",
       "mean1,sd1,n,scale_min,scale_max\n4.0,3.0,20,1,7"},
      {"beyond-scale", impossible, "mean1,n,scale_min,scale_max\n7.6,20,1,7",
       "mean1,n,scale_min,scale_max\n6.6,20,1,7"},
      {"se-printed-as-sd", look, "t,df,mean1,sd1,n1,mean2,sd2,n2\n2.02,58,5.0,0.22,30,4.4,0.20,30",
       "t,df,mean1,sd1,n1,mean2,sd2,n2\n2.02,58,5.0,1.20,30,4.4,1.10,30"},
      {"se-printed-as-sd", look, "mean1,sd1,n1,mean2,sd2,n2\n5.0,0.11,100,4.4,0.12,100",
       "mean1,sd1,n1,mean2,sd2,n2\n5.0,1.1,100,4.4,1.2,100"},
      {"words-against-cells", impossible, "t,n1,n2,as_printed\n2.12,15,15,t(28) = 2.21",
       "t,n1,n2,as_printed\n2.2,15,15,t(28) = 2.21"},
      {"same-test-twice", look, "study,t,n1,n2\nA,2.13,20,22\nB,2.13,20,22",
       "study,t,n1,n2\nA,2.13,20,22\nB,2.13,20,23"},
      {"same-label-twice", look, "study,t,n1,n2\nA,2.13,20,22\nA,1.13,20,22",
       "study,t,n1,n2\nA,2.13,20,22\nB,1.13,20,22"},
      {"labels-differ-by-case", look, "study,t,n1,n2\nLee,2.13,20,22\nLEE,1.13,20,22",
       "study,t,n1,n2\nLee,2.13,20,22\nLea,1.13,20,22"},
  };
  return all;
}

}  // namespace

TEST_CASE("every rule finds its disagreement and leaves sound rows alone") {
  for (const Case& c : cases()) {
    INFO(c.broken);
    const auto found = findings(c.broken);
    const auto hit =
        std::find_if(found.begin(), found.end(), [&](const Finding& f) { return f.rule == c.rule; });
    for (const Finding& f : found) UNSCOPED_INFO(f.rule << ": " << f.what);
    REQUIRE(hit != found.end());
    CHECK(hit->grade == c.grade);
    CHECK(hit->what.back() == '.');
    CHECK_FALSE(hit->remedy.empty());
    INFO(c.sound);
    for (const Finding& f : findings(c.sound)) {
      INFO(f.rule << ": " << f.what);
      CHECK(f.rule != c.rule);
      CHECK(f.grade == look);
    }
  }
}

TEST_CASE("every rule of the registry has a case") {
  std::set<std::string_view> tested;
  for (const Case& c : cases()) tested.insert(c.rule);
  tested.insert("far-from-others");  // in far_test.cpp
  for (const auto& rule : steelyard::audit_rules()) {
    INFO(rule.id);
    CHECK(tested.count(rule.id) == 1);
    CHECK_FALSE(rule.checks.empty());
    CHECK_FALSE(rule.source.empty());
  }
}

TEST_CASE("what honest authors do is not called impossible") {
  const std::vector<const char*> rows = {
      // Welch's t printed beside means and SDs, its df printed or not
      "t,df,mean1,sd1,n1,mean2,sd2,n2\n2.01,20.9,10.0,2.0,40,8.0,4.0,18",
      "t,mean1,sd1,n1,mean2,sd2,n2\n2.02,10.0,2.0,40,8.0,4.0,18",
      // cut-off instead of rounded: t of 2.109 printed 2.10, p of .0369 printed .036
      "t,df,p\n2.10,28,.044",
      // d by the SD of the second group
      "mean1,sd1,n1,mean2,sd2,n2,d\n5.00,1.00,30,4.00,2.00,30,0.50",
      // a z interval
      "t,df,n1,n2,mean_diff,ci_low,ci_high\n2.10,18,10,10,2.10,0.14,4.06",
      // an error term from a factorial design
      "t,df,p\n2.10,54,.040",
      // half up and half to even
      "mean1,n,items\n2.12,8,1", "mean1,n,items\n2.13,8,1",
      // Student (1908), sleep: as R's t.test prints it, Welch's test with its interval, means and SDs
      "t,df,p,mean1,sd1,n1,mean2,sd2,n2\n-1.8608,17.776,0.07939,0.75,1.789,10,2.33,2.002,10",
      "t,df,p,mean_diff,ci_low,ci_high,n1,n2\n-1.8608,17.776,0.07939,-1.58,-3.365,0.205,10,10",
      // SD by n instead of n − 1
      "mean1,sd1,n,items\n2.00,0.82,3,1"};
  for (const char* row : rows) {
    INFO(row);
    for (const Finding& f : findings(row)) {
      INFO(f.rule << ": " << f.what);
      CHECK(f.grade == look);
    }
  }
}

TEST_CASE("findings say it in words") {
  const auto found = findings("study,t,df,n1,n2,p\nA,2.20,28,15,15,.136");
  REQUIRE(found.size() == 2);
  CHECK(found[1].rule == "p-changes-side");
  CHECK(found[0].what == "t = 2.20 with 28 df gives p between .0354 and .0366, but p is printed as .136.");
  const auto grim = findings("study,mean1,n,items\nA,5.19,28,1");
  REQUIRE(grim.size() == 1);
  CHECK(grim[0].what ==
        "mean1 = 5.19 can't be the mean of 28 people with 1 whole-number item: the nearest means are 5.1786 "
        "and 5.2143.");
}

TEST_CASE("rows that can't be used are left to the errors that say so") {
  CHECK(findings("study,t,df,p\nA,2.20,28,1.2").empty());
}

TEST_CASE("honest ranges cover rounding and cutting off") {
  const auto read = steelyard::parse_printed("2.10", {}, {});
  const auto range = steelyard::auditing::honest(*read.value);
  CHECK(range.low == 2.095);
  CHECK(range.high == Approx(2.11));
}
