// A study far from the others.
#include <catch2/catch.hpp>
#include <cmath>
#include <string>

#include "steelyard/audit.hpp"
#include "steelyard/numeric.hpp"

namespace {

std::vector<steelyard::Finding> far(const std::string& csv) {
  const auto read = steelyard::read_csv(csv, "rows.csv");
  REQUIRE(read.ok());
  const auto studies = steelyard::rebuild_all(*read.value);
  REQUIRE(studies.ok());
  auto all = steelyard::audit(*read.value, *studies.value);
  std::vector<steelyard::Finding> result;
  for (auto& f : all) {
    if (f.rule == "far-from-others") result.push_back(f);
  }
  return result;
}

}  // namespace

TEST_CASE("a study far from the others is pointed out, with the chance of it") {
  const std::string others =
      "study,t,n1,n2\nA,1.50,40,40\nB,1.80,38,41\nC,1.20,45,45\nD,1.60,50,48\nE,1.40,40,42\n";
  CHECK(far(others + "F,1.70,40,40\n").empty());
  const auto found = far(others + "F,-7.10,40,40\n");
  REQUIRE(found.size() == 1);
  CHECK(found[0].row == 5);
  CHECK(found[0].grade == steelyard::Grade::worth_a_look);
  CHECK(found[0].what.find("\"F\" lies far from the other 5 studies") == 0);
}

TEST_CASE("studies that vary widely among themselves leave room for another") {
  CHECK(
      far("study,t,n1,n2\nA,-3.5,40,40\nB,4.1,38,41\nC,1.2,45,45\nD,-2.6,50,48\nE,5.4,40,42\nF,-5.1,40,40\n")
          .empty());
}

TEST_CASE("other metrics are compared among themselves only") {
  const std::string rows =
      "study,estimate,se,metric\nA,10.1,1.0,points\nB,11.0,1.1,points\nC,9.6,0.9,points\nD,10.4,1.0,"
      "points\nE,30.0,1.0,points\n";
  REQUIRE(far(rows).size() == 1);
  CHECK(far(rows)[0].row == 4);
  CHECK(far("study,estimate,se,metric\nA,10.1,1.0,a\nB,11.0,1.1,a\nC,9.6,0.9,a\nD,30.0,1.0,b\n").empty());
}

TEST_CASE("tables without any stranger seldom have one pointed out") {
  std::size_t found = 0;
  for (int table = 0; table < 200; ++table) {
    std::string csv = "study,t,n1,n2\n";
    for (int i = 0; i < 8; ++i) {
      // t of equal effects: quantiles of a fixed low-discrepancy sequence, as even as chance
      const double u = std::fmod(0.5 + 0.6180339887498949 * (table * 8 + i), 1.0);
      csv += std::string("S").append(std::to_string(i)).append(",=");
      csv += std::to_string(1.5 + steelyard::numeric::normal_upper_quantile(u)).append("!,60,60\n");
    }
    found += far(csv).size();
  }
  CHECK(found <= 4);
}
