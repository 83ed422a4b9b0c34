#include "gas/catalogue.h"

#include <algorithm>
#include <catch2/catch.hpp>
#include <set>

#include "unit/gas/support.h"

using namespace gaskettle;

TEST_CASE("the catalogue has the 21 gases under their names, each name and alias once") {
  const std::vector<std::string> expected = {"nitrogen",
                                             "oxygen",
                                             "argon",
                                             "helium",
                                             "neon",
                                             "krypton",
                                             "xenon",
                                             "hydrogen",
                                             "carbon_dioxide",
                                             "carbon_monoxide",
                                             "water",
                                             "methane",
                                             "ethane",
                                             "propane",
                                             "ethylene",
                                             "ammonia",
                                             "sulfur_hexafluoride",
                                             "nitrous_oxide",
                                             "sulfur_dioxide",
                                             "nitric_oxide",
                                             "air"};
  REQUIRE(gas_catalogue().size() == expected.size());
  for (std::size_t i = 0; i < expected.size(); ++i) CHECK(gas_catalogue()[i].species.name == expected[i]);
  const std::vector<std::string> names = gas_names();
  CHECK(std::set<std::string>(names.begin(), names.end()).size() == names.size());
}

TEST_CASE("formulas and steam are aliases; anything else is not found") {
  CHECK(gas("N2").name == "nitrogen");
  CHECK(gas("C2H4").name == "ethylene");
  CHECK(gas("steam").name == "water");
  CHECK(gas("H2O").name == "water");
  CHECK_FALSE(find_gas("unobtainium").has_value());
  CHECK_FALSE(find_gas("").has_value());
}

TEST_CASE("every gas says where its figures come from") {
  for (const GasEntry& e : gas_catalogue()) {
    INFO(e.species.name);
    CHECK_FALSE(e.species.source.empty());
    CHECK_FALSE(e.species.transport_source.empty());
    REQUIRE(e.species.critical.has_value());
    CHECK_FALSE(e.species.critical->source.empty());
  }
  CHECK_FALSE(gas_data_version().empty());
}

TEST_CASE("critical figures fit together") {
  // Critical compressibility p/(rho R T): between 0.23 (polar) and 0.32 (quantum gases) for
  // any known fluid (Poling, Prausnitz, O'Connell, 5th ed. 2001, appendix A), nitric oxide 0.25.
  for (const GasEntry& e : gas_catalogue()) {
    INFO(e.species.name);
    const CriticalPoint& c = *e.species.critical;
    const double z = c.pressure / (c.molar_density * molar_gas_constant * c.temperature);
    CHECK(z > 0.22);
    CHECK(z < 0.32);
  }
}

TEST_CASE("molar masses are those of the formulas") {
  // Weights of the elements, g/mol (IUPAC 1997, to what a gas model resolves): the sum
  // of atoms is an independent spelling of the table's column.
  const double h = 1.00794, c = 12.0107, n = 14.0067, o = 15.9994, s = 32.065, f = 18.9984032;
  CHECK(gas("propane").molar_mass == Approx(1e-3 * (3 * c + 8 * h)).epsilon(2e-5));
  CHECK(gas("ammonia").molar_mass == Approx(1e-3 * (n + 3 * h)).epsilon(2e-5));
  CHECK(gas("sulfur_hexafluoride").molar_mass == Approx(1e-3 * (s + 6 * f)).epsilon(2e-5));
  CHECK(gas("nitrous_oxide").molar_mass == Approx(1e-3 * (2 * n + o)).epsilon(2e-5));
  CHECK(gas("air").molar_mass ==
        Approx(1e-3 * (1.5617 * n + 0.41959 * o + 0.00937 * 39.948 + 0.00032 * c)).epsilon(2e-5));
}
