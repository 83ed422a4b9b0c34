#include "support/perfect_gas.h"

using namespace gaskettle;
using namespace gaskettle::testing;

namespace {
std::string tank(const std::string& rest) {
  return perfect_model("gas_spaces: {tank: {volume: 100 l, gas: perfect, temperature: 300 K, pressure: 2 bar abs}}\n" +
                       rest);
}
const double gas_capacity = 2e5 * 0.1 / 300.0 * 2.5;  // m cv, J/K
}  // namespace

TEST_CASE("a lumped body and the gas approach each other exponentially") {
  const ModelRun run =
      run_model(tank("bodies: {block: {in: tank, specific_heat: 500 J/kg/K, mass: 0.2 kg, area: 0.01 m2, film: 50 "
                     "W/m2/K, count: 3, temperature: 400 K}}\nrun: {until: 200 s}"));
  const double C = 300.0, G = 3 * 0.01 * 50.0, rate = G * (1 / C + 1 / gas_capacity);
  CHECK(run.last("block.temperature") - run.last("tank.temperature") == within(100.0 * std::exp(-rate * 200.0), 1e-6));
  CHECK(C * run.last("block.temperature") + gas_capacity * run.last("tank.temperature") ==
        within(C * 400.0 + gas_capacity * 300.0, 1e-12));
  CHECK(run.last("entropy.film") == within(C * std::log(run.last("block.temperature") / 400.0) +
                                               gas_capacity * std::log(run.last("tank.temperature") / 300.0),
                                           1e-7));
  check_books(run);
}

TEST_CASE("the core of a thick body lags its face by the parabola of a steady warm-up") {
  // Two sides, half thickness L: once the start is forgotten all rises at one rate r, and the core
  // lags by r rho c L^2 / (2 k) (H. S. Carslaw, J. C. Jaeger, Conduction of Heat in Solids, 2nd ed. 1959, section 3.7).
  // rho L A = 1000 * 0.02 * 0.5 = 10 kg: mass and area speak of the same slab.
  const ModelRun run = run_model(perfect_model(
      "materials: {brick: {density: 1000 kg/m3, specific_heat: 800 J/kg/K, conductivity: 0.5 W/m/K, emissivity: 0}}\n"
      "gas_spaces: {tank: {volume: 100 l, gas: perfect, temperature: 300 K, pressure: 2 bar abs}}\n"
      "bodies: {slab: {in: tank, material: brick, mass: 10 kg, area: 0.5 m2, film: 100 W/m2/K, half_thickness: 20 "
      "mm}}\n"
      "heaters: {coil: {in: tank, power: 50 W}}\nrun: {until: 3 h}"));
  const double rate = 50.0 / (8000.0 + gas_capacity);
  CHECK(run.last("slab.temperature") - run.last("slab.core_temperature") ==
        within(rate * 1000.0 * 800.0 * 4e-4 / (2 * 0.5), 1e-6));
  CHECK(run.last("tank.temperature") - run.last("slab.temperature") == within(rate * 8000.0 / (100.0 * 0.5), 1e-6));
  check_books(run);
}
