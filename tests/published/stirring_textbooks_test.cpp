// Shaft and impeller power against worked examples of
//   Y. A. Cengel, M. A. Boles, Thermodynamics: An Engineering Approach, Example 2-7
//   P. Harriott, Chemical Reactor Design, Example 7.6b
// and a public course problem. Agitation texts count in rev/s; the program in rad/s.
#include <catch2/catch.hpp>

#include "laws/stirring.h"

using namespace gaskettle;

namespace {
double rev_per_s(double n) { return n * radians_per_revolution; }
}  // namespace

TEST_CASE("Cengel & Boles 2-7: 200 N m at 4000 rpm", "[stirring]") {
  CHECK(shaft_power(200.0, rev_per_s(4000.0 / 60)) == Approx(83775.8041).epsilon(0.001));
  CHECK(shaft_power(200.0, rev_per_s(4000.0 / 60)) == Approx(83.8e3).epsilon(0.001));  // printed 83.8 kW
}

TEST_CASE("Harriott 7.6b: turbine of 1.333 m at 120 rpm in water, and with two pitched-blade turbines", "[stirring]") {
  const double turbine = impeller_power(6.0, 1000.0, rev_per_s(2), 1.333);
  CHECK(turbine == Approx(202018.892).epsilon(1e-4));  // diameter to four digits
  CHECK(turbine + 2 * impeller_power(1.7, 1000.0, rev_per_s(2), 1.333) == Approx(316496.264).epsilon(1e-4));
}

TEST_CASE("course problem: Rushton turbine of 0.4 m at 200 rpm in water", "[stirring]") {
  CHECK(impeller_power(5.0, 1000.0, rev_per_s(200.0 / 60), 0.4) == Approx(1896.2963).epsilon(1e-4));
}

TEST_CASE("nitrogen at 10 bar, 300 K, turbine of 0.1 m at 25 rev/s", "[stirring]") {
  CHECK(impeller_power(5.0, 1e6 / (296.8 * 300), rev_per_s(25), 0.1) == Approx(8.77414645).epsilon(1e-4));
}

TEST_CASE("fan laws: twice the speed at half the density takes four times the power", "[stirring]") {
  const double one = impeller_power(0.4, 1.2, 100.0, 0.3);
  CHECK(impeller_power(0.4, 0.6, 200.0, 0.3) / one * 100 == Approx(400.0).epsilon(1e-9));
}
