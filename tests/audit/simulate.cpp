#include "simulate.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "rebuild/student.hpp"
#include "steelyard/rebuild.hpp"

namespace simulate {

namespace {

using steelyard::rebuilding::two_sided_p;
using steelyard::rebuilding::upper_p;
using steelyard::rebuilding::upper_t;
using steelyard::rebuilding::upper_z;

// Uniform without std::uniform_*, and at most one draw among the arguments of a call: the same numbers with
// every standard library and compiler.
double uniform(Random& random) { return static_cast<double>(random() >> 11) * 0x1.0p-53; }
int between(Random& random, int low, int high) {
  return low + static_cast<int>(uniform(random) * (high - low + 1));
}
bool chance(Random& random, double p) { return uniform(random) < p; }
double normal(Random& random) { return upper_z(std::max(uniform(random), 0x1.0p-60)); }

struct Group {
  std::vector<double> x;
  double n = 0.0, mean = 0.0, sd = 0.0;
};

Group summarized(std::vector<double> x) {
  Group g;
  g.n = static_cast<double>(x.size());
  for (const double v : x) g.mean += v / g.n;
  for (const double v : x) g.sd += (v - g.mean) * (v - g.mean);
  g.sd = std::sqrt(g.sd / (g.n - 1.0));
  g.x = std::move(x);
  return g;
}

Group drawn(Random& random, int n, double mean, double sd) {
  std::vector<double> x(static_cast<std::size_t>(n));
  for (double& v : x) v = mean + sd * normal(random);
  return summarized(std::move(x));
}

// Averages of whole-number items from 1 to 7.
Group rated(Random& random, int n, int items, double center) {
  std::vector<double> x(static_cast<std::size_t>(n));
  for (double& v : x) {
    double sum = 0.0;
    for (int i = 0; i < items; ++i) sum += std::clamp(std::round(center + 1.4 * normal(random)), 1.0, 7.0);
    v = sum / items;
  }
  return summarized(std::move(x));
}

struct Test {
  double diff, se, t, df;
};

Test student(const Group& a, const Group& b) {
  const double df = a.n + b.n - 2.0;
  const double sd = std::sqrt(((a.n - 1.0) * a.sd * a.sd + (b.n - 1.0) * b.sd * b.sd) / df);
  const double se = sd * std::sqrt(1.0 / a.n + 1.0 / b.n);
  return {a.mean - b.mean, se, (a.mean - b.mean) / se, df};
}

Test welch(const Group& a, const Group& b) {
  const double u = a.sd * a.sd / a.n;
  const double v = b.sd * b.sd / b.n;
  const double se = std::sqrt(u + v);
  return {a.mean - b.mean, se, (a.mean - b.mean) / se,
          (u + v) * (u + v) / (u * u / (a.n - 1.0) + v * v / (b.n - 1.0))};
}

// One paper being written.
class Writer {
 public:
  Writer(Random& random, Author author, std::string form) : random_(random), author_(author) {
    row_.form = std::move(form);
  }

  void number(const std::string& column, double value) {
    row_.set(column, print(value, between(random_, 1, 3), author_.rounding));
  }
  void digits(const std::string& column, double value, int decimals) {
    row_.set(column, print(value, decimals, author_.rounding));
  }
  void count(const std::string& column, double value) { row_.set(column, fmt::format("{}", value)); }
  void text(const std::string& column, const std::string& value) { row_.set(column, value); }
  void p_value(double p) { digits("p", p, between(random_, author_.plain ? 2 : 1, 3)); }
  void bound(double p) {
    text("p", p < .001 ? "<.001" : p < .01 ? "<.01" : p < .05 ? "<.05" : chance(random_, .5) ? "ns" : ">.05");
  }
  void sizes(const Group& a, const Group& b) {
    count("n1", a.n);
    count("n2", b.n);
  }
  void means(const Group& a, const Group& b, bool standard_errors = false) {
    const int decimals = between(random_, 1, 3);
    digits("mean1", a.mean, decimals);
    digits("mean2", b.mean, decimals);
    digits(standard_errors ? "se1" : "sd1", standard_errors ? a.sd / std::sqrt(a.n) : a.sd,
           decimals + (standard_errors ? 1 : 0));
    digits(standard_errors ? "se2" : "sd2", standard_errors ? b.sd / std::sqrt(b.n) : b.sd,
           decimals + (standard_errors ? 1 : 0));
  }
  void test(const Test& t, bool with_p = true) {
    number("t", t.t);
    if (t.df == std::floor(t.df)) {
      count("df", t.df);
    } else {
      number("df", t.df);
    }
    if (with_p) p_value(two_sided_p(t.t, t.df));
  }
  // d by the definition that the author prefers, with or without J.
  void effect(const Group& a, const Group& b) {
    const Test s = student(a, b);
    const double pooled = s.se / std::sqrt(1.0 / a.n + 1.0 / b.n);
    const double options[] = {pooled,
                              b.sd,
                              a.sd,
                              std::sqrt((a.sd * a.sd + b.sd * b.sd) / 2.0),
                              (a.sd + b.sd) / 2.0,
                              pooled * std::sqrt(s.df / (s.df + 2.0))};
    const double sd = options[author_.plain ? 0 : between(random_, 0, 5)];
    const bool hedges = chance(random_, .4);
    number(hedges ? "g" : "d", s.diff / sd * (hedges ? steelyard::hedges_j(s.df) : 1.0));
  }
  void interval(const Test& t) {
    const bool z = !author_.plain && chance(random_, .3);
    const double level = chance(random_, .2) ? .99 : .95;
    const double half = t.se * (z ? upper_z((1.0 - level) / 2.0) : upper_t((1.0 - level) / 2.0, t.df));
    const int decimals = between(random_, 1, 3);
    digits("mean_diff", t.diff, decimals);
    digits("ci_low", t.diff - half, decimals);
    digits("ci_high", t.diff + half, decimals);
    if (level != .95) text("ci_level", ".99");
  }
  Random& random() { return random_; }
  [[nodiscard]] bool plain() const { return author_.plain; }
  [[nodiscard]] bool coin(double p) { return chance(random_, p); }
  Row take() { return std::move(row_); }

 private:
  Random& random_;
  Author author_;
  Row row_;
};

struct Pair {
  Group a, b;
};

Pair two_groups(Writer& w) {
  Random& random = w.random();
  const double scale = std::exp(2.0 + normal(random));
  const double base = scale * 4.0 * uniform(random);
  const bool equal = chance(random, .4);
  const int n1 = between(random, 6, 80);
  const int n2 = equal ? n1 : between(random, 6, 80);
  const double ratio = w.plain() ? 1.0 : std::exp(.4 * normal(random));
  return {drawn(random, n1, base + scale * .6 * normal(random), scale),
          drawn(random, n2, base, scale * ratio)};
}

Test chosen_test(Writer& w, const Pair& p) {
  return !w.plain() && w.coin(.3) ? welch(p.a, p.b) : student(p.a, p.b);
}

void t_and_p(Writer& w) {
  const Pair p = two_groups(w);
  w.sizes(p.a, p.b);
  w.test(chosen_test(w, p));
  if (w.coin(.5)) w.effect(p.a, p.b);
}

void f_and_p(Writer& w) {
  const Pair p = two_groups(w);
  const Test t = student(p.a, p.b);
  w.number("f", t.t * t.t);
  w.count("df1", 1);
  w.count("df", t.df);
  w.p_value(two_sided_p(t.t, t.df));
  if (w.coin(.5)) w.sizes(p.a, p.b);
}

void means_and_test(Writer& w) {
  const Pair p = two_groups(w);
  w.sizes(p.a, p.b);
  w.means(p.a, p.b, w.coin(.2));
  const Test t = chosen_test(w, p);
  w.test(t, w.coin(.7));
}

void means_and_effect(Writer& w) {
  const Pair p = two_groups(w);
  w.sizes(p.a, p.b);
  w.means(p.a, p.b);
  w.effect(p.a, p.b);
  if (w.coin(.5)) w.p_value(two_sided_p(chosen_test(w, p).t, student(p.a, p.b).df));
}

void difference_and_interval(Writer& w) {
  const Pair p = two_groups(w);
  const Test t = chosen_test(w, p);
  w.sizes(p.a, p.b);
  w.interval(t);
  if (w.coin(.6)) w.test(t);
}

void one_sample(Writer& w) {
  Random& random = w.random();
  const int n = between(random, 6, 80);
  const Group g = drawn(random, n, 100.0 + 6.0 * normal(random), 15.0);
  const double se = g.sd / std::sqrt(g.n);
  w.text("design", "one_sample");
  w.count("n", g.n);
  w.number("mean1", g.mean);
  w.number("sd1", g.sd);
  w.text("mu0", "100");
  w.test({g.mean - 100.0, se, (g.mean - 100.0) / se, g.n - 1.0});
}

struct Pairs {
  Group a, b, differences;
  double r;
};

Pairs pairs(Writer& w) {
  Random& random = w.random();
  const int n = between(random, 6, 80);
  const double common = .9 * uniform(random);
  std::vector<double> a, b, d;
  const double shift = .5 * normal(random);
  for (int i = 0; i < n; ++i) {
    const double shared = std::sqrt(common) * normal(random);
    a.push_back(20.0 + 4.0 * (shift + shared + std::sqrt(1.0 - common) * normal(random)));
    b.push_back(20.0 + 4.5 * (shared + std::sqrt(1.0 - common) * normal(random)));
    d.push_back(a.back() - b.back());
  }
  Pairs p{summarized(a), summarized(b), summarized(d), 0.0};
  p.r = (p.a.sd * p.a.sd + p.b.sd * p.b.sd - p.differences.sd * p.differences.sd) / (2.0 * p.a.sd * p.b.sd);
  return p;
}

Test paired_test(const Pairs& p) {
  const double se = p.differences.sd / std::sqrt(p.differences.n);
  return {p.differences.mean, se, p.differences.mean / se, p.differences.n - 1.0};
}

void paired_means(Writer& w) {
  const Pairs p = pairs(w);
  w.text("design", "paired");
  w.count("n", p.a.n);
  w.means(p.a, p.b);
  w.number("r_pair", p.r);
  w.test(paired_test(p));
  const double sds[] = {p.differences.sd, (p.a.sd + p.b.sd) / 2.0,
                        p.differences.sd / std::sqrt(2.0 * (1.0 - p.r)), p.b.sd};
  if (w.coin(.6)) w.number("d", p.differences.mean / sds[w.plain() ? 0 : between(w.random(), 0, 3)]);
}

void paired_test_only(Writer& w) {
  const Pairs p = pairs(w);
  w.text("design", "paired");
  w.count("n", p.a.n);
  w.test(paired_test(p));
  if (w.coin(.5)) w.number("d", p.differences.mean / (w.plain() || w.coin(.5) ? p.differences.sd : p.b.sd));
}

void ratings(Writer& w) {
  Random& random = w.random();
  const int items = between(random, 1, 4);
  const int n1 = between(random, 6, 60);
  const Group a = rated(random, n1, items, 3.0 + 2.0 * uniform(random));
  const int n2 = between(random, 6, 60);
  const Group b = rated(random, n2, items, 3.0 + 2.0 * uniform(random));
  w.sizes(a, b);
  w.means(a, b);
  w.count("items", items);
  w.text("scale_min", "1");
  w.text("scale_max", "7");
  if (w.coin(.6)) w.test(chosen_test(w, {a, b}));
}

void welch_test(Writer& w) {
  const Pair p = two_groups(w);
  w.sizes(p.a, p.b);
  const Test t = welch(p.a, p.b);
  w.test(t);
  if (w.coin(.5)) w.means(p.a, p.b);
  if (w.coin(.3)) w.effect(p.a, p.b);
}

void bounded(Writer& w) {
  const Pair p = two_groups(w);
  const Test t = student(p.a, p.b);
  w.sizes(p.a, p.b);
  w.test(t, false);
  w.bound(two_sided_p(t.t, t.df));
}

void one_tailed(Writer& w) {
  const Pair p = two_groups(w);
  const Test t = student(p.a, p.b);
  const bool up = w.coin(.8);
  w.sizes(p.a, p.b);
  w.test(t, false);
  w.text("tails", "1");
  w.text("sign", up ? "+" : "-");
  w.p_value(upper_p(up ? t.t : -t.t, t.df));
}

// Two groups crossed with another factor: residuals within four cells, main effect of the first factor.
void factorial(Writer& w) {
  Random& random = w.random();
  const int n = between(random, 6, 40);
  const Group cells[] = {drawn(random, n, 11.0, 3.0), drawn(random, n, 13.0, 3.0),
                         drawn(random, n, 10.0, 3.0), drawn(random, n, 12.0, 3.0)};
  std::vector<double> first = cells[0].x, second = cells[2].x;
  first.insert(first.end(), cells[1].x.begin(), cells[1].x.end());
  second.insert(second.end(), cells[3].x.begin(), cells[3].x.end());
  double square = 0.0;
  for (const Group& cell : cells) square += cell.sd * cell.sd / 4.0;
  const Group a = summarized(first);
  const Group b = summarized(second);
  const double df = 4.0 * n - 4.0;
  const double t = (a.mean - b.mean) / std::sqrt(square / n);
  w.sizes(a, b);
  if (w.coin(.5)) w.means(a, b);
  w.number("f", t * t);
  w.count("df1", 1);
  w.count("df", df);
  w.p_value(two_sided_p(t, df));
}

void adjusted(Writer& w) {
  const Pair p = two_groups(w);
  const double r = .3 + .4 * uniform(w.random());
  Test t = student(p.a, p.b);
  t.df -= 1.0;
  t.t /= std::sqrt(1.0 - r * r);
  w.sizes(p.a, p.b);
  w.text("covariates", "1");
  w.number("covariate_r", r);
  if (w.coin(.5)) w.means(p.a, p.b);
  w.test(t);
}

void own_words(Writer& w) {
  const Pair p = two_groups(w);
  const Test t = student(p.a, p.b);
  const std::string printed = print(t.t, 2, 0);
  w.sizes(p.a, p.b);
  w.text("as_printed", fmt::format("t({}) = {}, p = {}", t.df, printed, print(two_sided_p(t.t, t.df), 3, 0)));
  if (w.coin(.5)) w.text("t", printed);
  if (w.coin(.5)) w.means(p.a, p.b);
}

void point_biserial(Writer& w) {
  const Pair p = two_groups(w);
  const Test t = student(p.a, p.b);
  w.sizes(p.a, p.b);
  w.test(t);
  w.number("r", t.t / std::sqrt(t.t * t.t + t.df));
}

void several_groups(Writer& w) {
  Random& random = w.random();
  const Group g[] = {drawn(random, between(random, 6, 40), 12.0, 3.0),
                     drawn(random, between(random, 6, 40), 13.0, 3.0),
                     drawn(random, between(random, 6, 40), 14.0, 3.0)};
  const double df = g[0].n + g[1].n + g[2].n - 3.0;
  double square = 0.0;
  for (const Group& x : g) square += (x.n - 1.0) * x.sd * x.sd / df;
  const double t = (g[0].mean - g[2].mean) / std::sqrt(square * (1.0 / g[0].n + 1.0 / g[2].n));
  w.text("compare", "1-3");
  for (int i = 0; i < 3; ++i) {
    const std::string number = std::to_string(i + 1);
    w.count(std::string("n").append(number), g[i].n);
    w.number(std::string("mean").append(number), g[i].mean);
    w.number(std::string("sd").append(number), g[i].sd);
  }
  w.number("t", t);
  w.count("df", df);
  w.p_value(two_sided_p(t, df));
}

void odds(Writer& w) {
  Random& random = w.random();
  const double log_ratio = .8 * normal(random);
  const double se = .15 + .5 * uniform(random);
  const double half = se * upper_z(.025);
  const int decimals = between(random, 2, 3);
  w.digits("odds_ratio", std::exp(log_ratio), decimals);
  w.digits("ci_low", std::exp(log_ratio - half), decimals);
  w.digits("ci_high", std::exp(log_ratio + half), decimals);
}

void estimates(Writer& w) {
  Random& random = w.random();
  const double estimate = normal(random);
  const double se = .1 + .5 * uniform(random);
  w.number("estimate", estimate);
  w.text("metric", "log-hazard-ratio");
  if (w.coin(.5)) w.digits("se", se, 3);
  const int decimals = between(random, 1, 3);
  w.digits("ci_low", estimate - se * upper_z(.025), decimals);
  w.digits("ci_high", estimate + se * upper_z(.025), decimals);
}

void total_only(Writer& w) {
  const Pair p = two_groups(w);
  w.count("n_total", p.a.n + p.b.n);
  w.test(student(p.a, p.b));
  if (w.coin(.5)) w.effect(p.a, p.b);
}

// d with the large-sample interval that papers print.
void effect_and_interval(Writer& w) {
  const Pair p = two_groups(w);
  const Test t = student(p.a, p.b);
  const double f = std::sqrt(1.0 / p.a.n + 1.0 / p.b.n);
  const double d = t.t * f;
  const double half = upper_z(.025) * std::sqrt(f * f + d * d / (2.0 * (p.a.n + p.b.n)));
  const int decimals = between(w.random(), 1, 3);
  w.sizes(p.a, p.b);
  w.digits("d", d, decimals);
  w.digits("ci_low", d - half, decimals);
  w.digits("ci_high", d + half, decimals);
  w.test(t);
}

void change(Writer& w) {
  const Pairs one = pairs(w);
  const Pairs two = pairs(w);
  w.sizes(one.a, two.a);
  w.number("baseline_mean1", one.b.mean);
  w.number("baseline_sd1", one.b.sd);
  w.number("baseline_mean2", two.b.mean);
  w.number("baseline_sd2", two.b.sd);
  w.means(one.a, two.a);
  w.number("r_pair", (one.r + two.r) / 2.0);
  w.test(student(one.differences, two.differences));
}

void correlation(Writer& w) {
  const Pairs p = pairs(w);
  const double t = p.r * std::sqrt((p.a.n - 2.0) / (1.0 - p.r * p.r));
  w.number("correlation", p.r);
  w.count("n", p.a.n);
  w.p_value(two_sided_p(t, p.a.n - 2.0));
}

struct Form {
  const char* name;
  void (*write)(Writer&);
};
constexpr Form all_forms[] = {{"t, df, p (and d)", t_and_p},
                              {"F(1, df), p", f_and_p},
                              {"means, SDs or SEs, test", means_and_test},
                              {"means, SDs, d or g", means_and_effect},
                              {"difference, interval, test", difference_and_interval},
                              {"one sample", one_sample},
                              {"pairs with r", paired_means},
                              {"pairs without r", paired_test_only},
                              {"whole-number ratings", ratings},
                              {"Welch's t", welch_test},
                              {"t and a bound on p", bounded},
                              {"one-tailed p", one_tailed},
                              {"factorial F", factorial},
                              {"adjusted for a covariate", adjusted},
                              {"as printed, and cells", own_words},
                              {"point-biserial r", point_biserial},
                              {"three groups", several_groups},
                              {"odds ratio", odds},
                              {"estimate of its own metric", estimates},
                              {"only a total", total_only},
                              {"d and its interval", effect_and_interval},
                              {"change from baseline", change},
                              {"Pearson's correlation", correlation}};

}  // namespace

const std::string* Row::cell(const std::string& column) const {
  const auto found =
      std::find_if(cells.begin(), cells.end(), [&](const auto& c) { return c.first == column; });
  return found == cells.end() ? nullptr : &found->second;
}

void Row::set(const std::string& column, const std::string& text) {
  const auto found =
      std::find_if(cells.begin(), cells.end(), [&](const auto& c) { return c.first == column; });
  if (found == cells.end()) {
    cells.emplace_back(column, text);
  } else {
    found->second = text;
  }
}

std::string print(double value, int decimals, int rounding) {
  const double scale = std::pow(10.0, decimals);
  const double scaled = std::abs(value) * scale;
  double whole = std::floor(scaled + 0.5);
  if (rounding == 1) whole = std::nearbyint(scaled);
  // Whoever cuts off sees 4.1, not the 4.0999999999 that a sum of binary fractions may give.
  if (rounding == 2) whole = std::floor(scaled + 1e-9);
  return fmt::format("{:.{}f}", (value < 0.0 && whole > 0.0 ? -whole : whole) / scale, decimals);
}

std::size_t forms() { return std::size(all_forms); }

Row honest_row(std::size_t form, Random& random, bool plain) {
  Author author;
  author.plain = plain;
  author.rounding = plain ? 0 : between(random, 0, 2);
  Writer writer(random, author, all_forms[form].name);
  all_forms[form].write(writer);
  return writer.take();
}

std::string csv(const Row& row) {
  std::string head, body;
  for (const auto& [column, cell] : row.cells) {
    if (!head.empty()) {
      head += ',';
      body += ',';
    }
    head += column;
    body += cell.find(',') == std::string::npos ? cell : fmt::format("\"{}\"", cell);
  }
  return fmt::format("{}\n{}\n", head, body);
}

}  // namespace simulate
