#include "support/perfect_gas.h"

using namespace gaskettle;
using namespace gaskettle::testing;
using Catch::Matchers::Contains;

namespace {
/// Gas of 1000/6 J/K at 300 K and 2 bar in 100 l.
std::string tank(const std::string& rest) {
  return perfect_model("gas_spaces: {tank: {volume: 100 l, gas: perfect, temperature: 300 K, pressure: 2 bar abs}}\n" +
                       rest);
}
}  // namespace

TEST_CASE("two guards at one instant both act") {
  const ModelRun run =
      run_model(tank("heaters: {coil: {in: tank, power: 1 kW}}\n"
                     "relief_devices:\n"
                     "  left: {protects: tank, set: 2 bar gauge, reseat: 1.5 bar gauge, flow_area: 10 mm2, "
                     "discharge_coefficient: 0.7}\n"
                     "  right: {protects: tank, set: 2 bar gauge, reseat: 1.5 bar gauge, flow_area: 10 mm2, "
                     "discharge_coefficient: 0.7}\n"
                     "run: {until: 200 s}"));
  const std::size_t lifts = run.event_count("left", "lifts");
  CHECK(lifts >= 3);
  CHECK(run.event_count("right", "lifts") == lifts);
  CHECK(run.event_time("left", "lifts") == within(1e5 * 0.1 / 400.0, 1e-7));
  for (std::size_t n = 0; n < lifts; ++n)
    CHECK(run.event_time("left", "lifts", n) == run.event_time("right", "lifts", n));
  CHECK(run.last("left.released") == within(run.last("right.released"), 1e-12));
  CHECK(run.result.ending.stats.events == static_cast<long>(run.result.events.size() / 2));
  check_books(run);
}

TEST_CASE("a scheduled jump and a guard at one instant") {
  // 100 s of 100 W: the pressure meets the set pressure just when the power goes off, within the event tolerance.
  const ModelRun run =
      run_model(tank("heaters: {coil: {in: tank, power: {schedule: [[0 s, 100 W], [100 s, 0 W]], held: true}}}\n"
                     "relief_devices: {valve: {protects: tank, set: 1.4 bar gauge, reseat: 1.2 bar gauge, flow_area: "
                     "10 mm2, discharge_coefficient: 0.7}}\n"
                     "run: {until: 200 s}"));
  CHECK(run.last("energy.heater") == within(10e3, 1e-12));
  CHECK(run.event_count("valve", "lifts") <= 1);  // rounding decides whether it just lifts
  CHECK(run.event_count("valve", "reseats") == run.event_count("valve", "lifts"));
  check_books(run);
}

TEST_CASE("a pulse far shorter than a step is not overlooked") {
  const ModelRun run =
      run_model(tank("heaters: {coil: {in: tank, power: {schedule: [[0 s, 0 W], [1800 s, 2 kW], [1800.05 s, 0 W]], "
                     "held: true}}}\nrun: {until: 1 h}"));
  CHECK(run.last("energy.heater") == within(100.0, 1e-10));  // the width of the pulse in doubles: 2e-13 / 0.05
  CHECK(run.last("tank.temperature") == within(300.0 + 100.0 / (1000.0 / 6.0), 1e-12));
  CHECK(run.result.ending.stats.steps < 60);
  check_books(run);
}

TEST_CASE("a state-dependent pulse within a long run is found") {
  // A valve that lifts for a fraction of a second, once an hour, on a slow feed.
  const ModelRun run =
      run_model(tank("ports: {feed: {from: {supply: {gas: perfect, pressure: 50 bar abs, temperature: 300 K}}, to: "
                     "tank, flow: 0.01 g/s}}\n"
                     "relief_devices: {valve: {protects: tank, set: 1.5 bar gauge, reseat: 1.4 bar gauge, flow_area: "
                     "100 mm2, discharge_coefficient: 0.8}}\nrun: {until: 12 h}"));
  const double rate = 0.4 * 1e-5 * perfect::cp * 300.0 / 0.1;  // Pa/s
  CHECK(run.event_time("valve", "lifts") == within(0.5e5 / rate, 1e-7));
  CHECK(run.event_count("valve", "lifts") ==
        static_cast<std::size_t>(1 + (12 * 3600.0 - 0.5e5 / rate) / (0.1e5 / rate + 0.5)));
  CHECK(run.event_time("valve", "reseats") - run.event_time("valve", "lifts") < 1.0);
  check_books(run);
}

TEST_CASE("two vessels equalise in a few steps and stay equal") {
  const auto equalise = [](const char* method, const char* until) {
    return run_model(
        perfect_model("gas_spaces:\n  a: {volume: 100 l, gas: perfect, temperature: 300 K, pressure: 8 bar abs}\n"
                      "  b: {volume: 50 l, gas: perfect, temperature: 300 K, pressure: 1 bar abs}\n"
                      "ports: {link: {from: a, to: b, orifice: {bore: 5 mm, discharge_coefficient: 0.8}}}\n"
                      "run: {until: 1 h, rtol: 1e-6}"),
        {std::string("run.method=") + method, std::string("run.until=") + until});
  };
  const double p = (8e5 * 0.1 + 1e5 * 0.05) / 0.15;  // energies of a perfect gas add as p V
  for (const char* method : {"stiff", "auto"}) {
    INFO(method);
    const ModelRun run = equalise(method, "1 h");
    CHECK(run.last("a.pressure") == within(p, 1e-6));
    CHECK(run.last("b.pressure") == within(run.last("a.pressure"), 1e-9));
    // What stays expands adiabatically; the error is at most that of all steps, 1e-6 each.
    CHECK(run.last("a.temperature") == within(300.0 * std::pow(p / 8e5, 0.4 / 1.4), 1e-4));
    CHECK(run.result.events.empty());
    check_books(run);
    // They are equal after half a minute. A raw square root would stall there.
    const long first = equalise(method, "1 min").result.ending.stats.steps;
    CHECK(run.result.ending.stats.steps - first < 10);
  }
  CHECK(equalise("stiff", "1 h").result.ending.stats.steps < 60);
}

TEST_CASE("a valve with a tiny blowdown chatters: counted, and the run goes on") {
  const ModelRun run =
      run_model(tank("ports: {feed: {from: {supply: {gas: perfect, pressure: 50 bar abs, temperature: 300 K}}, to: "
                     "tank, flow: 5 g/s}}\n"
                     "relief_devices: {valve: {protects: tank, set: 2 bar gauge, blowdown: 0.1 %, flow_area: 40 mm2, "
                     "discharge_coefficient: 0.8}}\nrun: {until: 30 s}"));
  CHECK(run.result.ending.reason == EndReason::end_time);
  // 200 Pa up at 0.4 cp 300 K * 5 g/s / 0.1 m3 = 6.2 kPa/s or so: some tens of cycles a second.
  CHECK(run.event_count("valve", "lifts") > 100);
  CHECK(run.result.reliefs[0].lifts == static_cast<long>(run.event_count("valve", "lifts")));
  CHECK(run.last("tank.pressure") == within(3e5, 1.1e-3));
  check_books(run);
}

TEST_CASE("a storm ends the run and names who made it") {
  // The dead band is crossed faster than 1e-12 of the run.
  const ModelRun run =
      run_model(tank("heaters:\n  coil: {in: tank, rating: 50 kW}\n  chiller: {in: tank, power: -20 kW}\n"
                     "controllers: {nervous: {drives: coil.power, holds: tank.temperature, at: 310 K, by: {on_off: "
                     "{dead_band: 0.000000000001 K}}}}\nrun: {until: 1 h}"));
  CHECK(run.result.ending.reason == EndReason::event_storm);
  CHECK(run.result.partial());
  CHECK(run.result.ending.time == near(10.0 * 1000.0 / 6.0 / 30e3, 1e-3));
  CHECK_THAT(run.result.ending.message, Contains("nervous"));
  CHECK(run.result.books.closure_energy <= closure_bound);
  CHECK(run.time.size() >= 2);  // what was computed is kept
}

TEST_CASE("a model that starts past its guards settles at time zero") {
  const ModelRun run = run_model(
      perfect_model("gas_spaces: {tank: {volume: 100 l, gas: perfect, temperature: 300 K, pressure: 5 bar abs}}\n"
                    "relief_devices: {valve: {protects: tank, set: 2 bar gauge, reseat: 1 bar gauge, flow_area: 20 "
                    "mm2, discharge_coefficient: 0.8}}\n"
                    "sensors: {probe: {reads: tank.pressure, range: [0 bar abs, 4 bar abs]}}\n"
                    "controllers: {loop: {drives: coil.power, holds: tank.temperature, at: 290 K, by: {pi: {gain: 10 "
                    "W/K, reset_time: 1 min}}}}\n"
                    "heaters: {coil: {in: tank, rating: 500 W}}\nrun: {until: 60 s}"));
  CHECK(run.event_time("valve", "lifts") == 0.0);
  CHECK(run["valve.opening"].front() == 1.0);
  CHECK(run["probe.reading"].front() == 4e5);
  CHECK(run["coil.power"].front() == 0.0);
  check_books(run);
}

TEST_CASE("rows stand on each side of an event, and time rises strictly") {
  const ModelRun run =
      run_model(tank("heaters: {coil: {in: tank, power: {schedule: [[0 s, 10 W], [7.3 s, 90 W]], held: true}}}\nrun: "
                     "{until: 20 s, record_every: 2 s}"));
  const auto at = std::find(run.time.begin(), run.time.end(), 7.3);
  REQUIRE(at != run.time.end());
  CHECK(*(at - 1) == std::nextafter(7.3, 0.0));
  const auto i = static_cast<std::size_t>(at - run.time.begin());
  CHECK(run["coil.power"][i - 1] == 10.0);
  CHECK(run["coil.power"][i] == 90.0);
  CHECK(std::adjacent_find(run.time.begin(), run.time.end(), std::greater_equal<>()) == run.time.end());
  CHECK(run.time.size() == 11 + 2);
}
