#include "support/perfect_gas.h"

using namespace gaskettle;
using namespace gaskettle::testing;

namespace {
/// Gas of a heat capacity of 1000/6 J/K at 300 K, a heater of 500 W: 3 K/s.
constexpr double capacity = 1000.0 / 6.0;
std::string heated(const std::string& controller, const std::string& rest, const std::string& more = "") {
  return perfect_model(
      "gas_spaces: {tank: {volume: 100 l, gas: perfect, temperature: 300 K, pressure: 2 bar abs}}\n"
      "heaters:\n  coil: {in: tank, rating: 500 W}\n" +
      more + "controllers: {loop: {drives: coil.power, holds: tank.temperature, " + controller + "}}\n" + rest);
}
}  // namespace

TEST_CASE("the period of an on/off controller") {
  const ModelRun run = run_model(heated("at: 330 K, by: {on_off: {dead_band: 4 K}}", "run: {until: 200 s}",
                                        "  cooler: {in: tank, power: -200 W}\n"));
  const double up = 300.0 / capacity, down = 200.0 / capacity;  // K/s
  double t = 32.0 / up;                                         // starts on, off at 332 K
  for (std::size_t n = 0; n < 10; ++n) {
    CHECK(run.event_time("loop", "switches off", n) == within(t, 1e-9));
    t += 4.0 / down;
    CHECK(run.event_time("loop", "switches on", n) == within(t, 1e-9));
    t += 4.0 / up;
  }
  check_books(run);
}

TEST_CASE("a PI controller rides on its limit, lets go once, and settles") {
  // Full power less the cooler's 200 W warms by 1.8 K/s. The unlimited output, gain e, falls to 500 W at e = 25 K; as
  // e/Ti = 3.1 K/s there, the free output would push out again, and the frozen one would let it fall in: it is held
  // until e/Ti = 1.8 K/s.
  const double slope = 1.8, gain = 20.0, reset = 8.0, lets_go = (100.0 - slope * reset) / slope;
  const std::string model = heated("at: 400 K, by: {pi: {gain: 20 W/K, reset_time: 8 s}}", "run: {until: 100 s}",
                                   "  cooler: {in: tank, power: -200 W}\n");
  std::vector<long> instants;
  for (const char* rtol : {"1e-6", "1e-8", "1e-10"}) {
    const ModelRun run = run_model(model, {std::string("run.rtol=") + rtol});
    CHECK(run.event_time("loop", "leaves its upper limit") == within(lets_go, 1e-6));
    CHECK(run.result.events.size() == 1);
    CHECK(run.at("loop.output", 30.0) == 500.0);
    CHECK(value_after(run, "loop.output", 45.0) == 500.0);
    instants.push_back(run.result.ending.stats.events);
    check_books(run);
  }
  CHECK(instants == std::vector<long>(3, instants[0]));  // chatter would double with each halving of the step
  CHECK(instants[0] <= 3);
  // Free from there: e'' + k e' + k/Ti e = 0 with k = gain/C, from e = slope Ti, e' = -slope.
  const double k = gain / capacity, t = 100.0 - lets_go, w = std::sqrt(k / reset - k * k / 4);
  const double e =
      std::exp(-k * t / 2) * (slope * reset * std::cos(w * t) + (-slope + k / 2 * slope * reset) / w * std::sin(w * t));
  CHECK(400.0 - run_model(model).last("tank.temperature") == near(e, 1e-6));
}

TEST_CASE("a setpoint that jumps: the output answers with its proportional part") {
  const auto stepped = [](const std::string& to) {
    return run_model(heated(
        "at: {schedule: [[0 s, 400 K], [45 s, " + to + "]], held: true}, by: {pi: {gain: 20 W/K, reset_time: 8 s}}",
        "run: {until: 60 s}", "  cooler: {in: tank, power: -200 W}\n"));
  };
  SECTION("down by 5 K while the output is held: it drops by 100 W at once") {
    const ModelRun run = stepped("395 K");
    CHECK(run.event_time("loop", "leaves its upper limit") == 45.0);
    CHECK(value_after(run, "loop.output", 45.0) == within(400.0, 1e-9));
  }
  SECTION("up: further beyond the limit") {
    const ModelRun run = stepped("420 K");
    // The integral is frozen where the limit had led it: I/Ti = 25 - 19 = 6 K at 45 s; gain (e + 6) = 500 at e = 19 K,
    // and there it is held again.
    CHECK(value_after(run, "loop.output", 45.0) == 500.0);
    CHECK(run.event_count("loop", "leaves its upper limit") == 1);
    CHECK(run.event_time("loop", "leaves its upper limit") == within((120.0 - 1.8 * 8.0) / 1.8, 1e-6));
  }
}

TEST_CASE("the integral starts at zero and the output is gain times error at first") {
  const ModelRun run =
      run_model(heated("at: 310 K, by: {pi: {gain: 20 W/K, reset_time: 60 s}}", "run: {until: 100 s}"));
  CHECK(run["loop.output"].front() == within(200.0, 1e-12));
  // e'' + k e' + k/Ti e = 0, e = 10, e' = -200/C.
  const double k = 20.0 / capacity, a = k / 2, w2 = a * a - k / 60.0, w = std::sqrt(w2);
  const double e =
      std::exp(-a * 20.0) * (10.0 * std::cosh(w * 20.0) + (-200.0 / capacity + a * 10.0) / w * std::sinh(w * 20.0));
  CHECK(310.0 - run.at("tank.temperature", 20.0) == near(e, 1e-6));
  CHECK(run.last("loop.setpoint") == within(310.0, 1e-15));
}

TEST_CASE("a setpoint ramp starts from the reading") {
  const ModelRun run = run_model(heated(
      "at: {ramp: {to: 340 K, at: 30 K/min}}, by: {pi: {gain: 200 W/K, reset_time: 30 s}}", "run: {until: 100 s}"));
  CHECK(run["loop.setpoint"].front() == within(300.0, 1e-14));
  CHECK(run.at("loop.setpoint", 50.0) == within(325.0, 1e-12));
  CHECK(run.last("loop.setpoint") == within(340.0, 1e-12));
}

TEST_CASE("a controller drives a cooler: as the reading rises its power falls, below zero") {
  const auto chilled = [](const std::string& by) {
    return run_model(
        perfect_model("gas_spaces: {tank: {volume: 100 l, gas: perfect, temperature: 300 K, pressure: 2 bar abs}}\n"
                      "heaters:\n  chiller: {in: tank, rating: -500 W}\n  load: {in: tank, power: 200 W}\n"
                      "controllers: {loop: {drives: chiller.power, holds: tank.temperature, at: 290 K, by: " +
                      by + "}}\nrun: {until: 10 min}"));
  };
  SECTION("proportional-integral") {
    const ModelRun run = chilled("{pi: {gain: 50 W/K, reset_time: 20 s}}");
    CHECK(run["chiller.power"].front() == within(-500.0, 1e-9));  // 50 W/K times 10 K: just at the limit
    CHECK(run.last("tank.temperature") == near(290.0, 1e-5));
    CHECK(run.last("chiller.power") == within(-200.0, 1e-4));
    check_books(run);
  }
  SECTION("on and off") {
    const ModelRun run = chilled("{on_off: {dead_band: 2 K}}");
    CHECK(run["chiller.power"].front() == -500.0);
    CHECK(run.event_time("loop", "switches off") == within(11.0 * capacity / 300.0, 1e-9));
    CHECK(run.event_time("loop", "switches on") == within(11.0 * capacity / 300.0 + 2.0 * capacity / 200.0, 1e-9));
    check_books(run);
  }
}

TEST_CASE("a controller opens a vent on rising pressure") {
  const ModelRun run = run_model(
      perfect_model("gas_spaces: {tank: {volume: 100 l, gas: perfect, temperature: 300 K, pressure: 3 bar abs}}\n"
                    "ports:\n  feed: {from: {supply: {gas: perfect, pressure: 20 bar abs, temperature: 300 K}}, to: "
                    "tank, flow: 4 g/s}\n"
                    "  vent: {from: tank, to: atmosphere, orifice: {area: 10 mm2, discharge_coefficient: 0.8}}\n"
                    "controllers: {loop: {drives: vent.opening, holds: tank.pressure, at: 5 bar abs, action: direct, "
                    "by: {pi: {gain: 0.5 1/bar, reset_time: 20 s}}}}\nrun: {until: 2 h}"));
  CHECK(run.last("tank.pressure") == within(5e5, 1e-7));
  CHECK(run.last("vent.opening") == within(4e-3 / (8e-6 * perfect::choked_flux(5e5, 300.0)), 1e-6));
  check_books(run);
}
