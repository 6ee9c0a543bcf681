#include "pool/cautions.hpp"

#include <fmt/format.h>

#include <string>
#include <utility>
#include <variant>

namespace steelyard::pool_room {

namespace {

constexpr std::size_t few = 5;

Diagnostic caution(std::string code, std::string what, std::string remedy) {
  return {Severity::caution, std::move(code), {}, std::move(what), std::move(remedy)};
}

}  // namespace

std::vector<Diagnostic> cautions(std::span<const Study> studies, const Priors& priors,
                                 const PoolOptions& options, const PoolResult& result) {
  std::vector<Diagnostic> out;
  const std::size_t n = studies.size();
  if (n == 1)
    out.push_back(caution("one-study", "With a single study nothing can be said about how effects vary.",
                          "Only the same-effect models are compared."));
  else if (n <= few)
    out.push_back(caution(
        "few-studies",
        fmt::format(
            "With only {} studies, effects that vary around no mean effect explain large t values "
            "almost as well as an effect does, so the averaged evidence for an effect is understated.",
            n),
        "Read the same-effect and the varying-effects evidence beside the average."));
  std::size_t bands = 0;
  std::size_t folded = 0;
  for (const Study& study : studies) {
    bands += std::holds_alternative<BandT>(study.evidence) ? 1U : 0U;
    folded += is_folded(study.evidence) ? 1U : 0U;
  }
  if (bands > 0)
    out.push_back(caution("bounded-results",
                          fmt::format("{} of {} studies {} known only to lie within bounds.", bands, n,
                                      bands == 1 ? "is" : "are"),
                          "Their likelihood assumes that why a result was printed only as a bound says "
                          "nothing further about it "
                          "(coarsening at random, Heitjan & Rubin 1991)."));
  if (folded > 0)
    out.push_back(caution("unsigned-results",
                          fmt::format("{} of {} studies {} without a sign, so both signs are considered.",
                                      folded, n, folded == 1 ? "comes" : "come"),
                          "Give the sign where the paper tells the direction."));
  if (!result.accurate)
    out.push_back(caution("accuracy", "The promised accuracy of the integrals was not reached.",
                          "See abs_error and status of each model."));
  if (options.summaries && options.shrunken && n > options.shrunken_limit)
    out.push_back(
        caution("shrunken-omitted",
                fmt::format("With {} studies the studies' own (shrunken) effects are not computed; the "
                            "limit is {}.",
                            n, options.shrunken_limit),
                "Raise the limit if you need them."));
  if (priors.effect.direction != Direction::either)
    out.push_back(caution("one-direction",
                          fmt::format("The effect prior allows only a mean effect {} than zero.",
                                      priors.effect.direction == Direction::greater ? "greater" : "less"),
                          "Evidence for no effect includes evidence for the opposite direction."));
  return out;
}

}  // namespace steelyard::pool_room
