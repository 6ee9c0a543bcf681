#include "pool/request.hpp"

#include <fmt/format.h>

#include <cmath>
#include <set>
#include <string>
#include <utility>

namespace steelyard::pool_room {

namespace {

Diagnostic error(std::string code, std::string what, std::string remedy) {
  return {Severity::error, std::move(code), {}, std::move(what), std::move(remedy)};
}

void check_models(const Priors& priors, std::vector<Diagnostic>& out) {
  double sum = 0.0;
  bool negative = false;
  for (const double p : priors.model) {
    sum += p;
    negative = negative || !(p >= 0.0);
  }
  if (negative || !(std::fabs(sum - 1.0) < 1e-9))
    out.push_back(
        error("model-priors",
              fmt::format("The prior probabilities of the four models are {}, {}, {} and {}; they must "
                          "not be negative and must sum to 1.",
                          priors.model[0], priors.model[1], priors.model[2], priors.model[3]),
              "Give four probabilities that sum to 1, in the order no effect, effect, no mean effect "
              "but varying, varying effect."));
}

void check_metrics(std::span<const Study> studies, std::vector<Diagnostic>& out) {
  std::set<std::string> metrics;
  for (const Study& study : studies) metrics.insert(study.metric);
  if (metrics.size() < 2) return;
  std::string list;
  for (const std::string& metric : metrics) {
    if (!list.empty()) list += ", ";
    list += "\"" + (metric.empty() ? std::string("unnamed") : metric) + "\"";
  }
  out.push_back(error("mixed-metrics",
                      fmt::format("The studies are in different metrics ({}), which cannot be pooled.", list),
                      "Pool each metric by itself, or leave rows out by name. Paired rows join the "
                      "standardized mean difference of two groups when their correlation is in r_pair."));
}

}  // namespace

std::vector<Diagnostic> problems_with_request(std::span<const Study> studies, const Priors& priors,
                                              const PoolOptions& options) {
  std::vector<Diagnostic> out;
  if (studies.empty())
    out.push_back(
        error("no-studies", "There are no studies to pool.", "Give a file with at least one study."));
  check_metrics(studies, out);
  if (const auto problem = problem_with(priors.effect)) out.push_back(*problem);
  if (const auto problem = problem_with(priors.spread)) out.push_back(*problem);
  check_models(priors, out);
  if (!(options.level > 0.0 && options.level < 1.0))
    out.push_back(error(
        "level", fmt::format("The level of the intervals is {}; it must lie between 0 and 1.", options.level),
        "Use for instance 0.95."));
  return out;
}

}  // namespace steelyard::pool_room
