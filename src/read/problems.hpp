// All problems of a file, without drowning in them.
#pragma once

#include <cstddef>
#include <string>
#include <vector>

#include "steelyard/base.hpp"

namespace steelyard::read {

/// Collects diagnostics: as many as anyone would read are kept, the rest are counted.
class Problems {
 public:
  static constexpr std::size_t most = 100;

  void add(Diagnostic diagnostic);
  void error(std::string code, Place where, std::string what, std::string remedy) {
    add({Severity::error, std::move(code), std::move(where), std::move(what), std::move(remedy)});
  }
  void caution(std::string code, Place where, std::string what, std::string remedy) {
    add({Severity::caution, std::move(code), std::move(where), std::move(what), std::move(remedy)});
  }
  /// One more error than are kept: count it without the cost of writing it.
  [[nodiscard]] bool enough_errors() const { return errors_ >= most; }
  void count_error() { ++errors_; }

  [[nodiscard]] bool has_errors() const { return errors_ > 0; }
  /// At most `most` diagnostics in the order of their places; errors are kept before cautions, and a
  /// last one tells how many more there were.
  [[nodiscard]] std::vector<Diagnostic> take();

 private:
  std::vector<Diagnostic> kept_errors_;
  std::vector<Diagnostic> kept_cautions_;
  std::size_t errors_ = 0;
  std::size_t cautions_ = 0;
};

}  // namespace steelyard::read
