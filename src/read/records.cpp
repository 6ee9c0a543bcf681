#include "read/records.hpp"

#include <algorithm>
#include <array>
#include <utility>

#include <fmt/format.h>

namespace steelyard::read {

namespace {

constexpr char quote = '"';

bool ends_line(char c) { return c == '\n' || c == '\r'; }

std::string name_of(char separator) {
  if (separator == '\t') return "a tab";
  return fmt::format("\"{}\"", separator);
}

// How many known names, and how many fields, the header has with this separator.
std::pair<std::size_t, std::size_t> score(std::string_view text, char separator) {
  std::pair<std::size_t, std::size_t> found{0, 0};
  bool inside = false;
  std::size_t start = 0;
  for (std::size_t at = 0;; ++at) {
    const bool end = at >= text.size() || at >= longest_record || (!inside && ends_line(text[at]));
    if (end || (!inside && text[at] == separator)) {
      std::string_view name = trim(text.substr(start, at - start));
      if (name.size() >= 2 && name.front() == quote && name.back() == quote)
        name = name.substr(1, name.size() - 2);
      found.first += find_column(name) != nullptr ? 1 : 0;
      found.second += 1;
      start = at + 1;
    } else if (text[at] == quote) {
      inside = !inside;
    }
    if (end) return found;
  }
}

}  // namespace

std::string unescape(const Field& field) {
  if (!field.doubled) return std::string(field.text);
  std::string text;
  text.reserve(field.text.size());
  for (std::size_t i = 0; i < field.text.size(); ++i) {
    text += field.text[i];
    if (field.text[i] == quote && i + 1 < field.text.size() && field.text[i + 1] == quote) ++i;
  }
  return text;
}

char find_separator(std::string_view text) {
  char best = ',';
  std::pair<std::size_t, std::size_t> most{0, 0};
  for (const char separator : {',', ';', '\t'}) {
    const auto found = score(text, separator);
    if (found > most) {
      most = found;
      best = separator;
    }
  }
  return best;
}

bool Records::next(std::vector<Field>& fields) {
  while (!stopped_ && at_ < text_.size()) {
    fields.clear();
    broken_ = false;
    record(fields);
    const bool blank =
        std::all_of(fields.begin(), fields.end(), [](const Field& f) { return f.text.empty(); });
    if (!blank) return true;
  }
  return false;
}

void Records::record(std::vector<Field>& fields) {
  const std::size_t start = at_;
  locator_.advance_to(start);
  const std::size_t line = locator_.line();
  while (true) {
    fields.push_back(at_ < text_.size() && text_[at_] == quote ? quoted_field() : plain_field());
    if (stopped_) return;
    if (too_long(start, line)) {
      fields.clear();
      return;
    }
    if (at_ >= text_.size()) return;
    if (text_[at_] != separator_) break;
    ++at_;
  }
  skip_line_end();
}

// The record is given up and the rest of its line skipped.
bool Records::too_long(std::size_t start, std::size_t line) {
  if (at_ - start <= longest_record) return false;
  problems_.error(
      "line-too-long", {file_, line, 1},
      fmt::format("The line that begins here is longer than {} bytes.", with_commas(longest_record)),
      "No row of a table is that long: check that the file has line ends and that quotes are closed.");
  at_ = std::min(text_.find_first_of("\r\n", at_), text_.size());
  skip_line_end();
  return true;
}

bool Records::at_line_end(std::size_t at) const { return at >= text_.size() || ends_line(text_[at]); }

void Records::skip_line_end() {
  if (at_ < text_.size() && text_[at_] == '\r') {
    ++at_;
    if (at_ < text_.size() && text_[at_] == '\n') ++at_;
  } else if (at_ < text_.size() && text_[at_] == '\n') {
    ++at_;
  }
}

std::size_t Records::find_field_end(std::size_t from) const {
  while (from < text_.size() && text_[from] != separator_ && !ends_line(text_[from])) ++from;
  return from;
}

Field Records::make(std::string_view text) {
  Field field;
  field.text = trim(text);
  const auto start = static_cast<std::size_t>((field.text.empty() ? text : field.text).data() - text_.data());
  locator_.advance_to(start);
  field.line = locator_.line();
  field.column = locator_.column();
  return field;
}

void Records::error(std::size_t at, const char* code, std::string what, std::string remedy) {
  broken_ = true;
  if (problems_.enough_errors()) return problems_.count_error();
  locator_.advance_to(at);
  problems_.error(code, locator_.place(file_), std::move(what), std::move(remedy));
}

Field Records::plain_field() {
  const std::size_t start = at_;
  const std::size_t end = find_field_end(start);
  const std::string_view text = text_.substr(start, end - start);
  at_ = end;
  const Field field = make(text);
  const std::size_t at = text.find(quote);
  if (at != std::string_view::npos) {
    const bool only_blanks = trim(text.substr(0, at)).empty();
    error(start + at, "broken-quote",
          only_blanks ? "There is a blank before the opening quote of this cell."
                      : "There is a quote inside a cell that does not begin with one.",
          only_blanks
              ? "Remove the blank."
              : "Put the whole cell in quotes and double the quotes in it, as in \"the \"\"new\"\" test\".");
  }
  return field;
}

Field Records::quoted_field() {
  const std::size_t opening = at_;
  bool doubled = false;
  std::size_t closing = opening + 1;
  while (true) {
    const std::size_t limit = opening + longest_record;
    closing = std::min(text_.find(quote, closing), text_.size());
    if (closing >= text_.size() || closing > limit) {
      error(opening, "quote-not-closed",
            closing >= text_.size()
                ? "The quote that opens this cell is never closed."
                : fmt::format("The quote that opens this cell is not closed within {} bytes.",
                              with_commas(longest_record)),
            "Close it, and double every quote inside the cell.");
      stopped_ = true;
      return {};
    }
    if (closing + 1 >= text_.size() || text_[closing + 1] != quote) break;
    doubled = true;
    closing += 2;
  }
  Field field = make(text_.substr(opening + 1, closing - opening - 1));
  field.doubled = doubled;
  at_ = closing + 1;
  if (!at_line_end(at_) && text_[at_] != separator_) {
    const std::size_t end = find_field_end(at_);
    error(at_, "broken-quote",
          fmt::format("After the closing quote of this cell comes {} instead of {} or the end of the line.",
                      quoted(text_.substr(at_, end - at_)), name_of(separator_)),
          "Double every quote inside the cell, and leave nothing after the closing quote.");
    at_ = end;
  }
  return field;
}

}  // namespace steelyard::read
