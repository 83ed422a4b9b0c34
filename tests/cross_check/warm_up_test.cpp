// Heat only: an element, radiation, layered walls.
#include <catch2/catch.hpp>

#include "cross_check/agreement.h"
#include "cross_check/hand_laws.h"

using namespace gaskettle;
using namespace gaskettle::testing;

TEST_CASE("CVODE agrees on a warm-up by a heater element that radiates to the wall") {
  const ModelRun model = completed(R"(
gaskettle: 1
title: element, gas and a steel shell
gases:
  plain: {molar_mass: 28 g/mol, cp: 1040 J/kg/K}
gas_spaces:
  chamber: {volume: 0.4 m3, gas: plain, pressure: 6 bar abs, temperature: 300 K}
walls:
  shell:
    around: chamber
    area: 3 m2
    layers: [{material: {density: 7800 kg/m3, specific_heat: 480 J/kg/K, conductivity: 45 W/m/K}, thickness: 6 mm}]
    temperature: 295 K
    inside: {film: 15 W/m2/K, emissivity: 0.8}
    outside: {film: 8 W/m2/K, emissivity: 0.9}
heaters:
  element: {in: chamber, rating: 5 kW, heat_capacity: 3 kJ/K, conductance: 10 W/K, area: 0.3 m2, emissivity: 0.85, temperature: 310 K}
run: {until: 3600 s, record_every: 20 s, rtol: 1e-11}
)");

  const PlainGas gas{0.028, 1040.0};
  const double V = 0.4, m = gas.mass(6e5, V, 300.0);
  WallSpec spec;
  spec.layers = {{0.006, 45.0, 7800.0, 480.0, 0.0}};
  spec.inner_film = 15.0;
  spec.outer_film = 8.0;
  const HandWall wall{choose_conduction_grid(spec, 3.6), 3.0, {[](double) { return 45.0; }}};
  const std::size_t n = wall.size();

  // gas, element, heat lost, wall nodes
  const auto loss = [&](double T) {
    return wall.outer_area() * (8.0 * (T - room) + 0.9 * radiation_constant * (std::pow(T, 4) - std::pow(room, 4)));
  };
  std::vector<double> start(3 + n, 295.0), size(3 + n, 300.0);
  start[0] = 300.0;
  start[1] = 310.0;
  start[2] = 0.0;
  size[2] = 1e6;
  CvodeRun run(Multistep::bdf, start, size, [&](double, const double* y, double* f) {
    const double radiated = grey_exchange(0.3, 0.85, y[1], 3.0, 0.8, y[3]);
    const double element_to_gas = 10.0 * (y[1] - y[0]), gas_to_wall = 15.0 * 3.0 * (y[0] - y[3]);
    f[0] = (element_to_gas - gas_to_wall) / (m * gas.cv());
    f[1] = (5000.0 - element_to_gas - radiated) / 3000.0;
    f[2] = loss(y[2 + n]);
    wall.rates(y + 3, f + 3, gas_to_wall + radiated, -loss(y[2 + n]));
  });
  const auto worst = differences(
      model, 20.0, run, [] {},
      [&]() -> Values {
        const double* y = run.y();
        return {
            {"chamber.temperature", y[0]}, {"chamber.pressure", m * gas.R() * y[0] / V}, {"element.temperature", y[1]},
            {"shell.temperature", y[3]},   {"shell.outer_temperature", y[2 + n]},        {"shell.loss", loss(y[2 + n])},
            {"energy.wall_loss", y[2]}};
      });
  check_agreement(worst);
}

TEST_CASE("CVODE agrees on a layered wall with a contact, bridges, k(T) and weather outside") {
  const ModelRun model = completed(R"(
gaskettle: 1
title: insulated cylinder
gases:
  plain: {molar_mass: 28 g/mol, cp: 1040 J/kg/K}
gas_spaces:
  chamber:
    shape: {cylinder: {bore: 600 mm, length: 1.2 m, ends: flat, axis: level}}
    gas: plain
    pressure: 4 bar abs
    temperature: 293.15 K
walls:
  shell:
    around: chamber
    layers:
      - {material: {density: 7800 kg/m3, specific_heat: 480 J/kg/K, conductivity: 45 W/m/K}, thickness: 8 mm}
      - material: {density: 100 kg/m3, specific_heat: 840 J/kg/K, conductivity: [[250 K, 0.03 W/m/K], [600 K, 0.10 W/m/K]]}
        thickness: 60 mm
        contact: 2e-2 m2 K/W
    bridges: 1.2 W/K
    inside: {film: 25 W/m2/K}
    outside:
      film: 10 W/m2/K
      emissivity: 0.85
      temperature: {sine: {mean: 285 K, amplitude: 12 K, frequency: 2e-4 Hz}}
      flux: {schedule: [[0 s, 0 W/m2], [3000 s, 0 W/m2], [4000 s, 600 W/m2], [7000 s, 100 W/m2]]}
heaters:
  coil: {in: chamber, rating: 2 kW}
run: {until: 10000 s, record_every: 100 s, rtol: 1e-11}
)");

  const PlainGas gas{0.028, 1040.0};
  const double V = pi / 4.0 * 0.36 * 1.2, m = gas.mass(4e5, V, room);
  const auto wool = [](double T) { return 0.03 + (T - 250.0) * (0.07 / 350.0); };
  WallSpec spec;
  spec.shape = WallShape::cylinder;
  spec.inner_radius = 0.3;
  spec.layers = {{0.008, 45.0, 7800.0, 480.0, 0.0}, {0.06, wool(room), 100.0, 840.0, 2e-2}};
  spec.inner_film = 25.0;
  spec.outer_film = 10.0;
  spec.outside_driven = true;
  const double area = pi * 0.6 * 1.2 + 2.0 * pi / 4.0 * 0.36;
  const HandWall wall{choose_conduction_grid(spec, 10.0), area, {[](double) { return 45.0; }, wool}, 1.2};
  const std::size_t n = wall.size();

  const auto weather = [](double t) { return 285.0 + 12.0 * std::sin(2.0 * pi * 2e-4 * t); };
  const auto sun = [](double t) {
    if (t <= 3000.0) return 0.0;
    if (t <= 4000.0) return 0.6 * (t - 3000.0);
    return t <= 7000.0 ? 600.0 - (t - 4000.0) / 6.0 : 100.0;
  };
  const auto loss = [&](double t, double T) {
    const double there = weather(t);
    return wall.outer_area() * (10.0 * (T - there) + 0.85 * radiation_constant * (std::pow(T, 4) - std::pow(there, 4)));
  };
  // gas, heat lost, sun absorbed, wall nodes
  std::vector<double> start(3 + n, room), size(3 + n, 300.0);
  start[1] = start[2] = 0.0;
  size[1] = size[2] = 1e6;
  CvodeRun run(Multistep::bdf, start, size, [&](double t, const double* y, double* f) {
    const double gas_to_wall = 25.0 * area * (y[0] - y[3]), lost = loss(t, y[2 + n]);
    f[0] = (2000.0 - gas_to_wall) / (m * gas.cv());
    f[1] = lost;
    f[2] = sun(t) * wall.outer_area();
    wall.rates(y + 3, f + 3, gas_to_wall, f[2] - lost);
  });
  run.corners({3000.0, 4000.0, 7000.0});
  const auto worst = differences(
      model, 100.0, run, [] {},
      [&]() -> Values {
        const double* y = run.y();
        return {{"chamber.temperature", y[0]},
                {"shell.temperature", y[3]},
                {"shell.outer_temperature", y[2 + n]},
                {"shell.loss", loss(run.time(), y[2 + n])},
                {"energy.wall_loss", y[1]},
                {"energy.flux", y[2]}};
      });
  check_agreement(worst);
}
