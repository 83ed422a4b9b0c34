#include "laws/iso6358.h"

#include <array>
#include <catch2/catch.hpp>
#include <cmath>

#include "base/dependency_set.h"
#include "base/dual.h"

using namespace gaskettle;

namespace {

constexpr double C = 1e-8;
constexpr double b = 0.35;
constexpr double band = 1e-5;

Dual<3> dual_flow(double p_up, double T_up, double p_down, double critical = b) {
  Dual<3> x[3] = {p_up, T_up, p_down};
  for (int i = 0; i < 3; ++i) x[i].d[i] = 1.0;
  return iso6358_flow(x[0], x[1], x[2], C, critical, band);
}

}  // namespace

TEST_CASE("ISO 6358: choked flow, the ellipse, and zero uphill", "[iso6358]") {
  const double choked = C * 7e5 * 1.185 * std::sqrt(293.15 / 350.0);
  CHECK(iso6358_flow(7e5, 350.0, 1e5, C, b, band) == Approx(choked).epsilon(1e-14));
  const double x = (6.0 / 7.0 - b) / (1 - b);
  CHECK(iso6358_flow(7e5, 350.0, 6e5, C, b, band) == Approx(choked * std::sqrt(1 - x * x)).epsilon(1e-13));
  CHECK(iso6358_flow(7e5, 350.0, 7e5, C, b, band) == 0.0);
  CHECK(iso6358_flow(7e5, 350.0, 8e5, C, b, band) == 0.0);
}

TEST_CASE("ISO 6358: value and slope are continuous at b and at the band's edge", "[iso6358]") {
  const double critical = GENERATE(0.0, 0.35, 0.9, 0.99999);
  const double edge = std::min(band, 0.5 * (1 - critical));
  for (const double drop : {edge, 1 - critical}) {
    if (drop >= 1.0) continue;  // b = 0 chokes only into vacuum
    const auto in = dual_flow(1e5, 300, 1e5 * (1 - drop * (1 - 1e-8)), critical);
    const auto out = dual_flow(1e5, 300, 1e5 * (1 - drop * (1 + 1e-8)), critical);
    CAPTURE(critical, drop);
    // Over the gap of 2e-8 of the drop; slopes also against the flow over the drop, as they vanish at choking.
    CHECK(in.v == Approx(out.v).epsilon(1e-7));
    for (int i : {0, 2}) CHECK(in.d[i] == Approx(out.d[i]).epsilon(1e-6).margin(1e-6 * in.v / (1e5 * drop)));
  }
}

TEST_CASE("ISO 6358: derivatives are finite and agree with differences", "[iso6358]") {
  const double ratio = GENERATE(1.2, 1.0, 1 - 4e-6, 1 - 1e-4, 0.7, 0.2, 0.0);
  const auto flow = dual_flow(1e5, 300, 1e5 * ratio);
  for (double slope : flow.d) REQUIRE(std::isfinite(slope));
  if (ratio == 1.0 || ratio == 0.0) return;
  const double step = 1e5 * std::abs(1 - ratio) * 0.01;  // central difference: error 1e-4 of the slope
  const auto value_at = [&](double dp) { return dual_flow(1e5, 300, 1e5 * ratio + dp).v; };
  CHECK(flow.d[2] == Approx((value_at(step) - value_at(-step)) / (2 * step)).epsilon(5e-4).margin(1e-20));
  CHECK(flow.d[1] == Approx(-0.5 * flow.v / 300).epsilon(1e-13));  // flow goes with T^-1/2
}

TEST_CASE("ISO 6358: dependencies do not follow the regime", "[iso6358]") {
  const double p_down = GENERATE(2e5, 1e5, 0.999999e5, 0.8e5, 0.1e5);
  const auto flow = iso6358_flow(DependencySet::input(1e5, 0), DependencySet::input(300, 1),
                                 DependencySet::input(p_down, 2), C, b, band);
  for (int i = 0; i < 3; ++i) CHECK(flow.depends_on(i));
}

TEST_CASE("ISO 6358: an ideal nozzle in its terms passes the nozzle's flow", "[iso6358]") {
  const double area = 3e-6;
  const double conductance = sonic_conductance_of_nozzle(area);
  CHECK(conductance == Approx(1.99e-3 * area).epsilon(2e-3));  // 0.199 dm3/(s bar) a mm2, three digits
  for (const double R : {287.0, 2077.0}) {
    const double gamma = R > 1000 ? 5.0 / 3.0 : 1.4;
    const double flow = iso6358_flow(5e5, 320.0, 1e5, conductance, 0.5, band) * iso6358_gas_factor(R, gamma);
    CHECK(flow == Approx(area * nozzle_flux(5e5, 320.0, R, gamma, 1e5, band)).epsilon(1e-12));  // both choked
  }
  // With b = r_c the ellipse stays within 0.3 % of the nozzle for gamma = 1.4, at every ratio (recomputed property
  // of the two formulas).
  const double r_c = critical_ratio(1.4);
  for (double r = 0.3; r < 0.999; r += 0.01)
    CHECK(iso6358_flow_function(1 - r, r_c, band) * choked_flow_function(1.4) ==
          Approx(nozzle_flow_function(1 - r, 1.4, band)).epsilon(3.5e-3));
}
