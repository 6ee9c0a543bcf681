#include <catch2/catch.hpp>

#include <string>
#include <vector>

#include "steelyard/analysis.hpp"

using namespace steelyard;

namespace {

const std::string studies =
    "study,n1,n2,t\nAlpha,20,20,2.1\n,30,30,0.4\nGamma,25,25,1.7\nGamma two,25,25,1.1\n";

Table table_of(const std::string& text) {
  auto table = read_table(text, "studies.csv");
  REQUIRE(table.ok());
  return std::move(*table.value);
}

}  // namespace

TEST_CASE("a row is called by its label, or by its number", "[analysis]") {
  const Table table = table_of(studies);
  CHECK(row_label(table, 0) == "Alpha");
  CHECK(row_label(table, 1) == "row 2");
}

TEST_CASE("rows are left out by label or number", "[analysis]") {
  const Table table = table_of(studies);
  const auto kept = rows_without(table, std::vector<std::string>{"row 2", "Gamma"});
  REQUIRE(kept.ok());
  CHECK(*kept.value == std::vector<std::size_t>{0, 3});
  CHECK(rows_without(table, std::vector<std::string>{"row 1"}).value->size() == 3);
}

TEST_CASE("a label that names no row is an error with a suggestion", "[analysis]") {
  const Table table = table_of(studies);
  const auto kept = rows_without(table, std::vector<std::string>{"Alhpa", "row 9"});
  CHECK_FALSE(kept.ok());
  REQUIRE(kept.diagnostics.size() == 2);
  CHECK(kept.diagnostics[0].what == "No study is called \"Alhpa\", so it can't be left out.");
  CHECK(kept.diagnostics[0].remedy == "Did you mean \"Alpha\"?");
  CHECK(kept.diagnostics[1].code == "without-unknown");
}

TEST_CASE("leaving out everything is an error", "[analysis]") {
  const Table table = table_of("study,n1,n2,t\nA,20,20,1\n");
  const auto kept = rows_without(table, std::vector<std::string>{"A"});
  CHECK_FALSE(kept.ok());
  CHECK(kept.diagnostics.at(0).code == "without-everything");
}

TEST_CASE("what is left out is said, and the rest still points at the whole table", "[analysis]") {
  AnalysisOptions options;
  options.without = {"Alpha"};
  const auto outcome = analyse_pool(studies, "studies.csv", options);
  REQUIRE(outcome.ok());
  const Analysis& analysis = *outcome.value;
  CHECK(analysis.left_out == std::vector<std::string>{"Alpha"});
  REQUIRE(analysis.studies.size() == 3);
  CHECK(analysis.studies[0].label == "row 2");
  CHECK(analysis.studies[0].row == 1);
  CHECK(analysis.studies[0].line == 3);
  CHECK(analysis.input.table.rows.size() == 4);
}

TEST_CASE("a row that is left out need not be usable", "[analysis]") {
  AnalysisOptions options;
  options.without = {"Broken"};
  const std::string text = "study,n1,n2,t\nA,20,20,2.1\nBroken,,,1.0\nC,20,20,1.0\n";
  CHECK_FALSE(analyse_pool(text, "studies.csv").ok());
  const auto outcome = analyse_pool(text, "studies.csv", options);
  REQUIRE(outcome.ok());
  CHECK(outcome.value->studies.size() == 2);
}

TEST_CASE("another metric than SD units needs stated priors", "[analysis]") {
  const std::string text = "study,estimate,se,metric\nA,3,1,points\nB,4,2,points\n";
  const auto refused = analyse_pool(text, "studies.csv");
  CHECK_FALSE(refused.ok());
  CHECK(refused.diagnostics.at(0).code == "priors-needed");
  AnalysisOptions options;
  options.explicit_priors = true;
  CHECK(analyse_pool(text, "studies.csv", options).ok());
}

TEST_CASE("check goes on where pool must stop", "[analysis]") {
  const auto outcome = analyse_check("study,n1,n2,t\nA,20,20,2.1\nB,,,1.0\n", "studies.csv");
  REQUIRE(outcome.ok());
  CHECK(outcome.value->studies.size() == 1);
  CHECK(outcome.value->problems.size() == 1);
}

TEST_CASE("what is no result of pool is refused", "[analysis]") {
  CHECK(read_result("[]", "x.json").diagnostics.at(0).code == "result-kind");
  CHECK(read_result("not json", "x.json").diagnostics.at(0).code == "result-kind");
  CHECK(read_result(R"({"steelyard": "0.1.0", "command": "check"})", "x.json").diagnostics.at(0).code ==
        "result-kind");
  CHECK(read_result(R"({"steelyard": "9.0.0", "schema": 99, "command": "pool"})", "x.json")
            .diagnostics.at(0)
            .code == "result-version");
}
