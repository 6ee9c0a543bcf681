#include <algorithm>
#include <sstream>
#include <string>

#include <catch2/catch.hpp>

#include "figure/made_up.hpp"
#include "render/unicode.hpp"
#include "steelyard/render.hpp"

using namespace steelyard;
using namespace steelyard::render;

namespace {

std::size_t widest_line(const std::string& text) {
  std::istringstream lines(text);
  std::size_t out = 0;
  for (std::string line; std::getline(lines, line);) out = std::max(out, cell_width(decode(line)));
  return out;
}

}  // namespace

TEST_CASE("text fits the terminal", "[text]") {
  for (const std::size_t width : {60U, 80U, 100U, 140U, 250U}) {
    for (const std::size_t count : {1U, 2U, 12U, 300U}) {
      for (const bool utf8 : {true, false}) {
        INFO(width << " columns, " << count << " studies");
        CHECK(widest_line(render_text(made_up::analysis(count), {width, utf8, false})) <= width);
      }
    }
  }
  const std::string wide_label(120, 'W');
  CHECK(widest_line(render_text(made_up::analysis(12, 0.4, 1.0, wide_label), {80, true, false})) <= 80);
  CHECK(widest_line(render_text(made_up::analysis(12, 0.4, 1000.0), {80, true, false})) <= 80);
}

TEST_CASE("a terminal without UTF-8 gets ASCII", "[text]") {
  const std::string out = render_text(
      made_up::analysis(12, 0.4, 1.0, "M\xC3\xBCller \xE2\x80\x93 \xE6\xBC\xA2"), {80, false, false});
  for (const char c : out) REQUIRE((c == '\n' || (c >= 0x20 && c < 0x7F)));
  CHECK(out.find("Muller - ?") != std::string::npos);
  CHECK(out.find("10^") != std::string::npos);
}

TEST_CASE("no control character of a label reaches the terminal", "[text]") {
  const std::string out = render_text(made_up::analysis(3, 0.4, 1.0,
                                                        "a\x1B[2Jb\x07\r\xC2\x9B"
                                                        "31m\xE2\x80\xAE"),
                                      {80, true, false});
  for (const char32_t c : decode(out)) {
    REQUIRE((c == U'\n' || c >= 0x20));
    REQUIRE_FALSE((c >= 0x7F && c < 0xA0));
    REQUIRE(c != 0x202E);
  }
  CHECK(out.find("\xE2\x90\x9B") != std::string::npos);
}

TEST_CASE("colour is only added around the same text", "[text]") {
  const std::string plain = render_text(made_up::analysis(5), {80, true, false});
  std::string coloured = render_text(made_up::analysis(5), {80, true, true});
  CHECK(coloured.find("\x1B[") != std::string::npos);
  for (auto at = coloured.find('\x1B'); at != std::string::npos; at = coloured.find('\x1B'))
    coloured.erase(at, coloured.find('m', at) - at + 1);
  std::istringstream a(plain), b(coloured);
  for (std::string x, y; std::getline(a, x) && std::getline(b, y);) {
    y.erase(y.find_last_not_of(' ') + 1);
    x.erase(x.find_last_not_of(' ') + 1);
    CHECK(x == y);
  }
}

TEST_CASE("the answer comes first, the caution last", "[text]") {
  const std::string out = render_text(made_up::analysis(5), {100, true, false});
  CHECK(out.find("Is there an effect? The data favour") < out.find("Likelihood"));
  CHECK(out.find("Does it vary?") < out.find("Likelihood"));
  CHECK(out.find("licensed practice.") > out.find("Estimates"));
  CHECK(out.back() == '\n');
}

TEST_CASE("many studies: an excerpt, and it says so", "[text]") {
  const std::string out = render_text(made_up::analysis(300), {80, true, false});
  CHECK(out.find("Shown: the 40 studies whose evidence weighs most, of 300") != std::string::npos);
  CHECK(out.find("300 studies pooled") != std::string::npos);
}

TEST_CASE("what does not exist has its reason", "[text]") {
  const std::string out = render_text(made_up::analysis(1), {80, true, false});
  CHECK(out.find("nan") == std::string::npos);
  CHECK(out.find("not identified") != std::string::npos);
  Analysis analysis = made_up::analysis(4);
  analysis.result.spread.sd.reset();
  analysis.result.spread.reason = "The prior's tail leaves no finite variance.";
  CHECK(render_text(analysis, {120, true, false}).find("The prior's tail leaves no finite variance.") !=
        std::string::npos);
}

TEST_CASE("UTF-8 is read strictly", "[unicode]") {
  CHECK(decode("a\xC3\xA4") == U"aä");
  CHECK(decode("\xC0\x80") == U"\xFFFD\xFFFD");            // overlong
  CHECK(decode("\xED\xA0\x80") == U"\xFFFD\xFFFD\xFFFD");  // a surrogate
  CHECK(decode("\xF0\x9F\x98\x80") == U"\U0001F600");
  CHECK(encode(U"aä漢\U0001F600") == "a\xC3\xA4\xE6\xBC\xA2\xF0\x9F\x98\x80");
  CHECK(cell_width(U"e\x0301漢") == 3);
}
