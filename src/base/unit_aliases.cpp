#include "base/unit_aliases.h"

#include <algorithm>
#include <array>
#include <numbers>

namespace gaskettle::unit_reading {
namespace {

// Water columns: conventional, 1000 kg/m3 and 9.80665 m/s2 (A. Thompson, B. N.
// Taylor, Guide for the Use of the SI, NIST Special Publication 811, 2008,
// table B.8: mmH2O 9.80665 Pa, inH2O 249.0889 Pa).
constexpr double millimetre_of_water = 9.80665;
constexpr double turn = 2.0 * std::numbers::pi;
constexpr std::array<UnitAlias, 32> aliases{{
    {"rev", turn, "rad"},
    {"rpm", turn / 60.0, "rad/s"},
    {"deg", 1, "degree"},
    {"lbm", 1, "lb"},
    {"Wh", 3600, "J"},
    {"kWh", 3.6e6, "J"},
    {"MWh", 3.6e9, "J"},
    {"GWh", 3.6e12, "J"},
    {"Nm", 1, "N m"},
    {"mNm", 1, "mN m"},
    {"kNm", 1, "kN m"},
    {"Ns", 1, "N s"},
    {"kgK", 1, "kg K"},
    {"molK", 1, "mol K"},
    {"kmolK", 1, "kmol K"},
    {"gK", 1, "g K"},
    {"Pas", 1, "Pa s"},
    {"mPas", 1, "mPa s"},
    {"uPas", 1, "uPa s"},
    {"cP", 1, "mPa s"},
    {"lbmR", 1, "lb degR"},
    {"lbR", 1, "lb degR"},
    {"lbF", 1, "lb degF"},
    {"dyn", 1e-5, "N"},
    {"mph", 1, "mile/h"},
    {"cfm", 1, "ft3/min"},
    {"cc", 1, "cm3"},
    {"mins", 1, "min"},
    {"hrs", 1, "h"},
    {"mmH2O", millimetre_of_water, "Pa"},
    {"cmH2O", 10 * millimetre_of_water, "Pa"},
    {"inH2O", 25.4 * millimetre_of_water, "Pa"},
}};

constexpr std::array<std::string_view, 8> reserved{"since", "from", "after", "ref", "lg", "ln", "per", "re"};

}  // namespace

const UnitAlias* find_unit_alias(std::string_view name) {
  for (const UnitAlias& alias : aliases)
    if (alias.name == name) return &alias;
  return nullptr;
}

bool is_reserved_unit_word(std::string_view word) {
  return std::find(reserved.begin(), reserved.end(), word) != reserved.end();
}

}  // namespace gaskettle::unit_reading
