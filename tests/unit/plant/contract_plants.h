/// Plants that together hold every kind of part, and go through every mode it has.
#pragma once
#include <string>
#include <vector>

namespace gaskettle::testing {

struct ContractPlant {
  const char* name;
  const char* yaml;
};

inline const std::vector<ContractPlant>& contract_plants() {
  static const std::vector<ContractPlant> list = {
      {"everything that heats, on a vessel in the sun", R"(gaskettle: 1
surroundings: {temperature: {sine: {mean: 290 K, amplitude: 5 K, frequency: 0.002 Hz}}, wind: 3 m/s}
gas_spaces:
  vessel: {shape: {cylinder: {bore: 600 mm, length: 1 m, axis: level}}, gas: nitrogen, temperature: 290 K, pressure: 3 bar abs}
  ball: {shape: {sphere: {bore: 400 mm}}, gas: nitrogen, temperature: 290 K, pressure: 3 bar abs}
walls:
  shell: {around: vessel, layers: [{material: carbon_steel, thickness: 8 mm}, {material: mineral_wool, thickness: 40 mm, contact: 0.001 m2 K/W}], bridges: 1 W/K, inside: {film: stirred, emissivity: 0.8}, outside: {film: wind, emissivity: 0.9, flux: {schedule: [[0 s, 0 W/m2], [100 s, 600 W/m2]]}}}
  skin: {around: ball, layers: [{material: copper, thickness: 3 mm}], inside: {film: enclosed}, outside: {film: still_air, emissivity: 0.5}}
  between: {around: vessel, area: 0.2 m2, layers: [{material: aluminium, thickness: 5 mm}], to: {space: ball}, inside: {film: 20 W/m2/K}, outside: {film: enclosed}}
bodies:
  rack: {in: vessel, material: aluminium, mass: 20 kg, area: 1 m2, film: 15 W/m2/K, emissivity: 0.3}
  billet: {in: vessel, material: stainless_steel, mass: 30 kg, area: 0.3 m2, film: 40 W/m2/K, half_thickness: 12 mm}
heaters:
  element: {in: vessel, rating: 3 kW, heat_capacity: 2 kJ/K, conductance: 10 W/K, area: 0.2 m2, emissivity: 0.8}
  mat: {wall: shell, after_layer: 1, power: 200 W}
  cartridge: {body: billet, power: {ramp: {to: 300 W, at: 5 W/s}}, heat_capacity: 100 J/K, conductance: 8 W/K}
  chiller: {in: ball, power: -20 W}
stirrers:
  fan: {in: vessel, speed: {schedule: [[0 s, 0 rpm], [60 s, 0 rpm], [120 s, 1400 rpm]]}, diameter: 200 mm, power_number: 0.4}
  paddle: {in: ball, torque: 0.1 N m, speed: 100 rpm}
  plain: {in: ball, power: 2 W}
sensors:
  probe: {reads: vessel.temperature, time_constant: 6 s, range: [250 K, 330 K]}
  watts: {reads: element.power, time_constant: 3 s}
controllers: {heat: {drives: element.power, holds: probe, at: {ramp: {to: 325 K, at: 6 K/min}}, by: {pi: {gain: 300 W/K, reset_time: 3 min}}}}
run: {until: 20 min, rtol: 1e-6})"},

      {"gases that come in from outside", R"(gaskettle: 1
gas_spaces:
  a: {volume: 40 l, gas: nitrogen, temperature: 300 K, pressure: 2 bar abs}
  b: {volume: 30 l, gas: argon, temperature: 300 K, pressure: 2 bar abs}
  c: {volume: 30 l, gas: nitrogen, temperature: 320 K, pressure: 1.2 bar abs}
ports:
  link: {from: a, to: b, orifice: {bore: 3 mm, discharge_coefficient: 0.8}}
  sonic: {from: b, to: c, iso6358: {C: 1 l/s/bar, b: 0.35}}
  breather: {from: atmosphere, to: c, orifice: {bore: 2 mm, discharge_coefficient: 0.7}}
  check: {from: a, to: atmosphere, orifice: {bore: 1 mm, discharge_coefficient: 0.7}, one_way: true, opening: {schedule: [[0 s, 0], [20 s, 0], [30 s, 1]]}}
  feed: {from: {supply: {gas: {helium: 0.4, argon: 0.6}, pressure: {schedule: [[0 s, 6 bar abs], [60 s, 0.5 bar abs]]}, temperature: 290 K}}, to: a, flow: 2 l/s normal}
relief_devices:
  pop: {protects: a, set: 1.6 bar gauge, reseat: 1.2 bar gauge, flow_area: 6 mm2, discharge_coefficient: 0.7}
  lifting: {protects: b, to: c, set: 1.2 bar gauge, action: proportional, full_lift_at: 5 %, balanced: true, flow_area: 1 mm2, discharge_coefficient: 0.7}
  disc: {protects: c, burst: 1.4 bar gauge, flow_area: 5 mm2, discharge_coefficient: 0.62}
heaters: {coil: {in: c, power: 800 W}}
run: {until: 120 s, rtol: 1e-6})"},

      {"balanced pistons with friction, springs and stops", R"(gaskettle: 1
gas_spaces:
  left: {volume: 5 l, gas: nitrogen, temperature: 300 K, pressure: 2 bar abs}
  right: {volume: 5 l, gas: helium, temperature: 300 K, pressure: 2 bar abs}
  damped: {volume: 2 l, gas: air, temperature: 300 K, pressure: 1.5 bar abs}
walls: {sleeve: {around: left, area: 0.2 m2, layers: [{material: carbon_steel, thickness: 4 mm}], temperature: 300 K, inside: {film: 25 W/m2/K}, outside: {film: 8 W/m2/K}}}
pistons:
  sliding: {closes: left, area: 100 cm2, at: 500 mm, force: 1013 N, stops: [450 mm, 560 mm], friction: {breakaway: 60 N, kinetic: 30 N}}
  spring: {closes: left, area: 20 cm2, at: 200 mm, spring: {stiffness: 2 kN/m, free_at: 101.325 mm}}
  between: {closes: left, area: 50 cm2, at: 300 mm, back: {space: right}}
  creeping: {closes: damped, area: 30 cm2, at: 300 mm, force: 40 N, friction: {viscous: 2000 N s/m, heat_to: gas}, stops: [200 mm, 400 mm]}
heaters:
  coil: {in: left, power: {schedule: [[0 s, 150 W], [30 s, -200 W], [70 s, 100 W]], held: true}}
  warm: {in: damped, power: {schedule: [[0 s, 60 W], [40 s, -60 W]], held: true}}
run: {until: 90 s, rtol: 1e-6})"},

      {"inertial pistons, and driven ones", R"(gaskettle: 1
gas_spaces:
  cushion: {volume: 4 l, gas: air, temperature: 300 K, pressure: 2.4 bar abs}
  back: {volume: 6 l, gas: argon, temperature: 300 K, pressure: 1 bar abs}
  pumped: {volume: 3 l, gas: nitrogen, temperature: 300 K, pressure: 1 bar abs}
pistons:
  hammer: {closes: cushion, area: 110 cm2, at: 350 mm, mass: {schedule: [[0 s, 60 kg], [1 s, 60 kg], [1.5 s, 70 kg], [2 s, 70 kg], [2 s, 260 kg], [3.5 s, 260 kg], [3.5 s, 50 kg]]}, motion: inertial, stops: [300 mm, 400 mm], restitution: 0.3, friction: {breakaway: 50 N, kinetic: 30 N, viscous: 10 N s/m, stribeck_velocity: 20 mm/s, heat_to: gas}, back: {space: back}}
  sled: {closes: cushion, area: 5 cm2, at: 100 mm, tilt: 90 deg, mass: 20 kg, motion: inertial, velocity: 0.5 m/s, friction: {breakaway: 300 N, kinetic: 200 N}}
  smooth: {closes: back, area: 20 cm2, at: 300 mm, mass: 5 kg, tilt: 90 deg, motion: inertial, velocity: 0.2 m/s, friction: {viscous: 40 N s/m}}
  pump: {closes: pumped, area: 50 cm2, at: 600 mm, motion: driven, position: {sine: {mean: 600 mm, amplitude: 100 mm, frequency: 0.5 Hz}}, friction: {kinetic: 10 N}}
  liquid: {closes: pumped, area: 30 cm2, at: 100 mm, motion: driven, flow: {schedule: [[0 s, 0.2 l/s], [2 s, -0.3 l/s], [4 s, 0.1 l/s]], held: true}, stops: [50 mm, 150 mm]}
run: {until: 6 s, rtol: 1e-6})"},

      {"controllers at both limits", R"(gaskettle: 1
gas_spaces:
  tank: {volume: 100 l, gas: nitrogen, temperature: 300 K, pressure: 2 bar abs}
  other: {volume: 100 l, gas: nitrogen, temperature: 300 K, pressure: 2 bar abs}
heaters:
  coil: {in: tank, rating: 500 W}
  cooler: {in: tank, power: {schedule: [[0 s, -200 W], [250 s, -200 W], [250 s, 100 W]], held: true}}
  plate: {in: other, rating: 400 W}
  chiller: {in: other, power: -150 W}
  cold: {in: other, rating: -100 W}
sensors: {clipped: {reads: other.temperature, range: [302 K, 308 K]}}
controllers:
  loop: {drives: coil.power, holds: tank.temperature, at: {schedule: [[0 s, 400 K], [100 s, 400 K], [140 s, 340 K]]}, by: {pi: {gain: 20 W/K, reset_time: 5 s}}}
  thermostat: {drives: plate.power, holds: other.temperature, at: 306 K, by: {on_off: {dead_band: 6 K}}}
  second: {drives: cold.power, holds: clipped, at: 305 K, by: {pi: {gain: 40 W/K, reset_time: 5 s}}}
run: {until: 300 s, rtol: 1e-6})"},
  };
  return list;
}

}  // namespace gaskettle::testing
