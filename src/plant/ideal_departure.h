/// How far a real gas is from the ideal one, as a first estimate.
#pragma once
#include "model/layout.h"

namespace gaskettle {

/// |Z - 1| of a mixture from the second virial coefficient: M. M. Abbott in J. M. Smith
/// and H. C. Van Ness, Introduction to Chemical Engineering Thermodynamics, 3rd ed. 1975,
/// p. 87, with mole-fraction means of critical temperature, pressure and acentric factor.
/// Good while it is small; where it is not, it says that the ideal gas is out of place.
class IdealDeparture {
public:
  explicit IdealDeparture(const Composition& composition);
  /// |Z - 1| at T (K) and p (Pa); 0 where a gas has no critical data (a gas of one's own).
  double at(double temperature, double pressure) const;

private:
  double critical_temperature_ = 0.0, critical_pressure_ = 0.0, acentric_ = 0.0;
  bool known_ = true;
};

/// From here on the answer says that the ideal gas is off.
inline constexpr double departure_worth_saying = 0.02;
/// From here on the gas may as well be liquid, and no figure is given.
inline constexpr double departure_beyond_estimate = 0.3;

/// "the ideal gas is off by about 5.8 % ..." in words for a departure.
std::string departure_text(double departure);

}  // namespace gaskettle
