// Private to the room: the fields that every document about gathered rows begins with.
#pragma once

#include <string>
#include <vector>

#include "render/json/parts.hpp"

namespace steelyard::json {

[[nodiscard]] Part<AnalysisOptions> analysis_options_part();
[[nodiscard]] Part<RegionResult> region_part();

/// An array of texts.
template <class T, class Get>
Part<T> texts(Get get) {
  return array<T>(text<std::string>([](const std::string& s) { return std::string_view(s); }), get);
}

/// Head, input, priors, options and what was left out; `rows(from)` gives a const Gathered&.
template <class T, class Get>
std::vector<Field<T>> gathered_fields(std::string_view command, Get rows) {
  return head_fields<T>(command) +
         std::vector<Field<T>>{
             {"input", "what was read",
              inside<T>(input_part(), [rows](const T& v) -> const Input& { return rows(v).input; })},
             {"priors", "what was assumed before the data",
              inside<T>(priors_part(),
                        [rows](const T& v) -> const Priors& { return rows(v).options.priors; })},
             {"options", "what was asked for",
              inside<T>(analysis_options_part(),
                        [rows](const T& v) -> const AnalysisOptions& { return rows(v).options; })},
             {"left_out", "labels of the studies that were left out",
              texts<T>([rows](const T& v) -> const std::vector<std::string>& { return rows(v).left_out; })}};
}

/// A label and a line of a study, for any T from which `study(from)` gives a const Study&.
template <class T, class Get>
std::vector<Field<T>> name_fields(Get study) {
  return {{"study", "label", text<T>([study](const T& v) { return study(v).label; })},
          {"line", "line of the row", integer<T>([study](const T& v) { return study(v).line; })}};
}

}  // namespace steelyard::json
