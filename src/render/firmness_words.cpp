#include "render/firmness_words.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "render/words.hpp"
#include "steelyard/figure.hpp"

namespace steelyard::render {

namespace {

using figure::decimals_for;
using figure::number_text;

std::string ratio(double log_bf) { return ratio_text(std::abs(log_bf)); }

bool is_even(double log_bf) { return ratio(log_bf) == "1.00"; }

std::string favoured(double log_bf, Direction direction) {
  return log_bf >= 0.0 ? effect_phrase(direction) : "no effect";
}

// "4.20 times as probable if there is an effect as if there is none"
std::string times_as_probable(double log_bf, Direction direction) {
  const std::string effect = effect_phrase(direction);
  return log_bf >= 0.0
             ? fmt::format("{} times as probable if there is {} as if there is none", ratio(log_bf), effect)
             : fmt::format("{} times as probable if there is none as if there is {}", ratio(log_bf), effect);
}

std::string decibans_number(double value) { return decibans_text(value * std::log(10.0) / 10.0); }

std::string percent(double probability) {
  if (probability > 0.0 && probability < 0.0005) return "less than 0.1%";
  if (probability < 1.0 && probability > 0.9995) return "more than 99.9%";
  return fmt::format("{:.1f}%", 100.0 * probability);
}

Direction direction_of(const Gathered& rows) { return rows.options.priors.effect.direction; }

std::string doubt(double log_bf, Direction direction) {
  const std::string effect = effect_phrase(direction);
  if (log_bf >= 0.0) {
    return fmt::format("Prior odds of {} worse than {} would still leave no effect the more probable.",
                       effect, odds_text(-log_bf));
  }
  return fmt::format("Prior odds of {} better than {} would still leave it the more probable.", effect,
                     odds_text(-log_bf));
}

}  // namespace

std::string side_text(double log_bf, Direction direction) {
  if (is_even(log_bf)) return "even";
  return fmt::format("{} for {}", odds_text(std::abs(log_bf)), favoured(log_bf, direction));
}

std::string weigh_sentence(const Weighing& weighing, const Study& study, Direction direction) {
  const double log_bf = weighing.bf.log_bf;
  if (is_even(log_bf)) {
    return fmt::format("\"{}\" does not tell {} from none: its result is equally probable under both.",
                       study.label, effect_phrase(direction));
  }
  return fmt::format("\"{}\" favours {}: its result is {} ({} decibans). {}", study.label,
                     favoured(log_bf, direction), times_as_probable(log_bf, direction), decibans_text(log_bf),
                     doubt(log_bf, direction));
}

std::string weigh_verdict(const WeighAnalysis& analysis) {
  const WeighSpread& s = analysis.result.spread;
  const Direction direction = direction_of(analysis.rows);
  if (s.count == 1) return weigh_sentence(analysis.result.rows[0], analysis.rows.studies[0], direction);
  std::string text = fmt::format("Weighed one by one, {} of {} studies favour {} and {} no effect.",
                                 s.for_effect, s.count, effect_phrase(direction), s.for_none);
  text += fmt::format(" At 10 to 1 or more, {} favour{} {} and {} no effect.", s.clearly_for_effect,
                      s.clearly_for_effect == 1 ? "s" : "", effect_phrase(direction), s.clearly_for_none);
  return text + fmt::format(" Their evidence runs from {} to {} decibans, the middle half from {} to {}.",
                            decibans_number(s.least), decibans_number(s.most),
                            decibans_number(s.lower_quartile), decibans_number(s.upper_quartile));
}

std::vector<std::string> region_sentences(const RegionResult& region) {
  std::vector<std::string> out;
  const Interval& r = region.asked.region;
  const std::string range = fmt::format("between {} and {}", number_text(r.low, decimals_for(r.high - r.low)),
                                        number_text(r.high, decimals_for(r.high - r.low)));
  const auto odds = [](double log_bf) {
    return log_bf >= 0.0 ? fmt::format("{} for a mean effect inside", odds_text(log_bf))
                         : fmt::format("{} for a mean effect outside", odds_text(-log_bf));
  };
  if (region.negligible) {
    out.push_back(fmt::format("Is it negligible, that is {}? The evidence is {} the region ({} decibans).",
                              range, odds(region.negligible->log_bf),
                              decibans_text(region.negligible->log_bf)));
  } else if (region.negligible_limit) {
    out.push_back(fmt::format("Is it negligible, that is {}? The evidence is more than {} the region.", range,
                              odds(*region.negligible_limit)));
  } else {
    out.push_back(fmt::format("Is it negligible, that is {}? {}", range, region.reason));
  }
  std::string inside = fmt::format("If there is an effect, its mean lies there with probability {}",
                                   percent(region.mean_effect.inside));
  if (region.mean_effect.inside_all_models) {
    inside += fmt::format("; counting the possibility of no effect, {}",
                          percent(*region.mean_effect.inside_all_models));
  }
  out.push_back(inside + ".");
  std::string next = fmt::format("The effect in a new study lies there with probability {}",
                                 percent(region.new_study.inside));
  if (region.new_study.inside_all_models) {
    next += fmt::format("; counting the possibility of no effect, {}",
                        percent(*region.new_study.inside_all_models));
  }
  out.push_back(next + ".");
  if (region.log_sign_odds) {
    out.push_back(fmt::format("Which sign? If there is an effect, the odds are {} that it is {}.",
                              odds_text(std::abs(*region.log_sign_odds)),
                              *region.log_sign_odds >= 0.0 ? "positive" : "negative"));
  }
  if (region.above_threshold) {
    const double t = *region.asked.threshold;
    out.push_back(fmt::format("The effect in a new study exceeds {} with probability {}.",
                              number_text(t, decimals_for(std::max(std::abs(t), 0.1))),
                              percent(*region.above_threshold)));
  }
  return out;
}

namespace {

std::string stand_text(Stand stand, Direction direction) {
  return stand == Stand::effect ? effect_phrase(direction) : std::string(to_text(stand));
}

std::string with_limit(const StressAnalysis& a) { return odds_text(std::log(a.options.verdict)); }

std::string moved(const StressAnalysis& a, const Turn& turn) {
  const Direction d = direction_of(a.rows);
  return fmt::format("the evidence moves from {} to {}: {}", side_text(turn.from, d), side_text(turn.to, d),
                     turn.after == Stand::undecided
                         ? fmt::format("short of {}, so undecided", with_limit(a))
                         : fmt::format("a verdict for {}", stand_text(turn.after, d)));
}

std::string factor_clause(const StressAnalysis& a, const Turn& turn, std::string_view more,
                          std::string_view less, std::string_view of) {
  const bool up = turn.factor > 1.0;
  return fmt::format("With {} more than {} times as {} as stated, the verdict is {}.", of,
                     ratio_text(std::abs(std::log(turn.factor))), up ? more : less,
                     turn.after == Stand::undecided ? fmt::format("short of {}, so undecided", with_limit(a))
                                                    : stand_text(turn.after, direction_of(a.rows)));
}

std::string_view kind_text(Change kind) {
  switch (kind) {
    case Change::study:
      return "Every leave-one-out";
    case Change::order:
      return "The answer at every arrival";
    case Change::width:
    case Change::scale:
      return "Every pair of priors tried";
    case Change::direction:
      return "The answer for one direction, or for either,";
    case Change::model:
      return "The same-effect and the varying-effects answer, each alone,";
    case Change::group:
      break;
  }
  return "Every group alone or left out";
}

}  // namespace

std::string turn_sentence(const StressAnalysis& a, const Turn& turn) {
  switch (turn.kind) {
    case Change::study:
      return fmt::format("Without \"{}\" {}.", a.rows.studies[turn.index].label, moved(a, turn));
    case Change::order:
      return fmt::format("It has stood since study {} of {} (\"{}\"); before that one the evidence was {}.",
                         turn.index + 1, a.result.order.size(),
                         a.rows.studies[a.result.order[turn.index]].label,
                         side_text(turn.to, direction_of(a.rows)));
    case Change::width:
      return factor_clause(a, turn, "wide", "narrow", "an effect prior");
    case Change::scale:
      return factor_clause(a, turn, "large", "small", "a spread prior");
    case Change::direction: {
      const auto direction = static_cast<Direction>(turn.index);
      return fmt::format(
          "When only {} is asked for, {}.",
          direction == Direction::either ? "an effect in either direction" : effect_phrase(direction),
          moved(a, turn));
    }
    case Change::model:
      return fmt::format(
          "{}, {}.",
          turn.index == 0 ? "If all studies share one effect" : "If effects vary from study to study",
          moved(a, turn));
    case Change::group:
      break;
  }
  return fmt::format("{} the group \"{}\"{} {}.", turn.left_out ? "Without" : "With",
                     a.result.subsets[turn.index].group, turn.left_out ? "" : " alone", moved(a, turn));
}

std::string firmness_sentence(const Firmness& f) {
  const Direction d = Direction::either;
  const std::string_view subject = kind_text(f.kind);
  const std::string_view verb = f.kind == Change::model ? "stay" : "stays";
  for (const double limit : {1000.0, 100.0, 30.0, 10.0, 3.0, 1.0}) {
    const double log_limit = std::log(limit);
    if (f.lowest < log_limit && f.highest > -log_limit) continue;
    const bool up = f.lowest >= log_limit;
    const std::string side = up ? effect_phrase(d) : "no effect";
    const double nearest = up ? f.lowest : -f.highest;
    return limit == 1.0 ? fmt::format("{} {} on the side of {} (at least {}).", subject, verb, side,
                                      odds_text(nearest))
                        : fmt::format("{} {} above {:.0f} to 1 for {} (at least {}).", subject, verb, limit,
                                      side, odds_text(nearest));
  }
  return fmt::format("{} {} between {} and {}.", subject, verb, side_text(f.lowest, d),
                     side_text(f.highest, d));
}

std::string stress_verdict(const StressAnalysis& a) {
  const StressResult& r = a.result;
  if (!r.base.effect) {
    return "How firm the answer is can't be told: the assumed model probabilities leave room for one answer "
           "only.";
  }
  const Direction d = direction_of(a.rows);
  const std::string as_it_stands =
      r.stand == Stand::undecided
          ? fmt::format("As it stands the evidence is {}: short of {} either way, so undecided.",
                        side_text(r.base.effect->log_bf, d), with_limit(a))
          : fmt::format("As it stands the evidence is {}.", side_text(r.base.effect->log_bf, d));
  const bool only_order = !r.turns.empty() && r.turns.front().kind == Change::order;
  if (r.turns.empty() || only_order) {
    return as_it_stands +
           " Nothing that was tried turns that: no study left out, no prior, direction or kind of model." +
           (only_order ? " " + turn_sentence(a, r.turns.front()) : "");
  }
  const bool from_study = r.turns.front().kind == Change::study;
  return fmt::format("{} {} {}", as_it_stands,
                     from_study ? "One study can turn it." : "No single study turns it.",
                     turn_sentence(a, r.turns.front()));
}

std::string groups_sentence(const StressAnalysis& a) {
  if (!a.groups) return "";
  const GroupResult& g = *a.groups;
  const LogBayesFactor& bf = g.averaged ? *g.averaged : g.fixed;
  const bool differ = bf.log_bf >= 0.0;
  return fmt::format(
      "Do the {} groups by `{}` differ? The data are {} times as probable if {} as if {} ({} decibans; "
      "deviations "
      "{}; {}).",
      g.groups.size(), a.by, ratio(bf.log_bf), differ ? "they do" : "they share one mean",
      differ ? "they share one mean" : "they do", decibans_text(bf.log_bf),
      to_text(EffectPrior{g.options.deviation}),
      g.options.shared_spread ? "one spread for all" : "a spread for each");
}

std::string replicate_verdict(const ReplicateAnalysis& a) {
  const ReplicateResult& r = a.result;
  const Direction d = direction_of(a.rows);
  const bool one_original = r.originals.size() == 1;
  const bool one_replication = r.replications.size() == 1;
  const EvidenceTriple& main = r.carried;
  const std::optional<LogBayesFactor>& bf = main.averaged ? main.averaged : main.fixed;
  if (!bf) return "Whether it replicated was not weighed. " + main.reason;
  const std::string who = one_replication ? "the replication" : "the replications";
  if (is_even(bf->log_bf)) {
    return fmt::format("Given what the original{} taught, {} {} nothing about whether there is {}.",
                       one_original ? "" : "s", who, one_replication ? "says" : "say", effect_phrase(d));
  }
  return fmt::format(
      "{}: given what the original{} taught, the data of {} are {} ({} decibans). With the original{}, all "
      "evidence "
      "is {}.",
      bf->log_bf >= 0.0 ? "It points to a replication" : "It points against a replication",
      one_original ? "" : "s", who, times_as_probable(bf->log_bf, d), decibans_text(bf->log_bf),
      one_original ? "" : "s",
      r.all.averaged ? side_text(r.all.averaged->log_bf, d) : side_text(r.all.fixed->log_bf, d));
}

std::string prediction_sentence(const ReplicateAnalysis& a) {
  std::size_t placed = 0;
  std::size_t inside = 0;
  for (const Prediction& p : a.result.predictions) {
    if (!p.inside) continue;
    ++placed;
    inside += *p.inside ? 1 : 0;
  }
  if (placed == 0) return "";
  const std::string level = fmt::format("{:g}%", 100.0 * a.options.level);
  const char* whose = a.result.originals.size() == 1 ? "original" : "originals";
  if (placed == 1) {
    return fmt::format("The replication lies {} what the {} predicted (exact {} interval).",
                       inside == 1 ? "inside" : "outside", whose, level);
  }
  return fmt::format("{} lie inside what the {} predicted (exact {} intervals).",
                     fmt::format("{} of {} replications", inside, placed), whose, level);
}

std::string shrinkage_sentence(const ReplicateAnalysis& a) {
  const ReplicateResult& r = a.result;
  if (!r.shrinkage) return "";
  const bool means = r.effect_all.mean && r.effect_originals.mean;
  const double before = means ? *r.effect_originals.mean : *r.effect_originals.median;
  const double after = means ? *r.effect_all.mean : *r.effect_all.median;
  return fmt::format("With the replications the {} effect goes from {} to {}, {} of what it was.",
                     means ? "mean" : "median", number_text(before, 2), number_text(after, 2),
                     percent(*r.shrinkage));
}

std::string assumed_sentence(const Gathered& rows, bool models) {
  const Priors& priors = rows.options.priors;
  std::string text = fmt::format("Assumed: effect {}", to_text(priors.effect));
  if (priors.effect.direction != Direction::either) {
    text += fmt::format(", only {} than 0", to_text(priors.effect.direction));
  }
  if (!models) return text + ".";
  text += fmt::format("; spread {}; model probabilities", to_text(priors.spread));
  for (std::size_t i = 0; i < model_count; ++i) {
    text += fmt::format("{} {} ({})", i == 0 ? "" : ",", probability_text(priors.model[i]),
                        model_name(static_cast<Model>(i), priors.effect.direction));
  }
  return text + ".";
}

std::vector<std::string> caution_sentences(const Gathered& rows, const std::vector<Diagnostic>& more) {
  std::vector<std::string> out;
  const auto add = [&out](std::string sentence) {
    if (std::find(out.begin(), out.end(), sentence) == out.end()) out.push_back(std::move(sentence));
  };
  for (const std::string& label : rows.left_out) add("Left out on request: " + label + ".");
  std::vector<std::string> said;
  const auto add_diagnostic = [&](const Diagnostic& d) {
    const std::string line = d.where.line > 0 ? fmt::format("Line {}: ", d.where.line) : "";
    add(line + d.what + (d.remedy.empty() ? "" : " " + d.remedy));
    said.push_back(d.what);
  };
  for (const Diagnostic& d : rows.cautions) add_diagnostic(d);
  for (const Diagnostic& d : more) add_diagnostic(d);
  for (const Study& study : rows.studies) {
    for (const std::string& caution : study.cautions) {
      const bool known = std::any_of(said.begin(), said.end(), [&](const std::string& s) {
        return s.find(caution) != std::string::npos;
      });
      if (!known) add(study.label + ": " + caution);
    }
  }
  return out;
}

std::string_view change_word(Change change) {
  constexpr std::string_view words[] = {"study", "order", "width", "scale", "direction", "model", "group"};
  return words[static_cast<std::size_t>(change)];
}

std::string favour_sentence(double log_bf, std::string_view numerator, std::string_view denominator) {
  const bool for_it = log_bf >= 0.0;
  return fmt::format("The data are {} times as probable under {} as under {} ({} decibans).",
                     ratio_text(std::abs(log_bf)), for_it ? numerator : denominator,
                     for_it ? denominator : numerator, decibans_text(log_bf));
}

}  // namespace steelyard::render
