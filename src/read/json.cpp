#include "read/json.hpp"

#include <fmt/format.h>

namespace steelyard::read {

namespace {

bool is_digit(char c) { return c >= '0' && c <= '9'; }

void append_utf8(std::string& out, unsigned code) {
  const auto put = [&](unsigned byte) { out += static_cast<char>(byte); };
  if (code < 0x80) {
    put(code);
  } else if (code < 0x800) {
    put(0xC0U | (code >> 6U));
    put(0x80U | (code & 0x3FU));
  } else if (code < 0x10000) {
    put(0xE0U | (code >> 12U));
    put(0x80U | ((code >> 6U) & 0x3FU));
    put(0x80U | (code & 0x3FU));
  } else {
    put(0xF0U | (code >> 18U));
    put(0x80U | ((code >> 12U) & 0x3FU));
    put(0x80U | ((code >> 6U) & 0x3FU));
    put(0x80U | (code & 0x3FU));
  }
}

}  // namespace

char JsonReader::peek() {
  while (at_ < text_.size() &&
         (text_[at_] == ' ' || text_[at_] == '\t' || text_[at_] == '\n' || text_[at_] == '\r')) {
    ++at_;
  }
  return at_ < text_.size() ? text_[at_] : '\0';
}

Place JsonReader::place() {
  peek();
  locator_.advance_to(at_);
  return locator_.place(file_);
}

bool JsonReader::complain(const char* code, std::string what, std::string remedy) {
  problems_.error(code, place(), std::move(what), std::move(remedy));
  return false;
}

bool JsonReader::fail(const char* expected) {
  const char c = peek();
  if (c == '\0') {
    return complain("json-syntax", fmt::format("The file ends where {} is expected.", expected),
                    "Check that it was saved whole.");
  }
  const std::string_view found = text_.substr(at_, first_character(text_.substr(at_)).length);
  return complain("json-syntax", fmt::format("Here stands {} where {} is expected.", quoted(found), expected),
                  "Correct the JSON at this place; what follows was not read.");
}

bool JsonReader::eat(char c, const char* expected) {
  if (peek() != c) return fail(expected);
  ++at_;
  return true;
}

bool JsonReader::end() { return peek() == '\0' ? true : fail("the end of the file"); }

bool JsonReader::string(std::string& out) {
  const Place opening = place();
  if (!eat('"', "a text in quotes")) return false;
  out.clear();
  while (true) {
    std::size_t stop = at_;
    while (stop < text_.size() && text_[stop] != '"' && text_[stop] != '\\' &&
           static_cast<unsigned char>(text_[stop]) >= 0x20) {
      ++stop;
    }
    out += text_.substr(at_, stop - at_);
    at_ = stop;
    if (at_ >= text_.size() || out.size() > longest_record) {
      problems_.error("quote-not-closed", opening,
                      at_ >= text_.size()
                          ? std::string("The quote that opens this text is never closed.")
                          : fmt::format("This text is longer than {} bytes.", with_commas(longest_record)),
                      "Close the quote, and write a quote inside the text as \\\".");
      return false;
    }
    if (text_[at_] == '"') {
      ++at_;
      return true;
    }
    if (text_[at_] != '\\') {
      return complain("json-syntax", "A text in quotes breaks off here: it contains a control character.",
                      "Write a line end inside a text as \\n and a tab as \\t.");
    }
    ++at_;
    if (!escape(out)) return false;
  }
}

bool JsonReader::hex4(unsigned& out) {
  out = 0;
  for (int i = 0; i < 4; ++i) {
    const char c = at_ < text_.size() ? text_[at_] : '\0';
    unsigned digit = 0;
    if (is_digit(c)) {
      digit = static_cast<unsigned>(c - '0');
    } else if ((c >= 'a' && c <= 'f') || (c >= 'A' && c <= 'F')) {
      digit = static_cast<unsigned>((c | 0x20) - 'a') + 10U;
    } else {
      return false;
    }
    out = 16U * out + digit;
    ++at_;
  }
  return true;
}

bool JsonReader::escape(std::string& out) {
  static constexpr std::string_view letters = "\"\\/bfnrt";
  static constexpr std::string_view meanings = "\"\\/\b\f\n\r\t";
  const auto wrong = [&] {
    return complain("json-escape", "What follows the backslash here is not a character.",
                    "Write a backslash as \\\\; \\u needs four hexadecimal digits that make a character.");
  };
  const char c = at_ < text_.size() ? text_[at_] : '\0';
  const std::size_t known = letters.find(c);
  if (c != '\0' && known != std::string_view::npos) {
    out += meanings[known];
    ++at_;
    return true;
  }
  if (c != 'u') return wrong();
  ++at_;
  unsigned code = 0;
  if (!hex4(code) || code == 0 || (code >= 0xDC00 && code < 0xE000)) return wrong();
  if (code >= 0xD800 && code < 0xDC00) {
    unsigned low = 0;
    if (text_.substr(at_, 2) != "\\u") return wrong();
    at_ += 2;
    if (!hex4(low) || low < 0xDC00 || low >= 0xE000) return wrong();
    code = 0x10000U + ((code - 0xD800U) << 10U) + (low - 0xDC00U);
  }
  append_utf8(out, code);
  return true;
}

bool JsonReader::number() {
  const auto digits = [&] {
    const std::size_t start = at_;
    while (at_ < text_.size() && is_digit(text_[at_])) ++at_;
    return at_ > start;
  };
  const auto at = [&](char c) { return at_ < text_.size() && text_[at_] == c; };
  if (at('-')) ++at_;
  if (at('0')) {
    ++at_;
  } else if (!digits()) {
    return false;
  }
  if (at('.')) {
    ++at_;
    if (!digits()) return false;
  }
  if (at('e') || at('E')) {
    ++at_;
    if (at('+') || at('-')) ++at_;
    if (!digits()) return false;
  }
  return true;
}

bool JsonReader::scalar(std::string_view& out) {
  peek();
  const std::size_t start = at_;
  for (const std::string_view word : {"true", "false", "null"}) {
    if (text_.substr(at_, word.size()) != word) continue;
    at_ += word.size();
    out = word;
    return true;
  }
  if (!number()) return fail("a number, a text in quotes, true, false or null");
  out = text_.substr(start, at_ - start);
  return true;
}

bool JsonReader::skip_value(std::size_t depth) {
  if (depth > deepest_json) {
    return complain("json-too-deep",
                    fmt::format("Objects or arrays are nested more than {} deep here.", deepest_json),
                    "A table is an array of flat objects, one for each study.");
  }
  std::string text;
  std::string_view word;
  switch (peek()) {
    case '[':
      return array([&] { return skip_value(depth + 1); });
    case '{':
      return object([&](const std::string&, const Place&) { return skip_value(depth + 1); });
    case '"':
      return string(text);
    default:
      return scalar(word);
  }
}

}  // namespace steelyard::read
