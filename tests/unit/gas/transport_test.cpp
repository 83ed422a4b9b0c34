#include <catch2/catch.hpp>

#include "base/dual.h"
#include "gas/mixture.h"
#include "unit/gas/support.h"

using namespace gaskettle;

TEST_CASE("one gas named twice is as viscous and conducts as well as one") {
  Species other = gas("nitrogen");
  other.name = "nitrogen again";
  const GasMixture mix({gas("nitrogen"), other, gas("helium")});
  const double m[3] = {0.2, 0.7, 0.0};
  for (const double t : {150.0, 300.0, 1500.0}) {
    const GasTransport<double> g = mix.transport(m, t);
    CHECK(g.viscosity == Approx(gas("nitrogen").viscosity(t)).epsilon(1e-13));
    CHECK(g.conductivity == Approx(gas("nitrogen").conductivity(t)).epsilon(1e-13));
  }
}

TEST_CASE("a plant of one gas takes its own curves") {
  const GasMixture mix({gas("argon")});
  const double m = 3.0;
  CHECK(mix.viscosity(&m, 400.0) == gas("argon").viscosity(400.0));
  CHECK(mix.conductivity(&m, 400.0) == gas("argon").conductivity(400.0));
  // One atom: Pr = cp mu / k near 2/3 by the kinetic theory of gases (Chapman and Cowling), within 1 %.
  CHECK(prandtl(mix.from_temperature(&m, 400.0, 1e5), mix.transport(&m, 400.0)) == Approx(2.0 / 3.0).epsilon(0.01));
}

TEST_CASE("the mixture rules do not care about the amount or the order of the gases") {
  const GasMixture ab = mixture_of({"hydrogen", "carbon_dioxide"}), ba = mixture_of({"carbon_dioxide", "hydrogen"});
  const double m[2] = {0.1, 0.5}, ten[2] = {1.0, 5.0}, turned[2] = {0.5, 0.1};
  CHECK(ab.viscosity(m, 350.0) == Approx(ab.viscosity(ten, 350.0)).epsilon(1e-14));
  CHECK(ab.viscosity(m, 350.0) == Approx(ba.viscosity(turned, 350.0)).epsilon(1e-14));
  CHECK(ab.conductivity(m, 350.0) == Approx(ba.conductivity(turned, 350.0)).epsilon(1e-14));
}

TEST_CASE("dual derivatives of the mixture's transport agree with differences") {
  const GasMixture mix = five_gases();
  using D = Dual<6>;
  const double x[6] = {0.3, 0.02, 0.2, 0.1, 0.4, 430.0};  // masses, T
  std::array<D, 6> seed;
  for (int k = 0; k < 6; ++k) {
    seed[k] = D(x[k]);
    seed[k].d[k] = 1.0;
  }
  const GasTransport<D> exact = mix.transport(seed.data(), seed[5]);
  for (int k = 0; k < 6; ++k) {
    double low[6], high[6];
    std::copy(std::begin(x), std::end(x), low);
    std::copy(std::begin(x), std::end(x), high);
    const double d = 1e-5 * x[k];
    low[k] -= d;
    high[k] += d;
    const GasTransport<double> a = mix.transport(low, low[5]), b = mix.transport(high, high[5]);
    INFO("input " << k);
    // Central differences: (1e-5)^2 of order one, rounding 1e-15 / 1e-5 of the value.
    const double mu = exact.viscosity.v / (2 * d), lambda = exact.conductivity.v / (2 * d);
    CHECK((b.viscosity - a.viscosity) / (2 * d) == Approx(exact.viscosity.d[k]).epsilon(1e-6).margin(1e-13 * mu));
    CHECK((b.conductivity - a.conductivity) / (2 * d) ==
          Approx(exact.conductivity.d[k]).epsilon(1e-6).margin(1e-13 * lambda));
  }
}

TEST_CASE("a gas without transport data says so") {
  const GasMixture mix({gas("argon"), constant_cp_gas("plain", 0.04, 520.0)});
  const double m[2] = {1.0, 0.0};
  CHECK_FALSE(mix.has_transport());
  CHECK(std::isnan(mix.viscosity(m, 300.0)));
  CHECK(five_gases().has_transport());
}
