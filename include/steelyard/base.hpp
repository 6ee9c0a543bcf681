// Room "base": diagnostics, the one table of columns, the version.
#pragma once

#include <cstddef>
#include <optional>
#include <span>
#include <string>
#include <string_view>
#include <utility>
#include <vector>

#include "steelyard/version.hpp"

namespace steelyard {

/// Where something stands in a file. Lines and columns count from 1; 0 means "not known".
/// Columns count characters (code points), not bytes.
struct Place {
  std::string file;
  std::size_t line = 0;
  std::size_t column = 0;
};

/// `error`: the data can't be used. `caution`: usable, but the reader must know. `note`: for interest.
enum class Severity { note, caution, error };

/// One message to the user: which rule (`code`, a stable kebab-case word), where, what is the
/// matter, and what to do about it. `what` and `remedy` are whole sentences.
struct Diagnostic {
  Severity severity = Severity::error;
  std::string code;
  Place where;
  std::string what;
  std::string remedy;
};

/// `file:line:column: error: what remedy [code]`, as it is printed for people.
[[nodiscard]] std::string to_text(const Diagnostic& diagnostic);

/// A value, if it could be made, and everything there is to say about it.
/// A value may be present beside cautions; it is absent exactly when there is an error.
template <class T>
struct Outcome {
  std::optional<T> value;
  std::vector<Diagnostic> diagnostics;

  [[nodiscard]] bool ok() const { return value.has_value(); }
};

/// What the cells of a column hold.
enum class ColumnKind {
  text,    ///< taken as it stands
  number,  ///< a number as printed, see docs/formats.md
  count,   ///< a number as printed that must be whole and not negative
  choice   ///< one of a few words, listed in `Column::choices`
};

/// One column that the reader knows. The table of them is read by the reader, the routes, the
/// command-line options, the documentation and the schema, so that they cannot drift apart.
struct Column {
  std::string_view name;
  ColumnKind kind;
  std::string_view meaning;  ///< one line, no full stop
  std::string_view unit;     ///< "", or what the number counts
  std::string_view choices;  ///< words separated by '|', for ColumnKind::choice
};

/// All known columns, in the order of the documentation.
[[nodiscard]] std::span<const Column> columns();

/// The column of that name (exact, lower case), or null.
[[nodiscard]] const Column* find_column(std::string_view name);

/// The known column that `name` most resembles when it is probably a slip (case, spaces, one edit,
/// a swapped pair), or null when it looks like a label of the user's own.
[[nodiscard]] const Column* near_column(std::string_view name);

/// Of `words`, the one closest to `word` within two edits (one for words up to four letters), or "".
[[nodiscard]] std::string_view nearest_word(std::string_view word, std::span<const std::string_view> words);

/// The number of single-character insertions, deletions, substitutions and neighbour swaps between
/// two words (optimal string alignment distance).
[[nodiscard]] std::size_t edit_distance(std::string_view a, std::string_view b);

}  // namespace steelyard
