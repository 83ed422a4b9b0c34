#include "support/perfect_gas.h"

// Gas of 1000/6 J/K: 1 kW is 6 K/s, and all temperatures are straight lines.
using namespace gaskettle;
using namespace gaskettle::testing;

namespace {
std::string tank(const std::string& power, const std::string& rest) {
  return perfect_model(
      "gas_spaces: {tank: {volume: 100 l, gas: perfect, temperature: 300 K, pressure: 2 bar abs}}\n"
      "heaters: {coil: {in: tank, power: " +
      power + "}}\n" + rest);
}
constexpr double per_watt = 6e-3;  // K/s
// Up to 360 K at 10 s, down to 330 K at 20 s, up to 390 K at 40 s, then level.
const std::string zigzag = "{schedule: [[0 s, 1 kW], [10 s, -500 W], [20 s, 500 W], [40 s, 0 W]], held: true}";

const Target& target(const ModelRun& run, const std::string& name) {
  for (const Target& t : run.result.targets)
    if (t.name == name) return t;
  throw std::runtime_error("no target " + name);
}
const Limit& limit(const ModelRun& run, const std::string& name) {
  for (const Limit& l : run.result.limits)
    if (l.name == name) return l;
  throw std::runtime_error("no limit " + name);
}
}  // namespace

TEST_CASE("targets: first time, direction, one after the other") {
  const ModelRun run =
      run_model(tank(zigzag,
                     "targets:\n"
                     "  warm: {when: tank.temperature, reaches: 345 K}\n"
                     "  cooled: {when: tank.temperature, reaches: 345 K, direction: falling}\n"
                     "  again: {when: tank.temperature, reaches: 345 K, direction: rising, after: cooled}\n"
                     "  third: {when: tank.temperature, reaches: 350 K, after: again}\n"
                     "  never: {when: tank.temperature, reaches: 400 K}\n"
                     "  afterwards: {when: tank.temperature, reaches: 320 K, after: never}\n"
                     "  at_once: {when: tank.pressure, reaches: 2 bar abs}\n"
                     "run: {until: 60 s}"));
  CHECK(target(run, "warm").time == within(7.5, 1e-9));
  CHECK(target(run, "cooled").time == within(15.0, 1e-9));
  CHECK(target(run, "again").time == within(25.0, 1e-9));
  CHECK(target(run, "third").time == within(20.0 + 20.0 / 3.0, 1e-9));
  CHECK_FALSE(target(run, "never").reached());
  CHECK_FALSE(target(run, "afterwards").reached());
  CHECK(target(run, "at_once").time == 0.0);
  CHECK(run.result.target_missed());
  CHECK(run.result.ending.stats.events > 0);
}

TEST_CASE("a target settles at the beginning of the first stay that is long enough") {
  // Within 355 +- 5 K: 8.33 to 10 s or so on the way up, and from 18.33... no: 350 K down at 13.3 s; again up from 26.7
  // s to 30 s.
  const ModelRun run = run_model(tank(zigzag,
                                      "targets:\n"
                                      "  brief: {when: tank.temperature, settles_within: 6 K, of: 355 K, for: 3 s}\n"
                                      "  long: {when: tank.temperature, settles_within: 6 K, of: 355 K, for: 8 s}\n"
                                      "  level: {when: tank.temperature, settles_within: 2 K, of: 390 K, for: 15 s}\n"
                                      "run: {until: 60 s}"));
  // 349..361 K: in from 8.1667 s, through 360 K at 10 s, out at 349 K after 11/3 s more: a stay of 5.5 s.
  CHECK(target(run, "brief").time == within(49.0 / 6.0, 1e-9));
  CHECK(run.event_time("brief", "leaves its band") == within(10.0 + 11.0 / 3.0, 1e-9));  // a later exit is an event
  CHECK_FALSE(target(run, "long").reached());  // the second stay lasts 12/3 = 4 s
  CHECK(target(run, "level").time == within(20.0 + 58.0 / 3.0, 1e-9));
}

TEST_CASE("a stay that the end of the run cuts short does not count") {
  const ModelRun run = run_model(
      tank("1 kW",
           "targets: {hot: {when: tank.temperature, settles_within: 30 K, of: 360 K, for: 6 s}}\nrun: {until: 10 s}"));
  CHECK_FALSE(target(run, "hot").reached());  // inside from 5 s on
}

TEST_CASE("limits: extreme, when, margin, first crossing") {
  const ModelRun run = run_model(tank(zigzag,
                                      "limits:\n"
                                      "  high: {of: tank.temperature, below: 350 K}\n"
                                      "  low: {of: tank.temperature, above: 290 K}\n"
                                      "  exact: {of: tank.temperature, above: 300 K}\n"
                                      "  quick: {rate_of: tank.temperature, below: 5 K/s}\n"
                                      "  slow: {rate_of: tank.temperature, above: -4 K/s}\n"
                                      "run: {until: 60 s}"));
  CHECK(limit(run, "high").extreme == within(390.0, 1e-9));
  CHECK(limit(run, "high").crossed == within(50.0 / 6.0, 1e-9));
  CHECK(limit(run, "high").margin() == within(-40.0, 1e-8));
  CHECK(limit(run, "high").broken());
  CHECK_FALSE(limit(run, "low").broken());
  CHECK(limit(run, "low").margin() == within(10.0, 1e-9));
  CHECK(limit(run, "low").extreme_time == 0.0);
  CHECK_FALSE(limit(run, "exact").broken());  // equality keeps it
  CHECK(limit(run, "quick").extreme == within(1000.0 * per_watt, 1e-9));
  CHECK(limit(run, "quick").crossed == 0.0);
  CHECK(limit(run, "slow").extreme == within(-3.0, 1e-9));
  CHECK_FALSE(limit(run, "slow").broken());
  CHECK(run.result.limit_broken());
}

TEST_CASE("a limit on a difference, and a peak between rows") {
  // A sensor of 4 s behind a triangle: the difference peaks where slopes meet; rows only every 7 s.
  const ModelRun run = run_model(tank("{sine: {mean: 0 W, amplitude: 1 kW, frequency: 0.05 Hz}}",
                                      "sensors: {probe: {reads: tank.temperature, time_constant: 4 s}}\n"
                                      "limits:\n  lag: {of: tank.temperature, minus: probe.reading, below: 15 K}\n  "
                                      "top: {of: tank.temperature, below: 500 K}\n"
                                      "run: {until: 100 s, record_every: 7 s}"));
  // T = 300 + a/w (1 - cos w t): its top is 300 + 2 a/w at half a period, 10 s.
  const double w = 2 * 3.14159265358979323846 * 0.05;
  CHECK(limit(run, "top").extreme == within(300.0 + 2 * 6.0 / w, 1e-7));
  // d = T - lagged obeys d' + d/tau = a sin w t; from rest d = A (sin(w t - f) + sin f exp(-t/tau)), tan f = w tau.
  const double A = 6.0 / std::sqrt(w * w + 1 / 16.0), f = std::atan(w * 4.0);
  double most = 0.0, crossed = -1.0;
  const auto d = [&](double t) { return A * (std::sin(w * t - f) + std::sin(f) * std::exp(-t / 4.0)); };
  for (double t = 0.0; t < 100.0; t += 1e-4) most = std::max(most, d(t));
  if (most > 15.0) {
    double a = 0.0, b = 10.0;
    for (int i = 0; i < 60; ++i) (d(0.5 * (a + b)) < 15.0 ? a : b) = 0.5 * (a + b);
    crossed = a;
  }
  CHECK(limit(run, "lag").extreme == within(most, 1e-6));
  if (crossed > 0) CHECK(limit(run, "lag").crossed == within(crossed, 1e-6));
}

TEST_CASE("design pressure with accumulation is a bound on gauge pressure") {
  const ModelRun run = run_model(tank(
      "1 kW", "limits: {design: {of: tank.pressure, design: 2 bar gauge, accumulation: 10 %}}\nrun: {until: 40 s}"));
  CHECK(limit(run, "design").bound == within(1e5 + 2.2e5, 1e-14));
  CHECK(limit(run, "design").crossed == within(1.2e5 * 0.1 / 400.0, 1e-9));
}

TEST_CASE("the run stops when a target is reached") {
  const ModelRun run = run_model(
      tank("1 kW", "targets: {hot: {when: tank.temperature, reaches: 345 K}}\nrun: {until: 60 s, stop_when: hot}"));
  CHECK(run.result.ending.reason == EndReason::stop_condition);
  CHECK(run.result.ending.time == within(7.5, 1e-9));
  CHECK(run.time.back() == run.result.ending.time);
  CHECK(run.last("tank.temperature") == within(345.0, 1e-10));
  CHECK_FALSE(run.result.partial());
  check_books(run);
  const ModelRun settled = run_model(tank("{schedule: [[0 s, 1 kW], [10 s, 0 W]], held: true}",
                                          "targets: {level: {when: tank.temperature, settles_within: 1 K, of: 360 K, "
                                          "for: 5 s}}\nrun: {until: 60 s, stop_when: level}"));
  CHECK(settled.result.ending.time == within(59.0 / 6.0 + 5.0, 1e-9));  // when it is known
  CHECK(target(settled, "level").time == within(59.0 / 6.0, 1e-9));
}

TEST_CASE("a target that only touches its value is reached") {
  // The top of a parabola: power falls through zero at 10 s, T = 300 + 60 t/10 - 0.3 t^2 in K.
  const ModelRun run =
      run_model(tank("{schedule: [[0 s, 1 kW], [20 s, -1 kW]]}",
                     "targets: {touch: {when: tank.temperature, reaches: 329.999999 K}}\nrun: {until: 20 s}"));
  CHECK(target(run, "touch").time == within(10.0 - std::sqrt(1e-6 / 0.3), 1e-7));
}
