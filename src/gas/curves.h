/// Curves over temperature: heat capacity with its integrals, and transport.
///
/// Every curve is evaluated in plain numbers, value and slope together;
/// `along` then carries the pair into any scalar of the rate code. That is exact
/// to first order, which is all that forward duals hold, and costs a Jacobian
/// next to nothing.
#pragma once
#include <array>
#include <vector>

#include "base/scalar.h"

namespace gaskettle {

inline constexpr double enthalpy_zero_temperature = 298.15;  ///< K, where h = 0 for every gas

/// A value and its derivative by temperature.
struct Slope {
  double value = 0.0;
  double by_temperature = 0.0;
};

/// f(x) in the scalar S, from the plain value and slope of f at value(x).
template <Scalar S>
S along(const S& x, const Slope& f) {
  return S(f.value) + f.by_temperature * (x - value(x));
}

/// Heat capacity, its slope and its integrals, in units that the owner states:
/// over R (cp: 1, cp_slope: 1/K, enthalpy: K, entropy: 1) or per kilogram.
struct ThermalPoint {
  double cp = 0.0;
  double cp_slope = 0.0;
  double enthalpy = 0.0;
  double entropy = 0.0;
};

/// One range of a nine-coefficient fit (B. J. McBride, M. J. Zehe, S. Gordon,
/// "NASA Glenn Coefficients for Calculating Thermodynamic Properties of
/// Individual Species", NASA/TP-2002-211556, 2002, equations 1 to 3), T in K:
///   cp/R    = a0/T^2 + a1/T + a2 + a3 T + a4 T^2 + a5 T^3 + a6 T^4
///   h/R     = -a0/T + a1 ln T + a2 T + a3 T^2/2 + ... + a6 T^5/5 + b0
///   s/R     = -a0/(2 T^2) - a1/T + a2 ln T + a3 T + ... + a6 T^4/4 + b1
struct Nasa9Range {
  std::array<double, 7> a{};
  std::array<double, 2> b{};
};

/// Ideal-gas heat capacity over R for every T > 0.
///
/// Inside [lowest, highest] the published fit of two ranges that meet at `join`.
/// Outside, cp is held at its value at the limit and h and s go on consistently:
/// an extrapolated fit would reach cv <= 0 (methane below 80 K), and with it two
/// temperatures for one energy. The upper range's constants are shifted so that
/// h and s join at `join` to rounding; cp itself has the jump of the published
/// fits there, below 6e-9 of its value. h is exactly 0 at 298.15 K.
class HeatCapacityCurve {
public:
  HeatCapacityCurve() = default;
  /// A published fit; s keeps its published absolute value (1 bar).
  HeatCapacityCurve(const Nasa9Range& lower, const Nasa9Range& upper, double lowest, double join, double highest);
  /// Constant cp/R everywhere; s = 0 at 298.15 K.
  static HeatCapacityCurve constant(double cp_over_r);

  double lowest() const { return lowest_; }    ///< K; 0 for a constant cp
  double highest() const { return highest_; }  ///< K; infinite for a constant cp

  /// cp/R, its slope (1/K), h/R (K) and s/R at T > 0 (K); `log_temperature` is ln T.
  ThermalPoint at(double temperature, double log_temperature) const;

private:
  ThermalPoint inside(double temperature, double log_temperature) const;
  void hold_outside(double low, double high);

  Nasa9Range lower_, upper_;
  double lowest_ = 0.0, join_ = 0.0, highest_ = 0.0;  // K, as published
  struct Held {
    double temperature = 0.0, log_temperature = 0.0;  // K; cp is held beyond
    ThermalPoint point;
  };
  Held low_, high_;
};

/// One range of a transport fit, T in K, result in Pa s or W/(m K):
///   factor * exp(a ln T + b/T + c/T^2) / (1 + d/T + e/T^2)
/// It holds both published shapes in use: the NASA fit ln(value) = A ln T + B/T +
/// C/T^2 + D (R. A. Svehla, NASA TM-4647, 1995) with d = e = 0, and the DIPPR
/// equation 102 (Perry's Chemical Engineers' Handbook, 8th ed. 2008, section 2)
/// with b = c = 0.
struct TransportRange {
  double lowest = 0.0, highest = 0.0;  // K
  double factor = 0.0, a = 0.0, b = 0.0, c = 0.0, d = 0.0, e = 0.0;
};

/// Viscosity or conductivity of a dilute gas for every T > 0.
///
/// Below and above its published range the curve goes on as a power of T with the
/// value and the slope of the limit: positive everywhere, no kink. Where two
/// ranges meet, the upper one is scaled to join the lower.
class TransportCurve {
public:
  /// Ranges in rising order, each beginning where the one before ends; at least one.
  explicit TransportCurve(std::vector<TransportRange> ranges);
  static TransportCurve constant(double value);

  double lowest() const { return ranges_.front().lowest; }   ///< K, of the published range
  double highest() const { return ranges_.back().highest; }  ///< K
  /// The value and its slope at T > 0 (K); `log_temperature` is ln T.
  Slope at(double temperature, double log_temperature) const;

private:
  std::vector<TransportRange> ranges_;
};

}  // namespace gaskettle
