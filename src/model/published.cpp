// Priors from the literature, by name. Where a source gives a prior of τ², the definition here is the
// same prior written for τ: if log τ² ~ Normal(m, s²) then log τ ~ Normal(m/2, (s/2)²).
// Parameters are from memory of the sources unless docs/model.md says otherwise.
#include <array>

#include "steelyard/model.hpp"

namespace steelyard {

namespace {

constexpr std::array<PublishedPrior, 6> effects = {{
    {"default", "cauchy(0, 1/sqrt(2))",
     "standardized mean differences when nothing else is known; half of its mass lies beyond ±0.71",
     "common practice since Rouder, Speckman, Sun, Morey & Iverson (2009), Psychonomic Bulletin & Review 16, "
     "225-237, who took the scale 1"},
    {"jeffreys-1961", "cauchy(0, 1)", "the standardized mean of a Normal sample",
     "Jeffreys (1961), Theory of Probability, 3rd ed., section 5.2"},
    {"rouder-2009", "cauchy(0, 1)", "standardized mean differences in psychology",
     "Rouder, Speckman, Sun, Morey & Iverson (2009), Psychonomic Bulletin & Review 16, 225-237"},
    {"unit-information", "normal(0, 1)", "standardized mean differences, as much information as one score",
     "Kass & Wasserman (1995), Journal of the American Statistical Association 90, 928-934; for t tests "
     "Rouder "
     "et al. (2009)"},
    {"gronau-2020", "student-t(0.35, 0.102, 3)",
     "a small positive standardized effect, elicited from an expert on a facial-feedback study and used "
     "since "
     "for other small expected effects",
     "Gronau, Ly & Wagenmakers (2020), The American Statistician 74, 137-143; used in pooling by Gronau et "
     "al. "
     "(2017), Comprehensive Results in Social Psychology 2, 123-138"},
    {"medicine-2021", "student-t(0, 0.43, 5)",
     "standardized mean differences in medicine, fitted to a large database of clinical reviews",
     "Bartoš, Gronau, Timmers, Otte, Ly & Wagenmakers (2021), Statistics in Medicine 40, 6743-6761"},
}};

constexpr std::array<PublishedPrior, 9> spreads = {{
    {"default", "inverse-gamma(1, 0.15)",
     "the spread of standardized mean differences in psychology, fitted to published non-zero estimates",
     "Gronau, Van Erp, Heck, Cesario, Jonas & Wagenmakers (2017), Comprehensive Results in Social Psychology "
     "2, "
     "123-138"},
    {"gronau-2017", "inverse-gamma(1, 0.15)",
     "the spread of standardized mean differences in psychology, fitted to published non-zero estimates",
     "Gronau, Van Erp, Heck, Cesario, Jonas & Wagenmakers (2017), Comprehensive Results in Social Psychology "
     "2, "
     "123-138"},
    {"medicine-2021", "inverse-gamma(1.71, 0.73)",
     "the spread of standardized mean differences in medicine, fitted to a large database of clinical "
     "reviews",
     "Bartoš, Gronau, Timmers, Otte, Ly & Wagenmakers (2021), Statistics in Medicine 40, 6743-6761"},
    {"polson-scott-2012", "half-cauchy(1)", "a scale in units of the residual SD, when nothing else is known",
     "Polson & Scott (2012), Bayesian Analysis 7, 887-902"},
    {"gelman-2006", "half-cauchy(25)",
     "three schools of the eight-schools data, in points of a test with an SD of about 100 points",
     "Gelman (2006), Bayesian Analysis 1, 515-534"},
    {"friede-2017", "half-normal(0.5)",
     "the spread of log odds ratios with few small studies; also discussed by Röver et al. (2021), Research "
     "Synthesis Methods 12, 448-474",
     "Friede, Röver, Wandel & Neuenschwander (2017), Research Synthesis Methods 8, 79-91"},
    {"friede-2017-wide", "half-normal(1)",
     "the spread of log odds ratios with few small studies, the more cautious choice",
     "Friede, Röver, Wandel & Neuenschwander (2017), Research Synthesis Methods 8, 79-91"},
    {"turner-2012-log-odds", "log-normal(-1.28, 0.87)",
     "the spread of log odds ratios in health care, any outcome and comparison; published for the variance "
     "as "
     "log-normal(-2.56, 1.74)",
     "Turner, Davey, Clarke, Thompson & Higgins (2012), International Journal of Epidemiology 41, 818-827; "
     "Turner, Jackson, Wei, Thompson & Higgins (2015), Statistics in Medicine 34, 984-998"},
    {"turner-2015-mortality", "log-normal(-2.03, 0.725)",
     "the spread of log odds ratios of death from any cause, a drug against placebo or usual care; published "
     "for the variance as log-normal(-4.06, 1.45)",
     "Turner, Jackson, Wei, Thompson & Higgins (2015), Statistics in Medicine 34, 984-998"},
}};

}  // namespace

std::span<const PublishedPrior> published_effect_priors() { return effects; }
std::span<const PublishedPrior> published_spread_priors() { return spreads; }

}  // namespace steelyard
