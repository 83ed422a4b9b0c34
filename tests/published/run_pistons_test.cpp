// Pistons with dry friction and stops, as whole plants, against closed forms: Coulomb friction takes 4 F/k of amplitude
// a cycle at an unchanged period (J. P. Den Hartog, Mechanical Vibrations); a body dropped on a stop with restitution e
// rebounds to h0 e^(2n) and rests after sqrt(2 h0/g) (1 + e)/(1 - e). The gas is so thin, in so large a space, that it
// acts as a vacuum with the right force: 1 kPa on both sides, 1e6 m3 (1e-7 N/m beside 35 kN/m). Exact: 1e-7.
#include <catch2/catch.hpp>
#include <cmath>

#include "published/model_text.h"

using namespace gaskettle::testing;
using namespace model_text;

namespace {
constexpr double closed_form = 1e-7;
constexpr double pi = 3.14159265358979323846;
const std::string thin_gas = book_gas(287, 1004.5) + R"(
surroundings: {gravity: 9.81 m/s2}
gas_spaces: {vessel: {volume: 1e6 m3, gas: book_gas, temperature: 300 K, pressure: 1 kPa abs}}
)";
}  // namespace

TEST_CASE("run: Coulomb friction of 20 N on 5 kg and 35 kN/m from 10 mm: nine half swings, then it sticks",
          "[run][dynamics]") {
  const double k = 35e3, F = 20, x0 = 0.01, half = pi * std::sqrt(5 / k);
  const ModelRun run = run_model(thin_gas + R"(
pistons:
  block:
    closes: vessel
    area: 100 cm2
    at: 0.51 m
    mass: 5 kg
    tilt: 90 deg
    motion: inertial
    stops: [0 m, 1 m]
    back: {pressure: 1 kPa abs}
    spring: {stiffness: 35 kN/m, free_at: 0.5 m}
    friction: {kinetic: 20 N, heat_to: surroundings}
run: {until: 1 s, rtol: 1e-11, record_every: 0.1 s}
)");
  REQUIRE(run.event_count("block", "turns") == 8);
  for (std::size_t n = 0; n < 8; ++n) {
    const double t = run.event_time("block", "turns", n), sign = n % 2 ? 1 : -1, swings = static_cast<double>(n + 1);
    CHECK(t == Approx(swings * half).epsilon(closed_form));
    CHECK(sign * (run.at("block.position", t) - 0.5) == Approx(x0 - swings * 2 * F / k).epsilon(closed_form));
  }
  // A full cycle apart: 4 F/k.
  const auto swing = [&](std::size_t n) { return run.at("block.position", run.event_time("block", "turns", n)) - 0.5; };
  CHECK(swing(1) - swing(3) == Approx(0.00228571429).epsilon(1e-6));
  CHECK(run.event_time("block", "sticks") == Approx(9 * half).epsilon(closed_form));
  CHECK(run.last("block.position") - 0.5 == Approx(9 * 2 * F / k - x0).epsilon(1e-6));
  CHECK(run.last("energy.friction") == Approx(F * (x0 * 18 - 2 * F / k * 81)).epsilon(closed_form));
}

TEST_CASE("run: dropped 0.1 m on a stop with restitution 0.8", "[run][dynamics]") {
  // An apex is where it stops rising, and is looked for after it has come down through 1 cm.
  std::string targets = "targets:\n  low1: {when: weight.position, reaches: 1 cm, direction: falling}\n";
  for (int n = 1; n <= 4; ++n) {
    const std::string i = std::to_string(n), next = std::to_string(n + 1);
    targets += "  apex" + i + ": {when: weight.velocity, reaches: 0 m/s, direction: falling, after: low" + i + "}\n";
    targets += "  low" + next + ": {when: weight.position, reaches: 1 cm, direction: falling, after: apex" + i + "}\n";
  }
  const ModelRun run = run_model(thin_gas + R"(
pistons:
  weight:
    closes: vessel
    area: 100 cm2
    at: 0.1 m
    mass: 5 kg
    motion: inertial
    stops: [0 m, 1 m]
    restitution: 0.8
    back: {pressure: 1 kPa abs}
run: {until: 2 s, rtol: 1e-11, record_every: 0.1 s}
)" + targets);
  const double e = 0.8, h0 = 0.1, g = 9.81, fall = std::sqrt(2 * h0 / g);
  for (int n = 1; n <= 4; ++n)
    CHECK(run.at("weight.position", reached(run, "apex" + std::to_string(n))) ==
          Approx(h0 * std::pow(e, 2 * n)).epsilon(closed_form));
  CHECK(run.at("weight.position", reached(run, "apex3")) == Approx(0.0262144).epsilon(closed_form));
  // It counts as at rest when it would rebound slower than 0.1 mm/s, a geometric sum cut after N bounces.
  const double bounces = static_cast<double>(run.event_count("weight", "hits low stop"));
  const double rests = run.event_time("weight", "comes to rest on low stop");
  CHECK(bounces == std::floor(std::log(1e-4 / std::sqrt(2 * g * h0)) / std::log(e)));
  CHECK(rests == Approx(fall * (1 + 2 * e * (1 - std::pow(e, bounces)) / (1 - e))).epsilon(closed_form));
  CHECK(rests == Approx(1.28505881).margin(2 * 1e-4 / g / (1 - e)));  // the infinite sum, less what is cut
  CHECK(run.last("energy.impact") == Approx(5 * g * h0).epsilon(closed_form));
}

TEST_CASE("run: Stribeck friction on a driven piston: 45.04 N at 50 mm/s", "[run][dynamics]") {
  // Fs 60 N, Fc 40 N, vs 20 mm/s (exponent 2), 100 N s/m.
  const ModelRun run = run_model(thin_gas + R"(
pistons:
  rod:
    closes: vessel
    area: 100 cm2
    at: 0.1 m
    motion: driven
    position: {schedule: [[0 s, 0.1 m], [4 s, 0.3 m]]}
    friction: {breakaway: 60 N, kinetic: 40 N, stribeck_velocity: 20 mm/s, viscous: 100 N s/m}
run: {until: 4 s, rtol: 1e-10}
)");
  CHECK(run.last("energy.friction") / 0.2 == Approx(45.0386091).epsilon(closed_form));
}
