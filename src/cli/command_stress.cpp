// steelyard stress: the pooled answer again under changes.
#include <array>

#include "messages.hpp"
#include "progress.hpp"
#include "run.hpp"
#include "steelyard/json.hpp"
#include "steelyard/render.hpp"
#include "terminal.hpp"

namespace steelyard::cli {

Exit run_stress(const Options& options) {
  const std::array names = {options.json};
  Outputs outputs(names, options.file);
  if (!outputs.ok()) return Exit::file_trouble;
  auto gathered = gathered_rows(options);
  if (!gathered.rows) return gathered.exit;
  const auto outcome = [&] {
    const Progress progress("Pooling again under changes");
    StressOptions stress;
    stress.pool = options.analysis.pool;
    stress.verdict = options.verdict;
    stress.threads = options.threads;
    return analyse_stress(std::move(*gathered.rows), stress, options.by);
  }();
  if (!outcome.ok()) {
    say(outcome.diagnostics);
    return Exit::unusable_data;
  }
  const StressAnalysis& analysis = *outcome.value;
  if (outputs.at(0).wanted()) {
    write_json(analysis, [&](std::string_view bytes) { outputs.at(0).write(bytes); });
  }
  return finish(
      outputs, options, [&] { return render_text(analysis, text_style(options)); }, analysis.result.accurate,
      analysis.rows.findings);
}

}  // namespace steelyard::cli
