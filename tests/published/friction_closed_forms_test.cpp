// Friction and gas springs against closed forms of the linear and the Coulomb-damped oscillator
// (J. P. Den Hartog, Mechanical Vibrations, 4th ed.; E. Ruchardt, Physikalische Zeitschrift 30
// (1929) 58). The law's force drives a fixed-step integration; what comes out must be the closed form.
#include <array>
#include <catch2/catch.hpp>
#include <cmath>

#include "laws/friction.h"
#include "laws/gas_spring.h"
#include "published/fixed_step.h"

using namespace gaskettle;

namespace {

constexpr double pi = 3.14159265358979323846;
constexpr double mass = 5.0, stiffness = 35000.0;
using State = std::array<double, 2>;  // position, velocity

/// A mass on a spring that slides in one direction (+1 or -1).
struct Slider {
  SlidingFriction friction;
  double direction;
  State operator()(const State& y) const {
    const double opposing = direction * friction.force(direction * y[1]);
    return {y[1], (-stiffness * y[0] - opposing) / mass};
  }
};

/// Position where a slide from rest at x ends, by steps of h and a linear search for zero speed in the last one.
double next_rest(double x, const SlidingFriction& friction) {
  const double h = 1e-5;
  const Slider slide{friction, x > 0 ? -1.0 : 1.0};
  State y = fixed_step::step(State{x, 0.0}, h, slide);
  for (State last = y;; last = y) {
    y = fixed_step::step(last, h, slide);
    if (y[1] * slide.direction < 0) return fixed_step::step(last, h * last[1] / (last[1] - y[1]), slide)[0];
  }
}

}  // namespace

TEST_CASE("Stribeck curve at 50 mm/s", "[friction]") {
  CHECK(SlidingFriction{40.0, 60.0, 100.0, 0.02}.force(0.05) == Approx(45.0386091).epsilon(1e-6));
}

TEST_CASE("viscous friction: damped frequency and logarithmic decrement", "[friction]") {
  // m 5 kg, c 60 N s/m, k 35 kN/m. Upward passages of x = 0 are a damped period apart; speeds there fall by
  // exp(decrement). 1e-6: passages are interpolated in steps of 1e-5 s, an error of about (w h)^2/8 = 1e-7.
  const double h = 1e-5;
  const Slider slide{{0.0, 0.0, 60.0, 0.0}, 1.0};
  State y{0.0, 1.0};
  double t = 0.0;
  for (;; t += h) {
    const State next = fixed_step::step(y, h, slide);
    if (t > h && y[0] < 0 && next[0] >= 0) {
      const double part = y[0] / (y[0] - next[0]);
      CHECK(1 / (t + part * h) == Approx(13.281573).epsilon(1e-6));
      CHECK(-std::log(y[1] + part * (next[1] - y[1])) == Approx(0.45175372).epsilon(1e-6));
      break;
    }
    y = next;
  }
}

TEST_CASE("Coulomb friction: amplitude falls by 4 F/k a cycle and motion ends after nine half cycles", "[friction]") {
  // 1e-6: the turning point is flat in time, so its position is exact to the step's fourth order.
  const SlidingFriction coulomb{20.0, 20.0, 0.0, 0.0};
  const double start = 0.01;
  const double after_one_cycle = next_rest(next_rest(start, coulomb), coulomb);
  CHECK(start - after_one_cycle == Approx(0.00228571429).epsilon(1e-6));
  int half_cycles = 0;
  for (double x = start; std::abs(x) * stiffness > coulomb.breakaway; x = next_rest(x, coulomb)) ++half_cycles;
  CHECK(half_cycles == 9);
}

TEST_CASE("gas spring: 5 bar on 100 cm2 with 2 L", "[friction]") {
  CHECK(gas_spring_stiffness(1.4, 5e5, 0.01, 0.002) == Approx(35000.0).epsilon(1e-6));
  CHECK(gas_spring_stiffness(1.0, 5e5, 0.01, 0.002) == Approx(25000.0).epsilon(1e-6));
}

TEST_CASE("Ruchardt: period of a 16.5 g ball in a 16 mm tube on 10 L of air", "[friction]") {
  const double area = pi / 4 * 0.016 * 0.016;
  const double p = 101325.0 + 0.0165 * 9.81 / area;
  CHECK(oscillation_period(0.0165, gas_spring_stiffness(1.4, p, area, 0.01)) == Approx(1.06157627).epsilon(1e-6));
}
