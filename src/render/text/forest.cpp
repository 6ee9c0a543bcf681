// The forest in a terminal: a row of blocks for each likelihood, the estimate after pooling, and the weight
// of evidence as a number and a bar on a common scale.
#include <algorithm>
#include <cmath>
#include <string>

#include <fmt/format.h>

#include "render/text/page.hpp"
#include "render/unicode.hpp"

namespace steelyard {
namespace {

using namespace render;
using namespace render::text;

struct Glyphs {
  std::u32string_view hill;  ///< from nothing to full height
  char32_t zero, line, left, right, centre, beyond_left, beyond_right, full, tick;
};
constexpr Glyphs blocks = {U" ▁▂▃▄▅▆▇█", U'│', U'─', U'├', U'┤', U'▲', U'◂', U'▸', U'█', U'┴'};
constexpr Glyphs plain = {U" .:+*#", U'|', U'-', U'(', U')', U'^', U'<', U'>', U'=', U'+'};

struct Columns {
  std::size_t label = 0, plot = 0, number = 0, weight = 0, bar = 0;  ///< 0: left out
  const figure::Forest& forest;
  const TextStyle& style;
  const Glyphs& glyphs;

  [[nodiscard]] std::size_t at(double effect) const {
    const double cell = forest.effect.at(effect) * static_cast<double>(plot);
    return static_cast<std::size_t>(std::clamp(cell, 0.0, static_cast<double>(plot) - 1));
  }
  [[nodiscard]] std::size_t half_bar() const { return (bar - 1) / 2; }
};

std::string numbers_of(const figure::Estimate& estimate, int decimals) {
  if (!estimate.lower || !estimate.upper) return "not known";
  std::string out = estimate.centre ? figure::number_text(*estimate.centre, decimals) + " " : "";
  return out + fmt::format("[{}, {}]", figure::number_text(*estimate.lower, decimals),
                           figure::number_text(*estimate.upper, decimals));
}

std::string label_of(const figure::ForestStudy& study) {
  return study.mark.empty() ? study.label : fmt::format("{} ({})", study.label, study.mark);
}

Columns columns(const figure::Forest& forest, const TextStyle& style) {
  Columns out{5, 0, 11, 8, 0, forest, style, style.utf8 ? blocks : plain};
  const auto widen = [&](std::size_t& column, const std::string& content) {
    column = std::max(column, cell_width(shown(content, style)));
  };
  for (const auto& study : forest.studies) {
    widen(out.label, label_of(study));
    widen(out.number, numbers_of(study.own, forest.decimals));
    widen(out.weight, decibans_text(study.log_bf));
  }
  for (const auto& pooled : forest.pooled) {
    widen(out.label, pooled.label);
    widen(out.number, numbers_of(pooled.estimate, forest.decimals));
    if (pooled.log_bf) widen(out.weight, decibans_text(*pooled.log_bf));
  }
  const std::size_t width = std::max<std::size_t>(style.width, 40);
  const std::size_t fixed = out.number + out.weight + 2;
  std::size_t rest = width > fixed + 10 ? width - fixed : 10;
  if (rest >= 48) {
    out.bar = std::min<std::size_t>(13 + 2 * ((rest - 48) / 8), 31);
    rest -= out.bar + 1;
  }
  const std::size_t least_label = std::clamp<std::size_t>(rest * 2 / 5, 8, 48);
  out.label = std::min(out.label, rest >= least_label + 60 ? rest - 60 : least_label);
  out.plot = rest > out.label + 11 ? std::min<std::size_t>(rest - out.label - 1, 72) : 0;
  return out;
}

/// The highest point of the curve within each cell of the plot, 0 to 1.
std::vector<double> heights(const figure::Curve& curve, const Columns& columns) {
  std::vector<double> out(columns.plot, 0.0);
  for (std::size_t i = 0; i < curve.size(); ++i) {
    double& cell = out[columns.at(curve[i].x)];
    cell = std::max(cell, curve[i].y);
  }
  return out;
}

std::u32string empty_plot(const Columns& columns) {
  std::u32string out(columns.plot, U' ');
  const auto& scale = columns.forest.effect;
  if (columns.plot > 0 && scale.low <= 0 && scale.high >= 0) out[columns.at(0.0)] = columns.glyphs.zero;
  return out;
}

std::u32string hill_plot(const figure::ForestStudy& study, const Columns& columns) {
  std::u32string out = empty_plot(columns);
  if (study.likelihood.empty() && columns.plot > 0) {
    const bool left = study.own.centre.value_or(0.0) < columns.forest.effect.low;
    out[left ? 0 : columns.plot - 1] = left ? columns.glyphs.beyond_left : columns.glyphs.beyond_right;
    return out;
  }
  const auto height = heights(study.likelihood, columns);
  const double steps = static_cast<double>(columns.glyphs.hill.size() - 1);
  for (std::size_t i = 0; i < columns.plot; ++i) {
    const auto level = static_cast<std::size_t>(std::lround(height[i] * steps));
    if (level > 0) out[i] = columns.glyphs.hill[level];
  }
  return out;
}

std::u32string beam_plot(const figure::Estimate& estimate, const Columns& columns) {
  std::u32string out = empty_plot(columns);
  const auto& scale = columns.forest.effect;
  if (columns.plot == 0 || !estimate.lower || !estimate.upper) return out;
  const std::size_t from = columns.at(*estimate.lower), to = columns.at(*estimate.upper);
  std::fill(out.begin() + static_cast<std::ptrdiff_t>(from),
            out.begin() + static_cast<std::ptrdiff_t>(to) + 1, columns.glyphs.line);
  out[from] = *estimate.lower < scale.low ? columns.glyphs.beyond_left : columns.glyphs.left;
  out[to] = *estimate.upper > scale.high ? columns.glyphs.beyond_right : columns.glyphs.right;
  if (estimate.centre) out[columns.at(*estimate.centre)] = columns.glyphs.centre;
  return out;
}

std::u32string bar_plot(std::optional<double> log_bf, const Columns& columns) {
  if (columns.bar == 0) return U"";
  std::u32string out(columns.bar, U' ');
  const std::size_t half = columns.half_bar();
  out[half] = columns.glyphs.zero;
  if (!log_bf) return out;
  const double value = decibans(*log_bf);
  const double cells = std::fabs(value) / columns.forest.weight.high * static_cast<double>(half);
  const std::size_t whole = std::min(static_cast<std::size_t>(std::lround(std::min(cells, 1e6))), half);
  for (std::size_t i = 1; i <= whole; ++i) out[value > 0 ? half + i : half - i] = columns.glyphs.full;
  const bool cut = std::fabs(value) > columns.forest.weight.high;
  if (cut)
    out[value > 0 ? columns.bar - 1 : 0] =
        value > 0 ? columns.glyphs.beyond_right : columns.glyphs.beyond_left;
  return out;
}

std::string row(const Columns& columns, const std::string& label, const std::u32string& plot,
                const std::string& numbers, const std::string& weight, std::optional<double> log_bf,
                Tone tone) {
  std::string out =
      toned(fit(shown(label, columns.style), columns.label, columns.style), tone, columns.style);
  if (columns.plot > 0) out += " " + encode(plot);
  out += " " +
         toned(fit(shown(numbers, columns.style), columns.number, columns.style, true), tone, columns.style);
  out += " " +
         toned(fit(shown(weight, columns.style), columns.weight, columns.style, true), tone, columns.style);
  if (columns.bar > 0) {
    const Tone side = log_bf.value_or(0.0) < 0 ? Tone::against : Tone::in_favour;
    out += " " + toned(bar_plot(log_bf, columns), side, columns.style);
  }
  out.erase(out.find_last_not_of(' ') + 1);
  return out + "\n";
}

std::string head(const Columns& columns) {
  const TextStyle& style = columns.style;
  std::u32string out = fit(U"Study", columns.label, style);
  if (columns.plot > 0)
    out += U" " + fit(columns.plot < 24 ? U"Likelihood" : U"Likelihood of the effect", columns.plot, style);
  const std::string interval = fmt::format("{:g}%", 100 * columns.forest.level);
  const std::string pooled = (columns.number >= 18 ? "After pooling, " : "Pooled, ") + interval;
  out += U" " + fit(shown(pooled, style), columns.number, style, true);
  out += U" " + fit(U"Decibans", columns.weight, style, true);
  if (columns.bar > 0) {
    std::u32string sides(columns.bar, U' ');
    const std::size_t half = columns.half_bar();
    const std::u32string none = fit(U"none", half, style, true), some = fit(U"effect", half, style);
    sides = none + columns.glyphs.zero + some;
    out += U" " + sides;
  }
  out.erase(out.find_last_not_of(U' ') + 1);
  return toned(out, Tone::faint, style) + "\n";
}

/// The ticks that fit with their numbers, and where each number starts.
std::vector<std::pair<std::size_t, figure::Tick>> placed_ticks(const Columns& columns) {
  std::vector<std::pair<std::size_t, figure::Tick>> out;
  for (std::size_t most = std::max<std::size_t>(columns.plot / 4, 2); most >= 2; --most) {
    out.clear();
    std::size_t free_from = 0;
    bool fits = true;
    for (const auto& tick : figure::ticks(columns.forest.effect, most)) {
      const std::size_t length = shown(tick.text, columns.style).size();
      const std::size_t middle = columns.label + 1 + columns.at(tick.value);
      const std::size_t start = middle - std::min(middle, (length - 1) / 2);
      fits = fits && start >= free_from;
      free_from = start + length + 2;
      out.emplace_back(start, tick);
    }
    if (fits) return out;
  }
  out.resize(std::min<std::size_t>(out.size(), 1));
  return out;
}

std::string axis(const Columns& columns) {
  if (columns.plot == 0) return "";
  const TextStyle& style = columns.style;
  std::u32string line(columns.plot, columns.glyphs.line), numbers;
  for (const auto& [start, tick] : placed_ticks(columns)) {
    line[columns.at(tick.value)] = columns.glyphs.tick;
    numbers.resize(std::max(numbers.size(), start), U' ');
    numbers += shown(tick.text, style);
  }
  const std::size_t width = columns.label + 1 + columns.plot;
  const std::u32string title = fit(shown(columns.forest.effect.title, style), width, style, true);
  const std::u32string indent(columns.label + 1, U' ');
  return encode(indent + line) + "\n" + toned(numbers, Tone::faint, style) + "\n" +
         toned(title, Tone::faint, style) + "\n";
}

}  // namespace

std::string render_text(const figure::Forest& forest, const TextStyle& style) {
  const Columns at = columns(forest, style);
  std::string out = head(at);
  for (const auto& study : forest.studies)
    out += row(at, label_of(study), hill_plot(study, at), numbers_of(study.own, forest.decimals),
               decibans_text(study.log_bf), study.log_bf, Tone::plain);
  const std::size_t full =
      at.label + at.number + at.weight + 2 + (at.plot > 0 ? at.plot + 1 : 0) + (at.bar > 0 ? at.bar + 1 : 0);
  out += toned(std::u32string(full, at.glyphs.line), Tone::faint, style) + "\n";
  for (const auto& pooled : forest.pooled)
    out += row(at, pooled.label, beam_plot(pooled.estimate, at), numbers_of(pooled.estimate, forest.decimals),
               pooled.log_bf ? decibans_text(*pooled.log_bf) : "", pooled.log_bf, Tone::strong);
  out += axis(at);
  for (const std::string& note : forest.notes) out += paragraph(note, style);
  return out;
}

}  // namespace steelyard
