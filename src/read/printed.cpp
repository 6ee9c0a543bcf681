#include "read/printed.hpp"

#include <algorithm>
#include <array>
#include <charconv>
#include <cmath>
#include <cstdint>
#include <limits>
#include <optional>
#include <system_error>  // errc

#include <fmt/format.h>

#include "read/text.hpp"

namespace steelyard::read {

namespace {

constexpr double infinity = std::numeric_limits<double>::infinity();
constexpr std::size_t longest_number = 64;  // characters, far more than any paper prints

bool is_digit(char c) { return c >= '0' && c <= '9'; }
char lower(char c) { return c >= 'A' && c <= 'Z' ? static_cast<char>(c - 'A' + 'a') : c; }

std::size_t leading_digits(std::string_view text) {
  std::size_t count = 0;
  while (count < text.size() && is_digit(text[count])) ++count;
  return count;
}

// The text in plain ASCII: one kind of minus, of blank, of comparison.
struct Plain {
  std::array<char, 2 * longest_number> chars{};
  std::size_t size = 0;
  bool fits = true;

  void push(char c) {
    if (size < chars.size()) {
      chars[size++] = c;
    } else {
      fits = false;
    }
  }
  [[nodiscard]] std::string_view view() const { return {chars.data(), size}; }
};

bool is_minus(char32_t c) {
  return c == 0x2212 || (c >= 0x2010 && c <= 0x2013) || c == 0xFE63 || c == 0xFF0D;
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

// A decimal number in its digits: ±digits · 10^-decimals.
struct Decimal {
  bool negative = false;
  std::array<char, longest_number + 1> digits{};
  std::size_t size = 0;
  int decimals = 0;
  bool percent = false;

  bool push(char c) {
    if (size == longest_number) return false;
    digits[size++] = c;
    return true;
  }
};

// The part of the grammar that has the digits; each step eats from `rest` and says whether it could.
class DecimalReader {
 public:
  DecimalReader(std::string_view text, char mark) : rest_(text), mark_(mark) {}

  Fault read(Decimal& out) {
    sign(out);
    if (!whole(out) || !fraction(out) || out.size == 0) return Fault::not_a_number;
    if (!exponent(out)) return Fault::not_a_number;
    rest_ = strip(rest_);
    if (!rest_.empty() && rest_.front() == '%') {
      out.percent = true;
      out.decimals += 2;
      rest_.remove_prefix(1);
    }
    return rest_.empty() ? Fault::none : Fault::not_a_number;
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
  if (decimal.size > 17) return std::nullopt;
  for (std::size_t i = 0; i < decimal.size; ++i) n = 10 * n + (decimal.digits[i] - '0');
  return n;
}

std::optional<double> value_of(const Decimal& decimal) {
  std::optional<double> value;
  if (const auto n = as_integer(decimal)) value = exact_scale(*n, -decimal.decimals);
  if (!value) value = scale({decimal.digits.data(), decimal.size}, -decimal.decimals);
  if (value && decimal.negative) value = -*value;
  return value;
}

// The rounding band, half a unit of the last digit to either side. While the digits fit an integer
// its ends are the doubles nearest to the decimal ends: 2.10 gives exactly 2.095 and 2.105.
void set_band(const Decimal& decimal, Printed& printed) {
  const int exponent = -decimal.decimals - 1;
  const std::optional<std::int64_t> n = as_integer(decimal);
  const std::optional<double> inner = n ? exact_scale(10 * *n - 5, exponent) : std::nullopt;
  const std::optional<double> outer = n ? exact_scale(10 * *n + 5, exponent) : std::nullopt;
  if (inner && outer) {
    printed.low = decimal.negative ? -*outer : *inner;
    printed.high = decimal.negative ? -*inner : *outer;
  } else {
    const double half = scale("5", exponent).value_or(0.0);
    printed.low = printed.value - half;
    printed.high = printed.value + half;
  }
}

bool is_ns(std::string_view text) {
  if (lower(text.front()) != 'n' || text.size() > 5) return false;
  std::string letters;
  for (const char c : text) {
    if (c != '.' && c != ' ') letters += lower(c);
  }
  return letters == "ns";
}

bool is_not_finite(std::string_view text) {
  if (!text.empty() && (text.front() == '-' || text.front() == '+')) text.remove_prefix(1);
  std::string word;
  for (const char c : text.substr(0, 9)) word += lower(c);
  return word == "nan" || word == "inf" || word == "infinity";
}

Fault number(std::string_view text, const NumberStyle& style, Decimal& decimal, double& value) {
  const Fault fault = DecimalReader(text, style.decimal_comma ? ',' : '.').read(decimal);
  if (fault != Fault::none) {
    // Would the other decimal mark have made it a number? Then say that instead.
    Decimal other;
    const bool mark = DecimalReader(text, style.decimal_comma ? '.' : ',').read(other) == Fault::none;
    if (mark) return style.decimal_comma ? Fault::point : Fault::comma;
    return is_not_finite(text) ? Fault::not_finite : fault;
  }
  const std::optional<double> number = value_of(decimal);
  if (!number) return Fault::out_of_range;
  value = *number;
  return Fault::none;
}

Scan failed(Fault fault) { return {{}, fault, false}; }

Scan plain_number(std::string_view text, const NumberStyle& style, Relation relation) {
  Decimal decimal;
  Scan scan;
  Printed& printed = scan.printed;
  if (const Fault fault = number(text, style, decimal, printed.value); fault != Fault::none)
    return failed(fault);
  printed.relation = relation;
  printed.decimals = decimal.decimals;
  scan.percent = decimal.percent;
  if (relation == Relation::exact) {
    printed.low = printed.high = printed.value;
  } else {
    set_band(decimal, printed);
  }
  return scan;
}

// `<.05`, `>= 2`; the sign of equality makes no difference to a band.
Scan bound(std::string_view text, const NumberStyle& style) {
  const bool below = text.front() == '<';
  text.remove_prefix(1);
  if (!text.empty() && text.front() == '=') text.remove_prefix(1);
  Decimal decimal;
  double end = 0.0;
  if (const Fault fault = number(strip(text), style, decimal, end); fault != Fault::none)
    return failed(fault);
  Scan scan;
  scan.printed.relation = Relation::bounded;
  scan.printed.decimals = decimal.decimals;
  (below ? scan.printed.high : scan.printed.low) = end;
  scan.percent = decimal.percent;
  return scan;
}

// `2.1..2.4`. When the lower end is printed without a zero before its mark, so is the upper end, and the
// second point of the `..` may be its own: `.01..05` is from .01 to .05.
Scan range(std::string_view text, std::size_t dots, const NumberStyle& style) {
  const char mark = style.decimal_comma ? ',' : '.';
  const std::string_view left = strip(text.substr(0, dots));
  std::string right(strip(text.substr(dots + 2)));
  const bool bare = !left.empty() && left.front() == mark;
  if (bare && !right.empty() && is_digit(right.front()) && right.find(mark) == std::string::npos) {
    right.insert(right.begin(), mark);
  }
  Decimal low, high;
  Scan scan;
  Printed& printed = scan.printed;
  if (const Fault fault = number(left, style, low, printed.low); fault != Fault::none) return failed(fault);
  if (const Fault fault = number(right, style, high, printed.high); fault != Fault::none)
    return failed(fault);
  if (!(printed.low < printed.high)) return failed(Fault::turned_round);
  printed.relation = Relation::bounded;
  printed.decimals = std::max(low.decimals, high.decimals);
  scan.percent = low.percent || high.percent;
  if (low.percent != high.percent) return failed(Fault::not_a_number);
  return scan;
}

std::size_t trailing_digits(std::string_view text) {
  std::size_t count = 0;
  while (count < text.size() && is_digit(text[text.size() - 1 - count])) ++count;
  return count;
}

// `1,234` may be either; with other than three digits behind it, more than three or a lone 0 before
// it, a comma is a decimal mark.
Mark mark_of_comma(std::string_view before, std::string_view after) {
  const std::size_t behind = leading_digits(after);
  const std::size_t ahead = trailing_digits(before);
  if (behind == 0) return Mark::silent;
  const bool could_group = behind == 3 && ahead >= 1 && ahead <= 3 && before[before.size() - ahead] != '0';
  return could_group ? Mark::either : Mark::comma;
}

constexpr const char* accepted =
    "Accepted are 2.10, .05, −1.2, 1 234, 2.1e-3, and 12% for a p value; bounds like <.05, >.10, <1, "
    "2.1..2.4 and ns; =2.1! for an exact value; and an empty cell when nothing is printed.";

}  // namespace

Scan scan_printed(std::string_view text, const NumberStyle& style) {
  const Plain ascii = plain(trim(text));
  if (!ascii.fits) return failed(Fault::not_a_number);
  const std::string_view all = ascii.view();
  if (all.empty()) return {};
  if (is_ns(all)) {
    Scan scan;
    scan.printed.relation = Relation::not_significant;
    return scan;
  }
  if (all.front() == '=') {
    if (all.back() != '!') return failed(Fault::not_closed);
    return plain_number(strip(all.substr(1, all.size() - 2)), style, Relation::exact);
  }
  if (all.front() == '<' || all.front() == '>') return bound(all, style);
  const std::size_t dots = all.find("..");
  if (dots != std::string_view::npos) return range(all, dots, style);
  return plain_number(all, style, Relation::rounded);
}

Diagnostic describe(Fault fault, std::string_view text, const Place& where) {
  const auto error = [&](const char* code, std::string what, std::string remedy) {
    return Diagnostic{Severity::error, code, where, std::move(what), std::move(remedy)};
  };
  const std::string cell = quoted(trim(text));
  switch (fault) {
    case Fault::not_finite:
      return error("not-finite", fmt::format("{} is not a number that a paper prints.", cell),
                   "Leave the cell empty when nothing is printed.");
    case Fault::out_of_range:
      return error("number-out-of-range",
                   fmt::format("{} is too large or too close to 0 to compute with.", cell),
                   "Check its exponent.");
    case Fault::comma:
      return error(
          "decimal-comma", fmt::format("{} has a comma, but the decimal mark is the point here.", cell),
          "Write it with a point; thousands are written with a blank or with nothing: 1 234 or 1234.");
    case Fault::point:
      return error("decimal-point",
                   fmt::format("{} has a point, but the decimal mark is the comma here.", cell),
                   "Use one decimal mark in the whole file; thousands are written with a blank or with "
                   "nothing: 1 234 or 1234.");
    case Fault::turned_round:
      return error("range-turned-round",
                   fmt::format("{} does not run from a lower to a higher number.", cell),
                   "Write the lower end first, as in 2.1..2.4.");
    case Fault::not_closed:
      return error("exact-not-closed",
                   fmt::format("{} begins like an exact value but does not end with \"!\".", cell),
                   "Write =2.1! for exactly 2.1, or 2.1 for a rounded number.");
    case Fault::none:
    case Fault::not_a_number:
      break;
  }
  return error("not-a-number", fmt::format("{} is not a number.", cell), accepted);
}

Mark decimal_mark(std::string_view text) {
  if (text.find_first_of(",.") == std::string_view::npos) return Mark::silent;
  const Plain ascii = plain(trim(text));
  const std::string_view all = ascii.view();
  Mark mark = Mark::silent;
  for (std::size_t i = 0; i < all.size(); ++i) {
    if (all[i] == ',') {
      const Mark comma = mark_of_comma(all.substr(0, i), all.substr(i + 1));
      if (comma == Mark::comma) return comma;
      if (comma == Mark::either && mark == Mark::silent) mark = comma;
    } else if (all[i] == '.' && (i == 0 || all[i - 1] != '.') && leading_digits(all.substr(i + 1)) > 0) {
      mark = Mark::point;
    }
  }
  return mark;
}

Diagnostic describe_ambiguous(std::string_view text, const Place& where) {
  const std::string_view number = trim(text);
  return {Severity::error, "ambiguous-comma", where,
          fmt::format(
              "{} can be read with a decimal comma or with a comma between thousands, and no other number "
              "of this file tells which.",
              quoted(number)),
          "Write it with a decimal point, or without the comma."};
}

}  // namespace steelyard::read

namespace steelyard {

Outcome<Printed> parse_printed(std::string_view text, const NumberStyle& style, const Place& where) {
  const read::Scan scan = read::scan_printed(text, style);
  if (scan.fault == read::Fault::none) return {scan.printed, {}};
  return {std::nullopt, {read::describe(scan.fault, text, where)}};
}

}  // namespace steelyard
