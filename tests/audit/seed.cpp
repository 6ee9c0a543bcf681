#include "seed.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <charconv>
#include <cmath>
#include <functional>

#include "rebuild/student.hpp"
#include "steelyard/rebuild.hpp"

namespace seed {

namespace {

using simulate::Random;
using simulate::Row;

std::size_t pick(Random& random, std::size_t count) { return static_cast<std::size_t>(random() % count); }

bool has(const Row& row, const std::string& column) {
  return row.cell(column) != nullptr && !row.cell(column)->empty();
}

// Places where two neighbouring digits differ.
std::vector<std::pair<std::string, std::size_t>> swaps(const Row& row) {
  static const char* const columns[] = {"t", "f", "p", "mean1",     "mean2",  "sd1",    "sd2",
                                        "d", "g", "r", "mean_diff", "ci_low", "ci_high"};
  std::vector<std::pair<std::string, std::size_t>> found;
  for (const char* column : columns) {
    const std::string* text = row.cell(column);
    if (text == nullptr) continue;
    for (std::size_t i = 0; i + 1 < text->size(); ++i) {
      const bool digits = std::isdigit((*text)[i]) != 0 && std::isdigit((*text)[i + 1]) != 0;
      if (digits && (*text)[i] != (*text)[i + 1]) found.emplace_back(column, i);
    }
  }
  return found;
}

struct Band {
  double low, high;
};

std::optional<Band> band(const Row& row, const std::string& column) {
  if (!has(row, column)) return std::nullopt;
  const auto printed = steelyard::parse_printed(*row.cell(column), {}, {});
  if (!printed.ok()) return std::nullopt;
  if (printed.value->relation == steelyard::Relation::not_significant) return Band{.05, 1.0};
  if (column == "p") return Band{std::max(printed.value->low, 0.0), std::min(printed.value->high, 1.0)};
  return Band{printed.value->low, printed.value->high};
}

double number(const Row& row, const std::string& column) {
  return (band(row, column)->low + band(row, column)->high) / 2.0;
}

using Inputs = std::vector<Band>;
using Function = std::function<double(const std::vector<double>&)>;

Band over(const Inputs& inputs, const Function& f) {
  Band result{INFINITY, -INFINITY};
  for (std::size_t corner = 0; corner < (std::size_t{1} << inputs.size()); ++corner) {
    std::vector<double> x;
    for (std::size_t i = 0; i < inputs.size(); ++i)
      x.push_back((corner >> i & 1U) != 0 ? inputs[i].high : inputs[i].low);
    result = {std::min(result.low, f(x)), std::max(result.high, f(x))};
  }
  return result;
}

std::optional<Inputs> bands(const Row& row, std::initializer_list<const char*> columns) {
  Inputs inputs;
  for (const char* column : columns) {
    const auto b = band(row, column);
    if (!b) return std::nullopt;
    inputs.push_back(*b);
  }
  return inputs;
}

double gap(const Band& recomputed, const Band& printed) {
  const double distance = std::max(recomputed.low - printed.high, printed.low - recomputed.high);
  const double width = recomputed.high - recomputed.low + printed.high - printed.low;
  return distance <= 0.0 ? 0.0 : distance / width;
}

double p_of_test(const Row& row) {
  const auto p = band(row, "p");
  if (!p || !has(row, "df")) return 0.0;
  const double df = number(row, "df");
  const bool f = !has(row, "t");
  auto t = band(row, f ? "f" : "t");
  if (!t) return 0.0;
  if (f) t = Band{std::sqrt(std::max(t->low, 0.0)), std::sqrt(t->high)};
  if (has(row, "tails")) {
    const double sign = *row.cell("sign") == "-" ? -1.0 : 1.0;
    return gap(over({*t}, [&](const auto& x) { return steelyard::rebuilding::upper_p(sign * x[0], df); }),
               *p);
  }
  if (t->low < 0.0) t = t->high > 0.0 ? Band{0.0, std::max(-t->low, t->high)} : Band{-t->high, -t->low};
  return gap(over({*t}, [&](const auto& x) { return steelyard::rebuilding::two_sided_p(x[0], df); }), *p);
}

double pooled(double s1, double n1, double s2, double n2) {
  return std::sqrt(((n1 - 1) * s1 * s1 + (n2 - 1) * s2 * s2) / (n1 + n2 - 2));
}

// Two groups: t and d of means and SDs; d and r of t.
double two_group_relations(const Row& row) {
  if (!has(row, "n1") || !has(row, "n2") || has(row, "compare") || has(row, "covariates")) return 0.0;
  const double n1 = number(row, "n1");
  const double n2 = number(row, "n2");
  const double f = std::sqrt(1 / n1 + 1 / n2);
  const double j = steelyard::hedges_j(n1 + n2 - 2);
  double worst = 0.0;
  const auto t = band(row, "t");
  const auto d = band(row, "d");
  const auto g = band(row, "g");
  if (const auto scores = bands(row, {"mean1", "mean2", "sd1", "sd2"})) {
    const Band by_scores =
        over(*scores, [&](const auto& x) { return (x[0] - x[1]) / pooled(x[2], n1, x[3], n2); });
    if (t) worst = std::max(worst, gap({by_scores.low / f, by_scores.high / f}, *t));
    if (d) worst = std::max(worst, gap(by_scores, *d));
    if (g) worst = std::max(worst, gap({by_scores.low * j, by_scores.high * j}, *g));
  } else if (t) {
    if (d) worst = std::max(worst, gap({t->low * f, t->high * f}, *d));
    if (g) worst = std::max(worst, gap({t->low * f * j, t->high * f * j}, *g));
  }
  const auto r = band(row, "r");
  if (t && r && has(row, "df")) {
    const double df = number(row, "df");
    worst = std::max(worst,
                     gap(over({*t}, [&](const auto& x) { return x[0] / std::sqrt(x[0] * x[0] + df); }), *r));
  }
  return worst;
}

double single_relations(const Row& row) {
  const auto t = band(row, "t");
  if (!has(row, "n") || !t) return 0.0;
  const double root = std::sqrt(number(row, "n"));
  if (has(row, "mu0")) {
    if (const auto x = bands(row, {"mean1", "sd1"})) {
      return gap(over(*x, [&](const auto& v) { return (v[0] - 100.0) / v[1] * root; }), *t);
    }
  }
  if (const auto x = bands(row, {"mean1", "mean2", "sd1", "sd2", "r_pair"})) {
    return gap(over(*x,
                    [&](const auto& v) {
                      return (v[0] - v[1]) / std::sqrt(v[2] * v[2] + v[3] * v[3] - 2 * v[4] * v[2] * v[3]) *
                             root;
                    }),
               *t);
  }
  return 0.0;
}

double interval_relation(const Row& row) {
  const auto t = band(row, "t");
  const auto x = bands(row, {"mean_diff", "ci_low", "ci_high"});
  if (!t || !x || !has(row, "df")) return 0.0;
  const double tail = has(row, "ci_level") ? .005 : .025;
  const double critical = steelyard::rebuilding::upper_t(tail, number(row, "df"));
  return gap(over(*x, [&](const auto& v) { return v[0] / ((v[2] - v[1]) / 2) * critical; }), *t);
}

std::optional<Row> transposed(const Row& row, Random& random) {
  const auto places = swaps(row);
  if (places.empty()) return std::nullopt;
  const auto& [column, at] = places[pick(random, places.size())];
  std::string text = *row.cell(column);
  std::swap(text[at], text[at + 1]);
  Row seeded = row;
  seeded.set(column, text);
  return seeded;
}

std::optional<Row> wrong_df(const Row& row, Random& random) {
  if (!has(row, "df")) return std::nullopt;
  const double df = number(row, "df");
  const double shift = static_cast<double>(1 + pick(random, 40));
  const double wrong = random() % 2 == 0 || df - shift < 1.0 ? df + shift : df - shift;
  Row seeded = row;
  seeded.set("df", fmt::format("{}", wrong));
  return seeded;
}

std::optional<Row> halved_p(const Row& row) {
  const auto p = band(row, "p");
  if (!p || std::isdigit(row.cell("p")->back()) == 0 || row.cell("p")->front() == '<' ||
      row.cell("p")->front() == '>') {
    return std::nullopt;
  }
  Row seeded = row;
  seeded.set("p", simulate::print(number(row, "p") / 2.0, static_cast<int>(row.cell("p")->size()) - 2, 0));
  return seeded;
}

std::optional<Row> flipped(const Row& row, Random& random) {
  std::vector<std::string> columns;
  for (const char* column : {"t", "d", "g", "r", "mean_diff"}) {
    if (has(row, column)) columns.emplace_back(column);
  }
  if (columns.empty()) return std::nullopt;
  const std::string& column = columns[pick(random, columns.size())];
  const std::string& text = *row.cell(column);
  Row seeded = row;
  seeded.set(column, text.front() == '-' ? text.substr(1) : std::string("-").append(text));
  return seeded;
}

std::optional<Row> se_for_sd(const Row& row) {
  if (!has(row, "sd1") || !has(row, "sd2") || !has(row, "n1") || !has(row, "n2")) return std::nullopt;
  Row seeded = row;
  for (const char* number_of : {"1", "2"}) {
    const std::string sd = std::string("sd").append(number_of);
    const std::string n = std::string("n").append(number_of);
    const auto decimals = static_cast<int>(row.cell(sd)->size() - row.cell(sd)->find('.') - 1);
    seeded.set(sd, simulate::print(number(row, sd) / std::sqrt(number(row, n)), decimals + 1, 0));
  }
  return seeded;
}

}  // namespace

const char* name(Error error) {
  static constexpr const char* names[] = {"transposed digits", "wrong df", "halved p", "flipped sign",
                                          "SE for SD"};
  return names[static_cast<std::size_t>(error)];
}

std::optional<Row> with_error(const Row& row, Error error, Random& random) {
  switch (error) {
    case Error::transposed_digits:
      return transposed(row, random);
    case Error::wrong_df:
      return wrong_df(row, random);
    case Error::halved_p:
      return halved_p(row);
    case Error::flipped_sign:
      return flipped(row, random);
    case Error::se_for_sd:
      return se_for_sd(row);
  }
  return std::nullopt;
}

double distance(const Row& row) {
  return std::max({p_of_test(row), two_group_relations(row), single_relations(row), interval_relation(row)});
}

}  // namespace seed
