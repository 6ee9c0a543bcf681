// The grammar of one printed number: every form, every refusal word for word, and round trips.
#include <catch2/catch.hpp>

#include <cmath>
#include <cstdio>
#include <limits>
#include <random>
#include <string>

#include "steelyard/read.hpp"

using namespace steelyard;

namespace {

constexpr double inf = std::numeric_limits<double>::infinity();
constexpr NumberStyle point{false};
constexpr NumberStyle comma{true};

Printed must_parse(const std::string& text, const NumberStyle& style = point) {
  const Outcome<Printed> outcome = parse_printed(text, style, {"f", 2, 5});
  INFO(text);
  REQUIRE(outcome.diagnostics.empty());
  REQUIRE(outcome.ok());
  return *outcome.value;
}

struct Rounded {
  const char* text;
  double value;
  double low;
  double high;
  int decimals;
};

void check_rounded(const Rounded& c, const NumberStyle& style) {
  INFO(c.text);
  const Printed printed = must_parse(c.text, style);
  CHECK(printed.relation == Relation::rounded);
  // The ends are the doubles nearest to the decimal ends, so `==` it is.
  CHECK(printed.value == c.value);
  CHECK(printed.low == c.low);
  CHECK(printed.high == c.high);
  CHECK(printed.decimals == c.decimals);
  CHECK(printed.has_value());
  CHECK_FALSE(printed.is_bound());
}

}  // namespace

TEST_CASE("rounded numbers carry their band") {
  const Rounded cases[] = {
      {"2.10", 2.10, 2.095, 2.105, 2},
      {"2.1", 2.1, 2.05, 2.15, 1},
      {"2", 2.0, 1.5, 2.5, 0},
      {".05", .05, .045, .055, 2},
      {"0.05", .05, .045, .055, 2},
      {"-1.2", -1.2, -1.25, -1.15, 1},
      {"−1.2", -1.2, -1.25, -1.15, 1},  // U+2212
      {"–1.2", -1.2, -1.25, -1.15, 1},  // en dash
      {"‐1.2", -1.2, -1.25, -1.15, 1},  // hyphen
      {"- 1.2", -1.2, -1.25, -1.15, 1},
      {"+1.2", 1.2, 1.15, 1.25, 1},
      {"2.1e-3", 2.1e-3, 2.05e-3, 2.15e-3, 4},
      {"2.1E-3", 2.1e-3, 2.05e-3, 2.15e-3, 4},
      {"2.1e3", 2100, 2050, 2150, -2},
      {"2e+2", 200, 150, 250, -2},
      {"1 234", 1234, 1233.5, 1234.5, 0},
      {"1 234 567.8", 1234567.8, 1234567.75, 1234567.85, 1},
      {"1\u202F234", 1234, 1233.5, 1234.5, 0},  // narrow no-break space
      {"1\u2009234", 1234, 1233.5, 1234.5, 0},  // thin space
      {"1\u00A0234", 1234, 1233.5, 1234.5, 0},  // no-break space
      {"12%", .12, .115, .125, 2},
      {"12 %", .12, .115, .125, 2},
      {"3.6%", .036, .0355, .0365, 3},
      {"  2.10\u00A0", 2.10, 2.095, 2.105, 2},
      {"0", 0.0, -.5, .5, 0},
      {".000", 0.0, -.0005, .0005, 3},
      {"-0.0", -0.0, -.05, .05, 1},
      {"007", 7, 6.5, 7.5, 0},
      {"123456789012345678901234567890", 1.2345678901234568e29, 1.2345678901234568e29, 1.2345678901234568e29,
       0},
  };
  for (const Rounded& c : cases) check_rounded(c, point);
}

TEST_CASE("a decimal comma where the file has it") {
  check_rounded({"1,5", 1.5, 1.45, 1.55, 1}, comma);
  check_rounded({",05", .05, .045, .055, 2}, comma);
  check_rounded({"1,234", 1.234, 1.2335, 1.2345, 3}, comma);
  check_rounded({"1 234,5", 1234.5, 1234.45, 1234.55, 1}, comma);
  check_rounded({"2,1e-3", 2.1e-3, 2.05e-3, 2.15e-3, 4}, comma);
  CHECK(must_parse("<,05", comma).high == .05);
  CHECK(must_parse(",01..,05", comma).low == .01);
  CHECK(must_parse("0,01..0,05", comma).high == .05);
  CHECK(must_parse("=2,1!", comma).value == 2.1);
}

TEST_CASE("bounds have ends and no value") {
  struct Case {
    const char* text;
    double low;
    double high;
  };
  const Case cases[] = {
      {"<.05", -inf, .05},        {"< .05", -inf, .05},   {"<=.05", -inf, .05},   {"≤.05", -inf, .05},
      {"≤ 0.05", -inf, .05},      {"⩽.05", -inf, .05},    {">.10", .10, inf},     {">=.10", .10, inf},
      {"≥.10", .10, inf},         {"<1", -inf, 1},        {"<-1", -inf, -1},      {"> −1.5", -1.5, inf},
      {".01..05", .01, .05},      {".01..10", .01, .10},  {".01...05", .01, .05}, {".01 .. .05", .01, .05},
      {"0.01..0.05", .01, .05},   {"2.1..2.4", 2.1, 2.4}, {"2.1…2.4", 2.1, 2.4},  {"2..3", 2, 3},
      {"-2.4..-2.1", -2.4, -2.1}, {"−0.5..0.5", -.5, .5}, {"<5%", -inf, .05},     {"1%..5%", .01, .05},
  };
  for (const Case& c : cases) {
    INFO(c.text);
    const Printed printed = must_parse(c.text);
    CHECK(printed.relation == Relation::bounded);
    CHECK(printed.low == c.low);
    CHECK(printed.high == c.high);
    CHECK(std::isnan(printed.value));
    CHECK(printed.is_bound());
    CHECK_FALSE(printed.has_value());
  }
}

TEST_CASE("ns is a bound without ends") {
  for (const char* text : {"ns", "NS", "n.s.", "N.S.", "n.s", "n. s."}) {
    INFO(text);
    const Printed printed = must_parse(text);
    CHECK(printed.relation == Relation::not_significant);
    CHECK(printed.low == -inf);
    CHECK(printed.high == inf);
    CHECK(printed.is_bound());
  }
}

TEST_CASE("an exact value has no band") {
  for (const char* text : {"=2.1!", "= 2.1 !"}) {
    const Printed printed = must_parse(text);
    CHECK(printed.relation == Relation::exact);
    CHECK(printed.value == 2.1);
    CHECK(printed.low == 2.1);
    CHECK(printed.high == 2.1);
  }
}

TEST_CASE("blank text is no number and no mistake") {
  CHECK_FALSE(must_parse("").present());
  CHECK_FALSE(must_parse("  \u00A0").present());
}

TEST_CASE("anything else is refused, word for word") {
  const std::string accepted =
      "Accepted are 2.10, .05, −1.2, 1 234, 2.1e-3, and 12% for a p value; bounds like <.05, >.10, <1, "
      "2.1..2.4 and ns; =2.1! for an exact value; and an empty cell when nothing is printed. [not-a-number]";
  const std::string two_marks =
      " has a point, but the decimal mark is the comma here. Use one decimal mark in the whole file; "
      "thousands "
      "are written with a blank or with nothing: 1 234 or 1234. [decimal-point]";
  const std::string comma_here =
      " has a comma, but the decimal mark is the point here. Write it with a point; thousands are written "
      "with a "
      "blank or with nothing: 1 234 or 1234. [decimal-comma]";
  const auto plain = [&](const char* cell) { return std::string(cell) + " is not a number. " + accepted; };
  struct Case {
    std::string text;
    NumberStyle style;
    std::string message;
  };
  const Case cases[] = {
      {"abc", point, plain("\"abc\"")},
      {"NA", point, plain("\"NA\"")},
      {"-", point, plain("\"-\"")},
      {".", point, plain("\".\"")},
      {"2.", point, plain("\"2.\"")},
      {"1.2.3", point, plain("\"1.2.3\"")},
      {"2.1x", point, plain("\"2.1x\"")},
      {"p<.05", point, plain("\"p<.05\"")},
      {"<", point, plain("\"<\"")},
      {"<<1", point, plain("\"<<1\"")},
      {"1 23", point, plain("\"1 23\"")},
      {"1234 567", point, plain("\"1234 567\"")},
      {"1 2345", point, plain("\"1 2345\"")},
      {"5%%", point, plain("\"5%%\"")},
      {"1%..5", point, plain("\"1%..5\"")},
      {"1e", point, plain("\"1e\"")},
      {"1e999999", point, plain("\"1e999999\"")},
      {"0x10", point, plain("\"0x10\"")},
      {"1.234,5", comma, plain("\"1.234,5\"")},
      {"½", point, plain("\"½\"")},
      {std::string("1\x1B[31m"), point, plain("\"1?[31m\"")},
      {std::string(300, '1'), point, plain(("\"" + std::string(60, '1') + "…\"").c_str())},
      {"NaN", point,
       "\"NaN\" is not a number that a paper prints. Leave the cell empty when nothing is printed. "
       "[not-finite]"},
      {"-inf", point,
       "\"-inf\" is not a number that a paper prints. Leave the cell empty when nothing is printed. "
       "[not-finite]"},
      {"Infinity", point,
       "\"Infinity\" is not a number that a paper prints. Leave the cell empty when nothing is "
       "printed. [not-finite]"},
      {"1e400", point,
       "\"1e400\" is too large or too close to 0 to compute with. Check its exponent. "
       "[number-out-of-range]"},
      {"1e-400", point,
       "\"1e-400\" is too large or too close to 0 to compute with. Check its exponent. "
       "[number-out-of-range]"},
      {"0e99999", point,
       "\"0e99999\" is too large or too close to 0 to compute with. Check its exponent. "
       "[number-out-of-range]"},
      {"1,5", point, "\"1,5\"" + comma_here},
      {"<,05", point, "\"<,05\"" + comma_here},
      {"1.5", comma, "\"1.5\"" + two_marks},
      {".05...01", point,
       "\".05...01\" does not run from a lower to a higher number. Write the lower end first, as "
       "in 2.1..2.4. [range-turned-round]"},
      {"2..2", point,
       "\"2..2\" does not run from a lower to a higher number. Write the lower end first, as in "
       "2.1..2.4. [range-turned-round]"},
      {"=2.1", point,
       "\"=2.1\" begins like an exact value but does not end with \"!\". Write =2.1! for exactly 2.1, "
       "or 2.1 for a rounded number. [exact-not-closed]"},
      {"=", point,
       "\"=\" begins like an exact value but does not end with \"!\". Write =2.1! for exactly 2.1, or 2.1 "
       "for a rounded number. [exact-not-closed]"},
      {"=!", point, plain("\"=!\"")},
  };
  for (const Case& c : cases) {
    INFO(c.text);
    const Outcome<Printed> outcome = parse_printed(c.text, c.style, {"f.csv", 2, 5});
    CHECK_FALSE(outcome.ok());
    REQUIRE(outcome.diagnostics.size() == 1);
    CHECK(to_text(outcome.diagnostics[0]) == "f.csv:2:5: error: " + c.message);
  }
}

TEST_CASE("printed digits come back: property") {
  std::mt19937_64 random(7);
  for (int i = 0; i < 20'000; ++i) {
    const int decimals = static_cast<int>(random() % 6);
    const long long digits = static_cast<long long>(random() % 1'000'000'000ULL) - 500'000'000LL;
    const bool negative = digits < 0;
    std::string text = std::to_string(negative ? -digits : digits);
    while (static_cast<int>(text.size()) <= decimals) text.insert(0, 1, '0');
    if (decimals > 0) text.insert(text.size() - static_cast<std::size_t>(decimals), 1, '.');
    if (negative) text.insert(0, 1, '-');
    INFO(text);
    const Printed printed = must_parse(text);
    const long double scale = std::pow(10.0L, decimals);
    const auto near = [&](double x, long double truth) {
      return std::fabs(x - static_cast<double>(truth)) <= 2e-16 * std::fabs(x);
    };
    CHECK(near(printed.value, static_cast<long double>(digits) / scale));
    CHECK(near(printed.low, (static_cast<long double>(digits) - 0.5L) / scale));
    CHECK(near(printed.high, (static_cast<long double>(digits) + 0.5L) / scale));
    CHECK(printed.low < printed.value);
    CHECK(printed.value < printed.high);
    CHECK(printed.decimals == decimals);
    if (decimals > 0) {
      std::string with_comma = text;
      with_comma[with_comma.find('.')] = ',';
      CHECK(must_parse(with_comma, comma).value == printed.value);
    }
  }
}
