/// Values with units, as people write them, into SI and back.
///
/// Unit names are looked up in UDUNITS-2; how names are joined ("W/m2K",
/// "14 bar gauge", "30 l/min normal") is read here, because people write more
/// than UDUNITS takes and because a few of its readings would be traps (rpm as
/// 1/s, 4 degC of difference as 277.15 K, 5 s taken for 0.2 Hz). Conversion
/// happens on the way in and on the way out; inside the program all is SI.
/// Every function here may be called from several threads.
#pragma once
#include <stdexcept>
#include <string>
#include <string_view>
#include <vector>

namespace gaskettle {

/// What beyond the dimension decides whether a unit is right.
enum class UnitFlavour {
  plain,                   ///< the dimension says all; with si "1": a pure number
  temperature,             ///< a point on the scale: 20 degC is 293.15 K, below 0 K is refused
  temperature_difference,  ///< an interval: 4 degC is 4 K
  pressure,                ///< says abs or gauge
  pressure_difference,     ///< says neither abs nor gauge
  rotation,                ///< rpm, rev/min, rev/s or rad/s; Hz and 1/s are refused
  frequency,               ///< cycles a second: Hz, 1/s
  gas_flow,                ///< mass, molar, or a volume flow that says at which state
  percentage,              ///< "7 %" is 0.07; a bare number is refused
  count                    ///< a positive whole number, no unit
};

/// A kind of quantity: `name` as used in messages ("length"), `si` its unit as
/// written to records, in UDUNITS spelling ("W m-2 K-1").
struct UnitKind {
  std::string name;
  std::string si;
  UnitFlavour flavour = UnitFlavour::plain;
};

namespace unit_kinds {
inline const UnitKind number{"pure number", "1"};
inline const UnitKind percentage{"percentage", "1", UnitFlavour::percentage};
inline const UnitKind count{"count", "1", UnitFlavour::count};
inline const UnitKind length{"length", "m"};
inline const UnitKind area{"area", "m2"};
inline const UnitKind volume{"volume", "m3"};
inline const UnitKind mass{"mass", "kg"};
inline const UnitKind time{"time", "s"};
inline const UnitKind temperature{"temperature", "K", UnitFlavour::temperature};
inline const UnitKind temperature_difference{"temperature difference", "K", UnitFlavour::temperature_difference};
inline const UnitKind pressure{"pressure", "Pa", UnitFlavour::pressure};
inline const UnitKind pressure_difference{"pressure difference", "Pa", UnitFlavour::pressure_difference};
inline const UnitKind force{"force", "N"};
inline const UnitKind torque{"torque", "N m"};
inline const UnitKind power{"power", "W"};
inline const UnitKind energy{"energy", "J"};
inline const UnitKind angle{"angle", "rad"};
inline const UnitKind frequency{"frequency", "Hz", UnitFlavour::frequency};
inline const UnitKind rotation{"speed of rotation", "rad s-1", UnitFlavour::rotation};
inline const UnitKind velocity{"velocity", "m s-1"};
inline const UnitKind acceleration{"acceleration", "m s-2"};
inline const UnitKind heat_capacity{"heat capacity", "J K-1"};
inline const UnitKind entropy{"entropy", "J K-1"};
inline const UnitKind specific_heat{"specific heat", "J kg-1 K-1"};
inline const UnitKind molar_specific_heat{"molar specific heat", "J mol-1 K-1"};
inline const UnitKind specific_entropy{"specific entropy", "J kg-1 K-1"};
inline const UnitKind specific_energy{"specific energy", "J kg-1"};
inline const UnitKind conductivity{"thermal conductivity", "W m-1 K-1"};
inline const UnitKind film_coefficient{"film coefficient", "W m-2 K-1"};
inline const UnitKind conductance{"thermal conductance", "W K-1"};
inline const UnitKind contact_resistance{"contact resistance", "m2 K W-1"};
inline const UnitKind heat_flux{"heat flux", "W m-2"};
inline const UnitKind density{"density", "kg m-3"};
inline const UnitKind molar_density{"molar density", "mol m-3"};
inline const UnitKind molar_mass{"molar mass", "kg mol-1"};
inline const UnitKind amount{"amount of substance", "mol"};
inline const UnitKind stiffness{"stiffness", "N m-1"};
inline const UnitKind viscous_coefficient{"viscous coefficient", "N s m-1"};
inline const UnitKind sonic_conductance{"sonic conductance", "m3 s-1 Pa-1"};
inline const UnitKind viscosity{"viscosity", "Pa s"};
inline const UnitKind gas_flow{"gas flow", "kg s-1", UnitFlavour::gas_flow};
inline const UnitKind liquid_flow{"volume flow", "m3 s-1"};
inline const UnitKind joule_thomson{"Joule-Thomson coefficient", "K Pa-1"};
}  // namespace unit_kinds

/// The rate of change of a kind, for ramps and limits: of a temperature "K s-1".
UnitKind per_time(const UnitKind& kind);
/// One kind for each unit of another, for gains: power per temperature "W K-1".
/// Temperatures and pressures count as differences in it, gas flows by mass.
UnitKind ratio(const UnitKind& numerator, const UnitKind& denominator);

/// What a gas flow counts: mass (kg/s), amount (mol/s), or volume at the state
/// upstream of where it flows (m3/s).
enum class FlowBasis { mass, molar, actual_volume };

/// A value as read.
struct Quantity {
  double value = 0;                   ///< in the SI unit of the kind (of the basis, for a gas flow)
  bool gauge = false;                 ///< a gauge pressure: value is above the surroundings
  FlowBasis basis = FlowBasis::mass;  ///< of a gas flow only
  std::string unit;                   ///< as written, without the number
};

/// A value or unit that cannot be taken. The message says what is wrong with
/// the text and what would be right, with an example of the kind.
class UnitError : public std::runtime_error {
public:
  using std::runtime_error::runtime_error;
};

/// Reads one number with its unit, such as "250 mm". The result is finite.
/// Errors: UnitError. Any bytes may be given.
Quantity parse_quantity(std::string_view text, const UnitKind& kind);

/// An SI value in `unit`, which is spelled as parse_quantity takes it; empty or
/// the kind's own `si` leaves the value as it is. For a gauge unit the caller
/// subtracts the pressure of the surroundings first; for a gas flow the value is
/// in the SI unit of the basis that `unit` has. Errors: UnitError.
double from_si(double si, const UnitKind& kind, const std::string& unit);

/// "181.3 degC": the value in `unit` (SI where empty) with its unit.
std::string format_quantity(double si, const UnitKind& kind, const std::string& unit, int significant = 4);

/// A number with at least so many significant digits, trailing zeros dropped;
/// digits before the point are never rounded away below 1e7.
std::string format_number(double x, int significant = 4);

/// Spellings of units to show for a kind, the most usual first; never empty
/// except for pure numbers and counts.
std::vector<std::string> example_units(const UnitKind& kind);

/// Values to show for a kind, the most usual first ("250 mm"); never empty.
std::vector<std::string> example_values(const UnitKind& kind);

}  // namespace gaskettle
