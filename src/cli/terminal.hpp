// What the terminal can show.
#pragma once

#include <cstddef>

#include "options.hpp"
#include "steelyard/render.hpp"

namespace steelyard::cli {

/// COLUMNS, else the width of the terminal behind standard output, else 80; from 40 to 1000.
[[nodiscard]] std::size_t terminal_width();

/// How text is written for these options and this surrounding.
[[nodiscard]] TextStyle text_style(const Options& options);

}  // namespace steelyard::cli
