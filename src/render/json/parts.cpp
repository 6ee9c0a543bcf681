#include "render/json/parts.hpp"

#include <cmath>

#include "render/json/rows.hpp"

namespace steelyard::json {

std::optional<double> finite(double value) {
  return std::isfinite(value) ? std::optional<double>(value) : std::nullopt;
}

namespace {

// A row with the names of its columns.
struct RowView {
  const Table* table;
  const Row* row;
};

Part<RowView> row_part() {
  return object<RowView>(
      "row",
      {{"line", "line in the file, from 1", integer<RowView>([](const RowView& v) { return v.row->line; })},
       {"cells", "the cells that are not empty, as they stand in the file, by column",
        text_map<RowView>([](const RowView& v, auto put) {
          for (std::size_t i = 0; i < v.row->cells.size() && i < v.table->names.size(); ++i) {
            if (!v.row->cells[i].empty()) put(v.table->names[i], v.row->cells[i].text);
          }
        })}});
}

// Made one at a time while the array is written: a long table needs no second list.
class RowRange {
 public:
  explicit RowRange(const Table& table) : table_(&table) {}
  class Iterator {
   public:
    Iterator(const Table* table, const Row* row) : view_{table, row} {}
    const RowView& operator*() const { return view_; }
    Iterator& operator++() {
      ++view_.row;
      return *this;
    }
    bool operator!=(const Iterator& other) const { return view_.row != other.view_.row; }

   private:
    RowView view_;
  };
  [[nodiscard]] Iterator begin() const { return {table_, table_->rows.data()}; }
  [[nodiscard]] Iterator end() const { return {table_, table_->rows.data() + table_->rows.size()}; }

 private:
  const Table* table_;
};

}  // namespace

Part<Input> input_part() {
  return object<Input>(
      "input", {{"file", "as named on the command line; \"-\" is standard input", text<Input>(&Input::file)},
                {"sha256", "checksum of the bytes as read", text<Input>(&Input::sha256)},
                {"decimal_comma", "true when the file writes one and a half as 1,5",
                 boolean<Input>([](const Input& input) { return input.table.style.decimal_comma; })},
                {"columns", "names of the columns, in the order of the file",
                 array<Input>(text<std::string>([](const std::string& s) { return std::string_view(s); }),
                              [](const Input& input) -> const std::vector<std::string>& {
                                return input.table.names;
                              })},
                {"rows", "all rows of the file, those left out included",
                 array<Input>(row_part(), [](const Input& input) { return RowRange(input.table); })}});
}

Part<Priors> priors_part() {
  using P = const Priors&;
  const auto weight = [](Model model) {
    return number<Priors>([model](P p) { return p.model[static_cast<std::size_t>(model)]; });
  };
  return object<Priors>(
      "priors",
      {{"effect", "prior of the mean effect, in the grammar of docs/model.md",
        text<Priors>([](P p) { return to_text(p.effect); })},
       {"direction", "mean effects that the prior allows",
        word<Priors>({"either", "greater", "less"}, [](P p) { return to_text(p.effect.direction); })},
       {"spread", "prior of the spread (SD of effects among studies)",
        text<Priors>([](P p) { return to_text(p.spread); })},
       {"models", "prior probabilities of the four models",
        object<Priors>(
            "model_priors",
            {{"fixed_null", "no effect, no spread", weight(Model::fixed_null)},
             {"fixed_effect", "the same effect everywhere", weight(Model::fixed_effect)},
             {"random_null", "no mean effect, but effects vary", weight(Model::random_null)},
             {"random_effect", "a mean effect, and effects vary", weight(Model::random_effect)}})}});
}

Part<Summary> summary_part() {
  return object<Summary>(
      "summary", {{"mean", "posterior mean; null where it does not exist or is not identified",
                   number<Summary>(&Summary::mean)},
                  {"sd", "posterior standard deviation, likewise", number<Summary>(&Summary::sd)},
                  {"median", "posterior median", number<Summary>(&Summary::median)},
                  {"lower", "lower end of the central credible interval", number<Summary>(&Summary::lower)},
                  {"upper", "its upper end", number<Summary>(&Summary::upper)},
                  {"reason", "why a number is null, in a sentence",
                   text_or_null<Summary>([](const Summary& s) { return std::string_view(s.reason); })}});
}

Part<LogBayesFactor> bayes_factor_part() {
  using B = const LogBayesFactor&;
  return object<LogBayesFactor>("log_bayes_factor",
                                {{"log_bf", "natural log of the Bayes factor",
                                  number<LogBayesFactor>([](B b) { return finite(b.log_bf); })},
                                 {"abs_error", "upper bound of its numerical error",
                                  number<LogBayesFactor>([](B b) { return finite(b.abs_error); })}});
}

Part<Diagnostic> diagnostic_part() {
  using D = const Diagnostic&;
  const auto place = [](std::size_t Place::*member) {
    return integer<Diagnostic>([member](D d) {
      const std::size_t value = d.where.*member;
      return value == 0 ? std::nullopt : std::optional<unsigned long long>(value);
    });
  };
  return object<Diagnostic>("message",
                            {{"code", "stable name of the rule", text<Diagnostic>(&Diagnostic::code)},
                             {"line", "line in the file, where one is meant", place(&Place::line)},
                             {"column", "column in that line, in characters", place(&Place::column)},
                             {"text", "what is the matter", text<Diagnostic>(&Diagnostic::what)},
                             {"remedy", "what to do about it", text<Diagnostic>(&Diagnostic::remedy)}});
}

Part<FindingView> finding_part() {
  using F = const FindingView&;
  return object<FindingView>(
      "finding",
      {{"rule", "the rule of docs/audit.md", text<FindingView>([](F f) { return f.finding->rule; })},
       {"grade", "how serious it is",
        word<FindingView>(
            {std::string(to_text(Grade::worth_a_look)), std::string(to_text(Grade::changes_the_verdict)),
             std::string(to_text(Grade::impossible))},
            [](F f) { return to_text(f.finding->grade); })},
       {"study", "label of the row",
        text<FindingView>([](F f) { return row_label(*f.table, f.finding->row); })},
       {"line", "line of the row",
        integer<FindingView>([](F f) { return f.table->rows[f.finding->row].line; })},
       {"others", "lines of further rows that are concerned",
        array<FindingView>(integer<std::size_t>([](std::size_t line) { return line; }),
                           [](F f) {
                             std::vector<std::size_t> lines;
                             for (const std::size_t row : f.finding->others)
                               lines.push_back(f.table->rows[row].line);
                             return lines;
                           })},
       {"text", "what does not agree, with the numbers",
        text<FindingView>([](F f) { return f.finding->what; })},
       {"remedy", "what to look at in the paper", text<FindingView>([](F f) { return f.finding->remedy; })}});
}

std::vector<std::vector<FindingView>> findings_by_row(const Table& table, std::span<const Finding> findings) {
  std::vector<std::vector<FindingView>> by_row(table.rows.size());
  for (const Finding& finding : findings) by_row[finding.row].push_back({&finding, &table});
  return by_row;
}

Part<Study> effect_part() {
  using S = const Study&;
  return object<Study>(
      "effect_size",
      {{"d", "Cohen's d, or the estimate itself in another metric",
        number<Study>([](S s) { return s.effect.d; })},
       {"g", "Hedges' g, with the exact factor", number<Study>([](S s) { return s.effect.g; })},
       {"se", "standard error of g, or of the estimate", number<Study>([](S s) { return s.effect.se; })}});
}

Part<Study> bands_part() {
  const Part<Interval> interval = object<Interval>(
      "band", {{"low", "lower end", number<Interval>([](const Interval& i) { return finite(i.low); })},
               {"high", "upper end", number<Interval>([](const Interval& i) { return finite(i.high); })}});
  return array<Study>(interval, [](const Study& study) {
    const auto* band = std::get_if<BandT>(&study.evidence);
    return band != nullptr ? band->bands : std::vector<Interval>();
  });
}

Part<Study> alternatives_part() {
  const Part<AlternativeRoute> route = object<AlternativeRoute>(
      "alternative", {{"route", "id of the route", text<AlternativeRoute>(&AlternativeRoute::route)},
                      {"t", "the t value it gives",
                       number<AlternativeRoute>([](const AlternativeRoute& a) { return finite(a.t); })}});
  return array<Study>(route,
                      [](const Study& s) -> const std::vector<AlternativeRoute>& { return s.alternatives; });
}

std::string_view design_word(Design design) {
  switch (design) {
    case Design::two_groups:
      return "two_groups";
    case Design::one_sample:
      return "one_sample";
    case Design::paired:
      return "paired";
  }
  return "";
}

Part<AnalysisOptions> analysis_options_part() {
  using O = const AnalysisOptions&;
  return object<AnalysisOptions>(
      "options",
      {{"level", "of the credible intervals", number<AnalysisOptions>([](O o) { return o.pool.level; })},
       {"alpha", "what \"not significant\" means where the file does not say",
        number<AnalysisOptions>([](O o) { return o.rebuild.alpha; })},
       {"explicit_priors", "true when both priors were stated by the user",
        boolean<AnalysisOptions>(&AnalysisOptions::explicit_priors)},
       {"without", "studies to leave out, as named by the user",
        array<AnalysisOptions>(text<std::string>([](const std::string& s) { return std::string_view(s); }),
                               [](O o) -> const std::vector<std::string>& { return o.without; })}});
}

namespace {

Part<RegionMass> mass_part() {
  return object<RegionMass>(
      "region_mass",
      {{"inside", "probability in the region, given an effect", number<RegionMass>(&RegionMass::inside)},
       {"inside_all_models", "the same with the models without an effect",
        number<RegionMass>(&RegionMass::inside_all_models)}});
}

}  // namespace

Part<RegionResult> region_part() {
  return object<RegionResult>(
      "region",
      {{"low", "lower end of the region",
        number<RegionResult>([](const RegionResult& r) { return r.asked.region.low; })},
       {"high", "upper end", number<RegionResult>([](const RegionResult& r) { return r.asked.region.high; })},
       {"negligible", "evidence for an effect inside against outside",
        inside<RegionResult>(bayes_factor_part(), &RegionResult::negligible)},
       {"negligible_limit", "where the evidence is only bounded: its log is beyond this",
        number<RegionResult>(&RegionResult::negligible_limit)},
       {"reason", "why a number is null",
        text_or_null<RegionResult>([](const RegionResult& r) { return std::string_view(r.reason); })},
       {"prior_inside", "prior probability of the region", number<RegionResult>(&RegionResult::prior_inside)},
       {"mean_effect", "of the mean effect", inside<RegionResult>(mass_part(), &RegionResult::mean_effect)},
       {"new_study", "of the effect in a new study",
        inside<RegionResult>(mass_part(), &RegionResult::new_study)},
       {"positive", "probability of a positive mean effect", number<RegionResult>(&RegionResult::positive)},
       {"log_sign_odds", "log odds of a positive against a negative effect",
        number<RegionResult>(&RegionResult::log_sign_odds)},
       {"threshold", "the threshold asked for",
        number<RegionResult>([](const RegionResult& r) { return r.asked.threshold; })},
       {"above_threshold", "probability that the effect in a new study exceeds it",
        number<RegionResult>(&RegionResult::above_threshold)},
       {"above_threshold_all_models", "the same with the models without an effect",
        number<RegionResult>(&RegionResult::above_threshold_all_models)}});
}

}  // namespace steelyard::json
