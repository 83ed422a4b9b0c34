// Stirred plants, against
//   Y. A. Cengel, M. A. Boles, Thermodynamics: An Engineering Approach, Example 2-7 (shaft power)
//   P. Harriott, Chemical Reactor Design, Example 7.6b; a public course problem (power number); the fan laws
// and first-law closed forms, up to the stroke of a loaded, insulated piston lifted by a stirrer.
#include <catch2/catch.hpp>
#include <cmath>

#include "published/model_text.h"

using namespace gaskettle::testing;
using namespace model_text;

TEST_CASE("run: Cengel & Boles 2-7: 200 N m at 4000 rpm", "[run][stirring]") {
  const ModelRun run = run_model(book_gas(287, 1004.5) + R"(
gas_spaces: {vessel: {volume: 10 m3, gas: book_gas, temperature: 300 K, pressure: 10 bar abs}}
stirrers: {shaft: {in: vessel, torque: 200 N m, speed: 4000 rpm}}
run: {until: 10 s}
)");
  CHECK(run.last("shaft.power") == Approx(83775.8041).epsilon(1e-8));
  CHECK(run.last("shaft.power") == Approx(83.8e3).epsilon(0.001));  // printed
  CHECK(run.last("energy.shaft") == Approx(837758.041).epsilon(1e-8));
}

namespace {
/// Shaft power of an impeller in a gas of this density (a book gas at 1 bar, 300 K).
double impeller(double Np, double density, const std::string& speed, double D) {
  const ModelRun run =
      run_model(book_gas(1e5 / (density * 300), 5e5 / (density * 300)) + put(fill(R"(
gas_spaces: {vessel: {volume: 100 m3, gas: book_gas, temperature: 300 K, pressure: 1 bar abs}}
stirrers: {turbine: {in: vessel, power_number: $Np, diameter: $D m, speed: SPEED}}
run: {until: 1 ms}
)",
                                                                                  {{"Np", Np}, {"D", D}}),
                                                                             "SPEED", speed));
  return run["turbine.power"].front();
}
}  // namespace

TEST_CASE("run: power numbers: turbines in something as dense as water, and in nitrogen at 10 bar", "[run][stirring]") {
  CHECK(impeller(6, 1000, "120 rpm", 1.333) == Approx(202018.892).epsilon(1e-8));  // Harriott 7.6b
  CHECK(impeller(6, 1000, "120 rpm", 1.333) + 2 * impeller(1.7, 1000, "120 rpm", 1.333) ==
        Approx(316496.264).epsilon(1e-8));
  CHECK(impeller(5, 1000, "200 rpm", 0.4) == Approx(1896.2963).epsilon(1e-8));  // course problem
  CHECK(impeller(5, 1e6 / (296.8 * 300), "25 rev/s", 0.1) == Approx(8.77414645).epsilon(1e-8));
  CHECK(impeller(5, 1e6 / (296.8 * 300), "50 rev/s", 0.1) / impeller(5, 2e6 / (296.8 * 300), "25 rev/s", 0.1) ==
        Approx(4).epsilon(1e-9));  // fan laws: 8 times for the speed, half for the density
}

TEST_CASE("run: 10 W into 0.2 kg with cv 743: 0.0673 K/s", "[run][stirring]") {
  const ModelRun run = run_model(book_gas(297, 743 + 297) + R"(
gas_spaces: {vessel: {volume: 0.1 m3, gas: book_gas, temperature: 300 K, mass: 0.2 kg}}
stirrers: {paddle: {in: vessel, power: 10 W}}
run: {until: 100 s}
)");
  CHECK((run.last("vessel.temperature") - 300) / 100 == Approx(0.067294751).epsilon(1e-8));
}

namespace {

/// A stirrer of 75 W lifts a piston of 450 kg, 0.3 m bore, from 0.4 to 0.55 m; nothing leaks heat.
ModelRun stroke(const std::string& head, const std::string& gas) {
  return run_model(head + put(R"(
surroundings: {pressure: 100 kPa abs}
gas_spaces: {cylinder: {shape: {cylinder: {bore: 300 mm, length: 400 mm}}, gas: GAS, temperature: 293.15 K}}
pistons: {ram: {closes: cylinder, bore: 300 mm, at: 400 mm, mass: 450 kg}}
stirrers: {mixer: {in: cylinder, power: 75 W}}
targets: {top: {when: ram.position, reaches: 550 mm}}
run: {until: 5 min, rtol: 1e-11, record_every: 1 s, stop_when: top}
)",
                              "GAS", gas));
}

/// The shaft's work by internal energy and boundary work, and by enthalpy, must both be P t.
void check_both_routes(const ModelRun& run) {
  const double work = 75 * reached(run, "top");
  const auto rise = [&](const std::string& c) { return run.last(c) - run[c].front(); };
  const double p = run.last("cylinder.pressure");
  CHECK(rise("cylinder.energy") + p * rise("cylinder.volume") == Approx(work).epsilon(1e-9));
  CHECK(rise("cylinder.energy") + run.last("energy.lifting") + run.last("energy.atmosphere") ==
        Approx(work).epsilon(1e-9));
  CHECK(run.last("energy.stored") + run.last("energy.boundary_work") ==
        Approx(run.last("energy.shaft")).epsilon(1e-10));
  CHECK(run.last("energy.lifting") == Approx(450 * 9.80665 * 0.15).epsilon(1e-9));
  CHECK(run.last("cylinder.temperature") == Approx(293.15 * 0.55 / 0.4).epsilon(1e-9));
}

}  // namespace

TEST_CASE("run: stroke of a loaded, insulated piston lifted by a stirrer", "[run][stirring][stroke]") {
  SECTION("constant cp: t = m cp dT/P") {
    const ModelRun run = stroke(book_gas(208.13, 520.3), "book_gas");
    const double m = run.last("cylinder.mass");
    CHECK(reached(run, "top") == Approx(m * 520.3 * 293.15 * 0.15 / 0.4 / 75).epsilon(1e-9));
    check_both_routes(run);
  }
  SECTION("argon: t = g/(g-1) p dV/P, g = 5/3") {
    const ModelRun run = stroke("gaskettle: 1\n", "argon");
    const double volume = 3.14159265358979323846 / 4 * 0.3 * 0.3 * 0.15;
    CHECK(reached(run, "top") == Approx(2.5 * run.last("cylinder.pressure") * volume / 75).epsilon(1e-9));
    check_both_routes(run);
  }
  SECTION("carbon dioxide: cp rises by a tenth on the way") {
    check_both_routes(stroke("gaskettle: 1\n", "carbon_dioxide"));
  }
}
