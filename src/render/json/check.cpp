// The document of `check` (docs/json.md).
#include <utility>

#include "render/json/documents.hpp"
#include "render/json/parts.hpp"

namespace steelyard::json {

namespace {

using C = const Check&;

Part<CheckOptions> options_part() {
  using O = const CheckOptions&;
  return object<CheckOptions>(
      "check_options",
      {{"alpha", "what \"not significant\" means where the file does not say",
        number<CheckOptions>([](O o) { return o.rebuild.alpha; })},
       {"without", "studies to leave out, as named by the user",
        array<CheckOptions>(text<std::string>([](const std::string& s) { return std::string_view(s); }),
                            [](O o) -> const std::vector<std::string>& { return o.without; })}});
}

Part<Check> counts_part() {
  const auto count = [](Grade grade) {
    return integer<Check>([grade](C c) {
      std::size_t found = 0;
      for (const Finding& finding : c.findings) found += finding.grade == grade ? 1 : 0;
      return found;
    });
  };
  return object<Check>("counts", {{"impossible", "findings of that grade", count(Grade::impossible)},
                                  {"changes_the_verdict", "likewise", count(Grade::changes_the_verdict)},
                                  {"worth_a_look", "likewise", count(Grade::worth_a_look)},
                                  {"not_rebuilt", "rows that could not be rebuilt", integer<Check>([](C c) {
                                     return c.input.table.rows.size() - c.left_out.size() - c.studies.size();
                                   })}});
}

std::vector<FindingView> finding_views(C check) {
  std::vector<FindingView> views;
  for (const Finding& finding : check.findings) views.push_back({&finding, &check.input.table});
  return views;
}

const Part<Check>& check_part() {
  static const Part<Check> part = object<Check>(
      "", head_fields<Check>("check") +
              std::vector<Field<Check>>{
                  {"input", "what was read", inside<Check>(input_part(), &Check::input)},
                  {"options", "what was asked for", inside<Check>(options_part(), &Check::options)},
                  {"left_out", "labels of the studies that were left out",
                   array<Check>(text<std::string>([](const std::string& s) { return std::string_view(s); }),
                                &Check::left_out)},
                  {"counts", "how many of what", inside<Check>(counts_part(), [](C c) -> C { return c; })},
                  {"studies", "the rows that could be rebuilt",
                   array<Check>(
                       object<Study>("rebuilt_study",
                                     study_fields<Study>([](const Study& s) -> const Study& { return s; })),
                       &Check::studies)},
                  {"problems", "why the other rows could not be rebuilt",
                   array<Check>(diagnostic_part(), &Check::problems)},
                  {"findings", "what does not agree, by row", array<Check>(finding_part(), finding_views)},
                  {"cautions", "what a reader must know beside the numbers",
                   array<Check>(diagnostic_part(), &Check::cautions)}});
  return part;
}

}  // namespace

const Shape& check_shape() { return check_part().shape; }

}  // namespace steelyard::json

namespace steelyard {

void write_json(const Check& check, const Sink& sink) {
  json::Writer writer(sink);
  json::check_part().write(writer, check);
  writer.finish();
}

std::string render_json(const Check& check) {
  std::string out;
  write_json(check, [&out](std::string_view bytes) { out += bytes; });
  return out;
}

}  // namespace steelyard
