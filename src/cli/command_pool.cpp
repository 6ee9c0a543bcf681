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
Outcome<RecordedRun> gather(const std::string& text, Options options) {
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
    return text ? gather(*text, options) : Outcome<RecordedRun>{};
  }();  // the text itself is not needed any longer
  if (!run.ok()) return {std::nullopt, std::move(run.diagnostics)};
  const Progress progress("Pooling the studies");
  return analyse_table(std::move(run.value->input), run.value->options, std::move(run.diagnostics));
}

}  // namespace

Exit run_pool(const Options& options) {
  const std::array names = {options.svg, options.json};
  Outputs outputs(names, options.file);
  if (!outputs.ok()) return Exit::file_trouble;

  const Outcome<Analysis> outcome = analyse(options);
  if (!outcome.ok()) {
    say(outcome.diagnostics);
    return outcome.diagnostics.empty() ? Exit::file_trouble : Exit::unusable_data;
  }
  const Analysis& analysis = *outcome.value;
  if (outputs.at(0).wanted()) outputs.at(0).write(render_svg(figure::forest(analysis)));
  if (outputs.at(1).wanted()) {
    write_json(analysis, [&](std::string_view bytes) { outputs.at(1).write(bytes); });
  }
  if (!outputs.commit()) return Exit::file_trouble;
  if (!outputs.takes_standard_output()) {
    const Exit printed = print(render_text(analysis, text_style(options)));
    if (printed != Exit::done) return printed;
  }
  if (!analysis.result.accurate) {
    say_error("The promised accuracy was not reached; the results say by how much it may be missed.");
    return Exit::not_satisfied;
  }
  return fails_on(options, analysis.findings) ? Exit::not_satisfied : Exit::done;
}

}  // namespace steelyard::cli
