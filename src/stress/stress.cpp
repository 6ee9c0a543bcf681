// The pooled answer again under every change.
#include "steelyard/stress.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <mutex>
#include <numeric>
#include <utility>

#include "stress/answer.hpp"
#include "stress/grid.hpp"
#include "stress/shares.hpp"
#include "stress/threads.hpp"
#include "stress/turns.hpp"

namespace steelyard {

namespace {

using namespace stressing;

Diagnostic refusal(std::string code, std::string what, std::string remedy) {
  return {Severity::error, std::move(code), {}, std::move(what), std::move(remedy)};
}

std::optional<Diagnostic> factor_problem(const std::vector<double>& factors, std::string_view what) {
  for (std::size_t i = 0; i < factors.size(); ++i) {
    if (factors[i] > 0.0 && factors[i] <= 1e6 && (i == 0 || factors[i] > factors[i - 1])) continue;
    return refusal("factors-out-of-range", fmt::format("{} holds {} at place {}.", what, factors[i], i + 1),
                   "Give positive factors of at most 1e6 that rise, for instance 0.5, 1, 2.");
  }
  return std::nullopt;
}

std::optional<Diagnostic> problem(std::span<const Study> studies, const StressOptions& options) {
  if (!(options.verdict > 1.0 && options.verdict <= 1e6)) {
    return refusal("verdict-out-of-range",
                   fmt::format("The Bayes factor that counts as a verdict is {}.", options.verdict),
                   "It must be larger than 1, for instance 3 or 10.");
  }
  if (options.threads < 1)
    return refusal("threads-out-of-range", "The number of threads is 0.", "Give at least 1.");
  if (options.exact_shares > 16) {
    return refusal("exact-shares-out-of-range",
                   fmt::format("Shares over all orders of {} studies were asked for.", options.exact_shares),
                   "At most 16 are possible; beyond that fixed rotations are used.");
  }
  if (!options.groups.empty() && options.groups.size() != studies.size()) {
    return refusal(
        "groups-do-not-match",
        fmt::format("There are {} group labels for {} studies.", options.groups.size(), studies.size()),
        "Give one label a study.");
  }
  if (auto found = factor_problem(options.widths, "The list of prior widths")) return found;
  return factor_problem(options.scales, "The list of spread scales");
}

// Counts steps and asks the caller whether to go on; safe to call from any thread.
class Progress {
 public:
  Progress(const StressOptions& options, std::size_t steps) : report_(options.progress), steps_(steps) {}

  bool step() {
    const std::lock_guard lock(mutex_);
    if (report_ && going_) going_ = report_(std::min(done_, steps_), steps_);
    ++done_;
    return going_;
  }

 private:
  std::function<bool(std::size_t, std::size_t)> report_;
  std::size_t steps_;
  std::size_t done_ = 0;
  bool going_ = true;
  std::mutex mutex_;
};

std::vector<Study> chosen(std::span<const Study> studies, const std::vector<std::size_t>& indices) {
  std::vector<Study> some;
  for (const std::size_t i : indices) some.push_back(studies[i]);
  return some;
}

// By year when every study has one; ties and missing years keep the order of the rows.
std::vector<std::size_t> arrival(std::span<const Study> studies, bool& by_year) {
  std::vector<std::size_t> order(studies.size());
  std::iota(order.begin(), order.end(), std::size_t{0});
  by_year =
      std::all_of(studies.begin(), studies.end(), [](const Study& study) { return study.year.has_value(); });
  if (by_year) {
    std::stable_sort(order.begin(), order.end(),
                     [&](std::size_t a, std::size_t b) { return *studies[a].year < *studies[b].year; });
  }
  return order;
}

// One pooling to be done: which studies, which direction, and where its answer goes.
struct Task {
  std::vector<std::size_t> studies;
  Direction direction;
  Answer* answer;
};

void plan_without(StressResult& result, std::size_t count, Direction direction, std::vector<Task>& tasks) {
  if (count < 2) return;
  result.without.resize(count);
  for (std::size_t out = 0; out < count; ++out) {
    std::vector<std::size_t> rest;
    for (std::size_t i = 0; i < count; ++i) {
      if (i != out) rest.push_back(i);
    }
    tasks.push_back({std::move(rest), direction, &result.without[out]});
  }
}

void plan_cumulative(StressResult& result, std::span<const Study> studies, Direction direction,
                     std::vector<Task>& tasks) {
  result.order = arrival(studies, result.by_year);
  result.cumulative.resize(studies.size());
  for (std::size_t i = 0; i + 1 < studies.size(); ++i) {
    const auto end = result.order.begin() + static_cast<std::ptrdiff_t>(i) + 1;
    std::vector<std::size_t> first(result.order.begin(), end);
    std::sort(first.begin(), first.end());
    tasks.push_back({std::move(first), direction, &result.cumulative[i]});
  }
}

void plan_subsets(StressResult& result, const std::vector<std::string>& groups, Direction direction,
                  std::vector<Task>& tasks) {
  std::vector<std::vector<std::size_t>> members;
  for (std::size_t i = 0; i < groups.size(); ++i) {
    auto at = std::find_if(result.subsets.begin(), result.subsets.end(),
                           [&](const SubsetAnswer& subset) { return subset.group == groups[i]; });
    if (at == result.subsets.end()) {
      result.subsets.push_back({groups[i], 0, {}, {}});
      members.emplace_back();
      at = result.subsets.end() - 1;
    }
    ++at->count;
    members[static_cast<std::size_t>(at - result.subsets.begin())].push_back(i);
  }
  for (std::size_t g = 0; g < members.size(); ++g) {
    SubsetAnswer& subset = result.subsets[g];
    std::vector<std::size_t> rest;
    for (std::size_t i = 0; i < groups.size(); ++i) {
      if (groups[i] != subset.group) rest.push_back(i);
    }
    tasks.push_back({members[g], direction, &subset.only});
    if (rest.empty()) {
      subset.without.refused = "No study is left without this group.";
    } else {
      tasks.push_back({std::move(rest), direction, &subset.without});
    }
  }
}

void plan_directions(StressResult& result, std::size_t count, Direction own, std::vector<Task>& tasks) {
  std::vector<std::size_t> all(count);
  std::iota(all.begin(), all.end(), std::size_t{0});
  for (const Direction direction : {Direction::either, Direction::greater, Direction::less}) {
    if (direction != own)
      tasks.push_back({all, direction, &result.directions[static_cast<std::size_t>(direction)]});
  }
}

void keep_shares(StressResult& result, Shares shares) {
  result.shares_exact = shares.exact;
  result.shares_orders = shares.orders;
  result.shares = std::move(shares.shares);
  if (!result.base.effect) return;
  // The fixed grid against the exact answers: its largest miss, twice because a step is a difference.
  double miss = std::abs(shares.all - result.base.effect->log_bf);
  for (std::size_t i = 0; i < shares.without.size() && i < result.without.size(); ++i) {
    if (result.without[i].effect)
      miss = std::max(miss, std::abs(shares.without[i] - result.without[i].effect->log_bf));
  }
  for (Share& share : result.shares) share.error += 2.0 * miss;
}

}  // namespace

Outcome<StressResult> stress(std::span<const Study> studies, const Priors& priors,
                             const StressOptions& options) {
  if (auto found = problem(studies, options)) return {std::nullopt, {std::move(*found)}};
  PoolOptions pooling = options.pool;
  pooling.summaries = true;
  pooling.shrunken = false;
  // Whatever makes pooling impossible is said in its own words.
  PoolOptions trial = pooling;
  trial.summaries = false;
  if (Outcome<PoolResult> pooled = pool(studies, priors, trial); !pooled.ok()) {
    return {std::nullopt, std::move(pooled.diagnostics)};
  }
  StressResult result;
  result.base = answer(studies, priors, pooling);
  result.stand = stand_of(result.base, options.verdict);

  std::vector<Task> tasks;
  const Direction own = priors.effect.direction;
  plan_without(result, studies.size(), own, tasks);
  plan_cumulative(result, studies, own, tasks);
  plan_subsets(result, options.groups, own, tasks);
  plan_directions(result, studies.size(), own, tasks);
  Progress progress(options, tasks.size() + (options.widths.empty() ? 20 : options.widths.size()));
  const auto keep_going = [&progress] { return progress.step(); };
  const auto work = [&](std::size_t i) {
    Priors changed = priors;
    changed.effect.direction = tasks[i].direction;
    *tasks[i].answer = answer(chosen(studies, tasks[i].studies), changed, pooling);
  };
  result.stopped = !for_each_index(tasks.size(), options.threads, work, keep_going);
  result.cumulative.back() = result.base;
  result.directions[static_cast<std::size_t>(own)] = result.base;
  for (const Task& task : tasks) result.accurate = result.accurate && task.answer->accurate;
  result.accurate = result.accurate && result.base.accurate;

  if (!result.stopped && options.grid) {
    result.grid = prior_grid(studies, priors, options, result.accurate, keep_going);
    result.stopped = !progress.step();
  }
  if (!result.stopped && options.shares && studies.size() <= options.most_shares) {
    keep_shares(result, shares(studies, priors, options.exact_shares, keep_going));
    result.stopped = !progress.step();
  }
  if (!result.stopped) find_turns(result, studies, priors, options);
  return {std::move(result), {}};
}

}  // namespace steelyard
