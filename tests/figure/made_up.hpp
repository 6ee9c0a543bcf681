// Invented analyses for the tests of figures and formats: no real study is meant.
#pragma once

#include <cmath>
#include <memory>
#include <string>
#include <vector>

#include "steelyard/figure.hpp"

namespace made_up {

using namespace steelyard;

inline double normal_density(double x, double mean, double sd) {
  const double z = (x - mean) / sd;
  return std::exp(-z * z / 2) / (sd * 2.50662827463100050242);
}
inline double normal_cdf(double x, double mean, double sd) {
  return std::erfc(-(x - mean) / sd / std::sqrt(2.0)) / 2;
}

/// Mean effect Normal(mean, sd) under the same effect, a bit wider if effects vary; a log-Normal spread.
class NormalPosterior : public Posterior {
 public:
  NormalPosterior(double mean, double sd, double spread) : mean_(mean), sd_(sd), spread_(spread) {}

  double effect_density(Within within, double x) const override {
    return 0.5 * normal_density(x, mean_, first(within)) + 0.5 * normal_density(x, mean_, second(within));
  }
  double effect_cdf(Within within, double x) const override {
    return 0.5 * normal_cdf(x, mean_, first(within)) + 0.5 * normal_cdf(x, mean_, second(within));
  }
  double effect_quantile(Within within, double p) const override {
    return solve([&](double x) { return effect_cdf(within, x); }, p, mean_ - 60 * sd_, mean_ + 60 * sd_);
  }
  double spread_density(double x) const override {
    return x <= 0 ? 0.0 : normal_density(std::log(x), std::log(spread_), 0.5) / x;
  }
  double spread_cdf(double x) const override {
    return x <= 0 ? 0.0 : normal_cdf(std::log(x), std::log(spread_), 0.5);
  }
  double spread_quantile(double p) const override {
    return solve([&](double x) { return spread_cdf(x); }, p, 0.0, 100 * spread_);
  }
  double new_study_density(Within, double x) const override {
    return normal_density(x, mean_, std::hypot(sd_, spread_));
  }
  double new_study_cdf(Within, double x) const override {
    return normal_cdf(x, mean_, std::hypot(sd_, spread_));
  }
  double new_study_quantile(Within, double p) const override {
    const double wide = std::hypot(sd_, spread_);
    return solve([&](double x) { return normal_cdf(x, mean_, wide); }, p, mean_ - 60 * wide,
                 mean_ + 60 * wide);
  }
  double joint_log_density(double effect, double spread) const override {
    return std::log(normal_density(effect, mean_, std::hypot(sd_, spread / 3)) * spread_density(spread) +
                    1e-300);
  }

 private:
  double first(Within within) const { return within == Within::random_effect ? 1.4 * sd_ : sd_; }
  double second(Within within) const { return within == Within::fixed_effect ? sd_ : 1.4 * sd_; }
  template <class Function>
  static double solve(const Function& cdf, double p, double low, double high) {
    for (int i = 0; i < 200; ++i) {
      const double middle = (low + high) / 2;
      (cdf(middle) < p ? low : high) = middle;
    }
    return (low + high) / 2;
  }
  double mean_, sd_, spread_;
};

inline Summary summary(double mean, double sd) {
  return {mean, sd, mean, mean - 1.96 * sd, mean + 1.96 * sd, ""};
}

inline Study study(std::size_t index, const std::string& label, double t, double n_per_group) {
  Study out;
  out.label = label;
  out.row = index;
  out.line = index + 2;
  out.route = "t-and-n";
  out.how = "t as printed, with the sizes of two groups.";
  out.evidence = ExactT{t, 2 * n_per_group - 2, n_per_group / 2, false};
  const double d = t * std::sqrt(2 / n_per_group);
  out.effect = {d, d * 0.98, std::sqrt(2 / n_per_group)};
  out.year = 1990 + static_cast<double>(index % 30);
  return out;
}

/// `count` studies around `effect`, of sizes from 12 to 150 per group; deterministic.
inline Analysis analysis(std::size_t count, double effect = 0.4, double scale = 1.0,
                         const std::string& label = "") {
  Analysis out;
  out.input.file = "made-up.csv";
  out.input.sha256 = std::string(64, 'a');
  double sum = 0, weight = 0;
  for (std::size_t i = 0; i < count; ++i) {
    const double n = 12 + static_cast<double>((i * 37) % 139);
    const double wobble = 1.3 * std::sin(12.9898 * static_cast<double>(i + 1));
    const double t = (effect * scale) * std::sqrt(n / 2) + wobble * (scale > 10 ? scale : 1.0);
    static constexpr const char* names[] = {"Arkin",   "Belov", "Castellanos", "Du",
                                            "Ekwueme", "Fjeld", "Grabowska"};
    const std::string name =
        label.empty() ? std::string(names[i % 7]) + " " + std::to_string(1990 + i % 30) : label;
    out.studies.push_back(study(i, name, t, n));
    sum += n * t * std::sqrt(2 / n);
    weight += n;
  }
  const double mean = sum / weight, sd = std::sqrt(2 / weight) * (scale > 10 ? scale : 1.0);
  PoolResult& result = out.result;
  for (std::size_t i = 0; i < count; ++i) {
    const auto& t = std::get<ExactT>(out.studies[i].evidence);
    const double own = 0.5 * mean + 0.5 * t.t / std::sqrt(t.n_effective);
    result.studies.push_back({t.t * t.t / 2 - 1.2 - 0.2 * std::log(t.n_effective), 1e-12,
                              summary(own, 0.7 * std::sqrt(1 / t.n_effective) * (scale > 10 ? scale : 1.0))});
  }
  result.pooled_effect_fixed = summary(mean, sd);
  result.pooled_effect_random = summary(mean, 1.4 * sd);
  result.pooled_effect = summary(mean, 1.2 * sd);
  result.new_study = summary(mean, std::hypot(sd, 0.2));
  result.spread = summary(0.2, 0.06);
  result.i2 = {0.4, 0.1, 0.41, 0.2, 0.6, ""};
  result.effect = LogBayesFactor{mean * mean / sd / sd / 2 - 2, 1e-10};
  result.effect_fixed = LogBayesFactor{mean * mean / sd / sd / 2 - 1, 1e-10};
  result.effect_random = LogBayesFactor{mean * mean / sd / sd / 4 - 2, 1e-10};
  result.heterogeneity = LogBayesFactor{-1.25, 1e-10};
  for (std::size_t m = 0; m < model_count; ++m)
    result.models[m] = {static_cast<Model>(m), 0.25, m == 1 ? 0.7 : 0.1,
                        Integral{-12.5 - static_cast<double>(m), 2e-11, 900, IntegralStatus::ok}};
  if (count == 1) {
    result.models[2].integral.reset();
    result.models[3].integral.reset();
    result.effect_random.reset();
    result.heterogeneity.reset();
    result.pooled_effect_random = {{}, {}, {}, {}, {}, "One study can't tell how much effects vary."};
    result.spread = result.pooled_effect_random;
    result.i2 = result.pooled_effect_random;
  }
  result.posterior = std::make_shared<NormalPosterior>(mean, sd, 0.2);
  return out;
}

/// Pooled answers as the first study, then the first two, ... come in.
inline std::vector<figure::Answer> answers(const Analysis& analysis) {
  std::vector<figure::Answer> out;
  double log_bf = -0.4;
  for (std::size_t i = 0; i < analysis.studies.size(); ++i) {
    log_bf += 0.4 * analysis.result.studies[i].log_bf * std::cos(static_cast<double>(i)) + 0.1;
    out.push_back({analysis.studies[i].label, analysis.studies[i].year, log_bf, {0.4, 0.2, 0.6, ""}});
  }
  return out;
}

/// Pooled answers without each study.
inline std::vector<figure::Answer> without(const Analysis& analysis) {
  std::vector<figure::Answer> out = answers(analysis);
  const double all = *out.back().log_bf;
  for (std::size_t i = 0; i < out.size(); ++i) out[i].log_bf = all - 0.3 * analysis.result.studies[i].log_bf;
  return out;
}

/// A grid over which the verdict turns at wide priors.
inline figure::PriorGrid grid(std::size_t widths, std::size_t scales) {
  figure::PriorGrid out;
  for (std::size_t i = 0; i < widths; ++i)
    out.widths.push_back(0.1 * std::pow(30.0, static_cast<double>(i) / static_cast<double>(widths - 1)));
  for (std::size_t j = 0; j < scales; ++j)
    out.scales.push_back(0.02 * std::pow(50.0, static_cast<double>(j) / static_cast<double>(scales - 1)));
  for (const double width : out.widths)
    for (const double scale : out.scales)
      out.log_bf.push_back(4.0 - 3.5 * std::log(1 + width) - 2.0 * std::sqrt(scale));
  out.width_used = 0.7071;
  out.scale_used = 0.15;
  return out;
}

}  // namespace made_up
