#include "laws/stirring.h"

#include <catch2/catch.hpp>
#include <cmath>

#include "base/dual.h"

using namespace gaskettle;

TEST_CASE("impeller power goes with density, speed cubed and diameter to the fifth", "[stirring]") {
  const double speed = 10.0 * radians_per_revolution;  // 10 rev/s
  CHECK(impeller_power(0.4, 12.0, speed, 0.25) == Approx(0.4 * 12 * 1e3 * std::pow(0.25, 5)).epsilon(1e-14));
  CHECK(impeller_power(0.4, 12.0, -speed, 0.25) == impeller_power(0.4, 12.0, speed, 0.25));
}

TEST_CASE("a stopped stirrer takes no power and has a finite slope", "[stirring]") {
  Dual<1> speed(0.0);
  speed.d[0] = 1.0;
  const auto power = impeller_power<Dual<1>>(0.4, 12.0, speed, 0.25);
  CHECK(power.v == 0.0);
  CHECK(power.d[0] == 0.0);
  CHECK(shaft_power<Dual<1>>(3.0, speed).d[0] == 3.0);
}

TEST_CASE("tip speed, Mach and Reynolds numbers", "[stirring]") {
  const double speed = 25.0 * radians_per_revolution;
  CHECK(impeller_tip_speed(speed, 0.1) == Approx(3.14159265358979 * 25 * 0.1).epsilon(1e-14));  // pi N D
  CHECK(impeller_tip_mach(speed, 0.1, 350.0) == Approx(3.14159265358979 * 2.5 / 350).epsilon(1e-14));
  CHECK(impeller_reynolds(11.2, speed, 0.1, 1.8e-5) == Approx(11.2 * 25 * 0.01 / 1.8e-5).epsilon(1e-14));
}
