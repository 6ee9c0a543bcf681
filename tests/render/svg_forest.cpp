#include <string>

#include <catch2/catch.hpp>

#include "figure/made_up.hpp"
#include "render/geometry.hpp"
#include "steelyard/render.hpp"

using namespace steelyard;

namespace {

const std::string hostile =
    "<script>alert(\"x\")</script> & ]]> ' javascript:alert(1) \xD7\xA9\xD7\x9C\xD7\x95\xD7\x9D "
    "\xE6\xBC\xA2\xE5\xAD\x97 "
    "e\xCC\x81\xCC\x82 \x1B[31m \xE2\x80\xAE reversed \xFF bad and on and on to a hundred and twenty";

void check(const std::string& svg) {
  CHECK(geometry::problem(svg) == "");
  CHECK(geometry::not_well_formed(svg) == "");
  CHECK(svg.find("nan") == std::string::npos);
  CHECK(svg.find("inf\"") == std::string::npos);
  CHECK(svg.find("role=\"img\"") != std::string::npos);
}

}  // namespace

TEST_CASE("forests of any size keep their labels apart and inside", "[svg][forest]") {
  for (const FigureWidth width : {FigureWidth::one_column, FigureWidth::two_columns}) {
    for (const std::size_t count : {1U, 2U, 3U, 12U, 60U, 400U}) {
      INFO(count << " studies");
      check(render_svg(figure::forest(made_up::analysis(count)), {width, false, "f"}));
    }
    for (const std::string& label : {std::string("A"), std::string(120, 'W'), hostile})
      check(render_svg(figure::forest(made_up::analysis(12, 0.4, 1.0, label)), {width, false, "f"}));
    check(render_svg(figure::forest(made_up::analysis(12, 1.0, 1e-3)), {width, false, "f"}));
    check(render_svg(figure::forest(made_up::analysis(12, 1.0, 1e3)), {width, false, "f"}));
  }
}

TEST_CASE("hostile labels are text", "[svg][forest]") {
  const std::string svg = render_svg(figure::forest(made_up::analysis(3, 0.4, 1.0, hostile)));
  CHECK(svg.find("<script") == std::string::npos);
  CHECK(svg.find('\x1B') == std::string::npos);
  CHECK(svg.find("\xE2\x80\xAE") == std::string::npos);
  CHECK(svg.find("&lt;script&gt;") != std::string::npos);
}

TEST_CASE("huge evidence fits its column", "[svg][forest]") {
  Analysis analysis = made_up::analysis(3);
  analysis.result.studies[1].log_bf = 230258.5;
  analysis.result.effect->log_bf = 230258.5;
  analysis.result.effect_fixed->log_bf = -230258.5;
  check(render_svg(figure::forest(analysis)));
  check(render_svg(figure::forest(analysis), {FigureWidth::one_column, false, "f"}));
}

TEST_CASE("what is not known is said, never drawn as a number", "[svg][forest]") {
  Analysis analysis = made_up::analysis(3);
  for (auto& study : analysis.result.studies) study.shrunken = {{}, {}, {}, {}, {}, "Too many studies."};
  analysis.result.pooled_effect = {{}, {}, {}, {}, {}, "Not identified."};
  const std::string svg = render_svg(figure::forest(analysis));
  check(svg);
  CHECK(svg.find("not known") != std::string::npos);
}

TEST_CASE("the same input gives the same bytes", "[svg][forest]") {
  CHECK(render_svg(figure::forest(made_up::analysis(12))) ==
        render_svg(figure::forest(made_up::analysis(12))));
}
