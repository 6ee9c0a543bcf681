// The forest on the page. A row: the study's likelihood as a hill; under it its estimate after pooling, a
// beam on its fulcrum; its numbers; and its weight of evidence as a bar to the side it favours.
#include <algorithm>
#include <cmath>
#include <string>

#include <fmt/format.h>

#include "render/svg/axis.hpp"
#include "render/svg/measure.hpp"

namespace steelyard {
namespace {

using namespace render::svg;

constexpr double margin = 10.0;

struct Layout {
  bool stacked = false;  ///< one column: label and numbers above the marks
  double width = 0.0;
  double size = 9.0;   ///< font
  double row = 26.0;   ///< height of a row
  double hill = 12.0;  ///< height of a likelihood
  double label_x = 0.0, label_width = 0.0;
  double number_right = 0.0, number_width = 0.0;
  double value_right = 0.0;
  Axis effect, weight;
};

std::string estimate_text(const figure::Estimate& estimate, int decimals) {
  if (!estimate.lower || !estimate.upper) return "not known";
  const std::string interval = fmt::format("[{}, {}]", figure::number_text(*estimate.lower, decimals),
                                           figure::number_text(*estimate.upper, decimals));
  return estimate.centre ? figure::number_text(*estimate.centre, decimals) + " " + interval : interval;
}

std::string weight_text(const figure::ForestPooled& pooled) {
  return pooled.log_bf ? decibans_text(*pooled.log_bf) : "–";
}

/// Widest of the numbers and of the weights.
std::pair<double, double> number_widths(const figure::Forest& forest, double size) {
  double numbers = text_width("not known", size), weights = text_width("+99.9", size);
  for (const auto& study : forest.studies) {
    numbers = std::max(numbers, text_width(estimate_text(study.own, forest.decimals), size));
    weights = std::max(weights, text_width(decibans_text(study.log_bf), size));
  }
  for (const auto& pooled : forest.pooled) {
    numbers = std::max(numbers, text_width(estimate_text(pooled.estimate, forest.decimals), size, true));
    weights = std::max(weights, text_width(weight_text(pooled), size, true));
  }
  return {numbers, weights};
}

double label_room(const figure::Forest& forest, double size, double most) {
  double width = text_width("Study", size);
  for (const auto& study : forest.studies) width = std::max(width, text_width(study.label, size));
  for (const auto& pooled : forest.pooled) width = std::max(width, text_width(pooled.label, size, true));
  return std::min(width + 1, most);
}

Layout layout(const figure::Forest& forest, const SvgStyle& style) {
  Layout out;
  out.width = page_width(style);
  out.stacked = style.width == FigureWidth::one_column;
  const std::size_t rows = forest.studies.size();
  out.size = rows <= 100 ? 9.0 : 8.0;
  out.row = rows <= 15 ? 27.0 : rows <= 40 ? 22.0 : rows <= 100 ? 17.0 : 13.0;
  out.hill = 0.55 * out.row;
  const auto [numbers, weights] = number_widths(forest, out.size);
  out.label_x = margin;
  out.value_right = out.width - margin;
  out.number_width = numbers;
  if (out.stacked) {
    out.row += 1.25 * out.size;
    out.number_right = out.value_right;
    out.label_width = out.width - 2 * margin - numbers - 8;
    out.weight = {forest.weight, out.width - margin - weights - 66, out.width - margin - weights - 4};
    out.effect = {forest.effect, margin, out.weight.from - 24};
    return out;
  }
  out.label_width = label_room(forest, out.size, 175);
  out.weight = {forest.weight, out.width - margin - weights - 98, out.width - margin - weights - 4};
  out.number_right = out.weight.from - 12;
  out.effect = {forest.effect, margin + out.label_width + 10, out.number_right - numbers - 10};
  return out;
}

/// Column heads in two lines; returns the y where the rows begin.
double heads(Drawing& page, const figure::Forest& forest, const Layout& at) {
  const double small = at.size - 0.5;
  const double first = margin + ascent * at.size, second = first + 1.3 * at.size;
  const double zero = at.weight.px(0.0), middle = (at.effect.from + at.effect.to) / 2;
  const std::string interval = fmt::format("[{:g}%]", 100 * forest.level);
  page.text(at.label_x, first, "Study", "ink", at.size, Anchor::start, true);
  if (at.stacked) {
    page.text(at.value_right, first, "after pooling " + interval, "ink", at.size, Anchor::end, true);
    page.text(middle, second, "likelihood of the effect", "ink", small, Anchor::middle);
  } else {
    page.text(at.number_right, first, "after pooling", "ink", at.size, Anchor::end, true);
    page.text(at.number_right, second, interval, "ink", small, Anchor::end);
    page.label(middle, first, "likelihood of the effect", at.effect.to - at.effect.from - 6, "ink", at.size,
               Anchor::middle, true);
    page.text(zero, first, "evidence for", "ink", at.size, Anchor::middle, true);
  }
  page.text(zero - 5, second, at.stacked ? "none" : "no effect", "ink", small, Anchor::end);
  page.text(zero + 5, second, at.stacked ? "effect" : "an effect", "ink", small, Anchor::start);
  return second + 0.6 * at.size;
}

void row_texts(Drawing& page, const Layout& at, double top, const std::string& label,
               const std::string& numbers, const std::string& weight, bool bold) {
  const double text_y = at.stacked ? top + at.size : top + 0.5 * at.row + 0.36 * at.size;
  const double weight_y =
      at.stacked ? top + 1.25 * at.size + 0.5 * (at.row - 1.25 * at.size) + 0.36 * at.size : text_y;
  page.label(at.label_x, text_y, label, at.label_width, "ink", at.size, Anchor::start, bold);
  page.text(at.number_right, text_y, numbers, "ink", at.size, Anchor::end, bold);
  page.text(at.value_right, weight_y, weight, "ink", at.size, Anchor::end, bold);
}

/// Where hill and beam of a row stand.
struct RowLines {
  double ground, beam, middle, beam_size, bar;
};
RowLines row_lines(const Layout& at, double top) {
  const double offset = at.stacked ? 1.25 * at.size : 0.0;
  const double height = at.row - offset;
  top += offset;
  return {top + 0.66 * height, top + 0.76 * height, top + 0.5 * height, 0.155 * height, 0.4 * height};
}

void study_row(Drawing& page, const figure::Forest& forest, const figure::ForestStudy& study,
               const Layout& at, double top) {
  const std::string numbers = estimate_text(study.own, forest.decimals);
  const std::string label =
      study.mark.empty() ? study.label : fmt::format("{} ({})", study.label, study.mark);
  const std::string title =
      fmt::format("{}: after pooling {}; alone {} decibans", label, numbers, decibans_text(study.log_bf));
  page.marks.emplace_back(GroupStart{"row", fmt::format("{}", study.index), title});
  const RowLines y = row_lines(at, top);
  hill(page, study.likelihood, at.effect, y.ground, at.hill, "hill");
  beam(page, study.own, at.effect, y.beam, y.beam_size, "");
  weight_bar(page, decibans(study.log_bf), at.weight, y.middle, y.bar);
  row_texts(page, at, top, label, numbers, decibans_text(study.log_bf), false);
  page.marks.emplace_back(GroupEnd{});
}

void pooled_row(Drawing& page, const figure::Forest& forest, const figure::ForestPooled& pooled,
                const Layout& at, double top) {
  const std::string numbers = estimate_text(pooled.estimate, forest.decimals);
  page.marks.emplace_back(GroupStart{"pooled", "", pooled.label + ": " + numbers});
  const RowLines y = row_lines(at, top);
  hill(page, pooled.density, at.effect, y.ground, at.hill, "pool-hill");
  beam(page, pooled.estimate, at.effect, y.beam, y.beam_size, "pool-");
  if (pooled.log_bf) weight_bar(page, decibans(*pooled.log_bf), at.weight, y.middle, y.bar);
  row_texts(page, at, top, pooled.label, numbers, weight_text(pooled), true);
  page.marks.emplace_back(GroupEnd{});
}

/// Grid and lines of no effect, behind the marks.
void background(Drawing& page, const Layout& at, double top, double bottom) {
  for (const Axis* axis : {&at.effect, &at.weight}) {
    grid_x(page, *axis, top, bottom, at.size - 0.5);
    page.line(axis->px(0.0), top, axis->px(0.0), bottom, "null");
  }
}

/// The page around an embedded forest answers the two questions itself.
double footer(Drawing& page, const figure::Forest& forest, const Layout& at, double y, bool embedded) {
  const double room = at.width - 2 * margin;
  y += 1.6 * at.size;
  if (!embedded) {
    y = page.prose(margin, y, "Is there an effect? " + forest.verdict.effect, room, "ink", at.size + 1);
    y = page.prose(margin, y + 3, "Does it vary? " + forest.verdict.heterogeneity, room, "ink", at.size + 1);
  }
  const std::string key = fmt::format(
      "Hill: likelihood of the study alone (light brown: what is known after pooling). Triangle under its "
      "line: "
      "estimate after pooling with its {:g}% credible interval. Bar: weight of evidence in decibans, "
      "10·log10 of the "
      "Bayes factor.",
      100 * forest.level);
  y = page.prose(margin, y + 4, key, room, "soft", at.size - 0.5);
  for (const std::string& note : forest.notes)
    y = page.prose(margin, y + 1, note, room, "soft", at.size - 0.5);
  return y - 1.4 * at.size + margin + descent * at.size;
}

}  // namespace

std::string render_svg(const figure::Forest& forest, const SvgStyle& style) {
  const Layout at = layout(forest, style);
  Drawing page;
  page.width = at.width;
  page.words = forest.words;
  const double top = heads(page, forest, at);
  const double studies_end = top + at.row * static_cast<double>(forest.studies.size());
  const double pooled_top = studies_end + 6;
  const double pooled_row_height = std::max(at.row, at.stacked ? 33.0 : 22.0);
  const double bottom = pooled_top + pooled_row_height * static_cast<double>(forest.pooled.size());
  if (!at.stacked) background(page, at, top, bottom);
  double y = top;
  for (const auto& study : forest.studies) {
    if (at.stacked) background(page, at, y + 1.25 * at.size, y + at.row - 1);
    study_row(page, forest, study, at, y);
    y += at.row;
  }
  page.line(margin, studies_end + 3, at.width - margin, studies_end + 3, "frame");
  Layout pooled_at = at;
  pooled_at.row = pooled_row_height;
  pooled_at.hill = 0.55 * (pooled_row_height - (at.stacked ? 1.25 * at.size : 0.0));
  y = pooled_top;
  for (const auto& pooled : forest.pooled) {
    if (at.stacked) background(page, at, y + 1.25 * at.size, y + pooled_row_height - 1);
    pooled_row(page, forest, pooled, pooled_at, y);
    y += pooled_row_height;
  }
  axis_below(page, at.weight, bottom + 2, at.size - 0.5, false);
  const double axis_bottom = axis_below(page, at.effect, bottom + 2, at.size - 0.5);
  page.text(at.weight.px(0.0), axis_bottom - descent * (at.size - 0.5), "decibans", "ink", at.size - 0.5,
            Anchor::middle);
  page.height = footer(page, forest, at, axis_bottom, style.embedded);
  return to_bytes(page, style);
}

}  // namespace steelyard
