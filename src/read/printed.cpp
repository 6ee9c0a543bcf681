#include "read/printed.hpp"

#include <algorithm>
#include <optional>

#include "read/decimal.hpp"
#include "read/text.hpp"

namespace steelyard::read {

namespace {

bool is_ns(std::string_view text) {
  if (lower(text.front()) != 'n' || text.size() > 5) return false;
  std::string letters;
  for (const char c : text) {
    if (c != '.' && c != ' ') letters += lower(c);
  }
  return letters == "ns";
}

bool is_not_finite(std::string_view text) {
  if (!text.empty() && (text.front() == '-' || text.front() == '+')) text.remove_prefix(1);
  std::string word;
  for (const char c : text.substr(0, 9)) word += lower(c);
  return word == "nan" || word == "inf" || word == "infinity";
}

Fault number(std::string_view text, const NumberStyle& style, Decimal& decimal, double& value) {
  const std::optional<Decimal> found = read_decimal(text, style.decimal_comma ? ',' : '.');
  if (!found) {
    // Would the other decimal mark have made it a number? Then say that instead.
    if (read_decimal(text, style.decimal_comma ? '.' : ',')) {
      return style.decimal_comma ? Fault::point : Fault::comma;
    }
    return is_not_finite(text) ? Fault::not_finite : Fault::not_a_number;
  }
  const std::optional<double> number = value_of(*found);
  if (!number) return Fault::out_of_range;
  decimal = *found;
  value = *number;
  return Fault::none;
}

Scan failed(Fault fault) { return {{}, fault, false}; }

Scan plain_number(std::string_view text, const NumberStyle& style, Relation relation) {
  Decimal decimal;
  Scan scan;
  Printed& printed = scan.printed;
  if (const Fault fault = number(text, style, decimal, printed.value); fault != Fault::none)
    return failed(fault);
  printed.relation = relation;
  printed.decimals = decimal.decimals;
  scan.percent = decimal.percent;
  if (relation == Relation::exact) {
    printed.low = printed.high = printed.value;
  } else if (!set_band(decimal, printed)) {
    return failed(Fault::out_of_range);
  }
  return scan;
}

// `<.05`, `>= 2`; the sign of equality makes no difference to a band.
Scan bound(std::string_view text, const NumberStyle& style) {
  const bool below = text.front() == '<';
  text.remove_prefix(1);
  if (!text.empty() && text.front() == '=') text.remove_prefix(1);
  Decimal decimal;
  double end = 0.0;
  if (const Fault fault = number(strip(text), style, decimal, end); fault != Fault::none)
    return failed(fault);
  Scan scan;
  scan.printed.relation = Relation::bounded;
  scan.printed.decimals = decimal.decimals;
  (below ? scan.printed.high : scan.printed.low) = end;
  scan.percent = decimal.percent;
  return scan;
}

// `2.1..2.4`. When the lower end is printed without a zero before its mark, so is the upper end, and the
// second point of the `..` may be its own: `.01..05` is from .01 to .05.
Scan range(std::string_view text, std::size_t dots, const NumberStyle& style) {
  const char mark = style.decimal_comma ? ',' : '.';
  const std::string_view left = strip(text.substr(0, dots));
  std::string right(strip(text.substr(dots + 2)));
  const bool bare = !left.empty() && left.front() == mark;
  if (bare && !right.empty() && is_digit(right.front()) && right.find(mark) == std::string::npos) {
    right.insert(right.begin(), mark);
  }
  Decimal low, high;
  Scan scan;
  Printed& printed = scan.printed;
  if (const Fault fault = number(left, style, low, printed.low); fault != Fault::none) return failed(fault);
  if (const Fault fault = number(right, style, high, printed.high); fault != Fault::none)
    return failed(fault);
  if (!(printed.low < printed.high)) return failed(Fault::turned_round);
  printed.relation = Relation::bounded;
  printed.decimals = std::max(low.decimals, high.decimals);
  scan.percent = low.percent || high.percent;
  if (low.percent != high.percent) return failed(Fault::not_a_number);
  return scan;
}

}  // namespace

Scan scan_printed(std::string_view text, const NumberStyle& style) {
  const Plain ascii = plain(trim(text));
  if (!ascii.fits) return failed(Fault::not_a_number);
  const std::string_view all = ascii.view();
  if (all.empty()) return {};
  if (is_ns(all)) {
    Scan scan;
    scan.printed.relation = Relation::not_significant;
    return scan;
  }
  if (all.front() == '=') {
    if (all.back() != '!') return failed(Fault::not_closed);
    return plain_number(strip(all.substr(1, all.size() - 2)), style, Relation::exact);
  }
  if (all.front() == '<' || all.front() == '>') return bound(all, style);
  const std::size_t dots = all.find("..");
  if (dots != std::string_view::npos) return range(all, dots, style);
  return plain_number(all, style, Relation::rounded);
}

}  // namespace steelyard::read

namespace steelyard {

Outcome<Printed> parse_printed(std::string_view text, const NumberStyle& style, const Place& where) {
  const read::Scan scan = read::scan_printed(text, style);
  if (scan.fault == read::Fault::none) return {scan.printed, {}};
  return {std::nullopt, {read::describe(scan.fault, text, where)}};
}

}  // namespace steelyard
