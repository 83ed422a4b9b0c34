/// One pure gas: heat capacity, enthalpy, entropy, transport, all of T alone.
#pragma once
#include <cmath>
#include <optional>
#include <string>

#include "gas/curves.h"

namespace gaskettle {

/// Molar gas constant, J/(mol K): k N_A of the SI of 2019 (CODATA 2018), exact.
///
/// Used for every gas, so that p V = m R T and cp - cv = R hold together. The
/// published fits give cp/R; the values printed with them used 8.31451, so that
/// cp, h and s come out 5.7e-6 (relative) below those prints.
inline constexpr double molar_gas_constant = 8.31446261815324;
inline constexpr double entropy_pressure = 1e5;  ///< Pa, the standard pressure of s

/// Critical point and acentric factor, for real-gas equations.
struct CriticalPoint {
  double temperature = 0.0;      ///< K
  double pressure = 0.0;         ///< Pa
  double molar_density = 0.0;    ///< mol/m3
  double acentric_factor = 0.0;  ///< 1
  std::string source;
};

/// A pure gas. Plain data, with properties as functions of temperature; T > 0, in K.
/// Take one from the catalogue, or make one with `constant_cp_gas`.
struct Species {
  std::string name;           ///< as written in a model: nitrogen
  std::string formula;        ///< N2; empty for a gas of one's own
  std::string source;         ///< where the heat capacity comes from
  double molar_mass = 0.0;    ///< kg/mol
  double gas_constant = 0.0;  ///< J/(kg K)
  HeatCapacityCurve heat;
  std::optional<TransportCurve> viscosity_curve;     ///< Pa s; absent where nothing is known
  std::optional<TransportCurve> conductivity_curve;  ///< W/(m K)
  std::string transport_source;
  std::optional<CriticalPoint> critical;

  /// K; the published range of cp. Outside, cp is held: leaving it deserves a warning.
  double lowest_temperature() const { return heat.lowest(); }
  double highest_temperature() const { return heat.highest(); }

  /// cp (J/(kg K)), its slope, h (J/kg) and s at 1 bar (J/(kg K)), in plain numbers.
  ThermalPoint thermal(double temperature, double log_temperature) const {
    ThermalPoint p = heat.at(temperature, log_temperature);
    p.cp *= gas_constant;
    p.cp_slope *= gas_constant;
    p.enthalpy *= gas_constant;
    p.entropy *= gas_constant;
    return p;
  }
  ThermalPoint thermal(double temperature) const { return thermal(temperature, std::log(temperature)); }

  /// J/(kg K), at constant pressure.
  template <Scalar S>
  S cp(const S& temperature) const {
    const ThermalPoint p = thermal(value(temperature));
    return along(temperature, {p.cp, p.cp_slope});
  }
  /// J/kg; exactly 0 at 298.15 K.
  template <Scalar S>
  S enthalpy(const S& temperature) const {
    const ThermalPoint p = thermal(value(temperature));
    return along(temperature, {p.enthalpy, p.cp});
  }
  /// J/kg: u = h - R T.
  template <Scalar S>
  S energy(const S& temperature) const {
    return enthalpy(temperature) - gas_constant * temperature;
  }
  /// J/(kg K) at 1 bar: absolute where published, else 0 at 298.15 K.
  template <Scalar S>
  S entropy(const S& temperature) const {
    const ThermalPoint p = thermal(value(temperature));
    return along(temperature, {p.entropy, p.cp / value(temperature)});
  }
  /// Pa s, dilute gas; not a number where `viscosity_curve` is absent.
  template <Scalar S>
  S viscosity(const S& temperature) const {
    return transport(viscosity_curve, temperature);
  }
  /// W/(m K), dilute gas; not a number where `conductivity_curve` is absent.
  template <Scalar S>
  S conductivity(const S& temperature) const {
    return transport(conductivity_curve, temperature);
  }

private:
  template <Scalar S>
  static S transport(const std::optional<TransportCurve>& curve, const S& temperature) {
    const double t = value(temperature);
    return along(temperature, curve ? curve->at(t, std::log(t)) : Slope{std::nan(""), 0.0});
  }
};

/// A gas of one's own: constant cp (J/(kg K)), molar mass (kg/mol), and, where
/// films need them, constant viscosity (Pa s) and conductivity (W/(m K)).
/// Throws std::invalid_argument unless the molar mass is > 0, cp > R (so that
/// cv > 0) and transport values are > 0, all finite.
Species constant_cp_gas(const std::string& name, double molar_mass, double cp, std::optional<double> viscosity = {},
                        std::optional<double> conductivity = {});

}  // namespace gaskettle
