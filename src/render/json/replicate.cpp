// The document of `replicate`.
#include <utility>

#include "render/firmness_words.hpp"
#include "render/json/documents.hpp"
#include "render/json/rows.hpp"

namespace steelyard::json {

namespace {

using V = const ReplicateAnalysis&;
using R = const ReplicateResult&;

Part<EvidenceTriple> triple_part() {
  using E = EvidenceTriple;
  return object<E>(
      "evidence_triple",
      {{"fixed", "the same effect everywhere", inside<E>(bayes_factor_part(), &E::fixed)},
       {"random", "effects vary", inside<E>(bayes_factor_part(), &E::random)},
       {"averaged", "both, by the model probabilities", inside<E>(bayes_factor_part(), &E::averaged)},
       {"reason", "why something is null",
        text_or_null<E>([](const E& e) { return std::string_view(e.reason); })}});
}

Part<ReplicateAnalysis> triple(EvidenceTriple ReplicateResult::*member) {
  return inside<ReplicateAnalysis>(triple_part(),
                                   [member](V v) -> const EvidenceTriple& { return v.result.*member; });
}

Part<ReplicateAnalysis> summary(Summary ReplicateResult::*member) {
  return inside<ReplicateAnalysis>(summary_part(),
                                   [member](V v) -> const Summary& { return v.result.*member; });
}

Part<Interval> interval_part() {
  return object<Interval>(
      "interval",
      {{"low", "lower end", number<Interval>([](const Interval& i) { return finite(i.low); })},
       {"high", "upper end", number<Interval>([](const Interval& i) { return finite(i.high); })}});
}

struct PredictionView {
  const Study* study;
  const Prediction* prediction;
};

Part<PredictionView> prediction_part() {
  using P = const PredictionView&;
  using Q = PredictionView;
  return object<Q>(
      "prediction",
      name_fields<Q>([](P p) -> const Study& { return *p.study; }) +
          std::vector<Field<Q>>{
              {"statistic", "central predictive interval of t (or estimate over its SE)",
               inside<Q>(interval_part(),
                         [](P p) -> const std::optional<Interval>& { return p.prediction->statistic; })},
              {"effect", "the same for the effect",
               inside<Q>(interval_part(),
                         [](P p) -> const std::optional<Interval>& { return p.prediction->effect; })},
              {"below", "predictive probability of a value up to the observed one",
               number<Q>([](P p) { return p.prediction->below; })},
              {"inside", "whether the replication lies in the interval",
               boolean<Q>([](P p) { return p.prediction->inside; })},
              {"band", "where only a band is known: its predictive probability",
               number<Q>([](P p) { return p.prediction->band; })},
              {"abs_error", "of the probabilities", number<Q>([](P p) { return p.prediction->error; })},
              {"reason", "why something is null",
               text_or_null<Q>([](P p) { return std::string_view(p.prediction->reason); })}});
}

Part<Discounted> discounted_part() {
  return object<Discounted>("discounted", {{"weight", "power of the originals' likelihood",
                                            number<Discounted>(&Discounted::weight)},
                                           {"effect", "evidence for an effect from all studies",
                                            inside<Discounted>(triple_part(), &Discounted::effect)}});
}

std::vector<std::string> labels(V v, const std::vector<std::size_t>& studies) {
  std::vector<std::string> list;
  for (const std::size_t i : studies) list.push_back(v.rows.studies[i].label);
  return list;
}

const Part<ReplicateAnalysis>& replicate_part() {
  using T = ReplicateAnalysis;
  static const Part<T> part = object<T>(
      "",
      gathered_fields<T>("replicate", [](V v) -> const Gathered& { return v.rows; }) +
          std::vector<Field<T>>{
              {"verdict", "did it replicate, in a sentence", text<T>(render::replicate_verdict)},
              {"accurate", "false when an integral missed its promised accuracy",
               boolean<T>([](V v) { return v.result.accurate; })},
              {"selection_alpha", "two-sided level at which originals are read as selected",
               number<T>([](V v) { return v.options.alpha; })},
              {"originals", "their labels", texts<T>([](V v) { return labels(v, v.result.originals); })},
              {"replications", "their labels",
               texts<T>([](V v) { return labels(v, v.result.replications); })},
              {"flat", "replications under the originals' posterior from a flat prior, against no effect",
               triple(&ReplicateResult::flat)},
              {"carried", "evidence of all studies over that of the originals",
               triple(&ReplicateResult::carried)},
              {"originals_alone", "evidence for an effect from the originals",
               triple(&ReplicateResult::originals_alone)},
              {"replications_alone", "from the replications", triple(&ReplicateResult::replications_alone)},
              {"all", "from all studies", triple(&ReplicateResult::all)},
              {"selected_all", "all studies, the originals read as selected for significance",
               triple(&ReplicateResult::selected_all)},
              {"selected_carried", "what the replications add to originals so read",
               triple(&ReplicateResult::selected_carried)},
              {"effect_originals", "pooled effect of the originals",
               summary(&ReplicateResult::effect_originals)},
              {"effect_replications", "of the replications", summary(&ReplicateResult::effect_replications)},
              {"effect_all", "of all studies", summary(&ReplicateResult::effect_all)},
              {"effect_selected", "of the originals read as selected",
               summary(&ReplicateResult::effect_selected)},
              {"shrinkage", "pooled effect of all over that of the originals",
               number<T>([](V v) { return v.result.shrinkage; })},
              {"predictions", "each replication among what the originals predict",
               array<T>(prediction_part(),
                        [](V v) {
                          std::vector<PredictionView> views;
                          for (const Prediction& p : v.result.predictions)
                            views.push_back({&v.rows.studies[p.study], &p});
                          return views;
                        })},
              {"discounted", "with the originals weighted down",
               array<T>(discounted_part(),
                        [](V v) -> const std::vector<Discounted>& { return v.result.discounted; })},
              {"cautions", "what a reader must know beside the numbers",
               array<T>(diagnostic_part(),
                        [](V v) -> const std::vector<Diagnostic>& { return v.rows.cautions; })}});
  return part;
}

}  // namespace

const Shape& replicate_shape() { return replicate_part().shape; }

}  // namespace steelyard::json

namespace steelyard {

void write_json(const ReplicateAnalysis& analysis, const Sink& sink) {
  json::Writer writer(sink);
  json::replicate_part().write(writer, analysis);
  writer.finish();
}

}  // namespace steelyard
