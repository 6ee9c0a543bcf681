// Every message that rebuilding can give, word for word.
#include "help.hpp"

namespace {

struct Said {
  const char* csv;
  const char* text;
};

std::string first_message(const char* csv) {
  const auto outcome = help::rebuilt(csv);
  return outcome.diagnostics.empty() ? "" : steelyard::to_text(outcome.diagnostics.front());
}

}  // namespace

TEST_CASE("every message word for word") {
  const std::vector<Said> all = {
      {"study,mean1,sd1,n1,mean2,sd2,n2\nA,5,-1.2,20,4,1.1,20",
       "rows.csv:2:5: error: sd1 is -1.2, but an SD or SE must be above 0. Correct the sign or the number. "
       "[spread-not-positive]"},
      {"study,mean1,sd1,n1,mean2,sd2,n2\nA,5,0.0,20,4,1.1,20",
       "rows.csv:2:5: error: sd1 is 0.0, but an SD or SE must be above 0. Give more digits, or leave the "
       "cell empty and give t, F or p instead. [spread-not-positive]"},
      {"study,t,n1,n2\nA,2.1,0,20",
       "rows.csv:2:7: error: n1 is 0, but a size must be at least 1. Correct it, or leave the cell empty if "
       "the size is not known. [size-not-positive]"},
      {"study,t,n1,n2\nA,2.1,1,1",
       "rows.csv:2:7: error: The sizes leave 0 degrees of freedom, and at least 1 is needed. Check the "
       "sizes: two groups need n1 + n2 of at least 3, one sample or pairs an n of at least 2. [no-df-left]"},
      {"study,t,df,n1,n2\nA,2.1,0,20,20",
       "rows.csv:2:7: error: df is 0, and at least 1 degree of freedom is needed. Correct it; a test needs "
       "at least one more score than it estimates means. [no-df-left]"},
      {"study,t,n1,n2\nA,2.1,1,20",
       "rows.csv:2:7: caution: n1 is 1: all of the spread comes from the other group. Check that this is a "
       "size and not a group number. [group-of-one]"},
      {"study,mean_diff,ci_low,ci_high,n1,n2\nA,3,5,1,20,20",
       "rows.csv:2:5: error: ci_low is 5 and ci_high is 1: the interval is the wrong way round. Swap the "
       "two, or correct the one that is wrong. [interval-reversed]"},
      {"study,mean_diff,ci_low,ci_high,n1,n2\nA,3,1,1,20,20",
       "rows.csv:2:5: error: ci_low is 1 and ci_high is 1: the interval has no width. Give more digits, or "
       "another column instead. [interval-without-width]"},
      {"study,mean_diff,ci_low,ci_high,ci_level,n1,n2\nA,3,1,5,120,20,20",
       "rows.csv:2:9: error: ci_level is 120, but a confidence level lies between 0 and 1 (or between 1 and "
       "100 %). Correct it. [level-out-of-range]"},
      {"study,p,n1,n2\nA,1.2,20,20",
       "rows.csv:2:3: error: p is 1.2, but a p value lies between 0 and 1. Correct it. [p-out-of-range]"},
      {"study,p,n1,n2\nA,=0!,20,20",
       "rows.csv:2:3: error: p is =0!, and no test has a p of exactly 0. Give it as it is printed (.000), or "
       "as a bound (<.001). [p-out-of-range]"},
      {"study,p,n1,n2\nA,>1,20,20",
       "rows.csv:2:3: error: p is >1, but a p value lies between 0 and 1. Correct it. [p-out-of-range]"},
      {"study,p,n1,n2\nA,.000,20,20",
       "rows.csv:2:3: caution: p = .000 can only mean that p is below 0.0005: all of that is used, not a p "
       "of 0. Give t, F or more digits of p if the paper has them. [p-of-zero]"},
      {"study,p,n1,n2\nA,.04,20,20",
       "rows.csv:2:3: caution: p = .04 stands for anything from 0.035 to 0.045, so only a band of t is "
       "known. Give t, F or more digits of p if the paper has them. [p-is-coarse]"},
      {"study,p,n1,n2,tails\nA,.036,15,15,1",
       "rows.csv:2:3: error: The p is one-tailed, but the row does not say which direction was hypothesised. "
       "Fill `sign` with + or − (the hypothesised direction), or set `tails` to 2. "
       "[one-tailed-without-direction]"},
      {"study,r,n1,n2\nA,1.0,20,20",
       "rows.csv:2:3: error: r is 1.0, but a correlation lies between −1 and 1. Correct it. "
       "[correlation-out-of-range]"},
      {"study,f,df1,n1,n2\nA,-4,1,20,20",
       "rows.csv:2:3: error: f is -4, but an F is a ratio of variances and can't be negative. Correct it. "
       "[f-negative]"},
      {"study,f,df1,df,n1,n2\nA,4.41,2,57,30,30",
       "rows.csv:2:8: error: An F with 2 numerator df compares more than two means at once and can't give a "
       "t. Use the contrast of interest: its t or F(1, df), or the means, SDs and sizes of the two groups. "
       "[f-with-several-df]"},
      {"study,f,n1,n2\nA,4.41,20,20",
       "rows.csv:2:3: caution: df1 is empty, and F was taken to have one numerator df, as a test of two "
       "means has. Fill df1 from the paper: F(df1, df). [df1-assumed]"},
      {"study,sd1,n1\nA,<5,20",
       "rows.csv:2:3: error: sd1 is <5: only p, t and f can be given as bounds. Give the number itself, or "
       "leave the cell empty. [bound-not-usable]"},
      {"study,t\nA,2.1",
       "rows.csv:2:1: error: The sizes do not tell whether this is a test of two groups, of one sample or of "
       "pairs. Fill `design` with two_groups, one_sample or paired, or give n1 and n2 for two groups. "
       "[design-unknown]"},
      {"study,t,n1\nA,2.1,20",
       "rows.csv:2:7: error: n1 is given but n2 is empty. Fill n2, or give n and say in `design` whether it "
       "is one_sample or paired. [group-size-missing]"},
      {"study,design,t\nA,two_groups,2.1",
       "rows.csv:2:1: error: The row has no sizes for its two groups. Fill n1 and n2 (or n_total, or df). "
       "[no-sample-size]"},
      {"study,design,t\nA,paired,2.1",
       "rows.csv:2:1: error: The row has no size for its sample. Fill n (or df). [no-sample-size]"},
      {"study,t,n_total\nA,2.1,60",
       "rows.csv:2:7: caution: Only the total of 60 is printed, so two equal groups of 30 are assumed; a 1:2 "
       "split would put d 6 % further from zero. Give n1 and n2 if the paper prints them. [split-assumed]"},
      {"study,design,t,df\nA,one_sample,2.1,38",
       "rows.csv:2:18: caution: No group size is printed; 39 scores follow from df = 38. Give the sizes if "
       "the paper prints them. [size-from-df]"},
      {"study,t,df,n1,n2\nA,2.1,56,30,30",
       "rows.csv:2:7: caution: The printed df of 56 is not n1 + n2 − 2 = 58; it is used, and the effect is "
       "in units of the residual SD of the analysis that it belongs to. Check the sizes and the df; give "
       "`covariates` if the analysis was adjusted. [residual-units]"},
      {"study,t,n1,n2,sign\nA,-2.1,20,20,+",
       "rows.csv:2:3: error: t is printed as -2.1 but the row's direction is positive. Correct the one that "
       "is wrong; `sign` is the sign of group 1 minus group 2. [sign-contradicts]"},
      {"study,t,n1,n2,sign\nA,2.1,20,20,-",
       "rows.csv:2:3: caution: t is printed as 2.1 and the row's direction is negative: it was taken as "
       "−2.1. Leave `sign` empty if the printed number already carries its sign. [sign-applied]"},
      {"study,mean1,sd1,n1,mean2,sd2,n2,sign\nA,5,1,20,6,1,20,+",
       "rows.csv:2:17: error: The means differ by -1, but the row's direction says otherwise. Correct the "
       "one that is wrong; `sign` is the sign of group 1 minus group 2, before `reverse`. "
       "[sign-contradicts]"},
      {"study,t,n1,n2\nA,50,20,20",
       "rows.csv:2:3: caution: t = 50 (d = 15.8) is far beyond what studies usually find. Check the decimal "
       "point, and that no SE was taken for an SD. [extreme-t]"},
      {"study,design,d,n\nA,paired,0.4,20",
       "rows.csv:2:10: caution: d of pairs was taken as the mean difference over the SD of the differences. "
       "Give t instead if the paper standardized by another SD. [d-of-differences]"},
      {"study,g,n\nA,0.4,2",
       "rows.csv:2:3: error: Hedges' g needs more than one degree of freedom, and the sizes leave 1. Give t, "
       "or Cohen's d as d. [no-hedges-factor]"},
      {"study,d,se\nA,0.61,0.28",
       "rows.csv:2:3: caution: d with its uncertainty but no sizes is taken as Normal on the d scale. Give "
       "the sizes if the paper prints them: the exact likelihood needs them. [normal-likelihood]"},
      {"study,mean_diff,sd_diff,n1,n2\nA,3,5,20,20",
       "rows.csv:2:5: caution: sd_diff of two groups was taken as their pooled SD. Give sd1 and sd2 if the "
       "paper prints them, or se_diff if the number is a standard error. [sd-taken-as-pooled]"},
      {"study,t,df,n1,n2\nA,2.10,35.6,20,32",
       "rows.csv:2:3: caution: Welch's t of unequal groups without their SDs leaves the ratio of variances "
       "open: d is approximate and its likelihood Normal. Give sd1 and sd2 if the paper prints them. "
       "[welch-without-sds]"},
      {"study,baseline_mean1,baseline_sd1,mean1,sd1,n1,baseline_mean2,baseline_sd2,mean2,sd2,n2\nA,20,4,15,5,"
       "25,20,4,18,5,25",
       "rows.csv:2:3: error: A change from baseline needs the correlation of the scores before and after. "
       "Fill r_pair (or state one for all rows), or leave the baseline columns out to compare the final "
       "scores. [baseline-without-correlation]"},
      {"study,mean1,sd1,n1,mean2,sd2,n2,mean3,sd3,n3\nA,5,1,20,6,1,20,4,1,20",
       "rows.csv:2:21: error: The row has more than two groups and does not say which of them to compare. "
       "Fill `compare`: 1-3 sets group 1 against group 3, 1+2-3 merges groups 1 and 2 first. "
       "[groups-not-chosen]"},
      {"study,compare,mean1,sd1,n1,mean2,sd2,n2\nA,1 and 2,5,1,20,6,1,20",
       "rows.csv:2:3: error: \"1 and 2\" does not say which groups to compare. Write 1-3 to set group 1 "
       "against group 3, or 1+2-3 to merge groups 1 and 2 first. [comparison-unreadable]"},
      {"study,compare,mean1,sd1,n1,mean2,sd2,n2\nA,1-3,5,1,20,6,1,20",
       "rows.csv:2:3: error: `compare` asks for group 3, but n3 is empty. Fill n3. [group-incomplete]"},
      {"study,correlation,n,t\nA,.50,3,5.7",
       "rows.csv:2:3: error: The row prints a correlation, so its test is not one of a mean difference. "
       "Leave the test out, or say in `design` what it compares. [test-of-correlation]"},
      {"study,events1,n1,events2,n2\nA,0,100,10,100",
       "rows.csv:2:3: error: events1 of 0 leaves an empty cell in the two-by-two table: the odds ratio does "
       "not exist, and nothing is added to the counts here. Give an estimate with its se from an analysis "
       "that can use empty cells, or leave the study out by name. [empty-cell]"},
      {"study,events1,n1,events2,n2\nA,5,100,100,100",
       "rows.csv:2:9: error: events2 of 100 fills its group and leaves an empty cell in the two-by-two "
       "table: the odds ratio does not exist, and nothing is added to the counts here. Give an estimate with "
       "its se from an analysis that can use empty cells, or leave the study out by name. [empty-cell]"},
      {"study,events1,n1,events2,n2\nA,120,100,10,100",
       "rows.csv:2:3: error: events1 is 120, but n1 is only 100. Correct one of them. "
       "[more-events-than-people]"},
      {"study,odds_ratio,ci_low,ci_high\nA,1.2,-0.1,2.5",
       "rows.csv:2:7: error: ci_low is -0.1, but the interval of an odds ratio lies above 0. Give more "
       "digits, or correct it; if the interval is that of the log odds ratio, use estimate and metric. "
       "[ratio-not-positive]"},
      {"study,median1,q1_1,q3_1,n1,median2,q1_2,q3_2,n2\nA,12,9,15,50,10,7,13,50",
       "rows.csv:2:3: caution: Means and SDs were guessed from medians as if scores were Normal; the "
       "effective n was lowered to 22.3 and the df to 37.3 so that the error rate is right. Prefer means and "
       "SDs, t, F or p if the paper has them; authors report medians when scores are skewed. [from-medians]"},
      {"study,median1,q1_1,q3_1,n1,median2,q1_2,q3_2,n2\nA,12,9,15,4,10,7,13,50",
       "rows.csv:2:3: error: With fewer than 5 scores in a group, mean and SD can't be told from a median. "
       "Give means and SDs, t, F or p. [medians-of-few]"},
      {"study,median1,q1_1,q3_1,n1,median2,q1_2,q3_2,n2\nA,12,13,15,40,10,7,13,50",
       "rows.csv:2:3: error: median1 = 12 lies below q1_1 = 13. Correct one of them. "
       "[quantiles-out-of-order]"},
      {"study,median1,min1,max1,n1,median2,min2,max2,n2\nA,12,5,19,30,10,3,17,30",
       "rows.csv:2:6: error: With more than 20 scores in a group the range says more about outliers than "
       "about the SD. Give quartiles, means and SDs, t, F or p. [range-of-many]"},
      {"study,metric,t,n1,n2\nA,mmHg,2,20,20",
       "rows.csv:2:3: error: The metric is mmHg, but this row can only be rebuilt as smd. Give estimate and "
       "se in that metric, or leave `metric` empty. [metric-does-not-fit]"},
      {"study,mean1,n1,n2\nA,5,20,20",
       "rows.csv:2:1: error: The row has n1, n2 and mean1, and no test can be rebuilt from that. Any of "
       "these would do: sd1, mean2 and sd2; se1, mean2 and se2; ci_low1, ci_high1 and mean2; t; f; "
       "docs/formats.md lists all routes. [cannot-rebuild]"},
      {"study,year\nA,2001",
       "rows.csv:2:1: error: The row has no numbers to rebuild a test from. Any of these would do: t; f; p; "
       "r; d, each with n1 and n2 (or n, or df); docs/formats.md lists all routes. [cannot-rebuild]"},
      {"study,t,n1,n2\nA,ns,20,20",
       "rows.csv:2:3: error: t is ns: only a p can be \"not significant\". Put it into the column p. "
       "[ns-not-usable]"},
      {"study,t,n1,n2\nA,1,20,20\nA,2,20,20",
       "rows.csv:3:1: caution: The label \"A\" stands in line 2 too. If both rows come from the same people, "
       "their effects are not independent: keep one, or merge them. [duplicate-label]"},
  };
  for (const Said& said : all) {
    INFO(said.csv);
    CHECK(first_message(said.csv) == said.text);
  }
}
