#include "messages.hpp"

#include <fmt/format.h>
#include <unistd.h>

#include <algorithm>

namespace steelyard::cli {

namespace {

void put(std::string_view text) {
  while (!text.empty()) {
    const ssize_t written = ::write(STDERR_FILENO, text.data(), text.size());
    if (written <= 0) return;  // nowhere is left to say it
    text.remove_prefix(static_cast<std::size_t>(written));
  }
}

}  // namespace

std::string harmless(std::string_view text) {
  std::string out;
  for (std::size_t i = 0; i < text.size(); ++i) {
    const auto c = static_cast<unsigned char>(text[i]);
    // C0 controls and DEL, and the C1 controls U+0080 to U+009F (C2 80 to C2 9F).
    if (c < 0x20 || c == 0x7f) {
      out += fmt::format("\\x{:02x}", c);
    } else if (c == 0xc2 && i + 1 < text.size() && static_cast<unsigned char>(text[i + 1]) < 0xa0) {
      out += fmt::format("\\x{:02x}", static_cast<unsigned char>(text[++i]));
    } else {
      out += text[i];
    }
  }
  return out;
}

void say_error(std::string_view sentence) { put(fmt::format("steelyard: error: {}\n", harmless(sentence))); }

void say(std::span<const Diagnostic> diagnostics) {
  std::string text;
  const std::size_t listed = std::min(diagnostics.size(), most_listed);
  for (const Diagnostic& diagnostic : diagnostics.first(listed)) text += harmless(to_text(diagnostic)) + '\n';
  if (listed < diagnostics.size()) {
    text += fmt::format("steelyard: {} more problems are not listed; {} in all.\n",
                        diagnostics.size() - listed, diagnostics.size());
  }
  put(text);
}

}  // namespace steelyard::cli
