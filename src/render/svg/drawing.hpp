// The drawing layer: marks in px on a page, and the one place where they become bytes.
#pragma once

#include <string>
#include <string_view>
#include <variant>
#include <vector>

#include "steelyard/render.hpp"

namespace steelyard::render::svg {

struct Box {
  double x = 0.0, y = 0.0, width = 0.0, height = 0.0;
  [[nodiscard]] double right() const { return x + width; }
  [[nodiscard]] double bottom() const { return y + height; }
};

/// The `d` of a path, built point by point.
class Path {
 public:
  Path& move(double x, double y);
  Path& line(double x, double y);
  Path& close();
  [[nodiscard]] const std::string& data() const { return data_; }
  [[nodiscard]] bool empty() const { return data_.empty(); }

 private:
  std::string data_;
};

enum class Anchor { start, middle, end };

/// `role` is what a mark means; the style sheet gives it its colour (see style.cpp).
struct Shape {
  std::string data;
  std::string role;
  std::string title;  ///< shown on hovering; may be empty
};

struct Text {
  double x = 0.0, y = 0.0;  ///< of the baseline
  std::string text;         ///< clean already
  std::string role;
  Anchor anchor = Anchor::start;
  double size = 10.0;
  bool bold = false;
  bool upright = true;  ///< false: turned a quarter to the left around (x, y)
  std::string title;    ///< the full text when `text` was cut
};

/// Opens a group that a page can find: class, `data-study` and title. Ended by GroupEnd.
struct GroupStart {
  std::string role;
  std::string study;  ///< the index of a study, or ""
  std::string title;
};
struct GroupEnd {};

using Mark = std::variant<Shape, Text, GroupStart, GroupEnd>;

struct Drawing {
  double width = 0.0;
  double height = 0.0;
  figure::Words words;
  std::vector<Mark> marks;

  void shape(const Path& path, std::string role, std::string title = "");
  void rect(const Box& box, std::string role, std::string title = "");
  void line(double x1, double y1, double x2, double y2, std::string role);
  /// Text that fits already.
  void text(double x, double y, std::string_view text, std::string role, double size,
            Anchor anchor = Anchor::start, bool bold = false);
  /// Text cut to a width.
  void label(double x, double y, std::string_view text, double width, std::string role, double size,
             Anchor anchor = Anchor::start, bool bold = false);
  /// Lines of prose downward from the baseline y; returns the baseline after the last line.
  double prose(double x, double y, std::string_view text, double width, std::string role, double size,
               bool bold = false);
};

/// Where a text stands, by measured widths.
[[nodiscard]] Box box_of(const Text& text);

/// The file, or the element for a page that carries the style sheet.
[[nodiscard]] std::string to_bytes(const Drawing& drawing, const SvgStyle& style);

/// The width of the page in px (96 to the inch).
[[nodiscard]] double page_width(const SvgStyle& style);

/// Text for the inside of elements and quoted attributes; nothing in it can end either.
[[nodiscard]] std::string escape(std::string_view text);

}  // namespace steelyard::render::svg
