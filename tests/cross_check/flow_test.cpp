// Gas that flows: blowdown, filling from a bottle, two gases that mix.
#include <catch2/catch.hpp>

#include "cross_check/agreement.h"
#include "cross_check/hand_laws.h"
#include "gas/catalogue.h"

using namespace gaskettle;
using namespace gaskettle::testing;

TEST_CASE("CVODE agrees on a blowdown of nitrogen, choked and then not, warmed by a body") {
  const ModelRun model = completed(R"(
gaskettle: 1
title: blowdown
gas_spaces:
  vessel: {volume: 0.1 m3, gas: nitrogen, pressure: 20 bar abs, temperature: 450 K}
bodies:
  rack: {in: vessel, mass: 2 kg, specific_heat: 500 J/kg/K, area: 0.3 m2, film: 12 W/m2/K}
ports:
  vent: {from: vessel, to: atmosphere, orifice: {bore: 5 mm, discharge_coefficient: 0.8}, one_way: true}
run: {until: 200 s, record_every: 0.5 s, rtol: 1e-11}
)");

  // The published heat capacity of the gas is shared data; the balances are our own.
  const Species nitrogen = *find_gas("nitrogen");
  const double R = molar_gas / nitrogen.molar_mass, V = 0.1, area = 0.8 * pi / 4.0 * 25e-6;
  const auto pressure = [&](const double* y) { return y[0] * R * y[1] / V; };
  const auto flow = [&](const double* y) {
    const double cp = nitrogen.cp(y[1]);
    return nozzle_flow(area, pressure(y), y[1], R, cp / (cp - R), standard_atmosphere);
  };
  // mass, T, rack
  CvodeRun run(Multistep::bdf, {2e6 * V / (R * 450.0), 450.0, 450.0}, {1.0, 300.0, 300.0},
               [&](double, const double* y, double* f) {
                 const double w = flow(y), heat = 12.0 * 0.3 * (y[2] - y[1]);
                 f[0] = -w;
                 // m cv dT = heat - w (h - u), h - u = R T
                 f[1] = (heat - w * R * y[1]) / (y[0] * (nitrogen.cp(y[1]) - R));
                 f[2] = -heat / 1000.0;
               });
  const auto worst = differences(
      model, 0.5, run, [] {},
      [&]() -> Values {
        const double* y = run.y();
        return {{"vessel.mass", y[0]},
                {"vessel.temperature", y[1]},
                {"vessel.pressure", pressure(y)},
                {"rack.temperature", y[2]},
                {"vent.flow", flow(y)}};
      });
  check_agreement(worst);
  // It must have gone through both regimes: critical ratio 0.528.
  CHECK(model["vessel.pressure"].front() > standard_atmosphere / 0.528);
  CHECK(model.last("vessel.pressure") < 1.01 * standard_atmosphere);
}

TEST_CASE("CVODE agrees on filling from a bottle, walls on both sides, until the pressures meet") {
  const ModelRun model = completed(R"(
gaskettle: 1
title: bottle to receiver
gases:
  plain: {molar_mass: 28 g/mol, cp: 1040 J/kg/K}
gas_spaces:
  bottle: {volume: 50 l, gas: plain, pressure: 60 bar abs, temperature: 293.15 K}
  receiver: {volume: 40 l, gas: plain, pressure: 1.5 bar abs, temperature: 293.15 K}
walls:
  bottle_steel:
    around: bottle
    area: 1 m2
    layers: [{material: {density: 7850 kg/m3, specific_heat: 440 J/kg/K, conductivity: 50 W/m/K}, thickness: 5 mm}]
    inside: {film: 20 W/m2/K}
    outside: {film: 8 W/m2/K}
  receiver_steel:
    around: receiver
    area: 0.8 m2
    layers: [{material: {density: 7900 kg/m3, specific_heat: 460 J/kg/K, conductivity: 17 W/m/K}, thickness: 4 mm}]
    inside: {film: 30 W/m2/K}
    outside: {film: none}
ports:
  line: {from: bottle, to: receiver, orifice: {bore: 2.5 mm, discharge_coefficient: 0.8}, opening: {schedule: [[0 s, 0], [2 s, 1]]}}
run: {until: 1200 s, record_every: 2 s, rtol: 1e-11}
)");

  const PlainGas gas{0.028, 1040.0};
  const double R = gas.R(), cv = gas.cv(), area = 0.8 * pi / 4.0 * 6.25e-6, Va = 0.05, Vb = 0.04;
  WallSpec one, two;
  one.layers = {{0.005, 50.0, 7850.0, 440.0, 0.0}};
  one.inner_film = 20.0;
  one.outer_film = 8.0;
  two.layers = {{0.004, 17.0, 7900.0, 460.0, 0.0}};
  two.inner_film = 30.0;
  const HandWall wall_a{choose_conduction_grid(one, 1.2), 1.0, {[](double) { return 50.0; }}};
  const HandWall wall_b{choose_conduction_grid(two, 1.2), 0.8, {[](double) { return 17.0; }}};
  const std::size_t na = wall_a.size(), nb = wall_b.size(), wb = 4 + na;

  // mass and T of the bottle, mass and T of the receiver, nodes of both walls
  const auto net_flow = [&](double t, const double* y) {
    const double opening = std::min(t / 2.0, 1.0);
    const double pa = y[0] * R * y[1] / Va, pb = y[2] * R * y[3] / Vb;
    return opening *
           (nozzle_flow(area, pa, y[1], R, gas.gamma(), pb) - nozzle_flow(area, pb, y[3], R, gas.gamma(), pa));
  };
  std::vector<double> start(4 + na + nb, room), size(4 + na + nb, 300.0);
  start[0] = gas.mass(6e6, Va, room);
  start[2] = gas.mass(1.5e5, Vb, room);
  size[0] = size[2] = 1.0;
  CvodeRun run(Multistep::bdf, start, size, [&](double t, const double* y, double* f) {
    const double w = net_flow(t, y), upstream = w >= 0.0 ? y[1] : y[3];
    const double into_a = 20.0 * 1.0 * (y[1] - y[4]), into_b = 30.0 * 0.8 * (y[3] - y[wb]);
    f[0] = -w;
    f[2] = w;
    f[1] = (-into_a - w * (gas.cp * upstream - cv * y[1])) / (y[0] * cv);
    f[3] = (-into_b + w * (gas.cp * upstream - cv * y[3])) / (y[2] * cv);
    wall_a.rates(y + 4, f + 4, into_a, -8.0 * wall_a.outer_area() * (y[3 + na] - room));
    wall_b.rates(y + wb, f + wb, into_b, 0.0);
  });
  run.corners({2.0});
  const auto worst = differences(
      model, 2.0, run, [] {},
      [&]() -> Values {
        const double* y = run.y();
        return {{"bottle.temperature", y[1]},
                {"bottle.pressure", y[0] * R * y[1] / Va},
                {"bottle.mass", y[0]},
                {"receiver.temperature", y[3]},
                {"receiver.pressure", y[2] * R * y[3] / Vb},
                {"receiver.mass", y[2]},
                {"bottle_steel.temperature", y[4]},
                {"receiver_steel.temperature", y[wb]},
                {"line.flow", net_flow(run.time(), y)}};
      });
  check_agreement(worst);
  CHECK(model.last("bottle.pressure") == Approx(model.last("receiver.pressure")).epsilon(1e-5));
}

TEST_CASE("CVODE agrees on two gases that mix through an orifice, there and back") {
  const ModelRun model = completed(R"(
gaskettle: 1
title: light and heavy gas
gases:
  light: {molar_mass: 4 g/mol, cp: 5200 J/kg/K}
  heavy: {molar_mass: 44 g/mol, cp: 850 J/kg/K}
gas_spaces:
  one: {volume: 30 l, gas: light, pressure: 3 bar abs, temperature: 320 K}
  two: {volume: 50 l, gas: heavy, pressure: 1.2 bar abs, temperature: 290 K}
bodies:
  sink: {in: two, mass: 0.5 kg, specific_heat: 400 J/kg/K, area: 0.2 m2, film: 10 W/m2/K}
heaters:
  coil: {in: two, rating: 400 W, power: {schedule: [[0 s, 0 W], [5 s, 0 W], [15 s, 400 W]]}}
ports:
  pipe: {from: one, to: two, orifice: {area: 5 mm2, discharge_coefficient: 0.7}}
run: {until: 60 s, record_every: 0.1 s, rtol: 1e-12}
)");

  const PlainGas gas[2] = {{0.004, 5200.0}, {0.044, 850.0}};
  struct Space {
    double volume;
    std::size_t at;  // of its masses (light, heavy) and temperature in the state
  };
  const Space one{0.03, 0}, two{0.05, 3};
  struct Side {
    double p, T, R, gamma, light;  // light: mass fraction
  };
  const auto side = [&](const Space& s, const double* y) {
    const double* m = y + s.at;
    const double total = m[0] + m[1], R = (m[0] * gas[0].R() + m[1] * gas[1].R()) / total;
    const double cp = (m[0] * gas[0].cp + m[1] * gas[1].cp) / total;
    return Side{total * R * m[2] / s.volume, m[2], R, cp / (cp - R), m[0] / total};
  };
  const auto net_flow = [&](const Side& a, const Side& b) {
    return nozzle_flow(3.5e-6, a.p, a.T, a.R, a.gamma, b.p) - nozzle_flow(3.5e-6, b.p, b.T, b.R, b.gamma, a.p);
  };
  const auto power = [](double t) { return t <= 5.0 ? 0.0 : std::min(40.0 * (t - 5.0), 400.0); };
  // m cv dT = heat + sum over species dm_k (h_k(T_upstream) - u_k(T)), with u_k = h_k - R_k T
  const auto balance = [&](const Space& s, const double* y, double* f, const double dm[2], double upstream,
                           double heat) {
    double capacity = 0.0, power_in = heat;
    for (int k = 0; k < 2; ++k) {
      f[s.at + k] = dm[k];
      capacity += y[s.at + k] * gas[k].cv();
      power_in += dm[k] * (gas[k].cp * (upstream - y[s.at + 2]) + gas[k].R() * y[s.at + 2]);
    }
    f[s.at + 2] = power_in / capacity;
  };
  CvodeRun run(Multistep::bdf,
               {gas[0].mass(3e5, 0.03, 320.0), 0.0, 320.0, 0.0, gas[1].mass(1.2e5, 0.05, 290.0), 290.0, 290.0},
               {0.01, 0.01, 300.0, 0.01, 0.1, 300.0, 300.0}, [&](double t, const double* y, double* f) {
                 const Side a = side(one, y), b = side(two, y);
                 const double w = net_flow(a, b), light = w >= 0.0 ? a.light : b.light, from = w >= 0.0 ? a.T : b.T;
                 const double to_sink = 2.0 * (b.T - y[6]);
                 const double in[2] = {w * light, w * (1.0 - light)}, out[2] = {-in[0], -in[1]};
                 balance(one, y, f, out, from, 0.0);
                 balance(two, y, f, in, from, power(t) - to_sink);
                 f[6] = to_sink / 200.0;
               });
  run.corners({5.0, 15.0});
  const auto fraction = [&](const double* m, int k) {
    return m[k] / gas[k].molar_mass / (m[0] / 0.004 + m[1] / 0.044);
  };
  const auto worst = differences(
      model, 0.1, run, [] {},
      [&]() -> Values {
        const double* y = run.y();
        const Side a = side(one, y), b = side(two, y);
        return {{"one.temperature", a.T},
                {"one.pressure", a.p},
                {"two.temperature", b.T},
                {"two.pressure", b.p},
                {"one.mass", y[0] + y[1]},
                {"one.mole_fraction.heavy", fraction(y, 1)},
                {"two.mole_fraction.light", fraction(y + 3, 0)},
                {"sink.temperature", y[6]},
                {"pipe.flow", net_flow(a, b)}};
      });
  // Once the pressures have met, the flow is their small difference times a large slope, and shows every error of
  // theirs a hundredfold: hence run.rtol 1e-12 here.
  check_agreement(worst);
  CHECK(model.last("one.mole_fraction.heavy") > 0.005);  // mixture came back
}
