// Bodies, elements and thermostats in gas, as whole plants, against
//   F. P. Incropera, D. P. DeWitt, T. L. Bergman, A. S. Lavine, Fundamentals of Heat and Mass Transfer, 6th ed.,
//   Examples 5.1, 5.2, 5.3, 5.5
//   Y. A. Cengel, A. J. Ghajar, Heat and Mass Transfer, 5th ed., Examples 4-1, 4-2, 13-12
// and closed forms of one and two lumped nodes. The gas around a body is held at its temperature by a far larger one.
// Closed forms: 1e-7 (nine digits; rtol 1e-10). The books' Stefan-Boltzmann constant is 5.67e-8, the program's is 66
// ppm larger.
#include <catch2/catch.hpp>
#include <cmath>

#include "laws/radiation.h"
#include "published/fixed_step.h"
#include "published/model_text.h"

using namespace gaskettle::testing;
using namespace model_text;

namespace {

constexpr double closed_form = 1e-7;
constexpr double pi = 3.14159265358979323846;

/// A lumped body of these properties in gas at T_gas, among black walls at T_walls, until it reaches T_end.
struct Bead {
  double mass, specific_heat, area, film, emissivity, T_start, T_gas, T_walls, T_end, until;
};

ModelRun heat(const Bead& b) {
  return run_model(book_gas(287, 1004.5) + fill(R"(
gas_spaces: {vessel: {volume: 1000 m3, gas: book_gas, temperature: $T_gas K, pressure: 1 bar abs}}
walls:
  duct:
    around: vessel
    area: 1000 m2
    layers: [{material: {density: 8000 kg/m3, specific_heat: 400 J/kg/K, conductivity: 1e5 W/m/K}, thickness: 1 mm}]
    temperature: $T_walls K
    inside: {film: none, emissivity: 1}
    outside: {film: 1e9 W/m2/K, temperature: $T_walls K}
bodies:
  bath: {in: vessel, mass: 1e9 kg, specific_heat: 1e6 J/kg/K, area: 100 m2, film: 1e9 W/m2/K}
  bead: {in: vessel, mass: $m kg, specific_heat: $c J/kg/K, area: $A m2, film: $h W/m2/K, emissivity: $e, temperature: $T_start K}
targets: {there: {when: bead.temperature, reaches: $T_end K}}
run: {until: $until s, rtol: 1e-10, record_every: $until s}
)",
                                                {{"T_gas", b.T_gas},
                                                 {"T_walls", b.T_walls},
                                                 {"T_start", b.T_start},
                                                 {"T_end", b.T_end},
                                                 {"m", b.mass},
                                                 {"c", b.specific_heat},
                                                 {"A", b.area},
                                                 {"h", b.film},
                                                 {"e", b.emissivity},
                                                 {"until", b.until}}));
}

/// The same by quadrature of dT/rate: C dT/dt = h A (T_gas - T) + e sigma A (T_walls^4 - T^4).
double time_by_quadrature(const Bead& b) {
  return fixed_step::integral(b.T_start, b.T_end, 20000, [&](double T) {
    return b.mass * b.specific_heat / b.area /
           (b.film * (b.T_gas - T) +
            b.emissivity * gaskettle::stefan_boltzmann * (std::pow(b.T_walls, 4) - std::pow(T, 4)));
  });
}

double sphere_area(double D) { return pi * D * D; }
double sphere_volume(double D) { return pi * D * D * D / 6; }

}  // namespace

TEST_CASE("run: Incropera 5.1: thermocouple bead of time constant 1 s comes within 1 K in 5.16 s", "[run][heat]") {
  const double D = 6 * 400.0 / (8500 * 400.0);  // 0.706 mm
  const double mass = 8500 * sphere_volume(D);
  const ModelRun run = heat({mass, 400, sphere_area(D), 400, 0, 298, 473, 473, 472, 10});
  CHECK(reached(run, "there") == Approx(5.16478597).epsilon(closed_form));
  CHECK(reached(run, "there") == Approx(5.2).margin(0.05));  // printed
  // Time constant 1 s: at 1 s it has done 1 - 1/e of its way.
  const ModelRun second = heat({mass, 400, sphere_area(D), 400, 0, 298, 473, 473, 473 - 175 * std::exp(-1.0), 10});
  CHECK(reached(second, "there") == Approx(1).epsilon(closed_form));
}

TEST_CASE("run: Incropera 5.2: the bead in a duct at 400 degC reads 218.7 degC in gas at 200 degC", "[run][heat]") {
  const double D = 0.0007058823529;
  const Bead bead{8500 * sphere_volume(D), 400, sphere_area(D), 400, 0.9, 298, 473, 673, 490.7, 60};
  const ModelRun run = heat(bead);
  CHECK(run.last("bead.temperature") == Approx(491.713476).margin(0.05));   // the row's sigma
  CHECK(run.last("bead.temperature") - 273 == Approx(218.7).margin(0.05));  // printed
  CHECK(reached(run, "there") == Approx(4.98070935).epsilon(0.002));        // within 1 K of the end, sigma counts
  CHECK(reached(run, "there") == Approx(time_by_quadrature(bead)).epsilon(closed_form));
}

TEST_CASE("run: Incropera 5.3: aluminium panel cured in an oven, then cooled", "[run][heat]") {
  // 3 mm thick, both faces, emissivity 0.8: to 150 degC by convection and radiation at 175 degC, 5 min more, then
  // cooled to 37 degC at 25 degC.
  Bead oven{2770 * 0.0015, 875, 1, 40, 0.8, 298, 448, 448, 423, 124};
  const double cured_from = reached(heat(oven), "there");
  CHECK(cured_from == Approx(123.075115).epsilon(0.002));
  CHECK(cured_from == Approx(124).epsilon(0.01));  // printed
  CHECK(cured_from == Approx(time_by_quadrature(oven)).epsilon(closed_form));
  oven.until = cured_from + 300;
  const double hottest = heat(oven).last("bead.temperature");
  const Bead cooling{2770 * 0.0015, 875, 1, 10, 0.8, hottest, 298, 298, 310, 1000};
  const double total = cured_from + 300 + reached(heat(cooling), "there");
  CHECK(total == Approx(986.330299).epsilon(0.003));
  CHECK(total == Approx(989).epsilon(0.003));  // printed
}

TEST_CASE("run: Incropera 5.5: sphere of 10 mm cools in air from 400 to 335 degC in 94 s", "[run][heat]") {
  const ModelRun run = heat({3000 * sphere_volume(0.01), 1000, sphere_area(0.01), 10, 0, 673, 293, 293, 608, 200});
  CHECK(reached(run, "there") == Approx(93.7993069).epsilon(closed_form));
  CHECK(reached(run, "there") == Approx(94).epsilon(0.005));  // printed
}

TEST_CASE("run: Cengel & Ghajar 4-1: thermocouple junction reads 99 % of a step in 10 s", "[run][heat]") {
  const ModelRun run = heat({8500 * sphere_volume(0.001), 320, sphere_area(0.001), 210, 0, 300, 400, 400, 399, 20});
  CHECK(reached(run, "there") == Approx(9.94131977).epsilon(closed_form));
  CHECK(reached(run, "there") == Approx(10).epsilon(0.01));  // printed
}

TEST_CASE("run: Cengel & Ghajar 4-2: from 700 to 50 degC in 250 s with the exponent 0.0119 1/s", "[run][heat]") {
  const ModelRun run = heat({1, 1000, 1, 0.0118962831 * 1000, 0, 973, 288, 288, 323, 300});
  CHECK(reached(run, "there") == Approx(250).epsilon(closed_form));
}

TEST_CASE("run: Cengel & Ghajar 13-12: a thermocouple among walls at 400 K reads 650 K in gas at 715 K", "[run][heat]") {
  const ModelRun run = heat({1e-3, 500, 1e-3, 80, 0.6, 500, 715.023383, 400, 649.9, 1000});
  CHECK(run.last("bead.temperature") == Approx(650).margin(0.02));  // the book's sigma
  const double reading = fixed_step::zero(400, 715, [](double T) {
    return 0.6 * gaskettle::stefan_boltzmann * (std::pow(T, 4) - std::pow(400.0, 4)) - 80 * (715.023383 - T);
  });
  CHECK(run.last("bead.temperature") == Approx(reading).epsilon(closed_form));
}

namespace {

/// Node 1 is gas of 50 J/K heated by 100 W or an element of 50 J/K on the wall; node 2 a metal wall of 2000 J/K.
constexpr const char* two_nodes = R"(
walls:
  shell:
    around: vessel
    area: 1 m2
    layers: [{material: {density: 2000 kg/m3, specific_heat: 1000 J/kg/K, conductivity: 1e6 W/m/K}, thickness: 1 mm}]
    temperature: 293.15 K
    inside: {film: FILM}
    outside: {film: 1 W/m2/K}
surroundings: {temperature: 293.15 K}
gas_spaces: {vessel: {volume: 0.1 m3, gas: book_gas, temperature: 293.15 K, mass: 0.05 kg}}
run: {until: 600 s, rtol: 1e-10, record_every: 10 s}
)";

}  // namespace

TEST_CASE("run: two nodes, 50 and 2000 J/K, 2 W/K between and 1 W/K out, 100 W for 600 s", "[run][heat]") {
  // Closed form with two exponentials: 366.687265 and 317.619457 K. The wall's 1e-9 m2 K/W inside is no obstacle.
  SECTION("gas and wall") {
    const ModelRun run = run_model(book_gas(287, 1287) + put(two_nodes, "FILM", "2 W/m2/K") +
                                   "heaters: {element: {in: vessel, rating: 100 W}}\n");
    CHECK(run.last("vessel.temperature") == Approx(366.687265).epsilon(closed_form));
    CHECK(run.last("shell.temperature") == Approx(317.619457).epsilon(closed_form));
    CHECK(run.last("shell.loss") == Approx(317.619457 - 293.15).epsilon(1e-6));
  }
  SECTION("element and wall") {
    const ModelRun run =
        run_model(book_gas(287, 1287) + put(two_nodes, "FILM", "none") +
                  "heaters: {element: {wall: shell, rating: 100 W, heat_capacity: 50 J/K, conductance: 2 W/K}}\n");
    CHECK(run.last("element.temperature") == Approx(366.687265).epsilon(closed_form));
    CHECK(run.last("shell.temperature") == Approx(317.619457).epsilon(closed_form));
  }
}

TEST_CASE("run: thermostat on a first-order plant: 46.5452 s on, 35.1021 s off", "[run][control]") {
  // 1000 J/K of gas, 2 W/K to surroundings at 20 degC, 200 W, between 75 and 79 degC.
  const ModelRun run = run_model(book_gas(287, 1287) + R"(
surroundings: {temperature: 293.15 K}
gas_spaces: {vessel: {volume: 1 m3, gas: book_gas, temperature: 293.15 K, mass: 1 kg}}
bodies: {room: {in: vessel, mass: 1e9 kg, specific_heat: 1e6 J/kg/K, area: 1 m2, film: 2 W/m2/K}}
heaters: {element: {in: vessel, rating: 200 W}}
controllers: {thermostat: {drives: element.power, holds: vessel.temperature, at: 350.15 K, by: {on_off: {dead_band: 4 K}}}}
run: {until: 1000 s, rtol: 1e-10, record_every: 1 s}
)");
  REQUIRE(run.event_count("thermostat", "switches on") > 3);
  const auto off = [&](std::size_t n) { return run.event_time("thermostat", "switches off", n); };
  const auto on = [&](std::size_t n) { return run.event_time("thermostat", "switches on", n); };
  CHECK(off(0) == Approx(500 * std::log(100.0 / (100 - 59))).epsilon(closed_form));  // the first warm-up, to 79 degC
  for (std::size_t n = 0; n < 3; ++n) {
    CHECK(on(n) - off(n) == Approx(35.1021293).epsilon(closed_form));
    CHECK(off(n + 1) - on(n) == Approx(46.5452115).epsilon(closed_form));
  }
  CHECK((off(2) - on(1)) / (off(2) - off(1)) == Approx(0.57007627).epsilon(closed_form));
}
