// One pass over a fixed grid of (mean, spread): at each spread the log likelihoods of all studies are
// evaluated once, and every subset (or every beginning of an order) adds its own sum of them.
#include "stress/shares.hpp"

#include <algorithm>
#include <cmath>
#include <cstdint>
#include <limits>
#include <numeric>

#include "numeric/chebyshev.hpp"
#include "pool/field.hpp"
#include "steelyard/numeric.hpp"
#include "stress/nodes.hpp"

namespace steelyard::stressing {

namespace {

constexpr double infinity = std::numeric_limits<double>::infinity();

// What one set of studies has gathered so far.
struct Gathered {
  double fixed_null = -infinity, fixed_effect = -infinity;
  double random_null = -infinity, random_effect = -infinity;
  std::size_t size = 0;
};

// The averaged log Bayes factor of an effect; a single study has only the same-effect models.
double log_bf(const Gathered& g, const Priors& priors) {
  if (g.size == 0) return 0.0;
  const auto weigh = [&](double fixed, Model fixed_model, double random, Model random_model) {
    const double a = priors.model[static_cast<std::size_t>(fixed_model)];
    const double b = g.size > 1 ? priors.model[static_cast<std::size_t>(random_model)] : 0.0;
    double sum = a > 0.0 ? fixed + std::log(a) : -infinity;
    if (b > 0.0) sum = numeric::log_add(sum, random + std::log(b));
    return sum - std::log(a + b);
  };
  return weigh(g.fixed_effect, Model::fixed_effect, g.random_effect, Model::random_effect) -
         weigh(g.fixed_null, Model::fixed_null, g.random_null, Model::random_null);
}

// The values at one spread: for each study at the means of the axis and, last, at mean 0.
struct Block {
  std::size_t width = 0;
  std::vector<double> rows;
  std::span<const double> weight;  // of the means
  bool fixed = false;
  double log_spread_weight = 0.0;

  [[nodiscard]] std::span<const double> row(std::size_t study) const {
    return {rows.data() + study * width, width};
  }
};

// Adds a set's sum of log likelihoods to what it has gathered.
void gather(Gathered& set, std::span<const double> sum, const Block& block, std::vector<double>& scratch) {
  const std::size_t means = sum.size() - 1;
  double top = -infinity;
  for (std::size_t j = 0; j < means; ++j) {
    scratch[j] = sum[j] + block.weight[j];
    top = std::max(top, scratch[j]);
  }
  double log_sum = -infinity;
  if (top > -infinity) {
    numeric::exp_shifted(scratch.data(), top, means);
    log_sum =
        top + std::log(std::accumulate(scratch.begin(), scratch.begin() + static_cast<long>(means), 0.0));
  }
  if (block.fixed) {
    set.fixed_effect = log_sum;
    set.fixed_null = sum[means];
  } else {
    set.random_effect = numeric::log_add(set.random_effect, log_sum + block.log_spread_weight);
    set.random_null = numeric::log_add(set.random_null, sum[means] + block.log_spread_weight);
  }
}

// Walks all blocks: the same-effect one first, then one a spread.
template <class Visit>
bool walk(std::span<const Study> studies, const Priors& priors, const std::function<bool()>& keep_going,
          Visit visit) {
  const Axis means = mean_axis(studies, priors.effect, 4);
  const Axis spreads = spread_axis(studies, priors.spread, 4);
  const bool random = priors.model[2] + priors.model[3] > 0.0 && studies.size() > 1;
  std::vector<double> at = means.x;
  at.push_back(0.0);
  std::vector<Likelihood> likelihoods;
  for (const Study& study : studies) likelihoods.push_back(likelihood(study));
  const pool_room::Field field(likelihoods);
  Block block;
  block.width = at.size();
  block.weight = means.log_weight;
  const std::size_t blocks = random ? spreads.x.size() + 1 : 1;
  for (std::size_t b = 0; b < blocks; ++b) {
    if (!keep_going()) return false;
    block.fixed = b == 0;
    block.log_spread_weight = block.fixed ? 0.0 : spreads.log_weight[b - 1];
    block.rows.assign(studies.size() * at.size(), 0.0);
    for (std::size_t i = 0; i < studies.size(); ++i) {
      field.evaluate_one(i, block.fixed ? 0.0 : spreads.x[b - 1], at,
                         {block.rows.data() + i * at.size(), at.size()});
    }
    visit(block);
  }
  return true;
}

// All subsets, by taking or leaving one study after the other; `sums[depth]` is the sum so far.
class Subsets {
 public:
  Subsets(std::size_t studies) : studies_(studies), sets_(std::size_t{1} << studies) {}

  void add(const Block& block) {
    sums_.assign((studies_ + 1) * block.width, 0.0);
    scratch_.assign(block.width, 0.0);
    descend(block, 0, 0);
  }
  [[nodiscard]] const std::vector<Gathered>& sets() const { return sets_; }

 private:
  void descend(const Block& block, std::size_t depth, std::size_t set) {
    const std::span<double> here(sums_.data() + depth * block.width, block.width);
    if (depth == studies_) {
      if (set == 0) return;
      gather(sets_[set], here, block, scratch_);
      return;
    }
    const std::span<double> next(sums_.data() + (depth + 1) * block.width, block.width);
    std::copy(here.begin(), here.end(), next.begin());
    descend(block, depth + 1, set);
    const std::span<const double> row = block.row(depth);
    for (std::size_t j = 0; j < row.size(); ++j) next[j] = here[j] + row[j];
    descend(block, depth + 1, set | (std::size_t{1} << depth));
  }

  std::size_t studies_;
  std::vector<Gathered> sets_;
  std::vector<double> sums_, scratch_;
};

std::size_t members(std::size_t set) {
  std::size_t count = 0;
  for (; set != 0; set &= set - 1) ++count;
  return count;
}

// Shapley's value: Σ over sets without i of |S|!(k−|S|−1)!/k! · (v(S ∪ i) − v(S)).
Shares over_all_orders(std::span<const Study> studies, const Priors& priors,
                       const std::function<bool()>& keep_going) {
  const std::size_t k = studies.size();
  Subsets subsets(k);
  Shares out;
  if (!walk(studies, priors, keep_going, [&](const Block& block) { subsets.add(block); })) return out;
  const std::size_t all = (std::size_t{1} << k) - 1;
  std::vector<double> value(all + 1);
  for (std::size_t set = 0; set <= all; ++set) {
    Gathered g = subsets.sets()[set];
    g.size = members(set);
    value[set] = log_bf(g, priors);
  }
  std::vector<double> weight(k);  // of a set of size s, for one study: 1/(k·C(k − 1, s))
  double choose = 1.0;
  for (std::size_t s = 0; s < k; ++s) {
    weight[s] = 1.0 / (static_cast<double>(k) * choose);
    choose = choose * static_cast<double>(k - 1 - s) / static_cast<double>(s + 1);
  }
  out.shares.resize(k);
  for (std::size_t i = 0; i < k; ++i) {
    const std::size_t bit = std::size_t{1} << i;
    for (std::size_t set = 0; set <= all; ++set) {
      if ((set & bit) == 0) out.shares[i].log_bf += weight[members(set)] * (value[set | bit] - value[set]);
    }
    out.alone.push_back(value[bit]);
    out.without.push_back(value[all ^ bit]);
  }
  out.all = value[all];
  return out;
}

// Eight fixed orders: four starting points around the circle of rows, each forwards and backwards.
std::vector<std::vector<std::size_t>> rotations(std::size_t k) {
  std::vector<std::vector<std::size_t>> orders;
  for (std::size_t start = 0; start < 4; ++start) {
    std::vector<std::size_t> order(k);
    for (std::size_t i = 0; i < k; ++i) order[i] = (start * k / 4 + i) % k;
    orders.push_back(order);
    std::reverse(order.begin(), order.end());
    orders.push_back(order);
  }
  return orders;
}

Shares over_rotations(std::span<const Study> studies, const Priors& priors,
                      const std::function<bool()>& keep_going) {
  const std::size_t k = studies.size();
  const std::vector<std::vector<std::size_t>> orders = rotations(k);
  std::vector<std::vector<Gathered>> begun(orders.size(), std::vector<Gathered>(k));
  std::vector<double> sum, scratch;
  const auto visit = [&](const Block& block) {
    scratch.assign(block.width, 0.0);
    for (std::size_t r = 0; r < orders.size(); ++r) {
      sum.assign(block.width, 0.0);
      for (std::size_t i = 0; i < k; ++i) {
        const std::span<const double> row = block.row(orders[r][i]);
        for (std::size_t j = 0; j < sum.size(); ++j) sum[j] += row[j];
        gather(begun[r][i], sum, block, scratch);
      }
    }
  };
  Shares out;
  if (!walk(studies, priors, keep_going, visit)) return out;
  out.exact = false;
  out.orders = orders.size();
  out.shares.resize(k);
  std::vector<std::vector<double>> steps(k);
  for (std::size_t r = 0; r < orders.size(); ++r) {
    double before = 0.0;
    for (std::size_t i = 0; i < k; ++i) {
      begun[r][i].size = i + 1;
      const double now = log_bf(begun[r][i], priors);
      steps[orders[r][i]].push_back(now - before);
      before = now;
    }
    out.all = before;
  }
  for (std::size_t i = 0; i < k; ++i) {
    const double n = static_cast<double>(orders.size());
    const double mean = std::accumulate(steps[i].begin(), steps[i].end(), 0.0) / n;
    double squares = 0.0;
    for (const double step : steps[i]) squares += (step - mean) * (step - mean);
    out.shares[i] = {mean, std::sqrt(squares / (n - 1.0))};
  }
  return out;
}

}  // namespace

Shares shares(std::span<const Study> studies, const Priors& priors, std::size_t exact_limit,
              const std::function<bool()>& keep_going) {
  return studies.size() <= exact_limit ? over_all_orders(studies, priors, keep_going)
                                       : over_rotations(studies, priors, keep_going);
}

}  // namespace steelyard::stressing
