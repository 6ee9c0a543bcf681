// Room "render": pure functions from an analysis and its figures to bytes.
#pragma once

#include <cstddef>
#include <optional>
#include <string>
#include <vector>

#include "steelyard/analysis.hpp"
#include "steelyard/figure.hpp"

namespace steelyard {

/// What a terminal can show.
struct TextStyle {
  std::size_t width = 80;  ///< columns; 40 is the least that is used
  bool utf8 = false;       ///< false: ASCII only, what it lacks is spelled or shown as `?`
  bool colour = false;     ///< ANSI colours; nothing is told by colour alone
};

/// `pool` for people: verdict, forest, models, evidence, estimates, findings, cautions.
/// Ends with a newline. No control character of the input gets through.
[[nodiscard]] std::string render_text(const Analysis& analysis, const TextStyle& style = {});
/// The forest alone.
[[nodiscard]] std::string render_text(const figure::Forest& forest, const TextStyle& style = {});

/// `check` for people: how each row is read, and what does not agree. Ends with a newline.
[[nodiscard]] std::string render_text(const Check& check, const TextStyle& style = {});

/// `weigh`, `stress` and `replicate` for people: the answer in a sentence, then the tables.
[[nodiscard]] std::string render_text(const RegionResult& region, const TextStyle& style = {});
[[nodiscard]] std::string render_text(const WeighAnalysis& analysis, const TextStyle& style = {});
[[nodiscard]] std::string render_text(const StressAnalysis& analysis, const TextStyle& style = {});
[[nodiscard]] std::string render_text(const ReplicateAnalysis& analysis, const TextStyle& style = {});

/// `pool` for machines; the fields are described in docs/json.md.
[[nodiscard]] std::string render_json(const Analysis& analysis);

/// Widths that journals print: 85 mm and 180 mm.
enum class FigureWidth { one_column, two_columns };

struct SvgStyle {
  FigureWidth width = FigureWidth::two_columns;
  bool embedded = false;         ///< for the inside of an HTML page that carries `svg_stylesheet()`
  std::string id = "steelyard";  ///< letters, digits, '-'; begins every id in the file
};

/// A whole SVG file, ends with a newline; the same bytes for the same input.
[[nodiscard]] std::string render_svg(const figure::Forest& forest, const SvgStyle& style = {});
[[nodiscard]] std::string render_svg(const figure::Surface& surface, const SvgStyle& style = {});
[[nodiscard]] std::string render_svg(const figure::Belief& belief, const SvgStyle& style = {});
[[nodiscard]] std::string render_svg(const figure::Funnel& funnel, const SvgStyle& style = {});
[[nodiscard]] std::string render_svg(const figure::Ladder& ladder, const SvgStyle& style = {});
[[nodiscard]] std::string render_svg(const figure::Sway& sway, const SvgStyle& style = {});
[[nodiscard]] std::string render_svg(const figure::PriorMap& map, const SvgStyle& style = {});

/// Everything that a report shows. What is empty or absent is left out, and the report says so.
struct Report {
  Analysis analysis;
  std::string command;                     ///< as typed, to get the same again
  std::vector<figure::Answer> cumulative;  ///< in order of arrival, the last one with all studies
  std::vector<figure::Answer> without;     ///< all but one study each
  std::optional<figure::PriorGrid> prior_grid;
};

/// One self-contained HTML file: no network, all content without JavaScript; ends with a newline.
[[nodiscard]] std::string render_html(const Report& report);

/// The same in Markdown (CommonMark with tables), without figures.
[[nodiscard]] std::string render_markdown(const Report& report);

/// The style rules of all figures, light and dark, for a page that embeds them.
[[nodiscard]] std::string svg_stylesheet();

/// The sentence that stands under every result that might guide treatment or safety.
[[nodiscard]] std::string usual_caution();

}  // namespace steelyard
