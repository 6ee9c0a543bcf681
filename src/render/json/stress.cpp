// The document of `stress`.
#include <utility>

#include "render/firmness_words.hpp"
#include "render/json/documents.hpp"
#include "render/json/rows.hpp"

namespace steelyard::json {

namespace {

using S = const StressAnalysis&;
using A = const Answer&;

Part<Answer> answer_part() {
  const auto factor = [](std::optional<LogBayesFactor> Answer::*member) {
    return inside<Answer>(bayes_factor_part(),
                          [member](A a) -> const std::optional<LogBayesFactor>& { return a.*member; });
  };
  return object<Answer>(
      "answer",
      {{"effect", "for an effect, averaged", factor(&Answer::effect)},
       {"effect_fixed", "the same everywhere", factor(&Answer::effect_fixed)},
       {"effect_random", "given that effects vary", factor(&Answer::effect_random)},
       {"heterogeneity", "for effects that vary", factor(&Answer::heterogeneity)},
       {"pooled_effect", "mean effect, averaged", inside<Answer>(summary_part(), &Answer::pooled_effect)},
       {"accurate", "whether the accuracy was reached", boolean<Answer>(&Answer::accurate)},
       {"refused", "why there is no answer",
        text_or_null<Answer>([](A a) { return std::string_view(a.refused); })}});
}

// An answer with the study that it is about.
struct Named {
  const Study* study;
  const Answer* answer;
};

Part<Named> named_part() {
  using N = const Named&;
  return object<Named>(
      "study_answer",
      name_fields<Named>([](N n) -> const Study& { return *n.study; }) +
          std::vector<Field<Named>>{{"answer", "the pooled answer",
                                     inside<Named>(answer_part(), [](N n) -> A { return *n.answer; })}});
}

std::vector<Named> named_answers(S s, const std::vector<Answer>& answers, bool in_order) {
  std::vector<Named> list;
  for (std::size_t i = 0; i < answers.size(); ++i) {
    list.push_back({&s.rows.studies[in_order ? s.result.order[i] : i], &answers[i]});
  }
  return list;
}

Part<SubsetAnswer> subset_part() {
  using G = SubsetAnswer;
  return object<G>("subset", {{"group", "what stands in the column", text<G>(&G::group)},
                              {"count", "studies in the group", integer<G>(&G::count)},
                              {"only", "these studies alone", inside<G>(answer_part(), &G::only)},
                              {"without", "all others", inside<G>(answer_part(), &G::without)}});
}

Part<PriorGrid> grid_part() {
  using G = PriorGrid;
  const auto numbers = [](std::vector<double> G::*member) {
    return array<G>(number<double>([](double x) { return x; }),
                    [member](const G& g) -> const std::vector<double>& { return g.*member; });
  };
  const auto factors = [](std::vector<LogBayesFactor> G::*member) {
    return array<G>(bayes_factor_part(),
                    [member](const G& g) -> const std::vector<LogBayesFactor>& { return g.*member; });
  };
  return object<G>("prior_grid",
                   {{"widths", "factors on the width of the effect prior", numbers(&G::widths)},
                    {"scales", "factors on the scale of the spread prior", numbers(&G::scales)},
                    {"effect", "evidence for an effect; the scale runs fastest", factors(&G::effect)},
                    {"heterogeneity", "evidence for varying effects, likewise", factors(&G::heterogeneity)}});
}

struct ShareView {
  const Study* study;
  const Share* share;
};

Part<ShareView> share_part() {
  using V = const ShareView&;
  return object<ShareView>(
      "share", name_fields<ShareView>([](V v) -> const Study& { return *v.study; }) +
                   std::vector<Field<ShareView>>{
                       {"log_bf", "mean contribution to the averaged log Bayes factor over orders of arrival",
                        number<ShareView>([](V v) { return finite(v.share->log_bf); })},
                       {"abs_error", "numerical, and the spread over orders where not all were taken",
                        number<ShareView>([](V v) { return finite(v.share->error); })}});
}

const std::vector<std::string> stands = {"an effect", "undecided", "no effect"};
const std::vector<std::string> changes = {"study", "order", "width", "scale", "direction", "model", "group"};

struct TurnView {
  const StressAnalysis* analysis;
  const Turn* turn;
};

Part<TurnView> turn_part() {
  using V = const TurnView&;
  return object<TurnView>(
      "turn", {{"kind", "what was changed",
                word<TurnView>(changes, [](V v) { return render::change_word(v.turn->kind); })},
               {"text", "the change and what it does",
                text<TurnView>([](V v) { return render::turn_sentence(*v.analysis, *v.turn); })},
               {"factor", "on a width or scale: beyond it the verdict turns",
                number<TurnView>([](V v) { return v.turn->factor; })},
               {"log_bf_before", "for an effect, as it stands",
                number<TurnView>([](V v) { return finite(v.turn->from); })},
               {"log_bf_after", "after the change", number<TurnView>([](V v) { return finite(v.turn->to); })},
               {"before", "verdict as it stands",
                word<TurnView>(stands, [](V v) { return to_text(v.turn->before); })},
               {"after", "verdict after the change",
                word<TurnView>(stands, [](V v) { return to_text(v.turn->after); })}});
}

Part<Firmness> firmness_part() {
  using F = Firmness;
  return object<F>(
      "firmness",
      {{"kind", "what was changed", word<F>(changes, [](const F& f) { return render::change_word(f.kind); })},
       {"count", "changes made", integer<F>(&F::count)},
       {"lowest", "log Bayes factor of an effect", number<F>([](const F& f) { return finite(f.lowest); })},
       {"highest", "likewise", number<F>([](const F& f) { return finite(f.highest); })},
       {"same_verdict", "true when the verdict never turns", boolean<F>(&F::same_stand)},
       {"text", "the same in a sentence", text<F>(render::firmness_sentence)}});
}

struct DirectionView {
  Direction direction;
  const Answer* answer;
};

Part<DirectionView> direction_part() {
  using V = const DirectionView&;
  return object<DirectionView>(
      "direction_answer",
      {{"direction", "mean effects that the prior allows",
        word<DirectionView>({"either", "greater", "less"}, [](V v) { return to_text(v.direction); })},
       {"answer", "the pooled answer",
        inside<DirectionView>(answer_part(), [](V v) -> A { return *v.answer; })}});
}

Part<GroupAnswer> group_part() {
  using G = const GroupAnswer&;
  return object<GroupAnswer>(
      "group",
      {{"name", "what stands in the column", text<GroupAnswer>(&GroupAnswer::name)},
       {"count", "studies in the group", integer<GroupAnswer>([](G g) { return g.studies.size(); })},
       {"effect", "evidence for an effect in the group, averaged",
        inside<GroupAnswer>(bayes_factor_part(),
                            [](G g) -> const std::optional<LogBayesFactor>& { return g.pooled.effect; })},
       {"pooled_effect", "mean effect in the group, averaged",
        inside<GroupAnswer>(summary_part(), [](G g) -> const Summary& { return g.pooled.pooled_effect; })}});
}

Part<GroupResult> groups_part() {
  using G = GroupResult;
  return object<G>(
      "groups",
      {{"fixed", "for a difference among groups, one effect within each",
        inside<G>(bayes_factor_part(), &G::fixed)},
       {"random", "with effects that vary within groups", inside<G>(bayes_factor_part(), &G::random)},
       {"averaged", "both, by the model probabilities", inside<G>(bayes_factor_part(), &G::averaged)},
       {"groups", "each group alone",
        array<G>(group_part(), [](const G& g) -> const std::vector<GroupAnswer>& { return g.groups; })}});
}

const Part<StressAnalysis>& stress_part() {
  static const Part<StressAnalysis> part = object<StressAnalysis>(
      "",
      gathered_fields<StressAnalysis>("stress", [](S s) -> const Gathered& { return s.rows; }) +
          std::vector<Field<StressAnalysis>>{
              {"verdict_from", "a Bayes factor of at least this, either way, is a verdict",
               number<StressAnalysis>([](S s) { return s.options.verdict; })},
              {"by", "the column that makes groups",
               text_or_null<StressAnalysis>([](S s) { return std::string_view(s.by); })},
              {"verdict", "how firm the answer is, in a sentence",
               text<StressAnalysis>(render::stress_verdict)},
              {"accurate", "false when an integral missed its promised accuracy",
               boolean<StressAnalysis>([](S s) { return s.result.accurate; })},
              {"stand", "the verdict as it stands",
               word<StressAnalysis>(stands, [](S s) { return to_text(s.result.stand); })},
              {"base", "the pooled answer as it stands",
               inside<StressAnalysis>(answer_part(), [](S s) -> A { return s.result.base; })},
              {"turns", "the smallest change of each kind that turns the verdict",
               array<StressAnalysis>(turn_part(),
                                     [](S s) {
                                       std::vector<TurnView> views;
                                       for (const Turn& turn : s.result.turns) views.push_back({&s, &turn});
                                       return views;
                                     })},
              {"firmness", "between what the evidence stays, by kind of change",
               array<StressAnalysis>(firmness_part(),
                                     [](S s) -> const std::vector<Firmness>& { return s.result.firmness; })},
              {"without", "each study left out",
               array<StressAnalysis>(named_part(),
                                     [](S s) { return named_answers(s, s.result.without, false); })},
              {"by_year", "true when studies arrive by year, else in the order of the file",
               boolean<StressAnalysis>([](S s) { return s.result.by_year; })},
              {"cumulative", "as studies arrive: with each one and those before it",
               array<StressAnalysis>(named_part(),
                                     [](S s) { return named_answers(s, s.result.cumulative, true); })},
              {"subsets", "by group",
               array<StressAnalysis>(
                   subset_part(), [](S s) -> const std::vector<SubsetAnswer>& { return s.result.subsets; })},
              {"groups", "whether the groups differ",
               inside<StressAnalysis>(groups_part(), &StressAnalysis::groups)},
              {"directions", "with only some mean effects allowed",
               array<
                   StressAnalysis>(direction_part(),
                                   [](S s) {
                                     std::vector<DirectionView> views;
                                     for (std::size_t i = 0; i < 3; ++i)
                                       views.push_back({static_cast<Direction>(i), &s.result.directions[i]});
                                     return views;
                                   })},
              {"grid", "over prior width and spread scale",
               inside<StressAnalysis>(grid_part(),
                                      [](S s) -> const std::optional<PriorGrid>& { return s.result.grid; })},
              {"shares", "the evidence that each study carries",
               array<StressAnalysis>(share_part(),
                                     [](S s) {
                                       std::vector<ShareView> views;
                                       for (std::size_t i = 0; i < s.result.shares.size(); ++i)
                                         views.push_back({&s.rows.studies[i], &s.result.shares[i]});
                                       return views;
                                     })},
              {"shares_exact", "true when all orders were taken",
               boolean<StressAnalysis>([](S s) { return s.result.shares_exact; })},
              {"cautions", "what a reader must know beside the numbers",
               array<StressAnalysis>(diagnostic_part(), [](S s) -> const std::vector<Diagnostic>& {
                 return s.rows.cautions;
               })}});
  return part;
}

}  // namespace

const Shape& stress_shape() { return stress_part().shape; }

}  // namespace steelyard::json

namespace steelyard {

void write_json(const StressAnalysis& analysis, const Sink& sink) {
  json::Writer writer(sink);
  json::stress_part().write(writer, analysis);
  writer.finish();
}

}  // namespace steelyard
