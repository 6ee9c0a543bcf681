#include "figure/contour.hpp"

#include <cmath>

#include <catch2/catch.hpp>

using namespace steelyard::figure;

namespace {

template <class Function>
Grid sampled_grid(const Function& f, std::size_t count, double half_width) {
  Grid grid;
  for (std::size_t i = 0; i < count; ++i)
    grid.xs.push_back(-half_width + 2 * half_width * static_cast<double>(i) / static_cast<double>(count - 1));
  grid.ys = grid.xs;
  for (const double x : grid.xs)
    for (const double y : grid.ys) grid.values.push_back(f(x, y));
  return grid;
}

double area(const Curve& ring) {
  double sum = 0;
  for (std::size_t i = 1; i < ring.size(); ++i) sum += ring[i - 1].x * ring[i].y - ring[i].x * ring[i - 1].y;
  return std::fabs(sum) / 2;
}

}  // namespace

TEST_CASE("the contour of a cone is a circle", "[contour]") {
  const Grid grid = sampled_grid([](double x, double y) { return 2 - std::hypot(x, y); }, 81, 2.0);
  const auto lines = contour_lines(grid, 1.0);
  REQUIRE(lines.size() == 1);
  CHECK(lines[0].front().x == lines[0].back().x);
  for (const Point& point : lines[0]) CHECK(std::hypot(point.x, point.y) == Approx(1.0).margin(0.002));
  CHECK(area(lines[0]) == Approx(3.14159265).epsilon(0.005));
}

TEST_CASE("two hills have two rings, and the saddle parts them", "[contour]") {
  const auto hills = [](double x, double y) {
    return std::exp(-8 * std::hypot(x - 1, y) * std::hypot(x - 1, y)) +
           std::exp(-8 * std::hypot(x + 1, y) * std::hypot(x + 1, y));
  };
  CHECK(contour_rings(sampled_grid(hills, 60, 2.0), 0.5).size() == 2);
  // A chequered square of four cells: every corner case of the saddle closes.
  const Grid saddle{{0, 1, 2}, {0, 1, 2}, {1, 0, 1, 0, 1, 0, 1, 0, 1}};
  for (const auto& ring : contour_rings(saddle, 0.5)) {
    CHECK(ring.front().x == ring.back().x);
    CHECK(ring.front().y == ring.back().y);
  }
}

TEST_CASE("a region that meets the edge of the grid is closed along it", "[contour]") {
  const Grid grid = sampled_grid([](double x, double) { return x; }, 21, 1.0);
  const auto open = contour_lines(grid, 0.25);
  REQUIRE(open.size() == 1);
  for (const Point& point : open[0]) CHECK(point.x == Approx(0.25));
  const auto rings = contour_rings(grid, 0.25);
  REQUIRE(rings.size() == 1);
  CHECK(area(rings[0]) == Approx(0.75 * 2.0));
}
