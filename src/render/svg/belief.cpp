// Belief as a stream that flows down from before the data to after them and on to a new study: equal shares
// of belief run between the same two quantiles at every stage, so the stream narrows as belief sharpens.
#include <algorithm>
#include <string>

#include <fmt/format.h>

#include "render/svg/plot.hpp"

namespace steelyard {
namespace {

using namespace render::svg;

constexpr double bar = 30.0;   // height of a stage
constexpr double flow = 44.0;  // height of the stream between two stages
constexpr int steps = 14;      // pieces of the stream's edge between two stages

struct Stream {
  const figure::Belief& belief;
  const Axis& axis;
  double top;

  [[nodiscard]] double y(std::size_t stage) const { return top + static_cast<double>(stage) * (bar + flow); }
};

/// The edge of the stream at one quantile, downward: straight within a stage, a smooth turn between two.
std::vector<figure::Point> edge(const Stream& at, std::size_t quantile) {
  std::vector<figure::Point> out;
  const auto& stages = at.belief.stages;
  for (std::size_t s = 0; s < stages.size(); ++s) {
    const double here = stages[s].quantiles[quantile];
    out.push_back({at.axis.inside(here), at.y(s)});
    out.push_back({at.axis.inside(here), at.y(s) + bar});
    if (s + 1 == stages.size()) break;
    const double next = stages[s + 1].quantiles[quantile];
    for (int k = 1; k < steps; ++k) {
      const double u = static_cast<double>(k) / steps;
      out.push_back({at.axis.inside(here + (next - here) * u * u * (3 - 2 * u)), at.y(s) + bar + u * flow});
    }
  }
  return out;
}

/// The stream between quantile k and its mirror.
void stream(Drawing& page, const Stream& at, std::size_t k, const std::string& role) {
  const std::size_t mirror = at.belief.probabilities.size() - 1 - k;
  auto outline = edge(at, k);
  const auto back = edge(at, mirror);
  outline.insert(outline.end(), back.rbegin(), back.rend());
  Path path;
  for (const figure::Point& point : outline)
    path.empty() ? path.move(point.x, point.y) : path.line(point.x, point.y);
  page.shape(path.close(), role,
             fmt::format("middle {:g}% of belief",
                         100 * (at.belief.probabilities[mirror] - at.belief.probabilities[k])));
}

void stage_texts(Drawing& page, const figure::BeliefStage& stage, double y) {
  y += 0.75 * body;
  page.text(page_margin, y, stage.label, "ink", body, Anchor::start, true);
  page.text(page_margin, y + 1.3 * body, figure::percent_text(1 - stage.above_zero) + " below 0", "soft",
            small);
  page.text(page_margin, y + 2.55 * body, figure::percent_text(stage.above_zero) + " above 0", "soft", small);
}

}  // namespace

std::string render_svg(const figure::Belief& belief, const SvgStyle& style) {
  Drawing page;
  page.width = page_width(style);
  page.words = belief.words;
  double labels = text_width("<0.1% below 0", small);
  for (const auto& stage : belief.stages) labels = std::max(labels, text_width(stage.label, body, true));
  const Axis axis{belief.effect, page_margin + labels + 12, page.width - page_margin};
  const Stream at{belief, axis, page_margin + 2};
  const double bottom = at.y(belief.stages.size() - 1) + bar + 6;
  grid_x(page, axis, at.top, bottom, small);
  const std::size_t middle = belief.probabilities.size() / 2;
  for (std::size_t k = 0; k < middle; ++k) stream(page, at, k, fmt::format("level-{}", k + 1));
  Path median;
  for (const figure::Point& point : edge(at, middle))
    median.empty() ? median.move(point.x, point.y) : median.line(point.x, point.y);
  page.shape(median, "gap");
  page.line(axis.px(0), at.top, axis.px(0), bottom, "gap");
  page.line(axis.px(0), at.top, axis.px(0), bottom, "null");
  for (std::size_t s = 0; s < belief.stages.size(); ++s) stage_texts(page, belief.stages[s], at.y(s));
  const double end = axis_below(page, axis, bottom, small);
  return finish(
      page, end,
      {"Stream: the middle 95, 80 and 50% of belief, light to dark, and the median; what runs along the edge "
       "lies beyond it. Dark line: no effect."},
      style);
}

}  // namespace steelyard
