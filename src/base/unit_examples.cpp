#include <fmt/format.h>

#include <algorithm>
#include <array>

#include "base/units.h"

namespace gaskettle {
namespace {

struct Examples {
  const UnitKind* kind;
  std::vector<std::string> values;
};

const std::vector<Examples>& table() {
  namespace uk = unit_kinds;
  static const std::vector<Examples> rows{
      {&uk::number, {"0.85"}},
      {&uk::percentage, {"7 %"}},
      {&uk::count, {"3"}},
      {&uk::length, {"250 mm", "1.8 m", "4 cm", "10 in", "3 ft"}},
      {&uk::area, {"2.2 m2", "20 mm2", "3 cm2", "0.5 in2"}},
      {&uk::volume, {"0.5 m3", "50 l", "30 dm3", "200 cm3", "2 ft3"}},
      {&uk::mass, {"40 kg", "250 g", "3 t", "12 lbm"}},
      {&uk::time, {"8 s", "10 min", "4 h", "20 ms", "2 day"}},
      {&uk::temperature, {"20 degC", "293.15 K", "68 degF"}},
      {&uk::temperature_difference, {"4 K", "4 degC", "7.2 degF"}},
      {&uk::pressure,
       {"14 bar abs", "14 bar gauge", "300 kPa abs", "1.2 MPa gauge", "14 barg", "14 bara", "200 psig", "200 psia"}},
      {&uk::pressure_difference, {"0.2 bar", "20 kPa", "3 psi", "50 mbar", "2 MPa"}},
      {&uk::force, {"200 N", "1.5 kN", "40 lbf"}},
      {&uk::torque, {"3 N m", "3 Nm", "0.2 kN m"}},
      {&uk::power, {"6 kW", "150 W", "1 MW"}},
      {&uk::energy, {"2 kJ", "3 kWh", "500 J", "1 MJ"}},
      {&uk::angle, {"30 deg", "0.5 rad"}},
      {&uk::frequency, {"2 Hz", "0.5 1/s", "3 1/min"}},
      {&uk::rotation, {"1450 rpm", "1450 rev/min", "24 rev/s", "151.8 rad/s"}},
      {&uk::velocity, {"3 m/s", "20 mm/s", "10 km/h", "5 ft/s"}},
      {&uk::acceleration, {"9.80665 m/s2", "32.17 ft/s2"}},
      {&uk::heat_capacity, {"4 kJ/K", "900 J/K"}},
      {&uk::entropy, {"4 kJ/K", "900 J/K"}},
      {&uk::specific_heat, {"1.04 kJ/kg/K", "490 J/kg/K", "0.49 kJ/kgK"}},
      {&uk::molar_specific_heat, {"29.1 J/mol/K"}},
      {&uk::specific_entropy, {"6.8 kJ/kg/K", "6800 J/kg/K"}},
      {&uk::specific_energy, {"300 kJ/kg", "300000 J/kg"}},
      {&uk::conductivity, {"0.04 W/m/K", "50 W/(m K)"}},
      {&uk::film_coefficient, {"35 W/m2/K", "35 W/m2K", "35 W/(m2 K)"}},
      {&uk::conductance, {"12 W/K"}},
      {&uk::contact_resistance, {"0.0002 m2 K/W"}},
      {&uk::heat_flux, {"800 W/m2", "5 kW/m2"}},
      {&uk::density, {"7850 kg/m3", "1.2 g/l"}},
      {&uk::molar_density, {"40 mol/m3", "0.04 mol/l"}},
      {&uk::molar_mass, {"28.01 g/mol", "0.02801 kg/mol"}},
      {&uk::amount, {"2 mol", "1 kmol"}},
      {&uk::stiffness, {"20 N/mm", "20000 N/m"}},
      {&uk::viscous_coefficient, {"500 N s/m", "500 Ns/m"}},
      {&uk::sonic_conductance, {"2 dm3/s/bar", "2 l/s/bar", "2e-8 m3/s/Pa"}},
      {&uk::viscosity, {"18 uPa s", "1.8e-5 Pa s"}},
      {&uk::gas_flow,
       {"2 g/s", "5 kg/h", "3 mol/s", "30 l/min normal", "30 l/min anr", "30 l/min actual", "2 Nm3/h", "30 Nl/min"}},
      {&uk::liquid_flow, {"30 l/min", "2 m3/h", "5 cm3/s"}},
      {&uk::joule_thomson, {"0.2 K/bar"}},
  };
  return rows;
}

/// "W m-2 K-1" as "W/m2/K".
std::string with_slashes(const std::string& si) {
  std::string above;
  std::string below;
  for (std::size_t i = 0; i < si.size();) {
    const std::size_t end = std::min(si.find(' ', i), si.size());
    const std::string factor = si.substr(i, end - i);
    const std::size_t minus = factor.find('-');
    if (minus == std::string::npos) {
      if (!above.empty()) above += ' ';
      above += factor;
    } else {
      const std::string power = factor.substr(minus + 1);
      below += '/';
      below += factor.substr(0, minus);
      if (power != "1") below += power;
    }
    i = end + 1;
  }
  if (above.empty()) above += '1';
  return above + below;
}

}  // namespace

std::vector<std::string> example_values(const UnitKind& kind) {
  for (const Examples& row : table())
    if (row.kind->name == kind.name && row.kind->si == kind.si) return row.values;
  for (const Examples& row : table())
    if (row.kind->si == kind.si && row.kind->flavour == kind.flavour) return row.values;
  return {fmt::format("2 {}", with_slashes(kind.si))};
}

std::vector<std::string> example_units(const UnitKind& kind) {
  std::vector<std::string> units;
  for (const std::string& value : example_values(kind)) {
    const std::size_t blank = value.find(' ');
    if (blank != std::string::npos) units.push_back(value.substr(blank + 1));
  }
  return units;
}

}  // namespace gaskettle
