// Flow laws of standards: ISO 6358-1 (pneumatic components), J. A. Perry's sharp-edged orifice (Trans. ASME 71, 1949,
// 757, as the polynomial used in pneumatics) and ISO 9300:2022 (critical-flow venturi). The values are the published
// formulas evaluated to nine digits.
#include <catch2/catch.hpp>

#include "laws/iso6358.h"
#include "laws/nozzle.h"

using namespace gaskettle;

TEST_CASE("ISO 6358: C 1 dm3/(s bar), b 0.35, 7 bar at 20 degC", "[flow]") {
  const auto flow = [](double p_down) { return iso6358_flow(7e5, 293.15, p_down, 1e-8, 0.35, smallest_pressure_band); };
  CHECK(flow(1e5) == Approx(0.008295).epsilon(1e-6));
  CHECK(flow(5e5) == Approx(0.00686988023).epsilon(1e-6));
}

TEST_CASE("Perry: discharge coefficient of a sharp-edged orifice", "[flow]") {
  // Coefficients are given to four decimals: 1e-4.
  CHECK(sharp_orifice_discharge_coefficient(0.5283) == Approx(0.737363638).epsilon(1e-4));
  CHECK(sharp_orifice_discharge_coefficient(1.0) == Approx(0.6001).epsilon(1e-3));
}

TEST_CASE("ISO 9300: toroidal venturi at a throat Reynolds number of 1e6", "[flow]") {
  CHECK(toroidal_venturi_discharge_coefficient(1e6) == Approx(0.99318).epsilon(1e-6));
}
