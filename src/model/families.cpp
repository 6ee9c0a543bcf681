#include "model/families.hpp"

namespace steelyard::model {

namespace {

using Arguments = std::span<const double>;

constexpr std::array<GrammarFamily<EffectFamily>, 4> effects = {{
    {"cauchy", "", "cauchy(location, scale)", 2,
     [](Arguments a) -> EffectFamily {
       return CauchyPrior{a[0], a[1]};
     }},
    {"normal", "", "normal(mean, sd)", 2,
     [](Arguments a) -> EffectFamily {
       return NormalPrior{a[0], a[1]};
     }},
    {"student-t", "t", "student-t(location, scale, df)", 3,
     [](Arguments a) -> EffectFamily {
       return StudentTPrior{a[0], a[1], a[2]};
     }},
    {"uniform", "", "uniform(low, high)", 2,
     [](Arguments a) -> EffectFamily {
       return UniformPrior{a[0], a[1]};
     }},
}};

constexpr std::array<GrammarFamily<SpreadFamily>, 7> spreads = {{
    {"half-cauchy", "", "half-cauchy(scale)", 1,
     [](Arguments a) -> SpreadFamily { return HalfCauchyPrior{a[0]}; }},
    {"half-normal", "", "half-normal(scale)", 1,
     [](Arguments a) -> SpreadFamily { return HalfNormalPrior{a[0]}; }},
    {"half-student-t", "half-t", "half-student-t(scale, df)", 2,
     [](Arguments a) -> SpreadFamily {
       return HalfStudentTPrior{a[0], a[1]};
     }},
    {"inverse-gamma", "", "inverse-gamma(shape, scale)", 2,
     [](Arguments a) -> SpreadFamily {
       return InverseGammaPrior{a[0], a[1]};
     }},
    {"log-normal", "lognormal", "log-normal(log mean, log sd)", 2,
     [](Arguments a) -> SpreadFamily {
       return LogNormalPrior{a[0], a[1]};
     }},
    {"exponential", "", "exponential(mean)", 1,
     [](Arguments a) -> SpreadFamily { return ExponentialPrior{a[0]}; }},
    {"uniform", "", "uniform(low, high)", 2,
     [](Arguments a) -> SpreadFamily {
       return UniformSpreadPrior{a[0], a[1]};
     }},
}};

}  // namespace

std::span<const GrammarFamily<EffectFamily>> effect_families() { return effects; }
std::span<const GrammarFamily<SpreadFamily>> spread_families() { return spreads; }

}  // namespace steelyard::model
