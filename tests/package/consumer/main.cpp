#include <iostream>
#include <steelyard/analysis.hpp>
#include <steelyard/figure.hpp>
#include <steelyard/json.hpp>
#include <steelyard/numeric.hpp>
#include <steelyard/render.hpp>

std::size_t routes_in_second_unit();

int main() {
  const auto analysis = steelyard::analyse_pool("study,n1,n2,t\nA,20,20,2.1\nB,30,30,1.4\n", "in memory");
  if (!analysis.ok()) return 1;
  std::cout << steelyard::render_json(*analysis.value);
  return routes_in_second_unit() > 0 ? 0 : 1;
}
