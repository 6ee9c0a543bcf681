// The surface on the page: nested regions, the line of no effect, the highest point.
#include <string>

#include <fmt/format.h>

#include "render/svg/plot.hpp"

namespace steelyard {

using namespace render::svg;

std::string render_svg(const figure::Surface& surface, const SvgStyle& style) {
  const bool narrow = style.width == FigureWidth::one_column;
  Plot plot = render::svg::plot(surface.words, surface.effect, surface.spread, narrow ? 210 : 330, style);
  Drawing& page = plot.page;
  std::string key;
  for (std::size_t i = 0; i < surface.regions.size(); ++i) {
    Path path;
    for (const figure::Curve& ring : surface.regions[i].rings) {
      for (std::size_t k = 0; k < ring.size(); ++k) {
        const double x = plot.x.inside(ring[k].x), y = plot.y.inside(ring[k].y);
        k == 0 ? path.move(x, y) : path.line(x, y);
      }
      path.close();
    }
    page.shape(path, fmt::format("level-{}", i + 1),
               fmt::format("{:g}% of the posterior", 100 * surface.regions[i].mass));
    page.shape(path, "level-edge");
    key += fmt::format("{}{:g}%",
                       i == 0                            ? ""
                       : i + 1 == surface.regions.size() ? " and "
                                                         : ", ",
                       100 * surface.regions[i].mass);
  }
  page.line(plot.x.px(0), plot.top(), plot.x.px(0), plot.bottom(), "null");
  const bool right_side = plot.x.px(0) < (plot.left() + plot.right()) / 2;
  page.text(plot.x.px(0) + (right_side ? 4 : -4), plot.top() + ascent * small + 2, "no effect", "ink", small,
            right_side ? Anchor::start : Anchor::end);
  const double x = plot.x.px(surface.peak.x), y = plot.y.px(surface.peak.y);
  page.line(x - 4, y, x + 4, y, "gap");
  page.line(x, y - 4, x, y + 4, "gap");
  return finish(
      plot,
      {fmt::format("Filled: the smallest regions that hold {} of the posterior. Cross: its highest point. "
                   "Line: no effect.",
                   key)},
      style);
}

}  // namespace steelyard
