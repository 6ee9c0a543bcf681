#include "render/firmness_words.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

namespace steelyard::render {

namespace {

std::string label(const StressAnalysis& a, std::size_t study) {
  return fmt::format("\"{}\"", a.rows.studies[study].label);
}

std::string change_text(const StressAnalysis& a, const Turn& turn) {
  const StressResult& r = a.result;
  switch (turn.kind) {
    case Change::study:
      return fmt::format("Without {}", label(a, turn.index));
    case Change::order:
      return fmt::format("With only the first {} of {} studies, up to {},", turn.index, r.order.size(),
                         label(a, r.order[turn.index - 1]));
    case Change::width:
      return fmt::format("With an effect prior {:.3g} times as wide", turn.factor);
    case Change::scale:
      return fmt::format("With a spread prior {:.3g} times as wide", turn.factor);
    case Change::direction:
      return fmt::format("With only {} effects allowed",
                         static_cast<Direction>(turn.index) == Direction::greater ? "positive" : "negative");
    case Change::model:
      return turn.index == 0 ? "If all studies share one effect" : "If effects vary";
    case Change::group:
      return fmt::format("{} the group \"{}\"", turn.left_out ? "Without" : "With only",
                         r.subsets[turn.index].group);
  }
  return "";
}

std::string_view change_noun(Change change) {
  switch (change) {
    case Change::study:
      return "leave-one-outs";
    case Change::order:
      return "steps as studies arrive";
    case Change::width:
      return "pairs of prior widths";
    case Change::scale:
      return "spread priors";
    case Change::direction:
      return "directions";
    case Change::model:
      return "kinds of model";
    case Change::group:
      return "groups, left out or alone";
  }
  return "";
}

}  // namespace

std::string_view change_word(Change change) {
  constexpr std::string_view words[] = {"study", "order", "width", "scale", "direction", "model", "group"};
  return words[static_cast<std::size_t>(change)];
}

std::string turn_sentence(const StressAnalysis& a, const Turn& turn) {
  return fmt::format("{} the Bayes factor for an effect goes from {} to {}: {} becomes {}.",
                     change_text(a, turn), odds_text(turn.from), odds_text(turn.to), to_text(turn.before),
                     to_text(turn.after));
}

std::string firmness_sentence(const Firmness& f) {
  return fmt::format("Over {} {} the Bayes factor for an effect stays between {} and {}{}.", f.count,
                     change_noun(f.kind), odds_text(f.lowest), odds_text(f.highest),
                     f.same_stand ? "; the verdict never turns" : "");
}

std::string stress_verdict(const StressAnalysis& a) {
  const StressResult& r = a.result;
  std::string text = r.base.effect ? fmt::format("As it stands the verdict is {} ({} for an effect).",
                                                 to_text(r.stand), odds_text(r.base.effect->log_bf))
                                   : fmt::format("As it stands the verdict is {}.", to_text(r.stand));
  if (r.turns.empty()) return text + " Nothing that was tried turns it.";
  return text + " What turns it most easily: " + turn_sentence(a, r.turns.front());
}

std::string weigh_verdict(const WeighAnalysis& a) {
  const WeighSpread& s = a.result.spread;
  const std::string effect = effect_phrase(a.rows.options.priors.effect.direction);
  if (s.count == 1) return favour_sentence(a.result.rows.front().bf.log_bf, effect, "no effect");
  return fmt::format(
      "Of {} studies, each on its own, {} speak for {} and {} for no effect; {} do so clearly (10 to 1 or "
      "more), {} "
      "clearly for no effect. The median weight of evidence is {:+.1f} decibans, from {:+.1f} to {:+.1f}.",
      s.count, s.for_effect, effect, s.for_none, s.clearly_for_effect, s.clearly_for_none, s.median, s.least,
      s.most);
}

std::string replicate_verdict(const ReplicateAnalysis& a) {
  const ReplicateResult& r = a.result;
  const auto& bf = r.carried.averaged ? r.carried.averaged : r.carried.fixed;
  if (!bf) return "The evidence that the replications add is not identified. " + r.carried.reason;
  return favour_sentence(bf->log_bf, "the effect that the originals suggest", "no effect") +
         " This is what the replications add to the originals, with the spread averaged over where it is "
         "identified.";
}

std::string favour_sentence(double log_bf, std::string_view numerator, std::string_view denominator) {
  const bool for_it = log_bf >= 0.0;
  return fmt::format("The data are {} times as probable under {} as under {} ({} decibans).",
                     ratio_text(std::abs(log_bf)), for_it ? numerator : denominator,
                     for_it ? denominator : numerator, decibans_text(log_bf));
}

}  // namespace steelyard::render
