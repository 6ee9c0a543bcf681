// steelyard weigh: each study on its own.
#include <array>

#include "messages.hpp"
#include "run.hpp"
#include "steelyard/json.hpp"
#include "steelyard/render.hpp"
#include "terminal.hpp"

namespace steelyard::cli {

namespace {

WeighOptions weigh_options(const Options& options) {
  WeighOptions weigh;
  weigh.level = options.analysis.pool.level;
  weigh.expected = options.expected;
  if (options.region) weigh.region = RegionOptions{*options.region, options.threshold};
  return weigh;
}

}  // namespace

Exit run_weigh(const Options& options) {
  const std::array names = {options.json};
  Outputs outputs(names, options.file);
  if (!outputs.ok()) return Exit::file_trouble;
  Options given = options;
  // Only the effect prior is used, so it is the only one that must be stated for other units.
  given.analysis.explicit_priors = options.effect_prior_given;
  auto gathered = gathered_rows(given);
  if (!gathered.rows) return gathered.exit;
  const auto outcome = analyse_weigh(std::move(*gathered.rows), weigh_options(options));
  if (!outcome.ok()) {
    say(outcome.diagnostics);
    return Exit::unusable_data;
  }
  const WeighAnalysis& analysis = *outcome.value;
  if (outputs.at(0).wanted()) {
    write_json(analysis, [&](std::string_view bytes) { outputs.at(0).write(bytes); });
  }
  return finish(
      outputs, options, [&] { return render_text(analysis, text_style(options)); }, analysis.result.accurate,
      analysis.rows.findings);
}

}  // namespace steelyard::cli
