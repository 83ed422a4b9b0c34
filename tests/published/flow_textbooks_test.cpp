// Nozzle flow against worked examples of
//   Y. A. Cengel, J. M. Cimbala, Fluid Mechanics: Fundamentals and Applications, chapter 12
//   R. T. Balmer, Modern Engineering Thermodynamics, chapters 6 and 16.
// Where a book's print is known it stands beside the check; the closer figure is the book's closed form evaluated
// with the book's inputs to nine digits. Such a form has no error but rounding: 1e-6 leaves room for rounded inputs.
#include <catch2/catch.hpp>
#include <cmath>

#include "laws/nozzle.h"
#include "published/fixed_step.h"

using namespace gaskettle;

namespace {

constexpr double pi = 3.14159265358979323846;
constexpr double band = smallest_pressure_band;
constexpr double closed_form = 1e-6;
constexpr double air = 287.0;

double disc(double diameter) { return pi / 4 * diameter * diameter; }

}  // namespace

TEST_CASE("critical ratio and choked flow function, closed forms", "[flow]") {
  CHECK(critical_ratio(1.4) == Approx(0.528281788).epsilon(closed_form));
  CHECK(critical_ratio(1.3) == Approx(0.545727734).epsilon(closed_form));
  CHECK(critical_ratio(5.0 / 3.0) == Approx(0.48713929).epsilon(closed_form));
  CHECK(choked_flow_function(1.4) == Approx(0.684731456).epsilon(closed_form));
}

TEST_CASE("Cengel & Cimbala: carbon dioxide through a nozzle, throat conditions", "[flow]") {
  // Examples 12-3 and 12-4: 1.4 MPa, 473 K, k 1.289; printed 767 kPa and 413 K.
  CHECK(1.4e6 * critical_ratio(1.289) == Approx(766812.902).epsilon(closed_form));
  // From p and T along an isentrope, so that the critical ratio itself is on trial.
  CHECK(473.0 * std::pow(critical_ratio(1.289), 0.289 / 1.289) == Approx(413.280909).epsilon(closed_form));
}

TEST_CASE("Cengel & Cimbala: air in a converging nozzle, 50 cm2, inlet at 150 m/s", "[flow]") {
  // 1 MPa, 873 K, cp 1005, k 1.4; 6.785 and 7.106 kg/s with the inputs as stated. 0.3 %: the book works with table
  // values of three to four digits.
  const double T0 = 873.0 + 150.0 * 150.0 / (2 * 1005.0);
  const double p0 = 1e6 * std::pow(T0 / 873.0, 3.5);
  CHECK(0.005 * nozzle_flux(p0, T0, air, 1.4, 0.7e6, band) == Approx(6.78497028).epsilon(0.003));
  CHECK(0.005 * nozzle_flux(p0, T0, air, 1.4, 0.4e6, band) == Approx(7.10627839).epsilon(0.003));
}

TEST_CASE("Cengel & Cimbala: leak through a 4 mm hole in a tyre", "[flow]") {
  // 314 kPa absolute, 25 degC, outside 94 kPa; printed 0.554 kg/min, so 0.2 %.
  const double flow = disc(0.004) * nozzle_flux(314e3, 298.0, air, 1.4, 94e3, band);
  CHECK(flow == Approx(0.00923869673).epsilon(0.002));
  CHECK(60 * flow == Approx(0.554).epsilon(0.002));
}

TEST_CASE("Balmer 16.12: choked flow through a 20 mm throat at 7 MPa, 2000 degC", "[flow]") {
  // The book's constant 0.0404 is rounded to three digits (1.863 kg/s): 0.5 %.
  const double flow = disc(0.02) * nozzle_flux(7e6, 2273.15, 286.0, 1.4, 101325.0, band);
  CHECK(flow == Approx(1.86754523).epsilon(0.005));
  CHECK(flow == Approx(1.863).epsilon(0.005));
}

TEST_CASE("Balmer 16.8: a tyre of 1 ft3 empties at constant temperature", "[flow]") {
  // Valve bore 0.0938 in, 50 psia, 70 degF into 14.7 psia. Printed: time constant 31.95 s, unchokes at 13.1 psig
  // after 18.7 s. The book rounds to three digits: 0.2 and 0.3 %.
  const double V = 0.02831684659, A = disc(0.00238252), T = 294.2611111, p0 = 344737.8647, pa = 101352.9322;
  const auto leak = [&](double p) { return A * nozzle_flux(p, T, air, 1.4, pa, band); };
  CHECK(p0 * V / (air * T) / leak(p0) == Approx(31.9193643).epsilon(0.002));
  const double p_unchoked = pa / critical_ratio(1.4);
  CHECK(p_unchoked - pa == Approx(90500.9885).epsilon(0.003));
  // m = p V/(R T): dt = -V/(R T) dp/leak. Simpson on the smooth, choked range: error far below 1e-6.
  const double time = fixed_step::integral(p_unchoked, p0, 1000, [&](double p) { return V / (air * T) / leak(p); });
  CHECK(time == Approx(18.7063454).epsilon(0.003));
}

TEST_CASE("Balmer 6.8: an insulated, evacuated vessel filled from a line at 20 degC", "[flow]") {
  // Printed 137 degC. States: mass, internal energy; the line's pressure is 1 MPa (the answer does not depend on it).
  const double cp = 1.4 / 0.4 * air, cv = cp - air, Ts = 293.15, V = 0.1;
  const auto filling = [&](const std::array<double, 2>& y) {
    const double flow = 1e-5 * nozzle_flux(1e6, Ts, air, 1.4, 0.4 * y[1] / V, band);
    return std::array<double, 2>{flow, flow * cp * Ts};
  };
  const auto end = fixed_step::run<2>({0.0, 0.0}, 20.0, 2000, filling);
  CHECK(end[1] / (end[0] * cv) == Approx(410.41).epsilon(closed_form));
  CHECK(end[1] / (end[0] * cv) - 273.15 == Approx(137.0).margin(0.5));
}
