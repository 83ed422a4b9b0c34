#include "gas/species.h"

#include <stdexcept>

namespace gaskettle {

namespace {

void require_positive(const std::string& gas, const char* what, double x, const char* unit) {
  if (!(x > 0.0) || !std::isfinite(x))
    throw std::invalid_argument("gas " + gas + ": the " + what + " is " + std::to_string(x) + " " + unit +
                                ", but must be above zero");
}

}  // namespace

Species constant_cp_gas(const std::string& name, double molar_mass, double cp, std::optional<double> viscosity,
                        std::optional<double> conductivity) {
  require_positive(name, "molar mass", molar_mass, "kg/mol");
  require_positive(name, "heat capacity cp", cp, "J/(kg K)");
  Species gas;
  gas.name = name;
  gas.source = "given in the model";
  gas.molar_mass = molar_mass;
  gas.gas_constant = molar_gas_constant / molar_mass;
  if (!(cp > gas.gas_constant))
    throw std::invalid_argument("gas " + name + ": cp is " + std::to_string(cp) +
                                " J/(kg K), but must be above the gas constant " + std::to_string(gas.gas_constant) +
                                " J/(kg K) of its molar mass");
  gas.heat = HeatCapacityCurve::constant(cp / gas.gas_constant);
  if (viscosity) {
    require_positive(name, "viscosity", *viscosity, "Pa s");
    gas.viscosity_curve = TransportCurve::constant(*viscosity);
  }
  if (conductivity) {
    require_positive(name, "conductivity", *conductivity, "W/(m K)");
    gas.conductivity_curve = TransportCurve::constant(*conductivity);
  }
  gas.transport_source = viscosity || conductivity ? gas.source : "";
  return gas;
}

}  // namespace gaskettle
