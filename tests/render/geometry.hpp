// Boxes of the texts in an SVG file, by the measured widths, for tests that look for overlap.
#pragma once

#include <cstdlib>
#include <string>
#include <vector>

#include "render/svg/drawing.hpp"
#include "render/svg/measure.hpp"
#include "render/unicode.hpp"

namespace geometry {

using steelyard::render::svg::Anchor;
using steelyard::render::svg::Box;
using steelyard::render::svg::Text;

inline std::string attribute(const std::string& tag, const std::string& name) {
  const std::string key = " " + name + "=\"";
  const auto at = tag.find(key);
  if (at == std::string::npos) return "";
  return tag.substr(at + key.size(), tag.find('"', at + key.size()) - at - key.size());
}

inline std::string unescape(std::string text) {
  const std::pair<const char*, const char*> pairs[] = {
      {"&lt;", "<"}, {"&gt;", ">"}, {"&quot;", "\""}, {"&#39;", "'"}, {"&amp;", "&"}};
  for (const auto& [from, to] : pairs)
    for (auto at = text.find(from); at != std::string::npos; at = text.find(from, at + 1))
      text.replace(at, std::string(from).size(), to);
  return text;
}

/// Every <text> of the file.
inline std::vector<Text> texts(const std::string& svg) {
  std::vector<Text> out;
  for (auto at = svg.find("<text"); at != std::string::npos; at = svg.find("<text", at + 1)) {
    const auto close = svg.find('>', at), end = svg.find("</text>", at);
    const std::string tag = svg.substr(at, close - at);
    std::string content = svg.substr(close + 1, end - close - 1);
    const auto title = content.find("</title>");
    if (title != std::string::npos) content.erase(0, title + 8);
    Text text;
    text.x = std::strtod(attribute(tag, "x").c_str(), nullptr);
    text.y = std::strtod(attribute(tag, "y").c_str(), nullptr);
    text.size = std::strtod(attribute(tag, "font-size").c_str(), nullptr);
    const std::string anchor = attribute(tag, "text-anchor");
    text.anchor = anchor == "end" ? Anchor::end : anchor == "middle" ? Anchor::middle : Anchor::start;
    text.bold = attribute(tag, "font-weight") == "bold";
    text.upright = attribute(tag, "transform").empty();
    text.text = unescape(content);
    out.push_back(text);
  }
  return out;
}

inline bool overlap(const Box& a, const Box& b) {
  constexpr double touch = 0.5;
  return a.x + touch < b.right() && b.x + touch < a.right() && a.y + touch < b.bottom() &&
         b.y + touch < a.bottom();
}

/// "" when no two texts overlap and none leaves the page; else what is wrong.
inline std::string problem(const std::string& svg) {
  const double width = std::strtod(attribute(svg.substr(svg.find("<svg")), "width").c_str(), nullptr);
  const double height = std::strtod(attribute(svg.substr(svg.find("<svg")), "height").c_str(), nullptr);
  const auto all = texts(svg);
  std::vector<Box> boxes;
  for (const Text& text : all) boxes.push_back(steelyard::render::svg::box_of(text));
  for (std::size_t i = 0; i < all.size(); ++i) {
    if (boxes[i].x < -0.1 || boxes[i].y < -0.1 || boxes[i].right() > width + 0.1 ||
        boxes[i].bottom() > height + 0.1)
      return "outside the page: " + all[i].text;
    for (std::size_t j = 0; j < i; ++j)
      if (overlap(boxes[i], boxes[j])) return "overlap: " + all[j].text + " | " + all[i].text;
  }
  return "";
}

/// "" when the tags of the file nest and close, attributes are quoted, and no bare & or < stands in text.
inline std::string not_well_formed(const std::string& xml) {
  std::vector<std::string> open;
  for (std::size_t at = xml.rfind("?>", 60) == std::string::npos ? 0 : xml.find("?>") + 2; at < xml.size();) {
    if (xml[at] == '&') {
      const auto semicolon = xml.find(';', at);
      const std::string name = xml.substr(at, semicolon - at + 1);
      if (name != "&amp;" && name != "&lt;" && name != "&gt;" && name != "&quot;" && name != "&#39;")
        return "bare & at " + xml.substr(at, 20);
    }
    if (xml[at] != '<') {
      ++at;
      continue;
    }
    const auto close = xml.find('>', at);
    if (close == std::string::npos) return "unclosed tag";
    const std::string tag = xml.substr(at + 1, close - at - 1);
    if (tag.find('<') != std::string::npos) return "< inside " + tag;
    const std::string name = tag.substr(0, tag.find_first_of(" \n/", 1));
    if (tag.front() == '/') {
      if (open.empty() || open.back() != tag.substr(1)) return "unexpected </" + tag + ">";
      open.pop_back();
    } else if (tag.back() != '/') {
      open.push_back(name);
    }
    at = close + 1;
  }
  return open.empty() ? "" : "never closed: " + open.back();
}

}  // namespace geometry
