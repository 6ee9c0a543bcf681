#include "render/svg/measure.hpp"

#include <algorithm>
#include <cstdint>
#include <iterator>  // std::begin, std::end, std::prev

#include "render/unicode.hpp"

namespace steelyard::render::svg {
namespace {

struct Glyphs {
  std::uint32_t first, last;
  std::uint16_t book, bold;
};

constexpr Glyphs table[] = {
#include "render/svg/glyph_widths.inc"
};

double glyph_width(char32_t c, bool bold) {
  const auto* after =
      std::upper_bound(std::begin(table), std::end(table), c,
                       [](char32_t value, const Glyphs& glyphs) { return value < glyphs.first; });
  if (after != std::begin(table)) {
    const Glyphs& glyphs = *std::prev(after);
    if (c <= glyphs.last) return bold ? glyphs.bold : glyphs.book;
  }
  const int cells = cell_width(c);
  if (cells == 0) return 0;
  return c >= 0x1F000 ? 1400 : (bold ? 1100 : 1000);
}

double width_of(std::u32string_view text, double size, bool bold) {
  double sum = 0;
  for (const char32_t c : text) sum += glyph_width(c, bold);
  return sum * size / 1000;
}

/// Number of characters from the front that fit; never parts a mark from its letter.
std::size_t count_that_fits(std::u32string_view text, double size, double width, bool bold) {
  double sum = 0;
  std::size_t whole = 0;
  for (std::size_t i = 0; i < text.size(); ++i) {
    const double glyph = glyph_width(text[i], bold) * size / 1000;
    if (cell_width(text[i]) > 0) whole = i;
    sum += glyph;
    if (sum > width) return whole;
  }
  return text.size();
}

}  // namespace

double text_width(std::string_view text, double size, bool bold) {
  return width_of(decode(text), size, bold);
}

Fitted fit(std::string_view text, double size, double width, bool bold) {
  const std::u32string all = clean(text);
  if (width_of(all, size, bold) <= width) return {encode(all), ""};
  const double room = width - width_of(U"…", size, bold);
  std::size_t count = room > 0 ? count_that_fits(all, size, room, bold) : 0;
  while (count > 0 && all[count - 1] == U' ') --count;
  return {encode(all.substr(0, count)) + "…", encode(all)};
}

std::vector<std::string> wrap(std::string_view text, double size, double width, bool bold) {
  std::u32string rest = clean(text);
  std::vector<std::string> lines;
  while (!rest.empty()) {
    const std::size_t count = count_that_fits(rest, size, width, bold);
    if (count == rest.size()) {
      lines.push_back(encode(rest));
      break;
    }
    const std::size_t space = rest.rfind(U' ', count);
    const bool at_space = space != std::u32string::npos && space > 0;
    const std::size_t end = at_space ? space : std::max<std::size_t>(count, 1);
    lines.push_back(encode(rest.substr(0, end)));
    rest.erase(0, at_space ? end + 1 : end);
  }
  return lines;
}

}  // namespace steelyard::render::svg
