#include "support/perfect_gas.h"
#include "unit/plant/contract_plants.h"

using namespace gaskettle;
using namespace gaskettle::testing;

TEST_CASE("the ledgers close to rounding at any tolerance, by any method") {
  for (const ContractPlant& c : contract_plants())
    for (const char* rtol : {"1e-3", "1e-6"})
      for (const char* method : {"stiff", "auto"}) {
        INFO(c.name << ", rtol " << rtol << ", " << method);
        const ModelRun run = run_model(c.yaml, {std::string("run.rtol=") + rtol, std::string("run.method=") + method});
        CHECK(run.result.ending.complete());
        CHECK(run.result.books.closure_energy <= closure_bound);
        CHECK(run.result.books.closure_mass <= closure_bound);
      }
}

TEST_CASE("the entropy of all stores is what crossed the boundary and what was generated") {
  for (const ContractPlant& c : contract_plants()) {
    INFO(c.name);
    const ModelRun run = run_model(c.yaml, {"run.rtol=1e-8"});
    const Books& b = run.result.books;
    CHECK(b.generated > 0.0);
    CHECK(std::abs(b.entropy_imbalance()) <= 10 * 1e-8 * b.generated);
    for (const double s : b.entropy) CHECK(s >= -1e-8 * b.generated);
  }
}

TEST_CASE("kinetic and spring work agree with their state functions") {
  for (const ContractPlant& c : contract_plants()) {
    INFO(c.name);
    for (const WorkComparison& w : run_model(c.yaml, {"run.rtol=1e-9"}).result.books.work) {
      INFO(w.what);
      CHECK(std::abs(w.difference()) <= 1e-6 * w.scale);
    }
  }
}

TEST_CASE("the record's columns are the books: sums, parts of terms, balance in every row") {
  const ModelRun run = run_model(contract_plants()[0].yaml);
  const double throughput = run.result.books.throughput;
  for (std::size_t i = 0; i < run.time.size(); ++i) {
    const double left = run["energy.shaft"][i] + run["energy.heater"][i] + run["energy.flux"][i] +
                        run["energy.enthalpy_in"][i] + run["energy.returned"][i];
    const double right = run["energy.enthalpy_out"][i] + run["energy.wall_loss"][i] + run["energy.boundary_work"][i] +
                         run["energy.stored"][i];
    // An interpolant is linear in the states too.
    if (std::abs(left - right) > 1e-11 * throughput) FAIL_CHECK("row at " << run.time[i] << " s: " << left - right);
  }
  CHECK(run.last("energy.heater") == within(run.last("energy.heater.element") + run.last("energy.heater.mat") +
                                                run.last("energy.heater.cartridge") + run.last("energy.heater.chiller"),
                                            1e-12));
  CHECK(run.last("energy.wall_loss") ==
        within(run.last("energy.wall_loss.shell") + run.last("energy.wall_loss.skin"), 1e-12));
  CHECK(run.last("energy.heater") ==
        within(run.result.books.term[static_cast<std::size_t>(LedgerTerm::heater)], 1e-14));
  double sum = 0.0;
  for (const char* m : mechanism_names) sum += run.last(std::string("entropy.") + m);
  CHECK(run.last("entropy.generated") == within(sum, 1e-12));
}

TEST_CASE("no throughput, no residual") {
  const ModelRun run = run_model(perfect_model(
      "gas_spaces: {tank: {volume: 1 l, gas: perfect, temperature: 300 K, pressure: 1 bar abs}}\nrun: {until: 1 h}"));
  CHECK(run.result.books.throughput == 0.0);
  CHECK(run.result.books.closure_energy == 0.0);
  CHECK(run.last("tank.temperature") == within(300.0, 1e-15));
}

TEST_CASE("a small throughput beside a large store still closes") {
  const ModelRun run = run_model(
      perfect_model("gas_spaces: {tank: {volume: 1 m3, gas: perfect, temperature: 300 K, pressure: 50 bar abs}}\n"
                    "walls: {block: {around: tank, area: 6 m2, layers: [{material: carbon_steel, thickness: 300 mm}], "
                    "temperature: 300 K, inside: {film: 10 W/m2/K}, outside: {film: 5 W/m2/K}}}\n"
                    "heaters: {coil: {in: tank, power: 1 mW}}\nrun: {until: 10 min}"));
  CHECK(run.last("energy.heater") == within(0.6, 1e-12));
  check_books(run);
}
