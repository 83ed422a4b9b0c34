// Pistons: the balance eliminated by hand, and inertia without events.
#include <catch2/catch.hpp>

#include "cross_check/agreement.h"
#include "cross_check/hand_laws.h"

using namespace gaskettle;
using namespace gaskettle::testing;

TEST_CASE("CVODE agrees on a stirred balanced piston by the enthalpy balance") {
  const ModelRun model = completed(R"(
gaskettle: 1
title: stirrer under a load, cooled by a block
surroundings: {pressure: 100 kPa abs}
gases:
  plain: {molar_mass: 40 g/mol, cp: 520 J/kg/K}
gas_spaces:
  cylinder: {volume: 20 l, gas: plain, temperature: 300 K}
pistons:
  ram: {closes: cylinder, area: 0.05 m2, at: 400 mm, mass: 120 kg, motion: balanced}
bodies:
  block: {in: cylinder, mass: 1 kg, specific_heat: 400 J/kg/K, area: 0.1 m2, film: 20 W/m2/K}
stirrers:
  mixer: {in: cylinder, torque: 1 N m, speed: 600 rpm}
run: {until: 1000 s, record_every: 5 s, rtol: 1e-11}
)");

  const PlainGas gas{0.040, 520.0};
  const double A = 0.05, p = 1e5 + 120.0 * standard_gravity / A, m = gas.mass(p, 0.02, 300.0);
  const double power = 1.0 * 2.0 * pi * 10.0;
  // At constant pressure m cp dT = heat and shaft work: no piston is left in the equations.
  CvodeRun run(Multistep::bdf, {300.0, 300.0}, {300.0, 300.0}, [&](double, const double* y, double* f) {
    const double to_block = 20.0 * 0.1 * (y[0] - y[1]);
    f[0] = (power - to_block) / (m * gas.cp);
    f[1] = to_block / 400.0;
  });
  const auto worst = differences(
      model, 5.0, run, [] {},
      [&]() -> Values {
        const double* y = run.y();
        const double V = m * gas.R() * y[0] / p, x = 0.4 + (V - 0.02) / A;
        return {{"cylinder.temperature", y[0]},
                {"cylinder.volume", V},
                {"block.temperature", y[1]},
                {"ram.position", x},
                {"ram.velocity", m * gas.R() * run.rates()[0] / p / A},
                {"energy.shaft", power * run.time()},
                {"energy.boundary_work", p * (V - 0.02)},
                {"energy.lifting", 120.0 * standard_gravity * (x - 0.4)}};
      });
  check_agreement(worst);
}

TEST_CASE("CVODE agrees on a balanced piston with a spring, a rising force and a stop") {
  const ModelRun model = completed(R"(
gaskettle: 1
title: stirrer under a spring, pushed back off its stop
surroundings: {pressure: 100 kPa abs}
gases:
  plain: {molar_mass: 40 g/mol, cp: 520 J/kg/K}
gas_spaces:
  cylinder: {volume: 20 l, gas: plain, temperature: 300 K}
pistons:
  ram:
    closes: cylinder
    area: 0.05 m2
    at: 400 mm
    mass: 120 kg
    motion: balanced
    stops: [100 mm, 520 mm]
    spring: {stiffness: 3 kN/m, free_at: 300 mm}
    force: {schedule: [[0 s, 0 N], [700 s, 0 N], [900 s, 1500 N]]}
bodies:
  block: {in: cylinder, mass: 1 kg, specific_heat: 400 J/kg/K, area: 0.1 m2, film: 20 W/m2/K}
stirrers:
  mixer: {in: cylinder, power: 60 W}
run: {until: 1500 s, record_every: 5 s, rtol: 1e-11}
)");

  const PlainGas gas{0.040, 520.0};
  const double A = 0.05, weight = 120.0 * standard_gravity, k = 3000.0;
  int piece = 0;  // of the force: before, during and after its rise; changes at corners only
  const auto force = [&](double t) { return piece == 0 ? 0.0 : (piece == 1 ? 7.5 * (t - 700.0) : 1500.0); };
  const auto force_rate = [&] { return piece == 1 ? 7.5 : 0.0; };
  const auto opposing = [&](double t, double x) { return 1e5 * A + weight + k * (x - 0.3) + force(t); };
  const auto volume = [&](double x) { return 0.02 + A * (x - 0.4); };
  const double m = gas.mass(opposing(0.0, 0.4) / A, 0.02, 300.0);
  bool stopped = false;

  // States: x, block, work done; on the stop the first is T instead. Free: p V = m R T with p = opposing(x, t) / A.
  const auto temperature = [&](double t, const double* y) {
    return stopped ? y[0] : opposing(t, y[0]) / A * volume(y[0]) / (m * gas.R());
  };
  CvodeRun run(Multistep::bdf, {0.4, 300.0, 0.0}, {0.1, 300.0, 100.0}, [&](double t, const double* y, double* f) {
    const double to_block = 2.0 * (temperature(t, y) - y[1]), heat = 60.0 - to_block;
    f[1] = to_block / 400.0;
    f[2] = 0.0;
    if (stopped) {
      f[0] = heat / (m * gas.cv());
      return;
    }
    // m cv dT + p A dx = heat, m R dT = V dp + p dV, dp = (k dx + dF) / A
    const double F = opposing(t, y[0]), V = volume(y[0]), ratio = gas.cv() / gas.R();
    f[0] = (heat - ratio * V / A * force_rate()) / (ratio * (V * k / A + F) + F);
    f[2] = F * f[0];
  });
  run.corners({700.0, 900.0}, [&] { ++piece; });
  run.watch(1, [&](double t, const double* y, double* g) {
    g[0] = stopped ? opposing(t, 0.52) - m * gas.R() * y[0] / volume(0.52) * A : y[0] - 0.52;
  });
  std::vector<HandEvent> events;
  const auto on_event = [&] {
    events.push_back({run.time(), "ram", stopped ? "leaves high stop" : "rests on high stop"});
    const double T = temperature(run.time(), run.y());
    stopped = !stopped;
    run.y()[0] = stopped ? T : 0.52;
  };
  const auto worst = differences(model, 5.0, run, on_event, [&]() -> Values {
    const double* y = run.y();
    const double T = temperature(run.time(), y), x = stopped ? 0.52 : y[0];
    return {{"cylinder.temperature", T},
            {"cylinder.pressure", m * gas.R() * T / volume(x)},
            {"block.temperature", y[1]},
            {"ram.position", x},
            {"ram.velocity", stopped ? 0.0 : run.rates()[0]},
            {"energy.boundary_work", y[2]},
            {"energy.spring", 0.5 * k * ((x - 0.3) * (x - 0.3) - 0.01)}};
  });
  check_agreement(worst);
  CHECK(events.size() >= 2);
  check_events(model, "ram", events);
}

TEST_CASE("CVODE agrees on an inertial piston between two gases, with viscous friction") {
  const ModelRun model = completed(R"(
gaskettle: 1
title: damped swing
gases:
  plain: {molar_mass: 29 g/mol, cp: 1005 J/kg/K}
gas_spaces:
  cushion: {volume: 4.5 l, gas: plain, temperature: 293 K, pressure: 1.4 bar abs}
  rear: {volume: 6 l, gas: plain, temperature: 300 K, pressure: 1.1 bar abs}
pistons:
  plunger:
    closes: cushion
    area: 0.0113 m2
    at: 400 mm
    mass: 30 kg
    motion: inertial
    velocity: 0.3 m/s
    tilt: 20 deg
    spring: {stiffness: 2 kN/m, free_at: 350 mm}
    friction: {viscous: 40 N s/m, heat_to: gas}
    force: {sine: {mean: 50 N, amplitude: 30 N, frequency: 1.3 Hz}}
    back: {space: rear, area: 0.010 m2}
run: {until: 5 s, record_every: 10 ms, rtol: 1e-11}
)");

  const PlainGas gas{0.029, 1005.0};
  const double A = 0.0113, B = 0.010, M = 30.0;
  const double m1 = gas.mass(1.4e5, 4.5e-3, 293.0), m2 = gas.mass(1.1e5, 6e-3, 300.0);
  const auto V1 = [&](double x) { return 4.5e-3 + A * (x - 0.4); };
  const auto V2 = [&](double x) { return 6e-3 - B * (x - 0.4); };
  // x, v, T of the cushion, T behind, friction heat
  CvodeRun run(Multistep::adams, {0.4, 0.3, 293.0, 300.0, 0.0}, {0.1, 0.3, 300.0, 300.0, 1.0},
               [&](double t, const double* y, double* f) {
                 const double p1 = m1 * gas.R() * y[2] / V1(y[0]), p2 = m2 * gas.R() * y[3] / V2(y[0]);
                 const double applied = 50.0 + 30.0 * std::sin(2.0 * pi * 1.3 * t), drag = 40.0 * y[1];
                 f[0] = y[1];
                 f[1] = (p1 * A - p2 * B - M * standard_gravity * std::cos(20.0 * pi / 180.0) - 2000.0 * (y[0] - 0.35) -
                         applied - drag) /
                        M;
                 f[2] = (drag * y[1] - p1 * A * y[1]) / (m1 * gas.cv());
                 f[3] = p2 * B * y[1] / (m2 * gas.cv());
                 f[4] = drag * y[1];
               });
  const auto worst = differences(
      model, 0.01, run, [] {},
      [&]() -> Values {
        const double* y = run.y();
        return {{"cushion.temperature", y[2]}, {"cushion.pressure", m1 * gas.R() * y[2] / V1(y[0])},
                {"rear.temperature", y[3]},    {"rear.pressure", m2 * gas.R() * y[3] / V2(y[0])},
                {"plunger.position", y[0]},    {"plunger.velocity", y[1]},
                {"energy.friction", y[4]},     {"energy.kinetic", 0.5 * M * (y[1] * y[1] - 0.09)}};
      });
  check_agreement(worst);
}
