#include "laws/radiation.h"

#include <catch2/catch.hpp>
#include <cmath>
#include <limits>

#include "base/dual.h"

using namespace gaskettle;

namespace {
constexpr double rounding = 1e-13;
}

TEST_CASE("exchange areas have the textbook limits", "[radiation]") {
  // Black surfaces: A1 F12. Large surroundings: e1 A1. Equal plates: A/(1/e1 + 1/e2 - 1).
  CHECK(two_surface_exchange_area(2.0, 1.0, 9.0, 1.0, 0.4) == Approx(0.8).epsilon(rounding));
  CHECK(two_surface_exchange_area(2.0, 0.3, 2e12, 0.5) == Approx(small_body_exchange_area(2.0, 0.3)).epsilon(1e-11));
  CHECK(parallel_plates_exchange_area(2.0, 0.2, 0.7) == Approx(2 / (1 / 0.2 + 1 / 0.7 - 1)).epsilon(rounding));
  const double resistances = (1 - 0.3) / (0.3 * 2) + 1 / (2 * 0.8) + (1 - 0.6) / (0.6 * 5);
  CHECK(two_surface_exchange_area(2.0, 0.3, 5.0, 0.6, 0.8) == Approx(1 / resistances).epsilon(rounding));
}

TEST_CASE("a mirror exchanges nothing, and breaks nothing", "[radiation]") {
  CHECK(two_surface_exchange_area(2.0, 0.0, 5.0, 0.6) == 0.0);
  CHECK(two_surface_exchange_area(2.0, 0.0, 5.0, 0.0) == 0.0);
  CHECK(exchange_areas_in_series(0.0, 3.0) == 0.0);
  CHECK(exchange_areas_in_series(2.0, 3.0) == Approx(1.2).epsilon(rounding));
}

TEST_CASE("a shield of the plates' own emissivity halves the heat", "[radiation]") {
  // Textbook result for N equal shields between equal plates: heat/(N + 1).
  const double gap = parallel_plates_exchange_area(1.0, 0.4, 0.4);
  CHECK(exchange_areas_in_series(gap, gap) == Approx(0.5 * gap).epsilon(rounding));
}

TEST_CASE("radiant heat is zero at equal temperatures with the film's slope", "[radiation]") {
  using D = Dual<2>;
  D hot(350.0), cold(350.0);
  hot.d[0] = 1.0;
  cold.d[1] = 1.0;
  const D heat = radiant_heat<D>(0.7, hot, cold);
  CHECK(heat.v == 0.0);
  const double slope = 4 * stefan_boltzmann * 0.7 * 350.0 * 350.0 * 350.0;
  CHECK(heat.d[0] == Approx(slope).epsilon(rounding));
  CHECK(heat.d[1] == Approx(-slope).epsilon(rounding));
  CHECK(0.7 * radiation_film(350.0, 350.0) == Approx(slope).epsilon(rounding));
}

TEST_CASE("radiant heat is the difference of fourth powers and odd in its surfaces", "[radiation]") {
  const double direct = stefan_boltzmann * 0.7 * (std::pow(900.0, 4) - std::pow(300.0, 4));
  CHECK(radiant_heat(0.7, 900.0, 300.0) == Approx(direct).epsilon(rounding));
  CHECK(radiant_heat(0.7, 300.0, 900.0) == -radiant_heat(0.7, 900.0, 300.0));
  CHECK(0.7 * radiation_film(900.0, 300.0) * 600.0 == Approx(direct).epsilon(rounding));
  // Nearly equal temperatures keep their digits: the factor T1 - T2 is exact here.
  CHECK(radiant_heat(1.0, 300.0 + 0x1p-30, 300.0) ==
        Approx(0x1p-30 * 4 * stefan_boltzmann * 2.7e7).epsilon(1e-11));  // next term of the expansion: 1.5 dT/T
}

TEST_CASE("fire flux: a black flame is radiation plus film, a wall at flame temperature takes none", "[radiation]") {
  CHECK(fire_heat_flux(1000.0, 300.0, 1.0, 0.8, 25.0) ==
        Approx(0.8 * radiant_heat(1.0, 1000.0, 300.0) + 25 * 700).epsilon(rounding));
  CHECK(fire_heat_flux(1000.0, 1000.0, 1.0, 0.8, 25.0) == 0.0);
  const double thin_flame = 0.7 * 0.3 * emissive_power(1000.0) - 0.7 * emissive_power(300.0) + 10 * 700;
  CHECK(fire_heat_flux(1000.0, 300.0, 0.3, 0.7, 10.0) == Approx(thin_flame).epsilon(rounding));
}

TEST_CASE("fire curves start at 20 degC", "[radiation]") {
  CHECK(standard_fire_temperature(0.0) == 293.15);
  CHECK(hydrocarbon_fire_temperature(0.0) == Approx(293.15).margin(1e-9));        // 1 - 0.325 - 0.675 in doubles
  CHECK(hydrocarbon_fire_temperature(1e6) == Approx(1373.15).epsilon(rounding));  // plateau at 1100 degC
}

TEST_CASE("an emissivity out of range is refused with its name", "[radiation]") {
  CHECK_NOTHROW(check_emissivity(0.0, "emissivity"));
  CHECK_NOTHROW(check_emissivity(1.0, "emissivity"));
  CHECK_THROWS_WITH(check_emissivity(1.2, "shell emissivity"), Catch::Contains("shell emissivity"));
  CHECK_THROWS_AS(check_emissivity(-0.1, "emissivity"), std::invalid_argument);
  CHECK_THROWS_AS(check_emissivity(std::numeric_limits<double>::quiet_NaN(), "emissivity"), std::invalid_argument);
}
