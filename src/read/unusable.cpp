#include "read/unusable.hpp"

namespace steelyard::read {

namespace {

constexpr std::string_view counts = "For a table of two groups give its counts: events1, n1, events2, n2.";
constexpr std::string_view f_instead =
    "Give F with its degrees of freedom, or the means and standard deviations.";
constexpr std::string_view ranks =
    "Give means and standard deviations, or medians with quartiles, and the group sizes.";
constexpr std::string_view bayes = "It depends on its prior; give the test statistic that it was made from.";
constexpr std::string_view regression = "Give its t and df, or give it as estimate with se and metric.";
constexpr std::string_view ratio = "Give the counts (events1, n1, events2, n2) or the odds ratio.";
constexpr std::string_view test =
    "Give the means, standard deviations and group sizes that it was made from.";
constexpr std::string_view other_d =
    "Give the means, standard deviations and r_pair, or t with the number of pairs.";

constexpr Unusable table[] = {
    {"chi2", "χ²", counts},
    {"chi", "χ²", counts},
    {"x2", "χ²", counts},
    {"g2", "G²", counts},
    {"phi", "φ", counts},
    {"z", "z", test},
    {"q", "Q", test},
    {"u", "U", ranks},
    {"h", "H", ranks},
    {"w", "W", ranks},
    {"rho", "ρ", ranks},
    {"tau", "τ", ranks},
    {"eta2", "η²", f_instead},
    {"eta2p", "partial η²", f_instead},
    {"etap2", "partial η²", f_instead},
    {"omega2", "ω²", f_instead},
    {"omega2p", "partial ω²", f_instead},
    {"omegap2", "partial ω²", f_instead},
    {"r2", "R²", f_instead},
    {"mse", "MSE", f_instead},
    {"b", "a regression coefficient", regression},
    {"beta", "β", regression},
    {"bf", "a Bayes factor", bayes},
    {"bf10", "a Bayes factor", bayes},
    {"bf01", "a Bayes factor", bayes},
    {"rr", "a risk ratio", ratio},
    {"hr", "a hazard ratio", "Give its logarithm as estimate, with se and metric."},
    {"drm", "d for repeated measures", other_d},
    {"dav", "d by the average standard deviation", other_d},
    {"smd", "SMD", "Say which it is: write d = or g =."},
};

}  // namespace

const Unusable* find_unusable(std::string_view word) {
  for (const Unusable& entry : table) {
    if (entry.word == word) return &entry;
  }
  return nullptr;
}

}  // namespace steelyard::read
