#include "laws/conductivity_table.h"

#include <catch2/catch.hpp>
#include <cmath>
#include <stdexcept>

#include "base/dual.h"

using gaskettle::ConductivityTable;
using gaskettle::Dual;

namespace {
Dual<1> slope_probe(const ConductivityTable& table, double temperature) {
  Dual<1> x(temperature);
  x.d[0] = 1.0;
  return table.at(x);
}
// Ceramic fibre: rising, with a knee.
ConductivityTable fibre() { return {{300.0, 500.0, 600.0, 900.0}, {0.04, 0.06, 0.12, 0.18}}; }
}  // namespace

TEST_CASE("a conductivity table passes through its points and keeps between neighbours") {
  const ConductivityTable table = fibre();
  CHECK(table.at(300.0) == Approx(0.04).epsilon(1e-14));
  CHECK(table.at(500.0) == Approx(0.06).epsilon(1e-14));
  CHECK(table.at(600.0) == Approx(0.12).epsilon(1e-14));
  CHECK(table.at(900.0) == Approx(0.18).epsilon(1e-14));
  double before = table.at(250.0);
  for (double t = 251.0; t < 1000.0; t += 1.0) {
    CHECK(table.at(t) >= before - 1e-15);  // rounding only
    before = table.at(t);
  }
}

TEST_CASE("two points of a conductivity table make a straight line") {
  const ConductivityTable steel({293.15, 1073.15}, {53.33, 27.33});
  CHECK(steel.at(673.15) == Approx(53.33 - 26.0 * 380.0 / 780.0).epsilon(1e-13));
}

TEST_CASE("a conductivity table has no kink, ends included") {
  const ConductivityTable table = fibre();
  // The slope may change by curvature times 2e-6 K; a kink would be of the order of the slope, 1e-4.
  for (const double knot : {300.0, 500.0, 600.0, 900.0, 296.0, 906.0}) {
    const double left = slope_probe(table, knot - 1e-6).d[0], right = slope_probe(table, knot + 1e-6).d[0];
    CHECK(std::abs(left - right) < 1e-9);
  }
  for (const double t : {310.0, 550.0, 700.0, 899.0, 903.0, 298.0}) {
    const double difference = (table.at(t + 1e-3) - table.at(t - 1e-3)) / 2e-3;
    CHECK(slope_probe(table, t).d[0] == Approx(difference).margin(1e-9));  // rounding 1e-17 / 1e-3 and curvature
  }
}

TEST_CASE("a conductivity table is held beyond its ends, within 1 % and above zero") {
  const ConductivityTable table = fibre();
  CHECK(table.at(2000.0) == table.at(920.0));
  CHECK(std::abs(table.at(2000.0) / 0.18 - 1.0) <= 0.01);
  CHECK(std::abs(table.at(10.0) / 0.04 - 1.0) <= 0.01);
  const ConductivityTable steep({300.0, 400.0}, {1.0, 0.001});
  CHECK(steep.at(1000.0) > 0.00098);
}

TEST_CASE("a table of one point is constant, and nonsense is refused") {
  CHECK(ConductivityTable(45.0).at(777.0) == 45.0);
  CHECK(ConductivityTable(45.0).constant());
  CHECK_THROWS_AS(ConductivityTable({300.0, 300.0}, {1.0, 2.0}), std::invalid_argument);
  CHECK_THROWS_AS(ConductivityTable({300.0, 400.0}, {1.0}), std::invalid_argument);
  CHECK_THROWS_AS(ConductivityTable({300.0, 400.0}, {1.0, 0.0}), std::invalid_argument);
  CHECK_THROWS_AS(ConductivityTable(std::vector<double>{}, std::vector<double>{}), std::invalid_argument);
}
