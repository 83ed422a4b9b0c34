#include "solve/step_control.h"

#include <algorithm>
#include <cmath>
#include <limits>

namespace gaskettle {
namespace {
constexpr double safety = 0.9;
constexpr double shortest_factor = 0.2, longest_factor = 6.0, failure_factor = 0.25;
constexpr double smallest_error = 1e-10;  // keeps the powers finite
}  // namespace

void StepControl::restart() {
  previous_error_ = 1e-4;
  rejected_ = false;
}

double StepControl::after_accepted(double h, double error) {
  const double e = std::max(error, smallest_error);
  const double plain = safety * std::pow(e, -1.0 / 5);
  const double damped = safety * std::pow(e, -0.7 / 5) * std::pow(previous_error_, 0.4 / 5);
  double factor = std::clamp(std::min(plain, damped), shortest_factor, longest_factor);
  if (rejected_) factor = std::min(factor, 1.0);
  previous_error_ = std::max(error, 1e-4);
  rejected_ = false;
  return h * factor;
}

double StepControl::after_rejected(double h, double error) {
  rejected_ = true;
  if (!std::isfinite(error)) return h * shortest_factor;
  return h * std::clamp(safety * std::pow(error, -1.0 / 5), shortest_factor, safety);
}

double StepControl::after_failure(double h) {
  rejected_ = true;
  return h * failure_factor;
}

double smallest_step(double t, double run_length) {
  return 16 * std::numeric_limits<double>::epsilon() * std::fabs(t) + 1e-20 * run_length;
}

double step_end(double t, double h, double limit) {
  const double left = limit - t;
  if (1.02 * h >= left) return limit;
  if (2 * h > left) return t + 0.5 * left;
  return t + h;
}

}  // namespace gaskettle
