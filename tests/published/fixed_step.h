/// Small, plain integrators for checks against closed forms. They share nothing
/// with the program's own steppers, so that an error cannot hide in both.
#pragma once
#include <array>
#include <cmath>
#include <cstddef>

namespace fixed_step {

/// One step h of the classical fourth-order Runge-Kutta method for dy/dt = rate(y).
template <std::size_t N, class Rate>
std::array<double, N> step(const std::array<double, N>& y, double h, const Rate& rate) {
  const auto moved = [&y](const std::array<double, N>& k, double by) {
    auto z = y;
    for (std::size_t i = 0; i < N; ++i) z[i] += by * k[i];
    return z;
  };
  const auto k1 = rate(y), k2 = rate(moved(k1, h / 2)), k3 = rate(moved(k2, h / 2)), k4 = rate(moved(k3, h));
  auto z = y;
  for (std::size_t i = 0; i < N; ++i) z[i] += h / 6 * (k1[i] + 2 * k2[i] + 2 * k3[i] + k4[i]);
  return z;
}

/// The state after `duration` in `steps` equal steps.
template <std::size_t N, class Rate>
std::array<double, N> run(std::array<double, N> y, double duration, int steps, const Rate& rate) {
  for (int i = 0; i < steps; ++i) y = step(y, duration / steps, rate);
  return y;
}

/// Integral of f from a to b by Simpson's rule with n (even) intervals.
template <class F>
double integral(double a, double b, int n, const F& f) {
  const double h = (b - a) / n;
  double sum = f(a) + f(b);
  for (int i = 1; i < n; ++i) sum += (i % 2 ? 4 : 2) * f(a + i * h);
  return sum * h / 3;
}

/// The zero of an f that changes sign once between a and b, by bisection to rounding.
template <class F>
double zero(double a, double b, const F& f) {
  const bool rising = f(a) < 0;
  for (int i = 0; i < 200; ++i) {
    const double middle = 0.5 * (a + b);
    ((f(middle) < 0) == rising ? a : b) = middle;
  }
  return 0.5 * (a + b);
}

}  // namespace fixed_step
