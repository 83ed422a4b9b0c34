// Pistons with events: impact on a stop, sticking and slipping.
#include <catch2/catch.hpp>

#include "cross_check/agreement.h"
#include "cross_check/hand_laws.h"

using namespace gaskettle;
using namespace gaskettle::testing;

namespace {

enum class Motion { outward, inward, stuck, low_stop };

/// A mass on a cushion of gas, with dry friction and a stop below, by hand: states x, v, T.
struct Plunger {
  PlainGas gas{0.029, 1005.0};
  double A, V0, x0, T0, p0, M;
  double breakaway, kinetic, viscous, stribeck, low, restitution;
  std::function<double(double)> force;
  bool heat_to_gas;
  Motion motion = Motion::outward;
  std::vector<HandEvent> events = {};

  double mass() const { return gas.mass(p0, V0, T0); }
  double pressure(double x, double T) const { return mass() * gas.R() * T / (V0 + A * (x - x0)); }
  double net(double t, const double* y) const {
    return pressure(y[0], y[2]) * A - standard_atmosphere * A - M * standard_gravity - force(t);
  }
  /// Sliding friction, a force against the motion; continued past v = 0 in the same sense.
  double friction(double v) const {
    const double sense = motion == Motion::outward ? 1.0 : -1.0, speed = sense * v;
    double F = kinetic + viscous * speed;
    if (stribeck > 0.0) F += (breakaway - kinetic) * std::exp(-std::pow(speed / stribeck, 2));
    return sense * F;
  }
  bool moving() const { return motion == Motion::outward || motion == Motion::inward; }
  void rates(double t, const double* y, double* f) const {
    f[0] = f[1] = f[2] = 0.0;
    if (!moving()) return;
    const double v = y[1], F = friction(v);
    f[0] = v;
    f[1] = (net(t, y) - F) / M;
    f[2] = ((heat_to_gas ? F : 0.0) - pressure(y[0], y[2]) * A) * v / (mass() * gas.cv());
  }
  void guards(double t, const double* y, double* g) const {
    g[0] = motion == Motion::inward ? low - y[0] : -1.0;
    g[1] = moving() ? (motion == Motion::outward ? -y[1] : y[1]) : -1.0;
    g[2] = moving() ? -1.0 : net(t, y) - breakaway;
    g[3] = motion == Motion::stuck ? -net(t, y) - breakaway : -1.0;
  }
  void event(int which, double t, double* y) {
    std::string what;
    if (which == 0) {
      y[1] *= -restitution;
      const bool rests = std::abs(y[1]) < 1e-4;
      if (rests) y[1] = 0.0;
      motion = rests ? Motion::low_stop : Motion::outward;
      what = rests ? "comes to rest on low stop" : "hits low stop";
    } else if (which == 1) {
      y[1] = 0.0;
      const double push = net(t, y);
      const bool sticks = std::abs(push) <= breakaway;
      motion = sticks ? Motion::stuck : (push > 0.0 ? Motion::outward : Motion::inward);
      what = sticks ? "sticks" : "turns";
    } else {
      what = motion == Motion::low_stop ? "leaves low stop" : (which == 2 ? "slips outward" : "slips inward");
      motion = which == 2 ? Motion::outward : Motion::inward;
    }
    events.push_back({t, "plunger", what});
  }
};

void compare(Plunger& plunger, const ModelRun& model, double every, double v0) {
  CvodeRun run(Multistep::adams, {plunger.x0, v0, plunger.T0}, {0.1, 1.0, 300.0},
               [&](double t, const double* y, double* f) { plunger.rates(t, y, f); });
  run.watch(4, [&](double t, const double* y, double* g) { plunger.guards(t, y, g); });
  const auto on_event = [&] { plunger.event(run.fired(), run.time(), run.y()); };
  const auto worst = differences(model, every, run, on_event, [&]() -> Values {
    const double* y = run.y();
    return {{"cushion.temperature", y[2]},
            {"cushion.pressure", plunger.pressure(y[0], y[2])},
            {"plunger.position", y[0]},
            {"plunger.velocity", y[1]}};
  });
  check_agreement(worst);
  check_events(model, "plunger", plunger.events);
}

}  // namespace

TEST_CASE("CVODE agrees on a mass that falls onto a stop, bounces, rests and is lifted again") {
  const ModelRun model = completed(R"(
gaskettle: 1
title: drop onto a stop
gases:
  plain: {molar_mass: 29 g/mol, cp: 1005 J/kg/K}
gas_spaces:
  cushion: {volume: 4.5 l, gas: plain, temperature: 293 K, pressure: 1.1 bar abs}
pistons:
  plunger:
    closes: cushion
    area: 0.0113 m2
    at: 400 mm
    mass: 90 kg
    motion: inertial
    stops: [330 mm, 900 mm]
    restitution: 0.5
    friction: {breakaway: 60 N, kinetic: 40 N, viscous: 15 N s/m, stribeck_velocity: 20 mm/s, heat_to: gas}
    force: {sine: {mean: 0 N, amplitude: 550 N, frequency: 0.2 Hz}}
run: {until: 6 s, record_every: 10 ms, rtol: 1e-11}
)");
  Plunger plunger{.A = 0.0113,
                  .V0 = 4.5e-3,
                  .x0 = 0.4,
                  .T0 = 293.0,
                  .p0 = 1.1e5,
                  .M = 90.0,
                  .breakaway = 60.0,
                  .kinetic = 40.0,
                  .viscous = 15.0,
                  .stribeck = 0.02,
                  .low = 0.33,
                  .restitution = 0.5,
                  .force = [](double t) { return 550.0 * std::sin(2.0 * pi * 0.2 * t); },
                  .heat_to_gas = true,
                  .motion = Motion::inward};
  compare(plunger, model, 0.01, 0.0);
  CHECK(model.event_count("plunger", "hits low stop") >= 5);
  CHECK(model.event_count("plunger", "comes to rest on low stop") >= 1);
  CHECK(model.event_count("plunger", "leaves low stop") >= 1);
}

TEST_CASE("CVODE agrees on a seal that sticks and slips under a slow force") {
  const ModelRun model = completed(R"(
gaskettle: 1
title: stick and slip
gases:
  plain: {molar_mass: 29 g/mol, cp: 1005 J/kg/K}
gas_spaces:
  cushion: {volume: 4.5 l, gas: plain, temperature: 293 K, pressure: 1.36 bar abs}
pistons:
  plunger:
    closes: cushion
    area: 0.0113 m2
    at: 400 mm
    mass: 40 kg
    motion: inertial
    friction: {breakaway: 130 N, kinetic: 60 N, heat_to: surroundings}
    force: {sine: {mean: 0 N, amplitude: 400 N, frequency: 0.25 Hz}}
run: {until: 12 s, record_every: 20 ms, rtol: 1e-11}
)");
  Plunger plunger{.A = 0.0113,
                  .V0 = 4.5e-3,
                  .x0 = 0.4,
                  .T0 = 293.0,
                  .p0 = 1.36e5,
                  .M = 40.0,
                  .breakaway = 130.0,
                  .kinetic = 60.0,
                  .viscous = 0.0,
                  .stribeck = 0.0,
                  .low = 0.0,
                  .restitution = 0.0,
                  .force = [](double t) { return 400.0 * std::sin(2.0 * pi * 0.25 * t); },
                  .heat_to_gas = false,
                  .motion = Motion::stuck};
  compare(plunger, model, 0.02, 0.0);
  CHECK(model.event_count("plunger", "sticks") >= 5);
  CHECK(model.event_count("plunger", "slips outward") >= 2);
  CHECK(model.event_count("plunger", "slips inward") >= 2);
}
