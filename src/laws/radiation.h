/// Thermal radiation between gray, diffuse surfaces across a gas that takes no part.
///
/// Every exchange is written with an effective area (m2):
///
///     heat 1 -> 2 = sigma A_eff (T1^4 - T2^4)                              W
///
/// Nitrogen, oxygen, hydrogen and noble gases let radiation pass; carbon dioxide,
/// steam, ammonia and hydrocarbons do not, and then these laws are wrong.
/// Source: F. P. Incropera, D. P. DeWitt, T. L. Bergman and A. S. Lavine,
/// Fundamentals of Heat and Mass Transfer, 6th ed., chapter 13 (eq. 13.18 and
/// table 13.3); temperatures in K, emissivities from 0 to 1.
#pragma once
#include <type_traits>

#include "base/scalar.h"

namespace gaskettle {

/// Stefan-Boltzmann constant, W/(m2 K4), CODATA 2018 (exact, here to ten digits).
inline constexpr double stefan_boltzmann = 5.670374419e-8;

/// Effective area of two surfaces that form an enclosure; surface 1 (area A1, m2)
/// sees surface 2 (A2) with view factor F12 (1 when 1 cannot see itself):
///     1/A_eff = (1 - e1)/(e1 A1) + 1/(A1 F12) + (1 - e2)/(e2 A2)
/// Areas > 0, 0 < F12 <= 1 and A1 F12 <= A2. Zero when either emissivity is zero.
/// With F12 = 1 it serves parallel plates (A1 = A2), long concentric cylinders,
/// concentric spheres and a body inside an enclosure.
template <Scalar S>
S two_surface_exchange_area(const S& A1, double e1, const std::type_identity_t<S>& A2, double e2, double F12 = 1.0) {
  if (e1 <= 0.0 || e2 <= 0.0) return 0.0 * (A1 + A2);
  const double one = (1.0 - e1) / e1 + 1.0 / F12;
  const double two = (1.0 - e2) / e2;
  return A1 * A2 / (one * A2 + two * A1);
}

/// A body (A1, e1) much smaller than what surrounds it, which then looks black.
template <Scalar S>
S small_body_exchange_area(const S& A1, double e1) {
  return e1 * A1;
}

/// Two facing plates of area A with a gap small beside their size.
template <Scalar S>
S parallel_plates_exchange_area(const S& A, double e1, double e2) {
  return two_surface_exchange_area(A, e1, A, e2);
}

/// Long concentric cylinders of diameters D1 < D2, per length (m2/m).
inline double concentric_cylinders_exchange_area(double D1, double e1, double D2, double e2) {
  constexpr double pi = 3.14159265358979323846;
  return two_surface_exchange_area(pi * D1, e1, pi * D2, e2);
}

/// Two gaps in series, as on both sides of a thin shield: each gap's effective area
/// is taken between its wall and the shield's face (which may differ in emissivity).
template <Scalar S>
S exchange_areas_in_series(const S& a, const std::type_identity_t<S>& b) {
  if (value(a) <= 0.0 || value(b) <= 0.0) return 0.0 * (a + b);
  return a * b / (a + b);
}

/// Power per area of a black surface, sigma T^4, W/m2.
template <Scalar S>
S emissive_power(const S& T) {
  return stefan_boltzmann * fourth_power(T);
}

/// Heat from 1 to 2, W (W/m for an area per length). Factored, so that equal
/// temperatures give exactly zero and nearly equal ones lose no digits.
template <Scalar S>
S radiant_heat(const std::type_identity_t<S>& exchange_area, const S& T1, const std::type_identity_t<S>& T2) {
  return stefan_boltzmann * exchange_area * ((T1 - T2) * (T1 + T2) * (T1 * T1 + T2 * T2));
}

/// The film coefficient that carries the same heat, per effective area, W/(m2 K):
/// sigma (T1 + T2)(T1^2 + T2^2).
template <Scalar S>
S radiation_film(const S& T1, const std::type_identity_t<S>& T2) {
  return stefan_boltzmann * ((T1 + T2) * (T1 * T1 + T2 * T2));
}

/// Heat flux absorbed by a dry wall in a fire, W/m2: e_w e_f sigma T_f^4 - e_w sigma T_w^4
/// + h (T_f - T_w), the form of the analytical method of API Std 521 (6th ed. and
/// later) and of EN 1991-1-2, 3.1. e_f: emissivity of the flame, h in W/(m2 K).
template <Scalar S>
S fire_heat_flux(const S& T_fire, const std::type_identity_t<S>& T_wall, double e_fire, double e_wall, double h) {
  const S radiation = (e_fire - 1.0) * emissive_power(T_fire) + radiant_heat<S>(S(1.0), T_fire, T_wall);
  return e_wall * radiation + h * (T_fire - T_wall);
}

/// Gas temperature (K) of the standard fire after t seconds, t >= 0, started at 20 degC:
/// 20 + 345 log10(8 t_min + 1) degC. EN 1991-1-2:2002, eq. 3.4 (ISO 834-1).
template <Scalar S>
S standard_fire_temperature(const S& t) {
  using std::log;
  return 293.15 + 345.0 / std::log(10.0) * log(8.0 / 60.0 * t + 1.0);
}

/// Gas temperature (K) of the hydrocarbon fire after t seconds, t >= 0:
/// 20 + 1080 (1 - 0.325 exp(-0.167 t_min) - 0.675 exp(-2.5 t_min)) degC. EN 1991-1-2:2002, eq. 3.6.
template <Scalar S>
S hydrocarbon_fire_temperature(const S& t) {
  using std::exp;
  return 293.15 + 1080.0 * (1.0 - 0.325 * exp(-0.167 / 60.0 * t) - 0.675 * exp(-2.5 / 60.0 * t));
}

/// Throws std::invalid_argument unless 0 <= emissivity <= 1; `what` names it in the message.
void check_emissivity(double emissivity, const char* what);

}  // namespace gaskettle
