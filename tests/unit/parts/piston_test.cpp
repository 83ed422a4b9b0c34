#include "support/perfect_gas.h"

// Balanced pistons.
// 100 cm2 under a weight of 1000 N in 1 bar: the balance is at 2 bar. 5 l at the start, x = 500 mm.
using namespace gaskettle;
using namespace gaskettle::testing;
using Catch::Matchers::Contains;

namespace {
constexpr double area = 0.01, start_volume = 5e-3, start_position = 0.5;

std::string cylinder(const std::string& ram, const std::string& rest,
                     const std::string& start = "pressure: 2 bar abs") {
  return perfect_model("gas_spaces: {cylinder: {volume: 5 l, gas: perfect, temperature: 300 K, " + start + "}}\n" +
                       "pistons: {ram: {closes: cylinder, area: 100 cm2, at: 500 mm, " + ram + "}}\n" + rest);
}
/// Volume after an adiabatic jump from p0, V0 to p1 at constant opposing pressure p1 (first law of a perfect gas).
double jumped(double p0, double V0, double p1) { return V0 * (p0 + (perfect::kappa - 1) * p1) / (perfect::kappa * p1); }
}  // namespace

TEST_CASE("a balanced piston lets heated gas expand at constant pressure") {
  const ModelRun run =
      run_model(perfect_model("gas_spaces: {cylinder: {volume: 5 l, gas: perfect, temperature: 300 K}}\n"
                              "pistons: {ram: {closes: cylinder, area: 100 cm2, at: 500 mm, mass: 100 kg}}\n"
                              "stirrers: {mixer: {in: cylinder, power: 50 W}}\nrun: {until: 20 s}"));
  CHECK(run["cylinder.pressure"].front() == within(2e5, 1e-15));
  CHECK(run.last("cylinder.pressure") == within(2e5, 1e-12));
  // Q = gamma/(gamma-1) p dV; a linear problem: left is the error per step times the steps.
  CHECK(run.last("ram.position") == within(0.5 + 1000.0 / 3.5 / 2000.0, 1e-7));
  CHECK(run.last("energy.lifting") == within(1000.0 * (run.last("ram.position") - 0.5), 1e-7));
  CHECK(run.last("energy.atmosphere") == within(1000.0 * (run.last("ram.position") - 0.5), 1e-7));
  check_books(run);
}

TEST_CASE("a stuck piston slips when the pressure has beaten breakaway, and jumps at constant force") {
  const char* heat = "stirrers: {mixer: {in: cylinder, power: 50 W}}\nrun: {until: 40 s}";
  const double slip = 200.0 / area * start_volume / (0.4 * 50.0);  // dp/dt = (gamma-1) P / V
  const double p0 = 2.2e5, p1 = 2.08e5;                            // breakaway, kinetic
  SECTION("friction heat to the surroundings") {
    const ModelRun run = run_model(cylinder("mass: 100 kg, friction: {breakaway: 200 N, kinetic: 80 N}", heat));
    CHECK(run.event_time("ram", "slips outward") == within(slip, 1e-7));
    CHECK(run.event_time("ram", "jumps to its new balance") == run.event_time("ram", "slips outward"));
    const double x1 = jumped(p0, start_volume, p1) / area;
    CHECK(value_after(run, "ram.position", run.event_time("ram", "slips outward")) == within(x1, 1e-7));
    CHECK(run.last("ram.position") == within(x1 + 50.0 * (40.0 - slip) / 3.5 / (p1 * area), 1e-7));
    CHECK(run.last("energy.friction") == within(80.0 * (run.last("ram.position") - start_position), 1e-7));
    CHECK(run.last("energy.returned") == 0.0);
    check_books(run);
  }
  SECTION("friction heat to the gas") {
    const ModelRun run =
        run_model(cylinder("mass: 100 kg, friction: {breakaway: 200 N, kinetic: 80 N, heat_to: gas}", heat));
    // The gas loses 2000 N dx only; what friction takes comes back.
    const double V1 = start_volume * (p0 / 0.4 + 2e5) / (p1 / 0.4 + 2e5);
    CHECK(run.event_time("ram", "slips outward") == within(slip, 1e-7));
    CHECK(value_after(run, "ram.position", run.event_time("ram", "slips outward")) == within(V1 / area, 1e-7));
    CHECK(run.last("energy.returned") == within(run.last("energy.friction"), 1e-14));
    check_books(run);
  }
  SECTION("an inertial piston starts at the same instant") {
    const ModelRun run = run_model(
        cylinder("motion: inertial, mass: 100 kg, friction: {breakaway: 200 N, kinetic: 80 N, viscous: 500 N s/m}",
                 "stirrers: {mixer: {in: cylinder, power: 50 W}}\nrun: {until: 6 s}"));
    CHECK(run.event_time("ram", "slips outward") == within(slip, 1e-7));
    check_books(run);
  }
}

TEST_CASE("friction between a warming and a cooling stroke makes the piston stick and slip back") {
  const ModelRun run = run_model(
      cylinder("mass: 100 kg, friction: {breakaway: 100 N, kinetic: 100 N}",
               "heaters: {coil: {in: cylinder, power: {schedule: [[0 s, 50 W], [10 s, -50 W]], held: true}}}\n"
               "run: {until: 20 s}"));
  // Net force +100 N outward, then -100 N: 2.1 bar, 1.9 bar; no jump where breakaway is kinetic friction.
  const double out = 0.1e5 * start_volume / 20.0;
  CHECK(run.event_time("ram", "slips outward") == within(out, 1e-7));
  const double x1 = 0.5 + 50.0 * (10.0 - out) / 3.5 / 2100.0;
  CHECK(run.at("ram.position", 10.0) == within(x1, 1e-7));
  CHECK(run.event_time("ram", "sticks") == near(10.0, 1e-6));
  CHECK(run.event_time("ram", "slips inward") == within(10.0 + 0.2e5 * x1 * area / 20.0, 1e-7));
  CHECK(run.last("cylinder.pressure") == within(1.9e5, 1e-12));
  check_books(run);
}

TEST_CASE("a balanced piston leaves its low stop, meets the high one, and comes back") {
  const ModelRun run = run_model(
      cylinder("mass: 100 kg, stops: [500 mm, 600 mm]",
               "heaters: {coil: {in: cylinder, power: {schedule: [[0 s, 50 W], [40 s, -50 W]], held: true}}}\n"
               "run: {until: 80 s}",
               "pressure: 1.5 bar abs"));
  const double leaves = 0.5e5 * start_volume / 20.0, travel = 3.5 * 2000.0 * 0.1 / 50.0, reaches = leaves + travel;
  CHECK(run.event_time("ram", "leaves low stop") == within(leaves, 1e-7));
  CHECK(run.event_time("ram", "rests on high stop") == within(reaches, 1e-7));
  CHECK(run.at("cylinder.pressure", 40.0) == within(2e5 + 20.0 / 6e-3 * (40.0 - reaches), 1e-7));
  const double down = 40.0 + (40.0 - reaches);
  CHECK(run.event_time("ram", "leaves high stop") == within(down, 1e-7));
  CHECK(run.event_time("ram", "rests on low stop") == within(down + travel, 1e-7));
  CHECK(run.last("ram.position") == within(0.5, 1e-12));
  CHECK(run.result.events.size() == 4);
  check_books(run);
}

TEST_CASE("a load dropped on a balanced piston goes to the new balance at the new force") {
  const auto drop = [](const std::string& mass, const std::string& more = "") {
    return run_model(
        cylinder("mass: {schedule: [[0 s, 100 kg], [1 s, " + mass + "]], held: true}" + more, "run: {until: 2 s}"));
  };
  const double gas = 2e5 * start_volume / (perfect::R * 300.0);
  SECTION("dropped or removed") {
    for (const auto& [mass, p1] : {std::pair{"200 kg", 3e5}, std::pair{"50 kg", 1.5e5}, std::pair{"0 kg", 1e5}}) {
      const ModelRun run = drop(mass);
      const double V1 = jumped(2e5, start_volume, p1), T1 = 300.0 * p1 * V1 / (2e5 * start_volume);
      CHECK(run.event_time("ram", "jumps to its new balance") == 1.0);
      // A single algebraic jump: rounding only.
      CHECK(run.last("ram.position") == within(V1 / area, 1e-12));
      CHECK(run.last("cylinder.temperature") == within(T1, 1e-12));
      CHECK(run.last("cylinder.pressure") == within(p1, 1e-13));
      const double sudden = gas * (perfect::cp * std::log(T1 / 300.0) - perfect::R * std::log(p1 / 2e5));
      CHECK(run.last("entropy.sudden") == within(sudden, 1e-9));
      CHECK(run.last("energy.lifting") == within((p1 - 1e5) * area * (V1 / area - 0.5), 1e-11));
      CHECK(std::abs(run.result.books.entropy_imbalance()) < 1e-9 * run.result.books.generated);
      check_books(run);
    }
  }
  SECTION("onto its stop") {
    const ModelRun run = drop("200 kg", ", stops: [400 mm, 600 mm]");
    CHECK(run.event_time("ram", "jumps to its stop") == 1.0);
    CHECK(run.last("ram.position") == within(0.4, 1e-14));
    // 3000 N over 0.1 m into the gas.
    CHECK(run.last("cylinder.pressure") == within((2e5 * start_volume + 0.4 * 300.0) / 4e-3, 1e-12));
    check_books(run);
  }
}

TEST_CASE("equal masses on and off in small steps approach the reversible path") {
  double before = 0.0;
  for (const int steps : {1, 4, 16}) {
    std::string points = "[0 s, 100 kg]";
    double p = 2e5, V = start_volume;
    for (int i = 1; i <= 2 * steps; ++i) {
      const double mass = 100.0 + 100.0 * (i <= steps ? i : 2 * steps - i) / steps;
      points += ", [" + std::to_string(i) + " s, " + std::to_string(mass) + " kg]";
      const double next = 1e5 + mass * perfect::gravity / area;
      V = jumped(p, V, next);
      p = next;
    }
    const ModelRun run = run_model(cylinder("mass: {schedule: [" + points + "], held: true}", "run: {until: 50 s}"));
    CHECK(run.last("ram.position") == within(V / area, 1e-11));
    const double generated = run.last("entropy.generated");
    if (steps > 1) CHECK(generated < 0.35 * before);  // falls as 1/steps
    before = generated;
    check_books(run);
  }
}

TEST_CASE("a load that grows smoothly compresses along the adiabat") {
  const ModelRun run = run_model(cylinder("mass: {schedule: [[0 s, 100 kg], [10 s, 300 kg]]}", "run: {until: 10 s}"));
  CHECK(run.last("ram.position") == within(0.5 * std::pow(0.5, 1 / 1.4), 1e-7));
  CHECK(run.last("cylinder.temperature") == within(300.0 * std::pow(2.0, 0.4 / 1.4), 1e-7));
  CHECK(std::abs(run.last("entropy.generated")) < 1e-7);  // of a gas that holds 8 J/K of heat capacity
  check_books(run);
}

TEST_CASE("spring, rod side and force stand in the balance") {
  const ModelRun run = run_model(perfect_model(
      "gas_spaces: {cylinder: {volume: 5 l, gas: perfect, temperature: 300 K}}\n"
      "pistons: {ram: {closes: cylinder, area: 100 cm2, at: 500 mm, mass: 100 kg, tilt: 60 deg, force: 250 N,\n"
      "  spring: {stiffness: 4 kN/m, free_at: 300 mm}, back: {pressure: 3 bar abs, area: 50 cm2}}}\n"
      "stirrers: {mixer: {in: cylinder, power: 50 W}}\nrun: {until: 20 s}"));
  const auto force = [](double x) { return 3e5 * 5e-3 + 1000.0 * 0.5 + 250.0 + 4000.0 * (x - 0.3); };
  CHECK(run["cylinder.pressure"].front() == within(force(0.5) / area, 1e-14));
  const double x = run.last("ram.position");
  CHECK(run.last("cylinder.pressure") == within(force(x) / area, 1e-12));
  // First law between the end states, both on the balance.
  const double stored = 2.5 * (force(x) / area * (start_volume + area * (x - 0.5)) - force(0.5) / area * start_volume);
  const double work = 0.5 * (force(x) + force(0.5)) * (x - 0.5);
  CHECK(stored + work == within(1000.0, 1e-7));
  CHECK(run.last("energy.spring") == within(0.5 * 4000.0 * ((x - 0.3) * (x - 0.3) - 0.04), 1e-7));
  CHECK(run.last("energy.back") == within(1500.0 * (x - 0.5), 1e-7));
  CHECK(run.last("energy.applied") == within(250.0 * (x - 0.5), 1e-7));
  for (const WorkComparison& w : run.result.books.work) CHECK(std::abs(w.difference()) < 1e-7 * w.scale);
  check_books(run);
}

TEST_CASE("a viscous balanced piston creeps to its balance") {
  // Constant pressure: b dx/dt = F - k x, an exponential.
  const ModelRun run = run_model(
      perfect_model("gas_spaces: {room: {volume: 10000 m3, gas: perfect, temperature: 300 K, pressure: 2 bar abs}}\n"
                    "pistons: {ram: {closes: room, area: 1 cm2, at: 0 m, spring: {stiffness: 100 N/m, free_at: 0 m}, "
                    "friction: {viscous: 300 N s/m}}}\n"
                    "run: {until: 5 s}"));
  CHECK(run.last("ram.position") == within(10.0 / 100.0 * (1 - std::exp(-5.0 / 3.0)), 1e-7));
  CHECK(run.last("energy.friction") + run.last("energy.spring") == within(10.0 * run.last("ram.position"), 1e-7));
  check_books(run);
}

TEST_CASE("a weightless piston between two gases keeps them at one pressure") {
  const ModelRun run =
      run_model(perfect_model("gas_spaces:\n"
                              "  hot: {volume: 5 l, gas: perfect, temperature: 300 K, pressure: 2 bar abs}\n"
                              "  cold: {volume: 3 l, gas: perfect, temperature: 300 K, pressure: 2 bar abs}\n"
                              "pistons: {wall: {closes: hot, area: 100 cm2, at: 500 mm, back: {space: cold}}}\n"
                              "stirrers: {mixer: {in: hot, power: 50 W}}\nrun: {until: 20 s}"));
  const double p = 2e5 + 0.4 * 1000.0 / 8e-3;
  CHECK(run.last("hot.pressure") == within(p, 1e-10));
  CHECK(run.last("cold.pressure") == within(run.last("hot.pressure"), 1e-12));
  CHECK(run.last("cold.volume") == within(3e-3 * std::pow(2e5 / p, 1 / 1.4), 1e-7));
  CHECK(run.last("energy.boundary_work") == 0.0);  // nets out
  check_books(run);
}

TEST_CASE("two balanced pistons share a space") {
  const ModelRun run = run_model(perfect_model(
      "gas_spaces: {cylinder: {volume: 5 l, gas: perfect, temperature: 300 K, pressure: 2 bar abs}}\n"
      "pistons:\n"
      "  wide: {closes: cylinder, area: 100 cm2, at: 100 mm, spring: {stiffness: 20 kN/m, free_at: 50 mm}}\n"
      "  slim: {closes: cylinder, area: 40 cm2, at: 300 mm, mass: 20 kg, spring: {stiffness: 1 kN/m, free_at: 100 "
      "mm}}\n"
      "stirrers: {mixer: {in: cylinder, power: 50 W}}\nrun: {until: 20 s}"));
  // Both positions and the work follow from the pressure, the pressure from the first law.
  const auto wide = [](double p) { return 0.05 + (p - 1e5) * 0.01 / 20e3; };
  const auto slim = [](double p) { return 0.1 + ((p - 1e5) * 0.004 - 200.0) / 1e3; };
  const auto energy = [&](double p) {
    const double a = wide(p) - wide(2e5), b = slim(p) - slim(2e5);
    const double work = 0.5 * (p + 2e5) * (0.01 * a + 0.004 * b);  // forces are linear in travel
    return 2.5 * (p * (5e-3 + 0.01 * a + 0.004 * b) - 2e5 * 5e-3) + work;
  };
  double low = 2e5, high = 4e5;
  for (int i = 0; i < 100; ++i) (energy(0.5 * (low + high)) < 1000.0 ? low : high) = 0.5 * (low + high);
  CHECK(run.last("cylinder.pressure") == within(low, 1e-8));
  CHECK(run.last("wide.position") == within(wide(low), 1e-7));
  CHECK(run.last("slim.position") == within(slim(low), 1e-7));
  CHECK(run.last("wide.position") == within(wide(run.last("cylinder.pressure")), 1e-11));
  CHECK(run.last("slim.position") == within(slim(run.last("cylinder.pressure")), 1e-11));
  check_books(run);
}

TEST_CASE("friction heat goes to the wall where one is there") {
  const ModelRun run =
      run_model(cylinder("mass: 100 kg, friction: {kinetic: 80 N}",
                         "walls: {shell: {around: cylinder, area: 0.1 m2, layers: [{material: copper, thickness: 1 "
                         "mm}], temperature: 300 K, inside: {film: none}, outside: {film: none}}}\n"
                         "stirrers: {mixer: {in: cylinder, power: 50 W}}\nrun: {until: 20 s}"));
  CHECK(run.last("energy.friction") > 5.0);
  CHECK(run.last("energy.returned") == within(run.last("energy.friction"), 1e-14));
  CHECK(run.last("shell.temperature") > 300.0);
  CHECK(run.last("entropy.friction") > 0.0);
  check_books(run);
}

TEST_CASE("a start far from the balance is refused with the right pressure") {
  const ModelRun run = run_model(cylinder("mass: 100 kg", "run: {until: 1 s}", "pressure: 2.3 bar abs"), {}, true);
  CHECK_THAT(run.problems, Contains("200000 Pa abs"));
}
