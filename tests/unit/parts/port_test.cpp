#include "support/perfect_gas.h"

using namespace gaskettle;
using namespace gaskettle::testing;

namespace {
using namespace gaskettle::testing::perfect;
constexpr double volume = 0.1;
std::string tank(const std::string& pressure, const std::string& ports, const std::string& run) {
  return perfect_model("gas_spaces: {tank: {volume: 100 l, gas: perfect, temperature: 300 K, pressure: " + pressure +
                       "}}\nports: {line: {" + ports + "}}\nrun: {" + run + "}");
}
}  // namespace

TEST_CASE("a stated flow fills until its source no longer exceeds its sink") {
  const ModelRun run = run_model(tank(
      "1 bar abs", "from: {supply: {gas: perfect, pressure: 3 bar abs, temperature: 350 K}}, to: tank, flow: 1 g/s",
      "until: 300 s"));
  // dp/dt = (gamma - 1) m h / V with h from 0 K for a perfect gas: cp T.
  const double ends = 2e5 * volume / (0.4 * 1e-3 * cp * 350.0);
  CHECK(run.event_time("line", "stated flow needs a pump and ends") == within(ends, 1e-7));
  CHECK(run.last("tank.pressure") == within(3e5, 1e-7));
  CHECK(run.last("mass.in.perfect") == within(1e-3 * ends, 1e-7));
  CHECK(run.last("line.flow") == 0.0);
  CHECK(run.result.events.size() == 1);
  check_books(run);
}

TEST_CASE("a stated volume flow at the state upstream empties a vessel along the adiabat") {
  const ModelRun run =
      run_model(tank("3 bar abs", "from: tank, to: atmosphere, flow: 6 l/min actual", "until: 30 min"));
  // dm/dt = -m q/V, and what stays expands adiabatically: p = p0 exp(-gamma q t/V).
  const double q = 1e-4, ends = volume / (kappa * q) * std::log(3.0);
  CHECK(run.event_time("line", "stated flow needs a pump and ends") == within(ends, 1e-7));
  CHECK(run.last("tank.temperature") == within(300.0 * std::pow(3.0, -0.4 / 1.4), 1e-7));
  check_books(run);
}

TEST_CASE("molar and normal flows are amounts of gas") {
  const std::string from = "from: {supply: {gas: perfect, pressure: 30 bar abs, temperature: 350 K}}, to: tank, ";
  CHECK(run_model(tank("1 bar abs", from + "flow: 0.01 mol/s", "until: 60 s")).last("line.flow") ==
        within(0.01 * 0.028, 1e-12));
  const double amount = 101325.0 * 0.5e-3 / (8.31446261815324 * 273.15);  // of 0.5 l/s at 0 degC, 101325 Pa
  CHECK(run_model(tank("1 bar abs", from + "flow: 30 l/min normal", "until: 60 s")).last("line.flow") ==
        within(amount * 0.028, 1e-9));
}

TEST_CASE("a supply whose pressure and temperature are scheduled") {
  const ModelRun run = run_model(
      tank("1 bar abs",
           "from: {supply: {gas: perfect, pressure: {schedule: [[0 s, 20 bar abs], [50 s, 20 bar abs], [50 s, 0.5 bar "
           "abs]]}, temperature: {schedule: [[0 s, 300 K], [100 s, 400 K]]}}}, to: tank, flow: 1 g/s",
           "until: 100 s"));
  // Enthalpy from 298.15 K; the flow ends where the supply's pressure falls away.
  CHECK(run.event_time("line", "stated flow needs a pump and ends") == 50.0);
  CHECK(run.last("energy.enthalpy_in") == within(1e-3 * 50.0 * cp * (325.0 - zero_of_enthalpy), 1e-9));
  check_books(run);
}

TEST_CASE("choked blowdown through an opening that opens slowly") {
  const ModelRun run = run_model(tank("10 bar abs",
                                      "from: tank, to: atmosphere, orifice: {area: 20 mm2, discharge_coefficient: "
                                      "0.8}, opening: {schedule: [[0 s, 0], [2 s, 1]]}",
                                      "until: 6 s"));
  // Adiabatic, choked: p = p0 (1 + (gamma-1)/2 k t)^(-2 gamma/(gamma-1)), k the initial flow over the mass
  // (M. A. Saad, Compressible Fluid Flow, 2nd ed. 1993, discharge from a reservoir); t counts full opening: 1 + 4 s.
  const double mass = 1e6 * volume / (R * 300.0), k = 16e-6 * choked_flux(1e6, 300.0) / mass;
  const double p = 1e6 * std::pow(1 + 0.2 * k * 5.0, -7.0);
  CHECK(p > 1e5 / 0.528);  // choked to the end
  CHECK(run.last("tank.pressure") == within(p, 1e-7));
  CHECK(run.last("tank.temperature") == within(300.0 * std::pow(p / 1e6, 0.4 / 1.4), 1e-7));
  CHECK(run.last("line.opening") == 1.0);
  CHECK(run.last("mass.out.perfect") == within(mass * (1 - std::pow(1 + 0.2 * k * 5.0, -5.0)), 1e-7));
  CHECK(run.last("entropy.throttling") > 0.0);
  check_books(run);
}

TEST_CASE("charging from a supply heats the gas by the flow work") {
  const ModelRun run = run_model(tank("0.5 bar abs",
                                      "from: {supply: {gas: perfect, pressure: 8 bar abs, temperature: 300 K}}, to: "
                                      "tank, orifice: {bore: 4 mm, discharge_coefficient: 0.8}",
                                      "until: 60 s"));
  // First law between start and end: T = gamma Ts / (1 + p0/p (gamma Ts/T0 - 1)).
  const double p = run.last("tank.pressure");
  CHECK(p == within(8e5, 1e-6));  // regularised near equal pressure: it ends exponentially
  CHECK(run.last("tank.temperature") == within(1.4 * 300.0 / (1 + 0.5e5 / p * 0.4), 1e-7));
  check_books(run);
}

TEST_CASE("one way only") {
  const std::string path = "from: tank, to: atmosphere, orifice: {bore: 4 mm, discharge_coefficient: 0.8}";
  CHECK(run_model(tank("0.5 bar abs", path + ", one_way: true", "until: 60 s")).last("mass.in.perfect") == 0.0);
  CHECK(run_model(tank("0.5 bar abs", path, "until: 60 s")).last("tank.pressure") == within(1e5, 1e-6));
}

TEST_CASE("a component by ISO 6358 passes C p rho_ref sqrt(T_ref/T) when choked") {
  const ModelRun run = run_model(
      "gaskettle: 1\nsurroundings: {pressure: 100 kPa abs}\ngas_spaces: {tank: {volume: 100 l, gas: air, temperature: "
      "350 K, pressure: 8 bar abs}}\n"
      "ports: {valve: {from: tank, to: atmosphere, iso6358: {C: 1 l/s/bar, b: 0.4}}}\nrun: {until: 1 ms}");
  // ISO 6358-1:2013: reference state 293.15 K, 100 kPa, density 1.185 kg/m3 (air of 65 % relative humidity; dry
  // air has 1.189, so within 0.5 %).
  CHECK(run["valve.flow"].front() == within(1e-8 * 8e5 * 1.185 * std::sqrt(293.15 / 350.0), 5e-3));
}

TEST_CASE("each species of a mixture is kept, and mixes as fractions of what flows") {
  const ModelRun run = run_model(
      "gaskettle: 1\nsurroundings: {pressure: 100 kPa abs, gas: nitrogen}\n"
      "gas_spaces:\n  a: {volume: 50 l, gas: {argon: 0.3, nitrogen: 0.7}, temperature: 300 K, pressure: 6 bar abs}\n"
      "  b: {volume: 80 l, gas: helium, temperature: 320 K, pressure: 2 bar abs}\n"
      "ports:\n  link: {from: a, to: b, orifice: {bore: 2 mm, discharge_coefficient: 0.8}}\n"
      "  feed: {from: {supply: {gas: {argon: 0.5, helium: 0.5}, pressure: 9 bar abs, temperature: 310 K}}, to: a, "
      "flow: 2 g/s}\n"
      "  vent: {from: b, to: atmosphere, orifice: {bore: 3 mm, discharge_coefficient: 0.8}}\nrun: {until: 2 min}");
  CHECK(run.result.books.closure_mass < 1e-13);
  const double argon =
      0.5 * 0.039948 / (0.5 * 0.039948 + 0.5 * 0.004002602);  // by mass; molar masses in g/mol: 39.948, 4.0026
  CHECK(run.last("mass.in.argon") == within(2e-3 * 120.0 * argon, 1e-5));
  CHECK(run.last("mass.in.argon") + run.last("mass.in.helium") == within(0.24, 1e-12));
  CHECK(run.last("mass.in.nitrogen") == 0.0);
  CHECK(run.last("mass.out.nitrogen") > 0.0);
  for (const char* space : {"a", "b"}) {
    double sum = 0.0;
    for (const char* gas : {"argon", "nitrogen", "helium"}) {
      const double x = run.last(std::string(space) + ".mole_fraction." + gas);
      CHECK(x >= 0.0);
      sum += x;
    }
    CHECK(sum == within(1.0, 1e-14));
  }
  CHECK(run.last("entropy.mixing") > 0.0);
  // The audit's bound: 10 rtol of what was generated.
  CHECK(std::abs(run.result.books.entropy_imbalance()) < 1e-7 * run.result.books.generated);
  check_books(run);
}

TEST_CASE("a steady flush replaces what was there exponentially") {
  // One molar mass and cp for both gases, one temperature and pressure: y = exp(-m t / M).
  const ModelRun run = run_model(
      "gaskettle: 1\ngases: {red: {molar_mass: 28 g/mol, cp: 29.1 J/mol/K}, blue: {molar_mass: 28 g/mol, cp: 29.1 "
      "J/mol/K}}\n"
      "surroundings: {temperature: 300 K, pressure: 100 kPa abs, gas: blue}\n"
      "gas_spaces: {tank: {volume: 100 l, gas: red, temperature: 300 K, pressure: 2 bar abs}}\n"
      "ports:\n  feed: {from: {supply: {gas: blue, pressure: 9 bar abs, temperature: 300 K}}, to: tank, flow: 5 g/s}\n"
      "  vent: {from: tank, to: atmosphere, flow: 5 g/s}\nrun: {until: 60 s}");
  const double mass = 2e5 * volume / (R * 300.0);
  CHECK(run.last("tank.mole_fraction.red") == within(std::exp(-5e-3 * 60.0 / mass), 1e-6));
  CHECK(run.last("tank.temperature") == within(300.0, 1e-9));
  check_books(run);
}
