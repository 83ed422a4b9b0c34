#include "laws/relief_capacity.h"

#include <cmath>
#include <stdexcept>
#include <string>

#include "laws/nozzle.h"

namespace gaskettle {
namespace {

constexpr double pound = 0.45359237;             // kg
constexpr double hour = 3600.0;                  // s
constexpr double inch = 0.0254;                  // m
constexpr double foot = 0.3048;                  // m
constexpr double psi_unit = 6894.757293168361;   // Pa, lbf/in2
constexpr double rankine_per_kelvin = 1.8;       // -
constexpr double pound_per_hour = pound / hour;  // kg/s
constexpr double kg_per_kmol = 1e-3;             // kg/mol

void require(bool good, const char* what, double given, const char* right) {
  if (!good) throw std::invalid_argument(std::string(what) + " is " + std::to_string(given) + "; it must be " + right);
}

void require_positive(const char* what, double given) {
  require(std::isfinite(given) && given > 0.0, what, given, "above 0");
}

void require_exponent(double k) { require(std::isfinite(k) && k >= 1.0, "isentropic exponent", k, "1 or more"); }

void check_gas(const ReliefGas& gas) {
  require_positive("relieving temperature (K)", gas.temperature);
  require_positive("molar mass (kg/mol)", gas.molar_mass);
  require_exponent(gas.isentropic_exponent);
  require_positive("compressibility", gas.compressibility);
}

/// psi or phi at p2/p1, without the regularisation that only a time integration needs.
double flow_function(double k, double pressure_ratio) {
  if (pressure_ratio <= critical_ratio(k)) return choked_flow_function(k);
  return pressure_ratio < 1.0 ? subcritical_flow_function(pressure_ratio, k) : 0.0;
}

double flux(double p1, double p2, const ReliefGas& gas) {
  check_gas(gas);
  require_positive("relieving pressure (Pa absolute)", p1);
  require(p2 >= 0.0 && p2 <= p1, "back pressure (Pa absolute)", p2, "from 0 to the relieving pressure");
  const double RT = gas.compressibility * relief_molar_gas_constant * gas.temperature / gas.molar_mass;
  return p1 / std::sqrt(RT) * flow_function(gas.isentropic_exponent, p2 / p1);
}

}  // namespace

double relief_capacity(double coefficient, double area, double p1, double p2, const ReliefGas& gas) {
  require_positive("discharge coefficient", coefficient);
  require_positive("flow area (m2)", area);
  return coefficient * area * flux(p1, p2, gas);
}

double required_relief_area(double mass_flow, double coefficient, double p1, double p2, const ReliefGas& gas) {
  require_positive("relieving mass flow (kg/s)", mass_flow);
  require_positive("discharge coefficient", coefficient);
  require(p2 < p1, "back pressure (Pa absolute)", p2, "below the relieving pressure");
  return mass_flow / (coefficient * flux(p1, p2, gas));
}

double subcritical_factor_f2(double k, double pressure_ratio) {
  require_exponent(k);
  require(pressure_ratio > 0.0 && pressure_ratio < 1.0, "pressure ratio", pressure_ratio, "between 0 and 1");
  // F2 = phi/sqrt(2 (1 - r)), from the two definitions.
  return subcritical_flow_function(pressure_ratio, k) / std::sqrt(2.0 * (1.0 - pressure_ratio));
}

double back_pressure_capacity_factor(double k, double pressure_ratio) {
  require_exponent(k);
  require(pressure_ratio >= 0.0 && pressure_ratio <= 1.0, "back-pressure ratio", pressure_ratio, "from 0 to 1");
  return flow_function(k, pressure_ratio) / choked_flow_function(k);
}

double iso4126_constant(double k) {
  require_exponent(k);
  // kg/h from kg/s, bar, mm2 and kg/kmol: 3600 * 1e5 * 1e-6/sqrt(1000 R_u) = 3.94808; the standard prints 3.948.
  return hour * 0.1 / std::sqrt(relief_molar_gas_constant / kg_per_kmol) * choked_flow_function(k);
}

double iso4126_specific_volume_factor() {
  // M/(Z R_u T) = 1/(p v): the same constant without R_u, with p v in Pa m3/kg.
  return std::sqrt(relief_molar_gas_constant / kg_per_kmol * 1e-5);
}

double api520_constant_si(double k) { return 0.01 * iso4126_constant(k); }

double api520_constant_us(double k) {
  require_exponent(k);
  return 520.0 * choked_flow_function(k);
}

double capacity_from_steam_rating(double steam_capacity, const ReliefGas& gas) {
  require_positive("steam rating (kg/s)", steam_capacity);
  check_gas(gas);
  const double C = api520_constant_us(gas.isentropic_exponent);
  const double M = gas.molar_mass / kg_per_kmol;
  const double T = gas.temperature * rankine_per_kelvin;
  return steam_capacity * C / 51.5 * std::sqrt(M / (gas.compressibility * T));
}

double relieving_pressure(double set_gauge, double overpressure, double surroundings_pressure) {
  require_positive("set pressure (Pa gauge)", set_gauge);
  require(overpressure >= 0.0, "overpressure (fraction of set)", overpressure, "0 or more");
  return set_gauge * (1.0 + overpressure) + surroundings_pressure;
}

double reseat_pressure(double set_gauge, double blowdown, double surroundings_pressure) {
  require_positive("set pressure (Pa gauge)", set_gauge);
  require(blowdown > 0.0 && blowdown < 1.0, "blowdown (fraction of set)", blowdown, "above 0 and below 1");
  return set_gauge * (1.0 - blowdown) + surroundings_pressure;
}

double letter_orifice_area(char letter) {
  for (const auto& orifice : letter_orifices)
    if (orifice.letter == letter) return orifice.area_in2 * inch * inch;
  throw std::invalid_argument(std::string("no API 526 orifice has the letter '") + letter +
                              "'; the letters are D E F G H J K L M N P Q R T");
}

char smallest_letter_orifice(double area) {
  require_positive("required area (m2)", area);
  for (const auto& orifice : letter_orifices)
    if (orifice.area_in2 * inch * inch >= area) return orifice.letter;
  throw std::invalid_argument("required area " + std::to_string(area) +
                              " m2 is above the largest API 526 orifice, T (0.016774 m2); use several valves");
}

double wetted_fire_heat(double wetted_area, double environment_factor, bool adequate_drainage) {
  require_positive("wetted area (m2)", wetted_area);
  require(environment_factor >= 0.0 && environment_factor <= 1.0, "environment factor", environment_factor,
          "from 0 to 1");
  return (adequate_drainage ? 43200.0 : 70900.0) * environment_factor * std::pow(wetted_area, 0.82);
}

double unwetted_fire_flow(double molar_mass, double p1, double exposed_area, double wall_temperature,
                          double gas_temperature) {
  require_positive("molar mass (kg/mol)", molar_mass);
  require_positive("relieving pressure (Pa absolute)", p1);
  require_positive("exposed area (m2)", exposed_area);
  require_positive("gas temperature (K)", gas_temperature);
  require(wall_temperature > gas_temperature, "wall temperature (K)", wall_temperature, "above the gas temperature");
  const double T1 = gas_temperature * rankine_per_kelvin;
  const double difference = wall_temperature * rankine_per_kelvin - T1;
  const double pounds_per_hour = 0.1406 * std::sqrt(molar_mass / kg_per_kmol * p1 / psi_unit) *
                                 (exposed_area / (foot * foot)) * std::pow(difference, 1.25) / std::pow(T1, 1.1506);
  return pounds_per_hour * pound_per_hour;
}

double lp_gas_air_rate_ft3_per_min(double outside_area_ft2) {
  require_positive("outside area (ft2)", outside_area_ft2);
  return 53.632 * std::pow(outside_area_ft2, 0.82);
}

}  // namespace gaskettle
