#include "support/perfect_gas.h"

using namespace gaskettle;
using namespace gaskettle::testing;

namespace {
/// Gas that warms by 2 K/s: its heat capacity is 1000/6 J/K.
std::string warming(const std::string& sensor, const std::string& until) {
  return perfect_model(
      "gas_spaces: {tank: {volume: 100 l, gas: perfect, temperature: 300 K, pressure: 2 bar abs}}\n"
      "stirrers: {mixer: {in: tank, power: 333.3333333333333333 W}}\nsensors: {probe: {" +
      sensor + "}}\nrun: {until: " + until + "}");
}
}  // namespace

TEST_CASE("a first-order lag behind a ramp") {
  const ModelRun run = run_model(warming("reads: tank.temperature, time_constant: 8 s, offset: 1.5 K", "20 s"));
  CHECK(run["probe.reading"].front() == within(301.5, 1e-15));
  CHECK(run.last("probe.reading") == within(301.5 + 2.0 * (20.0 - 8.0 * (1 - std::exp(-2.5))), 1e-8));
}

TEST_CASE("a reading stays within its range") {
  const ModelRun run = run_model(warming("reads: tank.temperature, range: [310 K, 330 K]", "30 s"));
  CHECK(run["probe.reading"].front() == within(310.0, 1e-15));
  CHECK(run.at("probe.reading", 4.0) == within(310.0, 1e-15));
  CHECK(run.at("probe.reading", 9.0) == within(318.0, 1e-12));
  CHECK(run.last("probe.reading") == within(330.0, 1e-15));
  CHECK(run.result.events.size() == 2);
  CHECK(run.result.events[0].time == within(5.0, 1e-9));
  CHECK(run.result.events[1].time == within(15.0, 1e-9));
}

TEST_CASE("a sensor of a flow or a power") {
  const ModelRun run = run_model(warming("reads: mixer.power, time_constant: 2 s", "10 s"));
  CHECK(run.last("probe.reading") == within(1000.0 / 3.0, 1e-12));  // starts at the true value, which stays
}
