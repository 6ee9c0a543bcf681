#include <string>

#include <catch2/catch.hpp>

#include "figure/made_up.hpp"
#include "render/geometry.hpp"
#include "steelyard/render.hpp"

using namespace steelyard;

namespace {

const std::string hostile =
    "<b>\"&]]> \xD7\xA9\xD7\x9C\xD7\x95\xD7\x9D \xE6\xBC\xA2\xE5\xAD\x97\xE6\xBC\xA2\xE5\xAD\x97 "
    "e\xCC\x81\xCC\x82 javascript:x";

void check(const std::string& svg) {
  CHECK(geometry::problem(svg) == "");
  CHECK(geometry::not_well_formed(svg) == "");
  CHECK(svg.find("nan") == std::string::npos);
  CHECK(svg.find("<b>") == std::string::npos);
}

void check_all(const Analysis& analysis, const SvgStyle& style) {
  if (analysis.studies.size() > 1) check(render_svg(*figure::surface(analysis).value, style));
  check(render_svg(*figure::belief(analysis).value, style));
  check(render_svg(*figure::funnel(analysis).value, style));
  const auto answers = made_up::answers(analysis);
  check(render_svg(figure::ladder(answers), style));
  check(render_svg(figure::sway(answers.back().log_bf, made_up::without(analysis)), style));
}

}  // namespace

TEST_CASE("figures of any size keep their labels apart and inside", "[svg][figures]") {
  for (const FigureWidth width : {FigureWidth::one_column, FigureWidth::two_columns}) {
    const SvgStyle style{width, false, "f"};
    for (const std::size_t count : {1U, 2U, 12U, 60U, 400U}) {
      INFO(count << " studies, " << (width == FigureWidth::one_column ? "narrow" : "wide"));
      check_all(made_up::analysis(count), style);
    }
    for (const std::string& label : {std::string("A"), std::string(120, 'W'), hostile})
      check_all(made_up::analysis(12, 0.4, 1.0, label), style);
    check_all(made_up::analysis(12, 1.0, 1e-3), style);
    check_all(made_up::analysis(12, 1.0, 1e3), style);
    for (const std::size_t side : {2U, 5U, 12U, 40U})
      check(render_svg(*figure::prior_map(made_up::grid(side, side)).value, style));
  }
}

TEST_CASE("an embedded figure leaves its style to the page", "[svg][figures]") {
  const std::string svg =
      render_svg(*figure::belief(made_up::analysis(3)).value, {FigureWidth::two_columns, true, "b"});
  CHECK(svg.find("<style") == std::string::npos);
  CHECK(svg.find("<?xml") == std::string::npos);
  CHECK(svg.find("id=\"b-title\"") != std::string::npos);
  CHECK(svg.find(" style=") == std::string::npos);
}

TEST_CASE("every role of a mark has its rule in the style sheet", "[svg][figures]") {
  const std::string style = svg_stylesheet();
  const Analysis analysis = made_up::analysis(12);
  std::string all = render_svg(figure::forest(analysis), {FigureWidth::two_columns, true, "f"});
  all += render_svg(*figure::surface(analysis).value, {FigureWidth::two_columns, true, "f"});
  all += render_svg(*figure::belief(analysis).value, {FigureWidth::two_columns, true, "f"});
  all += render_svg(*figure::funnel(analysis).value, {FigureWidth::two_columns, true, "f"});
  all += render_svg(figure::ladder(made_up::answers(analysis)), {FigureWidth::two_columns, true, "f"});
  all += render_svg(*figure::prior_map(made_up::grid(8, 8)).value, {FigureWidth::two_columns, true, "f"});
  for (auto at = all.find("class=\"y-"); at != std::string::npos; at = all.find("class=\"y-", at + 1)) {
    const std::string role = all.substr(at + 7, all.find('"', at + 7) - at - 7);
    if (role == "y-row" || role == "y-pooled") continue;  // groups, for the page to find
    INFO(role);
    CHECK(style.find("." + role + "{") != std::string::npos);
  }
}
