// The map of priors on the page: a cell for each pair, the turning line, and the prior that was used.
#include <algorithm>
#include <cmath>
#include <string>

#include <fmt/format.h>

#include "render/svg/plot.hpp"

namespace steelyard {
namespace {

using namespace render::svg;

constexpr double bounds[] = {2.5, 5, 10, 20};  // decibans between the shades

/// Shade 1 to 5 by size, of the side that the evidence favours.
std::string cell_role(double decibans) {
  int shade = 1;
  for (const double bound : bounds) shade += std::fabs(decibans) > bound ? 1 : 0;
  return fmt::format("{}-{}", decibans >= 0 ? "favour" : "oppose", shade);
}

std::string cell_text(double decibans) {
  const std::string text = figure::number_text(decibans, std::fabs(decibans) < 10 ? 1 : 0);
  return decibans > 0 ? "+" + text : text;
}

bool on_dark(double decibans) { return std::fabs(decibans) > bounds[2]; }

/// Whether the turning line or the diamond of the priors in use runs through a box.
bool crossed(const Plot& plot, const figure::PriorMap& map, const Box& box) {
  const auto inside = [&](double x, double y) {
    return x > box.x - 3 && x < box.right() + 3 && y > box.y - 1 && y < box.bottom() + 1;
  };
  const double used_x = plot.x.px(map.used.x), used_y = plot.y.px(map.used.y);
  if (used_x > box.x - 9 && used_x < box.right() + 9 && used_y > box.y - 8 && used_y < box.bottom() + 8)
    return true;
  for (const figure::Curve& line : map.turns)
    for (std::size_t i = 1; i < line.size(); ++i)
      for (int k = 0; k <= 20; ++k) {
        const double share = k / 20.0;
        const double x = plot.x.px(line[i - 1].x) * (1 - share) + plot.x.px(line[i].x) * share;
        const double y = plot.y.px(line[i - 1].y) * (1 - share) + plot.y.px(line[i].y) * share;
        if (inside(x, y)) return true;
      }
  return false;
}

void cells(Plot& plot, const figure::PriorMap& map) {
  const std::size_t rows = map.scale_edges.size() - 1, columns = map.width_edges.size() - 1;
  double widest = 0;
  for (const auto& value : map.decibans)
    if (value) widest = std::max(widest, text_width(cell_text(*value), small));
  const double cell_width = (plot.right() - plot.left()) / static_cast<double>(columns);
  const double cell_height = (plot.bottom() - plot.top()) / static_cast<double>(rows);
  // With many cells every second or third one carries its number.
  const auto each_column = static_cast<std::size_t>(std::max(1.0, std::ceil((widest + 4) / cell_width)));
  const auto each_row = static_cast<std::size_t>(std::max(1.0, std::ceil(1.3 * small / cell_height)));
  for (std::size_t i = 0; i < columns; ++i) {
    for (std::size_t j = 0; j < rows; ++j) {
      const auto& value = map.decibans[i * rows + j];
      const double x1 = plot.x.px(map.width_edges[i]), x2 = plot.x.px(map.width_edges[i + 1]);
      const double y1 = plot.y.px(map.scale_edges[j + 1]), y2 = plot.y.px(map.scale_edges[j]);
      if (value) plot.page.rect({x1, y1, x2 - x1 + 0.3, y2 - y1 + 0.3}, cell_role(*value));
      if (i % each_column != each_column / 2 || j % each_row != each_row / 2) continue;
      if (value && (x2 - x1) * static_cast<double>(each_column) < widest + 2) continue;
      const double middle = (x1 + x2) / 2;
      if (middle - widest / 2 < plot.left() || middle + widest / 2 > plot.right()) continue;
      const double width = value ? text_width(cell_text(*value), small) : 5;
      if (crossed(plot, map, {middle - width / 2, (y1 + y2) / 2 - small / 2, width, small})) continue;
      plot.page.text(middle, (y1 + y2) / 2 + 0.36 * small, value ? cell_text(*value) : "–",
                     value && on_dark(*value) && each_column == 1 ? "on-dark" : "ink", small, Anchor::middle);
    }
  }
}

}  // namespace

std::string render_svg(const figure::PriorMap& map, const SvgStyle& style) {
  const bool narrow = style.width == FigureWidth::one_column;
  Plot plot = render::svg::plot(map.words, map.width, map.scale, narrow ? 190 : 300, style);
  cells(plot, map);
  for (const figure::Curve& line : map.turns) {
    plot.page.shape(through(line, plot.x, plot.y, false), "turn-halo");
    plot.page.shape(through(line, plot.x, plot.y, false), "turn");
  }
  if (plot.x.holds(map.used.x) && plot.y.holds(map.used.y)) {
    const double x = plot.x.px(map.used.x), y = plot.y.px(map.used.y);
    const Path ring = Path().move(x, y - 8).line(x + 8, y).line(x, y + 8).line(x - 8, y).close();
    plot.page.shape(ring, "turn-halo");
    plot.page.shape(ring, "turn");
  }
  return finish(plot,
                {"Numbers: weight of evidence in decibans, + for an effect, − for no effect; darker is more "
                 "(steps at 2.5, 5, "
                 "10 and 20). Diamond: the priors of this analysis. Heavy line: where the verdict turns."},
                style);
}

}  // namespace steelyard
