// JSON text into tokens with their places; by RFC 8259, numbers kept as they are written.
#pragma once

#include <cstddef>
#include <string>
#include <string_view>

#include "read/problems.hpp"
#include "read/text.hpp"

namespace steelyard::read {

/// Deeper nesting than this is refused; a table needs four levels.
inline constexpr std::size_t deepest_json = 64;

/// Walks through a JSON text. Every step returns false after a syntax error, which it has reported;
/// then nothing more can be read.
class JsonReader {
 public:
  JsonReader(std::string_view text, const std::string& file, Problems& problems)
      : text_(text), locator_(text), file_(file), problems_(problems) {}

  /// The first character of what comes next, blanks skipped; '\0' at the end.
  char peek();
  /// Where the next token stands. Cheap when called in the order of the text.
  Place place();
  /// Eats `c`, or complains that `expected` should stand here.
  bool eat(char c, const char* expected);
  bool string(std::string& out);
  /// A number or one of true, false, null, as it is written.
  bool scalar(std::string_view& out);
  bool skip_value(std::size_t depth);
  /// Nothing but blanks may follow.
  bool end();

  /// Calls `item()` for each element of an array; `member(key, place of key)` for each member of an
  /// object. They return false to stop.
  template <class Item>
  bool array(Item item);
  template <class Member>
  bool object(Member member);

  bool fail(const char* expected);

 private:
  bool escape(std::string& out);
  bool hex4(unsigned& out);
  bool number();
  bool complain(const char* code, std::string what, std::string remedy);

  std::string_view text_;
  std::size_t at_ = 0;
  Locator locator_;
  const std::string& file_;
  Problems& problems_;
};

template <class Item>
bool JsonReader::array(Item item) {
  if (!eat('[', "\"[\"")) return false;
  if (peek() == ']') return eat(']', "\"]\"");
  while (true) {
    if (!item()) return false;
    if (peek() != ',') return eat(']', "\",\" or \"]\"");
    eat(',', "\",\"");
  }
}

template <class Member>
bool JsonReader::object(Member member) {
  if (!eat('{', "\"{\"")) return false;
  if (peek() == '}') return eat('}', "\"}\"");
  while (true) {
    if (peek() != '"') return fail("a name in quotes");
    const Place where = place();
    std::string key;
    if (!string(key) || !eat(':', "\":\"") || !member(key, where)) return false;
    if (peek() != ',') return eat('}', "\",\" or \"}\"");
    eat(',', "\",\"");
  }
}

}  // namespace steelyard::read
