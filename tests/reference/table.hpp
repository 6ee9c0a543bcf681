// Reading the reference tables: comma-separated, '#' comments, one line of column names.
#pragma once

#include <charconv>
#include <cstddef>
#include <fstream>
#include <limits>
#include <sstream>
#include <stdexcept>
#include <string>
#include <string_view>
#include <vector>

namespace reference {

/// The fields between commas.
inline std::vector<std::string> fields(std::string_view line) {
  std::vector<std::string> result(1);
  for (const char c : line) {
    if (c == ',') {
      result.emplace_back();
    } else if (c != '\r') {
      result.back() += c;
    }
  }
  return result;
}

/// The double nearest to a decimal text of any length; "inf" and "-inf" too.
inline double number(std::string_view text) {
  double value = std::numeric_limits<double>::quiet_NaN();
  const auto [end, error] = std::from_chars(text.data(), text.data() + text.size(), value);
  if (error == std::errc::result_out_of_range) {
    return 0.0;  // the tables hold no number too large for a double
  }
  if (error != std::errc{} || end != text.data() + text.size()) {
    throw std::runtime_error("not a number in a reference table: " + std::string(text));
  }
  return value;
}

/// All lines that are neither comments nor, when `named`, the line of column names.
inline std::vector<std::vector<std::string>> rows(const std::string& name, bool named = true) {
  const std::string path = std::string(STEELYARD_TEST_DIR) + "/reference/" + name;
  std::ifstream file(path);
  if (!file) {
    throw std::runtime_error("cannot open " + path);
  }
  std::vector<std::vector<std::string>> result;
  std::string line;
  bool header = named;
  while (std::getline(file, line)) {
    if (line.empty() || line.front() == '#') {
      continue;
    }
    if (header) {
      header = false;
      continue;
    }
    result.push_back(fields(line));
  }
  return result;
}

/// Collects what goes beyond its tolerance, so that one failing test names the worst of thousands.
class Worst {
 public:
  /// `error` and `allowed` are absolute; `where` is only built for a new worst case.
  template <typename Where>
  void see(double error, double allowed, Where&& where) {
    ++seen_;
    const double ratio = error / allowed;
    if (!(ratio <= 1.0)) {
      ++beyond_;
    }
    if (!(ratio <= worst_)) {
      worst_ = ratio;
      text_ = where();
    }
  }
  [[nodiscard]] std::size_t seen() const { return seen_; }
  [[nodiscard]] std::size_t beyond() const { return beyond_; }
  /// Error ÷ allowed error of the worst case.
  [[nodiscard]] double worst() const { return worst_; }
  [[nodiscard]] std::string report() const {
    std::ostringstream out;
    out << beyond_ << " of " << seen_ << " beyond the tolerance; worst " << worst_ << " times it: " << text_;
    return out.str();
  }

 private:
  std::size_t seen_ = 0, beyond_ = 0;
  double worst_ = -1.0;
  std::string text_;
};

}  // namespace reference
