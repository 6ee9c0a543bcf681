// steelyard check: how each row is read, and what does not agree.
#include <array>

#include "messages.hpp"
#include "progress.hpp"
#include "run.hpp"
#include "steelyard/json.hpp"
#include "steelyard/render.hpp"
#include "terminal.hpp"

namespace steelyard::cli {

Exit run_check(const Options& options) {
  const std::array names = {options.json};
  Outputs outputs(names, options.file);
  if (!outputs.ok()) return Exit::file_trouble;

  const auto text = input_text(options);
  if (!text) return Exit::file_trouble;
  const auto outcome = [&] {
    const Progress progress("Checking the rows");
    return analyse_check(*text, options.file, {options.analysis.rebuild, options.analysis.without});
  }();
  if (!outcome.ok()) {
    say(outcome.diagnostics);
    return Exit::unusable_data;
  }
  const Check& check = *outcome.value;
  if (outputs.at(0).wanted()) {
    write_json(check, [&](std::string_view bytes) { outputs.at(0).write(bytes); });
  }
  if (!outputs.commit()) return Exit::file_trouble;
  if (!outputs.takes_standard_output()) {
    const Exit printed = print(render_text(check, text_style(options)));
    if (printed != Exit::done) return printed;
  }
  say(check.problems);
  if (!check.problems.empty()) return Exit::unusable_data;
  return fails_on(options, check.findings) ? Exit::not_satisfied : Exit::done;
}

}  // namespace steelyard::cli
