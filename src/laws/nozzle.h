/// Mass flow of a perfect gas through a nozzle or orifice.
///
/// Per unit of effective area (discharge coefficient times area), from rest at
/// p_up, T_up to the pressure p_down, with r = p_down / p_up:
///
///     flux = p_up / sqrt(R T_up) * phi(r)                            kg/(s m2)
///     phi(r) = sqrt(2 gamma/(gamma-1) (r^(2/gamma) - r^((gamma+1)/gamma)))  r > r_c
///     phi(r) = psi = sqrt(gamma (2/(gamma+1))^((gamma+1)/(gamma-1)))        r <= r_c
///     r_c = (2/(gamma+1))^(gamma/(gamma-1))
///
/// Value and slope are continuous at r_c, since phi has its maximum there.
/// Source: Y. A. Cengel and J. M. Cimbala, Fluid Mechanics: Fundamentals and
/// Applications, chapter 12 (isentropic flow through nozzles). All forms below
/// also hold in the limit gamma -> 1 (r_c -> exp(-1/2), psi -> exp(-1/2)).
/// A real gas may put in R = p/(rho T) and its isentropic exponent for gamma.
///
/// Near r = 1, phi is close to sqrt(2 (1 - r)), whose slope is infinite. Within
/// `band` of equal pressure (1 - r <= band) the law is replaced by
///
///     phi_b ((3 - s)/2 y + (s - 1)/2 y^3),   y = (1 - r)/band
///
/// with phi_b the law's value at the band's edge and s its logarithmic slope
/// there (near 1/2): value and slope agree at the edge, the flow is straight and
/// odd at zero, and its slope falls steadily.
#pragma once
#include <type_traits>

#include "base/scalar.h"

namespace gaskettle {

/// Smallest useful `band`, as a fraction of the higher pressure: 1e-4 to 1e-6 let
/// two vessels equalise in a few tens of steps, 1e-7 or the raw root stall.
inline constexpr double smallest_pressure_band = 1e-5;

/// (exp(x) - 1)/x, exact to rounding through x = 0.
template <Scalar S>
S exp_minus_one_ratio(const S& x) {
  using std::exp;
  using std::tanh;
  const double size = value(x) < 0 ? -value(x) : value(x);
  if (size < 1e-3) return 1.0 + x * (1.0 / 2 + x * (1.0 / 6 + x * (1.0 / 24 + x * (1.0 / 120))));
  // exp(x) - 1 = tanh(x/2) (exp(x) + 1): no cancellation for small x.
  return tanh(0.5 * x) * (exp(x) + 1.0) / x;
}

/// ln(1 + x)/x for x > -1, through x = 0.
template <Scalar S>
S log_one_plus_ratio(const S& x) {
  using std::log;
  const double size = value(x) < 0 ? -value(x) : value(x);
  if (size < 1e-3) return 1.0 + x * (-1.0 / 2 + x * (1.0 / 3 + x * (-1.0 / 4 + x * (1.0 / 5))));
  return log(1.0 + x) / x;
}

/// r_c, the pressure ratio at and below which the throat is sonic; gamma >= 1.
template <Scalar S>
S critical_ratio(const S& gamma) {
  using std::exp;
  const S half_excess = 0.5 * (gamma - 1.0);
  return exp(-0.5 * gamma * log_one_plus_ratio(half_excess));
}

/// psi, the value of phi when choked; gamma >= 1.
template <Scalar S>
S choked_flow_function(const S& gamma) {
  using std::exp;
  using std::sqrt;
  const S half_excess = 0.5 * (gamma - 1.0);
  return sqrt(gamma) * exp(-0.25 * (gamma + 1.0) * log_one_plus_ratio(half_excess));
}

/// phi(r) of the unchoked nozzle, without regularisation; 0 < r < 1 (its slope is infinite at 1).
template <Scalar S>
S subcritical_flow_function(const S& ratio, const std::type_identity_t<S>& gamma) {
  using std::exp;
  using std::log;
  using std::sqrt;
  const S log_ratio = log(ratio);
  const S power_part = exp_minus_one_ratio(S((1.0 - 1.0 / gamma) * log_ratio));
  return exp(log_ratio / gamma) * sqrt(-2.0 * log_ratio * power_part);
}

/// The odd cubic of the file comment: 0 at y = 0, `edge_value` at y = 1 with
/// logarithmic slope d ln(flow)/d ln(y) = `edge_slope` there. 0 <= y <= 1.
template <Scalar S>
S near_equal_pressure(const S& y, const S& edge_value, const S& edge_slope) {
  return edge_value * y * 0.5 * ((3.0 - edge_slope) + (edge_slope - 1.0) * y * y);
}

/// phi for any pressure drop (p_up - p_down)/p_up from 0 to 1: choked, unchoked
/// or within the band. `band` from 0 (not included) to 0.1.
template <Scalar S>
S nozzle_flow_function(const S& relative_drop, const std::type_identity_t<S>& gamma, double band) {
  using std::exp;
  const S ratio = 1.0 - relative_drop;
  // The zero products keep the same dependencies in every branch: a Jacobian's pattern must not follow the values.
  if (value(ratio) <= critical_ratio(value(gamma))) return choked_flow_function(gamma) + 0.0 * relative_drop;
  if (value(relative_drop) > band) return subcritical_flow_function(ratio, gamma);
  const double edge_ratio = 1.0 - band;
  const double edge_log = std::log1p(-band);
  const S exponent = (1.0 - 1.0 / gamma) * edge_log;
  const S edge_slope =
      (0.5 * band / edge_ratio) * (exp(exponent) / (-edge_log * exp_minus_one_ratio(exponent)) - 2.0 / gamma);
  return near_equal_pressure(S(relative_drop / band), subcritical_flow_function(S(edge_ratio), gamma), edge_slope);
}

/// Mass flux, kg/(s m2), >= 0, per effective area, from p_up (Pa, > 0), T_up (K)
/// with gas constant R (J/(kg K)) and isentropic exponent gamma to p_down (Pa,
/// >= 0). Zero when p_up < p_down; at equal pressures zero with the slope of a
/// pressure drop. `band` as above: max(smallest_pressure_band, rtol).
template <Scalar S>
S nozzle_flux(const S& p_up, const std::type_identity_t<S>& T_up, const std::type_identity_t<S>& R,
              const std::type_identity_t<S>& gamma, const std::type_identity_t<S>& p_down, double band) {
  using std::sqrt;
  if (value(p_up) < value(p_down)) return 0.0 * (p_up + T_up + R + gamma + p_down);
  return p_up / sqrt(R * T_up) * nozzle_flow_function(S((p_up - p_down) / p_up), gamma, band);
}

/// What a nozzle law needs to know of the gas at rest on one side of a port.
template <Scalar S>
struct NozzleSide {
  S pressure;             ///< Pa
  S temperature;          ///< K
  S gas_constant;         ///< J/(kg K)
  S isentropic_exponent;  ///< -
};

/// Flow through a two-way path, both >= 0 and at most one of them above zero.
template <Scalar S>
struct TwoWayFlow {
  S forward;   ///< from side a to side b
  S backward;  ///< from side b to side a
};

/// Both directions of a nozzle between a and b, kg/(s m2). At equal pressures the
/// forward branch alone carries the slope, so that forward - backward has the right one.
template <Scalar S>
TwoWayFlow<S> nozzle_flux_both_ways(const NozzleSide<S>& a, const NozzleSide<S>& b, double band) {
  const auto from = [band](const NozzleSide<S>& up, const NozzleSide<S>& down) {
    return nozzle_flux<S>(up.pressure, up.temperature, up.gas_constant, up.isentropic_exponent, down.pressure, band);
  };
  const auto none = [](const NozzleSide<S>& up, const NozzleSide<S>& down) {
    return S(0.0 * (up.pressure + up.temperature + up.gas_constant + up.isentropic_exponent + down.pressure));
  };
  if (value(a.pressure) >= value(b.pressure)) return {from(a, b), none(b, a)};
  return {none(a, b), from(b, a)};
}

/// Discharge coefficient of a sharp-edged orifice at pressure ratio r = p_down/p_up,
/// 0 to 1: 0.841 into vacuum, 0.600 at small drops (the vena contracta grows with
/// the drop, so such an orifice never chokes completely). Polynomial fit used in
/// pneumatics to the data of J. A. Perry, Critical flow through sharp-edged
/// orifices, Trans. ASME 71 (1949) 757.
template <Scalar S>
S sharp_orifice_discharge_coefficient(const S& ratio) {
  return 0.8414 + ratio * (-0.1002 + ratio * (0.8415 + ratio * (-3.9 + ratio * (4.6001 - 1.6827 * ratio))));
}

/// Discharge coefficient of a toroidal-throat critical-flow venturi, ISO 9300:2022,
/// for a throat Reynolds number from 2.1e4 to 3.2e7.
template <Scalar S>
S toroidal_venturi_discharge_coefficient(const S& throat_reynolds) {
  using std::sqrt;
  return 0.9959 - 2.720 / sqrt(throat_reynolds);
}

}  // namespace gaskettle
