#include "laws/conductivity_table.h"

#include <cmath>
#include <stdexcept>
#include <utility>

namespace gaskettle {
namespace {

/// Slope at the middle of three points that keeps the curve monotone (Fritsch and Butland 1984).
double inner_slope(double width_before, double slope_before, double width_after, double slope_after) {
  if (slope_before * slope_after <= 0) return 0.0;
  const double weight_before = 2.0 * width_after + width_before;
  const double weight_after = width_after + 2.0 * width_before;
  return (weight_before + weight_after) / (weight_before / slope_before + weight_after / slope_after);
}

/// One-sided three-point slope at an end, limited so that the end interval stays monotone.
double end_slope(double width, double slope, double next_width, double next_slope) {
  const double raw = ((2.0 * width + next_width) * slope - width * next_slope) / (width + next_width);
  if (raw * slope <= 0) return 0.0;
  if (slope * next_slope <= 0 && std::abs(raw) > 3.0 * std::abs(slope)) return 3.0 * slope;
  return raw;
}

/// Width over which the curve levels off beyond an end: see the header.
double levelling_width(double interval, double end_value, double slope) {
  const double by_interval = 0.02 * interval;
  return slope == 0.0 ? by_interval : std::min(by_interval, 0.02 * end_value / std::abs(slope));
}

}  // namespace

ConductivityTable::ConductivityTable(double conductivity) : ConductivityTable({300.0}, {conductivity}) {}

ConductivityTable::ConductivityTable(std::vector<double> temperatures, std::vector<double> conductivities)
    : temperatures_(std::move(temperatures)), conductivities_(std::move(conductivities)) {
  const std::size_t n = temperatures_.size();
  if (n == 0 || n != conductivities_.size())
    throw std::invalid_argument("a conductivity table needs as many conductivities as temperatures, and at least one");
  for (std::size_t i = 0; i < n; ++i) {
    if (!(conductivities_[i] > 0)) throw std::invalid_argument("conductivities must be above 0 W/(m K)");
    if (i > 0 && !(temperatures_[i] > temperatures_[i - 1]))
      throw std::invalid_argument("the temperatures of a conductivity table must rise from one point to the next");
  }
  slopes_.assign(n, 0.0);
  if (n == 1) return;
  const auto width = [&](std::size_t i) { return temperatures_[i + 1] - temperatures_[i]; };
  const auto slope = [&](std::size_t i) { return (conductivities_[i + 1] - conductivities_[i]) / width(i); };
  if (n == 2) {
    slopes_[0] = slopes_[1] = slope(0);
  } else {
    slopes_[0] = end_slope(width(0), slope(0), width(1), slope(1));
    slopes_[n - 1] = end_slope(width(n - 2), slope(n - 2), width(n - 3), slope(n - 3));
    for (std::size_t i = 1; i + 1 < n; ++i) slopes_[i] = inner_slope(width(i - 1), slope(i - 1), width(i), slope(i));
  }
  low_width_ = levelling_width(width(0), conductivities_[0], slopes_[0]);
  high_width_ = levelling_width(width(n - 2), conductivities_[n - 1], slopes_[n - 1]);
}

}  // namespace gaskettle
