// The report in Markdown, for a supplement or a pull request.
#include <string>
#include <variant>

#include "render/document.hpp"
#include "render/unicode.hpp"

namespace steelyard {
namespace {

using namespace render;

/// Text in which nothing is read as Markdown or HTML.
std::string plain(const std::string& text) {
  static const std::string special = "\\`*_{}[]#|~!$";
  std::string out;
  for (const char c : encode(clean(text))) {
    switch (c) {
      case '&':
        out += "&amp;";
        break;
      case '<':
        out += "&lt;";
        break;
      case '>':
        out += "&gt;";
        break;
      default:
        if (special.find(c) != std::string::npos) out += '\\';
        out += c;
    }
  }
  return out;
}

struct Writer {
  std::string& out;

  void operator()(const Paragraph& paragraph) const {
    out += paragraph.strong ? "**" + plain(paragraph.text) + "**\n\n" : plain(paragraph.text) + "\n\n";
  }
  void operator()(const TableBlock& table) const {
    out += plain(table.caption) + ":\n\n|";
    for (const std::string& head : table.head) out += " " + plain(head) + " |";
    out += "\n|";
    for (std::size_t i = 0; i < table.head.size(); ++i) out += i == 0 ? " :-- |" : " --: |";
    out += "\n";
    for (const auto& row : table.rows) {
      out += "|";
      for (const TableCell& cell : row) out += " " + plain(cell.text) + " |";
      out += "\n";
    }
    out += "\n";
  }
  void operator()(const FigureBlock& figure) const { out += plain(figure.caption) + "\n\n"; }
  void operator()(const ListBlock& list) const {
    for (const std::string& item : list.items) out += "- " + plain(item) + "\n";
    out += "\n";
  }
  void operator()(const CodeBlock& code) const {
    // Indented code can't be ended by anything inside it.
    out += "    " + encode(clean(code.text)) + "\n\n";
  }
};

}  // namespace

std::string render_markdown(const Report& report) {
  const Document document = render::document(report, false);
  std::string out = "# " + plain(document.title) + "\n\n";
  const Writer writer{out};
  for (const Paragraph& paragraph : document.verdict) writer(paragraph);
  for (const Section& section : document.sections) {
    if (section.blocks.empty()) continue;
    out += "## " + plain(section.title) + "\n\n";
    for (const Block& block : section.blocks) std::visit(writer, block);
  }
  out.pop_back();
  return out;
}

}  // namespace steelyard
