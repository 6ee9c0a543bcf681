// `stress` for people: what would change the answer, then every answer that was tried.
#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <numeric>
#include <string>
#include <vector>

#include "render/firmness_words.hpp"
#include "render/text/page.hpp"

namespace steelyard {

namespace {

using namespace render;
using namespace render::text;

using Rows = std::vector<std::vector<std::string>>;

constexpr std::size_t most_rows = 40;  // of studies; more: those that move the answer most

std::string weight(const std::optional<LogBayesFactor>& bf) { return bf ? decibans_text(bf->log_bf) : "–"; }

std::string effect_text(const Summary& s) {
  if (!s.median) return "–";
  const std::string centre = figure::number_text(*s.median, 2);
  return s.lower && s.upper ? fmt::format("{} [{}, {}]", centre, figure::number_text(*s.lower, 2),
                                          figure::number_text(*s.upper, 2))
                            : centre;
}

std::vector<std::string> answer_row(const std::string& name, const Answer& answer) {
  if (!answer.refused.empty()) return {name, "–", "–", "–"};
  return {name, weight(answer.effect), weight(answer.heterogeneity), effect_text(answer.pooled_effect)};
}

std::string answers(const std::string& head, const Rows& rows, const TextStyle& style) {
  Rows all = {{head, "an effect?", "varies?", "mean effect"}};
  all.insert(all.end(), rows.begin(), rows.end());
  return table(all, style) + "\n";
}

// The studies to show, in file order: all, or those whose removal moves the answer most.
std::vector<std::size_t> shown_studies(const StressResult& r) {
  std::vector<std::size_t> order(r.without.size());
  std::iota(order.begin(), order.end(), std::size_t{0});
  if (order.size() <= most_rows || !r.base.effect) return order;
  const auto moved = [&r](std::size_t i) {
    return r.without[i].effect ? std::abs(r.without[i].effect->log_bf - r.base.effect->log_bf) : 0.0;
  };
  std::stable_sort(order.begin(), order.end(),
                   [&](std::size_t a, std::size_t b) { return moved(a) > moved(b); });
  order.resize(most_rows);
  std::sort(order.begin(), order.end());
  return order;
}

std::string excerpt(std::size_t shown, std::size_t of, std::string_view which, const TextStyle& style) {
  if (shown >= of) return "";
  return paragraph(fmt::format("{} of {}: {}; `--json` carries all.", shown, of, which), style, 2) + "\n";
}

std::string leave_one_out(const StressAnalysis& a, const TextStyle& style) {
  const StressResult& r = a.result;
  if (r.without.empty()) return "";
  Rows rows = {answer_row("all studies", r.base)};
  const std::vector<std::size_t> some = shown_studies(r);
  for (const std::size_t i : some)
    rows.push_back(answer_row("without " + a.rows.studies[i].label, r.without[i]));
  return answers("Leave one out (decibans)", rows, style) +
         excerpt(some.size(), r.without.size(), "those that move the answer most", style);
}

std::string arrival(const StressAnalysis& a, const TextStyle& style) {
  const StressResult& r = a.result;
  if (r.cumulative.size() < 2) return "";
  Rows rows;
  const std::size_t first = r.cumulative.size() > most_rows ? r.cumulative.size() - most_rows : 0;
  for (std::size_t i = first; i < r.cumulative.size(); ++i) {
    rows.push_back(answer_row("+ " + a.rows.studies[r.order[i]].label, r.cumulative[i]));
  }
  return answers(r.by_year ? "As studies arrive, by year" : "As studies arrive, in file order", rows, style) +
         excerpt(rows.size(), r.cumulative.size(), "the last to arrive", style);
}

std::string groups(const StressAnalysis& a, const TextStyle& style) {
  if (a.result.subsets.empty()) return "";
  Rows rows;
  for (const SubsetAnswer& subset : a.result.subsets) {
    rows.push_back(answer_row(fmt::format("{} alone ({})", subset.group, subset.count), subset.only));
    rows.push_back(answer_row(fmt::format("without {}", subset.group), subset.without));
  }
  return answers("By " + a.by, rows, style);
}

std::string shares(const StressAnalysis& a, const TextStyle& style) {
  const StressResult& r = a.result;
  if (r.shares.empty()) return "";
  Rows rows = {{"Evidence that each study carries", "decibans", "give or take"}};
  std::vector<std::size_t> some = shown_studies(r);
  if (r.without.empty()) some = {0};
  for (const std::size_t i : some) {
    const double error = decibans(r.shares[i].error);
    rows.push_back({a.rows.studies[i].label, decibans_text(r.shares[i].log_bf),
                    error < 0.05 ? "0.0" : fmt::format("{:.1f}", error)});
  }
  const std::string orders =
      r.shares_exact ? "The mean over all orders in which the studies could have arrived; the shares add up "
                       "to the whole."
                     : fmt::format(
                           "The mean over {} fixed orders of arrival, give or take what they differ by; the "
                           "shares add up to the whole.",
                           r.shares_orders);
  return table(rows, style) + paragraph(orders, style, 2) + "\n";
}

std::string directions(const StressAnalysis& a, const TextStyle& style) {
  Rows rows;
  constexpr std::string_view names[] = {"either direction", "positive effects only", "negative effects only"};
  for (std::size_t i = 0; i < 3; ++i)
    rows.push_back(answer_row(std::string(names[i]), a.result.directions[i]));
  if (a.result.base.effect_fixed && a.result.base.effect_random) {
    rows.push_back({"if all share one effect", weight(a.result.base.effect_fixed), "–", "–"});
    rows.push_back({"if effects vary", weight(a.result.base.effect_random), "–", "–"});
  }
  return answers("Direction and kind of model", rows, style);
}

// Up to five rows and columns of the grid, its ends among them.
std::vector<std::size_t> thinned(std::size_t count) {
  const std::size_t wanted = std::min<std::size_t>(count, 5);
  std::vector<std::size_t> some;
  for (std::size_t i = 0; i < wanted; ++i) some.push_back(wanted == 1 ? 0 : i * (count - 1) / (wanted - 1));
  return some;
}

std::string grid(const StressAnalysis& a, const TextStyle& style) {
  if (!a.result.grid) return "";
  const PriorGrid& g = *a.result.grid;
  std::vector<std::string> head = {"Effect prior (down), spread prior (across)"};
  for (const std::size_t c : thinned(g.scales.size())) head.push_back(fmt::format("× {:.3g}", g.scales[c]));
  Rows rows = {head};
  for (const std::size_t w : thinned(g.widths.size())) {
    std::vector<std::string> row = {fmt::format("× {:.3g}", g.widths[w])};
    for (const std::size_t c : thinned(g.scales.size())) {
      row.push_back(decibans_text(g.effect[w * g.scales.size() + c].log_bf));
    }
    rows.push_back(row);
  }
  return table(rows, style) +
         paragraph("Decibans for an effect when both priors are that many times as wide as stated.", style,
                   2) +
         "\n";
}

std::string firmness(const StressAnalysis& a, const TextStyle& style) {
  std::string out;
  // The first is in the verdict.
  for (std::size_t i = 1; i < a.result.turns.size(); ++i) {
    out += paragraph(turn_sentence(a, a.result.turns[i]), style, 2, 2);
  }
  for (const Firmness& f : a.result.firmness) {
    if (f.same_stand) out += paragraph(firmness_sentence(f), style, 2, 2);
  }
  return out.empty() ? "" : heading("What else turns it, and what doesn't", style) + out + "\n";
}

std::string cautions(const StressAnalysis& a, const TextStyle& style) {
  std::string out = heading("Cautions", style);
  for (const std::string& sentence : caution_sentences(a.rows)) out += paragraph(sentence, style, 2, 2);
  if (a.result.stopped)
    out += paragraph("Stopped before the end: what is shown is not complete.", style, 2, 2);
  if (!a.result.accurate) {
    out += paragraph("Not every integral reached its accuracy; `--json` shows which errors to expect.", style,
                     2, 2);
  }
  return out + paragraph(usual_caution(), style, 2, 2);
}

}  // namespace

std::string render_text(const StressAnalysis& a, const TextStyle& style) {
  std::string out = paragraph("How firm is it? " + stress_verdict(a), style);
  if (const std::string differ = groups_sentence(a); !differ.empty()) out += paragraph(differ, style);
  out += "\n" + firmness(a, style) + leave_one_out(a, style) + shares(a, style) + arrival(a, style) +
         groups(a, style) + directions(a, style) + grid(a, style);
  out += paragraph(fmt::format("A verdict is {} or more, either way. {}",
                               odds_text(std::log(a.options.verdict)), assumed_sentence(a.rows, true)),
                   style);
  return out + "\n" + cautions(a, style);
}

}  // namespace steelyard
