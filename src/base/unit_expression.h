/// Units written as products of names, looked up in UDUNITS-2.
///
/// Grammar: names with whole exponents ("m2", "m-2", "m^2", "m**2"), joined by
/// a blank, '.', '*', or '/' and "per", with parentheses; "1/s" may begin with
/// the 1. Products and quotients go from left to right, but what is written
/// without a blank binds first: "W/m2K" is W/(m2 K). Numbers, offsets, dates and
/// logarithms are no part of it.
#pragma once
#include <string>

namespace gaskettle::unit_reading {

/// How a unit relates to the SI unit: si = factor x + offset.
struct UnitScale {
  double factor = 1.0;
  double offset = 0.0;  ///< of temperature scales, K
};

enum class UnitFit {
  fits,
  malformed,        ///< not of the grammar
  unknown_name,     ///< a name that is no unit
  other_dimension,  ///< a unit, of another dimension
  other_angle       ///< differs by a power of an angle only: rad/s against 1/s
};

struct UnitReading {
  UnitFit fit = UnitFit::malformed;
  UnitScale scale;
  std::string culprit;  ///< the unknown name
};

/// Reads an ASCII unit against an SI unit. Where "a/b c" as a times c over b has
/// the wrong dimension and a over b c the right one, the latter is taken, as
/// people mean it ("J/kg K"). A temperature scale's offset is returned only for
/// a unit that is one name. Errors: std::runtime_error where the unit data of
/// UDUNITS-2 cannot be found.
UnitReading read_unit(const std::string& unit, const std::string& si);

}  // namespace gaskettle::unit_reading
