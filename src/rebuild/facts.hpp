// What one row says, looked up by column, and its numbers at one corner of their rounding bands.
#pragma once

#include <array>
#include <bitset>
#include <initializer_list>
#include <string>
#include <string_view>
#include <vector>

#include "rebuild/col.hpp"
#include "steelyard/read.hpp"
#include "steelyard/rebuild.hpp"

namespace steelyard::rebuilding {

using ColSet = std::bitset<col_count>;

/// Where each column stands in a table; made once a table.
struct Header {
  explicit Header(const Table& table);
  std::vector<int> cols;  ///< parallel to Table::names: index of the Col, or -1 for a label
};

/// The cells of one row. Where the row's own cell is empty, the cell that `as_printed` names is used.
class Facts {
 public:
  Facts(const Table& table, const Header& header, const Row& row);
  Facts(const Facts&) = delete;
  Facts& operator=(const Facts&) = delete;

  [[nodiscard]] const Cell* cell(Col col) const { return cells_[index(col)]; }
  [[nodiscard]] bool present(Col col) const { return cell(col) != nullptr; }
  /// The cell's text in lower case, with `_` and blanks as `-`; "" when empty.
  [[nodiscard]] std::string word(Col col) const;
  [[nodiscard]] std::string_view text(Col col) const;
  /// The cell's place; the row's first cell when it is empty.
  [[nodiscard]] Place place(Col col) const;
  [[nodiscard]] Place row_place() const;
  [[nodiscard]] std::size_t line() const { return row_.line; }
  /// The row's own cell and what its `as_printed` words say, each or null.
  [[nodiscard]] const Cell* own(Col col) const { return own_[index(col)]; }
  [[nodiscard]] const Cell* words(Col col) const { return words_[index(col)]; }
  [[nodiscard]] const Table& table() const { return table_; }

 private:
  const Table& table_;
  const Row& row_;
  std::array<const Cell*, col_count> cells_{};
  std::array<const Cell*, col_count> own_{};
  std::array<const Cell*, col_count> words_{};
};

/// Whether a cell's number may be off by its rounding: counts, df and choices are exact as they stand.
[[nodiscard]] bool is_rounded_quantity(Col col);

/// The numbers of a row, each at its printed value or moved to an end of its rounding band. Remembers which
/// were asked for, so that the route can be told and the corners searched. Collects messages unless muted.
class Numbers {
 public:
  Numbers(const Facts& facts, const RebuildOptions& options);

  [[nodiscard]] const Facts& facts() const { return facts_; }
  [[nodiscard]] const RebuildOptions& options() const { return options_; }
  [[nodiscard]] bool present(Col col) const { return facts_.present(col); }
  /// A number with a value (not a bound).
  [[nodiscard]] bool has(Col col) const;
  [[nodiscard]] bool has_all(std::initializer_list<Col> cols) const;
  [[nodiscard]] bool is_bound(Col col) const;
  [[nodiscard]] const Printed& printed(Col col) const;

  /// The number at this corner; NaN when there is none. Marks the column as used.
  double operator[](Col col);
  void mark(Col col) { used_.set(index(col)); }
  [[nodiscard]] const ColSet& used() const { return used_; }
  void forget() { used_.reset(); }
  void recall(const ColSet& used) { used_ = used; }

  void move(Col col, double value) { values_[index(col)] = value; }
  void mute(bool on) { muted_ = on; }

  void caution(Col col, std::string_view code, std::string what, std::string remedy);
  /// Says why a route can't be taken; an error if no other route can.
  void refuse(Col col, std::string_view code, std::string what, std::string remedy);
  [[nodiscard]] std::vector<Diagnostic>& cautions() { return cautions_; }
  [[nodiscard]] std::vector<Diagnostic>& refusals() { return refusals_; }

 private:
  const Facts& facts_;
  const RebuildOptions& options_;
  std::array<double, col_count> values_;
  ColSet used_;
  bool muted_ = false;
  std::vector<Diagnostic> cautions_;
  std::vector<Diagnostic> refusals_;
};

}  // namespace steelyard::rebuilding
