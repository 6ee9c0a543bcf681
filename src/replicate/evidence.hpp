// Evidence triples from sets of likelihoods; all four models stay in play even for a single study, so that
// the evidence of the originals times that of the replications given them is the evidence of all.
#pragma once

#include <span>
#include <vector>

#include "steelyard/replicate.hpp"

namespace steelyard::replicating {

/// The four log marginal likelihoods of a set of studies.
struct Marginals {
  Integral fixed_null, fixed_effect, random_null, random_effect;
};
[[nodiscard]] Marginals marginals(std::span<const Likelihood> studies, const EffectPrior& effect,
                                  const SpreadPrior& spread);

/// Evidence for an effect from a set of studies.
[[nodiscard]] EvidenceTriple evidence(const Marginals& of, const Priors& priors);
/// Evidence of what `all` holds beyond `known`: each marginal likelihood divided by that of `known`.
[[nodiscard]] EvidenceTriple evidence_beyond(const Marginals& all, const Marginals& known,
                                             const Priors& priors);

[[nodiscard]] bool accurate(const Marginals& of);

}  // namespace steelyard::replicating
