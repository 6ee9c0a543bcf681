// The evidence that each study carries, averaged over orders of arrival.
#pragma once

#include <cstddef>
#include <functional>
#include <span>
#include <vector>

#include "steelyard/stress.hpp"

namespace steelyard::stressing {

struct Shares {
  std::vector<Share> shares;
  bool exact = true;
  std::size_t orders = 0;
  /// The averaged log Bayes factor of all studies, of each alone, and without each, on the same grid: to be
  /// compared with exact values. `without` is empty when not exact.
  double all = 0.0;
  std::vector<double> alone, without;
};

/// `keep_going` is called between blocks; when it says false the shares are empty.
[[nodiscard]] Shares shares(std::span<const Study> studies, const Priors& priors, std::size_t exact_limit,
                            const std::function<bool()>& keep_going);

}  // namespace steelyard::stressing
