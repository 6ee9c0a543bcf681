#include <catch2/catch.hpp>

#include <cctype>
#include <set>
#include <string>

#include "steelyard/base.hpp"

using namespace steelyard;

TEST_CASE("the table of columns is well formed") {
  std::set<std::string_view> names;
  for (const Column& column : columns()) {
    INFO(column.name);
    CHECK(names.insert(column.name).second);
    CHECK(find_column(column.name) == &column);
    CHECK_FALSE(column.name.empty());
    for (const char c : column.name) CHECK((std::islower(c) || std::isdigit(c) || c == '_'));
    CHECK_FALSE(column.meaning.empty());
    CHECK(column.meaning.back() != '.');
    CHECK((column.kind == ColumnKind::choice) == !column.choices.empty());
    if (column.kind == ColumnKind::count) CHECK_FALSE(column.unit.empty());
  }
}

TEST_CASE("the columns of the plan are known") {
  for (const char* name :
       {"study",    "year",  "role",   "design",   "n1",        "n2",      "n",         "mean1",  "sd1",
        "se1",      "mean2", "sd2",    "se2",      "mean_diff", "sd_diff", "se_diff",   "ci_low", "ci_high",
        "ci_level", "t",     "df",     "f",        "df1",       "p",       "tails",     "sign",   "d",
        "g",        "r",     "r_pair", "estimate", "se",        "metric",  "as_printed"}) {
    INFO(name);
    CHECK(find_column(name) != nullptr);
  }
  CHECK(find_column("T") == nullptr);
  CHECK(find_column("") == nullptr);
}

TEST_CASE("no known column is taken for a slip of another") {
  for (const Column& column : columns()) CHECK(near_column(column.name) == nullptr);
}
