// What is told about a text that is not a printed number, and what its commas say.
#include <fmt/format.h>

#include "read/decimal.hpp"
#include "read/printed.hpp"
#include "read/text.hpp"

namespace steelyard::read {

namespace {

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
