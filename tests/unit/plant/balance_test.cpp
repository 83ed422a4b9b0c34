#include "support/perfect_gas.h"

// Balanced pistons stand on their balance at all times, however long and rough the run.
using namespace gaskettle;
using namespace gaskettle::testing;

namespace {
double force(const ModelRun& run, std::size_t row) {
  return 1e5 * 0.02 + 600.0 * perfect::gravity + 3000.0 * (run["ram.position"][row] - 0.2);
}
}  // namespace

TEST_CASE("the balance has not drifted after four hours of heating and cooling") {
  const ModelRun run = run_model(perfect_model(
      "gas_spaces: {cylinder: {shape: {cylinder: {bore: 160 mm, length: 600 mm}}, gas: perfect, temperature: 300 K}}\n"
      "walls: {shell: {around: cylinder, layers: [{material: carbon_steel, thickness: 8 mm}], temperature: 300 K, "
      "inside: {film: 40 W/m2/K}, outside: {film: 10 W/m2/K}}}\n"
      "heaters: {coil: {in: cylinder, heat_capacity: 300 J/K, conductance: 4 W/K, power: {schedule: [[0 s, 300 W], [7 "
      "min, 300 W], [7 min, 0 W], [13 min, 0 W]], repeat: forever}}}\n"
      "pistons: {ram: {closes: cylinder, area: 200 cm2, at: 600 mm, mass: 600 kg, spring: {stiffness: 3 kN/m, free_at: "
      "200 mm}}}\n"
      "run: {until: 4 h, rtol: 1e-6}"));
  double worst = 0.0;
  // Rows between steps are interpolated; at the events and at the end the states themselves stand.
  for (std::size_t i = 0; i < run.time.size(); ++i) {
    const double in_cycle = std::fmod(run.time[i], 780.0);
    if (in_cycle != 0.0 && in_cycle != 420.0 && i + 1 != run.time.size()) continue;
    worst = std::max(worst, std::abs(run["cylinder.pressure"][i] * 0.02 - force(run, i)) / force(run, i));
  }
  CHECK(worst < 1e-12);
  CHECK(run["ram.position"].back() != run["ram.position"].front());
  for (const WorkComparison& w : run.result.books.work) CHECK(std::abs(w.difference()) < 1e-6 * w.scale);
  check_books(run);
}

TEST_CASE("tighter tolerance only sharpens the answer: the balance holds at every one") {
  const std::string model = perfect_model(
      "gas_spaces: {cylinder: {volume: 12 l, gas: perfect, temperature: 300 K}}\n"
      "pistons: {ram: {closes: cylinder, area: 200 cm2, at: 600 mm, mass: 600 kg, spring: {stiffness: 3 kN/m, free_at: "
      "200 mm}}}\n"
      "heaters: {coil: {in: cylinder, power: {sine: {mean: 20 W, amplitude: 100 W, frequency: 0.2 Hz}}}}\nrun: {until: "
      "60 s}");
  const double exact = run_model(model, {"run.rtol=1e-11"}).last("ram.position");
  for (const auto& [rtol, error] : {std::pair{"1e-4", 1e-4}, std::pair{"1e-6", 1e-6}, std::pair{"1e-8", 1e-8}}) {
    const ModelRun run = run_model(model, {std::string("run.rtol=") + rtol});
    const std::size_t last = run.time.size() - 1;
    CHECK(run["cylinder.pressure"][last] * 0.02 == within(force(run, last), 1e-12));
    CHECK(run.last("ram.position") == within(exact, 10 * error));  // global error: some steps' worth
    check_books(run);
  }
}

TEST_CASE("three pistons in a row between four gases") {
  const ModelRun run =
      run_model(perfect_model("gas_spaces:\n"
                              "  a: {volume: 5 l, gas: perfect, temperature: 300 K, pressure: 2 bar abs}\n"
                              "  b: {volume: 4 l, gas: perfect, temperature: 300 K, pressure: 2 bar abs}\n"
                              "  c: {volume: 3 l, gas: perfect, temperature: 300 K, pressure: 2 bar abs}\n"
                              "  d: {volume: 2 l, gas: perfect, temperature: 300 K, pressure: 2 bar abs}\n"
                              "pistons:\n"
                              "  ab: {closes: a, area: 100 cm2, at: 500 mm, back: {space: b}}\n"
                              "  bc: {closes: b, area: 50 cm2, at: 500 mm, back: {space: c}}\n"
                              "  cd: {closes: c, area: 80 cm2, at: 500 mm, back: {space: d}}\n"
                              "stirrers: {mixer: {in: a, power: 50 W}}\nrun: {until: 20 s}"));
  const double p = 2e5 + 0.4 * 1000.0 / 14e-3;  // energies add as p V
  for (const char* space : {"a", "b", "c", "d"}) CHECK(run.last(std::string(space) + ".pressure") == within(p, 1e-9));
  for (const auto& [space, V] : {std::pair{"b", 4e-3}, std::pair{"c", 3e-3}, std::pair{"d", 2e-3}})
    CHECK(run.last(std::string(space) + ".volume") == within(V * std::pow(2e5 / p, 1 / 1.4), 1e-7));
  check_books(run);
}

TEST_CASE("a rod side: two spaces on areas of their own") {
  const ModelRun run =
      run_model(perfect_model("gas_spaces:\n"
                              "  head: {volume: 5 l, gas: perfect, temperature: 300 K}\n"
                              "  rod: {volume: 3 l, gas: perfect, temperature: 300 K, pressure: 4 bar abs}\n"
                              "pistons: {ram: {closes: head, area: 100 cm2, at: 500 mm, mass: 50 kg, force: 100 N, "
                              "back: {space: rod, area: 60 cm2}}}\n"
                              "stirrers: {mixer: {in: head, power: 50 W}}\nrun: {until: 20 s}"));
  CHECK(run["head.pressure"].front() == within((4e5 * 6e-3 + 600.0) / 0.01, 1e-14));
  CHECK(run.last("head.pressure") * 0.01 == within(run.last("rod.pressure") * 6e-3 + 600.0, 1e-12));
  CHECK(run.last("rod.pressure") * std::pow(run.last("rod.volume"), 1.4) == within(4e5 * std::pow(3e-3, 1.4), 1e-7));
  check_books(run);
}
