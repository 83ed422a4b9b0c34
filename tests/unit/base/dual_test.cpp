// Derivatives of dual numbers against closed forms.
#include "base/dual.h"

#include <catch2/catch.hpp>

using namespace gaskettle;

namespace {

using Two = Dual<2>;

/// x with derivative (1, 0), y with derivative (0, 1).
Two independent(double v, std::size_t which) {
  Two r(v);
  r.d[which] = 1.0;
  return r;
}

// Each derivative is a handful of products: some units in the last place.
constexpr double rounding = 1e-14;

void check(const Two& f, double v, double dx, double dy) {
  CHECK(f.v == Approx(v).epsilon(rounding).margin(0));
  CHECK(f.d[0] == Approx(dx).epsilon(rounding).margin(1e-300));
  CHECK(f.d[1] == Approx(dy).epsilon(rounding).margin(1e-300));
}

}  // namespace

TEST_CASE("arithmetic follows the rules of sums, products and quotients") {
  const Two x = independent(1.7, 0);
  const Two y = independent(-0.6, 1);
  check(x + y, 1.1, 1, 1);
  check(x - y, 2.3, 1, -1);
  check(x * y, 1.7 * -0.6, -0.6, 1.7);
  check(x / y, 1.7 / -0.6, 1 / -0.6, -1.7 / 0.36);
  check(-x, -1.7, -1, 0);
  check(3.0 + x, 4.7, 1, 0);
  check(x + 3.0, 4.7, 1, 0);
  check(3.0 - x, 1.3, -1, 0);
  check(x - 3.0, -1.3, 1, 0);
  check(3.0 * y, -1.8, 0, 3);
  check(y * 3.0, -1.8, 0, 3);
  check(y / 3.0, -0.2, 0, 1.0 / 3);
  check(3.0 / y, -5.0, 0, -3.0 / 0.36);
}

TEST_CASE("compound assignment also with itself on the right") {
  Two x = independent(1.7, 0);
  x *= x;
  check(x, 1.7 * 1.7, 3.4, 0);
  Two y = independent(1.7, 0);
  y /= y;
  CHECK(y.v == 1.0);
  CHECK(y.d[0] == Approx(0).margin(1e-16));
  Two z = independent(1.7, 0);
  z += z;
  check(z, 3.4, 2, 0);
  z -= independent(0.4, 1);
  check(z, 3.0, 2, -1);
}

TEST_CASE("functions have their textbook slopes") {
  const double v = 0.83;
  const Two x = independent(v, 0);
  check(log(x), std::log(v), 1 / v, 0);
  check(exp(x), std::exp(v), std::exp(v), 0);
  check(sqrt(x), std::sqrt(v), 0.5 / std::sqrt(v), 0);
  check(pow(x, 1.4), std::pow(v, 1.4), 1.4 * std::pow(v, 0.4), 0);
  check(pow(x, -2.0), std::pow(v, -2.0), -2 * std::pow(v, -3.0), 0);
  check(sin(x), std::sin(v), std::cos(v), 0);
  check(cos(x), std::cos(v), -std::sin(v), 0);
  check(tanh(x), std::tanh(v), 1 / (std::cosh(v) * std::cosh(v)), 0);
  const Two p = independent(1.4, 1);
  check(pow(x, p), std::pow(v, 1.4), 1.4 * std::pow(v, 0.4), std::pow(v, 1.4) * std::log(v));
}

TEST_CASE("a long chain agrees with differences of growing fineness") {
  const auto f = [](const auto& x, const auto& y) {
    using std::exp;
    using std::log;
    using std::sqrt;
    using std::tanh;
    return tanh(x * y) * exp(-x) + log(1.0 + y * y) / sqrt(x + 2.0);
  };
  const double x = 0.9;
  const double y = 1.3;
  const Two dual = f(independent(x, 0), independent(y, 1));
  CHECK(dual.v == Approx(f(x, y)).epsilon(rounding));
  // Central differences: error h^2 f'''/6 with f''' of order one, plus rounding 1e-16 / h.
  const double h = 1e-5;
  const double tolerance = h * h + 1e-16 / h;
  CHECK(dual.d[0] == Approx((f(x + h, y) - f(x - h, y)) / (2 * h)).margin(3 * tolerance));
  CHECK(dual.d[1] == Approx((f(x, y + h) - f(x, y - h)) / (2 * h)).margin(3 * tolerance));
}

TEST_CASE("a constant has no derivative") {
  const Dual<3> c(4.2);
  for (const double d : c.d) CHECK(d == 0.0);
  CHECK(value(c) == 4.2);
  STATIC_REQUIRE(Scalar<Dual<3>>);
}
