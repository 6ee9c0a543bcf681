// A paper's own words into tokens: typography and markup are levelled, places kept.
#pragma once

#include <cstddef>
#include <string>
#include <string_view>
#include <vector>

#include "steelyard/read.hpp"

namespace steelyard::read {

enum class TokenKind {
  word,      ///< letters and digits that begin with a letter; Greek letters by name: `chi2`
  number,    ///< digits as the cell grammar takes them: `-2.20`, `1.2e-5`, `95%`
  relation,  ///< = < > <= >=
  mark,      ///< any other single character
  broken     ///< begins like a number and isn't one: `2.2O`
};

struct Token {
  TokenKind kind = TokenKind::mark;
  std::string text;       ///< levelled, ASCII
  std::size_t begin = 0;  ///< bytes in the source
  std::size_t end = 0;
  std::size_t character = 0;  ///< characters before it in the source
  bool after_blank = false;   ///< a blank stands before it
};

[[nodiscard]] std::vector<Token> tokenize(std::string_view source, const NumberStyle& style);

}  // namespace steelyard::read
