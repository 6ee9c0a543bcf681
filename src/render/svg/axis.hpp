// Scales on the page: axes with ticks that never touch, and the marks that several figures share.
#pragma once

#include <optional>
#include <string>
#include <vector>

#include "render/svg/drawing.hpp"

namespace steelyard::render::svg {

/// A scale laid along px `from`..`to` (from > to for an axis that grows upward).
struct Axis {
  figure::Scale scale;
  double from = 0.0;
  double to = 1.0;

  [[nodiscard]] double px(double value) const { return from + scale.at(value) * (to - from); }
  /// The same, held inside the frame.
  [[nodiscard]] double inside(double value) const;
  [[nodiscard]] bool holds(double value) const { return value >= scale.low && value <= scale.high; }
};

/// As many round ticks as fit side by side at a font size (along x: by their widths, along y: by their
/// heights).
[[nodiscard]] std::vector<figure::Tick> fitting_ticks(const Axis& axis, double size, bool along_x);

/// Ticks and numbers under y; the title, if any, one line lower. Returns the bottom.
double axis_below(Drawing& drawing, const Axis& axis, double y, double size, bool with_title = true);
/// Ticks and numbers left of x; the title is written above the top end. `width` is the room for the numbers.
void axis_left(Drawing& drawing, const Axis& axis, double x, double size);
/// Widest number of a y axis.
[[nodiscard]] double tick_width(const Axis& axis, double size);

/// Thin lines at the ticks.
void grid_x(Drawing& drawing, const Axis& axis, double top, double bottom, double size);
void grid_y(Drawing& drawing, const Axis& axis, double left, double right, double size);

/// The curve as a hill of `height` px standing on y. Empty curves draw nothing.
void hill(Drawing& drawing, const figure::Curve& curve, const Axis& axis, double y, double height,
          const std::string& role);

/// An estimate as a beam on its fulcrum: the interval as a line at y, the centre as a triangle under it.
/// Ends beyond the frame end in an arrow head.
void beam(Drawing& drawing, const figure::Estimate& estimate, const Axis& axis, double y, double size,
          const std::string& role_prefix);

/// A triangle at (x, y) that points left or right.
void arrow(Drawing& drawing, double x, double y, double size, bool to_right, const std::string& role);

/// A weight of evidence as a bar from zero; cut, with a gap, where it leaves the frame.
void weight_bar(Drawing& drawing, double decibans, const Axis& axis, double y, double height);

}  // namespace steelyard::render::svg
