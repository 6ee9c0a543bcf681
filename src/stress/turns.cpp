#include "stress/turns.hpp"

#include <algorithm>
#include <array>
#include <cmath>
#include <optional>

#include "weigh/search.hpp"

namespace steelyard::stressing {

namespace {

struct Candidate {
  std::size_t index = 0;
  bool left_out = true;
  const Answer* answer = nullptr;
};

// How far an answer moved away from the verdict as it stands, in nats; "undecided" is left either way.
double moved(double from, double to, Stand before) {
  if (before == Stand::effect) return from - to;
  return before == Stand::no_effect ? to - from : std::abs(to - from);
}

// Of several answers: the range they span, and the one that moves furthest among those that turn.
void judge(StressResult& result, Change kind, const std::vector<Candidate>& candidates, double verdict) {
  Firmness firm;
  firm.kind = kind;
  std::optional<Turn> worst;
  const double from = result.base.effect->log_bf;
  for (const Candidate& c : candidates) {
    if (!c.answer->effect) continue;
    const double to = c.answer->effect->log_bf;
    firm.lowest = firm.count == 0 ? to : std::min(firm.lowest, to);
    firm.highest = firm.count == 0 ? to : std::max(firm.highest, to);
    ++firm.count;
    const Stand after = stand_of(to, verdict);
    if (after == result.stand) continue;
    firm.same_stand = false;
    if (!worst || moved(from, to, result.stand) > moved(from, worst->to, result.stand)) {
      worst = Turn{kind, c.index, c.left_out, 1.0, from, to, result.stand, after};
    }
  }
  if (firm.count == 0) return;
  result.firmness.push_back(firm);
  if (worst) result.turns.push_back(*worst);
}

std::vector<Candidate> numbered(const std::vector<Answer>& answers) {
  std::vector<Candidate> all;
  for (std::size_t i = 0; i < answers.size(); ++i) all.push_back({i, true, &answers[i]});
  return all;
}

void judge_order(StressResult& result, double verdict) {
  // Counted from 1; the last is the answer as it stands. The latest arrival that still turned it is the
  // smallest change: fewest studies taken back.
  Firmness firm;
  firm.kind = Change::order;
  std::optional<Turn> latest;
  for (std::size_t i = 0; i + 1 < result.cumulative.size(); ++i) {
    if (!result.cumulative[i].effect) continue;
    const double to = result.cumulative[i].effect->log_bf;
    firm.lowest = firm.count == 0 ? to : std::min(firm.lowest, to);
    firm.highest = firm.count == 0 ? to : std::max(firm.highest, to);
    ++firm.count;
    const Stand after = stand_of(to, verdict);
    if (after == result.stand) continue;
    firm.same_stand = false;
    latest = Turn{Change::order, i + 1, true, 1.0, result.base.effect->log_bf, to, result.stand, after};
  }
  if (firm.count == 0) return;
  result.firmness.push_back(firm);
  if (latest) result.turns.push_back(*latest);
}

// Both models that the averaged answer mixes, each alone.
void judge_models(StressResult& result, double verdict) {
  std::array<Answer, 2> answers;
  answers[0].effect = result.base.effect_fixed;
  answers[1].effect = result.base.effect_random;
  if (!answers[0].effect || !answers[1].effect) return;
  judge(result, Change::model, {{0, true, &answers[0]}, {1, true, &answers[1]}}, verdict);
}

// From either direction to the one that the data favour (the other is bound to speak against), or from one
// direction to either.
void judge_directions(StressResult& result, Direction own, double verdict) {
  const auto at = [&result](Direction d) -> const Answer& {
    return result.directions[static_cast<std::size_t>(d)];
  };
  Direction other = Direction::either;
  if (own == Direction::either) {
    const auto& greater = at(Direction::greater).effect;
    const auto& less = at(Direction::less).effect;
    const bool up = greater && (!less || greater->log_bf >= less->log_bf);
    other = up ? Direction::greater : Direction::less;
  }
  judge(result, Change::direction, {{static_cast<std::size_t>(other), true, &at(other)}}, verdict);
}

void judge_subsets(StressResult& result, double verdict) {
  std::vector<Candidate> all;
  for (std::size_t i = 0; i < result.subsets.size(); ++i) {
    all.push_back({i, true, &result.subsets[i].without});
    all.push_back({i, false, &result.subsets[i].only});
  }
  if (!all.empty()) judge(result, Change::group, all, verdict);
}

void judge_grid(StressResult& result, double verdict) {
  if (!result.grid) return;
  Firmness firm{Change::width, result.grid->effect.size(), result.grid->lowest, result.grid->highest, true};
  for (const LogBayesFactor& cell : result.grid->effect) {
    firm.same_stand = firm.same_stand && stand_of(cell.log_bf, verdict) == result.stand;
  }
  result.firmness.push_back(firm);
}

// The factor nearest to 1, either way, beyond which the verdict is another one.
template <class LogBf>
std::optional<Turn> factor_turn(Change kind, LogBf log_bf, double lowest, double highest, double from,
                                Stand stand, double verdict) {
  const double limit = std::log(verdict);
  std::optional<Turn> nearest;
  for (const double end : {std::log(lowest), std::log(highest)}) {
    constexpr int steps = 6;
    double a = 0.0;
    double fa = from;
    for (int i = 1; i <= steps; ++i) {
      const double b = end * i / steps;
      if (nearest && std::abs(a) > std::abs(std::log(nearest->factor))) break;
      const std::optional<double> fb = log_bf(std::exp(b));
      if (!fb) break;
      const Stand after = stand_of(*fb, verdict);
      if (after == stand) {
        a = b;
        fa = *fb;
        continue;
      }
      const double crossed = fa > limit && *fb < limit   ? limit
                             : fa<-limit&& * fb> - limit ? -limit
                             : *fb >= limit              ? limit
                                                         : -limit;
      const double at =
          weighing::zero([&](double x) { return log_bf(std::exp(x)).value_or(crossed) - crossed; }, a,
                         fa - crossed, b, *fb - crossed, 1e-7);
      if (!nearest || std::abs(at) < std::abs(std::log(nearest->factor))) {
        // Just beyond the limit the answer is the neighbouring one, even when the step went past it.
        const Stand next = stand == Stand::undecided ? after : Stand::undecided;
        nearest = Turn{kind, 0, true, std::exp(at), from, crossed, stand, next};
      }
      break;
    }
  }
  return nearest;
}

void judge_factors(StressResult& result, std::span<const Study> studies, const Priors& priors,
                   const StressOptions& options) {
  const PriorMarginals marginals(studies, priors);
  const auto ends = [](const std::vector<double>& given) {
    const std::vector<double> factors = given.empty() ? usual_factors() : given;
    return std::pair{std::min(1.0, factors.front()), std::max(1.0, factors.back())};
  };
  const double from = result.base.effect->log_bf;
  const auto [narrowest, widest] = ends(options.widths);
  const auto width = factor_turn(
      Change::width, [&](double factor) { return marginals.log_bf(factor, 1.0); }, narrowest, widest, from,
      result.stand, options.verdict);
  if (width) result.turns.push_back(*width);
  if (studies.size() < 2) return;
  const auto [smallest, largest] = ends(options.scales);
  const auto scale = factor_turn(
      Change::scale, [&](double factor) { return marginals.log_bf(1.0, factor); }, smallest, largest, from,
      result.stand, options.verdict);
  if (scale) result.turns.push_back(*scale);
}

}  // namespace

void find_turns(StressResult& result, std::span<const Study> studies, const Priors& priors,
                const StressOptions& options) {
  if (!result.base.effect) return;
  judge(result, Change::study, numbered(result.without), options.verdict);
  judge_factors(result, studies, priors, options);
  judge_grid(result, options.verdict);
  judge_directions(result, priors.effect.direction, options.verdict);
  judge_models(result, options.verdict);
  judge_subsets(result, options.verdict);
  judge_order(result, options.verdict);
}

}  // namespace steelyard::stressing
