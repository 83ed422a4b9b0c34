/// Thermal conductivity of a solid over temperature, from a few tabulated points.
///
/// Between the points runs a monotone piecewise cubic (F. N. Fritsch and R. E. Carlson,
/// "Monotone piecewise cubic interpolation", SIAM J. Numer. Anal. 17, 1980, with the three-point
/// slopes of Fritsch and Butland 1984): no overshoot, and no kink for a step-size controller to stumble
/// over. Two points give a straight line. Beyond the ends the value is held, after a rounding that keeps the slope
/// continuous: it runs on over at most 2 % of the end interval and changes the end value by at most 1 %.
#pragma once
#include <algorithm>
#include <cstddef>
#include <vector>

#include "base/scalar.h"

namespace gaskettle {

class ConductivityTable {
public:
  /// The same conductivity (W/(m K), above zero) at every temperature.
  explicit ConductivityTable(double conductivity);
  /// Points of temperature (K, rising) and conductivity (W/(m K), above zero).
  /// Throws std::invalid_argument where lengths differ, are zero, temperatures do not rise or a value is not above 0.
  ConductivityTable(std::vector<double> temperatures, std::vector<double> conductivities);

  bool constant() const { return temperatures_.size() == 1; }
  /// W/(m K) at a temperature in K; continuous with its slope.
  template <Scalar S>
  S at(const S& temperature) const;

private:
  template <Scalar S>
  static S held_end(const S& beyond, double end, double slope, double width);
  std::vector<double> temperatures_, conductivities_, slopes_;
  double low_width_ = 0.0, high_width_ = 0.0;  // K over which the end slopes die away
};

/// `beyond` >= 0 is the distance past the end; the slope falls linearly to zero over `width`.
template <Scalar S>
S ConductivityTable::held_end(const S& beyond, double end, double slope, double width) {
  if (value(beyond) >= width) return S(end + 0.5 * slope * width + 0.0 * beyond);
  return end + slope * beyond * (1.0 - beyond * (0.5 / width));
}

template <Scalar S>
S ConductivityTable::at(const S& temperature) const {
  const std::size_t last = temperatures_.size() - 1;
  if (last == 0) return S(conductivities_[0]);
  if (value(temperature) <= temperatures_[0])
    return held_end(S(temperatures_[0] - temperature), conductivities_[0], -slopes_[0], low_width_);
  if (value(temperature) >= temperatures_[last])
    return held_end(S(temperature - temperatures_[last]), conductivities_[last], slopes_[last], high_width_);
  std::size_t i = 0;
  while (value(temperature) >= temperatures_[i + 1]) ++i;
  const double width = temperatures_[i + 1] - temperatures_[i];
  const S x = (temperature - temperatures_[i]) / width;
  const double rise = conductivities_[i + 1] - conductivities_[i];
  const double start = slopes_[i] * width, end = slopes_[i + 1] * width;
  // Hermite cubic in Horner form: k_i + x (start + x (3 rise - 2 start - end + x (start + end - 2 rise)))
  return conductivities_[i] + x * (start + x * (3.0 * rise - 2.0 * start - end + x * (start + end - 2.0 * rise)));
}

}  // namespace gaskettle
