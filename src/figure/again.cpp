// What pooling again shows: the ladder of arriving studies, and the sway of each study's removal.
#include <algorithm>
#include <cmath>

#include <fmt/format.h>

#include "steelyard/figure.hpp"

namespace steelyard::figure {
namespace {

std::optional<double> in_decibans(const std::optional<double>& log_bf) {
  return log_bf ? std::optional<double>(decibans(*log_bf)) : std::nullopt;
}

std::string deciban_number(double value) { return number_text(value, std::fabs(value) < 999.95 ? 1 : 0); }

/// From the least to the greatest value, zero included.
Scale frame(const std::vector<double>& values) {
  double low = 0, high = 0;
  for (const double value : values) low = std::min(low, value), high = std::max(high, value);
  if (high - low < 2) low -= 1, high += 1;
  const double margin = 0.06 * (high - low);
  return {low - margin, high + margin, false, "weight of evidence for an effect, decibans"};
}

std::string rung_label(const Answer& answer) {
  if (!answer.year) return answer.label;
  const std::string year = fmt::format("{:g}", *answer.year);
  return answer.label.find(year) == std::string::npos ? answer.label + ", " + year : answer.label;
}

std::string ladder_finding(const Ladder& ladder) {
  const Rung* first = nullptr;
  const Rung* last = nullptr;
  const Rung* turned = nullptr;  // the last study at which the sign changed
  for (const Rung& rung : ladder.rungs) {
    if (!rung.decibans) continue;
    if (first == nullptr) first = &rung;
    if (last != nullptr && (*last->decibans >= 0) != (*rung.decibans >= 0)) turned = &rung;
    last = &rung;
  }
  if (last == nullptr) return "No step of the ladder has a Bayes factor.";
  const std::string side = *last->decibans >= 0 ? "for an effect" : "for no effect";
  std::string out =
      fmt::format("The weight of evidence went from {} decibans after {} to {} after all {} studies, {}.",
                  deciban_number(*first->decibans), first->label, deciban_number(*last->decibans),
                  ladder.rungs.size(), side);
  out += turned != nullptr ? fmt::format(" It has been on that side since {}.", turned->label)
                           : " It was on that side throughout.";
  return out;
}

std::string sway_finding(const Sway& sway, std::size_t turning) {
  if (!sway.decibans || sway.rows.empty() || !sway.rows.front().decibans)
    return "What a removal does can't be told here.";
  const SwayRow& most = sway.rows.front();
  std::string out = fmt::format("Leaving out {} changes the evidence most: from {} to {} decibans.",
                                most.label, deciban_number(*sway.decibans), deciban_number(*most.decibans));
  if (turning == 0) return out + " No single removal makes it change sides.";
  return out + (turning == 1 ? std::string(" One removal makes it change sides.")
                             : fmt::format(" {} removals make it change sides.", turning));
}

}  // namespace

Ladder ladder(std::span<const Answer> answers) {
  Ladder out;
  std::vector<double> values;
  for (const Answer& answer : answers) {
    out.rungs.push_back({rung_label(answer), in_decibans(answer.log_bf)});
    if (out.rungs.back().decibans) values.push_back(*out.rungs.back().decibans);
  }
  out.weight = frame(values);
  out.words = {"Ladder: weight of evidence as studies arrive", ladder_finding(out)};
  return out;
}

Sway sway(std::optional<double> log_bf, std::span<const Answer> without, std::size_t most_rows) {
  Sway out;
  out.decibans = in_decibans(log_bf);
  out.of = without.size();
  std::size_t turning = 0;
  std::vector<double> values, lows, highs;
  if (out.decibans) values.push_back(*out.decibans);
  for (const Answer& answer : without) {
    out.rows.push_back({answer.label, in_decibans(answer.log_bf), answer.effect});
    const auto& value = out.rows.back().decibans;
    if (value && out.decibans && (*value >= 0) != (*out.decibans >= 0)) ++turning;
  }
  const auto change = [&](const SwayRow& row) {
    return row.decibans && out.decibans ? std::fabs(*row.decibans - *out.decibans) : HUGE_VAL;
  };
  std::stable_sort(out.rows.begin(), out.rows.end(),
                   [&](const auto& a, const auto& b) { return change(a) > change(b); });
  if (out.rows.size() > most_rows) out.rows.resize(std::max<std::size_t>(most_rows, 1));
  double widest = 0;
  for (const SwayRow& row : out.rows) {
    if (row.decibans) values.push_back(*row.decibans);
    if (row.effect.lower && row.effect.upper)
      widest = std::max(widest, *row.effect.upper - *row.effect.lower);
  }
  out.weight = frame(values);
  out.decimals = decimals_for(widest);
  out.words = {"Sway: what each study's removal does", sway_finding(out, turning)};
  return out;
}

}  // namespace steelyard::figure
