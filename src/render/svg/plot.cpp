#include "render/svg/plot.hpp"

namespace steelyard::render::svg {
namespace {

/// Height at which the piece from a point outside the frame to one inside crosses it.
double cross(const figure::Point& outside, const figure::Point& inside, const Axis& x) {
  const double edge = outside.x < x.scale.low ? x.scale.low : x.scale.high;
  return outside.y + (inside.y - outside.y) * (edge - outside.x) / (inside.x - outside.x);
}

}  // namespace

Plot plot(const figure::Words& words, const figure::Scale& x, const figure::Scale& y, double height,
          const SvgStyle& style) {
  Plot out;
  out.page.width = page_width(style);
  out.page.words = words;
  const double top = page_margin + 2.0 * body;
  out.y = {y, top + height, top};
  out.x = {x, page_margin + tick_width(out.y, small) + 2, out.page.width - page_margin - 8};
  grid_x(out.page, out.x, out.top(), out.bottom(), small);
  grid_y(out.page, out.y, out.left(), out.right(), small);
  axis_left(out.page, out.y, out.left(), small);
  out.page.label(page_margin, page_margin + ascent * body, y.title, out.page.width - 2 * page_margin, "ink",
                 body);
  return out;
}

std::string finish(Drawing& page, double y, const std::vector<std::string>& notes, const SvgStyle& style) {
  const double room = page.width - 2 * page_margin;
  y = page.prose(page_margin, y + 1.7 * body, page.words.finding, room, "ink", body);
  for (const std::string& note : notes) y = page.prose(page_margin, y + 2, note, room, "soft", small);
  page.height = y - 1.4 * small + page_margin;
  return to_bytes(page, style);
}

std::string finish(Plot& plot, const std::vector<std::string>& notes, const SvgStyle& style) {
  const double bottom = axis_below(plot.page, plot.x, plot.bottom(), small);
  return finish(plot.page, bottom, notes, style);
}

Path through(const figure::Curve& curve, const Axis& x, const Axis& y, bool closed) {
  Path path;
  bool pen_down = false;
  for (std::size_t i = 0; i < curve.size(); ++i) {
    const figure::Point& point = curve[i];
    const double px = x.inside(point.x), py = y.inside(point.y);
    // An open line ends at the frame; a ring runs along it.
    const bool visible = closed || x.holds(point.x);
    if (!visible && !pen_down) {
      const bool enters = i + 1 < curve.size() && x.holds(curve[i + 1].x);
      if (enters) path.move(px, y.px(cross(point, curve[i + 1], x)));
      pen_down = enters;
      continue;
    }
    if (!visible) {
      path.line(px, y.px(cross(point, curve[i - 1], x)));
      pen_down = false;
      continue;
    }
    pen_down ? path.line(px, py) : path.move(px, py);
    pen_down = true;
  }
  if (closed && !path.empty()) path.close();
  return path;
}

}  // namespace steelyard::render::svg
