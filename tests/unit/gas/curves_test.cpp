#include "gas/curves.h"

#include <catch2/catch.hpp>
#include <cmath>
#include <limits>
#include <stdexcept>

#include "base/dual.h"
#include "unit/gas/support.h"

using namespace gaskettle;

namespace {

// The neighbours of a double, to look at both sides of a joint.
double just_below(double x) { return std::nextafter(x, 0.0); }
double just_above(double x) { return std::nextafter(x, std::numeric_limits<double>::infinity()); }

}  // namespace

TEST_CASE("h and s join at 1000 K, cp to the digits of the published fit") {
  for (const GasEntry& e : gas_catalogue()) {
    INFO(e.species.name);
    const ThermalPoint below = e.species.thermal(1000.0);
    const ThermalPoint above = e.species.thermal(just_above(1000.0));
    // Terms of the upper fits reach 10 times h itself; a few units of rounding of those.
    CHECK(above.enthalpy == Approx(below.enthalpy).epsilon(1e-14));
    CHECK(above.entropy == Approx(below.entropy).epsilon(1e-14));
    CHECK(above.cp == Approx(below.cp).epsilon(6e-9));  // ten printed digits, cancelling
  }
}

TEST_CASE("enthalpy is exactly zero at 298.15 K") {
  for (const GasEntry& e : gas_catalogue()) {
    INFO(e.species.name);
    CHECK(e.species.enthalpy(298.15) == 0.0);
    CHECK(e.species.enthalpy(Dual<1>(298.15)).v == 0.0);
  }
  CHECK(constant_cp_gas("mine", 0.02, 1500.0).enthalpy(298.15) == 0.0);
}

TEST_CASE("outside the published range cp is held and h, s go on with it") {
  for (const GasEntry& e : gas_catalogue()) {
    const Species& s = e.species;
    INFO(s.name);
    for (const double limit : {s.lowest_temperature(), s.highest_temperature()}) {
      const bool low = limit < 1000.0;
      const ThermalPoint edge = s.thermal(limit);
      const ThermalPoint beside = s.thermal(low ? just_below(limit) : just_above(limit));
      CHECK(beside.enthalpy == Approx(edge.enthalpy).epsilon(1e-13));
      CHECK(beside.entropy == Approx(edge.entropy).epsilon(1e-13));
      const double far_away = low ? 20.0 : 9000.0;
      const ThermalPoint held = s.thermal(far_away);
      CHECK(held.cp == edge.cp);
      CHECK(held.cp_slope == 0.0);
      CHECK(held.enthalpy == Approx(edge.enthalpy + edge.cp * (far_away - limit)).epsilon(1e-14));
      CHECK(held.entropy == Approx(edge.entropy + edge.cp * std::log(far_away / limit)).epsilon(1e-13));
    }
  }
}

TEST_CASE("cv stays positive at any temperature, so one energy has one temperature") {
  // The least heat capacity of a gas is that of one atom: cv = 1.5 R.
  for (const GasEntry& e : gas_catalogue())
    for (double t = 1.0; t < 20000.0; t *= 1.07) {
      INFO(e.species.name << " at " << t << " K");
      CHECK(e.species.cp(t) - e.species.gas_constant > 1.4999 * e.species.gas_constant);
    }
}

TEST_CASE("h, s and cp belong together: differences reproduce the slopes") {
  for (const GasEntry& e : gas_catalogue())
    for (const double t : {60.0, 150.0, 250.0, 298.15, 400.0, 850.0, 1100.0, 2500.0, 5500.0, 7000.0}) {
      const Species& s = e.species;
      INFO(s.name << " at " << t << " K");
      const double d = 1e-4 * t;  // central differences: error (1e-4)^2 of order one, rounding 1e-15 / 1e-4 times 30
      const ThermalPoint low = s.thermal(t - d), here = s.thermal(t), high = s.thermal(t + d);
      CHECK((high.enthalpy - low.enthalpy) / (2 * d) == Approx(here.cp).epsilon(1e-7));
      CHECK((high.entropy - low.entropy) / (2 * d) == Approx(here.cp / t).epsilon(1e-7));
      CHECK((high.cp - low.cp) / (2 * d) == Approx(here.cp_slope).epsilon(1e-6).margin(1e-8 * here.cp / t));
    }
}

TEST_CASE("ranges in the wrong order are refused") {
  const Nasa9Range r;
  CHECK_THROWS_AS(HeatCapacityCurve(r, r, 300.0, 1000.0, 6000.0), std::invalid_argument);
  CHECK_THROWS_AS(HeatCapacityCurve(r, r, 200.0, 1000.0, 900.0), std::invalid_argument);
  CHECK_THROWS_AS(TransportCurve({}), std::invalid_argument);
  CHECK_THROWS_AS(TransportCurve({{200, 1000, 1e-5, 0.7, 0, 0, 0, 0}, {1100, 2000, 1e-5, 0.7, 0, 0, 0, 0}}),
                  std::invalid_argument);
}

TEST_CASE("transport curves are positive, without a jump or a kink at their limits") {
  for (const GasEntry& e : gas_catalogue())
    for (const auto& curve : {e.species.viscosity_curve, e.species.conductivity_curve}) {
      INFO(e.species.name);
      REQUIRE(curve.has_value());
      for (double t = 1.0; t < 20000.0; t *= 1.03) CHECK(curve->at(t, std::log(t)).value > 0.0);
      for (const double joint : {curve->lowest(), 1000.0, 1073.2, 5000.0, curve->highest()}) {
        const double b = just_below(joint), a = just_above(joint);
        // exp of a difference of terms of size 10: a few 1e-15.
        CHECK(curve->at(a, std::log(a)).value == Approx(curve->at(b, std::log(b)).value).epsilon(1e-13));
      }
      for (const double edge : {curve->lowest(), curve->highest()}) {
        const double b = just_below(edge), a = just_above(edge);
        CHECK(curve->at(a, std::log(a)).by_temperature ==
              Approx(curve->at(b, std::log(b)).by_temperature).epsilon(1e-12));
      }
      for (const double t : {50.0, 320.0, 777.0, 1900.0, 5500.0, 18000.0}) {
        const double d = 1e-4 * t;
        const double difference =
            (curve->at(t + d, std::log(t + d)).value - curve->at(t - d, std::log(t - d)).value) / (2 * d);
        const Slope here = curve->at(t, std::log(t));
        CHECK(difference == Approx(here.by_temperature).epsilon(1e-6).margin(1e-8 * here.value / t));
      }
    }
}
