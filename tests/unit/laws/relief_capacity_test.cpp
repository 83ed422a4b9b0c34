#include "laws/relief_capacity.h"

#include <catch2/catch.hpp>
#include <cmath>

#include "laws/nozzle.h"

using namespace gaskettle;

namespace {
const ReliefGas nitrogen{300.0, 0.0280134, 1.4, 1.0};
}

TEST_CASE("relief capacity is the nozzle law with the certified coefficient", "[relief_capacity]") {
  const double R = relief_molar_gas_constant / 0.0280134;
  // Outside the band of the regularised law the two are the same equation: rounding only.
  for (const double p2 : {0.0, 1e5, 6e5, 8.5e5})
    CHECK(relief_capacity(0.9, 1e-4, 9e5, p2, nitrogen) ==
          Approx(0.9e-4 * nozzle_flux(9e5, 300.0, R, 1.4, p2, 1e-5)).epsilon(1e-12));
  CHECK(relief_capacity(0.9, 1e-4, 9e5, 9e5, nitrogen) == 0.0);
}

TEST_CASE("the required area passes the flow it was asked for", "[relief_capacity]") {
  for (const double p2 : {1e5, 8e5}) {
    const double area = required_relief_area(0.5, 0.975, 9e5, p2, nitrogen);
    CHECK(relief_capacity(0.975, area, 9e5, p2, nitrogen) == Approx(0.5).epsilon(1e-14));
  }
}

TEST_CASE("ISO 4126 and API 520 constants give the same flow as the SI equation", "[relief_capacity]") {
  const double M = 28.0134, T = 300.0, k = 1.4, A_mm2 = 100.0, p_bar = 9.0, K = 0.9;
  const double flow_kg_h = 3600 * relief_capacity(K, A_mm2 * 1e-6, p_bar * 1e5, 1e5, nitrogen);
  CHECK(p_bar * iso4126_constant(k) * A_mm2 * K * std::sqrt(M / T) == Approx(flow_kg_h).epsilon(1e-12));
  const double v0 = relief_molar_gas_constant * T / (M * 1e-3) / (p_bar * 1e5);
  CHECK(iso4126_specific_volume_factor() * iso4126_constant(k) * A_mm2 * K * std::sqrt(p_bar / v0) ==
        Approx(flow_kg_h).epsilon(1e-12));
  CHECK(flow_kg_h / (api520_constant_si(k) * K * p_bar * 100) * std::sqrt(T / M) == Approx(A_mm2).epsilon(1e-12));
  // US units; the standard rounds 519.45 to 520, 0.11 %.
  const double area_in2 =
      flow_kg_h / 0.45359237 / (api520_constant_us(k) * K * p_bar * 1e5 / 6894.757) * std::sqrt(T * 1.8 / M);
  CHECK(area_in2 * 645.16 == Approx(A_mm2).epsilon(1.2e-3));
}

TEST_CASE("API 520's subcritical area with F2 is the same equation", "[relief_capacity]") {
  // A = 17.9 W/(F2 K) sqrt(Z T/(M p1 (p1 - p2))), kg/h, kPa: 17.9 is 17.910 rounded, 0.06 %.
  const double F2 = subcritical_factor_f2(1.4, 8.0 / 9.0);
  const double area = 17.9 * 1800 / (F2 * 0.9) * std::sqrt(300 / (28.0134 * 900 * 100));
  CHECK(area == Approx(1e6 * required_relief_area(0.5, 0.9, 9e5, 8e5, nitrogen)).epsilon(1e-3));
  CHECK(subcritical_factor_f2(1.4, 1 - 1e-9) == Approx(1.0).margin(1e-6));  // small drops: incompressible
}

TEST_CASE("back pressure leaves choked flow alone", "[relief_capacity]") {
  CHECK(back_pressure_capacity_factor(1.4, 0.0) == 1.0);
  CHECK(back_pressure_capacity_factor(1.4, 0.528) == 1.0);
  CHECK(back_pressure_capacity_factor(1.4, 0.9) < 1.0);
  CHECK(back_pressure_capacity_factor(1.4, 1.0) == 0.0);
}

TEST_CASE("the smallest letter that is large enough", "[relief_capacity]") {
  CHECK(smallest_letter_orifice(letter_orifice_area('J')) == 'J');
  CHECK(smallest_letter_orifice(letter_orifice_area('J') * 1.0001) == 'K');
  CHECK(smallest_letter_orifice(1e-9) == 'D');
  CHECK_THROWS_WITH(smallest_letter_orifice(0.02), Catch::Contains("several valves"));
  CHECK_THROWS_WITH(letter_orifice_area('I'), Catch::Contains("D E F G H J"));
}

TEST_CASE("fire rules scale as stated", "[relief_capacity]") {
  CHECK(wetted_fire_heat(1.0, 0.3, true) == Approx(0.3 * 43200).epsilon(1e-14));
  CHECK(wetted_fire_heat(1.0, 1.0, false) == 70900.0);
  // Flow goes with the square root of pressure and molar mass, and with the area.
  const double one = unwetted_fire_flow(0.028, 1e6, 10, 866.0, 400.0);
  CHECK(unwetted_fire_flow(0.028, 4e6, 10, 866.0, 400.0) == Approx(2 * one).epsilon(1e-14));
  CHECK(unwetted_fire_flow(0.007, 1e6, 40, 866.0, 400.0) == Approx(2 * one).epsilon(1e-14));
}

TEST_CASE("impossible relief inputs are refused by name", "[relief_capacity]") {
  using Catch::Contains;
  CHECK_THROWS_WITH(relief_capacity(0, 1e-4, 9e5, 1e5, nitrogen), Contains("discharge coefficient"));
  CHECK_THROWS_WITH(relief_capacity(0.9, -1, 9e5, 1e5, nitrogen), Contains("flow area"));
  CHECK_THROWS_WITH(relief_capacity(0.9, 1e-4, 9e5, 10e5, nitrogen), Contains("back pressure"));
  CHECK_THROWS_WITH(relief_capacity(0.9, 1e-4, 9e5, 1e5, {0, 0.028, 1.4, 1}), Contains("temperature"));
  CHECK_THROWS_WITH(relief_capacity(0.9, 1e-4, 9e5, 1e5, {300, 0.028, 0.9, 1}), Contains("isentropic exponent"));
  CHECK_THROWS_WITH(required_relief_area(1, 0.9, 9e5, 9e5, nitrogen), Contains("back pressure"));
  CHECK_THROWS_WITH(reseat_pressure(7e5, 0.0, 1e5), Contains("blowdown"));
  CHECK_THROWS_WITH(relieving_pressure(-7e5, 0.1, 1e5), Contains("set pressure"));
  CHECK_THROWS_WITH(unwetted_fire_flow(0.028, 1e6, 10, 400, 400), Contains("wall temperature"));
}
