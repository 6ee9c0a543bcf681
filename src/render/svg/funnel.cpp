// The funnel on the page: precise studies at the top.
#include <string>

#include <fmt/format.h>

#include "render/svg/plot.hpp"

namespace steelyard {
namespace {

using namespace render::svg;

void dot(Drawing& page, double x, double y, double radius, const std::string& role,
         const std::string& title) {
  // A diamond: four points need no curve and print sharply.
  page.shape(Path().move(x, y - radius).line(x + radius, y).line(x, y + radius).line(x - radius, y).close(),
             role, title);
}

figure::Curve both_sides(const figure::Curve& low, const figure::Curve& high) {
  figure::Curve out = low;
  out.insert(out.end(), high.rbegin(), high.rend());
  return out;
}

void label_outsiders(Plot& plot, const figure::Funnel& funnel) {
  std::vector<Box> taken;
  for (const figure::FunnelStudy& study : funnel.studies) {
    const double x = plot.x.px(study.effect), y = plot.y.px(study.error);
    taken.push_back({x - 4, y - 4, 8, 8});
  }
  const double zero = plot.x.px(0);
  taken.push_back({zero - 2, plot.top(), 4, plot.bottom() - plot.top()});
  for (const figure::FunnelStudy& study : funnel.studies) {
    if (!study.outside_same) continue;
    const double x = plot.x.px(study.effect), y = plot.y.px(study.error);
    const bool right = x < (plot.left() + plot.right()) / 2;
    const std::string shown = fit(study.label, small, 110).shown;
    Text text{x + (right ? 7 : -7),
              y + 0.36 * small,
              shown,
              "ink",
              right ? Anchor::start : Anchor::end,
              small,
              false,
              true,
              ""};
    const Box box = box_of(text);
    bool free = box.x >= plot.left() && box.right() <= plot.right() && box.y >= plot.top() &&
                box.bottom() <= plot.bottom();
    for (const Box& other : taken)
      free = free && !(box.x < other.right() && other.x < box.right() && box.y < other.bottom() &&
                       other.y < box.bottom());
    if (!free) continue;
    taken.push_back(box);
    plot.page.marks.emplace_back(text);
  }
}

}  // namespace

std::string render_svg(const figure::Funnel& funnel, const SvgStyle& style) {
  const bool narrow = style.width == FigureWidth::one_column;
  Plot plot = render::svg::plot(funnel.words, funnel.effect, funnel.error, narrow ? 220 : 340, style);
  // Precise studies stand at the top: error grows downward.
  Drawing page;
  page.width = plot.page.width;
  page.words = plot.page.words;
  plot.page = page;
  std::swap(plot.y.from, plot.y.to);
  const double top = plot.y.from, bottom = plot.y.to;
  plot.page.shape(through(both_sides(funnel.same_low, funnel.same_high), plot.x, plot.y, true), "band");
  grid_x(plot.page, plot.x, top, bottom, small);
  grid_y(plot.page, plot.y, plot.left(), plot.right(), small);
  for (const auto* edge : {&funnel.same_low, &funnel.same_high})
    plot.page.shape(through(*edge, plot.x, plot.y, false), "band-edge");
  for (const auto* edge : {&funnel.varying_low, &funnel.varying_high})
    plot.page.shape(through(*edge, plot.x, plot.y, false), "band-wide");
  plot.page.line(plot.x.px(0), top, plot.x.px(0), bottom, "null");
  plot.page.line(plot.x.px(funnel.centre), top, plot.x.px(funnel.centre), bottom, "band-edge");
  axis_left(plot.page, plot.y, plot.left(), small);
  plot.page.label(page_margin, page_margin + ascent * body, funnel.error.title,
                  plot.page.width - 2 * page_margin, "ink", body);
  const double radius = funnel.studies.size() > 100 ? 2.6 : 3.8;
  for (const figure::FunnelStudy& study : funnel.studies) {
    const double x = plot.x.inside(study.effect), y = plot.y.inside(study.error);
    plot.page.marks.emplace_back(GroupStart{"row", fmt::format("{}", study.index), ""});
    dot(plot.page, x, y, radius, study.outside_same ? "dot-out" : "dot",
        fmt::format("{}: effect {:.3g}, standard error {:.3g}", study.label, study.effect, study.error));
    plot.page.marks.emplace_back(GroupEnd{});
  }
  std::swap(plot.y.from, plot.y.to);
  label_outsiders(plot, funnel);
  std::vector<std::string> notes = {
      "Shaded: where 95% of printed effects would lie around one shared effect, exact under the noncentral "
      "t. Dashed: the "
      "same with effects that vary. Hollow: outside the shaded region, judged by the study's own size and "
      "design."};
  notes.insert(notes.end(), funnel.notes.begin(), funnel.notes.end());
  return finish(plot, notes, style);
}

}  // namespace steelyard
