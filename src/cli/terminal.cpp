#include "terminal.hpp"

#include <sys/ioctl.h>
#include <unistd.h>

#include <charconv>
#include <cstdlib>
#include <string_view>

namespace steelyard::cli {

namespace {

std::string_view environment(const char* name) {
  const char* value = std::getenv(name);
  return value == nullptr ? std::string_view() : std::string_view(value);
}

// The names that POSIX looks at for LC_CTYPE, in its order. The locale is not loaded: nothing that is
// printed depends on it, and loading costs more than the rest of the start.
bool locale_is_utf8() {
  for (const char* name : {"LC_ALL", "LC_CTYPE", "LANG"}) {
    const std::string_view value = environment(name);
    if (value.empty()) continue;
    for (const std::string_view form : {"UTF-8", "UTF8", "utf-8", "utf8"}) {
      if (value.find(form) != std::string_view::npos) return true;
    }
    return false;
  }
  return false;
}

bool decide(When when, bool automatic) { return when == When::automatic ? automatic : when == When::always; }

}  // namespace

std::size_t terminal_width() {
  std::size_t columns = 0;
  const std::string_view stated = environment("COLUMNS");
  std::from_chars(stated.data(), stated.data() + stated.size(), columns);
  winsize size{};
  if (columns == 0 && isatty(STDOUT_FILENO) != 0 && ioctl(STDOUT_FILENO, TIOCGWINSZ, &size) == 0) {
    columns = size.ws_col;
  }
  if (columns == 0) return 80;
  return columns < 40 ? 40 : columns > 1000 ? 1000 : columns;
}

TextStyle text_style(const Options& options) {
  const bool terminal = isatty(STDOUT_FILENO) != 0;
  const bool plain = !environment("NO_COLOR").empty() || environment("TERM") == "dumb";
  TextStyle style;
  style.width = options.width.value_or(terminal_width());
  style.colour = decide(options.colour, terminal && !plain);
  style.utf8 = decide(options.utf8, locale_is_utf8());
  return style;
}

}  // namespace steelyard::cli
