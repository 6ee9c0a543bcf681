#include "render/json/writer.hpp"

#include <array>
#include <charconv>
#include <cmath>
#include <cstddef>

namespace steelyard::json {

namespace {

constexpr std::size_t buffer_bytes = 1 << 16;
constexpr std::string_view replacement = "\xEF\xBF\xBD";  // U+FFFD

// Length of the well-formed UTF-8 sequence that begins at `at`, or 0 (Unicode 15, table 3-7).
std::size_t sequence_length(std::string_view s, std::size_t at) {
  const auto byte = [&](std::size_t i) { return static_cast<unsigned char>(s[i]); };
  const auto continues = [&](std::size_t i, unsigned low = 0x80, unsigned high = 0xBF) {
    return i < s.size() && byte(i) >= low && byte(i) <= high;
  };
  const unsigned first = byte(at);
  if (first < 0x80) return 1;
  if (first >= 0xC2 && first <= 0xDF) return continues(at + 1) ? 2 : 0;
  if (first >= 0xE0 && first <= 0xEF) {
    const unsigned low = first == 0xE0 ? 0xA0 : 0x80;
    const unsigned high = first == 0xED ? 0x9F : 0xBF;
    return continues(at + 1, low, high) && continues(at + 2) ? 3 : 0;
  }
  if (first >= 0xF0 && first <= 0xF4) {
    const unsigned low = first == 0xF0 ? 0x90 : 0x80;
    const unsigned high = first == 0xF4 ? 0x8F : 0xBF;
    return continues(at + 1, low, high) && continues(at + 2) && continues(at + 3) ? 4 : 0;
  }
  return 0;
}

void append_control(std::string& out, unsigned char c) {
  constexpr std::string_view digits = "0123456789abcdef";
  switch (c) {
    case '\n':
      out += "\\n";
      return;
    case '\t':
      out += "\\t";
      return;
    case '\r':
      out += "\\r";
      return;
    default:
      out += "\\u00";
      out += digits[c >> 4];
      out += digits[c & 0xf];
  }
}

void append_quoted(std::string& out, std::string_view text) {
  out += '"';
  for (std::size_t at = 0; at < text.size();) {
    const auto c = static_cast<unsigned char>(text[at]);
    const std::size_t length = sequence_length(text, at);
    if (length == 0) {
      out += replacement;
      ++at;
      continue;
    }
    if (c == '"' || c == '\\') {
      out += '\\';
      out += text[at];
    } else if (c < 0x20 || c == 0x7f) {
      append_control(out, c);
    } else {
      out.append(text, at, length);
    }
    at += length;
  }
  out += '"';
}

}  // namespace

std::string quoted(std::string_view text) {
  std::string out;
  append_quoted(out, text);
  return out;
}

void Writer::key(std::string_view name) {
  before_value();
  append_quoted(buffer_, name);
  buffer_ += ": ";
  after_key_ = true;
}

void Writer::text(std::string_view value) {
  before_value();
  append_quoted(buffer_, value);
}

void Writer::number(double value) {
  if (!std::isfinite(value)) return null();
  before_value();
  std::array<char, 40> digits{};
  const auto written = std::to_chars(digits.data(), digits.data() + digits.size(), value);
  buffer_.append(digits.data(), written.ptr);
}

void Writer::integer(unsigned long long value) {
  before_value();
  buffer_ += std::to_string(value);
}

void Writer::boolean(bool value) {
  before_value();
  buffer_ += value ? "true" : "false";
}

void Writer::null() {
  before_value();
  buffer_ += "null";
}

void Writer::finish() {
  buffer_ += '\n';
  sink_(buffer_);
  buffer_.clear();
}

bool Writer::spread_out(std::size_t depth, char bracket) const {
  return depth < spread_ || (depth == spread_ && bracket == '[');
}

void Writer::begin(char bracket) {
  before_value();
  buffer_ += bracket;
  levels_.push_back({bracket, spread_out(levels_.size(), bracket), true});
}

void Writer::end(char bracket) {
  const Level level = levels_.back();
  levels_.pop_back();
  if (level.spread_out && !level.empty) new_line();
  buffer_ += bracket;
  flush_when_full();
}

void Writer::before_value() {
  if (after_key_) {
    after_key_ = false;
    return;
  }
  if (levels_.empty()) return;
  Level& level = levels_.back();
  if (!level.empty) buffer_ += level.spread_out ? "," : ", ";
  level.empty = false;
  if (level.spread_out) new_line();
}

void Writer::new_line() {
  buffer_ += '\n';
  buffer_.append(2 * levels_.size(), ' ');
}

void Writer::flush_when_full() {
  if (buffer_.size() < buffer_bytes) return;
  sink_(buffer_);
  buffer_.clear();
}

}  // namespace steelyard::json

namespace steelyard {

std::string quoted_json(std::string_view text) { return json::quoted(text); }

}  // namespace steelyard
