// Fire rules: Washington Administrative Code 296-307-41025 (LP-gas containers, from NFPA 58) and API Std 521.
#include <catch2/catch.hpp>
#include <cmath>

#include "laws/relief_capacity.h"

using namespace gaskettle;

TEST_CASE("WAC 296-307-41025: required free air of an LP-gas container", "[relief]") {
  // Printed to three or four digits: 0.2 %.
  CHECK(lp_gas_air_rate_ft3_per_min(20) == Approx(626.0).epsilon(0.002));
  CHECK(lp_gas_air_rate_ft3_per_min(100) == Approx(2340.0).epsilon(0.002));
  CHECK(lp_gas_air_rate_ft3_per_min(1000) == Approx(15470.0).epsilon(0.002));
}

TEST_CASE("API 521: heat into 10 m2 of wetted wall", "[relief]") {
  CHECK(wetted_fire_heat(10.0, 1.0, true) == Approx(285419.57).epsilon(1e-4));
  // The US form, 21 000 and 34 500 F A^0.82 Btu/h with ft2: the SI constants are rounded to three digits.
  const double btu_per_hour = 1055.05585262 / 3600, area_ft2 = 10 / (0.3048 * 0.3048);
  CHECK(wetted_fire_heat(10, 1, true) == Approx(21000 * std::pow(area_ft2, 0.82) * btu_per_hour).epsilon(1e-3));
  CHECK(wetted_fire_heat(10, 1, false) == Approx(34500 * std::pow(area_ft2, 0.82) * btu_per_hour).epsilon(1e-3));
}

TEST_CASE("API 521: a dry vessel of 100 ft2, 200 psia, M 28, wall 1560 degR, gas 600 degR", "[relief]") {
  // The equation evaluated in US units; 1e-4 covers its four-digit constant.
  CHECK(unwetted_fire_flow(0.028, 200 * 6894.757293168361, 100 * 0.3048 * 0.3048, 1560 / 1.8, 600 / 1.8) ==
        Approx(0.45054771).epsilon(1e-4));
}
