/// One gas at one state, by each gas model that covers it.
#pragma once
#include <string>

#include "gas/species.h"

namespace gaskettle {

/// Every property at a temperature (K) and pressure (Pa absolute).
struct GasStateReport {
  double temperature = 0.0, pressure = 0.0, density = 0.0;                 ///< K, Pa, kg/m3
  double energy = 0.0, enthalpy = 0.0, entropy = 0.0, cv = 0.0, cp = 0.0;  ///< per kg
  double sound_speed = 0.0, viscosity = 0.0, conductivity = 0.0;           ///< m/s, Pa s, W/m/K; NaN: not known
  double joule_thomson = 0.0, molar_mass = 0.0;                            ///< K/Pa, kg/mol
};

GasStateReport ideal_gas_state(const Species& species, double temperature, double pressure);
std::string gas_state_text(const Species& species, const GasStateReport& ideal);
/// One object a gas model; today `ideal` alone.
std::string gas_state_json(const GasStateReport& ideal);

}  // namespace gaskettle
