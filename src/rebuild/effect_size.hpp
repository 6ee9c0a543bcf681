#pragma once

#include "steelyard/rebuild.hpp"
#include "steelyard/study.hpp"

namespace steelyard::rebuilding {

/// d = t/√n_effective, g = J(df)·d, SE(g) = J·√(1/n_effective + d²/(2·people)), the large-sample formula
/// that papers print (Borenstein et al. 2009, eqs. 4.20–4.24). g is absent at df ≤ 1, its SE at df ≤ 2, all
/// of them for bands. For an estimate: the estimate and its SE.
[[nodiscard]] EffectSize effect_size(const Evidence& evidence, Design design, double people);

}  // namespace steelyard::rebuilding
