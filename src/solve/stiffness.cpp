#include "solve/stiffness.h"

#include <algorithm>
#include <cmath>

namespace gaskettle {
namespace {
constexpr double noise_share = 1e-3;  // keeps every direction alive when the largest eigenvalue changes
constexpr double memory = 0.7;
// The explicit pair is stable to h |lambda| = 3.3; below 2 its steps follow accuracy, not stability. Rates that level
// off (flow between nearly equal pressures) let it swing for ever within the tolerance, with an apparent 2.3 to 2.5.
constexpr double easy_speed = 1.5, hard_speed = 2.0;
constexpr int hard_steps = 15, forgiving_steps = 6, most_patience = 640;
}  // namespace

// A fixed sequence: same run, same numbers.
double SpectralEstimate::noise() {
  seed_ = seed_ * 1664525u + 1013904223u;
  return static_cast<double>(seed_ >> 8) / 8388608.0 - 1.0;
}

double SpectralEstimate::update(const Rodas5p& stepper, int n, const double* typical) {
  const double* y = stepper.begin_state();
  const auto weight = [&](int i) { return std::max(typical[i], std::fabs(y[i])); };
  // A state of infinite size is under no error control, and no rate depends on it.
  const auto counts = [&](int i) { return std::isfinite(weight(i)); };
  const bool fresh = direction_.size() != static_cast<std::size_t>(n);
  if (fresh) {
    direction_.resize(n);
    image_.resize(n);
    for (int i = 0; i < n; ++i) direction_[i] = counts(i) ? noise() * weight(i) : 0;
  }
  stepper.multiply_jacobian(direction_.data(), image_.data());
  double before = 0, after = 0;
  for (int i = 0; i < n; ++i) {
    before += std::pow(direction_[i] / weight(i), 2);
    after += std::pow(image_[i] / weight(i), 2);
  }
  const double length = std::sqrt(after);
  double log_ratio = before > 0 && after > 0 ? 0.5 * std::log(after / before) : -700;
  if (!known_) log_size_ = log_ratio;
  log_ratio = std::max(log_ratio, log_size_ - 7);  // one direction that J wipes out is no verdict
  log_size_ = memory * log_size_ + (1 - memory) * log_ratio;
  known_ = true;
  const double scale = length > 0 && std::isfinite(length) ? 1 / length : 0;
  for (int i = 0; i < n; ++i) direction_[i] = counts(i) ? image_[i] * scale + noise_share * noise() * weight(i) : 0;
  return std::exp(log_size_);
}

bool MethodChoice::leave_stiff(double speed) {
  easy_ = speed < easy_speed ? easy_ + 1 : 0;
  if (easy_ < patience_) return false;
  easy_ = 0;
  hard_ = easy_again_ = 0;
  return true;
}

bool MethodChoice::leave_explicit(double speed) {
  if (speed > hard_speed) {
    ++hard_;
    easy_again_ = 0;
  } else if (++easy_again_ >= forgiving_steps) {
    hard_ = 0;
  }
  if (hard_ < hard_steps) return false;
  patience_ = std::min(2 * patience_, most_patience);
  easy_ = hard_ = 0;
  return true;
}

}  // namespace gaskettle
