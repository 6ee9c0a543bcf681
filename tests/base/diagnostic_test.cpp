#include <catch2/catch.hpp>

#include "steelyard/base.hpp"

using namespace steelyard;

TEST_CASE("a diagnostic is printed as one line") {
  Diagnostic whole;
  whole.code = "not-a-number";
  whole.where = {"a.csv", 3, 7};
  whole.what = "\"x\" is not a number.";
  whole.remedy = "Correct it.";
  CHECK(to_text(whole) == "a.csv:3:7: error: \"x\" is not a number. Correct it. [not-a-number]");

  Diagnostic part = whole;
  part.where.column = 0;
  CHECK(to_text(part) == "a.csv:3: error: \"x\" is not a number. Correct it. [not-a-number]");
  part.where.line = 0;
  part.severity = Severity::caution;
  CHECK(to_text(part) == "a.csv: caution: \"x\" is not a number. Correct it. [not-a-number]");
  part.where.file.clear();
  part.severity = Severity::note;
  part.remedy.clear();
  part.code.clear();
  CHECK(to_text(part) == "note: \"x\" is not a number.");
}

TEST_CASE("an outcome is usable exactly when it has a value") {
  Outcome<int> outcome;
  CHECK_FALSE(outcome.ok());
  outcome.value = 3;
  CHECK(outcome.ok());
}
