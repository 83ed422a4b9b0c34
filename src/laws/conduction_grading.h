/// How node distances grow through a layered wall.
#pragma once
#include <algorithm>
#include <cmath>
#include <numeric>
#include <vector>

#include "laws/conduction_grid.h"

namespace gaskettle {

/// Where nodes are wanted: depth is measured as x / sqrt(diffusivity) (unit s^(1/2)), so that a disturbance spreads
/// alike in every layer; spacings grow in proportion to (distance from the driven face + start).
class Grading {
public:
  Grading(const WallSpec& wall, double start, bool from_inside, bool from_outside)
      : from_inside_(from_inside), from_outside_(from_outside) {
    for (const WallLayer& layer : wall.layers) {
      const double root = std::sqrt(layer.conductivity / (layer.density * layer.specific_heat));
      thickness_.push_back(layer.thickness);
      bounds_.push_back(bounds_.back() + layer.thickness / root);
    }
    start_ = std::max(start, 1e-8 * bounds_.back());  // rounding must leave the smallest spacing above 0
  }

  /// Spacings wanted in a layer, times the relative size step: integral of 1 / (distance + start).
  double demand(std::size_t layer) const { return count_to(bounds_[layer + 1]) - count_to(bounds_[layer]); }

  /// n spacings in a layer, in m.
  std::vector<double> spacings(std::size_t layer, int n) const {
    const double low = count_to(bounds_[layer]), high = count_to(bounds_[layer + 1]);
    std::vector<double> widths;
    double from = bounds_[layer];
    for (int i = 1; i <= n; ++i) {
      const double to = i == n ? bounds_[layer + 1] : depth_at(low + (high - low) * i / n);
      widths.push_back(to - from);
      from = to;
    }
    const double scale = thickness_[layer] / std::accumulate(widths.begin(), widths.end(), 0.0);  // takes rounding out
    for (double& width : widths) width *= scale;
    return widths;
  }

private:
  double count_to(double depth) const {
    const double total = bounds_.back();
    if (!from_outside_) return std::log1p(depth / start_);
    if (!from_inside_) return std::log1p(total / start_) - std::log1p((total - depth) / start_);
    const double half = std::log1p(0.5 * total / start_);
    return depth <= 0.5 * total ? std::log1p(depth / start_) : 2.0 * half - std::log1p((total - depth) / start_);
  }
  double depth_at(double count) const {
    const double total = bounds_.back();
    if (!from_outside_) return start_ * std::expm1(count);
    const double whole = count_to(total);
    if (!from_inside_ || count > 0.5 * whole) return total - start_ * std::expm1(whole - count);
    return start_ * std::expm1(count);
  }

  double start_ = 0.0;
  bool from_inside_, from_outside_;
  std::vector<double> thickness_, bounds_{0.0};
};

}  // namespace gaskettle
