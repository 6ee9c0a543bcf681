// The report as a value: sections of prose, tables and figures, which HTML and Markdown each turn into bytes.
#pragma once

#include <optional>
#include <string>
#include <variant>
#include <vector>

#include "steelyard/render.hpp"

namespace steelyard::render {

struct Paragraph {
  std::string text;
  bool strong = false;
};

/// A cell and, where its column can be sorted by number, the number.
struct TableCell {
  std::string text;
  std::optional<double> key;
};

struct TableBlock {
  std::string id;  ///< letters and '-'
  std::string caption;
  std::vector<std::string> head;
  std::vector<std::vector<TableCell>> rows;
  std::vector<std::string> row_keys;  ///< parallel to rows or empty: the study a row belongs to
  bool sortable = false;
};

/// A figure at both widths.
struct FigureBlock {
  std::string id;
  std::string caption;
  std::string wide, narrow;
};

struct ListBlock {
  std::vector<std::string> items;
};
struct CodeBlock {
  std::string text;
};

using Block = std::variant<Paragraph, TableBlock, FigureBlock, ListBlock, CodeBlock>;

struct Section {
  std::string id;
  std::string title;
  std::vector<Block> blocks;
};

struct Document {
  std::string title;
  std::vector<Paragraph> verdict;  ///< the answer, before everything else
  std::vector<Section> sections;
};

/// `with_figures`: false leaves the pictures out and keeps their captions.
[[nodiscard]] Document document(const Report& report, bool with_figures);

/// The methods paragraph, ready to paste, and its references in order of mention.
struct Methods {
  std::string paragraph;
  std::vector<std::string> references;
};
[[nodiscard]] Methods methods(const Analysis& analysis);

/// Every assumption in words.
[[nodiscard]] std::vector<std::string> assumptions(const Analysis& analysis);

}  // namespace steelyard::render
