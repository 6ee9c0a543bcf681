// `check` for people: first what the file holds and what does not agree, then how each row was read.
#include <fmt/format.h>

#include <string>

#include "render/text/page.hpp"

namespace steelyard {

namespace {

using namespace render::text;

std::string plural(std::size_t count, std::string_view one, std::string_view many) {
  return fmt::format("{} {}", count, count == 1 ? one : many);
}

std::size_t count_of(const Check& check, Grade grade) {
  std::size_t count = 0;
  for (const Finding& finding : check.findings) count += finding.grade == grade ? 1 : 0;
  return count;
}

std::string summary(const Check& check) {
  const std::size_t rows = check.input.table.rows.size();
  const std::size_t kept = rows - check.left_out.size();
  std::string text =
      check.studies.size() == kept
          ? fmt::format("{} of \"{}\" can be rebuilt.",
                        kept == 1 ? "The one row" : fmt::format("All {} rows", kept), check.input.file)
          : fmt::format("{} of {} of \"{}\" can be rebuilt.", check.studies.size(),
                        plural(kept, "row", "rows"), check.input.file);
  if (check.findings.empty())
    return text + " The printed numbers agree with each other as far as rounding can show.";
  return text +
         fmt::format(" The audit found {}: {} impossible, {} that change the verdict, {} worth a look.",
                     plural(check.findings.size(), "disagreement or oddity", "disagreements or oddities"),
                     count_of(check, Grade::impossible), count_of(check, Grade::changes_the_verdict),
                     count_of(check, Grade::worth_a_look));
}

std::string left_out(const Check& check) {
  std::string labels;
  for (const std::string& label : check.left_out)
    labels += fmt::format("{}\"{}\"", labels.empty() ? "" : ", ", label);
  return fmt::format("Left out as asked: {}.", labels);
}

std::string finding_lines(const Check& check, const Finding& finding, const TextStyle& style) {
  const Tone tone = finding.grade == Grade::worth_a_look ? Tone::plain : Tone::strong;
  const Table& table = check.input.table;
  const std::string head = fmt::format("{} (line {}): {} [{}]", row_label(table, finding.row),
                                       table.rows[finding.row].line, to_text(finding.grade), finding.rule);
  std::string text = toned(shown(head, style), tone, style) + '\n';
  text += paragraph(finding.what, style, 2);
  if (!finding.remedy.empty()) text += paragraph(finding.remedy, style, 2);
  return text;
}

std::string row_lines(const Study& study, const TextStyle& style) {
  std::string text =
      paragraph(fmt::format("{} (line {}): {}", study.label, study.line, study.how), style, 0, 2);
  for (const AlternativeRoute& other : study.alternatives) {
    text += paragraph(fmt::format("The row also gives t = {:.4g} by {}.", other.t, other.route), style, 2);
  }
  for (const std::string& caution : study.cautions) text += paragraph("Caution: " + caution, style, 2);
  return text;
}

}  // namespace

std::string render_text(const Check& check, const TextStyle& style) {
  std::string text = paragraph(summary(check), style);
  if (!check.left_out.empty()) text += paragraph(left_out(check), style);
  if (!check.findings.empty()) text += '\n' + heading("What does not agree", style);
  for (const Finding& finding : check.findings) text += finding_lines(check, finding, style);
  if (!check.studies.empty()) text += '\n' + heading("How each row is read", style);
  for (const Study& study : check.studies) text += row_lines(study, style);
  if (!check.cautions.empty()) text += '\n' + heading("Cautions", style);
  for (const Diagnostic& caution : check.cautions) {
    text += paragraph(fmt::format("{} {}", caution.what, caution.remedy), style, 0, 2);
  }
  return text;
}

}  // namespace steelyard
