// Private to the room: reading a file and rebuilding the rows that stay.
#pragma once

#include <span>
#include <string>
#include <string_view>
#include <vector>

#include "steelyard/analysis.hpp"

namespace steelyard::analysis {

/// The table without the rows that are left out, and where each kept row stands in the whole table.
struct KeptRows {
  std::vector<std::size_t> rows;
  std::vector<std::string> left_out;  ///< labels, in the order of the file
};

[[nodiscard]] Outcome<KeptRows> keep_rows(const Table& table, std::span<const std::string> without);

/// A copy of the table with only these rows.
[[nodiscard]] Table subset(const Table& table, std::span<const std::size_t> rows);

/// Moves diagnostics that are errors to `errors`, the others to `cautions`.
void sort_out(std::vector<Diagnostic>&& diagnostics, std::vector<Diagnostic>& errors,
              std::vector<Diagnostic>& cautions);

/// Lets indices and labels of studies (or findings) of a subset speak of the whole table again.
void point_at_whole_table(std::span<Study> studies, const Table& table, std::span<const std::size_t> rows);
void point_at_whole_table(std::span<Finding> findings, std::span<const std::size_t> rows);

}  // namespace steelyard::analysis
