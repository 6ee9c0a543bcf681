#include <fmt/format.h>

#include <string>

#include "steelyard/base.hpp"

namespace steelyard {

namespace {

std::string_view word(Severity severity) {
  switch (severity) {
    case Severity::note:
      return "note";
    case Severity::caution:
      return "caution";
    case Severity::error:
      break;
  }
  return "error";
}

}  // namespace

std::string to_text(const Diagnostic& diagnostic) {
  std::string line;
  if (!diagnostic.where.file.empty()) line += diagnostic.where.file + ":";
  if (diagnostic.where.line > 0) {
    line += fmt::format("{}:", diagnostic.where.line);
    if (diagnostic.where.column > 0) line += fmt::format("{}:", diagnostic.where.column);
  }
  if (!line.empty()) line += ' ';
  line += fmt::format("{}: {}", word(diagnostic.severity), diagnostic.what);
  if (!diagnostic.remedy.empty()) line += " " + diagnostic.remedy;
  if (!diagnostic.code.empty()) line += fmt::format(" [{}]", diagnostic.code);
  return line;
}

}  // namespace steelyard
