/// Power of a stirrer or fan in a gas.
///
///     P = T w                     shaft, torque T (N m), speed w (rad/s)
///     P = Np rho N^3 D^5          impeller, N = w/(2 pi) rev/s
///
/// Source: J. H. Rushton, E. W. Costich and H. J. Everett, Power characteristics
/// of mixing impellers, Chem. Eng. Progress 46 (1950) 395 and 467. Np is constant
/// for a Reynolds number rho N D^2/mu above about 1e4 and a tip Mach number below
/// about 0.3; below, it is only as good as the value given for that case.
#pragma once
#include <type_traits>

#include "base/scalar.h"

namespace gaskettle {

inline constexpr double radians_per_revolution = 6.283185307179586;

/// Shaft power, W, of `torque` (N m) at `speed` (rad/s).
template <Scalar S>
S shaft_power(const S& torque, const std::type_identity_t<S>& speed) {
  return torque * speed;
}

/// Impeller power, W, >= 0 for either sense of rotation: power number (-), gas
/// density (kg/m3), speed (rad/s), impeller diameter (m).
template <Scalar S>
S impeller_power(double power_number, const S& density, const std::type_identity_t<S>& speed, double diameter) {
  const S revolutions = absolute(speed) * (1.0 / radians_per_revolution);
  const double d2 = diameter * diameter;
  return (power_number * d2 * d2 * diameter) * density * cube(revolutions);
}

/// Speed of the blade tips, m/s, from speed (rad/s) and diameter (m).
template <Scalar S>
S impeller_tip_speed(const S& speed, double diameter) {
  return 0.5 * diameter * absolute(speed);
}

/// Tip speed over speed of sound (m/s).
template <Scalar S>
S impeller_tip_mach(const S& speed, double diameter, const std::type_identity_t<S>& speed_of_sound) {
  return impeller_tip_speed(speed, diameter) / speed_of_sound;
}

/// Reynolds number of an impeller, rho N D^2/mu with N in rev/s; viscosity in Pa s.
template <Scalar S>
S impeller_reynolds(const S& density, const std::type_identity_t<S>& speed, double diameter,
                    const std::type_identity_t<S>& viscosity) {
  return density * absolute(speed) * (diameter * diameter / radians_per_revolution) / viscosity;
}

}  // namespace gaskettle
