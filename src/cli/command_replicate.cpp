// steelyard replicate: originals against their replications.
#include <array>

#include "messages.hpp"
#include "progress.hpp"
#include "run.hpp"
#include "steelyard/json.hpp"
#include "steelyard/render.hpp"
#include "terminal.hpp"

namespace steelyard::cli {

Exit run_replicate(const Options& options) {
  const std::array names = {options.json};
  Outputs outputs(names, options.file);
  if (!outputs.ok()) return Exit::file_trouble;
  auto gathered = gathered_rows(options);
  if (!gathered.rows) return gathered.exit;
  const auto outcome = [&] {
    const Progress progress("Setting replications against originals");
    ReplicateOptions replicate;
    replicate.level = options.analysis.pool.level;
    replicate.alpha = options.selection_alpha;
    return analyse_replicate(std::move(*gathered.rows), replicate);
  }();
  if (!outcome.ok()) {
    say(outcome.diagnostics);
    return Exit::unusable_data;
  }
  const ReplicateAnalysis& analysis = *outcome.value;
  if (outputs.at(0).wanted()) {
    write_json(analysis, [&](std::string_view bytes) { outputs.at(0).write(bytes); });
  }
  return finish(
      outputs, options, [&] { return render_text(analysis, text_style(options)); }, analysis.result.accurate,
      analysis.rows.findings);
}

}  // namespace steelyard::cli
