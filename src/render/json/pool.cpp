// The document of `pool` (docs/json.md).
#include <utility>

#include "render/json/documents.hpp"
#include "render/json/rows.hpp"

namespace steelyard::json {

namespace {

// One study with what pooling found out about it.
struct StudyView {
  const Study* study;
  const StudyResult* result;
  const std::vector<FindingView>* findings;
};

struct View {
  const Analysis* analysis;
  std::vector<std::vector<FindingView>> findings;  ///< by row
};

Part<StudyView> study_part() {
  using V = const StudyView&;
  auto fields = study_fields<StudyView>([](V v) -> const Study& { return *v.study; });
  return object<StudyView>(
      "study",
      std::move(fields) +
          std::vector<Field<StudyView>>{
              {"log_bf", "natural log Bayes factor of the study alone: effect prior against no effect",
               number<StudyView>([](V v) { return finite(v.result->log_bf); })},
              {"log_bf_abs_error", "upper bound of its numerical error",
               number<StudyView>([](V v) { return finite(v.result->log_bf_error); })},
              {"shrunken", "the study's own effect, averaged over the two effect models",
               inside<StudyView>(summary_part(), [](V v) -> const Summary& { return v.result->shrunken; })},
              {"findings", "what the audit found in this row",
               array<StudyView>(finding_part(),
                                [](V v) -> const std::vector<FindingView>& { return *v.findings; })}});
}

Part<ModelResult> model_part() {
  using M = const ModelResult&;
  const auto of_integral = [](auto get) {
    return number<ModelResult>(
        [get](M m) { return m.integral ? finite(std::invoke(get, *m.integral)) : std::optional<double>(); });
  };
  return object<ModelResult>(
      "model",
      {{"id", "which model",
        word<ModelResult>({"fixed_null", "fixed_effect", "random_null", "random_effect"},
                          [](M m) { return id(m.model); })},
       {"prior_probability", "before the data", number<ModelResult>(&ModelResult::prior_probability)},
       {"posterior_probability", "after the data", number<ModelResult>(&ModelResult::posterior_probability)},
       {"log_marginal_likelihood", "natural log; null when the model is not identified",
        of_integral(&Integral::log_value)},
       {"abs_error", "upper bound of its numerical error, rounding included",
        of_integral(&Integral::abs_error)},
       {"evaluations", "nodes at which the studies were evaluated",
        integer<ModelResult>([](M m) { return m.integral ? m.integral->evaluations : std::size_t{0}; })},
       {"status", "whether the accuracy was reached",
        word<ModelResult>(
            {std::string(to_text(IntegralStatus::ok)),
             std::string(to_text(IntegralStatus::accuracy_not_reached)),
             std::string(to_text(IntegralStatus::not_identified))},
            [](M m) { return to_text(m.integral ? m.integral->status : IntegralStatus::not_identified); })}});
}

Part<PoolResult> evidence_part() {
  const auto factor = [](std::optional<LogBayesFactor> PoolResult::*member) {
    return inside<PoolResult>(
        bayes_factor_part(),
        [member](const PoolResult& r) -> const std::optional<LogBayesFactor>& { return r.*member; });
  };
  return object<PoolResult>(
      "evidence",
      {{"effect", "for an effect, averaged over whether effects vary", factor(&PoolResult::effect)},
       {"effect_fixed", "for an effect, the same everywhere", factor(&PoolResult::effect_fixed)},
       {"effect_random", "for a mean effect, given that effects vary", factor(&PoolResult::effect_random)},
       {"heterogeneity", "for effects that vary, averaged over whether there is an effect",
        factor(&PoolResult::heterogeneity)}});
}

Part<PoolResult> pooled_part() {
  const auto summary = [](Summary PoolResult::*member) {
    return inside<PoolResult>(summary_part(),
                              [member](const PoolResult& r) -> const Summary& { return r.*member; });
  };
  return object<PoolResult>(
      "pooled",
      {{"effect", "mean effect, averaged over the two effect models", summary(&PoolResult::pooled_effect)},
       {"effect_fixed", "under the same-effect model", summary(&PoolResult::pooled_effect_fixed)},
       {"effect_random", "under the varying-effects model", summary(&PoolResult::pooled_effect_random)},
       {"spread", "SD of effects among studies, under the varying-effects model",
        summary(&PoolResult::spread)},
       {"new_study", "effect in a new study, averaged over the two effect models",
        summary(&PoolResult::new_study)},
       {"i2", "share of variance between studies, 0 to 1, under the varying-effects model",
        summary(&PoolResult::i2)}});
}

Part<Analysis> verdict_part() {
  using A = const Analysis&;
  const auto sentence = [](std::string Verdict::*member) {
    return text<Analysis>([member](A a) { return verdict(a.result, a.options.priors, a.studies).*member; });
  };
  return object<Analysis>("verdict", {{"effect", "is there an effect?", sentence(&Verdict::effect)},
                                      {"heterogeneity", "does it vary?", sentence(&Verdict::heterogeneity)}});
}

// The studies as views, made one block at a time would save little: a view is three pointers.
std::vector<StudyView> study_views(const View& view) {
  const Analysis& a = *view.analysis;
  std::vector<StudyView> views;
  views.reserve(a.studies.size());
  for (std::size_t i = 0; i < a.studies.size(); ++i) {
    views.push_back({&a.studies[i], &a.result.studies[i], &view.findings[a.studies[i].row]});
  }
  return views;
}

using V = const View&;

template <class U, class Get>
Part<View> of_analysis(Part<U> part, Get get) {
  return inside<View>(std::move(part), [get](V v) -> const U& { return get(*v.analysis); });
}

const Part<View>& pool_part() {
  using A = const Analysis&;
  static const Part<View> part = object<View>(
      "",
      head_fields<View>("pool") +
          std::vector<Field<View>>{
              {"input", "what was read: with priors and options, all it takes to repeat the run",
               of_analysis(input_part(), [](A a) -> const Input& { return a.input; })},
              {"priors", "what was assumed before the data",
               of_analysis(priors_part(), [](A a) -> const Priors& { return a.options.priors; })},
              {"options", "what was asked for",
               of_analysis(analysis_options_part(), [](A a) -> const AnalysisOptions& { return a.options; })},
              {"left_out", "labels of the studies that were left out",
               array<View>(text<std::string>([](const std::string& s) { return std::string_view(s); }),
                           [](V v) -> const std::vector<std::string>& { return v.analysis->left_out; })},
              {"verdict", "the two questions, answered in a sentence each",
               of_analysis(verdict_part(), [](A a) -> const Analysis& { return a; })},
              {"accurate", "false when an integral missed its promised accuracy",
               boolean<View>([](V v) { return v.analysis->result.accurate; })},
              {"studies", "the studies that were pooled", array<View>(study_part(), study_views)},
              {"models", "the four models",
               array<View>(model_part(),
                           [](V v) -> const std::array<ModelResult, model_count>& {
                             return v.analysis->result.models;
                           })},
              {"evidence",
               "Bayes factors: posterior odds over prior odds of the class; null when not identified",
               of_analysis(evidence_part(), [](A a) -> const PoolResult& { return a.result; })},
              {"pooled", "what is known after the data",
               of_analysis(pooled_part(), [](A a) -> const PoolResult& { return a.result; })},
              {"region", "what was asked about a region",
               inside<View>(region_part(),
                            [](V v) -> const std::optional<RegionResult>& { return v.analysis->region; })},
              {"cautions", "what a reader must know beside the numbers",
               array<View>(diagnostic_part(),
                           [](V v) -> const std::vector<Diagnostic>& { return v.analysis->cautions; })}});
  return part;
}

}  // namespace

const Shape& pool_shape() { return pool_part().shape; }

}  // namespace steelyard::json

namespace steelyard {

void write_json(const Analysis& analysis, const Sink& sink) {
  json::Writer writer(sink);
  const json::View view{&analysis, json::findings_by_row(analysis.input.table, analysis.findings)};
  json::pool_part().write(writer, view);
  writer.finish();
}

std::string render_json(const Analysis& analysis) {
  std::string out;
  write_json(analysis, [&out](std::string_view bytes) { out += bytes; });
  return out;
}

}  // namespace steelyard
