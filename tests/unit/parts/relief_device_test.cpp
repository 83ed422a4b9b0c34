#include "support/perfect_gas.h"

using namespace gaskettle;
using namespace gaskettle::testing;

namespace {
using namespace gaskettle::testing::perfect;
constexpr double volume = 0.1, inflow = 5e-3;  // m3, kg/s of gas at 300 K

std::string fed(const std::string& valve, const std::string& until) {
  return perfect_model(
      "gas_spaces: {tank: {volume: 100 l, gas: perfect, temperature: 300 K, pressure: 4 bar abs}}\n"
      "ports: {feed: {from: {supply: {gas: perfect, pressure: 100 bar abs, temperature: 300 K}}, to: tank, flow: 5 "
      "g/s}}\n"
      "relief_devices: {valve: {protects: tank, " +
      valve + "}}\nrun: {until: " + until + "}");
}

/// The same vessel by itself: mass and p V, classical Runge-Kutta with short steps, cut where the pressure meets a
/// bound.
struct Vessel {
  double t = 0.0, mass = 4e5 * volume / (R * 300.0), p = 4e5;
  static std::pair<double, double> slopes(double m, double pressure, double area) {
    const double T = pressure * volume / (m * R), out = area * choked_flux(pressure, T);
    return {inflow - out, 0.4 / volume * cp * (inflow * 300.0 - out * T)};
  }
  void step(double h, double area) {
    const auto [a, b] = slopes(mass, p, area);
    const auto [c, d] = slopes(mass + 0.5 * h * a, p + 0.5 * h * b, area);
    const auto [e, f] = slopes(mass + 0.5 * h * c, p + 0.5 * h * d, area);
    const auto [g, i] = slopes(mass + h * e, p + h * f, area);
    mass += h / 6 * (a + 2 * c + 2 * e + g);
    p += h / 6 * (b + 2 * d + 2 * f + i);
    t += h;
  }
  void until(double bound, bool rising, double area) {
    constexpr double h = 2e-4;
    for (;;) {
      Vessel next = *this;
      next.step(h, area);
      if (rising ? next.p >= bound : next.p <= bound) break;
      *this = next;
    }
    double low = 0.0, high = h;
    for (int i = 0; i < 60; ++i) {
      Vessel next = *this;
      next.step(0.5 * (low + high), area);
      ((rising ? next.p >= bound : next.p <= bound) ? high : low) = 0.5 * (low + high);
    }
    step(high, area);
  }
};
}  // namespace

TEST_CASE("a valve pops and reseats as an integration of its own says") {
  const ModelRun run =
      run_model(fed("set: 5 bar gauge, reseat: 4.5 bar gauge, flow_area: 8 mm2, discharge_coefficient: 0.75", "400 s"));
  Vessel vessel;
  for (std::size_t n = 0; n < 4; ++n) {
    vessel.until(6e5, true, 0.0);
    CHECK(run.event_time("valve", "lifts", n) == within(vessel.t, 1e-7));
    vessel.until(5.5e5, false, 6e-6);
    CHECK(run.event_time("valve", "reseats", n) == within(vessel.t, 1e-7));
  }
  REQUIRE(run.result.reliefs.size() == 1);
  const ReliefOutcome& valve = run.result.reliefs[0];
  CHECK(valve.lifts == static_cast<long>(run.event_count("valve", "lifts")));
  CHECK(valve.greatest_opening == 1.0);
  CHECK(valve.peak_pressure == within(6e5, 1e-7));  // a popped valve of this size turns the pressure at once
  CHECK(valve.accumulation == near(0.0, 1e-7));
  CHECK(valve.set_pressure == within(6e5, 1e-14));
  CHECK(valve.released == within(run.last("mass.out.perfect"), 1e-9));
  CHECK(run.last("valve.released") == within(valve.released, 1e-12));
  check_books(run);
}

TEST_CASE("blowdown says the same as reseat") {
  const ModelRun a =
      run_model(fed("set: 5 bar gauge, reseat: 4.5 bar gauge, flow_area: 8 mm2, discharge_coefficient: 0.75", "80 s"));
  const ModelRun b =
      run_model(fed("set: 5 bar gauge, blowdown: 10 %, flow_area: 8 mm2, discharge_coefficient: 0.75", "80 s"));
  CHECK(b.event_time("valve", "reseats") == within(a.event_time("valve", "reseats"), 1e-9));
}

TEST_CASE("a proportional valve finds the lift that passes what comes in") {
  const ModelRun run = run_model(
      fed("set: 5 bar gauge, action: proportional, full_lift_at: 20 %, flow_area: 8 mm2, discharge_coefficient: 0.75",
          "2 h"));
  // At rest what leaves has the enthalpy of what enters: 300 K again.
  double low = 6e5, high = 7e5;
  for (int i = 0; i < 100; ++i) {
    const double p = 0.5 * (low + high);
    ((p - 6e5) / 1e5 * 6e-6 * choked_flux(p, 300.0) < inflow ? low : high) = p;
  }
  CHECK(run.last("tank.pressure") == within(low, 1e-8));
  CHECK(run.last("tank.temperature") == within(300.0, 1e-8));
  CHECK(run.last("valve.opening") == within((low - 6e5) / 1e5, 1e-7));
  CHECK(run.last("valve.flow") == within(inflow, 1e-8));
  CHECK(run.event_time("valve", "lifts") == within(2e5 * volume / (0.4 * inflow * cp * 300.0), 1e-7));
  CHECK(run.event_count("valve", "lifts") == 1);
  check_books(run);
}

TEST_CASE("a proportional valve too small goes to full lift and comes back with the pressure") {
  const ModelRun run = run_model(
      perfect_model("gas_spaces: {tank: {volume: 100 l, gas: perfect, temperature: 300 K, pressure: 4 bar abs}}\n"
                    "ports: {feed: {from: {supply: {gas: perfect, pressure: 100 bar abs, temperature: 300 K}}, to: "
                    "tank, flow: {schedule: [[0 s, 20 g/s], [15 s, 0 g/s]], held: true}}}\n"
                    "relief_devices: {valve: {protects: tank, set: 5 bar gauge, action: proportional, flow_area: 8 "
                    "mm2, discharge_coefficient: 0.75}}\nrun: {until: 60 s}"));
  std::vector<std::string> what;
  for (const LoggedEvent& e : run.result.events) what.push_back(e.what);
  CHECK(what == std::vector<std::string>{"lifts", "reaches full lift", "leaves full lift"});
  // Its flow fades with its lift: the set pressure is approached from above and not crossed.
  CHECK(run.last("tank.pressure") == within(6e5, 1e-3));
  CHECK(run.last("tank.pressure") > 6e5);
  CHECK(run.last("valve.opening") < 0.02);
  check_books(run);
}

TEST_CASE("a disc bursts once and stays open both ways") {
  const ModelRun run = run_model(perfect_model(
      "gas_spaces: {tank: {volume: 100 l, gas: perfect, temperature: 300 K, pressure: 4 bar abs}}\n"
      "heaters: {coil: {in: tank, power: {schedule: [[0 s, 2 kW], [60 s, -50 W], [400 s, 0 W]], held: true}}}\n"
      "relief_devices: {disc: {protects: tank, burst: 5 bar gauge, flow_area: 8 mm2, discharge_coefficient: "
      "0.62}}\nrun: {until: 600 s}"));
  CHECK(run.event_time("disc", "bursts") == within(2e5 * volume / (0.4 * 2000.0), 1e-7));
  CHECK(run.event_count("disc", "bursts") == 1);
  CHECK(run.last("disc.opening") == 1.0);
  CHECK(run.last("mass.in.perfect") > 0.0);  // cooled, it draws gas back in
  CHECK(run.last("tank.pressure") == within(1e5, 1e-3));
  CHECK(run.result.reliefs[0].disc);
  check_books(run);
}

TEST_CASE("back pressure acts on a valve unless it is balanced") {
  const auto lifts = [](const std::string& balanced) {
    return run_model(
        perfect_model("gas_spaces:\n  tank: {volume: 100 l, gas: perfect, temperature: 300 K, pressure: 4 bar abs}\n"
                      "  header: {volume: 1 m3, gas: perfect, temperature: 300 K, pressure: 1.5 bar abs}\n"
                      "heaters: {coil: {in: tank, power: 2 kW}}\n"
                      "relief_devices: {valve: {protects: tank, to: header, set: 5 bar gauge, blowdown: 10 %, "
                      "flow_area: 8 mm2, discharge_coefficient: 0.7" +
                      balanced + "}}\nrun: {until: 40 s}"));
  };
  const double bar = 1e5 * volume / (0.4 * 2000.0);
  CHECK(lifts("").event_time("valve", "lifts") == within(2.5 * bar, 1e-7));
  CHECK(lifts(", balanced: true").event_time("valve", "lifts") == within(2.0 * bar, 1e-7));
  check_books(lifts(""));
}
