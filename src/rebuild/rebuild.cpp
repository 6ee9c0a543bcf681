// One row: check its cells, try the routes, keep the best and remember the others.
#include "steelyard/rebuild.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <map>
#include <utility>

#include "rebuild/check_cells.hpp"
#include "rebuild/corners.hpp"
#include "rebuild/effect_size.hpp"
#include "rebuild/missing.hpp"
#include "rebuild/row.hpp"
#include "rebuild/sign.hpp"

namespace steelyard {

namespace rebuilding {

namespace {

// Evidence that says more goes first: a signed t, a signed estimate, an open sign, a band.
int grade(const Evidence& evidence) {
  if (std::holds_alternative<BandT>(evidence)) return 3;
  if (is_folded(evidence)) return 2;
  return std::holds_alternative<NormalEstimate>(evidence) ? 1 : 0;
}

bool metric_fits(const Numbers& x, const Solution& solution) {
  return !x.present(Col::metric) || x.facts().text(Col::metric) == solution.metric;
}

void turn_round(Evidence& evidence) {
  if (auto* exact = std::get_if<ExactT>(&evidence)) {
    if (!exact->folded) exact->t = -exact->t;
  } else if (auto* normal = std::get_if<NormalEstimate>(&evidence)) {
    if (!normal->folded) normal->estimate = -normal->estimate;
  } else if (auto* band = std::get_if<BandT>(&evidence)) {
    std::reverse(band->bands.begin(), band->bands.end());
    for (Interval& piece : band->bands) piece = {-piece.high, -piece.low};
  }
}

std::string describe(const Evidence& evidence) {
  if (const auto* exact = std::get_if<ExactT>(&evidence)) {
    return fmt::format("{} = {:.4g}, df {:g}, effective n {:.4g}", exact->folded ? "|t|" : "t", exact->t,
                       exact->df, exact->n_effective);
  }
  if (const auto* normal = std::get_if<NormalEstimate>(&evidence)) {
    return fmt::format("{} {:.4g}, SE {:.4g}", normal->folded ? "|estimate|" : "estimate", normal->estimate,
                       normal->se);
  }
  const auto& band = std::get<BandT>(evidence);
  std::string text = "t";
  for (const Interval& piece : band.bands) {
    text += fmt::format("{} {:.4g} to {:.4g}", text.size() == 1 ? " from" : " or", piece.low, piece.high);
  }
  return text + fmt::format(", df {:g}, effective n {:.4g}", band.df, band.n_effective);
}

std::string explain(const Numbers& x, const Candidate& candidate, const Evidence& evidence) {
  std::string cells;
  for (std::size_t i = 0; i < col_count; ++i) {
    if (!candidate.used.test(i)) continue;
    const std::string_view text = x.facts().text(static_cast<Col>(i));
    if (text.empty()) continue;
    if (!cells.empty()) cells += ", ";
    cells += fmt::format("{} = {}", col_names[i], text);
  }
  return fmt::format("{} ({}): {}.", candidate.route->says, cells, describe(evidence));
}

void add_cautions_of_size(Numbers& x, const Study& study, std::vector<Diagnostic>& cautions) {
  const auto t = t_value(study);
  if (!t) return;
  const double d = study.effect.d.value_or(0.0);
  if (std::abs(*t) < 20.0 && std::abs(d) < 4.0) return;
  const Col where = x.has(Col::t) ? Col::t : x.has(Col::f) ? Col::f : Col::study;
  cautions.push_back({Severity::caution, "extreme-t", x.facts().place(where),
                      fmt::format("t = {:.4g} (d = {:.3g}) is far beyond what studies usually find.", *t, d),
                      "Check the decimal point, and that no SE was taken for an SD."});
}

// The SD that turns d into a raw difference, where the row prints a difference but no SD.
std::optional<double> raw_sd_of(Numbers& x, const Solution& solution) {
  if (solution.raw_sd) return solution.raw_sd;
  const auto* exact = std::get_if<ExactT>(&solution.evidence);
  const bool means = x.has_all({Col::mean1, Col::mean2});
  if (exact == nullptr || exact->t == 0.0 || !(x.has(Col::mean_diff) || means)) return std::nullopt;
  const double difference = x.has(Col::mean_diff) ? x[Col::mean_diff] : x[Col::mean1] - x[Col::mean2];
  const double sd = std::abs(difference / exact->t) * std::sqrt(exact->n_effective);
  return sd > 0.0 ? std::optional(sd) : std::nullopt;
}

std::string label_of(const Facts& facts, std::size_t row) {
  const std::string_view text = facts.text(Col::study);
  return text.empty() ? fmt::format("row {}", row + 1) : std::string(text);
}

void add_unique(std::vector<Diagnostic>& to, std::vector<Diagnostic>&& from) {
  for (Diagnostic& item : from) {
    const bool known = std::any_of(to.begin(), to.end(), [&](const Diagnostic& d) {
      return d.code == item.code && d.what == item.what;
    });
    if (!known) to.push_back(std::move(item));
  }
}

std::vector<Diagnostic> why_not(Numbers& x) {
  std::vector<Diagnostic> reasons;
  add_unique(reasons, std::move(x.refusals()));
  if (reasons.empty()) reasons.push_back(what_is_missing(x));
  return reasons;
}

Diagnostic wrong_metric(const Numbers& x, const std::vector<Candidate>& candidates) {
  return {Severity::error, "metric-does-not-fit", x.facts().place(Col::metric),
          fmt::format("The metric is {}, but this row can only be rebuilt as {}.",
                      x.facts().text(Col::metric), candidates.front().solution.metric),
          "Give estimate and se in that metric, or leave `metric` empty."};
}

Study make_study(Numbers& x, std::vector<Candidate>& candidates, std::size_t best, std::size_t row) {
  Candidate& chosen = candidates[best];
  Study study;
  study.label = label_of(x.facts(), row);
  study.row = row;
  study.line = x.facts().line();
  study.route = std::string(chosen.route->info.id);
  study.design = chosen.solution.design;
  study.metric = chosen.solution.metric;
  study.role = x.facts().word(Col::role);
  if (x.has(Col::year)) study.year = x.printed(Col::year).value;
  study.raw_sd = raw_sd_of(x, chosen.solution);
  study.evidence = chosen.solution.evidence;
  Corners ends = corners(*chosen.route, x, chosen.solution);
  study.at_low = std::move(ends.low);
  study.at_high = std::move(ends.high);
  for (std::size_t i = 0; i < candidates.size(); ++i) {
    if (i == best) continue;
    if (const auto* exact = std::get_if<ExactT>(&candidates[i].solution.evidence)) {
      study.alternatives.push_back({std::string(candidates[i].route->info.id), exact->t});
    }
  }
  if (reversed(x)) {
    turn_round(study.evidence);
    std::swap(study.at_low, study.at_high);
    if (study.at_low) turn_round(*study.at_low);
    if (study.at_high) turn_round(*study.at_high);
    for (AlternativeRoute& other : study.alternatives) other.t = -other.t;
    chosen.used.set(index(Col::reverse));
  }
  study.effect = effect_size(study.evidence, study.design, chosen.solution.people);
  study.how = explain(x, chosen, study.evidence);
  return study;
}

}  // namespace

std::vector<Candidate> candidates_of(Numbers& x) {
  std::vector<Candidate> found;
  for (const Route& route : registry()) {
    if (!route.applies(x)) continue;
    x.forget();
    x.cautions().clear();
    auto solution = route.solve(x);
    if (!solution) continue;
    found.push_back({&route, std::move(*solution), x.used(), std::move(x.cautions())});
    x.cautions().clear();
  }
  return found;
}

Outcome<Study> rebuild_row(const Table& table, const Header& header, std::size_t row,
                           const RebuildOptions& options) {
  Outcome<Study> outcome;
  const Facts facts(table, header, table.rows[row]);
  outcome.diagnostics = check_cells(facts);
  const bool failed = std::any_of(outcome.diagnostics.begin(), outcome.diagnostics.end(),
                                  [](const Diagnostic& d) { return d.severity == Severity::error; });
  if (failed) return outcome;

  Numbers x(facts, options);
  std::vector<Candidate> candidates = candidates_of(x);
  if (candidates.empty()) {
    for (Diagnostic& reason : why_not(x)) outcome.diagnostics.push_back(std::move(reason));
    return outcome;
  }
  std::size_t best = candidates.size();
  for (std::size_t i = 0; i < candidates.size(); ++i) {
    if (!metric_fits(x, candidates[i].solution)) continue;
    if (best == candidates.size() ||
        grade(candidates[i].solution.evidence) < grade(candidates[best].solution.evidence)) {
      best = i;
    }
  }
  if (best == candidates.size()) {
    outcome.diagnostics.push_back(wrong_metric(x, candidates));
    return outcome;
  }
  std::vector<Diagnostic> cautions = candidates[best].cautions;
  x.recall(candidates[best].used);
  Study study = make_study(x, candidates, best, row);
  add_cautions_of_size(x, study, cautions);
  for (Diagnostic& caution : cautions) {
    const bool known =
        std::find(study.cautions.begin(), study.cautions.end(), caution.what) != study.cautions.end();
    if (known) continue;
    study.cautions.push_back(caution.what);
    outcome.diagnostics.push_back(std::move(caution));
  }
  outcome.value = std::move(study);
  return outcome;
}

}  // namespace rebuilding

namespace {

void say_twice(const Table& table, const Study& first, const Study& again, std::vector<Diagnostic>& to) {
  const Cell* cell = table.cell(table.rows[again.row], "study");
  const Place where{table.file, cell == nullptr ? again.line : cell->line,
                    cell == nullptr ? 1 : cell->column};
  to.push_back({Severity::caution, "duplicate-label", where,
                fmt::format("The label \"{}\" stands in line {} too.", again.label, first.line),
                "If both rows come from the same people, their effects are not independent: keep one, or "
                "merge them."});
}

}  // namespace

Outcome<Study> rebuild(const Table& table, const Row& row, const RebuildOptions& options) {
  const rebuilding::Header header(table);
  for (std::size_t i = 0; i < table.rows.size(); ++i) {
    if (&table.rows[i] == &row) return rebuilding::rebuild_row(table, header, i, options);
  }
  Table alone{table.file, table.names, {row}, table.style};
  return rebuilding::rebuild_row(alone, header, 0, options);
}

Outcome<std::vector<Study>> rebuild_all(const Table& table, const RebuildOptions& options) {
  Outcome<std::vector<Study>> outcome;
  const rebuilding::Header header(table);
  std::vector<Study> studies;
  studies.reserve(table.rows.size());
  std::map<std::string, std::size_t> seen;
  bool complete = true;
  for (std::size_t i = 0; i < table.rows.size(); ++i) {
    Outcome<Study> one = rebuilding::rebuild_row(table, header, i, options);
    for (Diagnostic& d : one.diagnostics) outcome.diagnostics.push_back(std::move(d));
    complete = complete && one.ok();
    if (!one.ok()) continue;
    studies.push_back(std::move(*one.value));
    const auto [where, is_new] = seen.emplace(studies.back().label, studies.size() - 1);
    if (!is_new) say_twice(table, studies[where->second], studies.back(), outcome.diagnostics);
  }
  if (complete) outcome.value = std::move(studies);
  return outcome;
}

}  // namespace steelyard
