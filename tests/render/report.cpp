#include <string>

#include <catch2/catch.hpp>

#include "figure/made_up.hpp"
#include "render/document.hpp"
#include "render/html/assets.hpp"
#include "steelyard/render.hpp"

using namespace steelyard;

namespace {

const std::string hostile =
    "</td><script>alert(1)</script>\" onload=\"x | `code` [a](javascript:b) *c* ]]> http://example.org";

Report report(std::size_t count, const std::string& label = "") {
  const Analysis analysis = made_up::analysis(count, 0.4, 1.0, label);
  return {analysis, "steelyard report made-up.csv -o out.html", made_up::answers(analysis),
          made_up::without(analysis), made_up::grid(9, 5)};
}

std::size_t count_of(const std::string& text, const std::string& part) {
  std::size_t out = 0;
  for (auto at = text.find(part); at != std::string::npos; at = text.find(part, at + 1)) ++out;
  return out;
}

}  // namespace

TEST_CASE("the report answers first and ends with how to get it again", "[html]") {
  const std::string html = render_html(report(12));
  CHECK(html.find("Is there an effect? The data favour") < html.find("<svg"));
  CHECK(html.find("How firm? Leaving out") < html.find("<svg"));
  for (const char* needed :
       {"id=\"evidence\"", "id=\"estimates\"", "id=\"firmness\"", "id=\"studies\"", "id=\"assumptions\"",
        "id=\"methods\"", "steelyard report made-up.csv -o out.html", "licensed practice", "SHA-256 aaaa"}) {
    INFO(needed);
    CHECK(html.find(needed) != std::string::npos);
  }
  // Seven figures at two widths; every id once.
  CHECK(count_of(html, "<svg ") == 14);
  for (auto at = html.find(" id=\""); at != std::string::npos; at = html.find(" id=\"", at + 1)) {
    const std::string id = html.substr(at, html.find('"', at + 5) - at + 1);
    INFO(id);
    CHECK(count_of(html, id) == 1);
  }
}

TEST_CASE("nothing in the report comes from elsewhere or can run by itself", "[html]") {
  const std::string html = render_html(report(5, hostile));
  CHECK(count_of(html, "<script") == 1);
  CHECK(count_of(html, " style=") == 0);
  CHECK(html.find("onload=\"") == std::string::npos);
  CHECK(html.find("href=\"http") == std::string::npos);
  CHECK(html.find("src=") == std::string::npos);
  CHECK(html.find("default-src 'none'") != std::string::npos);
}

TEST_CASE("the policy names the hash of what stands in the file", "[html]") {
  // SHA-256 of "abc" (FIPS 180-4, appendix), in base64.
  CHECK(render::html::policy_hash("abc") == "'sha256-ungWv48Bz+pBQUDeXa4iI7ADYaOWF3qctBD/YfIAFa0='");
  const std::string html = render_html(report(3));
  const auto between = [&](const std::string& open, const std::string& close) {
    const auto from = html.find(open) + open.size();
    return html.substr(from, html.find(close, from) - from);
  };
  CHECK(html.find(render::html::policy_hash(between("<script>", "</script>"))) != std::string::npos);
  CHECK(html.find(render::html::policy_hash(between("<style>", "</style>"))) != std::string::npos);
}

TEST_CASE("a report without stress results says so", "[html]") {
  const std::string html = render_html({made_up::analysis(4), "", {}, {}, {}});
  CHECK(html.find("were not computed for this report") != std::string::npos);
  CHECK(html.find("id=\"slide\"") == std::string::npos);
}

TEST_CASE("a report of one study has no figure that needs two", "[html]") {
  const std::string html = render_html(report(1));
  CHECK(html.find("figure-surface") == std::string::npos);
  CHECK(html.find("can&#39;t be told from one study") != std::string::npos);
}

TEST_CASE("Markdown holds the same, and labels stay labels", "[markdown]") {
  const std::string text = render_markdown(report(4, hostile));
  CHECK(text.substr(0, 2) == "# ");
  CHECK(text.find("**Is there an effect?") != std::string::npos);
  CHECK(text.find("## Methods, ready to paste") != std::string::npos);
  CHECK(text.find("<script") == std::string::npos);
  for (auto at = text.find("]("); at != std::string::npos; at = text.find("](", at + 1))
    CHECK(text[at - 1] == '\\');
  // A pipe in a label does not make a column: all rows of the study table have as many bars.
  const auto table = text.find("| Study |");
  REQUIRE(table != std::string::npos);
  const std::string head = text.substr(table, text.find('\n', table) - table);
  const auto bars = [](const std::string& line) { return count_of(line, "|") - count_of(line, "\\|"); };
  std::size_t at = text.find('\n', table) + 1;
  for (int k = 0; k < 5; ++k) {
    const std::string line = text.substr(at, text.find('\n', at) - at);
    CHECK(bars(line) == bars(head));
    at = text.find('\n', at) + 1;
  }
}

TEST_CASE("the methods paragraph names what was really used", "[methods]") {
  Analysis analysis = made_up::analysis(4);
  auto text = render::methods(analysis);
  CHECK(text.paragraph.find("noncentral t density of the t value (4 studies)") != std::string::npos);
  CHECK(text.paragraph.find("(Gronau et al., 2017)") != std::string::npos);
  CHECK(text.paragraph.find("bound") == text.paragraph.find("bounds, without sampling"));
  analysis.studies[1].evidence = BandT{{{-2, 2}}, 30, 8};
  analysis.options.priors.spread.family = HalfNormalPrior{0.3};
  analysis.options.priors.effect.direction = Direction::greater;
  text = render::methods(analysis);
  CHECK(text.paragraph.find("(1 study), assuming coarsening at random (Heitjan & Rubin, 1991)") !=
        std::string::npos);
  CHECK(text.paragraph.find("Gronau") == std::string::npos);
  CHECK(text.paragraph.find("restricted to mean effects greater than 0") != std::string::npos);
  for (const std::string& entry : text.references) {
    INFO(entry);
    CHECK(text.paragraph.find(entry.substr(0, entry.find(','))) != std::string::npos);
  }
}
