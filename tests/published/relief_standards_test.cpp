// Relief capacity against API Std 520 Part I, API Std 526, ISO 4126, the ASME Boiler and Pressure Vessel Code
// (Section VIII Div. 1, Appendix 11), P. Smith and R. W. Zappe, Valve Selection Handbook, table 7-2, and A. Farrell's
// public note on relief sizing (2024). Nine-digit figures are the published formula evaluated with the published
// inputs.
#include <catch2/catch.hpp>
#include <cmath>

#include "laws/nozzle.h"
#include "laws/relief_capacity.h"

using namespace gaskettle;

namespace {

/// API Std 520 Part I, Example 1: hydrocarbon vapour.
const ReliefGas vapour{348.0, 0.051, 1.11, 0.90};
constexpr double rate = 24270.0 / 3600.0;  // kg/s

}  // namespace

TEST_CASE("Valve Selection Handbook, table 7-2: C in US units", "[relief]") {
  // Printed as whole numbers, from the exact 519.45 or the rounded 520: 0.6.
  CHECK(api520_constant_us(1.01) == Approx(317.0).margin(0.6));
  CHECK(api520_constant_us(1.04) == Approx(320.0).margin(0.6));
  CHECK(api520_constant_us(1.08) == Approx(325.0).margin(0.6));
  CHECK(api520_constant_us(1.45) == Approx(360.0).margin(0.6));
  CHECK(api520_constant_us(1.60) == Approx(373.0).margin(0.6));
}

TEST_CASE("a valve maker's table of gas constants: air, propane, natural gas", "[relief]") {
  CHECK(api520_constant_us(1.40) == Approx(356.0).margin(0.6));
  CHECK(api520_constant_us(1.13) == Approx(330.0).margin(0.6));
  CHECK(api520_constant_us(1.27) == Approx(344.0).margin(0.6));
}

TEST_CASE("API 520 Part I, Example 1: critical flow", "[relief]") {
  // 24 270 kg/h at 670 kPa, K 0.975, into the atmosphere: printed 3698 mm2 with C rounded to three digits, 0.2 %.
  const double area = required_relief_area(rate, 0.975, 670e3, 101325.0, vapour);
  CHECK(area == Approx(0.00369904606).epsilon(0.002));
  CHECK(area == Approx(3698e-6).epsilon(0.002));
}

TEST_CASE("API 520 Part I, the same case with 532 kPa at the outlet: subcritical flow", "[relief]") {
  CHECK(subcritical_factor_f2(1.11, 532.0 / 670.0) == Approx(0.854763266).epsilon(1e-4));
  const double area = required_relief_area(rate, 0.975, 670e3, 532e3, vapour);
  CHECK(area == Approx(0.00424835878).epsilon(0.002));
  // Printed 4226 mm2: the standard rounds F2 from 0.8548 to 0.86, 0.6 %.
  CHECK(area == Approx(4226e-6).epsilon(0.006));
}

TEST_CASE("API 520 Part I, the subcritical case in US units", "[relief]") {
  // 53 500 lb/h, 627 degR, 97.2 and 77.2 psia: 6.59 in2 with exact F2; three digits in the inputs, 0.4 %.
  const ReliefGas gas{627.0 / 1.8, 0.051, 1.11, 0.90};
  const double psi = 6894.757293168361;
  const double area = required_relief_area(53500 * 0.45359237 / 3600, 0.975, 97.2 * psi, 77.2 * psi, gas);
  CHECK(area == Approx(0.00425037224).epsilon(0.004));
  CHECK(area / 0.0254 / 0.0254 == Approx(6.59).epsilon(0.004));
}

TEST_CASE("ASME VIII-1 Appendix 11, Example 1: a valve stamped 3020 lb/h of steam, on air at 100 degF", "[relief]") {
  // C = 356 in the code, here 356.06, and the code's answer rounded to 4750 lb/h: 0.1 %.
  const ReliefGas air{560.0 / 1.8, 0.02897, 1.4, 1.0};
  const double flow = capacity_from_steam_rating(3020 * 0.45359237 / 3600, air);
  CHECK(flow == Approx(0.598264435).epsilon(0.001));
  CHECK(flow * 3600 / 0.45359237 == Approx(4750.0).epsilon(0.001));
}

TEST_CASE("ISO 4126: the constants 3.948 and 0.2883, and the back-pressure factor", "[relief]") {
  // The standard prints four digits: 1e-3 against print, rounding against the derivation.
  const double constant = iso4126_constant(1.4) / choked_flow_function(1.4);
  CHECK(constant == Approx(3.948).epsilon(1e-3));
  CHECK(constant == Approx(3.94807513).epsilon(1e-8));
  CHECK(iso4126_specific_volume_factor() == Approx(0.2883).epsilon(1e-3));
  CHECK(iso4126_specific_volume_factor() == Approx(0.288348099).epsilon(1e-8));
  CHECK(back_pressure_capacity_factor(1.4, 0.8) == Approx(0.818804239).epsilon(1e-6));
}

TEST_CASE("ISO 4126 and API 520: relieving and reseating pressure count from the gauge set", "[relief]") {
  // 7 bar gauge, 10 % overpressure, 7 % blowdown: definitions, exact to rounding.
  CHECK(relieving_pressure(7e5, 0.10, 101325.0) == Approx(871325.0).epsilon(1e-9));
  CHECK(reseat_pressure(7e5, 0.07, 101325.0) == Approx(752325.0).epsilon(1e-9));
}

TEST_CASE("API 520: nitrogen through 1 cm2 at 7 bar gauge and 10 %", "[relief]") {
  const ReliefGas nitrogen{300.0, 0.0280134, 1.4, 1.0};
  const double p1 = relieving_pressure(7e5, 0.10, 101325.0);
  CHECK(relief_capacity(0.975, 1e-4, p1, 101325.0, nitrogen) == Approx(0.194944175).epsilon(1e-4));
}

TEST_CASE("API 526: effective areas of letters", "[relief]") {
  // Exact conversion of the printed square inches.
  CHECK(letter_orifice_area('D') == Approx(7.09676e-05).epsilon(1e-6));
  CHECK(letter_orifice_area('H') == Approx(0.0005064506).epsilon(1e-6));
  CHECK(letter_orifice_area('T') == Approx(0.01677416).epsilon(1e-6));
  // Example 1's choices: 3698 mm2 takes P, the subcritical case takes Q.
  CHECK(smallest_letter_orifice(3698e-6) == 'P');
  CHECK(smallest_letter_orifice(4226e-6) == 'Q');
}

TEST_CASE("Farrell (2024): ethane as an ideal gas from 200 bar, 400 K", "[relief]") {
  // Printed 38 359 kg/(m2 s), throat at 115 bar; k has four digits: 0.1 %.
  const ReliefGas ethane{400.0, 0.030069, 1.146, 1.0};
  const double flux = relief_capacity(1.0, 1.0, 2e7, 101325.0, ethane);
  CHECK(flux == Approx(38357.2719).epsilon(0.001));
  CHECK(flux == Approx(38359.0).epsilon(0.001));
  CHECK(200 * critical_ratio(1.146) == Approx(115.0).margin(0.1));
}
