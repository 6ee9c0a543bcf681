// Writes figures and reports of invented analyses to a folder, for the browser check.
#include <fstream>
#include <iostream>
#include <string>

#include "figure/made_up.hpp"
#include "steelyard/render.hpp"

using namespace steelyard;

namespace {

const std::string hostile =
    "<script>document.title='run'</script><img src=x onerror=\"document.title='run'\">]]>&\"' "
    "javascript:alert(1) "
    "\xD7\xA9\xD7\x9C\xD7\x95\xD7\x9D \xE6\xBC\xA2\xE5\xAD\x97 e\xCC\x81\xCC\x82 \xE2\x80\xAE and to a "
    "hundred and twenty";

struct Folder {
  std::string path;
  void put(const std::string& name, const std::string& bytes) const {
    std::ofstream(path + "/" + name) << bytes;
  }
};

void figures(const Folder& folder, const std::string& name, const Analysis& analysis, FigureWidth width) {
  const SvgStyle style{width, false, "sample"};
  const std::string end = name + (width == FigureWidth::one_column ? "-narrow.svg" : ".svg");
  const auto answers = made_up::answers(analysis);
  folder.put("forest-" + end, render_svg(figure::forest(analysis), style));
  folder.put("belief-" + end, render_svg(*figure::belief(analysis).value, style));
  folder.put("funnel-" + end, render_svg(*figure::funnel(analysis).value, style));
  folder.put("ladder-" + end, render_svg(figure::ladder(answers), style));
  folder.put("sway-" + end,
             render_svg(figure::sway(answers.back().log_bf, made_up::without(analysis)), style));
  if (analysis.studies.size() > 1)
    folder.put("surface-" + end, render_svg(*figure::surface(analysis).value, style));
}

Report report(const Analysis& analysis) {
  return {analysis, "steelyard report made-up.csv -o report.html", made_up::answers(analysis),
          made_up::without(analysis), made_up::grid(12, 7)};
}

}  // namespace

int main(int count, char** arguments) {
  if (count != 2) {
    std::cerr << "usage: browser_samples FOLDER\n";
    return 2;
  }
  const Folder folder{arguments[1]};
  for (const FigureWidth width : {FigureWidth::one_column, FigureWidth::two_columns}) {
    for (const std::size_t studies : {2U, 12U, 60U, 400U})
      figures(folder, std::to_string(studies), made_up::analysis(studies), width);
    figures(folder, "hostile", made_up::analysis(12, 0.4, 1.0, hostile), width);
    figures(folder, "wide", made_up::analysis(12, 0.4, 1.0, std::string(120, 'W')), width);
    figures(folder, "tiny", made_up::analysis(12, 1.0, 1e-3), width);
    figures(folder, "huge", made_up::analysis(12, 1.0, 1e3), width);
    const std::string end = width == FigureWidth::one_column ? "-narrow.svg" : ".svg";
    for (const std::size_t side : {2U, 7U, 20U})
      folder.put("priors-" + std::to_string(side) + end,
                 render_svg(*figure::prior_map(made_up::grid(side, side)).value, {width, false, "sample"}));
  }
  for (const std::size_t studies : {1U, 12U, 60U})
    folder.put("report-" + std::to_string(studies) + ".html",
               render_html(report(made_up::analysis(studies))));
  folder.put("report-hostile.html", render_html(report(made_up::analysis(12, 0.4, 1.0, hostile))));
  return 0;
}
