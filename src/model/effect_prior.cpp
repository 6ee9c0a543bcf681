// Priors of the mean effect: densities, distribution functions and quantiles, cut to a direction.
//
// A cut to `less` is the mirror image of a cut to `greater`, and a cut uniform is a narrower uniform, so
// one case is left: a symmetric location-scale distribution restricted to x > 0. Its mass P(X > 0) is
// kept as a logarithm, so that Normal(-5, 0.1) cut to `greater` (mass e^-1255) works like any other.
#include <algorithm>
#include <cmath>
#include <limits>
#include <variant>

#include "model/quantile.hpp"
#include "model/special.hpp"
#include "model/visit.hpp"
#include "steelyard/model.hpp"

namespace steelyard {

namespace {

using model::Kernel;
using model::Overloaded;
using model::Standard;

constexpr double infinity = std::numeric_limits<double>::infinity();
constexpr double not_a_number = std::numeric_limits<double>::quiet_NaN();

enum class Kind { location_scale, uniform, flat };

// A prior in canonical form: never `less`, and only a location-scale family is `cut` (to x > 0).
struct Canonical {
  Kind kind = Kind::location_scale;
  Standard standard;
  double location = 0.0;
  double scale = 1.0;
  double low = -infinity;
  double high = infinity;
  bool mirrored = false;
  bool cut = false;
};

Canonical canonical(const EffectPrior& prior) {
  Canonical c = std::visit(
      Overloaded{[](const CauchyPrior& f) {
                   return Canonical{Kind::location_scale, {Kernel::cauchy, 1.0}, f.location, f.scale};
                 },
                 [](const NormalPrior& f) {
                   return Canonical{Kind::location_scale, {Kernel::normal, 1.0}, f.mean, f.sd};
                 },
                 [](const StudentTPrior& f) {
                   return Canonical{Kind::location_scale, {Kernel::student, f.df}, f.location, f.scale};
                 },
                 [](const UniformPrior& f) { return Canonical{Kind::uniform, {}, 0.0, 1.0, f.low, f.high}; },
                 [](const FlatPrior&) {
                   return Canonical{Kind::flat, {}};
                 }},
      prior.family);
  if (prior.direction == Direction::less) {
    c.mirrored = true;
    c.location = 0.0 - c.location;
    const double low = c.low;
    c.low = 0.0 - c.high;
    c.high = 0.0 - low;
  }
  if (prior.direction != Direction::either) {
    c.cut = c.kind == Kind::location_scale;
    c.low = std::max(c.low, 0.0);
  }
  return c;
}

double uncut_log_density(const Canonical& c, double x) {
  return model::log_density(c.standard, (x - c.location) / c.scale) - std::log(c.scale);
}

double canonical_log_density(const Canonical& c, double x) {
  if (std::isnan(x)) return not_a_number;
  if (x < c.low || x > c.high || std::isinf(x)) return -infinity;
  if (c.kind == Kind::flat) return 0.0;
  if (c.kind == Kind::uniform) return -std::log(c.high - c.low);
  if (c.cut) {
    return model::log_density_beyond(c.standard, -c.location / c.scale, x / c.scale) - std::log(c.scale);
  }
  return uncut_log_density(c, x);
}

double uniform_lower(const Canonical& c, double x) {
  return std::clamp((x - c.low) / (c.high - c.low), 0.0, 1.0);
}
double uniform_upper(const Canonical& c, double x) {
  return std::clamp((c.high - x) / (c.high - c.low), 0.0, 1.0);
}

// Whether [0, x] is so narrow that the density should be integrated rather than two tails subtracted.
bool is_narrow(const Canonical& c, double x) {
  const double from = -c.location / c.scale;
  const double df = c.standard.kernel == Kernel::student ? std::min(1.0, c.standard.df) : 1.0;
  return x / c.scale * (1.0 + std::abs(from)) < 0.02 * std::sqrt(df);
}

// P(X ≤ x) of a distribution cut to x > 0.
double cut_lower(const Canonical& c, double x) {
  if (x <= 0.0) return 0.0;
  const double from = -c.location / c.scale;
  if (is_narrow(c, x)) return model::narrow_interval(c.standard, from, x / c.scale);
  return -std::expm1(model::log_upper_beyond(c.standard, from, x / c.scale));
}

double cut_upper(const Canonical& c, double x) {
  if (x <= 0.0) return 1.0;
  return std::exp(model::log_upper_beyond(c.standard, -c.location / c.scale, x / c.scale));
}

double canonical_lower(const Canonical& c, double x) {
  if (c.kind == Kind::flat || std::isnan(x)) return not_a_number;
  if (c.kind == Kind::uniform) return uniform_lower(c, x);
  if (c.cut) return cut_lower(c, x);
  return model::upper(c.standard, (c.location - x) / c.scale);
}

double canonical_upper(const Canonical& c, double x) {
  if (c.kind == Kind::flat || std::isnan(x)) return not_a_number;
  if (c.kind == Kind::uniform) return uniform_upper(c, x);
  if (c.cut) return cut_upper(c, x);
  return model::upper(c.standard, (x - c.location) / c.scale);
}

// Largest density inside the support stands here.
double nearest_to_mode(const Canonical& c) { return std::clamp(c.location, c.low, c.high); }

// The width of the density where it is largest: the family's scale, or, when a cut has removed the mode,
// the length over which what is left falls by a factor e.
double local_scale(const Canonical& c) {
  const double peak = nearest_to_mode(c);
  if (c.kind != Kind::location_scale || peak == c.location) return c.scale;
  double reach = c.scale;
  while (uncut_log_density(c, peak) - uncut_log_density(c, peak + reach) > 1.0) reach *= 0.5;
  return reach;
}

double canonical_quantile(const Canonical& c, double p) {
  if (c.kind == Kind::flat || !(p > 0.0 && p < 1.0)) return not_a_number;
  if (c.kind == Kind::uniform) {
    return p < 0.5 ? c.low + p * (c.high - c.low) : c.high - (1.0 - p) * (c.high - c.low);
  }
  if (!c.cut) {
    // 1 − p is exact for p ≥ ½; below, the lower tail is the mirrored upper one.
    return p < 0.5 ? c.location - c.scale * model::upper_quantile(c.standard, p)
                   : c.location + c.scale * model::upper_quantile(c.standard, 1.0 - p);
  }
  const auto deviation = [&](double x) {
    return p < 0.5 ? cut_lower(c, x) - p : (1.0 - p) - cut_upper(c, x);
  };
  return model::invert(deviation, 0.0, infinity, nearest_to_mode(c), local_scale(c));
}

}  // namespace

double log_density(const EffectPrior& prior, double effect) {
  const Canonical c = canonical(prior);
  return canonical_log_density(c, c.mirrored ? -effect : effect);
}

double cdf(const EffectPrior& prior, double effect) {
  const Canonical c = canonical(prior);
  return c.mirrored ? canonical_upper(c, -effect) : canonical_lower(c, effect);
}

double upper_cdf(const EffectPrior& prior, double effect) {
  const Canonical c = canonical(prior);
  return c.mirrored ? canonical_lower(c, -effect) : canonical_upper(c, effect);
}

double quantile(const EffectPrior& prior, double p) {
  const Canonical c = canonical(prior);
  // 1 − p would lose a small p: the mirrored quantile is sought by its own upper tail instead.
  if (!c.mirrored) return canonical_quantile(c, p);
  if (p > 1e-3 || c.kind != Kind::location_scale || !(p > 0.0)) return -canonical_quantile(c, 1.0 - p);
  return -model::invert([&](double x) { return p - cut_upper(c, x); }, 0.0, infinity, nearest_to_mode(c),
                        local_scale(c));
}

PriorShape shape(const EffectPrior& prior) {
  const Canonical c = canonical(prior);
  PriorShape s;
  s.low = c.low;
  s.high = c.high;
  if (c.kind == Kind::uniform) {
    s.center = 0.5 * (c.low + c.high);
    s.scale = 0.5 * (c.high - c.low);
    s.log_peak = -std::log(c.high - c.low);
  } else if (c.kind == Kind::location_scale) {
    s.center = nearest_to_mode(c);
    s.scale = local_scale(c);
    s.log_peak = canonical_log_density(c, s.center);
  }
  if (c.mirrored) {
    s.center = 0.0 - s.center;
    s.low = 0.0 - c.high;
    s.high = 0.0 - c.low;
  }
  return s;
}

double tail_order(const EffectPrior& prior) {
  return std::visit(
      Overloaded{[](const CauchyPrior&) { return 1.0; }, [](const StudentTPrior& f) { return f.df; },
                 [](const FlatPrior&) { return -1.0; }, [](const auto&) { return infinity; }},
      prior.family);
}

}  // namespace steelyard
