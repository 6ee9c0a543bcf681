// The grammar of one printed number (docs/formats.md).
#pragma once

#include <string>
#include <string_view>

#include "steelyard/base.hpp"
#include "steelyard/read.hpp"
#include "steelyard/study.hpp"

namespace steelyard::read {

/// Why a text is not a printed number.
enum class Fault {
  none,
  not_a_number,  ///< anything else
  not_finite,    ///< NaN, inf
  out_of_range,  ///< 1e400, 1e-400
  comma,         ///< a comma where the decimal mark is the point
  point,         ///< a point where the decimal mark is the comma
  turned_round,  ///< .05...01
  not_closed     ///< =2.1 without its !
};

struct Scan {
  Printed printed;
  Fault fault = Fault::none;
  bool percent = false;
};

/// Reads a printed number; builds no messages. Blank text is no number and no fault.
[[nodiscard]] Scan scan_printed(std::string_view text, const NumberStyle& style);

/// What to tell about a fault.
[[nodiscard]] Diagnostic describe(Fault fault, std::string_view text, const Place& where);

/// What commas and points in a text say about the decimal mark of its file.
enum class Mark { silent, comma, point, either };
/// `either`: like `1,234`, one comma before three digits.
[[nodiscard]] Mark decimal_mark(std::string_view text);

/// Two readings of `1,234` and nothing in the file to tell which.
[[nodiscard]] Diagnostic describe_ambiguous(std::string_view text, const Place& where);

}  // namespace steelyard::read
