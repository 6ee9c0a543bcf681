// How wide text is, without a browser: advance widths of one open font, and what is cut or wrapped by them.
#pragma once

#include <string>
#include <string_view>
#include <vector>

namespace steelyard::render::svg {

/// Width of one line at a font size, both in px. DejaVu Sans without kerning; characters that the font
/// lacks count one em (1.4 for emoji), combining marks nothing. Fallback fonts named beside it are no wider.
[[nodiscard]] double text_width(std::string_view text, double size, bool bold = false);

/// Height of a line box above and below its baseline, in em.
inline constexpr double ascent = 0.93;
inline constexpr double descent = 0.24;

/// A label as it fits: `shown` ends with an ellipsis when it was cut, `full` then holds all of it.
struct Fitted {
  std::string shown;
  std::string full;
};
[[nodiscard]] Fitted fit(std::string_view text, double size, double width, bool bold = false);

/// Lines no wider than `width`, broken at spaces; a word wider than a line is broken inside.
[[nodiscard]] std::vector<std::string> wrap(std::string_view text, double size, double width,
                                            bool bold = false);

}  // namespace steelyard::render::svg
