/// Capacity and size of relief valves and bursting discs for gas.
///
/// With psi, phi and r_c of laws/nozzle.h and absolute pressures:
///
///     m = K A p1 psi(k) sqrt(M/(Z R_u T))        p2/p1 <= r_c(k)
///     m = K A p1 phi(p2/p1) sqrt(M/(Z R_u T))    above
///
/// ISO 4126-1 and -7 (C = 3.948 psi) and API Std 520 Part I (C = 0.03948 psi in SI,
/// 520 psi in US units; F2 for subcritical flow) are this equation in other units.
/// K is the product of the coefficients of ONE system with the area of the SAME
/// system: API effective (0.975 valve, 0.62 disc) with API 526 letter areas, or
/// certified (ISO K_dr) with the actual flow area. Good for Z from 0.8 to 1.1.
/// A screening estimate, never a certified capacity.
///
/// All functions throw std::invalid_argument when a quantity is not positive or out
/// of its stated range.
#pragma once
#include <array>

namespace gaskettle {

/// Molar gas constant, J/(mol K), CODATA 2018 (exact).
inline constexpr double relief_molar_gas_constant = 8.31446261815324;

/// The gas at relieving conditions.
struct ReliefGas {
  double temperature = 0.0;          ///< K
  double molar_mass = 0.0;           ///< kg/mol
  double isentropic_exponent = 0.0;  ///< k, >= 1
  double compressibility = 1.0;      ///< Z
};

/// Mass flow, kg/s, through `area` (m2) with coefficient K from p1 to p2 (Pa absolute, p2 <= p1).
double relief_capacity(double coefficient, double area, double p1, double p2, const ReliefGas& gas);

/// Area, m2, that passes `mass_flow` (kg/s): the inverse of relief_capacity. p2 < p1.
double required_relief_area(double mass_flow, double coefficient, double p1, double p2, const ReliefGas& gas);

/// F2 of API Std 520 Part I, sizing for subcritical flow, k >= 1, 0 < r < 1:
///     sqrt(k/(k-1) r^(2/k) (1 - r^((k-1)/k))/(1 - r)),  r = p2/p1
double subcritical_factor_f2(double k, double pressure_ratio);

/// K_b of ISO 4126-7: flow at back-pressure ratio r over choked flow; 1 at or below r_c. 0 <= r <= 1.
double back_pressure_capacity_factor(double k, double pressure_ratio);

/// C of ISO 4126-1: Q_m[kg/h] = p0[bar] C A[mm2] K_dr sqrt(M[kg/kmol]/(Z T[K])), C = 3.948 psi.
double iso4126_constant(double k);
/// The factor of ISO 4126's other form, Q_m[kg/h] = 0.2883 C A[mm2] K_dr sqrt(p0[bar]/v0[m3/kg]).
double iso4126_specific_volume_factor();
/// C of API Std 520 Part I, SI: A[mm2] = W[kg/h]/(C K p1[kPa]) sqrt(T[K] Z/M), C = 0.03948 psi.
double api520_constant_si(double k);
/// C of API Std 520 Part I, US units: A[in2] = W[lb/h]/(C K p1[psia]) sqrt(T[degR] Z/M), C = 520 psi (rounded there).
double api520_constant_us(double k);

/// Gas capacity, kg/s, of a valve stamped in steam (kg/s), ASME Boiler and Pressure Vessel
/// Code Section VIII Div. 1 Appendix 11: W_s = 51.5 K A P and W = C K A P sqrt(M/T) in US units.
double capacity_from_steam_rating(double steam_capacity, const ReliefGas& gas);

/// Relieving pressure, Pa absolute: set (gauge) times 1 + overpressure (a fraction of
/// the gauge set), plus the surroundings. Definition of ISO 4126-1 and API Std 520.
double relieving_pressure(double set_gauge, double overpressure, double surroundings_pressure);
/// Pressure at which the valve shuts, Pa absolute: set (gauge) times 1 - blowdown, plus the surroundings.
double reseat_pressure(double set_gauge, double blowdown, double surroundings_pressure);

/// One standard orifice of API Std 526: letter and effective area in square inches.
struct LetterOrifice {
  char letter;
  double area_in2;
};
/// Effective orifice areas of API Std 526, ascending.
inline constexpr std::array<LetterOrifice, 14> letter_orifices{{{'D', 0.110},
                                                                {'E', 0.196},
                                                                {'F', 0.307},
                                                                {'G', 0.503},
                                                                {'H', 0.785},
                                                                {'J', 1.287},
                                                                {'K', 1.838},
                                                                {'L', 2.853},
                                                                {'M', 3.60},
                                                                {'N', 4.34},
                                                                {'P', 6.38},
                                                                {'Q', 11.05},
                                                                {'R', 16.0},
                                                                {'T', 26.0}}};
/// Effective area of a letter, m2.
double letter_orifice_area(char letter);
/// The smallest letter whose area is at least `area` (m2); throws when even T is too small.
char smallest_letter_orifice(double area);

/// Heat into the liquid-wetted part of a vessel in a pool fire, W, from its wetted
/// area (m2): 43 200 F A^0.82 with adequate drainage and fire fighting, 70 900 F A^0.82
/// without. API Std 521 / ISO 23251, wetted-surface equation. F: environment
/// factor, 1 for a bare vessel.
double wetted_fire_heat(double wetted_area, double environment_factor, bool adequate_drainage);

/// Relieving rate, kg/s, of a vessel that holds gas only, in a fire. API Std 521:
///     W[lb/h] = 0.1406 sqrt(M p1[psia]) A'[ft2] (T_w - T1)^1.25/T1^1.1506, T in degR
/// SI here: molar mass kg/mol, p1 Pa absolute, exposed area m2, wall T_w and gas T1
/// in K, T_w > T1. T_w is usually 866.5 K (1560 degR) for carbon steel. A sizing
/// rule for a constant pressure and a wall at its limit, not a transient model.
double unwetted_fire_flow(double molar_mass, double p1, double exposed_area, double wall_temperature,
                          double gas_temperature);

/// Free-air rating, ft3/min, of an LP-gas container's relief valves, from the outside
/// surface in ft2: 53.632 A^0.82. NFPA 58; Washington Administrative Code 296-307-41025.
double lp_gas_air_rate_ft3_per_min(double outside_area_ft2);

}  // namespace gaskettle
