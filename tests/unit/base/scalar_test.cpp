// The smooth helpers of rate code, with every scalar.
#include "base/scalar.h"

#include <catch2/catch.hpp>

#include "base/dependency_set.h"
#include "base/dual.h"

using namespace gaskettle;

namespace {
Dual<1> variable(double v) {
  Dual<1> x(v);
  x.d[0] = 1.0;
  return x;
}
}  // namespace

TEST_CASE("parts of a signed flow add up to it, with finite slopes at zero") {
  for (const double v : {-2.5, -1e-300, 0.0, 1e-300, 3.25}) {
    const Dual<1> x = variable(v);
    const Dual<1> forward = positive_part(x);
    const Dual<1> backward = negative_part(x);
    CHECK(forward.v + backward.v == v);
    CHECK(forward.v >= 0);
    CHECK(backward.v <= 0);
    CHECK(forward.d[0] == (v > 0 ? 1.0 : 0.0));
    CHECK(backward.d[0] == (v < 0 ? 1.0 : 0.0));
    CHECK(absolute(x).v == std::abs(v));
    CHECK(absolute(x).d[0] == (v < 0 ? -1.0 : 1.0));
  }
}

TEST_CASE("a part that is zero still depends on its input") {
  const DependencySet x = DependencySet::input(-1.0, 3);
  CHECK(positive_part(x).depends_on(3));
  CHECK(negative_part(DependencySet::input(1.0, 3)).depends_on(3));
  CHECK(power_from_zero(DependencySet::input(0.0, 3), 0.5).depends_on(3));
}

TEST_CASE("whole powers") {
  const Dual<1> x = variable(1.5);
  CHECK(square(x).v == 2.25);
  CHECK(square(x).d[0] == 3.0);
  CHECK(cube(x).v == 3.375);
  CHECK(cube(x).d[0] == 6.75);
  CHECK(fourth_power(x).v == 5.0625);
  CHECK(fourth_power(x).d[0] == 13.5);
}

TEST_CASE("a root starts with a finite slope and is itself above the floor") {
  const double floor = 1e-12;
  CHECK(power_from_zero(variable(0.0), 0.5).v == 0.0);
  CHECK(power_from_zero(variable(0.0), 0.5).d[0] == Approx(1 / std::sqrt(floor)).epsilon(1e-14));
  CHECK(power_from_zero(variable(0.3), 0.5).v == std::pow(0.3, 0.5));
  CHECK(power_from_zero(variable(0.3), 0.5).d[0] == Approx(0.5 / std::sqrt(0.3)).epsilon(1e-14));
  // Continuous where the line meets the curve: one rounding of the power.
  CHECK(power_from_zero(floor, 0.25) == Approx(power_from_zero(floor * (1 + 1e-12), 0.25)).epsilon(1e-11));
}

TEST_CASE("x ln x of an absent species") {
  const double floor = 1e-12;
  CHECK(x_log_x(variable(0.0)).v == 0.0);
  CHECK(std::isfinite(x_log_x(variable(0.0)).d[0]));
  CHECK(x_log_x(0.25) == 0.25 * std::log(0.25));
  CHECK(x_log_x(variable(0.25)).d[0] == Approx(std::log(0.25) + 1).epsilon(1e-14));
  CHECK(x_log_x(floor) == Approx(x_log_x(floor * (1 + 1e-12))).epsilon(1e-11));
}

TEST_CASE("the number types meet the concept") {
  STATIC_REQUIRE(Scalar<double>);
  STATIC_REQUIRE(Scalar<DependencySet>);
  STATIC_REQUIRE(Scalar<Dual<8>>);
  STATIC_REQUIRE_FALSE(Scalar<const char*>);
}
