// From a table of texts to a table of numbers: what CSV and JSON have in common.
#pragma once

#include <cstdint>
#include <string>
#include <string_view>
#include <vector>

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

/// The value, unless there were errors, and the problems.
[[nodiscard]] Outcome<Table> finish(Table table, Problems& problems);

}  // namespace steelyard::read
