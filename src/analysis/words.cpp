// Evidence in words: ratios, odds and decibans as people read them.
#include <cmath>
#include <string>

#include <fmt/format.h>

#include "steelyard/analysis.hpp"

namespace steelyard {
namespace {

constexpr double log_ten = 2.30258509299404568402;

std::string superscript(long long exponent) {
  static constexpr const char* digits[] = {"⁰", "¹", "²", "³", "⁴", "⁵", "⁶", "⁷", "⁸", "⁹"};
  std::string out = exponent < 0 ? "⁻" : "";
  for (const char c : fmt::format("{}", std::llabs(exponent))) out += digits[c - '0'];
  return out;
}

/// 1234567 as "1,234,567".
std::string grouped(long long value) {
  std::string digits = fmt::format("{}", value);
  for (std::size_t at = digits.size(); at > 3; at -= 3) digits.insert(at - 3, ",");
  return digits;
}

std::string power_of_ten(double log10_value) {
  auto exponent = std::floor(log10_value);
  double mantissa = std::pow(10.0, log10_value - exponent);
  if (mantissa >= 9.995) {
    mantissa = 1.0;
    exponent += 1.0;
  }
  return fmt::format("{:.2f}×10{}", mantissa, superscript(static_cast<long long>(exponent)));
}

}  // namespace

double decibans(double log_bf) { return 10.0 * log_bf / log_ten; }

std::string decibans_text(double log_bf) {
  const double value = decibans(log_bf);
  const double size = std::fabs(value);
  const std::string digits =
      size >= 999.95 ? (size < 1e15 ? grouped(std::llround(size)) : power_of_ten(std::log10(size)))
                     : fmt::format("{:.1f}", size);
  if (digits == "0.0") return digits;
  return (value < 0 ? "−" : "+") + digits;
}

std::string ratio_text(double log_ratio) {
  const double log10_value = log_ratio / log_ten;
  if (log10_value < -3.0 || log10_value >= 6.0) return power_of_ten(log10_value);
  const double value = std::exp(log_ratio);
  // Three figures; the digits after the point follow from the size after rounding.
  int decimals = 2 - static_cast<int>(std::floor(log10_value));
  if (std::round(value * std::pow(10.0, decimals)) >= 1000.0) --decimals;
  if (decimals > 0) return fmt::format("{:.{}f}", value, decimals);
  const double step = std::pow(10.0, -decimals);
  return grouped(std::llround(value / step) * std::llround(step));
}

std::string odds_text(double log_odds) {
  const double size = std::fabs(log_odds);
  const double whole = std::round(std::exp(std::fmin(size, 7.0)));
  const bool is_whole = size < 6.9 && std::fabs(size - std::log(whole)) < 1e-9;
  const std::string number = is_whole ? fmt::format("{:.0f}", whole) : ratio_text(size);
  if (log_odds >= 0 || number == "1") return number + " to 1";
  return "1 to " + number;
}

std::string effect_phrase(Direction direction) {
  switch (direction) {
    case Direction::greater:
      return "a positive effect";
    case Direction::less:
      return "a negative effect";
    case Direction::either:
      break;
  }
  return "an effect";
}

}  // namespace steelyard
