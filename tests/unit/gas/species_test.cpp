#include "gas/species.h"

#include <catch2/catch.hpp>
#include <stdexcept>

#include "base/dependency_set.h"
#include "base/dual.h"
#include "unit/gas/support.h"

using namespace gaskettle;
using Catch::Matchers::Contains;

TEST_CASE("the gas constant and the energy are those of one molar gas constant") {
  for (const GasEntry& e : gas_catalogue()) {
    const Species& s = e.species;
    INFO(s.name);
    CHECK(s.gas_constant * s.molar_mass == Approx(8.31446261815324).epsilon(1e-15));
    for (const double t : {77.0, 298.15, 1200.0})
      CHECK(s.enthalpy(t) - s.energy(t) == Approx(s.gas_constant * t).epsilon(1e-13));
  }
}

TEST_CASE("dual numbers carry the slopes, dependency sets the dependence") {
  Dual<1> t(640.0);
  t.d[0] = 1.0;
  const DependencySet marked = DependencySet::input(640.0, 70);
  for (const GasEntry& e : gas_catalogue()) {
    const Species& s = e.species;
    INFO(s.name);
    // The same numbers on both paths; one multiplication more or less is rounding.
    CHECK(s.enthalpy(t).v == s.enthalpy(640.0));
    CHECK(s.enthalpy(t).d[0] == Approx(s.cp(640.0)).epsilon(1e-14));
    CHECK(s.energy(t).d[0] == Approx(s.cp(640.0) - s.gas_constant).epsilon(1e-14));
    CHECK(s.entropy(t).d[0] == Approx(s.cp(640.0) / 640.0).epsilon(1e-14));
    CHECK(s.viscosity(t).d[0] > 0.0);
    CHECK(s.cp(marked).depends_on(70));  // also where cp is constant: structure, not values
    CHECK(s.conductivity(marked).depends_on(70));
    CHECK(s.viscosity(marked).plain() == s.viscosity(640.0));
  }
}

TEST_CASE("a gas of one's own has constant properties at any temperature") {
  const Species mine = constant_cp_gas("mine", 0.040, 520.0, 2.2e-5, 0.018);
  for (const double t : {3.0, 298.15, 8000.0}) {
    CHECK(mine.cp(t) == Approx(520.0).epsilon(1e-15));
    // h is built as R (cp/R) (T - 298.15): two roundings.
    CHECK(mine.enthalpy(t) == Approx(520.0 * (t - 298.15)).epsilon(1e-14).margin(1e-12));
    CHECK(mine.entropy(t) == Approx(520.0 * std::log(t / 298.15)).epsilon(1e-13).margin(1e-12));
    CHECK(mine.viscosity(t) == 2.2e-5);
    CHECK(mine.conductivity(t) == 0.018);
  }
  CHECK(mine.lowest_temperature() == 0.0);
  CHECK_FALSE(constant_cp_gas("plain", 0.040, 520.0).viscosity_curve.has_value());
  CHECK(std::isnan(constant_cp_gas("plain", 0.040, 520.0).viscosity(300.0)));
}

TEST_CASE("an impossible gas is refused with the reason") {
  CHECK_THROWS_WITH(constant_cp_gas("mine", 0.0, 520.0), Contains("molar mass"));
  CHECK_THROWS_WITH(constant_cp_gas("mine", 0.040, 200.0), Contains("above the gas constant 207.86"));
  CHECK_THROWS_WITH(constant_cp_gas("mine", 0.040, 520.0, -1.0), Contains("viscosity"));
  CHECK_THROWS_WITH(constant_cp_gas("mine", 0.040, 520.0, 1e-5, std::nan("")), Contains("conductivity"));
  CHECK_THROWS_AS(constant_cp_gas("mine", -1.0, 520.0), std::invalid_argument);
}
