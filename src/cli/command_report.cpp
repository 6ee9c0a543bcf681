// steelyard report: the whole analysis as one file.
#include <array>

#include "again.hpp"
#include "messages.hpp"
#include "progress.hpp"
#include "run.hpp"
#include "steelyard/render.hpp"

namespace steelyard::cli {

namespace {

constexpr std::size_t most_stressed = 400;  // beyond it, pooling again takes too long for a report

// What pooling again gives, where there is something to change and it does not take too long.
void add_firmness(Report& report, const Gathered& rows, const Options& options) {
  if (rows.studies.size() < 2 || rows.studies.size() > most_stressed) return;
  StressOptions stress;
  stress.pool = rows.options.pool;
  stress.threads = options.threads;
  stress.shares = false;
  const auto outcome = analyse_stress(rows, stress, "");
  if (!outcome.ok()) return;
  report.cumulative = arrivals(*outcome.value);
  report.without = leave_one_outs(*outcome.value);
  report.prior_grid = prior_grid(*outcome.value);
}

Outcome<Report> make_report(Gathered rows, const Options& options) {
  const Progress progress("Writing the report");
  Report report;
  report.command = options.typed;
  add_firmness(report, rows, options);
  auto pooled = analyse_table(std::move(rows.input), rows.options, std::move(rows.cautions));
  if (!pooled.ok()) return {std::nullopt, std::move(pooled.diagnostics)};
  report.analysis = std::move(*pooled.value);
  return {std::move(report), {}};
}

}  // namespace

Exit run_report(const Options& options) {
  const bool nowhere = options.html.empty() && options.markdown.empty();
  const std::array<std::string, 2> names = {nowhere ? "-" : options.html, options.markdown};
  Outputs outputs(names, options.file);
  if (!outputs.ok()) return Exit::file_trouble;
  auto gathered = gathered_rows(options);
  if (!gathered.rows) return gathered.exit;
  const auto report = make_report(std::move(*gathered.rows), options);
  if (!report.ok()) {
    say(report.diagnostics);
    return Exit::unusable_data;
  }
  if (outputs.at(0).wanted()) outputs.at(0).write(render_html(*report.value));
  if (outputs.at(1).wanted()) outputs.at(1).write(render_markdown(*report.value));
  if (!outputs.commit()) return Exit::file_trouble;
  return report.value->analysis.result.accurate ? Exit::done : Exit::not_satisfied;
}

}  // namespace steelyard::cli
