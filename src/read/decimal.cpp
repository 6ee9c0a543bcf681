#include "read/decimal.hpp"

#include <charconv>
#include <cstdint>
#include <string>
#include <system_error>  // errc

#include <fmt/format.h>

#include "read/text.hpp"

namespace steelyard::read {

namespace {

bool is_minus(char32_t c) {
  return c == 0x2212 || (c >= 0x2010 && c <= 0x2013) || c == 0xFE63 || c == 0xFF0D;
}

// The part of the grammar that has the digits; each step eats from `rest_` and says whether it could.
class DecimalReader {
 public:
  DecimalReader(std::string_view text, char mark) : rest_(text), mark_(mark) {}

  bool read(Decimal& out) {
    sign(out);
    if (!whole(out) || !fraction(out) || out.size == 0 || !exponent(out)) return false;
    rest_ = strip(rest_);
    if (!rest_.empty() && rest_.front() == '%') {
      out.percent = true;
      out.decimals += 2;
      rest_.remove_prefix(1);
    }
    return rest_.empty();
  }

 private:
  void sign(Decimal& out) {
    if (rest_.empty() || (rest_.front() != '-' && rest_.front() != '+')) return;
    out.negative = rest_.front() == '-';
    rest_ = strip(rest_.substr(1));
  }

  std::size_t run() const { return leading_digits(rest_); }

  bool take(Decimal& out, std::size_t count) {
    for (std::size_t i = 0; i < count; ++i) {
      if (!out.push(rest_[i])) return false;
    }
    rest_.remove_prefix(count);
    return true;
  }

  // Digits, or `1 234 567`: up to three digits, then groups of three.
  bool whole(Decimal& out) {
    const std::size_t first = run();
    if (!take(out, first)) return false;
    if (first == 0 || first > 3) return true;
    while (rest_.size() >= 4 && rest_.front() == ' ' && is_digit(rest_[1])) {
      rest_.remove_prefix(1);
      if (run() != 3 || !take(out, 3)) return false;
    }
    return true;
  }

  bool fraction(Decimal& out) {
    if (rest_.empty() || rest_.front() != mark_) return true;
    rest_.remove_prefix(1);
    const std::size_t count = run();
    out.decimals = static_cast<int>(count);
    return count > 0 && take(out, count);
  }

  bool exponent(Decimal& out) {
    if (rest_.empty() || lower(rest_.front()) != 'e') return true;
    rest_.remove_prefix(1);
    bool negative = false;
    if (!rest_.empty() && (rest_.front() == '-' || rest_.front() == '+')) {
      negative = rest_.front() == '-';
      rest_.remove_prefix(1);
    }
    const std::size_t count = run();
    if (count == 0 || count > 5) return false;
    int value = 0;
    for (std::size_t i = 0; i < count; ++i) value = 10 * value + (rest_[i] - '0');
    rest_.remove_prefix(count);
    out.decimals -= negative ? -value : value;
    return true;
  }

  std::string_view rest_;
  char mark_;
};

// n · 10^exponent as the nearest double, exactly rounded because n and the power are doubles themselves
// (Clinger 1990); nothing when they aren't.
std::optional<double> exact_scale(std::int64_t n, int exponent) {
  static constexpr std::array<double, 23> powers = {1e0,  1e1,  1e2,  1e3,  1e4,  1e5,  1e6,  1e7,
                                                    1e8,  1e9,  1e10, 1e11, 1e12, 1e13, 1e14, 1e15,
                                                    1e16, 1e17, 1e18, 1e19, 1e20, 1e21, 1e22};
  constexpr std::int64_t largest = std::int64_t{1} << 53;
  if (n > largest || n < -largest || exponent > 22 || exponent < -22) return std::nullopt;
  const auto value = static_cast<double>(n);
  return exponent < 0 ? value / powers[static_cast<std::size_t>(-exponent)]
                      : value * powers[static_cast<std::size_t>(exponent)];
}

// digits · 10^exponent as the nearest double; nothing when it overflows, or becomes 0 without being 0.
std::optional<double> scale(std::string_view digits, int exponent) {
  const std::string text = fmt::format("{}e{}", digits, exponent);
  double value = 0.0;
  if (std::from_chars(text.data(), text.data() + text.size(), value).ec == std::errc()) return value;
  if (digits.find_first_not_of('0') == std::string_view::npos) return 0.0;
  return std::nullopt;
}

std::optional<std::int64_t> as_integer(const Decimal& decimal) {
  std::int64_t n = 0;
  std::size_t first = 0;
  while (first < decimal.size && decimal.digits[first] == '0') ++first;
  if (decimal.size - first > 17) return std::nullopt;
  for (std::size_t i = first; i < decimal.size; ++i) n = 10 * n + (decimal.digits[i] - '0');
  return n;
}

}  // namespace

std::size_t leading_digits(std::string_view text) {
  std::size_t count = 0;
  while (count < text.size() && is_digit(text[count])) ++count;
  return count;
}

std::size_t trailing_digits(std::string_view text) {
  std::size_t count = 0;
  while (count < text.size() && is_digit(text[text.size() - 1 - count])) ++count;
  return count;
}

void Plain::push(char c) {
  if (size < chars.size()) {
    chars[size++] = c;
  } else {
    fits = false;
  }
}

Plain plain(std::string_view text) {
  Plain out;
  if (text.size() > 4 * longest_number) {
    out.fits = false;
    return out;
  }
  while (!text.empty()) {
    const Character c = first_character(text);
    if (blank_at_front(text) > 0) {
      out.push(' ');
    } else if (is_minus(c.code)) {
      out.push('-');
    } else if (c.code == U'≤' || c.code == U'⩽') {
      out.push('<');
      out.push('=');
    } else if (c.code == U'≥' || c.code == U'⩾') {
      out.push('>');
      out.push('=');
    } else if (c.code == U'…') {
      out.push('.');
      out.push('.');
    } else {
      out.push(c.code < 0x80 ? static_cast<char>(c.code) : '?');
    }
    text.remove_prefix(c.length);
  }
  return out;
}

std::string_view strip(std::string_view text) {
  while (!text.empty() && text.front() == ' ') text.remove_prefix(1);
  while (!text.empty() && text.back() == ' ') text.remove_suffix(1);
  return text;
}

bool Decimal::push(char c) {
  if (size == digits.size()) return false;
  digits[size++] = c;
  return true;
}

std::optional<Decimal> read_decimal(std::string_view text, char mark) {
  Decimal decimal;
  if (!DecimalReader(text, mark).read(decimal)) return std::nullopt;
  return decimal;
}

std::optional<double> value_of(const Decimal& decimal) {
  std::optional<double> value;
  if (const auto n = as_integer(decimal)) value = exact_scale(*n, -decimal.decimals);
  if (!value) value = scale({decimal.digits.data(), decimal.size}, -decimal.decimals);
  if (value && decimal.negative) value = -*value;
  return value;
}

bool set_band(const Decimal& decimal, Printed& printed) {
  const int exponent = -decimal.decimals - 1;
  const std::optional<std::int64_t> n = as_integer(decimal);
  const std::optional<double> inner = n ? exact_scale(10 * *n - 5, exponent) : std::nullopt;
  const std::optional<double> outer = n ? exact_scale(10 * *n + 5, exponent) : std::nullopt;
  if (inner && outer) {
    printed.low = decimal.negative ? -*outer : *inner;
    printed.high = decimal.negative ? -*inner : *outer;
  } else {
    const std::optional<double> half = scale("5", exponent);
    if (!half) return false;
    printed.low = printed.value - *half;
    printed.high = printed.value + *half;
  }
  return true;
}

}  // namespace steelyard::read
