// Lines for a terminal: what is shown of a text, columns, wrapping, colours.
#pragma once

#include <cstddef>
#include <string>
#include <string_view>
#include <vector>

#include "steelyard/render.hpp"

namespace steelyard::render::text {

/// The characters that the terminal will really get, one string for layout and output.
[[nodiscard]] std::u32string shown(std::string_view text, const TextStyle& style);

/// Cut (with an ellipsis) or padded to exactly `width` columns.
[[nodiscard]] std::u32string fit(std::u32string text, std::size_t width, const TextStyle& style,
                                 bool right = false);

/// ANSI colours by meaning.
enum class Tone { plain, strong, faint, in_favour, against };
[[nodiscard]] std::string toned(std::u32string_view text, Tone tone, const TextStyle& style);

/// A paragraph wrapped to the width, each line after the first indented by `hang`.
[[nodiscard]] std::string paragraph(std::string_view text, const TextStyle& style, std::size_t indent = 0,
                                    std::size_t hang = 0);

/// A section's head.
[[nodiscard]] std::string heading(std::string_view text, const TextStyle& style);

/// Columns side by side, the first row as head; the first column left, the others right aligned. The first
/// column gives way when the table is wider than the terminal.
[[nodiscard]] std::string table(const std::vector<std::vector<std::string>>& rows, const TextStyle& style);

}  // namespace steelyard::render::text
