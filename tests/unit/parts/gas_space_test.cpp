#include "support/perfect_gas.h"

using namespace gaskettle;
using namespace gaskettle::testing;

TEST_CASE("stirred gas in a rigid vessel warms by what the shaft brings") {
  const ModelRun run = run_model(
      perfect_model("gas_spaces: {tank: {volume: 100 l, gas: perfect, temperature: 300 K, pressure: 2 bar abs}}\n"
                    "stirrers: {mixer: {in: tank, power: 50 W}}\nrun: {until: 100 s}"));
  const double mass = 2e5 * 0.1 / (perfect::R * 300.0);
  CHECK(run["tank.mass"].front() == within(mass, 1e-14));
  CHECK(run.last("tank.temperature") == within(300.0 + 5000.0 / (mass * perfect::cv), 1e-12));
  CHECK(run.last("tank.pressure") == within(2e5 + 0.4 * 5000.0 / 0.1, 1e-12));
  // The gas equation and the definitions of the other channels, at the end.
  const double T = run.last("tank.temperature");
  CHECK(run.last("tank.density") == within(mass / 0.1, 1e-14));
  CHECK(run.last("tank.volume") == within(0.1, 1e-15));
  CHECK(run.last("tank.energy") ==
        within(mass * (perfect::cp * (T - perfect::zero_of_enthalpy) - perfect::R * T), 1e-12));
  CHECK(run.last("tank.mole_fraction.perfect") == 1.0);
  CHECK(run.last("tank.specific_entropy") - run["tank.specific_entropy"].front() ==
        within(perfect::cv * std::log(T / 300.0), 1e-11));
  CHECK(run.last("entropy.stirrer") == within(mass * perfect::cv * std::log(T / 300.0), 1e-7));
  check_books(run);
}

TEST_CASE("mass in place of pressure, and many spaces alike") {
  const auto tank = [](const std::string& start, const std::string& power) {
    return run_model(perfect_model("gas_spaces: {tank: {volume: 100 l, gas: perfect, temperature: 300 K, " + start +
                                   "}}\n" +
                                   "bodies: {block: {in: tank, specific_heat: 500 J/kg/K, mass: 2 kg, area: 0.1 m2, "
                                   "film: 20 W/m2/K, temperature: 350 K}}\n"
                                   "walls: {shell: {around: tank, area: 1 m2, layers: [{material: copper, thickness: 1 "
                                   "mm}], inside: {film: 10 W/m2/K}, outside: {film: 5 W/m2/K}}}\n"
                                   "heaters: {coil: {in: tank, power: " +
                                   power + "}}\nrun: {until: 20 min}"));
  };
  const ModelRun one = tank("mass: 0.25 kg", "100 W"), five = tank("mass: 0.25 kg, count: 5", "500 W");
  CHECK(one["tank.pressure"].front() == within(0.25 * perfect::R * 300.0 / 0.1, 1e-14));
  CHECK(five["tank.mass"].front() == within(1.25, 1e-14));
  // Walls and bodies go with the count: the five together are one, five times over.
  for (const char* same : {"tank.temperature", "tank.pressure", "block.temperature", "shell.temperature"})
    CHECK(five.last(same) == within(one.last(same), 1e-9));
  for (const char* fivefold : {"energy.wall_loss", "energy.heater", "energy.stored", "entropy.generated"})
    CHECK(five.last(fivefold) == within(5.0 * one.last(fivefold), 1e-7));
  check_books(five);
}

TEST_CASE("gas that leaves the range of its data is a warning with its time, and the run goes on") {
  // Nitrogen: NASA-9 fits from 200 K (B. J. McBride, M. J. Zehe, S. Gordon, NASA/TP-2002-211556).
  const ModelRun run = run_model(
      "gaskettle: 1\ngas_spaces: {tank: {volume: 100 l, gas: nitrogen, temperature: 250 K, pressure: 2 bar abs}}\n"
      "heaters: {cooler: {in: tank, power: -100 W}}\nrun: {until: 120 s}");
  CHECK(run.result.ending.complete());
  const double when = run.event_time("tank", "below the published range of the gas data");
  CHECK(run.at("tank.temperature", when) == within(200.0, 1e-9));
  REQUIRE(run.result.warnings.size() == 1);
  CHECK(run.last("tank.temperature") < 199.0);
  check_books(run);
}

TEST_CASE("a gas cooled without end stops the run and keeps what was computed") {
  const ModelRun run = run_model(
      perfect_model("gas_spaces: {tank: {volume: 100 l, gas: perfect, temperature: 300 K, pressure: 2 bar abs}}\n"
                    "heaters: {cooler: {in: tank, power: -100 W}}\nrun: {until: 1 h}"));
  // All its energy above 0 K is gone at U/P.
  const double gone = 2.5 * 2e5 * 0.1 / 100.0;
  CHECK_FALSE(run.result.ending.complete());
  CHECK(run.result.partial());
  CHECK(run.result.ending.time < gone);
  CHECK(run.result.ending.time > 0.9 * gone);
  CHECK_FALSE(run.result.ending.message.empty());
  CHECK(run.time.size() > 10);
}
