// Relief valves: pop and reseat by root finding, and a proportional lift.
#include <catch2/catch.hpp>

#include "cross_check/agreement.h"
#include "cross_check/hand_laws.h"

using namespace gaskettle;
using namespace gaskettle::testing;

TEST_CASE("CVODE agrees on a pop valve that lifts and reseats again and again") {
  const ModelRun model = completed(R"(
gaskettle: 1
title: pop valve on a heated vessel
gases:
  plain: {molar_mass: 28 g/mol, cp: 1040 J/kg/K}
gas_spaces:
  vessel: {volume: 50 l, gas: plain, pressure: 9.5 bar gauge, temperature: 300 K}
heaters:
  coil: {in: vessel, rating: 2 kW}
relief_devices:
  valve: {protects: vessel, set: 10 bar gauge, blowdown: 10 %, flow_area: 10 mm2, discharge_coefficient: 0.8, action: pop}
run: {until: 120 s, record_every: 0.25 s, rtol: 1e-11}
)");

  const PlainGas gas{0.028, 1040.0};
  const double R = gas.R(), V = 0.05;
  bool open = false;
  const auto pressure = [&](const double* y) { return y[0] * R * y[1] / V; };
  const auto flow = [&](const double* y) {
    return open ? nozzle_flow(8e-6, pressure(y), y[1], R, gas.gamma(), standard_atmosphere) : 0.0;
  };
  CvodeRun run(Multistep::adams, {gas.mass(standard_atmosphere + 9.5e5, V, 300.0), 300.0}, {1.0, 300.0},
               [&](double, const double* y, double* f) {
                 const double w = flow(y);
                 f[0] = -w;
                 f[1] = (2000.0 - w * R * y[1]) / (y[0] * gas.cv());
               });
  run.watch(1, [&](double, const double* y, double* g) {
    const double gauge = pressure(y) - standard_atmosphere;
    g[0] = open ? 9e5 - gauge : gauge - 10e5;
  });
  std::vector<HandEvent> events;
  const auto on_event = [&] {
    open = !open;
    events.push_back({run.time(), "valve", open ? "lifts" : "reseats"});
  };
  const auto worst = differences(model, 0.25, run, on_event, [&]() -> Values {
    const double* y = run.y();
    return {
        {"vessel.temperature", y[1]}, {"vessel.pressure", pressure(y)}, {"vessel.mass", y[0]}, {"valve.flow", flow(y)}};
  });
  check_agreement(worst);
  check_events(model, "valve", events);
  CHECK(events.size() >= 10);
}

TEST_CASE("CVODE agrees on a proportional valve that lifts, reaches full lift and shuts") {
  const ModelRun model = completed(R"(
gaskettle: 1
title: proportional valve on a heated vessel
gases:
  plain: {molar_mass: 28 g/mol, cp: 1040 J/kg/K}
gas_spaces:
  vessel: {volume: 50 l, gas: plain, pressure: 9.9 bar gauge, temperature: 300 K}
bodies:
  rack: {in: vessel, mass: 1 kg, specific_heat: 500 J/kg/K, area: 0.2 m2, film: 15 W/m2/K}
heaters:
  coil: {in: vessel, rating: 3 kW, power: {schedule: [[0 s, 0 kW], [20 s, 3 kW], [60 s, 0 kW]]}}
relief_devices:
  valve: {protects: vessel, set: 10 bar gauge, flow_area: 3 mm2, discharge_coefficient: 0.8, action: proportional, full_lift_at: 4 %}
run: {until: 100 s, record_every: 0.25 s, rtol: 1e-11}
)");

  const PlainGas gas{0.028, 1040.0};
  const double R = gas.R(), V = 0.05;
  enum class Lift { shut, part, full } lift = Lift::shut;
  const auto pressure = [&](const double* y) { return y[0] * R * y[1] / V; };
  const auto opening = [&](const double* y) {
    return lift == Lift::part ? (pressure(y) - standard_atmosphere - 10e5) / 0.4e5 : (lift == Lift::full ? 1.0 : 0.0);
  };
  const auto flow = [&](const double* y) {
    return opening(y) * nozzle_flow(2.4e-6, pressure(y), y[1], R, gas.gamma(), standard_atmosphere);
  };
  const auto power = [](double t) { return t <= 20.0 ? 150.0 * t : std::max(0.0, 3000.0 - 75.0 * (t - 20.0)); };
  CvodeRun run(Multistep::bdf, {gas.mass(standard_atmosphere + 9.9e5, V, 300.0), 300.0, 300.0}, {1.0, 300.0, 300.0},
               [&](double t, const double* y, double* f) {
                 const double w = flow(y), to_rack = 3.0 * (y[1] - y[2]);
                 f[0] = -w;
                 f[1] = (power(t) - to_rack - w * R * y[1]) / (y[0] * gas.cv());
                 f[2] = to_rack / 500.0;
               });
  run.corners({20.0, 60.0});
  run.watch(2, [&](double, const double* y, double* g) {
    const double over = pressure(y) - standard_atmosphere - 10e5;
    g[0] = lift == Lift::full ? -1.0 : over - (lift == Lift::part ? 0.4e5 : 0.0);
    g[1] = lift == Lift::shut ? -1.0 : (lift == Lift::full ? 0.4e5 : 0.0) - over;
  });
  std::vector<HandEvent> events;
  const auto on_event = [&] {
    const bool up = run.fired() == 0, part = lift == Lift::part;
    events.push_back(
        {run.time(), "valve", up ? (part ? "reaches full lift" : "lifts") : (part ? "reseats" : "leaves full lift")});
    lift = part ? (up ? Lift::full : Lift::shut) : Lift::part;
  };
  const auto worst = differences(model, 0.25, run, on_event, [&]() -> Values {
    const double* y = run.y();
    return {{"vessel.temperature", y[1]}, {"vessel.pressure", pressure(y)}, {"vessel.mass", y[0]},
            {"rack.temperature", y[2]},   {"valve.flow", flow(y)},          {"valve.opening", opening(y)}};
  });
  check_agreement(worst);
  check_events(model, "valve", events);
  CHECK(events.size() >= 4);
}
