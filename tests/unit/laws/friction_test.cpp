#include "laws/friction.h"

#include <catch2/catch.hpp>
#include <cmath>
#include <limits>

#include "base/dual.h"

using namespace gaskettle;

TEST_CASE("friction starts at breakaway and settles on Coulomb and viscous", "[friction]") {
  const SlidingFriction seal{40.0, 60.0, 100.0, 0.02};
  CHECK(seal.force(0.0) == 60.0);
  CHECK(seal.force_at_start() == 60.0);
  CHECK(seal.force(0.02) == Approx(40 + 20 * std::exp(-1.0) + 2).epsilon(1e-14));
  CHECK(seal.force(1.0) == 140.0);  // exp(-2500) is zero in doubles
}

TEST_CASE("without a Stribeck velocity the force drops to Coulomb at once", "[friction]") {
  const SlidingFriction seal{40.0, 60.0, 100.0, 0.0};
  CHECK(seal.force(0.0) == 40.0);
  CHECK(seal.force_at_start() == 40.0);
  CHECK(seal.force(0.5) == 90.0);
}

TEST_CASE("the curve goes on smoothly past the turning point", "[friction]") {
  const SlidingFriction seal{40.0, 60.0, 100.0, 0.02};
  using D = Dual<1>;
  const auto at = [&](double v) {
    D speed(v);
    speed.d[0] = 1.0;
    return seal.force(speed);
  };
  CHECK(at(0.0).d[0] == 100.0);  // the bell is flat at zero: only the viscous slope is left
  // Even bell, odd viscous part.
  CHECK(at(-0.001).v == Approx(at(0.001).v - 2 * 100 * 0.001).epsilon(1e-14));
  for (const double v : {-0.01, -1e-9, 0.0, 0.01, 0.03}) {
    const double h = 1e-6;  // central difference: third derivative (about 1e7) h^2/6 and rounding 1e-14/h
    CHECK(at(v).d[0] == Approx((at(v + h).v - at(v - h).v) / (2 * h)).margin(1e-4));
  }
}

TEST_CASE("unusable friction is refused with its name", "[friction]") {
  CHECK_NOTHROW(check_friction({}));
  CHECK_NOTHROW(check_friction({40, 40, 0, 0}));
  CHECK_THROWS_WITH(check_friction({40, 30, 0, 0}), Catch::Contains("breakaway") && Catch::Contains("below"));
  CHECK_THROWS_WITH(check_friction({-1, 30, 0, 0}), Catch::Contains("kinetic"));
  CHECK_THROWS_WITH(check_friction({0, 30, -1, 0}), Catch::Contains("viscous"));
  CHECK_THROWS_WITH(check_friction({0, 30, 0, std::numeric_limits<double>::quiet_NaN()}), Catch::Contains("stribeck"));
}
