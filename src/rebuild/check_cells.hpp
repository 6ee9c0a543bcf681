// Cells that can't mean what their column says, whatever the route.
#pragma once

#include <vector>

#include "rebuild/facts.hpp"

namespace steelyard::rebuilding {

/// Errors of single cells and of pairs of cells (an interval the wrong way round), each at its cell.
[[nodiscard]] std::vector<Diagnostic> check_cells(const Facts& facts);

}  // namespace steelyard::rebuilding
