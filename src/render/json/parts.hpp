// Private to the room: the parts that several documents share.
#pragma once

#include <optional>
#include <span>
#include <string_view>
#include <vector>

#include "render/json/fields.hpp"
#include "steelyard/analysis.hpp"

namespace steelyard::json {

/// A number that is null when it is not finite.
[[nodiscard]] std::optional<double> finite(double value);

[[nodiscard]] Part<Input> input_part();
[[nodiscard]] Part<Priors> priors_part();
[[nodiscard]] Part<Summary> summary_part();
[[nodiscard]] Part<LogBayesFactor> bayes_factor_part();
[[nodiscard]] Part<Diagnostic> diagnostic_part();

/// A finding with the table that its row numbers point into.
struct FindingView {
  const Finding* finding;
  const Table* table;
};
[[nodiscard]] Part<FindingView> finding_part();

/// The fields of a rebuilt study, for any T from which `study(from)` gives a const Study&.
template <class T, class Get>
std::vector<Field<T>> study_fields(Get study);

/// Fields that begin every document: who wrote it and for which command.
template <class T>
std::vector<Field<T>> head_fields(std::string_view command);

/// Both lists, one after the other.
template <class T>
std::vector<Field<T>> operator+(std::vector<Field<T>> first, std::vector<Field<T>> second) {
  for (Field<T>& field : second) first.push_back(std::move(field));
  return first;
}

/// The findings of each row: element r lists those of row r of the table.
[[nodiscard]] std::vector<std::vector<FindingView>> findings_by_row(const Table& table,
                                                                    std::span<const Finding> findings);

// ---- templates ----------------------------------------------------------------------------------

template <class T>
std::vector<Field<T>> head_fields(std::string_view command) {
  const std::string name(command);
  return {{"steelyard", "version of the program", text<T>([](const T&) { return STEELYARD_VERSION; })},
          {"schema", "version of these fields",
           integer<T>([](const T&) { return static_cast<unsigned long long>(json_schema_version); })},
          {"command", "the command that wrote it", word<T>({name}, [name](const T&) { return name; })}};
}

[[nodiscard]] Part<Study> effect_part();
[[nodiscard]] Part<Study> bands_part();
[[nodiscard]] Part<Study> alternatives_part();
[[nodiscard]] std::string_view design_word(Design design);

template <class T, class Get>
std::vector<Field<T>> study_fields(Get study) {
  const auto part = [study](Part<Study> p) { return inside<T>(std::move(p), study); };
  using S = const Study&;
  return {
      {"study", "label", part(text<Study>([](S s) { return s.label; }))},
      {"row", "number of the row in the file, from 1", part(integer<Study>([](S s) { return s.row + 1; }))},
      {"line", "line of the row in the file, from 1", part(integer<Study>([](S s) { return s.line; }))},
      {"route", "how the evidence was rebuilt, by its id in docs/rebuild.md",
       part(text<Study>([](S s) { return s.route; }))},
      {"how", "the same in a sentence", part(text<Study>([](S s) { return s.how; }))},
      {"design", "how the scores were gathered",
       part(word<Study>({"two_groups", "one_sample", "paired"}, [](S s) { return design_word(s.design); }))},
      {"likelihood", "form of the likelihood",
       part(word<Study>({"exact_t", "t_band", "normal"},
                        [](S s) { return std::string_view(likelihood_name(s.evidence)); }))},
      {"sign_open", "true when the printed numbers leave the sign of the effect open",
       part(boolean<Study>([](S s) { return is_folded(s.evidence); }))},
      {"metric", "unit of the effect; \"smd\" is a standardized mean difference",
       part(text<Study>([](S s) { return s.metric; }))},
      {"year", "year as given", part(number<Study>([](S s) { return s.year; }))},
      {"role", "original or replication, where given",
       part(text_or_null<Study>([](S s) { return std::string_view(s.role); }))},
      {"t", "t value; null where only a band or an estimate is known",
       part(number<Study>([](S s) { return t_value(s); }))},
      {"df", "degrees of freedom", part(number<Study>([](S s) { return degrees_of_freedom(s); }))},
      {"n_effective", "effective sample size: the noncentrality is effect times its square root",
       part(number<Study>([](S s) { return effective_n(s); }))},
      {"bands", "where only bounds are known: t lies in one of these intervals; null ends are infinite",
       part(bands_part())},
      {"effect", "the effect as it is usually printed", part(effect_part())},
      {"alternatives", "other ways in which the same row gives t", part(alternatives_part())},
      {"cautions", "sentences that must stand beside the study",
       part(array<Study>(text<std::string>([](const std::string& s) { return std::string_view(s); }),
                         [](S s) -> const std::vector<std::string>& { return s.cautions; }))}};
}

}  // namespace steelyard::json
