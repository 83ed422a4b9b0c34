/// Forward-mode dual numbers: a value and K directional derivatives.
///
/// Arithmetic follows the chain rule exactly, so a Jacobian taken through the
/// rate code has no truncation error. K columns are carried at once.
#pragma once
#include <array>

#include "base/scalar.h"

namespace gaskettle {

template <int K>
struct Dual {
  double v = 0.0;
  std::array<double, K> d{};

  Dual() = default;
  Dual(double x) : v(x) {}  // a constant: all derivatives zero

  Dual& operator+=(const Dual& b) {
    v += b.v;
    for (int k = 0; k < K; ++k) d[k] += b.d[k];
    return *this;
  }
  Dual& operator-=(const Dual& b) {
    v -= b.v;
    for (int k = 0; k < K; ++k) d[k] -= b.d[k];
    return *this;
  }
  Dual& operator*=(const Dual& b) { return *this = *this * b; }
  Dual& operator/=(const Dual& b) { return *this = *this / b; }

  friend Dual operator+(Dual a, const Dual& b) { return a += b; }
  friend Dual operator-(Dual a, const Dual& b) { return a -= b; }
  friend Dual operator-(const Dual& a) { return chain(a, -a.v, -1.0); }
  friend Dual operator*(const Dual& a, const Dual& b) {
    Dual r;
    r.v = a.v * b.v;
    for (int k = 0; k < K; ++k) r.d[k] = a.v * b.d[k] + b.v * a.d[k];
    return r;
  }
  friend Dual operator/(const Dual& a, const Dual& b) {
    Dual r;
    r.v = a.v / b.v;
    const double inverse = 1.0 / b.v;
    for (int k = 0; k < K; ++k) r.d[k] = (a.d[k] - r.v * b.d[k]) * inverse;
    return r;
  }
  friend Dual operator+(Dual a, double b) {
    a.v += b;
    return a;
  }
  friend Dual operator+(double a, Dual b) {
    b.v += a;
    return b;
  }
  friend Dual operator-(Dual a, double b) {
    a.v -= b;
    return a;
  }
  friend Dual operator-(double a, const Dual& b) { return chain(b, a - b.v, -1.0); }
  friend Dual operator*(const Dual& a, double b) { return chain(a, a.v * b, b); }
  friend Dual operator*(double a, const Dual& b) { return chain(b, a * b.v, a); }
  friend Dual operator/(const Dual& a, double b) { return chain(a, a.v / b, 1.0 / b); }
  friend Dual operator/(double a, const Dual& b) { return chain(b, a / b.v, -a / (b.v * b.v)); }

  /// f(a) where the value of f and its slope at a are known.
  static Dual chain(const Dual& a, double f, double slope) {
    Dual r;
    r.v = f;
    for (int k = 0; k < K; ++k) r.d[k] = slope * a.d[k];
    return r;
  }
};

template <int K>
double value(const Dual<K>& x) {
  return x.v;
}
template <int K>
Dual<K> log(const Dual<K>& a) {
  return Dual<K>::chain(a, std::log(a.v), 1.0 / a.v);
}
template <int K>
Dual<K> exp(const Dual<K>& a) {
  const double e = std::exp(a.v);
  return Dual<K>::chain(a, e, e);
}
template <int K>
Dual<K> sqrt(const Dual<K>& a) {
  const double r = std::sqrt(a.v);
  return Dual<K>::chain(a, r, 0.5 / r);
}
template <int K>
Dual<K> pow(const Dual<K>& a, double p) {
  const double r = std::pow(a.v, p);
  return Dual<K>::chain(a, r, p * r / a.v);
}
template <int K>
Dual<K> pow(const Dual<K>& a, const Dual<K>& p) {
  return exp(log(a) * p);
}
template <int K>
Dual<K> sin(const Dual<K>& a) {
  return Dual<K>::chain(a, std::sin(a.v), std::cos(a.v));
}
template <int K>
Dual<K> cos(const Dual<K>& a) {
  return Dual<K>::chain(a, std::cos(a.v), -std::sin(a.v));
}
template <int K>
Dual<K> tanh(const Dual<K>& a) {
  const double r = std::tanh(a.v);
  return Dual<K>::chain(a, r, 1.0 - r * r);
}

}  // namespace gaskettle
