// Scales, round ticks and the numbers that stand at them.
#include <algorithm>
#include <cmath>
#include <cstddef>
#include <string>
#include <vector>

#include <fmt/format.h>

#include "steelyard/figure.hpp"

namespace steelyard::figure {
namespace {

std::string with_minus(std::string text) {
  return !text.empty() && text.front() == '-' ? "−" + text.substr(1) : text;
}

std::string scientific(double value) {
  const auto exponent = static_cast<int>(std::floor(std::log10(std::fabs(value))));
  return with_minus(fmt::format("{:.2f}e{}", value / std::pow(10.0, exponent), exponent));
}

/// 1, 2 or 5 times a power of ten: the largest such number that is not above `value`.
double round_down(double value) {
  const double power = std::pow(10.0, std::floor(std::log10(value)));
  for (const double factor : {5.0, 2.0})
    if (factor * power <= value) return factor * power;
  return power;
}

std::vector<Tick> linear_ticks(const Scale& scale, std::size_t at_most) {
  double step = round_down((scale.high - scale.low) / static_cast<double>(at_most + 1));
  const auto first = [&] { return std::ceil(scale.low / step - 1e-9); };
  const auto last = [&] { return std::floor(scale.high / step + 1e-9); };
  while (last() - first() + 1 > static_cast<double>(at_most)) step = round_down(step * 2.51);
  const int decimals = std::clamp(static_cast<int>(-std::floor(std::log10(step) + 1e-9)), 0, 12);
  std::vector<Tick> out;
  for (double k = first(); k <= last(); k += 1.0) out.push_back({k * step, number_text(k * step, decimals)});
  return out;
}

std::vector<Tick> log_ticks(const Scale& scale, std::size_t at_most) {
  const int first = static_cast<int>(std::floor(std::log10(scale.low)));
  const int last = static_cast<int>(std::ceil(std::log10(scale.high)));
  const auto collect = [&](std::initializer_list<double> factors, int every) {
    std::vector<Tick> out;
    for (int power = first; power <= last; ++power) {
      if (power % every != 0) continue;
      for (const double factor : factors) {
        const double value = factor * std::pow(10.0, power);
        if (value < scale.low * (1 - 1e-9) || value > scale.high * (1 + 1e-9)) continue;
        out.push_back({value, number_text(value, std::clamp(-power, 0, 12))});
      }
    }
    return out;
  };
  for (const auto& factors : {std::initializer_list<double>{1.0, 2.0, 5.0}, {1.0, 3.0}}) {
    auto out = collect(factors, 1);
    if (out.size() <= at_most) return out;
  }
  for (int every = 1;; ++every) {
    auto out = collect({1.0}, every);
    if (out.size() <= std::max<std::size_t>(at_most, 1)) return out;
  }
}

}  // namespace

double Scale::at(double value) const {
  if (logarithmic) return (std::log(value) - std::log(low)) / (std::log(high) - std::log(low));
  return (value - low) / (high - low);
}

double Scale::value_at(double fraction) const {
  if (logarithmic) return std::exp(std::log(low) + fraction * (std::log(high) - std::log(low)));
  return low + fraction * (high - low);
}

std::vector<Tick> ticks(const Scale& scale, std::size_t at_most) {
  return scale.logarithmic ? log_ticks(scale, at_most) : linear_ticks(scale, at_most);
}

int decimals_for(double width) {
  if (!(width > 0)) return 2;
  if (width >= 0.3 && width < 30) return 2;
  if (width >= 300) return 0;
  if (width >= 30) return 1;
  return std::min(2 + static_cast<int>(std::ceil(std::log10(0.3 / width))), 12);
}

std::string percent_text(double share) {
  if (share > 0 && share < 0.0005) return "<0.1%";
  if (share < 1 && share > 0.9995) return ">99.9%";
  return fmt::format("{:.1f}%", 100 * share);
}

std::string number_text(double value, int decimals) {
  if (value != 0 && std::fabs(value) >= 1e7) return scientific(value);
  const std::string text = fmt::format("{:.{}f}", value, decimals);
  const bool is_zero = text.find_first_of("123456789") == std::string::npos;
  return is_zero && text.front() == '-' ? text.substr(1) : with_minus(text);
}

}  // namespace steelyard::figure
