// A page with one pair of axes: what surface, funnel, belief, ladder, sway and priors have in common.
#pragma once

#include <string>

#include "render/svg/axis.hpp"
#include "render/svg/measure.hpp"

namespace steelyard::render::svg {

inline constexpr double page_margin = 10.0;
inline constexpr double body = 9.0;   ///< font size of labels
inline constexpr double small = 8.5;  ///< of axes and notes

struct Plot {
  Drawing page;
  Axis x, y;  ///< y grows upward unless the figure says otherwise
  [[nodiscard]] double left() const { return x.from; }
  [[nodiscard]] double right() const { return x.to; }
  [[nodiscard]] double top() const { return y.to; }
  [[nodiscard]] double bottom() const { return y.from; }
};

/// Both axes with their grid; the y title stands above the frame. `height` is that of the frame.
[[nodiscard]] Plot plot(const figure::Words& words, const figure::Scale& x, const figure::Scale& y,
                        double height, const SvgStyle& style);

/// The x axis under the frame, then the finding and notes as prose; sets the height of the page.
std::string finish(Plot& plot, const std::vector<std::string>& notes, const SvgStyle& style);

/// Prose under y, then the bytes.
std::string finish(Drawing& page, double y, const std::vector<std::string>& notes, const SvgStyle& style);

/// A polyline or ring through points of a curve, held inside the frame.
[[nodiscard]] Path through(const figure::Curve& curve, const Axis& x, const Axis& y, bool closed);

}  // namespace steelyard::render::svg
