// The report as one HTML file.
#include <cmath>
#include <string>
#include <variant>

#include <fmt/format.h>

#include "render/document.hpp"
#include "render/html/assets.hpp"
#include "render/svg/drawing.hpp"

namespace steelyard {
namespace {

using namespace render;
using svg::escape;

/// Columns of words are set left, of numbers right.
bool is_words(const TableBlock& table, std::size_t column) {
  if (column == 0) return true;
  for (const auto& row : table.rows)
    if (row[column].text.size() > 40) return true;
  return table.sortable && column >= 9;
}

/// The question in a span, so that it can be seen at a glance.
std::string verdict_paragraph(const Paragraph& paragraph) {
  return fmt::format("<p{}>{}</p>\n", paragraph.strong ? " class=\"strong\"" : "", escape(paragraph.text));
}

struct Writer {
  std::string& out;
  std::size_t start;  ///< row of the width table that is in use

  void operator()(const Paragraph& paragraph) const {
    out += fmt::format("<p>{}</p>\n", escape(paragraph.text));
  }
  void operator()(const ListBlock& list) const {
    out += "<ul>\n";
    for (const std::string& item : list.items) out += fmt::format("<li>{}</li>\n", escape(item));
    out += "</ul>\n";
  }
  void operator()(const CodeBlock& code) const {
    out += fmt::format("<pre tabindex=\"0\">{}</pre>\n", escape(code.text));
  }
  void operator()(const FigureBlock& figure) const {
    out += fmt::format(
        "<figure id=\"figure-{}\">\n<div class=\"only-wide\">\n{}</div>\n<div "
        "class=\"only-narrow\">\n{}</div>\n</figure>\n",
        figure.id, figure.wide, figure.narrow);
  }
  void operator()(const TableBlock& table) const {
    if (table.id == "widths") slider();
    out += fmt::format(
        "<div class=\"scroll\" tabindex=\"0\" role=\"region\" aria-label=\"{}\">\n<table "
        "id=\"{}\"{}>\n<caption>{}</caption>\n<thead><tr>",
        escape(table.caption), table.id, table.sortable ? " class=\"sortable\"" : "", escape(table.caption));
    for (std::size_t i = 0; i < table.head.size(); ++i)
      out += fmt::format("<th scope=\"col\"{}>{}</th>", is_words(table, i) ? " class=\"words\"" : "",
                         escape(table.head[i]));
    out += "</tr></thead>\n<tbody>\n";
    for (std::size_t r = 0; r < table.rows.size(); ++r) row(table, r);
    out += "</tbody>\n</table>\n</div>\n";
  }

 private:
  void row(const TableBlock& table, std::size_t r) const {
    out += table.row_keys.empty() ? "<tr>" : fmt::format("<tr data-study=\"{}\">", escape(table.row_keys[r]));
    for (std::size_t i = 0; i < table.rows[r].size(); ++i) {
      const TableCell& cell = table.rows[r][i];
      const std::string value =
          cell.key && std::isfinite(*cell.key) ? fmt::format(" data-value=\"{:.17g}\"", *cell.key) : "";
      out += fmt::format("<td{}{}>{}</td>", is_words(table, i) ? " class=\"words\"" : "", value,
                         escape(cell.text));
    }
    out += "</tr>\n";
  }
  void slider() const {
    out += fmt::format(
        "<div class=\"slide\" id=\"slide\" data-start=\"{}\" hidden>\n<label for=\"slide-input\">Move the "
        "prior width (values computed beforehand)"
        "</label>\n<input id=\"slide-input\" type=\"range\" min=\"0\" value=\"0\" step=\"1\">\n<output "
        "id=\"slide-output\" for=\"slide-input\"></output>\n</div>\n",
        start);
  }
};

std::size_t used_width(const Report& report) {
  std::size_t nearest = 0;
  if (!report.prior_grid) return nearest;
  const auto& widths = report.prior_grid->widths;
  for (std::size_t i = 0; i < widths.size(); ++i)
    if (std::fabs(widths[i] - report.prior_grid->width_used) <
        std::fabs(widths[nearest] - report.prior_grid->width_used))
      nearest = i;
  return nearest;
}

std::string head(const Document& document) {
  const std::string style = html::style();
  return fmt::format(
      "<!DOCTYPE html>\n<html lang=\"en\">\n<head>\n<meta charset=\"utf-8\">\n<meta "
      "http-equiv=\"Content-Security-Policy\" content=\"default-src 'none'; "
      "style-src {}; script-src {}; base-uri 'none'; form-action 'none'\">\n<meta name=\"viewport\" "
      "content=\"width=device-width, initial-scale=1\">\n"
      "<title>{}</title>\n<style>{}</style>\n</head>\n",
      html::policy_hash(style), html::policy_hash(html::script()), escape(document.title), style);
}

std::string navigation(const Document& document) {
  std::string out = "<nav aria-label=\"Sections\">";
  for (const Section& section : document.sections)
    if (!section.blocks.empty())
      out += fmt::format("<a href=\"#{}\">{}</a> ", section.id, escape(section.title));
  return out + "</nav>\n";
}

void write(const Section& section, const Writer& writer) {
  if (section.blocks.empty()) return;
  writer.out += fmt::format("<section id=\"{}\">\n<h2>{}</h2>\n", section.id, escape(section.title));
  const bool paired = section.id == "shapes" || section.id == "firmness" || section.id == "evidence";
  if (paired) writer.out += "<div class=\"pair\">\n";
  for (const Block& block : section.blocks) {
    if (paired) writer.out += "<div>\n";
    std::visit(writer, block);
    if (paired) writer.out += "</div>\n";
  }
  writer.out += paired ? "</div>\n</section>\n" : "</section>\n";
}

}  // namespace

std::string render_html(const Report& report) {
  const Document document = render::document(report, true);
  std::string out = head(document);
  out += fmt::format("<body>\n<header>\n<h1>{}</h1>\n<div class=\"verdict\">\n", escape(document.title));
  for (const Paragraph& paragraph : document.verdict) out += verdict_paragraph(paragraph);
  out += "</div>\n" + navigation(document) + "</header>\n<main>\n";
  const Writer writer{out, used_width(report)};
  for (const Section& section : document.sections) write(section, writer);
  out += "</main>\n<div id=\"readout\" role=\"status\" hidden></div>\n<script>";
  out += html::script();
  return out + "</script>\n</body>\n</html>\n";
}

}  // namespace steelyard
