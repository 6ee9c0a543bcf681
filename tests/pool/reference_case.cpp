#include "pool/reference_case.hpp"

namespace reference {

namespace {

using Line = std::vector<std::string>;

double at(const Line& line, std::size_t i) { return number(line.at(i)); }

steelyard::EffectPrior effect_prior(const Line& line) {
  steelyard::EffectPrior prior;
  const std::string& name = line.at(1);
  if (name == "cauchy") prior.family = steelyard::CauchyPrior{at(line, 2), at(line, 3)};
  if (name == "normal") prior.family = steelyard::NormalPrior{at(line, 2), at(line, 3)};
  if (name == "student-t") prior.family = steelyard::StudentTPrior{at(line, 2), at(line, 3), at(line, 4)};
  if (name == "uniform") prior.family = steelyard::UniformPrior{at(line, 2), at(line, 3)};
  if (line.back() == "greater") prior.direction = steelyard::Direction::greater;
  if (line.back() == "less") prior.direction = steelyard::Direction::less;
  return prior;
}

steelyard::SpreadPrior spread_prior(const Line& line) {
  const std::string& name = line.at(1);
  if (name == "half-cauchy") return {steelyard::HalfCauchyPrior{at(line, 2)}};
  if (name == "half-normal") return {steelyard::HalfNormalPrior{at(line, 2)}};
  if (name == "half-student-t") return {steelyard::HalfStudentTPrior{at(line, 2), at(line, 3)}};
  if (name == "inverse-gamma") return {steelyard::InverseGammaPrior{at(line, 2), at(line, 3)}};
  if (name == "log-normal") return {steelyard::LogNormalPrior{at(line, 2), at(line, 3)}};
  if (name == "exponential") return {steelyard::ExponentialPrior{at(line, 2)}};
  if (name == "uniform") return {steelyard::UniformSpreadPrior{at(line, 2), at(line, 3)}};
  throw std::runtime_error("unknown spread prior in a reference table: " + name);
}

steelyard::Evidence evidence(const Line& line) {
  const std::string& kind = line.at(1);
  if (kind == "exact_t" || kind == "folded_t") {
    return steelyard::ExactT{at(line, 2), at(line, 3), at(line, 4), kind == "folded_t"};
  }
  if (kind == "normal" || kind == "folded_normal") {
    return steelyard::NormalEstimate{at(line, 2), at(line, 3), kind == "folded_normal"};
  }
  steelyard::BandT band;
  band.df = at(line, 2);
  band.n_effective = at(line, 3);
  for (std::size_t i = 4; i + 1 < line.size(); i += 2) band.bands.push_back({at(line, i), at(line, i + 1)});
  return band;
}

void read_answer(Case& c, const Line& line) {
  const std::string& kind = line.at(0);
  if (kind == "marginal") {
    c.marginals.push_back({line.at(1), at(line, 2), at(line, 3)});
  } else if (kind == "moments") {
    c.moments.push_back({line.at(1), at(line, 2), at(line, 3)});
  } else if (kind == "quantile") {
    c.quantiles.push_back({line.at(1), at(line, 2), at(line, 3), at(line, 4)});
  } else if (kind == "probability") {
    c.probabilities.push_back({line.at(1), at(line, 2), at(line, 3)});
  } else if (kind == "shrunken") {
    c.shrunken.push_back({static_cast<std::size_t>(at(line, 1)), at(line, 2), at(line, 3), at(line, 4),
                          at(line, 5), at(line, 6), at(line, 7)});
  } else {
    throw std::runtime_error("unknown line in a reference table: " + kind);
  }
}

}  // namespace

std::vector<Case> cases(const std::string& table) {
  std::vector<Case> result;
  for (const Line& line : rows(table, false)) {
    const std::string& kind = line.at(0);
    if (kind == "case") {
      result.emplace_back();
      result.back().name = line.at(1);
    } else if (kind == "effect") {
      result.back().priors.effect = effect_prior(line);
    } else if (kind == "spread") {
      result.back().priors.spread = spread_prior(line);
    } else if (kind == "study") {
      steelyard::Study study;
      study.label = "study " + std::to_string(result.back().studies.size() + 1);
      study.evidence = evidence(line);
      result.back().studies.push_back(study);
    } else if (kind == "repeat") {
      const steelyard::Study last = result.back().studies.back();
      result.back().studies.resize(result.back().studies.size() - 1 + static_cast<std::size_t>(at(line, 1)),
                                   last);
    } else {
      read_answer(result.back(), line);
    }
  }
  return result;
}

}  // namespace reference
