// A paper's own words: every form, every message word for word.
#include <catch2/catch.hpp>

#include <string>

#include "read/helpers.hpp"
#include "steelyard/read.hpp"

using namespace steelyard;
using test::cells_of;
using test::messages;

namespace {

Outcome<std::vector<NamedCell>> read(const std::string& words, bool comma = false) {
  return read_as_printed(words, {comma}, {"f", 2, 1});
}

struct Form {
  const char* words;
  const char* cells;
};

void check(const Form& form, bool comma = false) {
  INFO(form.words);
  const auto outcome = read(form.words, comma);
  CHECK(messages(outcome) == "");
  REQUIRE(outcome.ok());
  CHECK(cells_of(*outcome.value) == form.cells);
}

struct Said {
  std::string words;
  std::string cells;  // "-": refused
  std::string messages;
};

void check(const Said& said) {
  INFO(said.words);
  const auto outcome = read(said.words);
  CHECK(messages(outcome) == said.messages);
  CHECK((outcome.ok() ? cells_of(*outcome.value) : "-") == said.cells);
}

}  // namespace

TEST_CASE("tests and p values as papers print them") {
  const Form forms[] = {
      {"t(28) = 2.20, p = .036", "df=28@3 t=2.20@9 p=.036@19"},
      {"t(28)=2.20,p=.036,d=0.8", "df=28@3 t=2.20@7 p=.036@14 d=0.8@21"},
      {"t (28) = 2.20.", "df=28@4 t=2.20@10"},
      {"t(28) = −2.20, p < .05", "df=28@3 t=-2.20@9 p=<.05@20"},
      {"t(28) = 2.20; p ≤ .05", "df=28@3 t=2.20@9 p=<=.05@19"},
      {"t = 2.20, df = 28", "t=2.20@5 df=28@16"},
      {"t(df = 28) = 2.20", "df=28@8 t=2.20@14"},
      {"t28 = 2.20", "df=28@1 t=2.20@7"},
      {"t₂₈ = 2.20", "df=28@1 t=2.20@7"},
      {"T(28) = 2.20", "df=28@3 t=2.20@9"},
      {"t(28, N = 30) = 2.20", "df=28@3 n_total=30@11 t=2.20@17"},
      {"t(28) < 1, ns", "df=28@3 t=<1@9 p=ns@12"},
      {"t(28) = 1.1, n.s.", "df=28@3 t=1.1@9 p=ns@14"},
      {"t(28) = 1.1, p = n.s.", "df=28@3 t=1.1@9 p=ns@18"},
      {"t(28) = 1.1, p ns", "df=28@3 t=1.1@9 p=ns@16"},
      {"Welch's t(27.4) = 2.1", "welch=yes@1 df=27.4@11 t=2.1@19"},
      {"F(1, 58) = 4.41, p < .05", "df1=1@3 df=58@6 f=4.41@12 p=<.05@22"},
      {"F(1,58) = 4.41", "df1=1@3 df=58@5 f=4.41@11"},
      {"F(1;58) = 4.41", "df1=1@3 df=58@5 f=4.41@11"},
      {"F1,58 = 4.41", "df1=1@1 df=58@4 f=4.41@9"},
      {"F(1, 1200) = 4.41", "df1=1@3 df=1200@6 f=4.41@14"},
      {"F(1,120) = 4.41", "df1=1@3 df=120@5 f=4.41@12"},
      {"F < 1", "f=<1@5"},
      {"p-value = .04", "p=.04@11"},
      {"p value of .04", "p=.04@12"},
      {"p = 3.6%", "p=3.6%@5"},
      {"p = 2.1 × 10−5", "p=2.1e-5@5"},
      {"p = 2.1 × 10⁻⁵", "p=2.1e-5@5"},
      {"p = 2.1e-5", "p=2.1e-5@5"},
      {"p = .01..05", "p=.01..05@5"},
      {"p = .02 (one-tailed)", "p=.02@5 tails=1@10"},
      {"p = .02, 1-tailed", "p=.02@5 tails=1@10"},
      {"p = .02, two sided", "p=.02@5 tails=2@10"},
      {"t(28) = 2.2, alpha = .01", "df=28@3 t=2.2@9 alpha=.01@22"},
      {"p = .036, p = .036", "p=.036@5"},  // the same twice is once
  };
  for (const Form& form : forms) check(form);
}

TEST_CASE("markup and typography don't matter") {
  const Form forms[] = {
      {"*t*(28) = 2.20, *p* = .036", "df=28@5 t=2.20@11 p=.036@23"},
      {"_t_(28) = 2.20", "df=28@5 t=2.20@11"},
      {"$t(28) = 2.20$", "df=28@4 t=2.20@10"},
      {"$\\textit{t}(28) = 2.20$, \\emph{p} = .036", "df=28@13 t=2.20@19 p=.036@37"},
      {"<i>t</i>(28) = 2.20, <i>p</i> &lt; .05", "df=28@10 t=2.20@16 p=<.05@36"},
      {"𝑡(28) = 2.20, 𝑝 < .001", "df=28@3 t=2.20@9 p=<.001@19"},
      {"t(28)\u00A0=\u2009−2.20", "df=28@3 t=-2.20@9"},
      {"ｔ(28) ＝ 2.20", "df=28@3 t=2.20@9"},
      {"N = 1\u202F234", "n_total=1234@5"},
      {"Hedges’ g = 0.6", "g=0.6@13"},
  };
  for (const Form& form : forms) check(form);
}

TEST_CASE("groups as papers print them") {
  const Form forms[] = {
      {"M = 5.1 (SD = 1.2) vs. 4.4 (1.1), d = 0.61, 95% CI [0.1, 1.1]",
       "mean1=5.1@5 sd1=1.2@15 mean2=4.4@24 sd2=1.1@29 d=0.61@39 ci_low=0.1@53 ci_high=1.1@58 "
       "ci_level=95%@45 "
       "ci_of=d@53"},
      {"M = 5.1, SD = 1.2; M = 4.4, SD = 1.1", "mean1=5.1@5 sd1=1.2@15 mean2=4.4@24 sd2=1.1@34"},
      {"(M = 5.1, SD = 1.2, n = 30) vs (M = 4.4, SD = 1.1, n = 32)",
       "mean1=5.1@6 sd1=1.2@16 mean2=4.4@37 sd2=1.1@47 n1=30@25 n2=32@56"},
      {"(n = 30, M = 5.1, SD = 1.2) and (n = 32, M = 4.4, SD = 1.1)",
       "mean1=5.1@14 sd1=1.2@24 mean2=4.4@46 sd2=1.1@56 n1=30@6 n2=32@38"},
      {"M = 5.1 (SD = 1.2, n = 30) vs. 4.4 (1.1, 32)",
       "mean1=5.1@5 sd1=1.2@15 n1=30@24 mean2=4.4@32 sd2=1.1@37 n2=32@42"},
      {"M (SD) = 5.1 (1.2) vs. 4.4 (1.1)", "mean1=5.1@10 sd1=1.2@15 mean2=4.4@24 sd2=1.1@29"},
      {"M (SE) = 5.1 (0.2) versus 4.4 (0.3)", "mean1=5.1@10 se1=0.2@15 mean2=4.4@27 se2=0.3@32"},
      {"M = 5.1 (SEM = 0.2)", "mean1=5.1@5 se1=0.2@16"},
      {"M1 = 5.1, SD1 = 1.2, n1 = 30, M2 = 4.4, SD2 = 1.1, n2 = 32",
       "mean1=5.1@6 sd1=1.2@17 n1=30@27 mean2=4.4@36 sd2=1.1@47 n2=32@57"},
      {"Ms = 5.1 and 4.4, SDs = 1.2 and 1.1, ns = 30 and 32",
       "mean1=5.1@6 mean2=4.4@14 sd1=1.2@25 sd2=1.1@33 n1=30@43 n2=32@50"},
      {"means of 5.1 and 4.4", "mean1=5.1@10 mean2=4.4@18"},
      {"M1 = 5.1 (SD1 = 1.2, n1 = 30)", "mean1=5.1@6 sd1=1.2@17 n1=30@27"},
      {"M2 = 5.1 (SD = 1.2, n = 30)", "mean2=5.1@6 sd2=1.2@16 n2=30@25"},
      {"M = 5.1 (SD = 1.2, n = 30)", "mean1=5.1@5 sd1=1.2@15 n=30@24"},
      {"t(58) = 2.1, n = 30 per group", "df=58@3 t=2.1@9 n1=30@18 n2=30@18"},
      {"t(58) = 2.1, n = 30 in each condition", "df=58@3 t=2.1@9 n1=30@18 n2=30@18"},
      {"t(29) = 2.1, n = 30", "df=29@3 t=2.1@9 n=30@18"},
      {"t(58) = 2.1, N = 60", "df=58@3 t=2.1@9 n_total=60@18"},
      {"Mdn = 5 (IQR = 3 to 7) vs. 4 (IQR 2-6), n = 30 and 31",
       "median1=5@7 q1_1=3@16 q3_1=7@21 median2=4@28 q1_2=2@35 q3_2=6@37 n1=30@45 n2=31@52"},
      {"median = 5 (range 1–9)", "median1=5@10 min1=1@19 max1=9@21"},
      {"12/30 vs. 20/31", "events1=12@1 n1=30@4 events2=20@11 n2=31@14"},
      {"12 of 30 and 20 of 31", "events1=12@1 n1=30@7 events2=20@14 n2=31@20"},
  };
  for (const Form& form : forms) check(form);
}

TEST_CASE("effects and intervals as papers print them") {
  const Form forms[] = {
      {"Cohen's d = 0.5 (SE = 0.2)", "d=0.5@13 se=0.2@23"},
      {"d of 0.61", "d=0.61@6"},
      {"Hedges' g = -0.6", "g=-0.6@13"},
      {"r(28) = .45", "df=28@3 r=.45@9"},
      {"r = −.45, p = .01", "r=-.45@5 p=.01@15"},
      {"OR = 2.1 (95% CI 1.1–4.0)",
       "odds_ratio=2.1@6 ci_low=1.1@18 ci_high=4.0@22 ci_level=95%@11 ci_of=odds_ratio@18"},
      {"odds ratio = 2.1, CI95% [1.1; 4.0]",
       "odds_ratio=2.1@14 ci_low=1.1@26 ci_high=4.0@31 ci_level=95%@19 ci_of=odds_ratio@26"},
      {"mean difference = 0.7, SE = 0.3, 95% CI 0.1 to 1.3",
       "mean_diff=0.7@19 se_diff=0.3@29 ci_low=0.1@41 ci_high=1.3@48 ci_level=95%@34 ci_of=mean_diff@41"},
      {"difference in means of 0.7 (SD = 1.3)", "mean_diff=0.7@24 sd_diff=1.3@34"},
      {"MD = 0.7", "mean_diff=0.7@6"},
      {"M_diff = 0.7", "mean_diff=0.7@10"},
      {"ΔM = 0.7", "mean_diff=0.7@6"},
      {"M1 − M2 = 0.7, 95% CI: −0.1, 1.5",
       "mean_diff=0.7@11 ci_low=-0.1@24 ci_high=1.5@30 ci_level=95%@16 ci_of=mean_diff@24"},
      {"d = 0.6, 95 % CI = [−0.03, 1.17]",
       "d=0.6@5 ci_low=-0.03@21 ci_high=1.17@28 ci_level=95%@10 ci_of=d@21"},
      {"d = 0.6, 90% confidence interval (0.1, 1.1)",
       "d=0.6@5 ci_low=0.1@35 ci_high=1.1@40 ci_level=90%@10 ci_of=d@35"},
      {"d = 0.6, CI [0.1, 1.1]", "d=0.6@5 ci_low=0.1@14 ci_high=1.1@19 ci_of=d@14"},
      {"M = 5.1, 95% CI [4.5, 5.7]", "mean1=5.1@5 ci_low1=4.5@18 ci_high1=5.7@23 ci_level=95%@10"},
      {"M = 5.1, 95% CI [4.5, 5.7], M = 4.4, 95% CI [3.9, 4.9]",
       "mean1=5.1@5 ci_low1=4.5@18 ci_high1=5.7@23 ci_level=95%@10 mean2=4.4@33 ci_low2=3.9@46 "
       "ci_high2=4.9@51"},
      {"t(28) = 2.2, 95% CI [100,120]", "df=28@3 t=2.2@9 ci_low=100@22 ci_high=120@26 ci_level=95%@14"},
  };
  for (const Form& form : forms) check(form);
}

TEST_CASE("a decimal comma in words") {
  const Form forms[] = {
      {"t(28) = 2,20; p = ,036", "df=28@3 t=2,20@9 p=,036@19"},
      {"F(1,58) = 4,41, p < ,05", "df1=1@3 df=58@3 f=4,41@11 p=<,05@21"},
      {"F(1, 58) = 4,41", "df1=1@3 df=58@6 f=4,41@12"},
      {"M = 5,1 (SD = 1,2) vs. 4,4 (1,1)", "mean1=5,1@5 sd1=1,2@15 mean2=4,4@24 sd2=1,1@29"},
      {"d = 0,6, 95%-CI [0,1; 1,1]", "d=0,6@5 ci_low=0,1@18 ci_high=1,1@23 ci_level=95%@10 ci_of=d@18"},
  };
  for (const Form& form : forms) check(form, true);
  CHECK(messages(read("t(28) = 2.20", true)) ==
        "f:2:9: error: \"2.20\" has a point, but the decimal mark is the comma here. Use one decimal mark in "
        "the whole "
        "file; thousands are written with a blank or with nothing: 1 234 or 1234. [decimal-point]\n");
}

TEST_CASE("the numbers of words are read like those of cells") {
  const auto outcome = read("t(28) = 2.20, p < .05, n1 = 30");
  REQUIRE(outcome.ok());
  const std::vector<NamedCell>& cells = *outcome.value;
  REQUIRE(cells.size() == 4);
  CHECK(cells[1].cell.printed.low == 2.195);
  CHECK(cells[2].cell.printed.relation == Relation::bounded);
  CHECK(cells[2].cell.printed.high == .05);
  CHECK(cells[3].cell.printed.relation == Relation::exact);
  CHECK(cells[3].cell.line == 2);
}

TEST_CASE("what is not understood or not usable is said") {
  const std::string none = " gives no t by itself. ";
  const std::string counts =
      "For a table of two groups give its counts: events1, n1, events2, n2. [as-printed-not-used]\n";
  const std::string f =
      "Give F with its degrees of freedom, or the means and standard deviations. [as-printed-not-used]\n";
  const Said cases[] = {
      {"The new group scored higher, t(28) = 2.20, as predicted.", "df=28@32 t=2.20@38",
       "f:2:1: caution: These words were not understood and are not used: \"The new group scored higher\", "
       "\"as "
       "predicted\". Check that they carry no number that matters. [as-printed-left]\n"},
      {"χ²(1, N = 90) = 3.9, p = .048", "p=.048@26",
       "f:2:1: caution: \"χ²(1, N = 90) = 3.9\" is not used: χ²" + none + counts},
      {"z = 2.1, p = .036", "p=.036@14",
       "f:2:1: caution: \"z = 2.1\" is not used: z" + none +
           "Give the means, standard deviations and group sizes that it was made from. "
           "[as-printed-not-used]\n"},
      {"F(2, 57) = 3.1, ηp² = .10", "df1=2@3 df=57@6 f=3.1@12",
       "f:2:17: caution: \"ηp² = .10\" is not used: partial η²" + none + f},
      {"U = 12, p = .04", "p=.04@13",
       "f:2:1: caution: \"U = 12\" is not used: U" + none +
           "Give means and standard deviations, or medians with quartiles, and the group sizes. "
           "[as-printed-not-used]\n"},
      {"β = .3, p = .01", "p=.01@13",
       "f:2:1: caution: \"β = .3\" is not used: β" + none +
           "Give its t and df, or give it as estimate with se and metric. [as-printed-not-used]\n"},
      {"t(28) = 2.2, BF10 = 3.2", "df=28@3 t=2.2@9",
       "f:2:14: caution: \"BF10 = 3.2\" is not used: a Bayes factor" + none +
           "It depends on its prior; give the test statistic that it was made from. [as-printed-not-used]\n"},
      {"M = 5.1 ± 1.2", "mean1=5.1@5",
       "f:2:9: caution: \"± 1.2\" is not used: ± can mean a standard deviation or a standard error. Write it "
       "as (SD = …) "
       "or (SE = …). [as-printed-not-used]\n"},
      {"M = 5.1 (1.2)", "mean1=5.1@5",
       "f:2:10: caution: \"1.2\" is not used: it can be a standard deviation or a standard error. Write it "
       "as (SD = …) or "
       "(SE = …). [as-printed-not-used]\n"},
      {"M = 5.1 (SD = 1.2) vs. 4.4 (1.1), 95% CI [0.1, 1.3]",
       "mean1=5.1@5 sd1=1.2@15 mean2=4.4@24 sd2=1.1@29",
       "f:2:35: caution: \"95% CI [0.1, 1.3]\" is not used: it may enclose the second mean or the difference "
       "of the "
       "means. Say which just before it, as in: mean difference = 0.7, 95% CI [0.1, 1.3]. "
       "[as-printed-not-used]\n"},
      {"d = 0.5, 95% CI [0.1, 0.9], 90% CI [0.2, 0.8]",
       "d=0.5@5 ci_low=0.1@18 ci_high=0.9@23 ci_level=95%@10 ci_of=d@18",
       "f:2:29: caution: \"90% CI [0.2, 0.8]\" is not used: a confidence interval stands before it. Leave "
       "out the one "
       "that this row does not need. [as-printed-not-used]\n"},
      {"hello world", "-",
       "f:2:1: error: No statistic was found in \"hello world\". Copy the result as the paper prints it, for "
       "example: "
       "t(28) = 2.20, p = .036. [as-printed-nothing]\n"},
      {"", "-",
       "f:2:1: error: No statistic was found in \"\". Copy the result as the paper prints it, for example: "
       "t(28) = 2.20, "
       "p = .036. [as-printed-nothing]\n"},
      {"t(28) = 2.2O", "-",
       "f:2:9: error: After \"t(28) =\" stands \"2.2O\", which is not a number. Copy the number as the paper "
       "prints it, or "
       "leave this part out. [as-printed-number]\n"},
      {"d = large", "-",
       "f:2:5: error: After \"d =\" stands \"large\", which is not a number. Copy the number as the paper "
       "prints it, or "
       "leave this part out. [as-printed-number]\n"},
      {"t(28) =", "-",
       "f:2:7: error: After \"t(28) =\" the words end. Copy the number as the paper prints it, or leave this "
       "part out. "
       "[as-printed-number]\n"},
      {"t(28) = 2.20, t(30) = 1.1", "-",
       "f:2:17: error: These words print df twice, as \"28\" and as \"30\". Keep only the result that this "
       "row is about. "
       "[as-printed-twice]\n"
       "f:2:23: error: These words print t twice, as \"2.20\" and as \"1.1\". Keep only the result that this "
       "row is "
       "about. [as-printed-twice]\n"},
      {"N = 1,234", "-",
       "f:2:5: error: \"1,234\" can be read as one number or as two. Write thousands without a comma, and a "
       "blank after a "
       "comma that separates. [as-printed-comma]\n"},
      {"t(28) = 5%", "-",
       "f:2:9: error: \"5%\" is a percentage, but the column \"t\" does not hold probabilities. Write the "
       "number itself. "
       "[percent-outside-p]\n"},
      {"n = 30.5", "-",
       "f:2:5: error: \"30.5\" is not a whole number, but the column \"n\" counts people. Write a whole "
       "number, 0 or more, "
       "or leave the cell empty. [not-a-count]\n"},
      {"M = 1, M = 2, M = 3", "-",
       "f:2:19: error: These words print the means of more than two groups. Keep the two groups that are "
       "compared. "
       "[as-printed-groups]\n"},
      {"n = 1, n = 2, n = 3", "-",
       "f:2:19: error: These words print the sizes of more than two groups. Keep the two groups that are "
       "compared. "
       "[as-printed-groups]\n"},
      {"t = 1e400", "-",
       "f:2:5: error: \"1e400\" is too large or too close to 0 to compute with. Check its exponent. "
       "[number-out-of-range]\n"},
      {std::string(4001, 't'), "-",
       "f:2:1: error: These words are 4,001 bytes long; at most 4,000 are read. Copy only the result, not "
       "the page. "
       "[as-printed-too-long]\n"},
  };
  for (const Said& said : cases) check(said);
}

TEST_CASE("a line whose place is not known keeps it unknown") {
  const auto outcome = read_as_printed("t(28) = 2.20", {}, {"f", 3, 0});
  REQUIRE(outcome.ok());
  CHECK(cells_of(*outcome.value) == "df=28@0 t=2.20@0");
}
