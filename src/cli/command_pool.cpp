// steelyard pool: all studies together.
#include <array>

#include "messages.hpp"
#include "progress.hpp"
#include "run.hpp"
#include "steelyard/figure.hpp"
#include "steelyard/json.hpp"
#include "steelyard/render.hpp"
#include "terminal.hpp"

namespace steelyard::cli {

namespace {

// The rows and options of this run: from a file of studies, or from the result of an earlier run.
Outcome<RecordedRun> run_of(const std::string& text, Options options) {
  if (!options.from_result) {
    auto table = read_table(text, options.file);
    if (!table.ok()) return {std::nullopt, std::move(table.diagnostics)};
    Input input{options.file, sha256(text), std::move(*table.value)};
    return {RecordedRun{std::move(input), options.analysis}, std::move(table.diagnostics)};
  }
  auto run = read_result(text, options.file);
  if (!run.ok()) return run;
  for (const std::string& problem : build_on(run.value->options, options)) {
    Diagnostic& diagnostic = run.diagnostics.emplace_back();
    diagnostic.code = "options";
    diagnostic.what = problem;
    run.value.reset();
  }
  if (run.ok()) run.value->options = options.analysis;
  return run;
}

Outcome<Analysis> analyse(const Options& options) {
  auto run = [&]() -> Outcome<RecordedRun> {
    const auto text = input_text(options);
    return text ? run_of(*text, options) : Outcome<RecordedRun>{};
  }();  // the text itself is not needed any longer
  if (!run.ok()) return {std::nullopt, std::move(run.diagnostics)};
  const Progress progress("Pooling the studies");
  return analyse_table(std::move(run.value->input), run.value->options, std::move(run.diagnostics));
}

// The text, and what was asked about a region.
std::string text_of(const Analysis& analysis, const Options& options) {
  const TextStyle style = text_style(options);
  std::string text = render_text(analysis, style);
  if (analysis.region) text += '\n' + render_text(*analysis.region, style);
  return text;
}

// The question about a region, answered beside the analysis.
Outcome<Analysis> with_region(Outcome<Analysis> outcome, const Options& options) {
  if (!outcome.ok() || !options.region) return outcome;
  Analysis& analysis = *outcome.value;
  auto region = weigh_region(analysis.result, analysis.options.priors, analysis.studies,
                             {*options.region, options.threshold});
  if (!region.ok()) return {std::nullopt, std::move(region.diagnostics)};
  analysis.region = std::move(*region.value);
  return outcome;
}

}  // namespace

Exit run_pool(const Options& options) {
  const std::array names = {options.svg, options.json};
  Outputs outputs(names, options.file);
  if (!outputs.ok()) return Exit::file_trouble;

  const Outcome<Analysis> outcome = with_region(analyse(options), options);
  if (!outcome.ok()) {
    say(outcome.diagnostics);
    return outcome.diagnostics.empty() ? Exit::file_trouble : Exit::unusable_data;
  }
  const Analysis& analysis = *outcome.value;
  if (outputs.at(0).wanted()) outputs.at(0).write(render_svg(figure::forest(analysis)));
  if (outputs.at(1).wanted()) {
    write_json(analysis, [&](std::string_view bytes) { outputs.at(1).write(bytes); });
  }
  return finish(
      outputs, options, [&] { return text_of(analysis, options); }, analysis.result.accurate,
      analysis.findings);
}

}  // namespace steelyard::cli
