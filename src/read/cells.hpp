// From a table of texts to a table of numbers: what CSV and JSON have in common.
#pragma once

#include <cstdint>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

#include "read/printed.hpp"
#include "read/problems.hpp"
#include "read/text.hpp"
#include "steelyard/read.hpp"

namespace steelyard::read {

/// A place as small as a cell keeps it; what does not fit is the largest number.
[[nodiscard]] std::uint32_t narrow(std::size_t number);

/// Points out column names that are missing, given twice, unknown but near a known one, or all unknown.
/// `places` are parallel to `names`.
void check_names(const std::vector<std::string>& names, const std::vector<Place>& places, Problems& problems);

/// Finds out the decimal mark (the point when `comma_separates`), reads every number, checks every
/// choice and takes the `as_printed` cells apart.
void read_cells(Table& table, bool comma_separates, Problems& problems);

/// Puts a scanned number into a cell of that column, or says why it can't stand there: a percentage
/// that isn't a probability, a count that isn't one. Counts are exact: 30 people are not 29.5 to 30.5.
[[nodiscard]] std::optional<Diagnostic> set_printed(Cell& cell, const Column& column, const Scan& scan,
                                                    const Place& where);

/// The value, unless there were errors, and the problems.
[[nodiscard]] Outcome<Table> finish(Table table, Problems& problems);

}  // namespace steelyard::read
