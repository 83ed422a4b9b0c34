// Emptying, filling and joining of rigid vessels: the nozzle law, integrated here by a plain fixed-step method, must
// land on the closed forms of ideal-gas blowdown, e.g. [1 + (g-1)/2 t/tau]^(-2g/(g-1)) for the pressure of an
// insulated vessel behind a choked hole (most gas-dynamics textbooks; A. Farrell's
// public note on vessel blowdown, 2025). The closed forms are exact: 1e-6 covers nine printed digits and the
// fourth-order steps taken here, several hundred to a time constant.
#include <array>
#include <catch2/catch.hpp>
#include <cmath>

#include "laws/nozzle.h"
#include "published/fixed_step.h"

using namespace gaskettle;

namespace {

constexpr double pi = 3.14159265358979323846;
constexpr double band = smallest_pressure_band;
constexpr double closed_form = 1e-6;
constexpr double g = 1.4, R = 287.0;
constexpr double cv = R / (g - 1), cp = g * cv;

/// Insulated vessel behind a hole into vacuum: choked throughout. States: mass, internal energy.
struct ChokedVessel {
  double volume, area;
  std::array<double, 2> operator()(const std::array<double, 2>& y) const {
    const double T = y[1] / (y[0] * cv);
    const double flow = area * nozzle_flux((g - 1) * y[1] / volume, T, R, g, 0.0, band);
    return {-flow, -flow * cp * T};
  }
};

/// Time to fall from p0 to p1, by dp/dt = -n R T flow/V with T along p^((n-1)/n); n = 1 isothermal, g insulated.
double time_to_fall(double n, double p0, double T0, double p1, double p_out, double volume, double area) {
  const auto per_log_pressure = [&](double log_p) {
    const double p = std::exp(log_p);
    const double T = T0 * std::pow(p / p0, (n - 1) / n);
    return p * volume / (n * R * T * area * nozzle_flux(p, T, R, g, p_out, band));
  };
  return fixed_step::integral(std::log(p1), std::log(p0), 20000, per_log_pressure);
}

}  // namespace

TEST_CASE("diving cylinder, 11.11 L at 20.68 MPa through 1 mm", "[flow]") {
  // A. Farrell's inputs: Cd 0.85, density 246.9558 kg/m3, choked formula down to 101325 Pa. The times printed in
  // that note do not follow from its inputs; these are its formulas evaluated.
  const double V = 0.01111, A = 0.85 * pi / 4 * 1e-6, p0 = 20.68e6, pa = 101325.0, rho0 = 246.9558352;
  const double T0 = p0 / (rho0 * R);
  CHECK(rho0 * V / (A * nozzle_flux(p0, T0, R, g, 0.0, band)) == Approx(83.9884084).epsilon(closed_form));
  CHECK(time_to_fall(g, p0, T0, pa, 0.0, V, A) == Approx(477.829077).epsilon(closed_form));
  CHECK(time_to_fall(1, p0, T0, pa, 0.0, V, A) == Approx(446.699838).epsilon(closed_form));
}

TEST_CASE("choked blowdown after one time constant", "[flow]") {
  const double V = 1.0, A = 1e-4, p0 = 1e6, T0 = 300.0, m0 = p0 * V / (R * T0);
  const double tau = m0 / (A * nozzle_flux(p0, T0, R, g, 0.0, band));
  SECTION("insulated") {
    const auto end = fixed_step::run<2>({m0, m0 * cv * T0}, tau, 1000, ChokedVessel{V, A});
    CHECK((g - 1) * end[1] / V / p0 == Approx(0.279081647).epsilon(closed_form));
    CHECK(end[1] / (end[0] * cv) / T0 == Approx(0.694444444).epsilon(closed_form));
    CHECK(end[0] / m0 == Approx(0.401877572).epsilon(closed_form));
  }
  SECTION("isothermal") {
    const auto leak = [&](const std::array<double, 1>& m) {
      return std::array<double, 1>{-A * nozzle_flux(m[0] * R * T0 / V, T0, R, g, 0.0, band)};
    };
    CHECK(fixed_step::run<1>({m0}, tau, 1000, leak)[0] / m0 == Approx(0.367879441).epsilon(closed_form));
  }
}

TEST_CASE("1 m3 from 3 to 1.01 bar through 1 cm2 into 1 bar, choked then unchoked", "[flow]") {
  // Quadrature of the exact law by others to nine digits. 1e-5: the law's second derivative jumps at the critical
  // ratio, which Simpson's rule sees to third order in its interval (5e-5).
  CHECK(time_to_fall(1, 3e5, 300, 1.01e5, 1e5, 1.0, 1e-4) == Approx(64.1217854).epsilon(1e-5));
  CHECK(time_to_fall(g, 3e5, 300, 1.01e5, 1e5, 1.0, 1e-4) == Approx(50.0608108).epsilon(1e-5));
}

TEST_CASE("an insulated vessel filled from 1 to 10 bar by gas at 300 K", "[flow]") {
  // T2 = p2/(p1/T1 + (p2 - p1)/(g Ts)), mass added (p2 - p1) V/(g R Ts). A supply at 40 bar keeps the inlet choked,
  // so pressure rises at the constant rate g R Ts flow/V and the moment of 10 bar is known.
  const double p1 = 1e5, p2 = 1e6, T1 = 300, Ts = 300, V = 1, A = 1e-4;
  const auto filling = [&](const std::array<double, 2>& y) {
    const double flow = A * nozzle_flux(4e6, Ts, R, g, (g - 1) * y[1] / V, band);
    return std::array<double, 2>{flow, flow * cp * Ts};
  };
  const double m1 = p1 * V / (R * T1);
  const double duration = (p2 - p1) * V / (g * R * Ts * A * nozzle_flux(4e6, Ts, R, g, p1, band));
  const auto end = fixed_step::run<2>({m1, m1 * cv * T1}, duration, 500, filling);
  CHECK((g - 1) * end[1] / V == Approx(p2).epsilon(closed_form));
  CHECK(end[1] / (end[0] * cv) == Approx(403.846154).epsilon(closed_form));
  CHECK(end[0] - m1 == Approx(7.46640119).epsilon(closed_form));
  // From a supply at 10 bar, while choked.
  CHECK(g * R * Ts * A * nozzle_flux(1e6, Ts, R, g, 1e5, band) / V == Approx(28128.7149).epsilon(closed_form));
}

TEST_CASE("two insulated vessels joined: 10 bar in 1 m3, 1 bar in 2 m3", "[flow]") {
  // Ends at 4 bar; the supplying side stays isentropic, the receiver follows by mass. The end does not depend on how
  // fast it is reached, so a wide band keeps this plain method stable: 20 s are some hundred of the last time constant.
  const double VA = 1, VB = 2, A = 1e-3, wide = 1e-2;
  const auto joined = [&](const std::array<double, 4>& y) {
    const NozzleSide<double> a{(g - 1) * y[1] / VA, y[1] / (y[0] * cv), R, g};
    const NozzleSide<double> b{(g - 1) * y[3] / VB, y[3] / (y[2] * cv), R, g};
    const auto flux = nozzle_flux_both_ways(a, b, wide);
    const double mass = A * (flux.forward - flux.backward);
    const double energy = A * cp * (flux.forward * a.temperature - flux.backward * b.temperature);
    return std::array<double, 4>{-mass, -energy, mass, energy};
  };
  const double mA = 1e6 * VA / (R * 300), mB = 1e5 * VB / (R * 300);
  const auto end = fixed_step::run<4>({mA, mA * cv * 300, mB, mB * cv * 300}, 20.0, 4000, joined);
  CHECK((g - 1) * end[1] / VA == Approx(4e5).epsilon(closed_form));
  CHECK((g - 1) * end[3] / VB == Approx(4e5).epsilon(closed_form));
  CHECK(end[1] / (end[0] * cv) == Approx(230.900094).epsilon(closed_form));
  CHECK(end[3] / (end[2] * cv) == Approx(352.788279).epsilon(closed_form));
}
