// Rows that can't be used, or only with a caution: what is said, and at which cell.
#include "help.hpp"

using help::rebuilt;

namespace {

struct Bad {
  const char* csv;
  const char* code;
  std::size_t line, column;
  const char* words;
};

}  // namespace

TEST_CASE("rows that can't be used are told at their cell") {
  const std::vector<Bad> table = {
      {"study,mean1,sd1,n1,mean2,sd2,n2\nA,5,-1.2,20,4,1.1,20", "spread-not-positive", 2, 5, "sd1 is -1.2"},
      {"study,mean1,sd1,n1,mean2,sd2,n2\nA,5,0,20,4,1.1,20", "spread-not-positive", 2, 5, "sd1 is 0"},
      {"study,t,n1,n2\nA,2.1,0,20", "size-not-positive", 2, 7, "n1 is 0"},
      {"study,t,n1,n2\nA,2.1,1,1", "no-df-left", 2, 7, "0 degrees of freedom"},
      {"study,t,n\nA,2.1,1", "no-df-left", 2, 7, "0 degrees of freedom"},
      {"study,t,df,n1,n2\nA,2.1,0,20,20", "no-df-left", 2, 7, "df is 0"},
      {"study,mean_diff,ci_low,ci_high,n1,n2\nA,3,5,1,20,20", "interval-reversed", 2, 5, "wrong way round"},
      {"study,p,n1,n2\nA,1.2,20,20", "p-out-of-range", 2, 3, "p is 1.2"},
      {"study,r,n1,n2\nA,1.0,20,20", "correlation-out-of-range", 2, 3, "r is 1.0"},
      {"study,f,df1,n1,n2\nA,-4,1,20,20", "f-negative", 2, 3, "f is -4"},
      {"study,sd1,n1\nA,<5,20", "bound-not-usable", 2, 3, "sd1 is <5"},
      {"study,t\nA,2.1", "design-unknown", 2, 1, "two groups, of one sample or of pairs"},
      {"study,t,n1\nA,2.1,20", "group-size-missing", 2, 7, "n2 is empty"},
      {"study,mean1,n1,n2\nA,5,20,20", "cannot-rebuild", 2, 1, "The row has n1, n2 and mean1"},
  };
  for (const Bad& bad : table) {
    INFO(bad.csv);
    const auto outcome = rebuilt(bad.csv);
    CHECK_FALSE(outcome.ok());
    REQUIRE_FALSE(outcome.diagnostics.empty());
    const auto& d = outcome.diagnostics.front();
    INFO(steelyard::to_text(d));
    CHECK(d.severity == steelyard::Severity::error);
    CHECK(d.code == bad.code);
    CHECK(d.where.file == "rows.csv");
    CHECK(d.where.line == bad.line);
    CHECK(d.where.column == bad.column);
    CHECK(d.what.find(bad.words) != std::string::npos);
    CHECK_FALSE(d.remedy.empty());
  }
}

TEST_CASE("legal rows that need a caution") {
  const std::vector<std::pair<const char*, const char*>> table = {
      {"study,t,n1,n2\nA,2.1,1,20", "group-of-one"},
      {"study,t,n1,n2\nA,50,20,20", "extreme-t"},
      {"study,p,n1,n2\nA,.000,20,20", "p-of-zero"},
      {"study,t,n1,n2\nA,1,20,20\nA,2,20,20", "duplicate-label"},
      {"study,f,n1,n2\nA,4,20,20", "df1-assumed"},
      {"study,t,n_total\nA,2,40", "split-assumed"},
      {"study,design,t,df\nA,two_groups,2,38", "size-from-df"},
  };
  for (const auto& [csv, code] : table) {
    INFO(csv);
    const auto outcome = rebuilt(csv);
    CHECK(outcome.ok());
    CHECK(help::says(outcome.diagnostics, code));
    for (const auto& d : outcome.diagnostics) CHECK(d.severity != steelyard::Severity::error);
  }
}

TEST_CASE("all problems of all rows are told at once") {
  const auto outcome =
      rebuilt("study,mean1,sd1,n1,mean2,sd2,n2\nA,5,-1,20,4,-1,20\nB,5,1,20,4,1,20\nC,5,1,,4,1,");
  CHECK_FALSE(outcome.ok());
  CHECK(outcome.diagnostics.size() == 3);
}

TEST_CASE("a row that can't be rebuilt says which columns would make it possible") {
  const auto outcome = rebuilt("study,mean_diff,n1,n2\nA,5,20,20");
  REQUIRE(outcome.diagnostics.size() == 1);
  CHECK(steelyard::to_text(outcome.diagnostics[0]) ==
        "rows.csv:2:1: error: The row has n1, n2 and mean_diff, and no test can be rebuilt from that. Any of "
        "these "
        "would do: se_diff; sd_diff; t; f; p; docs/formats.md lists all routes. [cannot-rebuild]");
}
