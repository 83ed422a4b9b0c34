#include "gas/mixture.h"

#include <catch2/catch.hpp>
#include <stdexcept>

#include "base/dependency_set.h"
#include "base/dual.h"
#include "unit/gas/support.h"

using namespace gaskettle;
using Catch::Matchers::Contains;

namespace {

constexpr int gases = 5;
using Masses = std::array<double, gases>;

Masses draw_masses(Draw& draw) {
  Masses m;
  for (double& v : m) v = draw(0.0, 1.0) < 0.3 ? 0.0 : draw(0.01, 2.0);
  m[0] += 0.01;
  return m;
}

double total(const Masses& m) { return m[0] + m[1] + m[2] + m[3] + m[4]; }

}  // namespace

TEST_CASE("from_energy gives back the temperature and pressure of random mixtures") {
  const GasMixture mix = five_gases();
  Draw draw;
  for (int i = 0; i < 400; ++i) {
    const Masses m = draw_masses(draw);
    const double t = 60.0 * std::pow(50.0, draw(0.0, 1.0));  // 60 to 3000 K
    const double p = 1e5 * std::pow(10.0, draw(-1.0, 2.0));
    const GasState<double> a = mix.from_temperature(m.data(), t, p);
    const double volume = total(m) / a.density;
    const GasState<double> b = mix.from_energy(m.data(), total(m) * a.energy, volume, draw(1.0, 5000.0));
    // Terms of h/R reach ten times cv T: 1e-14; 1e-12 leaves room for near cancellation.
    CHECK(b.temperature == Approx(t).epsilon(1e-12));
    CHECK(b.pressure == Approx(p).epsilon(1e-12));
    CHECK(b.entropy == Approx(a.entropy).epsilon(1e-11));
    CHECK(b.cp - b.cv == Approx(b.gas_constant).epsilon(1e-14));
    CHECK(b.pressure * volume == Approx(total(m) * b.gas_constant * b.temperature).epsilon(1e-14));
    CHECK(b.enthalpy - b.energy == Approx(b.pressure / b.density).epsilon(1e-12));
  }
}

TEST_CASE("any guess leads to the same temperature") {
  const GasMixture mix = five_gases();
  const Masses m = {0.3, 0.0, 0.2, 0.1, 0.4};
  for (const double t : {5.0, 199.99, 200.0, 999.999, 1000.001, 5999.0, 8000.0}) {
    const double u = total(m) * mix.from_temperature(m.data(), t, 1e5).energy;
    for (const double guess : {1e-3, 1.0, 200.0, 1000.0, 1e6, -4.0, std::nan("")})
      CHECK(mix.temperature(m.data(), u, guess) == Approx(t).epsilon(1e-12));
  }
}

TEST_CASE("an energy without a temperature gives not a number and throws nothing") {
  const GasMixture mix = five_gases();
  const Masses m = {0.3, 0.1, 0.2, 0.1, 0.4};
  const Masses none = {0.0, 0.0, 0.0, 0.0, 0.0};
  CHECK(std::isnan(mix.from_energy(m.data(), -1e9, 1.0, 300.0).temperature));
  CHECK(std::isnan(mix.from_energy(m.data(), std::nan(""), 1.0, 300.0).temperature));
  CHECK(std::isnan(mix.from_energy(m.data(), std::numeric_limits<double>::infinity(), 1.0, 300.0).temperature));
  CHECK(std::isnan(mix.from_energy(none.data(), 0.0, 1.0, 300.0).temperature));
}

TEST_CASE("dual derivatives of the state agree with differences and with pressure_slopes") {
  const GasMixture mix = five_gases();
  Draw draw;
  for (int trial = 0; trial < 40; ++trial) {
    Masses m = draw_masses(draw);
    for (double& v : m) v += 0.02;  // differences need room on both sides
    const double t = draw(220.0, 2500.0);
    double x[gases + 2] = {m[0], m[1], m[2], m[3], m[4], 0.0, draw(0.1, 10.0)};  // masses, U, V
    x[5] = total(m) * mix.from_temperature(m.data(), t, 1e5).energy;

    using D = Dual<gases + 2>;
    std::array<D, gases + 2> seed;
    for (int k = 0; k < gases + 2; ++k) {
      seed[k] = D(x[k]);
      seed[k].d[k] = 1.0;
    }
    const GasState<D> state = mix.from_energy(seed.data(), seed[5], seed[6], t);
    const PressureSlopes<D> slopes = mix.pressure_slopes(state, seed.data(), seed[6]);
    // Exact against exact: rounding of a dozen operations.
    CHECK(slopes.by_energy.v == Approx(state.pressure.d[5]).epsilon(1e-11));
    CHECK(slopes.by_volume.v == Approx(state.pressure.d[6]).epsilon(1e-11));
    for (int k = 0; k < gases; ++k)
      CHECK(slopes.by_mass[k].v == Approx(state.pressure.d[k]).epsilon(1e-10).margin(1e-11 * state.pressure.v));

    for (int k = 0; k < gases + 2; ++k) {
      const double d = 1e-5 * (k == 5 ? total(m) * 1e6 : x[k]);
      const auto at = [&](double shift) {
        double y[gases + 2];
        std::copy(std::begin(x), std::end(x), y);
        y[k] += shift;
        const GasState<double> s = mix.from_energy(y, y[5], y[6], t);
        return std::array<double, 6>{s.temperature, s.pressure, s.cp,
                                     s.enthalpy,    s.entropy,  mix.pressure_slopes(s, y, y[6]).by_energy};
      };
      const auto low = at(-d), high = at(d);
      const std::array<D, 6> exact = {state.temperature, state.pressure, state.cp,
                                      state.enthalpy,    state.entropy,  slopes.by_energy};
      for (int q = 0; q < 6; ++q) {
        INFO("input " << k << ", quantity " << q << " at " << t << " K");
        // Central differences: (1e-5)^2 times third derivatives; rounding 1e-14 / 1e-5 of the value.
        const double scale = std::abs(exact[q].v) / (2 * d);
        CHECK((high[q] - low[q]) / (2 * d) == Approx(exact[q].d[k]).epsilon(2e-6).margin(1e-11 * scale));
      }
    }
  }
}

TEST_CASE("dependency sets mark what a state depends on, and nothing else") {
  const GasMixture mix = five_gases();
  std::array<DependencySet, gases> m;
  for (int k = 0; k < gases; ++k) m[k] = DependencySet::input(k == 2 ? 0.0 : 0.2, k);
  const auto energy = DependencySet::input(1e5, 10), volume = DependencySet::input(1.0, 11);
  const GasState<DependencySet> s = mix.from_energy(m.data(), energy, volume, 300.0);
  for (int k = 0; k < gases; ++k) {
    CHECK(s.temperature.depends_on(k));  // the absent gas too: structure, not values
    CHECK(s.pressure.depends_on(k));
    CHECK(s.cp.depends_on(k));
    CHECK(s.entropy.depends_on(k));
  }
  CHECK(s.temperature.depends_on(10));
  CHECK_FALSE(s.temperature.depends_on(11));
  CHECK_FALSE(s.enthalpy.depends_on(11));
  CHECK(s.pressure.depends_on(11));
  CHECK(s.density.depends_on(11));
  CHECK_FALSE(s.density.depends_on(10));
  CHECK_FALSE(s.gas_constant.depends_on(10));
  CHECK(s.entropy.depends_on(11));
  const GasTransport<DependencySet> g = mix.transport(m.data(), s.temperature);
  CHECK(g.viscosity.depends_on(2));
  CHECK(g.conductivity.depends_on(10));
}

TEST_CASE("absent gases, and masses a rounding below zero, keep everything finite") {
  const GasMixture mix = five_gases();
  using D = Dual<2>;
  for (const double trace : {0.0, -1e-18, 1e-300}) {
    std::array<D, gases> m = {D(1.0), D(trace), D(0.0), D(trace), D(0.0)};
    m[1].d[0] = 1.0;
    D u(2e4);
    u.d[1] = 1.0;
    const GasState<D> s = mix.from_energy(m.data(), u, D(1.0), 300.0);
    const GasTransport<D> g = mix.transport(m.data(), s.temperature);
    const PressureSlopes<D> p = mix.pressure_slopes(s, m.data(), D(1.0));
    for (const D& x : {s.temperature, s.pressure, s.cp, s.entropy, s.enthalpy, g.viscosity, g.conductivity, p.by_energy,
                       p.by_volume, p.by_mass[1], mix.sound_speed(s), prandtl(s, g)}) {
      CHECK(std::isfinite(x.v));
      CHECK(std::isfinite(x.d[0]));
      CHECK(std::isfinite(x.d[1]));
    }
    // One gas present: its own state, whatever stands beside it.
    const GasMixture alone({gas("nitrogen")});
    const double mass = 1.0;
    const GasState<double> pure = alone.from_energy(&mass, 2e4, 1.0, 300.0);
    CHECK(s.temperature.v == Approx(pure.temperature).epsilon(1e-14));
    CHECK(s.entropy.v == Approx(pure.entropy).epsilon(1e-13));
    CHECK(g.viscosity.v == Approx(gas("nitrogen").viscosity(pure.temperature)).epsilon(1e-13));
  }
}

TEST_CASE("mixing two gases at equal T and p gains the ideal entropy of mixing") {
  const GasMixture mix = mixture_of({"oxygen", "argon"});
  const double x[2] = {0.3, 0.7};
  const std::vector<double> y = mix.mass_fractions(x);
  const double first[2] = {1.0, 0.0}, second[2] = {0.0, 1.0};
  const GasState<double> mixed = mix.from_temperature(y.data(), 420.0, 3e5);
  const double apart =
      y[0] * mix.from_temperature(first, 420.0, 3e5).entropy + y[1] * mix.from_temperature(second, 420.0, 3e5).entropy;
  // -R sum x ln x; s is 10 times larger, so 1e-13 is a few units of rounding.
  const double ideal = -mixed.gas_constant * (0.3 * std::log(0.3) + 0.7 * std::log(0.7));
  CHECK(mixed.entropy - apart == Approx(ideal).epsilon(1e-12));
  CHECK(mixed.enthalpy ==
        Approx(y[0] * gas("oxygen").enthalpy(420.0) + y[1] * gas("argon").enthalpy(420.0)).epsilon(1e-14));
}

TEST_CASE("entropy obeys T ds = du + p dv") {
  const GasMixture mix = five_gases();
  using D = Dual<2>;
  Masses m = {0.3, 0.02, 0.2, 0.1, 0.4};
  std::array<D, gases> mass;
  for (int k = 0; k < gases; ++k) mass[k] = D(m[k]);
  D u(1e5), v(0.5);
  u.d[0] = 1.0;
  v.d[1] = 1.0;
  const GasState<D> s = mix.from_energy(mass.data(), u, v, 300.0);
  // Two exact derivatives against the values: rounding only.
  CHECK(s.temperature.v * total(m) * s.entropy.d[0] == Approx(1.0).epsilon(1e-12));
  CHECK(s.temperature.v * total(m) * s.entropy.d[1] == Approx(s.pressure.v).epsilon(1e-12));
  CHECK(mix.throttling_entropy(s, D(1e4)).v ==
        Approx(mix.from_temperature(m.data(), s.temperature.v, 1e4).entropy - s.entropy.v).epsilon(1e-12));
}

TEST_CASE("speed of sound follows from the isentropic slope of the pressure") {
  const GasMixture mix = five_gases();
  const Masses m = {0.3, 0.02, 0.2, 0.1, 0.4};
  const GasState<double> s = mix.from_energy(m.data(), 1e5, 0.5, 300.0);
  const PressureSlopes<double> p = mix.pressure_slopes(s, m.data(), 0.5);
  // dU = -p dV along an isentrope, and w^2 = dp/drho = -(V^2/m) dp/dV.
  const double dp_dv = p.by_volume - s.pressure * p.by_energy;
  const double w = mix.sound_speed(s);
  CHECK(w * w == Approx(-0.25 / total(m) * dp_dv).epsilon(1e-12));
}

TEST_CASE("compositions convert both ways") {
  const GasMixture mix = mixture_of({"nitrogen", "oxygen", "argon", "carbon_dioxide"});
  // Dry air of the fit's source: 28.9651159 g/mol; its fractions, rounded, with these gases.
  const double x[4] = {0.78084, 0.20948, 0.00937, 0.00031};
  CHECK(mix.molar_mass(x) == Approx(28.9651159e-3).epsilon(3e-5));
  const std::vector<double> back = mix.mole_fractions(mix.mass_fractions(x).data());
  for (int k = 0; k < 4; ++k) CHECK(back[k] == Approx(x[k]).epsilon(1e-14));
  const double m = mix.mass_in(2.0, x, 300.0, 1e5);
  std::vector<double> y = mix.mass_fractions(x);
  const GasState<double> s = mix.from_temperature(y.data(), 300.0, 1e5);
  CHECK(s.density * 2.0 == Approx(m).epsilon(1e-14));
  // Mixed from its parts, air has the heat capacity of its own fit (one author, digits apart).
  CHECK(s.cp == Approx(gas("air").cp(300.0)).epsilon(1e-4));
  CHECK(mix.index_of("argon") == 2);
  CHECK_FALSE(mix.index_of("neon").has_value());
}

TEST_CASE("the range of a mixture is the narrowest of the gases present") {
  const GasMixture mix = five_gases();
  const double own_only[gases] = {0.0, 0.0, 0.0, 0.0, 1.0};
  const double both[gases] = {0.5, 0.0, 0.0, 0.0, 0.5};
  CHECK(mix.lowest_temperature(own_only) == 0.0);
  CHECK(mix.lowest_temperature(both) == 200.0);
  CHECK(mix.highest_temperature(both) == 6000.0);
}

TEST_CASE("an impossible list of gases is refused") {
  CHECK_THROWS_WITH(GasMixture(std::vector<Species>{}), Contains("between 1 and 16"));
  CHECK_THROWS_WITH(mixture_of({"argon", "N2", "Ar"}), Contains("argon stands twice"));
  std::vector<Species> many;
  for (int i = 0; i < 17; ++i) many.push_back(constant_cp_gas(std::string(1, static_cast<char>(97 + i)), 0.03, 1000.0));
  CHECK_THROWS_WITH(GasMixture(many), Contains("17 gases"));
  many.pop_back();
  CHECK(GasMixture(many).count() == 16);
}
