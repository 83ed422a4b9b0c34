#include "base/unit_text.h"

#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <cctype>
#include <charconv>
#include <cmath>
#include <utility>

#include "base/units.h"

namespace gaskettle::unit_reading {
namespace {

struct Replacement {
  std::string_view from;
  std::string_view to;
};

// Blanks: no-break, thin, narrow no-break; and the minus sign of typesetting.
constexpr std::array<Replacement, 4> blanks{{{"\u00a0", " "}, {"\u2009", " "}, {"\u202f", " "}, {"\u2212", "-"}}};

constexpr std::array<Replacement, 21> unit_characters{{
    {"\u00b2", "2"},    {"\u00b3", "3"},    {"\u00b9", "1"}, {"\u2070", "0"}, {"\u2074", "4"},
    {"\u2075", "5"},    {"\u2076", "6"},    {"\u2077", "7"}, {"\u2078", "8"}, {"\u2079", "9"},
    {"\u207b", "-"},    {"\u00b5", "u"},    {"\u03bc", "u"},  // micro sign, Greek mu
    {"\u00b0", "deg"},  {"\u00ba", "deg"},                    // degree sign, and the ordinal taken for it
    {"\u2103", "degC"}, {"\u2109", "degF"},                   // one-character degree Celsius, Fahrenheit
    {"\u00b7", "."},    {"\u22c5", "."},    {"\u00d7", "."}, {"\u2219", "."},
}};

template <std::size_t N>
std::string replace_all(std::string_view text, const std::array<Replacement, N>& table) {
  std::string out;
  while (!text.empty()) {
    const Replacement* hit = nullptr;
    for (const Replacement& r : table)
      if (text.substr(0, r.from.size()) == r.from) hit = &r;
    out += hit != nullptr ? hit->to : text.substr(0, 1);
    text.remove_prefix(hit != nullptr ? hit->from.size() : 1);
  }
  return out;
}

bool is_digit(char c) { return c >= '0' && c <= '9'; }

std::size_t skip_digits(const std::string& s, std::size_t i) {
  while (i < s.size() && is_digit(s[i])) ++i;
  return i;
}

/// The end of the decimal number at the start of s; 0 where there is none.
std::size_t number_end(const std::string& s) {
  std::size_t i = !s.empty() && (s[0] == '+' || s[0] == '-') ? 1 : 0;
  std::size_t end = skip_digits(s, i);
  std::size_t digits = end - i;
  if (end < s.size() && s[end] == '.') {
    i = end + 1;
    end = skip_digits(s, i);
    digits += end - i;
  }
  if (digits == 0) return 0;
  if (end < s.size() && (s[end] == 'e' || s[end] == 'E')) {
    i = end + 1;
    if (i < s.size() && (s[i] == '+' || s[i] == '-')) ++i;
    // An e without digits is the start of a unit's name.
    if (skip_digits(s, i) > i) end = skip_digits(s, i);
  }
  return end;
}

[[noreturn]] void refuse_start(const std::string& text) {
  std::size_t i = text.find_first_not_of("+-.");
  const std::string word = i == std::string::npos ? std::string() : lower_case(text.substr(i, 3));
  if (word == "inf" || word == "nan") throw UnitError(fmt::format("{} is not a finite number", printable(text)));
  throw UnitError(fmt::format("{} does not begin with a number", printable(text)));
}

/// What may not follow a number directly: the signs of another number format.
void check_after_number(const std::string& text, std::size_t end) {
  if (end >= text.size()) return;
  const char next = text[end];
  const bool digit_after = end + 1 < text.size() && is_digit(text[end + 1]);
  if ((next == ',' || next == '\'' || next == '_') && digit_after)
    throw UnitError(
        fmt::format("{}: a number has a decimal point and no separators, such as 1.5 or 1500", printable(text)));
  if (next == 'x' || next == 'X')
    throw UnitError(fmt::format("{} looks hexadecimal; a number is written in decimal, such as 16", printable(text)));
  if (next == '.') throw UnitError(fmt::format("{} has two decimal points in its number", printable(text)));
  // "0.5 1/s" is one number, "1 1/2 in" is not.
  const std::size_t slash = text.find_first_not_of(' ', std::min(end + 2, text.size()));
  const bool one_over = text.compare(end, 2, " 1") == 0 && slash != std::string::npos && text[slash] == '/' &&
                        !(slash + 1 < text.size() && is_digit(text[slash + 1]));
  if (next == ' ' && digit_after && !one_over)
    throw UnitError(fmt::format("{} has two numbers; write one number without blanks in it, such as 1500, and one unit",
                                printable(text)));
}

}  // namespace

std::string printable(std::string_view text) {
  constexpr std::size_t most = 60;
  std::string out;
  for (const char c : text) {
    if (out.size() == most) return out + "...";
    out += c >= ' ' && c <= '~' ? c : '?';
  }
  return out;
}

std::string tidy_blanks(std::string_view text) {
  std::string out;
  for (const char c : replace_all(text, blanks)) {
    const bool blank = c == ' ' || c == '\t' || c == '\n' || c == '\r';
    if (!blank)
      out += c;
    else if (!out.empty() && out.back() != ' ')
      out += ' ';
  }
  if (!out.empty() && out.back() == ' ') out.pop_back();
  return out;
}

std::string unit_to_ascii(std::string_view unit) {
  std::string s = replace_all(unit, unit_characters);
  // "deg C", with a blank, is as common as "degC"; a degree times a coulomb is not.
  for (const char scale : {'C', 'F', 'K'}) {
    const std::string apart = std::string("deg ") + scale;
    const std::size_t at = s.find(apart);
    if (at == std::string::npos) continue;
    const std::size_t after = at + apart.size();
    if (after >= s.size() || !std::isalpha(static_cast<unsigned char>(s[after]))) s.erase(at + 3, 1);
  }
  return s;
}

std::string lower_case(std::string_view text) {
  std::string out(text);
  for (char& c : out)
    if (c >= 'A' && c <= 'Z') c = static_cast<char>(c - 'A' + 'a');
  return out;
}

NumberAndRest split_number(const std::string& text) {
  const std::size_t end = number_end(text);
  if (end == 0) refuse_start(text);
  check_after_number(text, end);
  NumberAndRest r;
  r.number = text.substr(0, end);
  const char* first = r.number.data() + (r.number[0] == '+' ? 1 : 0);  // from_chars takes no plus
  const auto [stop, error] = std::from_chars(first, r.number.data() + r.number.size(), r.value);
  if (error != std::errc() || !std::isfinite(r.value))
    throw UnitError(fmt::format("{} is outside the range of numbers (about 1e-300 to 1e300)", printable(r.number)));
  (void)stop;
  r.rest = tidy_blanks(std::string_view(text).substr(end));
  return r;
}

}  // namespace gaskettle::unit_reading
