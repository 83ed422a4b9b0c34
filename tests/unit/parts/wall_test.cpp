#include <numbers>

#include "support/perfect_gas.h"

using namespace gaskettle;
using namespace gaskettle::testing;

namespace {
const std::string plate =
    "layers: [{material: {density: 1000 kg/m3, specific_heat: 1000 J/kg/K, conductivity: 2 W/m/K}, thickness: 10 mm}]";
const double gas_capacity = 2e5 * 0.1 / 300.0 * 2.5;  // m cv of 100 l at 2 bar, J/K
std::string tank(const std::string& rest) {
  return perfect_model("gas_spaces: {tank: {volume: 100 l, gas: perfect, temperature: 300 K, pressure: 2 bar abs}}\n" +
                       rest);
}
}  // namespace

TEST_CASE("at rest the loss is the temperature difference over the sum of resistances") {
  const ModelRun run = run_model(tank("walls: {shell: {around: tank, area: 2 m2, " + plate +
                                      ", bridges: 3 W/K, inside: {film: 20 W/m2/K}, outside: {film: 10 W/m2/K}}}\n"
                                      "heaters: {coil: {in: tank, power: 100 W}}\nrun: {until: 30 h}"));
  const double inner = 1 / 40.0, middle = 1 / (2.0 / 0.01 * 2.0 + 3.0), outer = 1 / 20.0;
  CHECK(run.last("shell.loss") == within(100.0, 1e-7));
  CHECK(run.last("tank.temperature") == within(300.0 + 100.0 * (inner + middle + outer), 1e-8));
  CHECK(run.last("shell.temperature") == within(300.0 + 100.0 * (middle + outer), 1e-8));
  CHECK(run.last("shell.outer_temperature") == within(300.0 + 100.0 * outer, 1e-8));
  check_books(run);
}

TEST_CASE("contact resistance between layers") {
  const ModelRun run = run_model(
      tank("walls: {shell: {around: tank, area: 2 m2, layers: [{material: copper, thickness: 2 mm}, {material: copper, "
           "thickness: 2 mm, contact: 0.01 m2 K/W}], inside: {film: 20 W/m2/K}, outside: {film: 10 W/m2/K}}}\n"
           "heaters: {coil: {in: tank, power: 100 W}}\nrun: {until: 30 h}"));
  // Copper of 4 mm adds 1e-5 m2 K/W: take it from the difference of faces with 0.2 % to spare.
  CHECK(run.last("shell.temperature") - run.last("shell.outer_temperature") == within(50.0 * 0.01, 2e-3));
  check_books(run);
}

TEST_CASE("an outer face absorbs flux and sees a temperature of its own") {
  const ModelRun run = run_model(tank("walls: {shell: {around: tank, area: 2 m2, " + plate +
                                      ", inside: {film: 20 W/m2/K}, outside: {film: 10 W/m2/K, temperature: 320 K, "
                                      "flux: {schedule: [[0 s, 0 W/m2], [100 s, 50 W/m2]]}}}}\nrun: {until: 60 h}"));
  // No heat enters the gas at rest: the face stands flux/film above what it sees.
  CHECK(run.last("tank.temperature") == within(325.0, 1e-8));
  CHECK(run.last("energy.flux") == within(2.0 * 50.0 * (60 * 3600.0 - 50.0), 1e-12));
  check_books(run);
}

TEST_CASE("a grey face radiates to what it sees") {
  const ModelRun run =
      run_model(tank("walls: {shell: {around: tank, area: 2 m2, " + plate +
                     ", temperature: 300 K, inside: {film: 20 W/m2/K}, outside: {film: none, emissivity: 0.7}}}\n"
                     "heaters: {coil: {in: tank, power: 100 W}}\nrun: {until: 60 h}"));
  // Stefan-Boltzmann constant: CODATA 2018, exact in the SI of 2019.
  const double face = std::pow(100.0 / (0.7 * 2.0 * 5.670374419e-8) + std::pow(300.0, 4), 0.25);
  CHECK(run.last("shell.outer_temperature") == within(face, 1e-8));
  check_books(run);
}

TEST_CASE("a wall between two spaces ends at the common temperature") {
  const ModelRun run = run_model(
      perfect_model("gas_spaces:\n  hot: {volume: 100 l, gas: perfect, temperature: 400 K, pressure: 2 bar abs}\n"
                    "  cold: {volume: 300 l, gas: perfect, temperature: 300 K, pressure: 2 bar abs}\n"
                    "walls: {plate: {around: hot, area: 1 m2, " +
                    plate +
                    ", temperature: 350 K, to: {space: cold}, inside: {film: 20 W/m2/K}, outside: {film: 15 W/m2/K}}}\n"
                    "run: {until: 20 h}"));
  const double hot = 2e5 * 0.1 / 400.0 * 2.5, cold = 2e5 * 0.3 / 300.0 * 2.5, metal = 1e6 * 0.01;
  const double common = (hot * 400.0 + cold * 300.0 + metal * 350.0) / (hot + cold + metal);
  for (const char* c : {"hot.temperature", "cold.temperature", "plate.temperature", "plate.outer_temperature"})
    CHECK(run.last(c) == within(common, 1e-8));
  CHECK(run.last("energy.wall_loss") == 0.0);
  check_books(run);
}

TEST_CASE("the default area is the wetted area, and follows a piston") {
  const double end = std::numbers::pi / 4 * 0.04, side = std::numbers::pi * 0.2;
  const auto model = [&](const std::string& area, const std::string& until) {
    return perfect_model(
        "gas_spaces: {tank: {shape: {cylinder: {bore: 200 mm, length: 500 mm}}, gas: perfect, temperature: 400 K, "
        "pressure: 2 bar abs}}\n"
        "walls: {shell: {around: tank, " +
        area +
        "layers: [{material: {density: 1 Mg/m3, specific_heat: 1000 MJ/kg/K, conductivity: 1000 W/m/K}, thickness: 1 "
        "mm}], temperature: 400 K, inside: {film: 20 W/m2/K}, outside: {film: none}}}\n"
        "pistons: {ram: {closes: tank, bore: 200 mm, at: 500 mm, motion: driven, position: {schedule: [[0 s, 500 mm], "
        "[1 ms, 1000 mm]]}}}\nrun: {until: " +
        until + "}");
  };
  // The wall's capacity is without end, so its face stays at 400 K while the expanded gas warms by h A; the
  // piston's millisecond is short beside the 10 s of the gas.
  const auto rate = [&](const ModelRun& run) {
    const double a = 400.0 - run.at("tank.temperature", 0.1), b = 400.0 - run.at("tank.temperature", 0.2);
    return std::log(a / b) / 0.1;
  };
  const double capacity = 2e5 * end * 0.5 / 400.0 * 2.5;
  CHECK(rate(run_model(model("", "1 s"), {"run.record_every=0.1 s"})) ==
        within(20.0 * (2 * end + side * 1.0) / capacity, 1e-5));
  CHECK(rate(run_model(model("area: 0.3 m2, ", "1 s"), {"run.record_every=0.1 s"})) ==
        within(20.0 * 0.3 / capacity, 1e-5));
}
