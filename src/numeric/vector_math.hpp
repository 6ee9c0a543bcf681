// Logarithms written without branches or calls, so that a loop over them becomes vector code with the
// same bits on every instruction set: only IEEE additions, multiplications, divisions and bit moves.
#pragma once

#include <bit>
#include <cmath>
#include <cstdint>

namespace steelyard::numeric {

/// A positive normal number as 2^exponent · mantissa with mantissa in [√½, √2).
struct Split {
  double exponent;
  double mantissa;
};

[[gnu::always_inline]] inline Split split(double x) {
  constexpr std::uint64_t root_half = 0x3fe6a09e667f3bcdULL;  // bits of √½
  constexpr std::uint64_t bias = 0x3ff0000000000000ULL - root_half;
  const std::uint64_t shifted = std::bit_cast<std::uint64_t>(x) + bias;
  // The exponent field becomes a double through the mantissa of 2^52: no integer conversion needed.
  const double exponent = std::bit_cast<double>((shifted >> 52) | 0x4330000000000000ULL) - 4503599627371519.0;
  const double mantissa = std::bit_cast<double>((shifted & 0x000fffffffffffffULL) + root_half);
  return {exponent, mantissa};
}

inline constexpr double ln2_high = 6.93147180369123816490e-01;  ///< trailing zeros: e·ln2_high is exact
inline constexpr double ln2_low = 1.90821492927058770002e-10;

/// 2·(q³/3 + q⁵/5 + …)/q³ as a polynomial in q², |q| ≤ 3 − 2√2 (minimax-free: the plain series, whose
/// first left-out term is below 1e-17).
[[gnu::always_inline]] inline double atanh_tail(double q2) {
  double p = 2.0 / 23;
  p = p * q2 + 2.0 / 21;
  p = p * q2 + 2.0 / 19;
  p = p * q2 + 2.0 / 17;
  p = p * q2 + 2.0 / 15;
  p = p * q2 + 2.0 / 13;
  p = p * q2 + 2.0 / 11;
  p = p * q2 + 2.0 / 9;
  p = p * q2 + 2.0 / 7;
  p = p * q2 + 2.0 / 5;
  return p * q2 + 2.0 / 3;
}

/// log x for positive normal x; error about 1 ulp.
[[gnu::always_inline]] inline double vector_log(double x) {
  const Split parts = split(x);
  const double f = parts.mantissa - 1.0;
  const double q = f / (2.0 + f);
  const double q2 = q * q;
  // log1p(f) = 2q + q³·P = f − f·q + q³·P: the first term is exact.
  const double small = q * (q2 * atanh_tail(q2) - f) + parts.exponent * ln2_low;
  return parts.exponent * ln2_high + (f + small);
}

/// log(1 + d) and log(1 + d) − d, the second with full relative accuracy near d = 0.
struct LogPair {
  double log;
  double log_minus;
};

/// `z` = 1 + d as computed from d's own source (so that d ≈ −1 keeps its relative accuracy).
[[gnu::always_inline]] inline LogPair vector_log_minus(double z, double d) {
  const Split parts = split(z);
  // Near one d itself is the exact small part; elsewhere the mantissa is.
  const bool near_one = parts.exponent == 0.0;
  const double f = near_one ? d : parts.mantissa - 1.0;
  const double q = f / (2.0 + f);
  const double q2 = q * q;
  const double curved = q * (q2 * atanh_tail(q2) - f);  // log1p(f) − f
  const double shift = parts.exponent * ln2_high;
  const double low = parts.exponent * ln2_low;
  const double log = shift + (f + (curved + low));
  return {log, near_one ? curved : log - d};
}

/// exp x; 0 below −708, no overflow guard (callers subtract a maximum first: x ≤ 700). Error about 1 ulp.
[[gnu::always_inline]] inline double vector_exp(double x) {
  constexpr double round_to_integer = 6755399441055744.0;  // 1.5·2^52
  const double scaled = x * 1.4426950408889634074 + round_to_integer;
  const double k = scaled - round_to_integer;
  const double r = (x - k * ln2_high) - k * ln2_low;
  // Taylor to r^13, |r| ≤ ½ ln 2: the first left-out term is below 5e-18.
  double p = 1.0 / 6227020800.0;
  p = p * r + 1.0 / 479001600.0;
  p = p * r + 1.0 / 39916800.0;
  p = p * r + 1.0 / 3628800.0;
  p = p * r + 1.0 / 362880.0;
  p = p * r + 1.0 / 40320.0;
  p = p * r + 1.0 / 5040.0;
  p = p * r + 1.0 / 720.0;
  p = p * r + 1.0 / 120.0;
  p = p * r + 1.0 / 24.0;
  p = p * r + 1.0 / 6.0;
  p = p * r + 0.5;
  const double mantissa = 1.0 + (r + r * r * p);
  // The integer k sits in the low bits of `scaled`; shifting it into the exponent field gives 2^k.
  const std::uint64_t power = (std::bit_cast<std::uint64_t>(scaled) + 1023U) << 52;
  const double value = mantissa * std::bit_cast<double>(power);
  return x < -708.0 ? 0.0 : value;
}

}  // namespace steelyard::numeric
