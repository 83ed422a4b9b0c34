#include "solve/initial_step.h"

#include <algorithm>
#include <cmath>

namespace gaskettle {

double weighted_size(int n, const double* v, const double* y, const double* typical, double rtol) {
  double squares = 0;
  for (int i = 0; i < n; ++i) {
    const double ratio = v[i] / (rtol * std::max(typical[i], std::fabs(y[i])));
    squares += ratio * ratio;
  }
  return n > 0 ? std::sqrt(squares / n) : 0;
}

double probe_step(int n, const double* y, const double* rates, const double* typical, double rtol) {
  const double state = weighted_size(n, y, y, typical, rtol), rate = weighted_size(n, rates, y, typical, rtol);
  if (!(rate > 0) || !std::isfinite(rate)) return 1e-6;
  // A state near zero has no size of its own; then its typical size, here 1/rtol, moves by a millionth.
  return std::max(0.01 * state, 1e-6 / rtol) / rate;
}

double initial_step(int n, const double* y, const double* rates, const double* second_derivative, const double* typical,
                    double rtol) {
  const double h0 = probe_step(n, y, rates, typical, rtol);
  const double change =
      std::max(weighted_size(n, rates, y, typical, rtol), weighted_size(n, second_derivative, y, typical, rtol));
  if (!std::isfinite(change)) return h0 * 1e-3;
  if (change <= 1e-15) return std::max(1e-6, h0 * 1e-3);
  return std::min(100 * h0, std::pow(0.01 / change, 1.0 / 5));
}

}  // namespace gaskettle
