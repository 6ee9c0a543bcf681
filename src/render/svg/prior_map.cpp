// The map of priors on the page: a cell for each pair, the turning line, and the prior that was used.
#include <algorithm>
#include <cmath>
#include <string>

#include <fmt/format.h>

#include "render/svg/plot.hpp"

namespace steelyard {
namespace {

using namespace render::svg;

/// Decibans between five shades, even steps up to the largest value of the map, rounded to two figures.
std::vector<double> shade_bounds(const figure::PriorMap& map) {
  double most = 5.0;
  for (const auto& value : map.decibans)
    if (value) most = std::max(most, std::fabs(*value));
  const double unit = std::pow(10.0, std::floor(std::log10(most)) - 1);
  std::vector<double> out;
  for (const double share : {0.2, 0.4, 0.6, 0.8}) out.push_back(std::round(share * most / unit) * unit);
  return out;
}

int shade(double decibans, const std::vector<double>& bounds) {
  int out = 1;
  for (const double bound : bounds) out += std::fabs(decibans) > bound ? 1 : 0;
  return out;
}

std::string cell_text(double decibans) {
  const std::string text = figure::number_text(decibans, std::fabs(decibans) < 10 ? 1 : 0);
  return decibans > 0 ? "+" + text : text;
}

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

struct Cells {
  const figure::PriorMap& map;
  std::size_t rows, columns;
  std::vector<double> bounds;
  explicit Cells(const figure::PriorMap& of)
      : map(of),
        rows(of.scale_edges.size() - 1),
        columns(of.width_edges.size() - 1),
        bounds(shade_bounds(of)) {}
  [[nodiscard]] const std::optional<double>& at(std::size_t i, std::size_t j) const {
    return map.decibans[i * rows + j];
  }
  /// The darker two shades carry light text.
  [[nodiscard]] bool dark(std::size_t i, std::size_t j) const {
    return at(i, j) && shade(*at(i, j), bounds) > 3;
  }
  [[nodiscard]] Box cell(const Plot& plot, std::size_t i, std::size_t j) const {
    const double x = plot.x.px(map.width_edges[i]), y = plot.y.px(map.scale_edges[j + 1]);
    return {x, y, plot.x.px(map.width_edges[i + 1]) - x, plot.y.px(map.scale_edges[j]) - y};
  }
};

void fill_cells(Plot& plot, const Cells& table) {
  for (std::size_t i = 0; i < table.columns; ++i)
    for (std::size_t j = 0; j < table.rows; ++j) {
      Box cell = table.cell(plot, i, j);
      cell.width += 0.3, cell.height += 0.3;
      const auto& value = table.at(i, j);
      if (value)
        plot.page.rect(cell,
                       fmt::format("{}-{}", *value >= 0 ? "favour" : "oppose", shade(*value, table.bounds)));
    }
}

/// The number of a cell, if it stands clear on one lightness and nothing crosses it.
void print_number(Plot& plot, const Cells& table, std::size_t i, std::size_t j) {
  const Box cell = table.cell(plot, i, j);
  const auto& value = table.at(i, j);
  const std::string text = value ? cell_text(*value) : "–";
  const double width = text_width(text, small), middle = cell.x + cell.width / 2;
  const Box box = {middle - width / 2, cell.y + cell.height / 2 - small / 2, width, small};
  if (box.x < plot.left() || box.right() > plot.right() || crossed(plot, table.map, box)) return;
  const bool dark = table.dark(i, j);
  for (std::size_t k = 0; k < table.columns; ++k) {
    const Box other = table.cell(plot, k, j);
    const bool beneath = other.x < box.right() && box.x < other.right();
    if (beneath && table.dark(k, j) != dark) return;
  }
  plot.page.text(middle, cell.y + cell.height / 2 + 0.36 * small, text, dark ? "on-dark" : "ink", small,
                 Anchor::middle);
}

/// With many cells every second or third one carries its number.
void numbers(Plot& plot, const Cells& table) {
  double widest = 0;
  for (const auto& value : table.map.decibans)
    if (value) widest = std::max(widest, text_width(cell_text(*value), small));
  const Box cell = table.cell(plot, 0, 0);
  const auto each_column = static_cast<std::size_t>(
      std::max(std::ceil(static_cast<double>(table.columns) / 12), std::ceil((widest + 4) / cell.width)));
  const auto each_row = static_cast<std::size_t>(
      std::max(std::ceil(static_cast<double>(table.rows) / 12), std::ceil(1.3 * small / cell.height)));
  for (std::size_t i = each_column / 2; i < table.columns; i += each_column)
    for (std::size_t j = each_row / 2; j < table.rows; j += each_row) print_number(plot, table, i, j);
}

}  // namespace

std::string render_svg(const figure::PriorMap& map, const SvgStyle& style) {
  const bool narrow = style.width == FigureWidth::one_column;
  Plot plot = render::svg::plot(map.words, map.width, map.scale, narrow ? 190 : 300, style);
  const Cells table(map);
  fill_cells(plot, table);
  numbers(plot, table);
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
  std::string steps;
  for (const double bound : table.bounds) steps += fmt::format("{}{:g}", steps.empty() ? "" : ", ", bound);
  return finish(
      plot,
      {fmt::format(
          "Numbers: weight of evidence in decibans, + for an effect, − for no effect; darker is more "
          "(steps at {}). Diamond: the priors of this analysis. Heavy line, if any: where the evidence "
          "changes sides.",
          steps)},
      style);
}

}  // namespace steelyard
