// Rows for the tests, written as CSV.
#pragma once

#include <catch2/catch.hpp>
#include <string>
#include <string_view>
#include <vector>

#include "steelyard/read.hpp"
#include "steelyard/rebuild.hpp"

namespace help {

inline steelyard::Table table(std::string_view csv) {
  auto read = steelyard::read_csv(csv, "rows.csv");
  for (const auto& d : read.diagnostics) UNSCOPED_INFO(steelyard::to_text(d));
  REQUIRE(read.ok());
  return std::move(*read.value);
}

inline steelyard::Outcome<std::vector<steelyard::Study>> rebuilt(
    std::string_view csv, const steelyard::RebuildOptions& options = {}) {
  return steelyard::rebuild_all(table(csv), options);
}

/// The first study of rows that can be rebuilt.
inline steelyard::Study study(std::string_view csv, const steelyard::RebuildOptions& options = {}) {
  auto outcome = rebuilt(csv, options);
  INFO(csv);
  for (const auto& d : outcome.diagnostics) UNSCOPED_INFO(steelyard::to_text(d));
  REQUIRE(outcome.ok());
  return outcome.value->front();
}

inline steelyard::ExactT exact(const steelyard::Study& study) {
  INFO(study.how);
  REQUIRE(std::holds_alternative<steelyard::ExactT>(study.evidence));
  return std::get<steelyard::ExactT>(study.evidence);
}

inline steelyard::BandT band(const steelyard::Study& study) {
  INFO(study.how);
  REQUIRE(std::holds_alternative<steelyard::BandT>(study.evidence));
  return std::get<steelyard::BandT>(study.evidence);
}

inline steelyard::NormalEstimate normal(const steelyard::Study& study) {
  INFO(study.how);
  REQUIRE(std::holds_alternative<steelyard::NormalEstimate>(study.evidence));
  return std::get<steelyard::NormalEstimate>(study.evidence);
}

/// A number that is exact as it stands: `=2.1!`.
inline std::string exactly(double value) {
  return std::string("=").append(std::to_string(value)).append("!");
}

inline bool says(const std::vector<steelyard::Diagnostic>& all, std::string_view code) {
  for (const auto& d : all) {
    if (d.code == code) return true;
  }
  return false;
}

/// Equal to the digits printed in the source: half a unit of the last one.
inline Approx printed(double value, int decimals) {
  return Approx(value).margin(0.5001 * std::pow(10.0, -decimals)).epsilon(0.0);
}

}  // namespace help
