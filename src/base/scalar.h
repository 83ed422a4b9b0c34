/// What every number type of the rate code offers.
///
/// Rate code is written once, templated on its scalar, and runs with `double`
/// (values), `Dual<K>` (exact derivatives) and `DependencySet` (which states a
/// result depends on). Inside such code call `log`, `exp`, `sqrt`, `pow`, `sin`,
/// `cos`, `tanh` unqualified after `using std::log;` and so on, and take the
/// plain value with `value(x)`, only to choose a branch.
#pragma once
#include <cmath>
#include <concepts>

namespace gaskettle {

/// The plain value of a number; overloaded beside each number type.
inline constexpr double value(double x) { return x; }

template <class S>
concept Scalar = std::copy_constructible<S> && requires(S a, S b, double c) {
  S(c);
  {a + b};
  {a - b};
  {a * b};
  {a / b};
  {a + c};
  {c * a};
  {-a};
  { value(a) } -> std::convertible_to<double>;
};

/// |x|, with derivative +1 at zero.
template <Scalar S>
S absolute(const S& x) {
  return value(x) < 0 ? S(-x) : x;
}
/// max(x, 0): the part of a flow that goes forward. Its derivative at 0 is 0.
template <Scalar S>
S positive_part(const S& x) {
  return value(x) > 0 ? x : S(0.0 * x);
}
/// min(x, 0): the part of a flow that goes backward. Its derivative at 0 is 0.
template <Scalar S>
S negative_part(const S& x) {
  return value(x) < 0 ? x : S(0.0 * x);
}
template <Scalar S>
S square(const S& x) {
  return x * x;
}
template <Scalar S>
S cube(const S& x) {
  return x * x * x;
}
template <Scalar S>
S fourth_power(const S& x) {
  return square(square(x));
}

/// x^p for x >= 0 and p > 0 with a finite derivative at zero: below `floor` the
/// curve goes on as the straight line through the origin and (floor, floor^p).
/// The jump in slope there is invisible for a `floor` below all physical values.
template <Scalar S>
S power_from_zero(const S& x, double p, double floor = 1e-12) {
  using std::pow;
  if (value(x) > floor) return pow(x, p);
  return x * std::pow(floor, p - 1.0);
}

/// x ln(x) for x >= 0, continued by a straight line below `floor` (finite slope).
template <Scalar S>
S x_log_x(const S& x, double floor = 1e-12) {
  using std::log;
  if (value(x) > floor) return x * log(x);
  return x * std::log(floor);
}

}  // namespace gaskettle
