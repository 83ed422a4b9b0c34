#include <numbers>

#include "support/perfect_gas.h"

using namespace gaskettle;
using namespace gaskettle::testing;

namespace {
ModelRun stirred(const std::string& mixer, const std::string& until = "10 s") {
  return run_model(
      perfect_model("gas_spaces: {tank: {volume: 100 l, gas: perfect, temperature: 300 K, pressure: 2 bar abs}}\n"
                    "stirrers: {mixer: {in: tank, " +
                    mixer + "}}\nrun: {until: " + until + "}"));
}
constexpr double rpm = 2.0 * std::numbers::pi / 60.0;
}  // namespace

TEST_CASE("shaft power is torque times angular speed") {
  const ModelRun run = stirred("torque: 2 N m, speed: 300 rpm");
  CHECK(run.last("energy.shaft") == within(2.0 * 300.0 * rpm * 10.0, 1e-12));
  CHECK(run.last("mixer.speed") == within(300.0 * rpm, 1e-14));
  CHECK(run.last("mixer.torque") == within(2.0, 1e-14));
  check_books(run);
}

TEST_CASE("an impeller draws Np rho N^3 D^5") {
  const double density = 2e5 / (perfect::R * 300.0);
  const ModelRun run = stirred("power_number: 0.4, diameter: 200 mm, speed: 1500 rpm");
  const double power = 0.4 * density * std::pow(25.0, 3) * std::pow(0.2, 5);
  CHECK(run.last("mixer.power") == within(power, 1e-12));  // the vessel is rigid: the density stays
  CHECK(run.last("mixer.torque") == within(power / (1500.0 * rpm), 1e-12));
  CHECK(run.last("energy.shaft") == within(power * 10.0, 1e-12));
  check_books(run);
}

TEST_CASE("an impeller that runs up from standstill") {
  const double density = 2e5 / (perfect::R * 300.0);
  const ModelRun run =
      stirred("power_number: 0.4, diameter: 200 mm, speed: {schedule: [[0 s, 0 rpm], [8 s, 1500 rpm]]}");
  CHECK(run["mixer.torque"].front() == 0.0);
  // The cube of a straight line over 8 s, then 2 s at full speed.
  CHECK(run.last("energy.shaft") ==
        within(0.4 * density * std::pow(25.0, 3) * std::pow(0.2, 5) * (8.0 / 4.0 + 2.0), 1e-8));
  check_books(run);
}

TEST_CASE("speed that swings like a sine") {
  const ModelRun run = stirred("torque: 2 N m, speed: {sine: {mean: 300 rpm, amplitude: 100 rpm, frequency: 0.7 Hz}}");
  const double w = 2.0 * std::numbers::pi * 0.7;
  CHECK(run.last("energy.shaft") == within(2.0 * rpm * (300.0 * 10.0 + 100.0 * (1 - std::cos(w * 10.0)) / w), 1e-7));
  check_books(run);
}
