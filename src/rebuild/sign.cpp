#include "rebuild/sign.hpp"

#include <fmt/format.h>

#include <cmath>

namespace steelyard::rebuilding {

namespace {

// The sign of a printed number whose whole rounding band lies on one side of zero.
int clear_sign(const Printed& low_side, const Printed& high_side = Printed{}) {
  if (!low_side.has_value()) return 0;
  if (!high_side.has_value()) return low_side.low > 0.0 ? 1 : low_side.high < 0.0 ? -1 : 0;
  return low_side.low > high_side.high ? 1 : low_side.high < high_side.low ? -1 : 0;
}

int sign_word(std::string_view text) {
  if (text == "+" || text == "positive") return 1;
  if (text == "-" || text == "\u2212" || text == "negative") return -1;
  return 0;
}

}  // namespace

bool one_tailed(const Numbers& x) { return x.facts().text(Col::tails) == "1"; }

bool reversed(const Numbers& x) {
  const std::string word = x.facts().word(Col::reverse);
  return word == "yes" || word == "1" || word == "true";
}

int stated_sign(Numbers& x) {
  if (const int sign = sign_word(x.facts().text(Col::sign)); sign != 0) {
    x.mark(Col::sign);
    return sign;
  }
  const std::string_view favours = x.facts().text(Col::favours);
  if (favours != "1" && favours != "2") return 0;
  x.mark(Col::favours);
  // `favours` names the better group; with lower-is-better outcomes that is the smaller mean.
  return (favours == "1") == reversed(x) ? -1 : 1;
}

int sign_of(Numbers& x) {
  if (const int stated = stated_sign(x); stated != 0) return stated;
  if (x.has_all({Col::mean1, Col::mean2}) && !x.present(Col::compare)) {
    const int sign = clear_sign(x.printed(Col::mean1), x.printed(Col::mean2));
    if (sign == 0) return 0;
    x.mark(Col::mean1);
    x.mark(Col::mean2);
    return sign;
  }
  for (const Col col : {Col::mean_diff, Col::t, Col::d, Col::g, Col::r, Col::estimate}) {
    if (const int sign = clear_sign(x.printed(col)); sign != 0) {
      x.mark(col);
      return sign;
    }
  }
  return 0;
}

std::optional<double> with_sign(Numbers& x, Col col) {
  const double value = x[col];
  if (one_tailed(x)) return value;
  const int sign = stated_sign(x);
  const double printed = x.printed(col).value;
  if (sign == 0 || printed == 0.0 || (printed > 0.0) == (sign > 0)) return value;
  if (printed < 0.0) {
    x.refuse(col, "sign-contradicts",
             fmt::format("{} is printed as {} but the row's direction is positive.", name(col),
                         x.facts().text(col)),
             "Correct the one that is wrong; `sign` is the sign of group 1 minus group 2.");
    return std::nullopt;
  }
  x.caution(col, "sign-applied",
            fmt::format("{} is printed as {} and the row's direction is negative: it was taken as −{}.",
                        name(col), x.facts().text(col), x.facts().text(col)),
            "Leave `sign` empty if the printed number already carries its sign.");
  return -value;
}

}  // namespace steelyard::rebuilding
