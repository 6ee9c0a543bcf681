// `stress` for people: what would change the answer, then every answer that was tried.
#include <fmt/format.h>

#include <string>
#include <vector>

#include "render/firmness_words.hpp"
#include "render/text/page.hpp"

namespace steelyard {

namespace {

using namespace render;
using namespace render::text;

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

using Rows = std::vector<std::vector<std::string>>;

std::string answers(const std::string& head, const Rows& rows, const TextStyle& style) {
  Rows all = {{head, "an effect?", "varies?", "mean effect"}};
  all.insert(all.end(), rows.begin(), rows.end());
  return table(all, style) + "\n";
}

std::string leave_one_out(const StressAnalysis& a, const TextStyle& style) {
  Rows rows = {answer_row("all studies", a.result.base)};
  for (std::size_t i = 0; i < a.result.without.size(); ++i) {
    rows.push_back(answer_row("without " + a.rows.studies[i].label, a.result.without[i]));
  }
  return answers("Leave one out (decibans)", rows, style);
}

std::string arrival(const StressAnalysis& a, const TextStyle& style) {
  Rows rows;
  for (std::size_t i = 0; i < a.result.cumulative.size(); ++i) {
    rows.push_back(answer_row("+ " + a.rows.studies[a.result.order[i]].label, a.result.cumulative[i]));
  }
  return answers(a.result.by_year ? "As studies arrive, by year" : "As studies arrive, in file order", rows,
                 style);
}

std::string groups(const StressAnalysis& a, const TextStyle& style) {
  if (a.result.subsets.empty()) return "";
  Rows rows;
  for (const SubsetAnswer& subset : a.result.subsets) {
    rows.push_back(answer_row(fmt::format("{} only ({})", subset.group, subset.count), subset.only));
    rows.push_back(answer_row(fmt::format("without {}", subset.group), subset.without));
  }
  std::string out = answers("By " + a.by, rows, style);
  if (a.groups) {
    const auto& bf = a.groups->averaged ? *a.groups->averaged : a.groups->fixed;
    out += paragraph(
        "Do the groups differ? " + favour_sentence(bf.log_bf, "different means", "one common mean"), style);
    out += "\n";
  }
  return out;
}

std::string shares(const StressAnalysis& a, const TextStyle& style) {
  if (a.result.shares.empty()) return "";
  Rows rows = {{"Evidence that each study carries", "decibans", "error"}};
  for (std::size_t i = 0; i < a.result.shares.size(); ++i) {
    const Share& share = a.result.shares[i];
    rows.push_back(
        {a.rows.studies[i].label, decibans_text(share.log_bf), fmt::format("{:.1g}", decibans(share.error))});
  }
  const std::string orders = a.result.shares_exact
                                 ? "Averaged over all orders of arrival; the shares add up to the whole."
                                 : fmt::format("Averaged over {} orders of arrival.", a.result.shares_orders);
  return table(rows, style) + paragraph(orders, style, 2) + "\n";
}

std::string directions(const StressAnalysis& a, const TextStyle& style) {
  Rows rows;
  constexpr std::string_view names[] = {"all effects allowed", "positive effects only",
                                        "negative effects only"};
  for (std::size_t i = 0; i < 3; ++i)
    rows.push_back(answer_row(std::string(names[i]), a.result.directions[i]));
  return answers("Direction", rows, style);
}

}  // namespace

std::string render_text(const StressAnalysis& a, const TextStyle& style) {
  std::string out = paragraph(stress_verdict(a), style);
  for (std::size_t i = 1; i < a.result.turns.size(); ++i) {
    out += paragraph("Also: " + turn_sentence(a, a.result.turns[i]), style);
  }
  for (const Firmness& firmness : a.result.firmness)
    out += paragraph(firmness_sentence(firmness), style, 0, 2);
  out += "\n" + leave_one_out(a, style) + arrival(a, style) + groups(a, style) + shares(a, style) +
         directions(a, style);
  for (const std::string& label : a.rows.left_out)
    out += paragraph(fmt::format("Left out as asked: {}.", label), style);
  for (const Diagnostic& d : a.rows.cautions) out += paragraph("Caution: " + d.what, style, 0, 2);
  return out + paragraph(usual_caution(), style);
}

}  // namespace steelyard
