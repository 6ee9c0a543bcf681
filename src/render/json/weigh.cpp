// The document of `weigh`.
#include <utility>

#include "render/firmness_words.hpp"
#include "render/json/documents.hpp"
#include "render/json/rows.hpp"

namespace steelyard::json {

namespace {

struct RowView {
  const Study* study;
  const Weighing* weighing;
  const std::vector<FindingView>* findings;
};

using W = const Weighing&;

Part<Weighing> factor(std::optional<LogBayesFactor> Weighing::*member) {
  return inside<Weighing>(bayes_factor_part(),
                          [member](W w) -> const std::optional<LogBayesFactor>& { return w.*member; });
}

Part<Weighing> translated(std::optional<Translated> Weighing::*member) {
  const Part<Translated> part = object<Translated>(
      "translated", {{"median", "posterior median", number<Translated>(&Translated::median)},
                     {"lower", "lower end of the interval", number<Translated>(&Translated::lower)},
                     {"upper", "upper end", number<Translated>(&Translated::upper)}});
  return inside<Weighing>(part, [member](W w) -> const std::optional<Translated>& { return w.*member; });
}

Part<Weighing> bound_part() {
  return object<Weighing>("likelihood_bound", {{"log_bf", "no prior can make more of the study",
                                                number<Weighing>([](W w) { return finite(w.bound.log_bf); })},
                                               {"effect", "where it is reached",
                                                number<Weighing>([](W w) { return w.bound.effect; })}});
}

Part<Weighing> rounding_part() {
  const Part<LogRange> part =
      object<LogRange>("log_range", {{"low", "null: without end", number<LogRange>(&LogRange::low)},
                                     {"high", "null: without end", number<LogRange>(&LogRange::high)}});
  return inside<Weighing>(part, &Weighing::rounding);
}

std::vector<Field<Weighing>> weighing_fields() {
  return {
      {"log_bf", "natural log Bayes factor: the effect prior, cut to its direction, against no effect",
       number<Weighing>([](W w) { return finite(w.bf.log_bf); })},
      {"log_bf_abs_error", "upper bound of its numerical error",
       number<Weighing>([](W w) { return finite(w.bf.abs_error); })},
      {"either", "the same prior, not cut", factor(&Weighing::either)},
      {"greater", "cut to positive effects", factor(&Weighing::greater)},
      {"less", "cut to negative effects", factor(&Weighing::less)},
      {"posterior", "the effect under the effect prior", inside<Weighing>(summary_part(), &Weighing::effect)},
      {"rounding", "range of log_bf over what the printed digits allow", rounding_part()},
      {"sceptic", "with a prior that doubts the expected effect", factor(&Weighing::sceptic)},
      {"enthusiast", "with a prior that expects it", factor(&Weighing::enthusiast)},
      {"enthusiast_side", "what the enthusiast expects: greater or less",
       text_or_null<Weighing>([](W w) { return std::string_view(w.enthusiast_side); })},
      {"turning_factor", "factor on the prior's width at which the evidence turns",
       number<Weighing>(&Weighing::turning_factor)},
      {"turning_width", "how wide the prior then is", number<Weighing>(&Weighing::turning_width)},
      {"bound", "the largest likelihood of any effect against none",
       inside<Weighing>(bound_part(), [](W w) -> W { return w; })},
      {"p", "two-sided p", number<Weighing>(&Weighing::p)},
      {"log_p_bound", "log of 1/(-e p log p)", number<Weighing>(&Weighing::log_p_bound)},
      {"superiority", "chance that a member of group 1 beats one of group 2",
       translated(&Weighing::superiority)},
      {"raw", "the effect in raw units", translated(&Weighing::raw)},
      {"region", "what was asked about a region", inside<Weighing>(region_part(), &Weighing::region)},
      {"weigh_cautions", "what a reader must know beside these numbers",
       array<Weighing>(diagnostic_part(), [](W w) -> const std::vector<Diagnostic>& { return w.cautions; })}};
}

Part<RowView> row_part() {
  using V = const RowView&;
  auto fields = study_fields<RowView>([](V v) -> const Study& { return *v.study; });
  for (const Field<Weighing>& field : weighing_fields()) {
    fields.push_back(
        {field.name, field.meaning, inside<RowView>(field.part, [](V v) -> W { return *v.weighing; })});
  }
  fields.push_back(
      {"findings", "what the audit found in this row",
       array<RowView>(finding_part(), [](V v) -> const std::vector<FindingView>& { return *v.findings; })});
  return object<RowView>("weighed_study", std::move(fields));
}

Part<WeighSpread> spread_part() {
  using S = WeighSpread;
  return object<S>("weigh_spread",
                   {{"count", "rows", integer<S>(&S::count)},
                    {"least", "decibans", number<S>(&S::least)},
                    {"lower_quartile", "decibans", number<S>(&S::lower_quartile)},
                    {"median", "decibans", number<S>(&S::median)},
                    {"upper_quartile", "decibans", number<S>(&S::upper_quartile)},
                    {"most", "decibans", number<S>(&S::most)},
                    {"for_effect", "rows above 0", integer<S>(&S::for_effect)},
                    {"for_none", "rows below 0", integer<S>(&S::for_none)},
                    {"clearly_for_effect", "rows at +10 or more", integer<S>(&S::clearly_for_effect)},
                    {"clearly_for_none", "rows at -10 or less", integer<S>(&S::clearly_for_none)}});
}

struct View {
  const WeighAnalysis* analysis;
  std::vector<std::vector<FindingView>> findings;
};

const Part<View>& weigh_part() {
  using V = const View&;
  static const Part<View> part = object<View>(
      "", gathered_fields<View>("weigh", [](V v) -> const Gathered& { return v.analysis->rows; }) +
              std::vector<Field<View>>{
                  {"verdict", "the answer in a sentence",
                   text<View>([](V v) { return render::weigh_verdict(*v.analysis); })},
                  {"accurate", "false when an integral missed its promised accuracy",
                   boolean<View>([](V v) { return v.analysis->result.accurate; })},
                  {"spread", "how the evidence is distributed over the rows",
                   inside<View>(spread_part(),
                                [](V v) -> const WeighSpread& { return v.analysis->result.spread; })},
                  {"studies", "each study on its own",
                   array<View>(row_part(),
                               [](V v) {
                                 std::vector<RowView> rows;
                                 for (const Weighing& w : v.analysis->result.rows) {
                                   const Study& s = v.analysis->rows.studies[w.study];
                                   rows.push_back({&s, &w, &v.findings[s.row]});
                                 }
                                 return rows;
                               })},
                  {"cautions", "what a reader must know beside the numbers",
                   array<View>(diagnostic_part(), [](V v) -> const std::vector<Diagnostic>& {
                     return v.analysis->rows.cautions;
                   })}});
  return part;
}

}  // namespace

const Shape& weigh_shape() { return weigh_part().shape; }

}  // namespace steelyard::json

namespace steelyard {

void write_json(const WeighAnalysis& analysis, const Sink& sink) {
  json::Writer writer(sink);
  json::weigh_part().write(
      writer, {&analysis, json::findings_by_row(analysis.rows.input.table, analysis.rows.findings)});
  writer.finish();
}

}  // namespace steelyard
