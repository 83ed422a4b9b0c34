#include <numbers>

#include "support/perfect_gas.h"

using namespace gaskettle;
using namespace gaskettle::testing;

namespace {
std::string tank(const std::string& rest) {
  return perfect_model("gas_spaces: {tank: {volume: 100 l, gas: perfect, temperature: 300 K, pressure: 2 bar abs}}\n" +
                       rest);
}
ModelRun powered(const std::string& power, const std::string& until) {
  return run_model(tank("heaters: {coil: {in: tank, power: " + power + "}}\nrun: {until: " + until + "}"));
}
const double gas_capacity = 2e5 * 0.1 / 300.0 * 2.5;  // m cv = p V/T cv/R, J/K
}  // namespace

TEST_CASE("scheduled power brings the area under its schedule") {
  // Polynomials of low degree within each segment: rounding only.
  SECTION("straight lines, end values held outside") {
    const ModelRun run = powered("{schedule: [[10 s, 20 W], [20 s, 100 W], [30 s, 40 W]]}", "50 s");
    CHECK(run.last("energy.heater") == within(200.0 + 600.0 + 700.0 + 800.0, 1e-12));
  }
  SECTION("held") {
    const ModelRun run = powered("{schedule: [[10 s, 20 W], [20 s, 100 W], [30 s, 40 W]], held: true}", "50 s");
    CHECK(run.last("energy.heater") == within(200.0 + 200.0 + 1000.0 + 800.0, 1e-12));
  }
  SECTION("repeated three times, then the end value") {
    const ModelRun run = powered("{schedule: [[0 s, 0 W], [4 s, 80 W], [10 s, 0 W]], repeat: 3}", "50 s");
    CHECK(run.last("energy.heater") == within(3 * 400.0, 1e-12));
  }
  SECTION("repeated for ever, with a jump") {
    const ModelRun run = powered(
        "{schedule: [[0 s, 60 W], [3 s, 60 W], [3 s, 10 W], [7 s, 10 W]], held: true, repeat: forever}", "3600 s");
    // 514 whole cycles of 220 J, and 2 s of the next.
    CHECK(run.last("energy.heater") == within(514 * 220.0 + 120.0, 1e-11));
    CHECK(run.result.ending.stats.events == 1028);
  }
  SECTION("a ramp from zero") {
    const ModelRun run = powered("{ramp: {to: 60 W, at: 3 W/s}}", "50 s");
    CHECK(run.last("energy.heater") == within(600.0 + 1800.0, 1e-12));
  }
  SECTION("a sine") {
    const ModelRun run = powered("{sine: {mean: 50 W, amplitude: 30 W, frequency: 0.23 Hz}}", "50 s");
    const double w = 2 * std::numbers::pi * 0.23;
    CHECK(run.last("energy.heater") == within(2500.0 + 30.0 * (1 - std::cos(50 * w)) / w, 1e-7));
  }
}

TEST_CASE("an element with a heat capacity lags and passes its heat on") {
  const ModelRun run = run_model(tank(
      "heaters: {element: {in: tank, power: 100 W, heat_capacity: 500 J/K, conductance: 5 W/K}}\nrun: {until: 200 s}"));
  // Two stores and a constant source: the difference decays to P C2/(C1 + C2)/G.
  const double C1 = 500.0, C2 = gas_capacity, G = 5.0, rate = G * (1 / C1 + 1 / C2);
  const double difference = 100.0 / C1 / rate * (1 - std::exp(-rate * 200.0));
  CHECK(run.last("element.temperature") - run.last("tank.temperature") == within(difference, 1e-7));
  CHECK(C1 * run.last("element.temperature") + C2 * run.last("tank.temperature") ==
        within((C1 + C2) * 300.0 + 20e3, 1e-12));
  check_books(run);
}

TEST_CASE("a cooler takes heat out and generates no entropy by it") {
  const ModelRun run = powered("-50 W", "60 s");
  CHECK(run.last("energy.heater") == within(-3000.0, 1e-12));
  CHECK(run.last("tank.temperature") == within(300.0 - 3000.0 / gas_capacity, 1e-12));
  CHECK(run.last("entropy.heater") == 0.0);
  check_books(run);
}

TEST_CASE("a mat between two layers of a wall") {
  // Nothing enters on the inside: at rest all heat crosses the outer layer and its film.
  const char* wall =
      "walls: {shell: {around: tank, area: 2 m2, layers: [{material: {density: 1000 kg/m3, specific_heat: 1000 J/kg/K, "
      "conductivity: 2 W/m/K}, thickness: 5 mm},\n"
      "  {material: {density: 500 kg/m3, specific_heat: 800 J/kg/K, conductivity: 0.1 W/m/K}, thickness: 20 mm}], "
      "inside: {film: none}, outside: {film: 10 W/m2/K}}}\n";
  const auto mat = [&](int layer) {
    return run_model(tank(wall + std::string("heaters: {mat: {wall: shell, after_layer: ") + std::to_string(layer) +
                          ", power: 40 W}}\nrun: {until: 30 h}"));
  };
  const double film = 40.0 / (10.0 * 2.0), wool = 40.0 * 0.02 / (0.1 * 2.0), plate = 40.0 * 0.005 / (2.0 * 2.0);
  CHECK(mat(0).last("shell.temperature") == within(300.0 + film + wool + plate, 1e-8));
  CHECK(mat(1).last("shell.temperature") == within(300.0 + film + wool, 1e-8));
  CHECK(mat(2).last("shell.temperature") == within(300.0 + film, 1e-8));
  CHECK(mat(2).last("shell.loss") == within(40.0, 1e-6));
  check_books(mat(1));
}

TEST_CASE("a heater in a body") {
  const ModelRun run = run_model(
      tank("bodies: {block: {in: tank, specific_heat: 500 J/kg/K, mass: 2 kg, area: 0.5 m2, film: 20 W/m2/K}}\n"
           "heaters: {cartridge: {body: block, power: 80 W}}\nrun: {until: 300 s}"));
  const double C1 = 1000.0, C2 = gas_capacity, G = 10.0, rate = G * (1 / C1 + 1 / C2);
  CHECK(run.last("block.temperature") - run.last("tank.temperature") ==
        within(80.0 / C1 / rate * (1 - std::exp(-rate * 300.0)), 1e-7));
  CHECK(C1 * run.last("block.temperature") + C2 * run.last("tank.temperature") ==
        within((C1 + C2) * 300.0 + 24e3, 1e-12));
  check_books(run);
}
