#include "render/svg/axis.hpp"

#include <algorithm>
#include <cmath>

#include "render/svg/measure.hpp"

namespace steelyard::render::svg {
namespace {

/// Whether neighbouring tick texts keep a distance of half an em.
bool apart(const Axis& axis, const std::vector<figure::Tick>& ticks, double size, bool along_x) {
  for (std::size_t i = 1; i < ticks.size(); ++i) {
    const double distance = std::fabs(axis.px(ticks[i].value) - axis.px(ticks[i - 1].value));
    const double need =
        along_x ? (text_width(ticks[i].text, size) + text_width(ticks[i - 1].text, size)) / 2 + size
                : 1.5 * size;
    if (distance < need) return false;
  }
  return true;
}

}  // namespace

double Axis::inside(double value) const { return px(std::clamp(value, scale.low, scale.high)); }

std::vector<figure::Tick> fitting_ticks(const Axis& axis, double size, bool along_x) {
  for (std::size_t most = 9; most > 2; --most) {
    auto out = figure::ticks(axis.scale, most);
    if (apart(axis, out, size, along_x)) return out;
  }
  auto out = figure::ticks(axis.scale, 2);
  if (!apart(axis, out, size, along_x) && out.size() > 1) out.resize(1);
  return out;
}

double axis_below(Drawing& drawing, const Axis& axis, double y, double size, bool with_title) {
  drawing.line(axis.from, y, axis.to, y, "frame");
  for (const auto& tick : fitting_ticks(axis, size, true)) {
    const double x = axis.px(tick.value);
    drawing.line(x, y, x, y + 3, "frame");
    drawing.text(x, y + 5.5 + ascent * size, tick.text, "soft", size, Anchor::middle);
  }
  double bottom = y + 5.5 + (ascent + descent) * size;
  if (with_title && !axis.scale.title.empty()) {
    drawing.label((axis.from + axis.to) / 2, bottom + ascent * size, axis.scale.title,
                  std::fabs(axis.to - axis.from), "ink", size, Anchor::middle);
    bottom += (ascent + descent) * size;
  }
  return bottom;
}

void axis_left(Drawing& drawing, const Axis& axis, double x, double size) {
  drawing.line(x, axis.from, x, axis.to, "frame");
  for (const auto& tick : fitting_ticks(axis, size, false)) {
    const double y = axis.px(tick.value);
    drawing.line(x - 3, y, x, y, "frame");
    drawing.text(x - 5, y + 0.36 * size, tick.text, "soft", size, Anchor::end);
  }
}

double tick_width(const Axis& axis, double size) {
  double width = 0;
  for (const auto& tick : fitting_ticks(axis, size, false))
    width = std::max(width, text_width(tick.text, size));
  return width + 6;
}

void grid_x(Drawing& drawing, const Axis& axis, double top, double bottom, double size) {
  for (const auto& tick : fitting_ticks(axis, size, true))
    drawing.line(axis.px(tick.value), top, axis.px(tick.value), bottom, "rule");
}

void grid_y(Drawing& drawing, const Axis& axis, double left, double right, double size) {
  for (const auto& tick : fitting_ticks(axis, size, false))
    drawing.line(left, axis.px(tick.value), right, axis.px(tick.value), "rule");
}

void hill(Drawing& drawing, const figure::Curve& curve, const Axis& axis, double y, double height,
          const std::string& role) {
  Path path;
  // The flat parts beside the hill would only draw a line along the ground.
  const auto low = [](const figure::Point& point) { return point.y < 0.002; };
  for (std::size_t i = 0; i < curve.size(); ++i) {
    const bool skip =
        low(curve[i]) && (i == 0 || low(curve[i - 1])) && (i + 1 == curve.size() || low(curve[i + 1]));
    if (skip) continue;
    const double x = axis.inside(curve[i].x);
    if (path.empty()) path.move(x, y);
    path.line(x, y - height * curve[i].y);
    const bool ends =
        i + 1 == curve.size() || (low(curve[i + 1]) && (i + 2 >= curve.size() || low(curve[i + 2])));
    if (ends && !path.empty()) {
      path.line(x, y).close();
      drawing.shape(path, role);
      path = Path();
    }
  }
  if (!path.empty()) drawing.shape(path.close(), role);
}

void arrow(Drawing& drawing, double x, double y, double size, bool to_right, const std::string& role) {
  const double back = to_right ? -size : size;
  drawing.shape(Path().move(x, y).line(x + back, y - 0.6 * size).line(x + back, y + 0.6 * size).close(),
                role);
}

void beam(Drawing& drawing, const figure::Estimate& estimate, const Axis& axis, double y, double size,
          const std::string& role_prefix) {
  if (!estimate.lower || !estimate.upper) return;
  const bool outside = *estimate.upper < axis.scale.low || *estimate.lower > axis.scale.high;
  if (!outside)
    drawing.line(axis.inside(*estimate.lower), y, axis.inside(*estimate.upper), y, role_prefix + "beam");
  if (*estimate.lower < axis.scale.low) arrow(drawing, axis.from, y, size, false, role_prefix + "fulcrum");
  if (*estimate.upper > axis.scale.high) arrow(drawing, axis.to, y, size, true, role_prefix + "fulcrum");
  if (!estimate.centre || !axis.holds(*estimate.centre)) return;
  const double x = axis.px(*estimate.centre);
  drawing.shape(Path()
                    .move(x, y - 0.3)
                    .line(x + 0.75 * size, y + 1.25 * size)
                    .line(x - 0.75 * size, y + 1.25 * size)
                    .close(),
                role_prefix + "fulcrum");
}

void weight_bar(Drawing& drawing, double decibans, const Axis& axis, double y, double height) {
  const double zero = axis.px(0.0), end = axis.inside(decibans);
  const std::string role = decibans >= 0 ? "for" : "against";
  drawing.rect({std::min(zero, end), y - height / 2, std::fabs(end - zero), height}, role);
  if (axis.holds(decibans)) return;
  const double gap = zero + 0.82 * (end - zero);
  drawing.line(gap - 2, y + height / 2 + 1, gap + 2, y - height / 2 - 1, "gap");
}

}  // namespace steelyard::render::svg
