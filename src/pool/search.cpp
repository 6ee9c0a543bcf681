#include "pool/search.hpp"

#include <algorithm>
#include <cmath>

namespace steelyard::pool_room {

namespace {

struct Point {
  double x;
  double value;
};

class Search {
 public:
  explicit Search(const SearchSpace& space) : space_(space) {}

  Window run() {
    look(space_.start);
    std::vector<double> ends;
    for (const double end : {space_.low, space_.high})
      if (std::isfinite(end)) ends.push_back(end);
    look(ends);
    bracket();
    refine_peaks();
    measure_peak();
    Window window;
    window.low = trimmed_end(-1);
    window.high = trimmed_end(1);
    measure_peak();
    window.best = points_[best_].x;
    window.log_best = points_[best_].value;
    window.width = width_;
    window.evaluations = evaluations_;
    return window;
  }

 private:
  /// Evaluates new points and keeps the list sorted.
  void look(std::vector<double> xs) {
    std::sort(xs.begin(), xs.end());
    xs.erase(std::unique(xs.begin(), xs.end()), xs.end());
    std::erase_if(xs, [this](double x) {
      if (!(x >= space_.low && x <= space_.high) || !std::isfinite(x)) return true;
      return std::any_of(points_.begin(), points_.end(), [x](const Point& p) { return p.x == x; });
    });
    if (xs.empty()) return;
    values_.resize(xs.size());
    space_.log_integrand(xs, values_);
    evaluations_ += xs.size();
    for (std::size_t j = 0; j < xs.size(); ++j) points_.push_back({xs[j], values_[j]});
    std::sort(points_.begin(), points_.end(), [](const Point& a, const Point& b) { return a.x < b.x; });
    find_best();
  }

  void find_best() {
    best_ = 0;
    for (std::size_t i = 1; i < points_.size(); ++i)
      if (points_[i].value > points_[best_].value) best_ = i;
  }

  /// Widens until the best point has a neighbour (or the end of the support) on either side.
  void bracket() {
    for (int round = 0; round < 400; ++round) {
      const double x = points_[best_].x;
      const double span = std::max(points_.back().x - points_.front().x, 1e-12 * std::fabs(x) + 1e-300);
      if (best_ == 0 && x > space_.low)
        look({std::max(space_.low, x - span), std::max(space_.low, x - 3.0 * span)});
      else if (best_ + 1 == points_.size() && x < space_.high)
        look({std::min(space_.high, x + span), std::min(space_.high, x + 3.0 * span)});
      else
        return;
    }
  }

  /// How far the integrand falls from a point to its neighbour; 0 at an end of the support.
  [[nodiscard]] double fall(std::size_t i, int side) const {
    if (side < 0) return i == 0 ? 0.0 : points_[i].value - points_[i - 1].value;
    return i + 1 == points_.size() ? 0.0 : points_[i].value - points_[i + 1].value;
  }

  /// The first local peak that counts and isn't resolved yet, or nothing.
  [[nodiscard]] std::size_t unresolved() const {
    constexpr double resolved = 3.0;
    for (std::size_t i = 0; i < points_.size(); ++i) {
      if (!(points_[i].value > points_[best_].value - 60.0)) continue;
      const double left = fall(i, -1);
      const double right = fall(i, 1);
      if (left < 0.0 || right < 0.0) continue;  // not a peak
      if (left > resolved && gap(i, -1) > shortest(i)) return i;
      if (right > resolved && gap(i, 1) > shortest(i)) return i;
    }
    return points_.size();
  }

  [[nodiscard]] double gap(std::size_t i, int side) const {
    return side < 0 ? points_[i].x - points_[i - 1].x : points_[i + 1].x - points_[i].x;
  }
  [[nodiscard]] double shortest(std::size_t i) const { return 1e-13 * (std::fabs(points_[i].x) + 1e-13); }

  /// Closes in: a Normal peak that falls by `drop` over a gap falls by one over gap/√drop.
  void refine_peaks() {
    for (int round = 0; round < 200; ++round) {
      const std::size_t i = unresolved();
      if (i == points_.size()) return;
      std::vector<double> more;
      for (const int side : {-1, 1}) {
        const double drop = fall(i, side);
        if (drop <= 1.0) continue;
        const double share = std::isfinite(drop) ? std::clamp(std::sqrt(1.5 / drop), 0.01, 0.5) : 0.25;
        more.push_back(points_[i].x + side * share * gap(i, side));
      }
      const std::size_t before = points_.size();
      look(std::move(more));
      if (points_.size() == before) return;
    }
  }

  /// The width of the highest peak, from a parabola through its neighbours.
  void measure_peak() {
    const std::size_t n = points_.size();
    width_ = n > 1 ? points_.back().x - points_.front().x : 1.0;
    if (n == 1) return;
    const bool inside = best_ > 0 && best_ + 1 < n;
    if (!inside) {
      const int side = best_ == 0 ? 1 : -1;
      const double drop = fall(best_, side);
      width_ = gap(best_, side) / std::max(1e-3, std::isfinite(drop) ? std::min(drop, 4.0) : 4.0);
      return;
    }
    const double l = gap(best_, -1);
    const double r = gap(best_, 1);
    double left = fall(best_, -1);
    double right = fall(best_, 1);
    if (!std::isfinite(left)) left = 8.0;
    if (!std::isfinite(right)) right = 8.0;
    const double curvature = 2.0 * (left / l + right / r) / (l + r);
    width_ =
        curvature > 0.0 ? std::min(1.0 / std::sqrt(curvature), points_.back().x - points_.front().x) : l + r;
  }

  /// Whether a point is so far below the peak that what lies beyond doesn't count.
  [[nodiscard]] bool negligible(const Point& p) const {
    const double distance = std::fabs(p.x - points_[best_].x) / width_;
    return p.value + std::log1p(distance) < points_[best_].value - space_.drop;
  }

  /// The outermost point that counts and the one beyond it; widens as needed, then trims.
  double trimmed_end(int side) {
    const double limit = side < 0 ? space_.low : space_.high;
    for (int round = 0; round < 1200; ++round) {
      const std::size_t outer = outermost(side);
      const bool last = side < 0 ? outer == 0 : outer + 1 == points_.size();
      if (!last) return trim(outer, side);
      if (points_[outer].x == limit) return limit;
      const double distance = std::max(std::fabs(points_[outer].x - points_[best_].x), width_);
      // Algebraic tails go on for many powers of ten.
      const double factor = distance > 100.0 * width_ ? 10.0 : 2.0;
      const double next = points_[best_].x + side * factor * distance;
      look({side < 0 ? std::max(limit, next) : std::min(limit, next)});
    }
    return points_[outermost(side)].x;
  }

  [[nodiscard]] std::size_t outermost(int side) const {
    if (side < 0) {
      for (std::size_t i = 0; i < points_.size(); ++i)
        if (!negligible(points_[i])) return i;
    } else {
      for (std::size_t i = points_.size(); i-- > 0;)
        if (!negligible(points_[i])) return i;
    }
    return best_;
  }

  /// The end: beyond `outer`, but not where the integrand has fallen absurdly far.
  double trim(std::size_t outer, int side) {
    double inner = points_[outer].x;
    const Point& beyond = points_[side < 0 ? outer - 1 : outer + 1];
    double end = beyond.x;
    double end_value = beyond.value;
    const double floor = points_[best_].value - 1.7 * space_.drop;
    for (int round = 0; round < 60 && !(end_value > floor); ++round) {
      const double middle = 0.5 * (inner + end);
      if (middle == inner || middle == end) break;
      double value = 0.0;
      space_.log_integrand({&middle, 1}, {&value, 1});
      ++evaluations_;
      const Point p{middle, value};
      if (negligible(p)) {
        end = middle;
        end_value = value;
      } else {
        inner = middle;
      }
    }
    return end;
  }

  const SearchSpace& space_;
  std::vector<Point> points_;
  std::vector<double> values_;
  std::size_t best_ = 0;
  double width_ = 1.0;
  std::size_t evaluations_ = 0;
};

}  // namespace

Window find_window(const SearchSpace& space) { return Search(space).run(); }

}  // namespace steelyard::pool_room
