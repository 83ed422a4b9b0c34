#include "base/units.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "base/unit_meaning.h"
#include "base/unit_text.h"

namespace gaskettle {

using namespace unit_reading;

namespace {

bool takes_no_unit(const UnitKind& kind) {
  return kind.flavour == UnitFlavour::count || (kind.flavour == UnitFlavour::plain && kind.si == "1");
}

/// Numbers without a unit.
Quantity pure_number(const NumberAndRest& read, const UnitRequest& r) {
  if (!read.rest.empty()) {
    const bool percent = read.rest == "%" && r.kind.flavour == UnitFlavour::plain;
    if (percent)
      throw UnitError(fmt::format("{} carries a percent sign where a pure number is due; write {}", r.written,
                                  format_number(read.value / 100.0, 10)));
    throw UnitError(fmt::format("{} carries a unit where {} is due; write for example {}", r.written,
                                with_article(r.kind.name), read.number));
  }
  constexpr double most = 1e9;
  const bool whole = read.value >= 1 && read.value <= most && read.value == std::floor(read.value);
  if (r.kind.flavour == UnitFlavour::count && !whole) refuse(r, "is not a whole number from 1 to 1e9");
  Quantity q;
  q.value = read.value;
  return q;
}

void check_range(Quantity& q, const UnitRequest& r) {
  if (!std::isfinite(q.value)) refuse(r, "is too large");
  // -459.67 degF may come out a rounding below absolute zero.
  constexpr double rounding = 1e-9;
  if (r.kind.flavour == UnitFlavour::temperature && q.value > -rounding) q.value = std::max(q.value, 0.0);
  if (r.kind.flavour == UnitFlavour::temperature && q.value < 0) refuse(r, "is below absolute zero");
  if (r.kind.flavour == UnitFlavour::pressure && !q.gauge && q.value < 0)
    refuse(r, "is below vacuum, which an absolute pressure cannot be");
}

}  // namespace

Quantity parse_quantity(std::string_view text, const UnitKind& kind) {
  constexpr std::size_t longest = 200;
  if (text.size() > longest)
    throw UnitError(
        fmt::format("{} is too long for a value ({} characters); {}", printable(text), text.size(), advice(kind)));
  const std::string tidy = tidy_blanks(text);
  if (tidy.empty()) throw UnitError(fmt::format("{} is missing; {}", with_article(kind.name), advice(kind)));
  NumberAndRest read;
  try {
    read = split_number(tidy);
  } catch (const UnitError& e) {
    throw UnitError(fmt::format("{}; {}", e.what(), advice(kind)));
  }
  const std::string unit = unit_to_ascii(read.rest);
  const UnitRequest r{printable(unit.empty() ? read.number : fmt::format("{} {}", read.number, unit)), read.number,
                      unit, kind};
  if (takes_no_unit(kind)) return pure_number(read, r);
  if (read.rest.empty()) refuse(r, fmt::format("has no unit, and {} needs one", with_article(kind.name)));
  const UnitMeaning m = meaning_of(r);
  Quantity q{m.scale.factor * read.value + m.scale.offset, m.gauge, m.basis, read.rest};
  check_range(q, r);
  return q;
}

double from_si(double si, const UnitKind& kind, const std::string& unit) {
  if (unit.empty() || unit == kind.si) return si;
  const std::string tidy = tidy_blanks(unit);
  const UnitRequest r{printable(unit_to_ascii(tidy)), "1", unit_to_ascii(tidy), kind};
  if (takes_no_unit(kind))
    throw UnitError(fmt::format("{} has no unit, so \"{}\" does not go with it", kind.name, r.written));
  const UnitMeaning m = meaning_of(r);
  return (si - m.scale.offset) / m.scale.factor;
}

std::string format_number(double x, int significant) {
  if (!std::isfinite(x)) return std::isnan(x) ? "nan" : (x > 0 ? "inf" : "-inf");
  const double size = std::abs(x);
  if (size != 0.0 && (size < 1e-4 || size >= 1e7)) return fmt::format("{:.{}g}", x, significant);
  const int before_point = size < 1e-4 ? 1 : static_cast<int>(std::floor(std::log10(size))) + 1;
  const int decimals = std::max(0, significant - before_point);
  std::string s = fmt::format("{:.{}f}", x, decimals);
  if (s.find('.') != std::string::npos) {
    s.erase(s.find_last_not_of('0') + 1);
    if (s.back() == '.') s.pop_back();
  }
  return s == "-0" ? "0" : s;
}

std::string format_quantity(double si, const UnitKind& kind, const std::string& unit, int significant) {
  const std::string number = format_number(from_si(si, kind, unit), significant);
  if (takes_no_unit(kind) || (unit.empty() && kind.si == "1")) return number;
  if (!unit.empty()) return number + " " + unit;
  return number + " " + kind.si + (kind.flavour == UnitFlavour::pressure ? " abs" : "");
}

}  // namespace gaskettle
