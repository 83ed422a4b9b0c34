// Vessels that empty through a hole, as whole plants, against
//   Y. A. Cengel, J. M. Cimbala, Fluid Mechanics, Example 12-5/12-6 (leaking tyre)
//   R. T. Balmer, Modern Engineering Thermodynamics, Examples 16.8 (tyre valve) and 16.12
//   A. Farrell, public note on vessel blowdown, 2025 (diving cylinder; its printed times do not follow from its inputs)
// and the closed forms of ideal-gas blowdown. With tau = m0/flow0, choked: insulated p/p0 = [1 + (g-1)/2
// t/tau]^(-2g/(g-1)), isothermal exp(-t/tau). Figures computed from stated inputs: 1e-7 (nine digits; rtol 1e-10).
// Printed: as noted.
#include <catch2/catch.hpp>
#include <cmath>

#include "laws/nozzle.h"
#include "published/model_text.h"

using namespace gaskettle::testing;
using namespace model_text;

namespace {

constexpr double closed_form = 1e-7;
constexpr double pi = 3.14159265358979323846;

struct Hole {
  double V, A, Cd, p0, T0, pa, p_end, until;
  double R = 287, gamma = 1.4;
  bool isothermal = false;
};

ModelRun empty(const Hole& h) {
  return run_model(book_gas(h.R, h.R * h.gamma / (h.gamma - 1)) +
                   fill(R"(
surroundings: {pressure: $pa Pa abs}
gas_spaces: {vessel: {volume: $V m3, gas: book_gas, temperature: $T0 K, pressure: $p0 Pa abs}}
ports: {hole: {from: vessel, to: atmosphere, one_way: true, orifice: {area: $A m2, discharge_coefficient: $Cd}}}
targets: {fallen: {when: vessel.pressure, reaches: $p_end Pa abs}}
run: {until: $until s, rtol: 1e-10, record_every: $every s, stop_when: fallen}
)",
                        {{"pa", h.pa},
                         {"V", h.V},
                         {"T0", h.T0},
                         {"p0", h.p0},
                         {"A", h.A},
                         {"Cd", h.Cd},
                         {"p_end", h.p_end},
                         {"until", h.until},
                         {"every", h.until / 20}}) +
                   (h.isothermal ? bath : ""));
}

double start_flow(const ModelRun& run) { return run["hole.flow"].front(); }
double tau(const ModelRun& run) { return run["vessel.mass"].front() / start_flow(run); }

}  // namespace

TEST_CASE("run: Cengel & Cimbala: a 4 mm hole in a tyre at 314 kPa", "[run][flow]") {
  const ModelRun run = empty({0.02, pi / 4 * 16e-6, 1, 314e3, 298, 94e3, 300e3, 1});
  CHECK(start_flow(run) == Approx(0.00923869673).epsilon(closed_form));
  CHECK(start_flow(run) * 60 == Approx(0.554).epsilon(0.002));  // printed, kg/min
}

TEST_CASE("run: Balmer 16.12: 20 mm throat at 7 MPa, 2273 K", "[run][flow]") {
  const ModelRun run = empty({10, pi / 4 * 4e-4, 1, 7e6, 2273.15, 1e5, 6.9e6, 10, 286});
  CHECK(start_flow(run) == Approx(1.86754523).epsilon(closed_form));
  CHECK(start_flow(run) == Approx(1.863).epsilon(0.005));  // printed, with the book's constant rounded to 0.0404
}

TEST_CASE("run: Balmer 16.8: tyre of 1 ft3 emptied at constant temperature through a 0.0938 in valve", "[run][flow]") {
  const double V = 0.02831684659, pa = 101352.9322;
  const double p_unchoked = pa / gaskettle::critical_ratio(1.4);
  const ModelRun run =
      empty({V, pi / 4 * 0.00238252 * 0.00238252, 1, 344737.8647, 294.2611111, pa, p_unchoked, 60, 287, 1.4, true});
  CHECK(tau(run) == Approx(31.9193643).epsilon(closed_form));
  CHECK(tau(run) == Approx(31.95).epsilon(0.002));  // printed
  CHECK(p_unchoked - pa == Approx(90500.9885).epsilon(closed_form));
  CHECK((p_unchoked - pa) / 6894.757 == Approx(13.1).epsilon(0.003));  // printed, psig
  CHECK(reached(run, "fallen") == Approx(18.7063454).epsilon(closed_form));
  CHECK(reached(run, "fallen") == Approx(18.7).epsilon(0.003));  // printed
}

TEST_CASE("run: Farrell: diving cylinder of 11.11 L from 20.68 MPa through 1 mm, choked to 101325 Pa", "[run][flow]") {
  // 10 kPa outside keeps the flow choked down to the end.
  Hole h{0.01111, pi / 4 * 1e-6, 0.85, 20.68e6, 20.68e6 / (246.9558352 * 287), 10e3, 101325, 600};
  SECTION("insulated") {
    const ModelRun run = empty(h);
    CHECK(tau(run) == Approx(83.9884084).epsilon(closed_form));
    CHECK(reached(run, "fallen") == Approx(477.829077).epsilon(closed_form));
  }
  SECTION("isothermal") {
    h.isothermal = true;
    CHECK(reached(empty(h), "fallen") == Approx(446.699838).epsilon(closed_form));
  }
}

TEST_CASE("run: a vessel blown down for one time constant, choked", "[run][flow]") {
  Hole h{1, 1e-4, 1, 1e6, 300, 1e3, 2e3, 1};
  h.until = h.p0 * h.V / (287 * h.T0) / (h.A * gaskettle::nozzle_flux(h.p0, h.T0, 287.0, 1.4, 0.0, 1e-5));
  SECTION("insulated") {
    const ModelRun run = empty(h);
    CHECK(run.last("vessel.pressure") / h.p0 == Approx(0.279081647).epsilon(closed_form));
    CHECK(run.last("vessel.temperature") / h.T0 == Approx(0.694444444).epsilon(closed_form));
    CHECK(run.last("vessel.mass") / run["vessel.mass"].front() == Approx(0.401877572).epsilon(closed_form));
    // What is left has kept its entropy.
    CHECK(run.last("vessel.specific_entropy") == Approx(run["vessel.specific_entropy"].front()).margin(1e-7 * 717.5));
  }
  SECTION("isothermal") {
    h.isothermal = true;
    const ModelRun run = empty(h);
    CHECK(run.last("vessel.pressure") / h.p0 == Approx(0.367879441).epsilon(closed_form));
    CHECK(run.last("vessel.mass") / run["vessel.mass"].front() == Approx(0.367879441).epsilon(closed_form));
  }
}

TEST_CASE("run: 1 m3 from 3 to 1.01 bar through 1 cm2 into 1 bar, choked then unchoked", "[run][flow]") {
  // Quadrature of the exact law to nine digits. At 1.01 bar the pressure difference is still a thousand times the
  // band in which the program rounds off the square root.
  Hole h{1, 1e-4, 1, 3e5, 300, 1e5, 1.01e5, 100};
  SECTION("insulated") { CHECK(reached(empty(h), "fallen") == Approx(50.0608108).epsilon(closed_form)); }
  SECTION("isothermal") {
    h.isothermal = true;
    CHECK(reached(empty(h), "fallen") == Approx(64.1217854).epsilon(closed_form));
  }
}
