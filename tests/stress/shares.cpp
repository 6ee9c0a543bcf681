// The evidence that each study carries.
#include <algorithm>
#include <catch2/catch.hpp>
#include <cmath>
#include <numeric>
#include <vector>

#include "steelyard/stress.hpp"
#include "stress/shares.hpp"
#include "weigh/made_up.hpp"

using namespace steelyard;

namespace {

double averaged(const std::vector<Study>& studies) {
  return studies.empty() ? 0.0 : pool(studies, Priors{}).value->effect->log_bf;
}

// Shapley's value by its definition: all orders, the exact answers.
std::vector<double> by_definition(const std::vector<Study>& studies) {
  std::vector<std::size_t> order(studies.size());
  std::iota(order.begin(), order.end(), std::size_t{0});
  std::vector<double> sums(studies.size(), 0.0);
  double orders = 0.0;
  do {
    std::vector<Study> so_far;
    double before = 0.0;
    for (const std::size_t i : order) {
      so_far.push_back(studies[i]);
      const double now = averaged(so_far);
      sums[i] += now - before;
      before = now;
    }
    orders += 1.0;
  } while (std::next_permutation(order.begin(), order.end()));
  for (double& sum : sums) sum /= orders;
  return sums;
}

std::vector<Study> many(std::size_t count) {
  std::vector<Study> studies;
  for (std::size_t i = 0; i < count; ++i) {
    const double x = static_cast<double>((i * 37) % 11) / 5.0;
    studies.push_back(made_up::two_groups("s", 0.2 + x, 12.0 + static_cast<double>((i * 53) % 40)));
  }
  return studies;
}

}  // namespace

TEST_CASE("shares over all orders are Shapley's value") {
  const std::vector<Study> studies = {made_up::two_groups("a", 3.1, 24), made_up::two_groups("b", -0.4, 50),
                                      made_up::two_groups("c", 1.8, 15, true)};
  const auto expected = by_definition(studies);
  StressOptions options;
  options.grid = false;
  const auto result = stress(studies, Priors{}, options);
  REQUIRE(result.ok());
  REQUIRE(result.value->shares.size() == 3);
  CHECK(result.value->shares_exact);
  for (std::size_t i = 0; i < 3; ++i) {
    const Share& share = result.value->shares[i];
    CHECK(std::abs(share.log_bf - expected[i]) <= share.error + 1e-8);
    CHECK(share.error < 1e-5);
  }
}

TEST_CASE("shares add up to the evidence of all") {
  for (const std::size_t count : {2UL, 7UL, 12UL, 13UL, 40UL}) {
    StressOptions options;
    options.grid = false;
    const auto result = stress(many(count), Priors{}, options);
    REQUIRE(result.ok());
    const auto& shares = result.value->shares;
    REQUIRE(shares.size() == count);
    CHECK(result.value->shares_exact == (count <= 12));
    const double sum = std::accumulate(shares.begin(), shares.end(), 0.0,
                                       [](double total, const Share& share) { return total + share.log_bf; });
    CHECK(sum == Approx(result.value->base.effect->log_bf).margin(1e-4));
  }
}

TEST_CASE("rotations come close to all orders, within their stated error") {
  const auto studies = many(9);
  const auto go = [] { return true; };
  const stressing::Shares exact = stressing::shares(studies, Priors{}, 12, go);
  const stressing::Shares some = stressing::shares(studies, Priors{}, 4, go);
  CHECK(exact.exact);
  CHECK_FALSE(some.exact);
  CHECK(some.orders == 8);
  CHECK(some.all == Approx(exact.all).margin(1e-9));
  std::size_t within = 0;
  for (std::size_t i = 0; i < 9; ++i) {
    within += std::abs(some.shares[i].log_bf - exact.shares[i].log_bf) <= some.shares[i].error ? 1 : 0;
  }
  CHECK(within == 9);
}

TEST_CASE("two equal studies carry the same") {
  auto studies = many(5);
  studies[4] = studies[1];
  const stressing::Shares s = stressing::shares(studies, Priors{}, 12, [] { return true; });
  CHECK(s.shares[4].log_bf == Approx(s.shares[1].log_bf).margin(1e-12));
}
