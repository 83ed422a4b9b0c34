/// Stiffness of a gas behind a piston, for small motion, and what follows from it.
///
///     k = n p A^2/V       n = gamma (insulated) or 1 (isothermal)          N/m
///     period = 2 pi sqrt(m/k)
///
/// Source: E. Ruchardt, Eine einfache Methode zur Bestimmung von Cp/Cv,
/// Physikalische Zeitschrift 30 (1929) 58.
#pragma once
#include <cmath>

namespace gaskettle {

/// N/m, from exponent n (-), absolute pressure (Pa), piston area (m2) and gas volume (m3).
inline double gas_spring_stiffness(double exponent, double pressure, double area, double volume) {
  return exponent * pressure * area * area / volume;
}

/// Undamped period, s, of a mass (kg) on a spring (N/m, > 0). Compare it with the
/// times of interest to tell whether a piston's inertia matters.
inline double oscillation_period(double mass, double stiffness) {
  constexpr double two_pi = 6.283185307179586;
  return two_pi * std::sqrt(mass / stiffness);
}

}  // namespace gaskettle
