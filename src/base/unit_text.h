/// The text of a value before its unit is looked up: characters and the number.
#pragma once
#include <string>
#include <string_view>

namespace gaskettle::unit_reading {

/// `text` fit for a message: unprintable bytes as '?', at most 60 characters.
std::string printable(std::string_view text);

/// `text` trimmed, with every kind of blank as one space and the typographic
/// minus as '-'.
std::string tidy_blanks(std::string_view text);

/// A unit in ASCII: raised digits, micro, degree signs and middle dots spelled
/// out. Characters with no place in a unit are kept; the reader refuses them.
std::string unit_to_ascii(std::string_view unit);

std::string lower_case(std::string_view text);

/// A number and what follows it.
struct NumberAndRest {
  double value = 0;
  std::string number;  ///< as written
  std::string rest;    ///< trimmed; empty for a bare number
};

/// Splits tidied text after its leading decimal number. Leading zeros mean
/// nothing ("010" is ten). Errors: UnitError for anything but a finite decimal
/// number (hexadecimal, decimal comma, separators, nan, too large).
NumberAndRest split_number(const std::string& text);

}  // namespace gaskettle::unit_reading
