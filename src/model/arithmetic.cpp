#include "model/arithmetic.hpp"

#include <charconv>  // from_chars: reads numbers whatever the locale
#include <cmath>
#include <numbers>
#include <utility>

namespace steelyard::model {

namespace {

constexpr int deepest = 64;

bool is_letter(char c) { return (c >= 'a' && c <= 'z') || (c >= 'A' && c <= 'Z'); }
bool is_digit(char c) { return c >= '0' && c <= '9'; }
char lower(char c) { return c >= 'A' && c <= 'Z' ? static_cast<char>(c - 'A' + 'a') : c; }

// The value, and whether it is a literal that was already rounded to double.
struct Value {
  long double number = 0.0L;
  bool literal = false;
};

Value read_sum(Cursor& cursor, int depth);

Value read_number(Cursor& cursor) {
  const char* begin = cursor.text.data() + cursor.at;
  const char* end = cursor.text.data() + cursor.text.size();
  double nearest = 0.0;
  const auto [stop, error] = std::from_chars(begin, end, nearest);
  if (error != std::errc()) {
    cursor.fail(error == std::errc::result_out_of_range ? "a number that a computer can hold" : "a number");
    return {};
  }
  // The literal once more with the extra digits, for arithmetic that goes on with it.
  long double precise = 0.0L;
  if (std::from_chars(begin, end, precise).ec != std::errc()) precise = nearest;
  cursor.at += static_cast<std::size_t>(stop - begin);
  cursor.skip_space();
  const bool alone =
      cursor.at >= cursor.text.size() || cursor.text[cursor.at] == ',' || cursor.text[cursor.at] == ')';
  return alone ? Value{static_cast<long double>(nearest), true} : Value{precise, false};
}

Value apply(Cursor& cursor, const std::string& function, long double x, std::size_t at) {
  if (function == "sqrt" && x >= 0.0L) return {std::sqrt(x)};
  if (function == "exp") return {std::exp(x)};
  if (function == "log" && x > 0.0L) return {std::log(x)};
  cursor.at = at;
  cursor.fail(function == "sqrt" ? "a number that is not negative under the root"
                                 : "a positive number for the logarithm");
  return {};
}

Value read_word(Cursor& cursor, int depth) {
  const std::size_t at = cursor.at;
  std::string word;
  while (cursor.at < cursor.text.size() && is_letter(cursor.text[cursor.at]))
    word += lower(cursor.text[cursor.at++]);
  if (word == "pi") return {std::numbers::pi_v<long double>};
  if (word != "sqrt" && word != "exp" && word != "log") {
    cursor.at = at;
    cursor.fail("a number, `pi`, `sqrt(`, `exp(` or `log(`");
    return {};
  }
  if (!cursor.take('(')) {
    cursor.fail("`(` after `" + word + "`");
    return {};
  }
  cursor.skip_space();
  const std::size_t argument_at = cursor.at;
  const Value argument = read_sum(cursor, depth + 1);
  if (cursor.failed()) return {};
  if (!cursor.take(')')) {
    cursor.fail("`)`");
    return {};
  }
  return apply(cursor, word, argument.number, argument_at);
}

// A hyphen, or the typographic minus sign (U+2212).
bool take_minus(Cursor& cursor) {
  constexpr std::string_view minus = "\xe2\x88\x92";
  if (cursor.take('-')) return true;
  if (cursor.text.substr(cursor.at, minus.size()) != minus) return false;
  cursor.at += minus.size();
  return true;
}

Value read_factor(Cursor& cursor, int depth) {
  cursor.skip_space();
  if (depth > deepest) {
    cursor.fail("a simpler expression, at most 64 levels deep,");
    return {};
  }
  if (take_minus(cursor)) {
    const Value value = read_factor(cursor, depth + 1);
    return {-value.number, value.literal};
  }
  if (cursor.take('+')) return read_factor(cursor, depth + 1);
  if (cursor.take('(')) {
    const Value value = read_sum(cursor, depth + 1);
    if (!cursor.failed() && !cursor.take(')')) cursor.fail("`)`");
    return {value.number, false};
  }
  const char next = cursor.at < cursor.text.size() ? cursor.text[cursor.at] : '\0';
  if (is_letter(next)) return read_word(cursor, depth);
  return read_number(cursor);
}

Value read_product(Cursor& cursor, int depth) {
  Value value = read_factor(cursor, depth);
  while (!cursor.failed()) {
    if (cursor.take('*')) {
      value = {value.number * read_factor(cursor, depth).number};
    } else if (cursor.take('/')) {
      cursor.skip_space();
      const std::size_t at = cursor.at;
      const long double divisor = read_factor(cursor, depth).number;
      if (!cursor.failed() && divisor == 0.0L) {
        cursor.at = at;
        cursor.fail("a divisor that is not 0");
      }
      value = {value.number / divisor};
    } else {
      break;
    }
  }
  return value;
}

Value read_sum(Cursor& cursor, int depth) {
  Value value = read_product(cursor, depth);
  while (!cursor.failed()) {
    if (cursor.take('+')) {
      value = {value.number + read_product(cursor, depth).number};
    } else if (take_minus(cursor)) {
      value = {value.number - read_product(cursor, depth).number};
    } else {
      break;
    }
  }
  return value;
}

}  // namespace

void Cursor::skip_space() {
  while (at < text.size() && (text[at] == ' ' || text[at] == '\t')) ++at;
}

bool Cursor::take(char c) {
  skip_space();
  if (at >= text.size() || text[at] != c) return false;
  ++at;
  return true;
}

void Cursor::fail(std::string expected) {
  if (!misread) misread = Misread{at, std::move(expected)};
}

std::string take_word(Cursor& cursor) {
  cursor.skip_space();
  std::string word;
  while (cursor.at < cursor.text.size()) {
    const char c = cursor.text[cursor.at];
    if (!is_letter(c) && !is_digit(c) && c != '-' && c != '_') break;
    word += c == '_' ? '-' : lower(c);
    ++cursor.at;
  }
  return word;
}

double read_expression(Cursor& cursor) {
  cursor.skip_space();
  const std::size_t at = cursor.at;
  const Value value = read_sum(cursor, 0);
  const double rounded = static_cast<double>(value.number);
  if (!cursor.failed() && !std::isfinite(rounded)) {
    cursor.at = at;
    cursor.fail("a number that a computer can hold");
  }
  return rounded;
}

}  // namespace steelyard::model
