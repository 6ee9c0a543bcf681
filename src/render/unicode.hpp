// What every text format needs to know of Unicode: decoding, widths, and characters that must not get
// through.
#pragma once

#include <cstddef>
#include <string>
#include <string_view>

namespace steelyard::render {

/// Code points of UTF-8 text; what is not valid UTF-8 becomes U+FFFD, one for each byte.
[[nodiscard]] std::u32string decode(std::string_view text);
[[nodiscard]] std::string encode(std::u32string_view text);

/// The text with nothing in it that steers a terminal or a page: C0 and C1 controls become their
/// pictures (U+2400...) or U+FFFD, direction overrides and isolates U+FFFD, line breaks U+2424.
[[nodiscard]] std::u32string clean(std::string_view text);

/// Columns in a terminal: 0 for combining marks, 2 for wide East Asian characters and emoji, else 1.
[[nodiscard]] int cell_width(char32_t c);
[[nodiscard]] std::size_t cell_width(std::u32string_view text);

/// Printable ASCII: typographic signs, Greek letters and superscripts are spelled, Latin letters lose
/// their accents, the rest becomes `?`.
[[nodiscard]] std::string to_ascii(std::u32string_view text);

}  // namespace steelyard::render
