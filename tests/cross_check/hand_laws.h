/// The laws that the hand-written models share, written down afresh from their sources, so
/// that nothing of the program's own equations stands on both sides of a comparison.
#pragma once
#include <cmath>
#include <functional>
#include <numbers>
#include <vector>

#include "laws/conduction_grid.h"

namespace gaskettle::testing {

inline constexpr double pi = std::numbers::pi;
/// J/(mol K) and W/(m2 K4): CODATA 2018, both exact in the SI of 2019.
inline constexpr double molar_gas = 1.380649e-23 * 6.02214076e23;
inline constexpr double radiation_constant = 5.670374419184e-8;
inline constexpr double standard_gravity = 9.80665;
inline constexpr double standard_atmosphere = 101325.0;
inline constexpr double room = 293.15;  // K, the default surroundings

/// A gas of constant heat capacity, per kilogram.
struct PlainGas {
  double molar_mass, cp;
  double R() const { return molar_gas / molar_mass; }
  double cv() const { return cp - R(); }
  double gamma() const { return cp / cv(); }
  double mass(double p, double V, double T) const { return p * V / (R() * T); }
};

/// Mass flow through a nozzle of effective area `area`, >= 0: Y. A. Cengel and J. M. Cimbala,
/// Fluid Mechanics, chapter 12, isentropic flow. Within a relative drop of 1e-5 the model's
/// odd cubic, which joins the law at that drop in value and slope.
inline double nozzle_flow(double area, double p, double T, double R, double gamma, double p_down) {
  const double drop = (p - p_down) / p;
  if (drop <= 0.0) return 0.0;
  const double flux = area * p / std::sqrt(R * T);
  const double critical = std::pow(2.0 / (gamma + 1.0), gamma / (gamma - 1.0));
  if (1.0 - drop <= critical)
    return flux * std::sqrt(gamma * std::pow(2.0 / (gamma + 1.0), (gamma + 1.0) / (gamma - 1.0)));
  const double k = (gamma - 1.0) / gamma;
  // phi^2 = 2/k r^(2/gamma) (1 - r^k), with r = 1 - drop
  const auto squared = [&](double d) {
    const double l = std::log1p(-d);
    return 2.0 / k * std::exp(2.0 / gamma * l) * -std::expm1(k * l);
  };
  constexpr double band = 1e-5;
  if (drop > band) return flux * std::sqrt(squared(drop));
  const double r = 1.0 - band, f2 = squared(band);
  const double slope =
      2.0 / k * (2.0 / gamma * std::pow(r, 2.0 / gamma - 1.0) - (2.0 / gamma + k) * std::pow(r, 2.0 / gamma + k - 1.0));
  const double s = -band * slope / (2.0 * f2);  // d ln(phi) / d ln(drop)
  const double y = drop / band;
  return flux * std::sqrt(f2) * y * ((3.0 - s) + (s - 1.0) * y * y) / 2.0;
}

/// Grey two-surface exchange, W: F. P. Incropera et al., 6th ed., eq. 13.23, surface 1 not
/// seeing itself.
inline double grey_exchange(double A1, double e1, double T1, double A2, double e2, double T2) {
  const double resistance = (1.0 - e1) / (e1 * A1) + 1.0 / A1 + (1.0 - e2) / (e2 * A2);
  return radiation_constant * (std::pow(T1, 4) - std::pow(T2, 4)) / resistance;
}

/// A wall on the program's own nodes, which are data here: heat flows between them by
/// conductances, `conductivity[layer](T)` at the mean of two node temperatures.
struct HandWall {
  ConductionGrid grid;
  double area = 0.0;  ///< m2, inner face
  std::vector<std::function<double(double)>> conductivity;
  double bridges = 0.0;  ///< W/K from face to face

  std::size_t size() const { return grid.nodes.size(); }
  double outer_area() const { return area * grid.outer_area_ratio; }
  /// Node temperatures T, their rates, and the heat (W) put into the inner and outer face.
  void rates(const double* T, double* rate, double into_inner, double into_outer) const {
    const std::size_t last = size() - 1;
    for (std::size_t i = 0; i <= last; ++i) rate[i] = 0.0;
    rate[0] += into_inner;
    rate[last] += into_outer;
    for (std::size_t i = 0; i < last; ++i) {
      const ConductionLink& l = grid.links[i];
      const double k = l.layer < 0 ? 1.0 : conductivity[static_cast<std::size_t>(l.layer)](0.5 * (T[i] + T[i + 1]));
      const double q = k * l.geometry * area * (T[i] - T[i + 1]);
      rate[i] -= q;
      rate[i + 1] += q;
    }
    rate[0] -= bridges * (T[0] - T[last]);
    rate[last] += bridges * (T[0] - T[last]);
    for (std::size_t i = 0; i <= last; ++i) rate[i] /= grid.nodes[i].heat_capacity * area;
  }
};

}  // namespace gaskettle::testing
