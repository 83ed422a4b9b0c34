/// Pneumatic components rated by sonic conductance C and critical ratio b.
///
///     m = C p_up rho_0 sqrt(T_0/T_up)                                 r <= b
///     m = C p_up rho_0 sqrt(T_0/T_up) sqrt(1 - ((r - b)/(1 - b))^2)   r > b
///
/// with r = p_down/p_up. Source: ISO 6358-1, Pneumatic fluid power, flow-rate
/// characteristics; reference atmosphere (ANR, ISO 8778) T_0 = 293.15 K,
/// 100 kPa, 65 % relative humidity, rho_0 = 1.185 kg/m3. C in m3/(s Pa) at ANR
/// (1 dm3/(s bar) = 1e-8 m3/(s Pa)), b from 0 to below 1. Pressures absolute.
///
/// The ellipse has an infinite slope at r = 1; it is regularised over `band` of
/// the upstream pressure as in laws/nozzle.h.
#pragma once
#include <algorithm>

#include "laws/nozzle.h"

namespace gaskettle {

/// Density and temperature of the standard reference atmosphere ANR, ISO 8778.
inline constexpr double anr_density = 1.185;       // kg/m3
inline constexpr double anr_temperature = 293.15;  // K
inline constexpr double anr_pressure = 1.0e5;      // Pa

/// The share of the choked flow that passes at a relative drop 1 - r, 0 to 1.
template <Scalar S>
S iso6358_flow_function(const S& relative_drop, double critical_ratio_b, double band) {
  using std::sqrt;
  // With y = (1 - r)/(1 - b) the ellipse is sqrt(y (2 - y)): no cancellation near r = 1.
  const S y = relative_drop / (1.0 - critical_ratio_b);
  if (value(y) >= 1.0) return 1.0 + 0.0 * y;
  // For b within a band of 1 the band must still end before choking.
  const double edge = std::min(band / (1.0 - critical_ratio_b), 0.5);
  if (value(y) > edge) return sqrt(y * (2.0 - y));
  const double edge_value = std::sqrt(edge * (2.0 - edge));
  return near_equal_pressure(S(y / edge), S(edge_value), S((1.0 - edge) / (2.0 - edge)));
}

/// Mass flow of air, kg/s, >= 0; zero when p_up < p_down (at equal pressures zero
/// with the slope of a drop). p in Pa, T_up in K, C in m3/(s Pa), 0 <= b < 1.
template <Scalar S>
S iso6358_flow(const S& p_up, const std::type_identity_t<S>& T_up, const std::type_identity_t<S>& p_down,
               double sonic_conductance, double critical_ratio_b, double band) {
  using std::sqrt;
  if (value(p_up) < value(p_down)) return 0.0 * (p_up + T_up + p_down);
  const S choked = sonic_conductance * anr_density * p_up * sqrt(anr_temperature / T_up);
  return choked * iso6358_flow_function(S((p_up - p_down) / p_up), critical_ratio_b, band);
}

/// What multiplies `iso6358_flow` for another gas than air: the component is taken
/// as the nozzle of the same effective area, so flow goes with psi(gamma)/sqrt(R),
/// relative to air at ANR (R = p_0/(rho_0 T_0), gamma = 1.4). ISO 6358 itself
/// rates components with air only; b is left as rated. R in J/(kg K).
template <Scalar S>
S iso6358_gas_factor(const S& R, const std::type_identity_t<S>& gamma) {
  using std::sqrt;
  const double air_gas_constant = anr_pressure / (anr_density * anr_temperature);
  return sqrt(air_gas_constant / R) * choked_flow_function(gamma) * (1.0 / choked_flow_function(1.4));
}

/// Sonic conductance of an ideal nozzle of this effective area (m2) for air, m3/(s Pa).
inline double sonic_conductance_of_nozzle(double effective_area) {
  return effective_area * choked_flow_function(1.4) / std::sqrt(anr_density * anr_pressure);
}

}  // namespace gaskettle
