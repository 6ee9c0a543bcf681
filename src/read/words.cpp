#include "read/words.hpp"

#include <fmt/format.h>

#include "read/cells.hpp"
#include "read/printed.hpp"
#include "read/text.hpp"

namespace steelyard::read {

namespace {

std::string lower(std::string_view text) {
  std::string out(text);
  for (char& c : out) c = c >= 'A' && c <= 'Z' ? static_cast<char>(c - 'A' + 'a') : c;
  return out;
}

bool only_digits(std::string_view text) {
  return text.find_first_not_of("0123456789") == std::string_view::npos;
}

}  // namespace

Words::Words(std::string_view source, const NumberStyle& style, const Place& where)
    : source_(source), style_(style), where_(where), tokens_(tokenize(source, style)) {}

const Token* Words::token(std::size_t ahead) const {
  return at_ + ahead < tokens_.size() ? &tokens_[at_ + ahead] : nullptr;
}

bool Words::is(TokenKind kind, std::size_t ahead) const {
  return token(ahead) != nullptr && token(ahead)->kind == kind;
}

bool Words::is_mark(char mark, std::size_t ahead) const {
  return is(TokenKind::mark, ahead) && token(ahead)->text.front() == mark;
}

std::string Words::word(std::size_t ahead) const {
  return is(TokenKind::word, ahead) ? lower(token(ahead)->text) : std::string();
}

bool Words::relation_here(std::size_t ahead) const {
  constexpr std::array<std::string_view, 3> said = {"of", "was", "is"};
  return is(TokenKind::relation, ahead) || (one_of(word(ahead), said) && is(TokenKind::number, ahead + 1));
}

std::string_view Words::slice(std::size_t from, std::size_t to) const {
  const std::size_t begin = tokens_[from].begin;
  return trim(source_.substr(begin, tokens_[to - 1].end - begin));
}

bool Words::back_to(std::size_t start) {
  at_ = start;
  return false;
}

bool Words::eat_mark(char mark) {
  if (!is_mark(mark)) return false;
  ++at_;
  return true;
}

bool Words::eat_word(std::string_view text) {
  if (word() != text) return false;
  ++at_;
  return true;
}

void Words::eat_relations() {
  while (is(TokenKind::relation) || is_mark(':') || is_mark(',')) ++at_;
}

std::optional<Value> Words::number() {
  if (!is(TokenKind::number)) return std::nullopt;
  const Token& number = *token();
  ++at_;
  const Token* next = token(1);
  const bool joined = is_mark(',') && !token()->after_blank && is(TokenKind::number, 1) && !next->after_blank;
  const std::string_view digits =
      number.text.front() == '-' ? std::string_view(number.text).substr(1) : number.text;
  const bool thousands = joined && digits.size() <= 3 && only_digits(digits) &&
                         only_digits(std::string_view(next->text).substr(0, 3)) &&
                         (next->text.size() == 3 || (next->text.size() > 3 && next->text[3] == '.'));
  if (!thousands) return Value{number.text, &number};
  fail("as-printed-comma", number,
       fmt::format("\"{},{}\" can be read as one number or as two.", number.text, next->text),
       "Write thousands without a comma, and a blank after a comma that separates.");
  at_ += 2;
  return std::nullopt;
}

std::optional<Value> Words::value(std::size_t start) {
  const std::string relation = is(TokenKind::relation) ? token()->text : "=";
  ++at_;
  if (is(TokenKind::number)) {
    std::optional<Value> found = number();
    if (found && relation != "=") found->text.insert(0, relation);
    return found;
  }
  const std::string before = quoted(slice(start, at_));
  const Token& stands = at_end() ? tokens_[at_ - 1] : tokens_[at_];
  fail("as-printed-number", stands,
       at_end()
           ? fmt::format("After {} the words end.", before)
           : fmt::format("After {} stands {}, which is not a number.", before, quoted(slice(at_, at_ + 1))),
       "Copy the number as the paper prints it, or leave this part out.");
  if (!at_end()) ++at_;
  return std::nullopt;
}

std::optional<std::array<Value, 2>> Words::pair() {
  const std::size_t start = at_;
  const auto nothing = [&]() -> std::optional<std::array<Value, 2>> {
    at_ = start;
    return std::nullopt;
  };
  const bool bracket = eat_mark('[') || eat_mark('(');
  if (!is(TokenKind::number)) return nothing();
  const Value low{token()->text, token()};
  ++at_;
  const bool separated = eat_mark(',') || eat_mark(';') || eat_mark('-') || eat_word("to") || eat_word("and");
  if (!separated || !is(TokenKind::number)) return nothing();
  const Value high{token()->text, token()};
  ++at_;
  if (bracket && !eat_mark(']') && !eat_mark(')')) return nothing();
  return std::array<Value, 2>{low, high};
}

const NamedCell* Words::find(std::string_view column) const {
  const auto found =
      std::find_if(cells_.begin(), cells_.end(), [&](const NamedCell& cell) { return cell.name == column; });
  return found == cells_.end() ? nullptr : &*found;
}

Place Words::place_of(const Token& token) const {
  Place place = where_;
  if (place.column > 0) place.column += token.character;
  return place;
}

void Words::take(std::string column, const Value& value) {
  if (const NamedCell* before = find(column)) {
    if (before->cell.text == value.text) return;
    return fail("as-printed-twice", *value.token,
                fmt::format("These words print {} twice, as {} and as {}.", column, quoted(before->cell.text),
                            quoted(value.text)),
                "Keep only the result that this row is about.");
  }
  const Place place = place_of(*value.token);
  NamedCell cell{std::move(column), {value.text, narrow(place.line), narrow(place.column), {}}};
  const Column& known = *find_column(cell.name);
  const bool numeric = known.kind == ColumnKind::number || known.kind == ColumnKind::count;
  if (!numeric || set_number(cell, known, *value.token)) cells_.push_back(std::move(cell));
}

bool Words::set_number(NamedCell& cell, const Column& column, const Token& token) {
  const std::string& text = cell.cell.text;
  const Scan scan = scan_printed(text, style_);
  if (scan.fault != Fault::none) {
    problems_.add(describe(scan.fault, text, place_of(token)));
    return false;
  }
  std::optional<Diagnostic> problem = set_printed(cell.cell, column, scan, place_of(token));
  if (problem) problems_.add(std::move(*problem));
  return !problem;
}

void Words::rename(std::string_view from, std::string_view to) {
  for (NamedCell& cell : cells_) {
    if (cell.name == from) cell.name = to;
  }
}

void Words::fail(const char* code, const Token& token, std::string what, std::string remedy) {
  problems_.error(code, place_of(token), std::move(what), std::move(remedy));
}

void Words::not_used(std::size_t start, std::string_view why, std::string remedy) {
  problems_.caution("as-printed-not-used", place_of(tokens_[start]),
                    fmt::format("{} is not used: {}.", quoted(slice(start, at_)), why), std::move(remedy));
}

void Words::leave(std::size_t index) {
  if (!left_.empty() && left_.back().second == index) {
    left_.back().second = index + 1;
  } else {
    left_.emplace_back(index, index + 1);
  }
}

void Words::report_left() {
  constexpr std::size_t most = 5;
  if (left_.empty()) return;
  std::string list;
  for (std::size_t i = 0; i < std::min(left_.size(), most); ++i) {
    list += (i == 0 ? "" : ", ") + quoted(slice(left_[i].first, left_[i].second));
  }
  if (left_.size() > most) list += ", …";
  problems_.caution("as-printed-left", place_of(tokens_[left_.front().first]),
                    fmt::format("These words were not understood and are not used: {}.", list),
                    "Check that they carry no number that matters.");
}

Outcome<std::vector<NamedCell>> Words::finish() {
  if (cells_.empty() && !problems_.has_errors()) {
    problems_.error("as-printed-nothing", where_,
                    fmt::format("No statistic was found in {}.", quoted(source_)),
                    "Copy the result as the paper prints it, for example: t(28) = 2.20, p = .036.");
  } else {
    report_left();
  }
  const bool failed = problems_.has_errors();
  Outcome<std::vector<NamedCell>> outcome{std::nullopt, problems_.take()};
  if (!failed) outcome.value = std::move(cells_);
  return outcome;
}

}  // namespace steelyard::read
