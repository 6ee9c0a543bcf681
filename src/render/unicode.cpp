#include "render/unicode.hpp"

#include <algorithm>
#include <iterator>  // std::begin, std::end
#include <string>

namespace steelyard::render {
namespace {

struct Range {
  char32_t first, last;
};

// Combining and other characters without a width of their own: the blocks that occur in names and
// titles of papers (general category Mn and Me, and joiners).
constexpr Range zero_width[] = {
    {0x0300, 0x036F},   {0x0483, 0x0489}, {0x0591, 0x05BD}, {0x05BF, 0x05BF}, {0x05C1, 0x05C2},
    {0x05C4, 0x05C5},   {0x05C7, 0x05C7}, {0x0610, 0x061A}, {0x064B, 0x065F}, {0x0670, 0x0670},
    {0x06D6, 0x06DC},   {0x06DF, 0x06E4}, {0x06E7, 0x06E8}, {0x06EA, 0x06ED}, {0x0711, 0x0711},
    {0x0730, 0x074A},   {0x0900, 0x0902}, {0x093A, 0x093A}, {0x093C, 0x093C}, {0x0941, 0x0948},
    {0x094D, 0x094D},   {0x0951, 0x0957}, {0x0E31, 0x0E31}, {0x0E34, 0x0E3A}, {0x0E47, 0x0E4E},
    {0x1AB0, 0x1AFF},   {0x1DC0, 0x1DFF}, {0x200B, 0x200D}, {0x2060, 0x2064}, {0x20D0, 0x20FF},
    {0x302A, 0x302D},   {0x3099, 0x309A}, {0xFE00, 0xFE0F}, {0xFE20, 0xFE2F}, {0xFEFF, 0xFEFF},
    {0xE0100, 0xE01EF},
};

constexpr Range wide[] = {
    {0x1100, 0x115F},   {0x231A, 0x231B},   {0x2E80, 0x303E}, {0x3041, 0x33FF},   {0x3400, 0x4DBF},
    {0x4E00, 0x9FFF},   {0xA000, 0xA4CF},   {0xA960, 0xA97F}, {0xAC00, 0xD7A3},   {0xF900, 0xFAFF},
    {0xFE30, 0xFE6F},   {0xFF00, 0xFF60},   {0xFFE0, 0xFFE6}, {0x1F300, 0x1F64F}, {0x1F680, 0x1F6FF},
    {0x1F900, 0x1FAFF}, {0x20000, 0x3FFFD},
};

template <std::size_t n>
bool within(const Range (&ranges)[n], char32_t c) {
  const auto* after =
      std::upper_bound(std::begin(ranges), std::end(ranges), c,
                       [](char32_t value, const Range& range) { return value < range.first; });
  return after != std::begin(ranges) && c <= std::prev(after)->last;
}

/// Length of a sequence from its first byte, 0 when no sequence begins so.
std::size_t sequence_length(unsigned char lead) {
  if (lead < 0x80) return 1;
  if (lead >= 0xC2 && lead <= 0xDF) return 2;
  if (lead >= 0xE0 && lead <= 0xEF) return 3;
  if (lead >= 0xF0 && lead <= 0xF4) return 4;
  return 0;
}

/// The code point that begins at `at`, or U+FFFD with length 1.
char32_t decode_one(std::string_view text, std::size_t at, std::size_t& length) {
  const auto lead = static_cast<unsigned char>(text[at]);
  length = sequence_length(lead);
  if (length == 1) return lead;
  const auto bad = [&] {
    length = 1;
    return char32_t{0xFFFD};
  };
  if (length == 0 || at + length > text.size()) return bad();
  char32_t value = lead & (0xFFU >> (length + 1));
  for (std::size_t i = 1; i < length; ++i) {
    const auto byte = static_cast<unsigned char>(text[at + i]);
    if ((byte & 0xC0U) != 0x80U) return bad();
    value = (value << 6U) | (byte & 0x3FU);
  }
  static constexpr char32_t least[] = {0, 0, 0x80, 0x800, 0x10000};
  if (value < least[length] || value > 0x10FFFF || (value >= 0xD800 && value <= 0xDFFF)) return bad();
  return value;
}

bool is_direction_control(char32_t c) {
  return c == 0x061C || c == 0x200E || c == 0x200F || (c >= 0x202A && c <= 0x202E) ||
         (c >= 0x2066 && c <= 0x2069);
}

char32_t cleaned(char32_t c) {
  if (c == '\t') return ' ';
  if (c == '\n' || c == 0x2028 || c == 0x2029) return 0x2424;
  if (c < 0x20) return 0x2400 + c;
  if (c == 0x7F) return 0x2421;
  const bool never_in_xml = c == 0xFFFE || c == 0xFFFF || (c & 0xFFFEU) == 0xFFFEU;
  if ((c >= 0x80 && c < 0xA0) || is_direction_control(c) || c == 0xFEFF || never_in_xml) return 0xFFFD;
  return c;
}

struct Spelling {
  char32_t c;
  const char* ascii;
};
constexpr Spelling spellings[] = {
    {0x00A0, " "},   {0x00AB, "\""}, {0x00B0, "deg"},   {0x00B1, "+/-"},  {0x00B7, "*"},
    {0x00BB, "\""},  {0x00D7, "x"},  {0x03B1, "alpha"}, {0x03B2, "beta"}, {0x03B4, "delta"},
    {0x03BC, "mu"},  {0x03BD, "nu"}, {0x03C3, "sigma"}, {0x03C4, "tau"},  {0x2009, " "},
    {0x2010, "-"},   {0x2011, "-"},  {0x2012, "-"},     {0x2013, "-"},    {0x2014, "-"},
    {0x2018, "'"},   {0x2019, "'"},  {0x201C, "\""},    {0x201D, "\""},   {0x2022, "*"},
    {0x2026, "..."}, {0x202F, " "},  {0x2212, "-"},     {0x221A, "sqrt"}, {0x2248, "~"},
    {0x2260, "/="},  {0x2264, "<="}, {0x2265, ">="},    {0x2424, " "},
};

// U+00C0 to U+017F without their accents.
constexpr std::string_view latin =
    "AAAAAAACEEEEIIIIDNOOOOOxOUUUUYTsaaaaaaaceeeeiiiidnooooo/ouuuuyty"
    "AaAaAaCcCcCcCcDdDdEeEeEeEeEeGgGgGgGgHhHhIiIiIiIiIiJjJjKkkLlLlLlLlLlNnNnNnnNnOoOoOoOoRrRrRrSsSsSsSsTtTtTt"
    "UuUu"
    "UuUuUuUuWwYyYZzZzZzs";

int superscript_digit(char32_t c) {
  if (c == 0x00B9) return 1;
  if (c == 0x00B2) return 2;
  if (c == 0x00B3) return 3;
  if (c == 0x2070 || (c >= 0x2074 && c <= 0x2079)) return static_cast<int>(c - 0x2070);
  return -1;
}

std::string spelled(char32_t c) {
  if (c >= 0x20 && c < 0x7F) return std::string(1, static_cast<char>(c));
  if (c >= 0xC0 && c < 0xC0 + latin.size() && c != 0xD7) return std::string(1, latin[c - 0xC0]);
  for (const Spelling& spelling : spellings)
    if (spelling.c == c) return spelling.ascii;
  return cell_width(c) == 0 ? "" : "?";
}

}  // namespace

std::u32string decode(std::string_view text) {
  std::u32string out;
  for (std::size_t at = 0, length = 0; at < text.size(); at += length) out += decode_one(text, at, length);
  return out;
}

std::string encode(std::u32string_view text) {
  std::string out;
  const auto put = [&](char32_t value) { out += static_cast<char>(value); };
  for (const char32_t c : text) {
    if (c < 0x80) {
      put(c);
    } else if (c < 0x800) {
      put(0xC0 | (c >> 6U)), put(0x80 | (c & 0x3FU));
    } else if (c < 0x10000) {
      put(0xE0 | (c >> 12U)), put(0x80 | ((c >> 6U) & 0x3FU)), put(0x80 | (c & 0x3FU));
    } else {
      put(0xF0 | (c >> 18U)), put(0x80 | ((c >> 12U) & 0x3FU));
      put(0x80 | ((c >> 6U) & 0x3FU)), put(0x80 | (c & 0x3FU));
    }
  }
  return out;
}

std::u32string clean(std::string_view text) {
  std::u32string out = decode(text);
  std::transform(out.begin(), out.end(), out.begin(), cleaned);
  return out;
}

int cell_width(char32_t c) {
  if (c < 0x300) return 1;
  if (within(zero_width, c)) return 0;
  return within(wide, c) ? 2 : 1;
}

std::size_t cell_width(std::u32string_view text) {
  std::size_t out = 0;
  for (const char32_t c : text) out += static_cast<std::size_t>(cell_width(c));
  return out;
}

std::string to_ascii(std::u32string_view text) {
  std::string out;
  bool raised = false;
  for (const char32_t c : text) {
    const int digit = superscript_digit(c);
    const bool now_raised = digit >= 0 || c == 0x207B;
    if (now_raised && !raised) out += '^';
    raised = now_raised;
    if (digit >= 0) {
      out += static_cast<char>('0' + digit);
    } else if (c == 0x207B) {
      out += '-';
    } else {
      out += spelled(c);
    }
  }
  return out;
}

}  // namespace steelyard::render
