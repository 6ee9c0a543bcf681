// Speed of pooling, as times and as multiples of the roofline; with nodes evaluated and the stated error.
//   steelyard_bench --benchmark_filter=pool_exact
#include <benchmark/benchmark.h>

#include <cmath>
#include <cstdint>
#include <vector>

#include "roofline.hpp"
#include "steelyard/pool.hpp"
#include "steelyard/stress.hpp"
#include "steelyard/weigh.hpp"

namespace {

using namespace steelyard;

/// Numbers between 0 and 1 from a small generator, so that every run sees the same studies.
class Stream {
 public:
  double next() {
    state_ = state_ * 6364136223846793005ULL + 1442695040888963407ULL;
    return static_cast<double>(state_ >> 11) / 9007199254740992.0;
  }

 private:
  std::uint64_t state_ = 20090607;
};

/// Two-group studies of 10 to 100 a group, all with different degrees of freedom (Welch-like fractions),
/// around a mean effect of 0.3 with spread 0.2.
std::vector<Study> exact_studies(std::size_t count) {
  Stream stream;
  std::vector<Study> out;
  for (std::size_t i = 0; i < count; ++i) {
    const double n1 = 10.0 + std::floor(91.0 * stream.next());
    const double n2 = 10.0 + std::floor(91.0 * stream.next());
    const double n = n1 * n2 / (n1 + n2);
    const double noise =
        std::sqrt(-2.0 * std::log(1.0 - stream.next())) * std::cos(6.283185307179586 * stream.next());
    const double effect = 0.3 + 0.2 * (2.0 * stream.next() - 1.0) * 1.7;
    Study study;
    study.label = "study " + std::to_string(i + 1);
    study.evidence = ExactT{effect * std::sqrt(n) + noise, n1 + n2 - 2.0 - 0.5 * stream.next(), n, false};
    out.push_back(study);
  }
  return out;
}

std::vector<Study> estimates(std::size_t count) {
  Stream stream;
  std::vector<Study> out;
  for (std::size_t i = 0; i < count; ++i) {
    const double se = 0.05 + 0.4 * stream.next();
    Study study;
    study.evidence = NormalEstimate{0.3 + se * 2.0 * (stream.next() + stream.next() - 1.0), se, false};
    out.push_back(study);
  }
  return out;
}

void report(benchmark::State& state, const PoolResult& result) {
  std::size_t nodes = 0;
  double error = 0.0;
  for (const ModelResult& model : result.models) {
    if (!model.integral) continue;
    nodes += model.integral->evaluations;
    error = std::max(error, model.integral->abs_error);
  }
  state.counters["nodes"] = static_cast<double>(nodes);
  state.counters["stated_error"] = error;
}

void pool_with(benchmark::State& state, const std::vector<Study>& studies, const PoolOptions& options) {
  for (auto _ : state) {
    Outcome<PoolResult> result = pool(studies, Priors{}, options);
    benchmark::DoNotOptimize(result);
    state.PauseTiming();
    report(state, *result.value);
    state.ResumeTiming();
  }
}

void pool_exact(benchmark::State& state) {
  PoolOptions options;
  options.shrunken = state.range(0) <= 1000;
  pool_with(state, exact_studies(static_cast<std::size_t>(state.range(0))), options);
}
BENCHMARK(pool_exact)->Arg(10)->Arg(1000)->Arg(100000)->Unit(benchmark::kMicrosecond);

void pool_exact_without_shrunken(benchmark::State& state) {
  PoolOptions options;
  options.shrunken = false;
  pool_with(state, exact_studies(static_cast<std::size_t>(state.range(0))), options);
}
BENCHMARK(pool_exact_without_shrunken)->Arg(10)->Arg(1000)->Unit(benchmark::kMicrosecond);

void pool_estimates(benchmark::State& state) {
  pool_with(state, estimates(static_cast<std::size_t>(state.range(0))), {});
}
BENCHMARK(pool_estimates)->Arg(1000)->Unit(benchmark::kMicrosecond);

void weigh_one(benchmark::State& state) {
  const auto studies = exact_studies(1);
  for (auto _ : state) benchmark::DoNotOptimize(weigh(studies, EffectPrior{}));
}
BENCHMARK(weigh_one)->Unit(benchmark::kMicrosecond);

/// 60 studies under 400 pairs of priors and without each study in turn; one thread.
void stress_60x400(benchmark::State& state) {
  const auto studies = exact_studies(60);
  PoolOptions options;
  options.summaries = false;
  for (auto _ : state) {
    for (int i = 0; i < 20; ++i)
      for (int j = 0; j < 20; ++j) {
        Priors priors;
        priors.effect.family = CauchyPrior{0.0, 0.1 * std::pow(30.0, i / 19.0)};
        priors.spread.family = InverseGammaPrior{1.0, 0.02 * std::pow(50.0, j / 19.0)};
        benchmark::DoNotOptimize(pool(studies, priors, options));
      }
    for (std::size_t out = 0; out < studies.size(); ++out) {
      auto rest = studies;
      rest.erase(rest.begin() + static_cast<std::ptrdiff_t>(out));
      benchmark::DoNotOptimize(pool(rest, Priors{}, options));
    }
  }
}
BENCHMARK(stress_60x400)->Unit(benchmark::kMillisecond);

void roofline_benchmark(benchmark::State& state) {
  for (auto _ : state) benchmark::DoNotOptimize(roofline(static_cast<int>(state.range(0))));
}
BENCHMARK(roofline_benchmark)->Name("roofline")->Arg(10)->Unit(benchmark::kMicrosecond);

}  // namespace

BENCHMARK_MAIN();
