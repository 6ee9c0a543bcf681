#include "read/tokens.hpp"

#include <array>
#include <utility>

#include "read/text.hpp"

namespace steelyard::read {

namespace {

// A levelled character and where it came from.
struct Glyph {
  char c = 0;
  std::size_t begin = 0;
  std::size_t end = 0;
  std::size_t character = 0;
};

constexpr char thousands_blank = '\x01';  // a no-break or thin blank may stand inside a number

bool is_digit(char c) { return c >= '0' && c <= '9'; }
bool is_letter(char c) { return (c >= 'a' && c <= 'z') || (c >= 'A' && c <= 'Z') || c == '?'; }
bool is_blank(char c) { return c == ' ' || c == thousands_blank; }

constexpr std::array<std::pair<char32_t, const char*>, 33> spelled = {{
    {U'χ', "chi"},   {U'Χ', "chi"},   {U'η', "eta"},   {U'ω', "omega"},  {U'β', "beta"},  {U'Δ', "Delta"},
    {U'δ', "delta"}, {U'α', "alpha"}, {U'μ', "mu"},    {U'µ', "mu"},     {U'ρ', "rho"},   {U'τ', "tau"},
    {U'φ', "phi"},   {U'Φ', "phi"},   {U'κ', "kappa"}, {U'λ', "lambda"}, {U'σ', "sigma"}, {U'∆', "Delta"},
    {U'≤', "<="},    {U'⩽', "<="},    {U'≥', ">="},    {U'⩾', ">="},     {U'≠', "!"},     {U'—', ";"},
    {U'…', ".."},    {U'’', "'"},     {U'‘', "'"},     {U'′', "'"},      {U'ₚ', "p"},     {U'ᵖ', "p"},
    {U'×', "x"},     {U'±', "\x02"},  {U'′', "'"},
}};

// Letters of the mathematical alphabets (italic and bold statistics copied from a PDF), full-width
// forms, super- and subscript digits; 0 when the character is none of these.
char level(char32_t c) {
  constexpr std::u32string_view superscripts = U"⁰¹²³⁴⁵⁶⁷⁸⁹";
  if (c >= 0x1D400 && c <= 0x1D6A3) {
    const char32_t letter = (c - 0x1D400) % 52;
    return static_cast<char>(letter < 26 ? 'A' + letter : 'a' + (letter - 26));
  }
  if (c >= 0x1D7CE && c <= 0x1D7FF) return static_cast<char>('0' + (c - 0x1D7CE) % 10);
  if (c >= 0xFF01 && c <= 0xFF5E) return static_cast<char>(c - 0xFF01 + 0x21);
  if (c >= 0x2080 && c <= 0x2089) return static_cast<char>('0' + (c - 0x2080));
  const std::size_t power = superscripts.find(c);
  if (power != std::u32string_view::npos) return static_cast<char>('0' + static_cast<char>(power));
  const bool minus = (c >= 0x2010 && c <= 0x2013) || c == 0x2212 || c == 0x207B || c == 0x208B || c == 0xFE63;
  return minus ? '-' : '\0';
}

// `*`, `_`, `$`, `{`, `}`, `\`, `^`, and the tags and commands of italics, bold, sub- and superscript carry
// no meaning.
std::size_t markup_length(std::string_view rest) {
  constexpr std::array<std::string_view, 7> commands = {"\\textit", "\\textrm", "\\text", "\\emph",
                                                        "\\mathit", "\\mathrm", "\\it "};
  constexpr std::array<std::string_view, 12> tags = {"<i>",   "</i>",   "<b>",      "</b>",
                                                     "<em>",  "</em>",  "<sub>",    "</sub>",
                                                     "<sup>", "</sup>", "<strong>", "</strong>"};
  for (const std::string_view tag : tags) {
    if (rest.substr(0, tag.size()) == tag) return tag.size();
  }
  for (const std::string_view command : commands) {
    if (rest.substr(0, command.size()) == command) return command.size();
  }
  return std::string_view("*_${}\\^").find(rest.front()) == std::string_view::npos ? 0 : 1;
}

// `&lt;` and its like, from web pages; the length is 0 for anything else.
std::pair<char, std::size_t> entity_at(std::string_view rest) {
  if (rest.front() != '&') return {'\0', 0};
  if (rest.substr(0, 4) == "&lt;") return {'<', 4};
  if (rest.substr(0, 4) == "&gt;") return {'>', 4};
  if (rest.substr(0, 5) == "&amp;") return {'&', 5};
  if (rest.substr(0, 6) == "&nbsp;") return {' ', 6};
  return {'\0', 0};
}

void append(std::vector<Glyph>& glyphs, Glyph glyph, std::string_view text) {
  for (const char c : text) {
    glyph.c = c;
    glyphs.push_back(glyph);
  }
}

std::vector<Glyph> level_all(std::string_view source) {
  std::vector<Glyph> glyphs;
  std::size_t at = 0;
  std::size_t character = 0;
  while (at < source.size()) {
    const std::string_view rest = source.substr(at);
    if (const std::size_t markup = markup_length(rest)) {
      at += markup;
      character += markup;
      continue;
    }
    const Character c = first_character(rest);
    if (const auto [entity, length] = entity_at(rest); length > 0) {
      append(glyphs, {entity, at, at + length, character}, {&entity, 1});
      at += length;
      character += length;
      continue;
    }
    Glyph glyph{'?', at, at + c.length, character};
    const char* name = nullptr;
    for (const auto& [code, text] : spelled) {
      if (code == c.code) name = text;
    }
    if (name != nullptr) {
      append(glyphs, glyph, name);
    } else if (blank_at_front(rest) > 0) {
      append(glyphs, glyph, c.code < 0x80 ? " " : "\x01");
    } else if (const char plain = level(c.code)) {
      append(glyphs, glyph, {&plain, 1});
    } else if (c.code < 0x80) {
      append(glyphs, glyph, rest.substr(0, 1));
    } else if (c.code < 0x0300 || c.code > 0x036F) {  // combining accents are dropped
      append(glyphs, glyph, "?");                     // some letter
    }
    at += c.length;
    ++character;
  }
  return glyphs;
}

class Tokenizer {
 public:
  Tokenizer(std::string_view source, const NumberStyle& style)
      : glyphs_(level_all(source)), mark_(style.decimal_comma ? ',' : '.') {}

  std::vector<Token> all() {
    while (true) {
      const bool blank = skip_blanks();
      if (at_ >= glyphs_.size()) return std::move(tokens_);
      const std::size_t start = at_;
      Token token;
      token.after_blank = blank;
      read(token);
      token.begin = glyphs_[start].begin;
      token.end = glyphs_[at_ - 1].end;
      token.character = glyphs_[start].character;
      tokens_.push_back(std::move(token));
    }
  }

 private:
  [[nodiscard]] char peek(std::size_t ahead = 0) const {
    return at_ + ahead < glyphs_.size() ? glyphs_[at_ + ahead].c : '\0';
  }

  bool skip_blanks() {
    const std::size_t start = at_;
    while (is_blank(peek())) ++at_;
    return at_ > start;
  }

  // Is there a number (without its sign) `ahead` characters from here?
  [[nodiscard]] bool number_at(std::size_t ahead) const {
    return is_digit(peek(ahead)) ||
           ((peek(ahead) == mark_ || peek(ahead) == '.') && is_digit(peek(ahead + 1)));
  }

  // A minus is a sign unless it stands between two numbers, as in `3-7`.
  [[nodiscard]] bool sign_here() const {
    if (peek() != '-' && peek() != '+') return false;
    std::size_t ahead = 1;
    while (is_blank(peek(ahead))) ++ahead;
    const bool after_value = !tokens_.empty() && (tokens_.back().kind == TokenKind::number ||
                                                  tokens_.back().text == ")" || tokens_.back().text == "]");
    return number_at(ahead) && !after_value;
  }

  void read(Token& token) {
    if (number_at(0) || sign_here()) {
      number(token);
    } else if (is_letter(peek())) {
      word(token);
    } else if (peek() == '<' || peek() == '>' || peek() == '=') {
      token.kind = TokenKind::relation;
      token.text = glyphs_[at_++].c;
      if (token.text != "=" && peek() == '=') token.text += glyphs_[at_++].c;
    } else {
      token.text = glyphs_[at_++].c;
    }
  }

  void take(Token& token) { token.text += glyphs_[at_++].c; }
  void take_digits(Token& token) {
    while (is_digit(peek())) take(token);
  }

  void number(Token& token) {
    token.kind = TokenKind::number;
    if (peek() == '-') token.text = "-";
    if (peek() == '-' || peek() == '+') ++at_;
    skip_blanks();
    take_digits(token);
    while (peek() == thousands_blank && is_digit(peek(1)) && is_digit(peek(2)) && is_digit(peek(3)) &&
           !is_digit(peek(4))) {
      ++at_;
      take_digits(token);
    }
    if ((peek() == mark_ || peek() == '.') && is_digit(peek(1))) {
      take(token);
      take_digits(token);
    }
    exponent(token);
    if (peek() == '%') take(token);
    range(token);
    if (is_letter(peek())) {
      token.kind = TokenKind::broken;
      while (is_letter(peek()) || is_digit(peek())) take(token);
    }
  }

  // `e-5`, or ` x 10-5` as it is left of a power of ten.
  void exponent(Token& token) {
    const auto power = [&](std::size_t ahead) {
      const std::size_t sign = peek(ahead) == '-' || peek(ahead) == '+' ? 1 : 0;
      return is_digit(peek(ahead + sign));
    };
    std::size_t ahead = 0;
    if ((peek() == 'e' || peek() == 'E') && power(1)) {
      ahead = 1;
    } else {
      while (is_blank(peek(ahead))) ++ahead;
      if (peek(ahead) != 'x') return;
      ++ahead;
      while (is_blank(peek(ahead))) ++ahead;
      if (peek(ahead) != '1' || peek(ahead + 1) != '0' || !power(ahead + 2)) return;
      ahead += 2;
    }
    at_ += ahead;
    token.text += 'e';
    if (peek() == '-' || peek() == '+') take(token);
    take_digits(token);
  }

  // `.01..05`, as in a cell.
  void range(Token& token) {
    if (peek() != '.' || peek(1) != '.') return;
    while (peek() == '.' || peek() == mark_ || peek() == '-' || is_digit(peek())) take(token);
  }

  void word(Token& token) {
    token.kind = TokenKind::word;
    if (dotted_ns()) {
      token.text = "ns";
      return;
    }
    const auto joins = [&] {  // `one-tailed`, `Cohen's`
      return (peek() == '-' || peek() == '\'') && is_letter(peek(1)) && !is_digit(token.text.back());
    };
    while (is_letter(peek()) || is_digit(peek()) || joins()) take(token);
    if (peek() == '\'' && token.text.back() == 's') ++at_;  // `Hedges'`
  }

  bool dotted_ns() {
    const auto is = [&](std::size_t ahead, char small) { return (peek(ahead) | 0x20) == small; };
    if (!is(0, 'n') || peek(1) != '.') return false;
    const std::size_t s = is_blank(peek(2)) ? 3 : 2;
    if (!is(s, 's') || is_letter(peek(s + 1))) return false;
    at_ += s + 1;
    if (peek() == '.') ++at_;
    return true;
  }

  std::vector<Glyph> glyphs_;
  char mark_;
  std::size_t at_ = 0;
  std::vector<Token> tokens_;
};

}  // namespace

std::vector<Token> tokenize(std::string_view source, const NumberStyle& style) {
  return Tokenizer(source, style).all();
}

}  // namespace steelyard::read
