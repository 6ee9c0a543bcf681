#include "read/text.hpp"

#include <cstdint>
#include <cstring>  // memcpy, memchr

#include <fmt/format.h>

namespace steelyard::read {

namespace {

bool is_continuation(char c) { return (static_cast<unsigned char>(c) & 0xC0U) == 0x80U; }

// Length of the valid UTF-8 sequence at the front (no overlong forms, no surrogates, at most
// U+10FFFF), or 0.
std::size_t sequence_length(std::string_view text) {
  const auto byte = [&](std::size_t i) { return static_cast<unsigned char>(text[i]); };
  const unsigned lead = byte(0);
  if (lead < 0x80) return 1;
  const std::size_t length = lead >= 0xF0 ? 4 : lead >= 0xE0 ? 3 : 2;
  if (lead < 0xC2 || lead > 0xF4 || text.size() < length) return 0;
  for (std::size_t i = 1; i < length; ++i) {
    if (!is_continuation(text[i])) return 0;
  }
  const unsigned second = byte(1);
  const bool overlong = (lead == 0xE0 && second < 0xA0) || (lead == 0xF0 && second < 0x90);
  const bool outside = (lead == 0xED && second > 0x9F) || (lead == 0xF4 && second > 0x8F);
  return overlong || outside ? 0 : length;
}

// Offset of the first byte that is no UTF-8, or the size. Eight ASCII bytes at a time.
std::size_t first_bad_byte(std::string_view text) {
  std::size_t at = 0;
  while (at < text.size()) {
    if (text.size() - at >= 8) {
      std::uint64_t eight = 0;
      std::memcpy(&eight, text.data() + at, 8);
      if ((eight & 0x8080808080808080U) == 0) {
        at += 8;
        continue;
      }
    }
    const std::size_t length = sequence_length(text.substr(at));
    if (length == 0) break;
    at += length;
  }
  return at;
}

bool is_blank(char32_t c) {
  return c == ' ' || c == '\t' || c == '\n' || c == '\r' || c == 0xA0 || (c >= 0x2000 && c <= 0x200B) ||
         c == 0x202F || c == 0x205F || c == 0x3000 || c == 0x2060 || c == 0xFEFF;
}

std::vector<Diagnostic> at_byte(std::string_view text, std::size_t offset, const std::string& file,
                                std::string code, std::string what, std::string remedy) {
  Locator locator(text);
  locator.advance_to(offset);
  return {{Severity::error, std::move(code), locator.place(file), std::move(what), std::move(remedy)}};
}

bool looks_like_utf16(std::string_view text) {
  return text.size() >= 2 &&
         ((text[0] == '\xFF' && text[1] == '\xFE') || (text[0] == '\xFE' && text[1] == '\xFF'));
}

}  // namespace

void Locator::advance_to(std::size_t offset) {
  for (; offset_ < offset && offset_ < text_.size(); ++offset_) {
    const char c = text_[offset_];
    const bool ends_line =
        c == '\n' || (c == '\r' && (offset_ + 1 == text_.size() || text_[offset_ + 1] != '\n'));
    if (ends_line) {
      ++line_;
      column_ = 1;
    } else if (!is_continuation(c)) {
      ++column_;
    }
  }
}

std::string_view without_bom(std::string_view text) {
  return text.substr(0, 3) == "\xEF\xBB\xBF" ? text.substr(3) : text;
}

std::vector<Diagnostic> problems_with_encoding(std::string_view text, const std::string& file) {
  if (looks_like_utf16(text)) {
    return at_byte(text, 0, file, "not-utf8", "This file is UTF-16, not UTF-8.",
                   "Save it again as \"CSV UTF-8\" or in a plain text editor as UTF-8.");
  }
  const std::size_t bad = first_bad_byte(text);
  const void* nul = text.empty() ? nullptr : std::memchr(text.data(), 0, bad);
  if (nul != nullptr) {
    const auto offset = static_cast<std::size_t>(static_cast<const char*>(nul) - text.data());
    return at_byte(text, offset, file, "nul-byte", "There is a zero byte here, so this isn't a text file.",
                   "Save the table as CSV or JSON in UTF-8.");
  }
  if (bad == text.size()) return {};
  return at_byte(
      text, bad, file, "not-utf8",
      fmt::format("The byte 0x{:02X} here isn't UTF-8 text.", static_cast<unsigned char>(text[bad])),
      "Save the file again as UTF-8.");
}

std::size_t blank_at_front(std::string_view text) {
  if (text.empty()) return 0;
  const Character first = first_character(text);
  return is_blank(first.code) ? first.length : 0;
}

std::size_t blank_at_back(std::string_view text) {
  if (text.empty()) return 0;
  std::size_t start = text.size() - 1;
  while (start > 0 && is_continuation(text[start])) --start;
  const Character last = first_character(text.substr(start));
  return is_blank(last.code) && start + last.length == text.size() ? last.length : 0;
}

std::string_view trim(std::string_view text) {
  while (const std::size_t blank = blank_at_front(text)) text.remove_prefix(blank);
  while (const std::size_t blank = blank_at_back(text)) text.remove_suffix(blank);
  return text;
}

std::size_t count_characters(std::string_view text) {
  std::size_t count = 0;
  for (const char c : text) count += is_continuation(c) ? 0 : 1;
  return count;
}

Character first_character(std::string_view text) {
  const std::size_t length = sequence_length(text);
  if (length == 0) return {0xFFFD, 1};
  const auto bits = [&](std::size_t i) { return static_cast<char32_t>(static_cast<unsigned char>(text[i])); };
  if (length == 1) return {bits(0), 1};
  char32_t code = bits(0) & (0x7FU >> length);
  for (std::size_t i = 1; i < length; ++i) code = (code << 6U) | (bits(i) & 0x3FU);
  return {code, length};
}

std::string quoted(std::string_view text) {
  std::string shown = "\"";
  std::size_t characters = 0;
  while (!text.empty()) {
    if (characters++ == 60) return shown + "…\"";
    const Character c = first_character(text);
    const bool control = c.code < 0x20 || c.code == 0x7F || (c.code >= 0x80 && c.code < 0xA0);
    if (control || c.code == 0xFFFD) {
      shown += '?';
    } else {
      shown += text.substr(0, c.length);
    }
    text.remove_prefix(c.length);
  }
  return shown + "\"";
}

std::string with_commas(std::size_t number) {
  std::string digits = fmt::format("{}", number);
  for (std::size_t at = digits.size(); at > 3;) {
    at -= 3;
    digits.insert(at, 1, ',');
  }
  return digits;
}

}  // namespace steelyard::read
