#include "pool/prior_block.hpp"

#include <algorithm>
#include <cmath>
#include <limits>
#include <variant>

#include "pool/kernels.hpp"

namespace steelyard::pool_room {

PriorBlock::PriorBlock(const EffectPrior& prior) : shape_(steelyard::shape(prior)), prior_(prior) {
  if (const auto* cauchy = std::get_if<CauchyPrior>(&prior.family)) {
    kernel_ = Kernel::cauchy;
    location_ = cauchy->location;
    inv_scale_ = 1.0 / cauchy->scale;
    inv_df_ = 1.0;
    power_ = 1.0;
  } else if (const auto* normal = std::get_if<NormalPrior>(&prior.family)) {
    kernel_ = Kernel::normal;
    location_ = normal->mean;
    inv_scale_ = 1.0 / normal->sd;
  } else if (const auto* student = std::get_if<StudentTPrior>(&prior.family)) {
    kernel_ = Kernel::student;
    location_ = student->location;
    inv_scale_ = 1.0 / student->scale;
    inv_df_ = 1.0 / student->df;
    power_ = 0.5 * (student->df + 1.0);
  }
  if (kernel_ == Kernel::flat) {
    constant_ = std::holds_alternative<FlatPrior>(prior.family) ? 0.0 : shape_.log_peak;
    return;
  }
  // The constant, cut included, from the density where it is largest.
  const double x = std::clamp(location_, shape_.low, shape_.high);
  double kernel = 0.0;
  add({&x, 1}, {&kernel, 1});
  constant_ = steelyard::log_density(prior, x) - kernel;
}

void PriorBlock::add(std::span<const double> x, std::span<double> out) const {
  switch (kernel_) {
    case Kernel::flat:
      for (double& value : out) value += constant_;
      return;
    case Kernel::normal:
      add_normal(location_, 0.5 * inv_scale_ * inv_scale_, constant_, x.data(), out.data(), x.size());
      return;
    case Kernel::cauchy:
    case Kernel::student:
      add_log_power(location_, inv_scale_, inv_df_, power_, constant_, x.data(), out.data(), x.size());
      return;
  }
}

double PriorBlock::at(double x) const {
  if (!(x >= shape_.low && x <= shape_.high)) return -std::numeric_limits<double>::infinity();
  double out = 0.0;
  add({&x, 1}, {&out, 1});
  return out;
}

}  // namespace steelyard::pool_room
