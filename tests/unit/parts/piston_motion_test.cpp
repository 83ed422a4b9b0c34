#include "support/perfect_gas.h"

// Pistons with inertia, and driven ones.
using namespace gaskettle;
using namespace gaskettle::testing;

namespace {
constexpr double start_volume = 5e-3;

/// 100 cm2 under a weight of 1000 N in 1 bar: the balance is at 2 bar. 5 l at the start, x = 500 mm.
std::string cylinder(const std::string& ram, const std::string& rest,
                     const std::string& start = "pressure: 2 bar abs") {
  return perfect_model("gas_spaces: {cylinder: {volume: 5 l, gas: perfect, temperature: 300 K, " + start + "}}\n" +
                       "pistons: {ram: {closes: cylinder, area: 100 cm2, at: 500 mm, " + ram + "}}\n" + rest);
}

/// Gas so much that a small piston does not change its pressure (by 1e-13): mechanics in the open.
std::string open_field(const std::string& ram, const std::string& rest) {
  return perfect_model(
      "gas_spaces: {room: {volume: 10000 m3, gas: perfect, temperature: 300 K, pressure: 1 bar abs}}\n"
      "pistons: {ram: {closes: room, area: 1 mm2, at: 0 m, motion: inertial, " +
      ram + "}}\n" + rest);
}
}  // namespace

TEST_CASE("a piston falls, bounces and comes to rest on its stop") {
  const ModelRun run =
      run_model(open_field("mass: 2 kg, stops: [-1.25 m, 1 m], restitution: 0.5", "run: {until: 4 s, rtol: 1e-10}"));
  // Free fall over 1.25 m at 10 m/s2; each flight lasts half as long as the one before.
  double t = 0.5, v = 5.0;
  for (std::size_t n = 0; n < 6; ++n) {
    CHECK(run.event_time("ram", "hits low stop", n) == within(t, 1e-7));
    v *= 0.5;
    t += 2.0 * v / 10.0;
  }
  CHECK(run.event_time("ram", "comes to rest on low stop") < 1.5);     // the flights add up to 0.5 + 1 s
  CHECK(run.event_time("ram", "comes to rest on low stop") > 1.4998);  // below 0.1 mm/s it rests
  CHECK(run.last("energy.impact") == within(2.0 * 10.0 * 1.25, 1e-7));
  CHECK(run.last("ram.velocity") == 0.0);
  CHECK(run.last("ram.position") == near(-1.25, 1e-9));
  check_books(run);
}

TEST_CASE("a load arrives at rest on a moving piston and leaves with its kinetic energy") {
  const ModelRun run = run_model(open_field(
      "tilt: 90 deg, velocity: 2 m/s, mass: {schedule: [[0 s, 10 kg], [1 s, 40 kg], [2 s, 16 kg]], held: true}",
      "run: {until: 3 s}"));
  CHECK(run.at("ram.velocity", 0.9) == within(2.0, 1e-9));
  CHECK(value_after(run, "ram.velocity", 1.0) == within(0.5, 1e-9));
  CHECK(run.last("ram.velocity") == within(0.5, 1e-9));
  CHECK(run.last("ram.position") == within(2.0 + 0.5 + 0.5, 1e-9));
  CHECK(run.last("energy.impact") == within(0.5 * 10 * 4 - 0.5 * 40 * 0.25, 1e-9));
  CHECK(run.event_time("ram", "load arrives") == 1.0);
  CHECK(run.event_time("ram", "load leaves") == 2.0);
  CHECK(run.last("energy.kinetic") == within(0.5 * 40 * 0.25 - 0.5 * 10 * 4, 1e-9));
  REQUIRE(run.result.books.work.size() == 1);
  CHECK(std::abs(run.result.books.work[0].difference()) < 1e-8);
  check_books(run);
}

TEST_CASE("Coulomb friction brings a piston to rest and holds it") {
  const ModelRun run = run_model(open_field(
      "tilt: 90 deg, velocity: 2 m/s, mass: 10 kg, friction: {breakaway: 6 N, kinetic: 4 N}", "run: {until: 10 s}"));
  CHECK(run.event_time("ram", "sticks") == within(2.0 * 10.0 / 4.0, 1e-7));
  CHECK(run.last("ram.position") == within(4.0 * 10.0 / (2.0 * 4.0), 1e-7));
  CHECK(run.last("energy.friction") == within(20.0, 1e-7));
  CHECK(run.last("entropy.friction") == within(20.0 / 300.0, 1e-7));
  check_books(run);
}

TEST_CASE("an inertial piston turns where the work of the gas is used up") {
  const ModelRun run =
      run_model(cylinder("motion: inertial, mass: 100 kg",
                         "targets: {turned: {when: ram.velocity, reaches: 0 m/s, direction: falling}}\n"
                         "run: {until: 1 s, rtol: 1e-10, stop_when: turned}",
                         "pressure: 2.5 bar abs"));
  // p0 V0/(gamma-1) (1 - (V0/V)^(gamma-1)) = F (x - x0), bisected.
  double low = 0.51, high = 1.0;
  for (int i = 0; i < 100; ++i) {
    const double x = 0.5 * (low + high);
    const double left = 2.5e5 * start_volume / 0.4 * (1 - std::pow(0.5 / x, 0.4)) - 2000.0 * (x - 0.5);
    (left > 0 ? low : high) = x;
  }
  CHECK(run.last("ram.position") == within(low, 1e-7));
  CHECK(std::abs(run.last("energy.kinetic")) < 1e-6);  // of some 10 J exchanged
  check_books(run);
}

TEST_CASE("a driven piston follows its path, and the drive does what is missing") {
  const ModelRun run = run_model(cylinder(
      "motion: driven, mass: 100 kg, position: {schedule: [[0 s, 500 mm], [2 s, 250 mm]]}", "run: {until: 3 s}"));
  CHECK(run.last("ram.position") == within(0.25, 1e-14));
  CHECK(run.last("cylinder.pressure") == within(2e5 * std::pow(2.0, 1.4), 1e-7));
  const double work = 2e5 * start_volume / 0.4 * (std::pow(2.0, 0.4) - 1);  // into the gas
  CHECK(run.last("energy.boundary_work") == within(-work, 1e-7));
  CHECK(run.last("energy.applied") == within(-(work - 2000.0 * 0.25), 1e-6));
  check_books(run);
}

TEST_CASE("a piston driven by liquid stops at its stop and leaves when the flow turns") {
  const ModelRun run = run_model(
      cylinder("motion: driven, flow: {schedule: [[0 s, 1 l/s], [5 s, -0.5 l/s]], held: true}, stops: [200 mm, 550 mm]",
               "run: {until: 14 s}"));
  CHECK(run.event_time("ram", "rests on low stop") == within(3.0, 1e-9));
  CHECK(run.event_time("ram", "leaves low stop") == 5.0);
  CHECK(run.event_time("ram", "rests on high stop") == within(12.0, 1e-9));
  CHECK(run.last("ram.velocity") == 0.0);
  check_books(run);
}
