#include "render/text/page.hpp"

#include <algorithm>

#include "render/unicode.hpp"

namespace steelyard::render::text {

std::u32string shown(std::string_view text, const TextStyle& style) {
  const std::u32string safe = clean(text);
  return style.utf8 ? safe : decode(to_ascii(safe));
}

std::u32string fit(std::u32string text, std::size_t width, const TextStyle& style, bool right) {
  if (cell_width(text) > width) {
    const std::u32string ellipsis = style.utf8 ? U"…" : U"..";
    const std::size_t room = width > ellipsis.size() ? width - ellipsis.size() : 0;
    std::size_t used = 0, count = 0;
    while (count < text.size() && used + static_cast<std::size_t>(cell_width(text[count])) <= room)
      used += static_cast<std::size_t>(cell_width(text[count++]));
    text = (text.substr(0, count) + ellipsis).substr(0, count + std::min(width, ellipsis.size()));
  }
  const std::size_t width_now = cell_width(text);
  const std::u32string pad(width > width_now ? width - width_now : 0, U' ');
  return right ? pad + text : text + pad;
}

std::string toned(std::u32string_view text, Tone tone, const TextStyle& style) {
  static constexpr const char* codes[] = {"", "\x1b[1m", "\x1b[2m", "\x1b[33m", "\x1b[36m"};
  const std::string code = codes[static_cast<int>(tone)];
  if (!style.colour || code.empty() || text.empty()) return encode(text);
  return code + encode(text) + "\x1b[0m";
}

std::string paragraph(std::string_view text, const TextStyle& style, std::size_t indent, std::size_t hang) {
  const std::u32string all = shown(text, style);
  const std::size_t width = std::max<std::size_t>(style.width, 40);
  std::string out;
  std::u32string line(indent, U' ');
  std::size_t at = 0;
  bool fresh = true;
  while (at < all.size()) {
    const std::size_t end = std::min(all.find(U' ', at), all.size());
    std::u32string word = all.substr(at, end - at);
    at = end + 1;
    if (!fresh && cell_width(line) + 1 + cell_width(word) > width) {
      out += encode(line) + "\n";
      line = std::u32string(indent + hang, U' ');
      fresh = true;
    }
    // A word longer than a line is broken where the line ends.
    while (cell_width(line) + cell_width(word) > width && fresh) {
      std::size_t count = 0, used = cell_width(line);
      while (count < word.size() && used + static_cast<std::size_t>(cell_width(word[count])) <= width)
        used += static_cast<std::size_t>(cell_width(word[count++]));
      out += encode(line + word.substr(0, count)) + "\n";
      word.erase(0, count);
      line = std::u32string(indent + hang, U' ');
    }
    line += (fresh ? U"" : U" ") + word;
    fresh = false;
  }
  return out + encode(line) + "\n";
}

std::string heading(std::string_view text, const TextStyle& style) {
  return toned(shown(text, style), Tone::strong, style) + "\n";
}

std::string table(const std::vector<std::vector<std::string>>& rows, const TextStyle& style) {
  std::vector<std::size_t> widths;
  for (const auto& row : rows) {
    widths.resize(std::max(widths.size(), row.size()), 0);
    for (std::size_t i = 0; i < row.size(); ++i)
      widths[i] = std::max(widths[i], cell_width(shown(row[i], style)));
  }
  std::size_t total = 2;
  for (std::size_t i = 0; i < widths.size(); ++i) total += widths[i] + (i > 0 ? 2 : 0);
  const std::size_t most = std::max<std::size_t>(style.width, 40);
  if (total > most && widths[0] > 12) widths[0] -= std::min(widths[0] - 12, total - most);
  std::string out;
  for (std::size_t r = 0; r < rows.size(); ++r) {
    std::u32string line = U"  ";
    for (std::size_t i = 0; i < rows[r].size(); ++i)
      line += (i > 0 ? U"  " : U"") + fit(shown(rows[r][i], style), widths[i], style, i > 0);
    line.erase(line.find_last_not_of(U' ') + 1);
    out += toned(line, r == 0 ? Tone::faint : Tone::plain, style) + "\n";
  }
  return out;
}

}  // namespace steelyard::render::text
