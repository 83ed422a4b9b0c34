// A PI controller with a lagging sensor, through both limits of its heater.
#include <catch2/catch.hpp>

#include "cross_check/agreement.h"
#include "cross_check/hand_laws.h"

using namespace gaskettle;
using namespace gaskettle::testing;

namespace {

/// The anti-windup rules by hand. At a limit the integral is frozen ("limited"); where freeing it would push the output
/// out again while freezing it lets the output fall back in, it follows the limit ("held").
/// The upper limit has side +1, the lower one -1.
struct HandController {
  enum class Mode { free, limited, held };
  double gain, reset_time, top;
  Mode mode = Mode::limited;
  double side = 1.0;

  double limit() const { return side > 0.0 ? top : 0.0; }
  double unlimited(double e, double integral) const { return gain * (e + integral / reset_time); }
  double output(double e, double integral) const { return mode == Mode::free ? unlimited(e, integral) : limit(); }
  double integral_rate(double e) const { return mode == Mode::free ? e : 0.0; }

  /// e, its rate and the integral; three guards that rise where the mode ends.
  void guards(double e, double de, double integral, double* g) const {
    g[0] = g[1] = g[2] = -1.0;
    const double out = unlimited(e, integral);
    switch (mode) {
      case Mode::free:
        g[0] = out - top;
        g[1] = -out;
        break;
      case Mode::limited:
        g[0] = side * (limit() - out);
        break;
      case Mode::held:
        g[1] = -side * (de + e / reset_time);  // free pulls inward from here on
        g[2] = side * de;                      // frozen holds by itself from here on
        break;
    }
  }
  /// Returns what is logged, or nothing.
  std::string event(int which, double e, double de, double& integral) {
    const auto words = [&](const char* verb) {
      return std::string(verb) + (side > 0.0 ? " its upper limit" : " its lower limit");
    };
    if (mode == Mode::free) {
      side = which == 0 ? 1.0 : -1.0;
      mode = side * de < 0.0 ? Mode::held : Mode::limited;
      return words("reaches");
    }
    if (mode == Mode::held) {
      integral = reset_time * (limit() / gain - e);
      mode = which == 1 ? Mode::free : Mode::limited;
      return which == 1 ? words("leaves") : "";
    }
    mode = side * (de + e / reset_time) > 0.0 ? Mode::held : Mode::free;
    return mode == Mode::free ? words("leaves") : "";
  }
};

}  // namespace

TEST_CASE("CVODE agrees on a PI-controlled warm-up with sensor lag, through free, limited and held") {
  const ModelRun model = completed(R"(
gaskettle: 1
title: controlled warm-up
gases:
  plain: {molar_mass: 28 g/mol, cp: 1040 J/kg/K}
gas_spaces:
  chamber: {volume: 0.2 m3, gas: plain, pressure: 3 bar abs, temperature: 300 K}
walls:
  shell:
    around: chamber
    area: 1.5 m2
    layers: [{material: {density: 7800 kg/m3, specific_heat: 480 J/kg/K, conductivity: 45 W/m/K}, thickness: 2 mm}]
    temperature: 300 K
    inside: {film: 10 W/m2/K}
    outside: {film: 5 W/m2/K}
heaters:
  element: {in: chamber, rating: 1.2 kW, heat_capacity: 1 kJ/K, conductance: 15 W/K}
sensors:
  probe: {reads: chamber.temperature, time_constant: 12 s, offset: 0.4 K}
controllers:
  heat:
    drives: element.power
    holds: probe.reading
    at: {schedule: [[0 s, 345 K], [900 s, 345 K], [1100 s, 325 K], [1600 s, 325 K], [1900 s, 350 K]]}
    by: {pi: {gain: 40 W/K, reset_time: 40 s}}
run: {until: 3000 s, record_every: 5 s, rtol: 1e-11}
)");

  const PlainGas gas{0.028, 1040.0};
  const double V = 0.2, m = gas.mass(3e5, V, 300.0);
  WallSpec spec;
  spec.layers = {{0.002, 45.0, 7800.0, 480.0, 0.0}};
  spec.inner_film = 10.0;
  spec.outer_film = 5.0;
  const HandWall wall{choose_conduction_grid(spec, 3.0), 1.5, {[](double) { return 45.0; }}};
  const std::size_t n = wall.size();
  const double corner[5] = {0.0, 900.0, 1100.0, 1600.0, 1900.0}, level[5] = {345.0, 345.0, 325.0, 325.0, 350.0};
  std::size_t piece = 0;  // of the setpoint; changes at corners only
  const auto slope = [&] {
    return piece < 4 ? (level[piece + 1] - level[piece]) / (corner[piece + 1] - corner[piece]) : 0.0;
  };
  const auto setpoint = [&](double t) { return level[piece] + slope() * (t - corner[piece]); };

  HandController heat{.gain = 40.0, .reset_time = 40.0, .top = 1200.0};
  // gas, element, lagged reading, integral, wall nodes
  const auto error = [&](double t, const double* y) { return setpoint(t) - (y[2] + 0.4); };
  const auto error_rate = [&](const double* y) { return slope() - (y[0] - y[2]) / 12.0; };
  std::vector<double> start(4 + n, 300.0), size(4 + n, 300.0);
  start[3] = 0.0;
  size[3] = 1000.0;
  CvodeRun run(Multistep::bdf, start, size, [&](double t, const double* y, double* f) {
    const double e = error(t, y), to_gas = 15.0 * (y[1] - y[0]), to_wall = 10.0 * 1.5 * (y[0] - y[4]);
    f[0] = (to_gas - to_wall) / (m * gas.cv());
    f[1] = (heat.output(e, y[3]) - to_gas) / 1000.0;
    f[2] = (y[0] - y[2]) / 12.0;
    f[3] = heat.integral_rate(e);
    wall.rates(y + 4, f + 4, to_wall, -5.0 * wall.outer_area() * (y[3 + n] - room));
  });
  run.watch(3, [&](double t, const double* y, double* g) { heat.guards(error(t, y), error_rate(y), y[3], g); });
  std::vector<HandEvent> events;
  int held = 0;
  const auto on_event = [&] {
    const double* y = run.y();
    const std::string what = heat.event(run.fired(), error(run.time(), y), error_rate(y), run.y()[3]);
    held += heat.mode == HandController::Mode::held ? 1 : 0;
    if (!what.empty()) events.push_back({run.time(), "heat", what});
  };
  run.corners({900.0, 1100.0, 1600.0, 1900.0}, [&] { ++piece; });
  const auto worst = differences(model, 5.0, run, on_event, [&]() -> Values {
    const double* y = run.y();
    return {{"chamber.temperature", y[0]},
            {"element.temperature", y[1]},
            {"probe.reading", y[2] + 0.4},
            {"shell.temperature", y[4]},
            {"heat.output", heat.output(error(run.time(), y), y[3])}};
  });
  check_agreement(worst);
  check_events(model, "heat", events);
  // The story told: off the upper limit, through the lower one, and the integral held at least once.
  CHECK(model.event_count("heat", "leaves its upper limit") >= 1);
  CHECK(model.event_count("heat", "reaches its lower limit") >= 1);
  CHECK(held >= 1);
}
