// steelyard draw: one figure of the pooled answer.
#include <array>

#include "again.hpp"
#include "messages.hpp"
#include "progress.hpp"
#include "run.hpp"
#include "steelyard/figure.hpp"
#include "steelyard/render.hpp"

namespace steelyard::cli {

namespace {

SvgStyle svg_style(const Options& options) {
  SvgStyle style;
  style.width = options.one_column ? FigureWidth::one_column : FigureWidth::two_columns;
  return style;
}

template <class Figure>
Outcome<std::string> drawn(Outcome<Figure> figure, const SvgStyle& style) {
  if (!figure.ok()) return {std::nullopt, std::move(figure.diagnostics)};
  return {render_svg(*figure.value, style), {}};
}

Outcome<std::string> draw_pooled(Gathered rows, const Options& options) {
  const SvgStyle style = svg_style(options);
  const auto pooled = analyse_table(std::move(rows.input), rows.options, std::move(rows.cautions));
  if (!pooled.ok()) return {std::nullopt, pooled.diagnostics};
  const Analysis& analysis = *pooled.value;
  if (options.kind == "surface") return drawn(figure::surface(analysis), style);
  if (options.kind == "belief") return drawn(figure::belief(analysis), style);
  if (options.kind == "funnel") return drawn(figure::funnel(analysis), style);
  return {render_svg(figure::forest(analysis), style), {}};
}

Outcome<std::string> draw_again(Gathered rows, const Options& options) {
  StressOptions stress;
  stress.pool = options.analysis.pool;
  stress.threads = options.threads;
  stress.shares = false;
  stress.grid = options.kind == "priors";
  const auto outcome = analyse_stress(std::move(rows), stress, "");
  if (!outcome.ok()) return {std::nullopt, outcome.diagnostics};
  const StressAnalysis& analysis = *outcome.value;
  const SvgStyle style = svg_style(options);
  if (options.kind == "ladder") return {render_svg(figure::ladder(arrivals(analysis)), style), {}};
  if (options.kind == "priors") {
    const auto grid = prior_grid(analysis);
    if (grid) return drawn(figure::prior_map(*grid), style);
    Diagnostic problem;
    problem.code = "no-prior-grid";
    problem.what = "There is no grid of priors to draw: the models with varying effects are not identified.";
    problem.remedy = "Draw it with two or more studies.";
    return {std::nullopt, {problem}};
  }
  const auto& effect = analysis.result.base.effect;
  return {render_svg(
              figure::sway(effect ? std::optional(effect->log_bf) : std::nullopt, leave_one_outs(analysis)),
              style),
          {}};
}

}  // namespace

Exit run_draw(const Options& options) {
  const std::array<std::string, 1> names = {options.svg.empty() ? "-" : options.svg};
  Outputs outputs(names, options.file);
  if (!outputs.ok()) return Exit::file_trouble;
  auto gathered = gathered_rows(options);
  if (!gathered.rows) return gathered.exit;
  const bool again = options.kind == "ladder" || options.kind == "sway" || options.kind == "priors";
  const auto figure = [&] {
    const Progress progress("Drawing");
    return again ? draw_again(std::move(*gathered.rows), options)
                 : draw_pooled(std::move(*gathered.rows), options);
  }();
  if (!figure.ok()) {
    say(figure.diagnostics);
    return Exit::unusable_data;
  }
  outputs.at(0).write(*figure.value);
  return outputs.commit() ? Exit::done : Exit::file_trouble;
}

}  // namespace steelyard::cli
