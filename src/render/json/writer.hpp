// Private to the room: JSON, written as it comes, a buffer at a time.
#pragma once

#include <cstddef>
#include <string>
#include <string_view>
#include <vector>

#include "steelyard/json.hpp"

namespace steelyard::json {

/// Writes one JSON value to a sink. The outer levels stand one member a line, what lies deeper
/// stands on one line, so that a study is a line of the file.
class Writer {
 public:
  /// `spread` outer levels stand one member a line.
  explicit Writer(const Sink& sink, std::size_t spread = 2) : sink_(sink), spread_(spread) {}

  void begin_object() { begin('{'); }
  void end_object() { end('}'); }
  void begin_array() { begin('['); }
  void end_array() { end(']'); }
  void key(std::string_view name);

  void text(std::string_view value);  ///< invalid UTF-8 becomes U+FFFD
  void number(double value);          ///< null when not finite
  void integer(unsigned long long value);
  void boolean(bool value);
  void null();

  /// Hands over what is buffered, with a newline.
  void finish();

 private:
  void begin(char bracket);
  void end(char bracket);
  void before_value();
  void new_line();
  [[nodiscard]] bool spread_out(std::size_t depth, char bracket) const;
  void flush_when_full();

  const Sink& sink_;
  std::size_t spread_;
  std::string buffer_;
  struct Level {
    char bracket;
    bool spread_out;
    bool empty;
  };
  std::vector<Level> levels_;
  bool after_key_ = false;
};

/// A string with its quotes.
[[nodiscard]] std::string quoted(std::string_view text);

}  // namespace steelyard::json
