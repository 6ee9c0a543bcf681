#include <algorithm>
#include <string>

#include <catch2/catch.hpp>

#include "render/svg/measure.hpp"

using namespace steelyard::render::svg;

TEST_CASE("widths are those of the font", "[measure]") {
  // DejaVu Sans 2.37: 2048 units to the em; digits 1303, `i` 569, `W` 2025 units (hmtx, read by
  // glyph_widths.py).
  CHECK(text_width("0", 1000) == Approx(1303 * 1000.0 / 2048).margin(1));
  CHECK(text_width("i", 1000) == Approx(569 * 1000.0 / 2048).margin(1));
  CHECK(text_width("W", 1000) == Approx(2025 * 1000.0 / 2048).margin(1));
  CHECK(text_width("漢字", 10) == Approx(20));
  CHECK(text_width("e\xCC\x81\xCC\x82", 10) == text_width("e", 10));
}

TEST_CASE("what is cut fits and keeps the whole in its title", "[measure]") {
  const std::string label = "A label that is far too long for its column";
  const Fitted cut = fit(label, 10, 80);
  CHECK(text_width(cut.shown, 10) <= 80);
  CHECK(cut.full == label);
  CHECK(fit("short", 10, 80).full.empty());
  CHECK(fit("e\xCC\x81"
            "e\xCC\x81"
            "e\xCC\x81",
            10, 2 * text_width("e", 10))
            .shown.find("\xCC\x81\xE2\x80\xA6") != 1);
}

TEST_CASE("wrapped lines fit and lose nothing", "[measure]") {
  const std::string text =
      "some words of a sentence that is longer than one line, with averyveryverylongwordinsideit";
  std::string joined;
  for (const std::string& line : wrap(text, 10, 100)) {
    CHECK(text_width(line, 10) <= 100);
    joined += line;
  }
  std::string without = text;
  for (auto* s : {&joined, &without}) s->erase(std::remove(s->begin(), s->end(), ' '), s->end());
  CHECK(joined == without);
}
