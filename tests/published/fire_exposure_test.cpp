// Fire exposure of a dry wall: EN 1991-1-2:2002 (eq. 3.4 and 3.6, heat flux 3.1) and the analytical method of API
// Std 521 (6th ed. and later), which has the same form. Values are the printed equations evaluated: 1e-4 or better.
#include <catch2/catch.hpp>

#include "laws/radiation.h"

using namespace gaskettle;

TEST_CASE("EN 1991-1-2: fire curves after 30 minutes", "[fire]") {
  CHECK(standard_fire_temperature(1800.0) - 273.15 == Approx(841.79588).epsilon(1e-4));
  CHECK(hydrocarbon_fire_temperature(1800.0) - 273.15 == Approx(1097.65851).epsilon(1e-4));
}

TEST_CASE("API 521 and EN 1991-1-2: flux into a cold wall from a fire at 800 degC", "[fire]") {
  CHECK(fire_heat_flux(1073.15, 293.15, 1.0, 0.8, 25.0) == Approx(79329.9211).epsilon(1e-6));
}
