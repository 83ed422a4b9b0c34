// Radiation against worked examples of
//   F. P. Incropera, D. P. DeWitt, T. L. Bergman, A. S. Lavine, Fundamentals of Heat and Mass Transfer, 6th ed.
//   Y. A. Cengel, A. J. Ghajar, Heat and Mass Transfer: Fundamentals and Applications, 5th ed.
// The books use sigma = 5.67e-8, this program the CODATA value: 66 parts per million apart, below every tolerance
// here. Long figures are the books' equations evaluated with the books' inputs; prints stand beside them.
#include <array>
#include <catch2/catch.hpp>
#include <cmath>

#include "laws/radiation.h"
#include "published/fixed_step.h"

using namespace gaskettle;

namespace {

constexpr double pi = 3.14159265358979323846;

/// Heat into each m2 of a small body at T: film to gas at T_gas, radiation from surroundings.
double heating(double T, double h, double T_gas, double emissivity, double T_surroundings) {
  return h * (T_gas - T) + radiant_heat(small_body_exchange_area(1.0, emissivity), T_surroundings, T);
}

}  // namespace

TEST_CASE("Incropera 5.2: thermocouple bead in a gas stream inside a hot duct", "[radiation]") {
  const auto flux = [](double T) { return heating(T, 400, 473, 0.9, 673); };
  // Steady: printed 218.7 degC.
  const double steady = fixed_step::zero(473.0, 673.0, flux);
  CHECK(steady == Approx(491.713476).margin(0.05));
  CHECK(steady - 273.0 == Approx(218.7).margin(0.05));
  // From 25 to 217.7 degC. 0.2 %: the end is 1 K below steady, where 66 ppm of sigma make 0.03 % of time.
  const double heat_per_area = 8500 * 400 * 0.0007058823529 / 6;  // rho c V/A of a sphere
  const double time = fixed_step::integral(298, 490.7, 20000, [&](double T) { return heat_per_area / flux(T); });
  CHECK(time == Approx(4.98070935).epsilon(0.002));
}

TEST_CASE("Incropera 5.3: a coated panel is cured, then cooled", "[radiation]") {
  // 3 mm aluminium, both faces: half the thickness for each m2 of face. Printed 124 s and 989 s, from hand steps.
  const double heat_per_area = 2770 * 875 * 0.0015;
  const auto warming = [&](double T) { return heating(T, 40, 448, 0.8, 448) / heat_per_area; };
  const auto cooling = [&](double T) { return heating(T, 10, 298, 0.8, 298) / heat_per_area; };
  const double t_cure = fixed_step::integral(298, 423, 1000, [&](double T) { return 1 / warming(T); });
  CHECK(t_cure == Approx(123.075115).epsilon(0.002));
  CHECK(t_cure == Approx(124.0).epsilon(0.01));
  const auto hot = fixed_step::run<1>(
      {423.0}, 300.0, 3000, [&](const std::array<double, 1>& T) { return std::array<double, 1>{warming(T[0])}; });
  const double t_cool = fixed_step::integral(310, hot[0], 2000, [&](double T) { return -1 / cooling(T); });
  CHECK(t_cure + 300 + t_cool == Approx(986.330299).epsilon(0.003));
  CHECK(t_cure + 300 + t_cool == Approx(989.0).epsilon(0.005));
}

TEST_CASE("Incropera 13.3: heater, absorber and room", "[radiation]") {
  // Three-surface network: radiosities J1, J2 of the gray surfaces, the room black. Printed 77.8 kW into the absorber.
  const double A1F12 = 10 * 0.39, A1F13 = 10 * 0.61, A2F23 = 15 * 0.4067;
  const double E1 = emissive_power(1000.0), E2 = emissive_power(600.0), E3 = emissive_power(300.0);
  const double g1 = 0.9 * 10 / (1 - 0.9), g2 = 0.5 * 15 / (1 - 0.5);
  const double a = g1 + A1F12 + A1F13, b = g2 + A1F12 + A2F23;
  const double r1 = g1 * E1 + A1F13 * E3, r2 = g2 * E2 + A2F23 * E3;
  const double J2 = (a * r2 + A1F12 * r1) / (a * b - A1F12 * A1F12);
  CHECK(g2 * (J2 - E2) == Approx(77843.4588).epsilon(0.005));  // view factors to two digits: 0.5 %
}

TEST_CASE("Incropera 13.4: power through the opening of a black furnace cavity", "[radiation]") {
  const double opening = pi / 4 * 0.075 * 0.075;
  const auto through = [&](double view_factor, double T) {
    return radiant_heat(two_surface_exchange_area(opening, 1.0, 1.0, 1.0, view_factor), T, 300.0);
  };
  // View factor to the bottom 0.056 (two digits): 0.2 %.
  CHECK(through(0.056, 1923.0) + through(1 - 0.056, 1623.0) == Approx(1830.54069).epsilon(0.002));
}

TEST_CASE("Incropera 13.5: a cryogen tube, bare and behind one shield", "[radiation]") {
  // Printed 0.50 and 0.25 W per metre: two digits, 2 %; the same equations to nine digits: 0.2 %.
  const double bare = radiant_heat(concentric_cylinders_exchange_area(0.02, 0.02, 0.05, 0.05), 300.0, 77.0);
  CHECK(bare == Approx(0.498811634).epsilon(0.002));
  CHECK(bare == Approx(0.50).epsilon(0.02));
  const double inner = concentric_cylinders_exchange_area(0.02, 0.02, 0.035, 0.02);
  const double outer = concentric_cylinders_exchange_area(0.035, 0.02, 0.05, 0.05);
  const double shielded = radiant_heat(exchange_areas_in_series(inner, outer), 300.0, 77.0);
  CHECK(shielded == Approx(0.251652716).epsilon(0.002));
  CHECK(shielded == Approx(0.25).epsilon(0.02));
}

TEST_CASE("Stefan-Boltzmann law with the CODATA 2018 constant", "[radiation]") {
  CHECK(emissive_power(400.0) == Approx(1451.61585).epsilon(1e-6));
}

TEST_CASE("long concentric cylinders, 0.4 and 0.6 m, two-surface formula", "[radiation]") {
  const double per_length = radiant_heat(concentric_cylinders_exchange_area(0.4, 0.8, 0.6, 0.3), 500.0, 350.0);
  CHECK(per_length / (pi * 0.4) == Approx(959.907369).epsilon(1e-6));
}

TEST_CASE("Cengel 13-7: parallel plates at 800 and 500 K", "[radiation]") {
  const double flux = radiant_heat(parallel_plates_exchange_area(1.0, 0.2, 0.7), 800.0, 500.0);
  CHECK(flux == Approx(3625.36816).epsilon(0.001));
  CHECK(flux == Approx(3625.0).epsilon(0.001));
}

TEST_CASE("Cengel 13-12: gas temperature behind a thermocouple's reading", "[radiation]") {
  // Reading 650 K, duct wall 400 K, emissivity 0.6, h 80; printed 715 K.
  const double gas = 650.0 + radiant_heat(small_body_exchange_area(1.0, 0.6), 650.0, 400.0) / 80.0;
  CHECK(gas == Approx(715.023383).margin(0.5));
  CHECK(gas == Approx(715.0).margin(0.5));
}
