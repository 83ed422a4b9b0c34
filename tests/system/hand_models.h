// The shipped models once more by hand: what an engineer would put down on one page, in few lines each.
#pragma once
#include <array>
#include <cmath>
#include <cstddef>
#include <functional>
#include <numbers>
#include <vector>

namespace gaskettle::testing {

/// Classical Runge-Kutta of fourth order with a fixed step.
template <std::size_t N>
std::array<double, N> runge_kutta(const std::function<std::array<double, N>(double, const std::array<double, N>&)>& f,
                                  double t, const std::array<double, N>& y, double h) {
  const auto moved = [&](const std::array<double, N>& k, double by) {
    std::array<double, N> z = y;
    for (std::size_t i = 0; i < N; ++i) z[i] += by * k[i];
    return z;
  };
  const auto a = f(t, y), b = f(t + h / 2, moved(a, h / 2)), c = f(t + h / 2, moved(b, h / 2)),
             d = f(t + h, moved(c, h));
  std::array<double, N> z = y;
  for (std::size_t i = 0; i < N; ++i) z[i] += h / 6 * (a[i] + 2 * b[i] + 2 * c[i] + d[i]);
  return z;
}

/// First time at which a quantity of the state rises through zero, linear inside a step; -1 where it does not.
template <std::size_t N>
double first_rise(const std::function<std::array<double, N>(double, const std::array<double, N>&)>& f,
                  std::array<double, N> y, double h, double until,
                  const std::function<double(const std::array<double, N>&)>& quantity) {
  for (long i = 0; static_cast<double>(i) * h < until; ++i) {
    const double t = static_cast<double>(i) * h, before = quantity(y);
    y = runge_kutta<N>(f, t, y, h);
    if (before < 0 && quantity(y) >= 0) return t + h * before / (before - quantity(y));
  }
  return -1;
}

inline double circle(double bore) { return std::numbers::pi / 4 * bore * bore; }

/// Time for a body of one temperature (time constant tau, from T0) to reach T behind a gas of recorded temperature.
inline double body_reaches(const std::vector<double>& t, const std::vector<double>& gas, double T0, double tau,
                           double T) {
  double body = T0;
  for (std::size_t i = 1; i < t.size(); ++i) {
    // Exact for a gas temperature that goes straight from row to row.
    const double h = t[i] - t[i - 1], slope = h > 0 ? (gas[i] - gas[i - 1]) / h : 0, decay = std::exp(-h / tau);
    const double next = gas[i] - slope * tau + (body - gas[i - 1] + slope * tau) * decay;
    if (body < T && next >= T) return t[i - 1] + h * (T - body) / (next - body);
    body = next;
  }
  return -1;
}

}  // namespace gaskettle::testing
