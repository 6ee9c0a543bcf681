#include "render/svg/drawing.hpp"

#include <algorithm>
#include <cmath>
#include <utility>

#include <fmt/format.h>

#include "render/svg/measure.hpp"
#include "render/unicode.hpp"

namespace steelyard::render::svg {
namespace {

/// Hundredths of a px, without trailing zeros; whole arithmetic, so the same digits everywhere.
std::string coordinate(double value) {
  const auto hundredths = static_cast<long long>(std::llround(std::clamp(value, -1e6, 1e6) * 100));
  const long long size = std::llabs(hundredths);
  std::string out = hundredths < 0 ? "-" : "";
  out += fmt::format("{}", size / 100);
  if (size % 100 != 0)
    out += size % 10 == 0 ? fmt::format(".{}", size % 100 / 10) : fmt::format(".{:02}", size % 100);
  return out;
}

std::string title_element(const std::string& title) {
  return title.empty() ? "" : "<title>" + escape(title) + "</title>";
}

struct Writer {
  std::string& out;

  void operator()(const Shape& shape) const {
    out += "<path class=\"y-" + shape.role + "\" d=\"" + shape.data + "\"";
    out += shape.title.empty() ? "/>\n" : ">" + title_element(shape.title) + "</path>\n";
  }
  void operator()(const Text& text) const {
    static constexpr const char* anchors[] = {"", " text-anchor=\"middle\"", " text-anchor=\"end\""};
    const std::string x = coordinate(text.x), y = coordinate(text.y);
    out += "<text class=\"y-" + text.role + "\" x=\"" + x + "\" y=\"" + y + "\" font-size=\"" +
           coordinate(text.size) + "\"" + anchors[static_cast<int>(text.anchor)];
    if (text.bold) out += " font-weight=\"bold\"";
    if (!text.upright) out += " transform=\"rotate(-90 " + x + " " + y + ")\"";
    out += ">" + title_element(text.title) + escape(text.text) + "</text>\n";
  }
  void operator()(const GroupStart& group) const {
    out += "<g class=\"y-" + group.role + "\"";
    if (!group.study.empty()) out += " data-study=\"" + escape(group.study) + "\"";
    out += ">" + title_element(group.title) + "\n";
  }
  void operator()(const GroupEnd&) const { out += "</g>\n"; }
};

}  // namespace

Path& Path::move(double x, double y) {
  data_ += "M" + coordinate(x) + " " + coordinate(y);
  return *this;
}
Path& Path::line(double x, double y) {
  data_ += "L" + coordinate(x) + " " + coordinate(y);
  return *this;
}
Path& Path::close() {
  data_ += "Z";
  return *this;
}

void Drawing::shape(const Path& path, std::string role, std::string title) {
  if (!path.empty()) marks.emplace_back(Shape{path.data(), std::move(role), std::move(title)});
}

void Drawing::rect(const Box& box, std::string role, std::string title) {
  Path path;
  path.move(box.x, box.y)
      .line(box.right(), box.y)
      .line(box.right(), box.bottom())
      .line(box.x, box.bottom())
      .close();
  shape(path, std::move(role), std::move(title));
}

void Drawing::line(double x1, double y1, double x2, double y2, std::string role) {
  shape(Path().move(x1, y1).line(x2, y2), std::move(role));
}

void Drawing::text(double x, double y, std::string_view content, std::string role, double size, Anchor anchor,
                   bool bold) {
  marks.emplace_back(Text{x, y, encode(clean(content)), std::move(role), anchor, size, bold, true, ""});
}

void Drawing::label(double x, double y, std::string_view content, double room, std::string role, double size,
                    Anchor anchor, bool bold) {
  Fitted fitted = fit(content, size, room, bold);
  marks.emplace_back(
      Text{x, y, std::move(fitted.shown), std::move(role), anchor, size, bold, true, std::move(fitted.full)});
}

double Drawing::prose(double x, double y, std::string_view content, double room, std::string role,
                      double size, bool bold) {
  for (std::string& line : wrap(content, size, room, bold)) {
    marks.emplace_back(Text{x, y, std::move(line), role, Anchor::start, size, bold, true, ""});
    y += 1.4 * size;
  }
  return y;
}

Box box_of(const Text& text) {
  const double width = text_width(text.text, text.size, text.bold);
  const double shift = text.anchor == Anchor::start ? 0.0 : text.anchor == Anchor::middle ? width / 2 : width;
  const double up = ascent * text.size, height = (ascent + descent) * text.size;
  if (text.upright) return {text.x - shift, text.y - up, width, height};
  return {text.x - up, text.y + shift - width, height, width};
}

double page_width(const SvgStyle& style) { return style.width == FigureWidth::one_column ? 322.0 : 680.0; }

std::string escape(std::string_view text) {
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
      case '"':
        out += "&quot;";
        break;
      case '\'':
        out += "&#39;";
        break;
      default:
        out += c;
    }
  }
  return out;
}

std::string to_bytes(const Drawing& drawing, const SvgStyle& style) {
  const std::string width = coordinate(drawing.width), height = coordinate(drawing.height);
  std::string out = style.embedded ? "" : "<?xml version=\"1.0\" encoding=\"UTF-8\"?>\n";
  out += "<svg xmlns=\"http://www.w3.org/2000/svg\" width=\"" + width + "\" height=\"" + height +
         "\" viewBox=\"0 0 " + width + " " + height + "\" role=\"img\" aria-labelledby=\"" + style.id +
         "-title " + style.id + "-desc\" class=\"y-figure\">\n";
  out += "<title id=\"" + style.id + "-title\">" + escape(drawing.words.title) + "</title>\n";
  out += "<desc id=\"" + style.id + "-desc\">" + escape(drawing.words.finding) + "</desc>\n";
  if (!style.embedded) out += "<style>\n" + svg_stylesheet() + "</style>\n";
  out +=
      "<path class=\"y-paper\" d=\"M0 0L" + width + " 0L" + width + " " + height + "L0 " + height + "Z\"/>\n";
  const Writer writer{out};
  for (const Mark& mark : drawing.marks) std::visit(writer, mark);
  return out + "</svg>\n";
}

}  // namespace steelyard::render::svg
