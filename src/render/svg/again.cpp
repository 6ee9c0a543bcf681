// Ladder and sway on the page.
#include <algorithm>
#include <cmath>
#include <string>

#include <fmt/format.h>

#include "render/svg/plot.hpp"

namespace steelyard {
namespace {

using namespace render::svg;

double label_room(const std::vector<std::string>& labels, double page) {
  double width = 40;
  for (const std::string& label : labels) width = std::max(width, text_width(label, body) + 2);
  return std::min(width, 0.34 * page);
}

std::string value_text(const std::optional<double>& decibans) {
  return decibans ? decibans_text(*decibans / 10 * std::log(10.0)) : "not known";
}

void zero_line(Drawing& page, const Axis& axis, double top, double bottom) {
  page.line(axis.px(0), top, axis.px(0), bottom, "null");
  const bool both = axis.px(0) - axis.from > 60 && axis.to - axis.px(0) > 60;
  if (both || axis.px(0) - axis.from > axis.to - axis.px(0))
    page.text(axis.px(0) - 5, top - 4, "no effect", "ink", small, Anchor::end);
  if (both || axis.px(0) - axis.from <= axis.to - axis.px(0))
    page.text(axis.px(0) + 5, top - 4, "an effect", "ink", small, Anchor::start);
}

struct Rows {
  double top, height, label_right, value_right;
};

/// Height of a row so that labels never touch; with very many rows only some are labelled.
double row_height(std::size_t rows) { return rows <= 40 ? 15.0 : rows <= 120 ? 12.0 : 4.0; }

}  // namespace

std::string render_svg(const figure::Ladder& ladder, const SvgStyle& style) {
  Drawing page;
  page.width = page_width(style);
  page.words = ladder.words;
  std::vector<std::string> labels;
  for (const auto& rung : ladder.rungs) labels.push_back(rung.label);
  const double room = label_room(labels, page.width), height = row_height(ladder.rungs.size());
  const auto every = static_cast<std::size_t>(std::ceil(1.25 * body / height));
  double values = 0;
  for (const auto& rung : ladder.rungs)
    values = std::max(values, text_width(value_text(rung.decibans), body));
  const Axis axis{ladder.weight, page_margin + room + 10, page.width - page_margin - values - 8};
  const double top = page_margin + 1.6 * body;
  const double bottom = top + height * static_cast<double>(ladder.rungs.size()) + 4;
  grid_x(page, axis, top, bottom, small);
  zero_line(page, axis, top, bottom);
  std::optional<double> before = 0.0;
  for (std::size_t i = 0; i < ladder.rungs.size(); ++i) {
    const auto& rung = ladder.rungs[i];
    const double y = top + height * (static_cast<double>(i) + 0.5) + 2;
    const bool last = i + 1 == ladder.rungs.size();
    const bool labelled = i % every == 0 ? ladder.rungs.size() - 1 - i >= every || last : last;
    if (labelled) {
      page.label(page_margin, y + 0.36 * body, rung.label, room, "ink", body, Anchor::start, last);
      page.text(page.width - page_margin, y + 0.36 * body, value_text(rung.decibans), "ink", body,
                Anchor::end, last);
    }
    if (!rung.decibans) continue;
    const std::string side = *rung.decibans >= 0 ? "for" : "against";
    const double x = axis.px(*rung.decibans), from = axis.px(before.value_or(*rung.decibans));
    page.line(from, y, x, y, side + "-line");
    if (!last) page.line(x, y, x, y + height, side + "-line");
    if (height > 10)
      page.rect({x - 2.5, y - 2.5, 5, 5}, side, rung.label + ": " + value_text(rung.decibans) + " decibans");
    before = rung.decibans;
  }
  const double end = axis_below(page, axis, bottom, small);
  return finish(page, end,
                {"Each step adds one study; a rung shows how far it moved the weight of evidence."}, style);
}

std::string render_svg(const figure::Sway& sway, const SvgStyle& style) {
  Drawing page;
  page.width = page_width(style);
  page.words = sway.words;
  std::vector<std::string> labels = {"All studies in"};
  for (const auto& row : sway.rows) labels.push_back(row.label);
  const double room = label_room(labels, page.width),
               height = row_height(std::min<std::size_t>(sway.rows.size(), 60));
  double values = 0;
  for (const auto& row : sway.rows) values = std::max(values, text_width(value_text(row.decibans), body));
  values = std::max(values, text_width(value_text(sway.decibans), body, true));
  const Axis axis{sway.weight, page_margin + room + 10, page.width - page_margin - values - 8};
  const double top = page_margin + 1.6 * body;
  const double bottom = top + height * static_cast<double>(sway.rows.size() + 1) + 4;
  grid_x(page, axis, top, bottom, small);
  zero_line(page, axis, top, bottom);
  if (sway.decibans) page.line(axis.px(*sway.decibans), top, axis.px(*sway.decibans), bottom, "turn");
  const auto texts = [&](double y, const std::string& label, const std::optional<double>& value, bool bold) {
    page.label(page_margin, y + 0.36 * body, label, room, "ink", body, Anchor::start, bold);
    page.text(page.width - page_margin, y + 0.36 * body, value_text(value), "ink", body, Anchor::end, bold);
  };
  page.text(page_margin, top - 4, "Left out", "soft", small);
  double y = top + height / 2 + 2;
  texts(y, labels.front(), sway.decibans, true);
  for (const auto& row : sway.rows) {
    y += height;
    texts(y, row.label, row.decibans, false);
    if (!row.decibans || !sway.decibans) continue;
    const double from = axis.px(*sway.decibans), to = axis.px(*row.decibans);
    page.line(from, y, to, y, *row.decibans >= 0 ? "for-line" : "against-line");
    if (std::fabs(to - from) > 1)
      arrow(page, to, y, std::min(5.0, std::fabs(to - from)), to > from,
            *row.decibans >= 0 ? "for" : "against");
  }
  const double end = axis_below(page, axis, bottom, small);
  std::vector<std::string> notes = {
      "Each arrow leads from the evidence of all studies to the evidence without one of them."};
  if (sway.rows.size() < sway.of)
    notes.push_back(
        fmt::format("Shown: the {} studies whose removal changes most, of {}.", sway.rows.size(), sway.of));
  return finish(page, end, notes, style);
}

}  // namespace steelyard
