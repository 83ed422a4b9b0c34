#include "laws/nozzle.h"

#include <array>
#include <catch2/catch.hpp>
#include <cmath>

#include "base/dependency_set.h"
#include "base/dual.h"

using namespace gaskettle;

namespace {

constexpr double band = 1e-5;
// Rounding: some ten operations on doubles, and the log of a ratio near 1 at the band's edge (1e-16/1e-5).
constexpr double rounding = 1e-13;
constexpr double rounding_at_edge = 2e-11;

double textbook_phi(double r, double gamma) {
  return std::sqrt(2 * gamma / (gamma - 1) * (std::pow(r, 2 / gamma) - std::pow(r, (gamma + 1) / gamma)));
}

double air_flux(double p_up, double p_down) { return nozzle_flux(p_up, 300.0, 287.0, 1.4, p_down, band); }

/// Flux and its derivatives by p_up, T_up, R, gamma, p_down.
Dual<5> dual_flux(std::array<double, 5> x, double width) {
  std::array<Dual<5>, 5> s;
  for (int i = 0; i < 5; ++i) {
    s[i] = x[i];
    s[i].d[i] = 1.0;
  }
  return nozzle_flux(s[0], s[1], s[2], s[3], s[4], width);
}

}  // namespace

TEST_CASE("the nozzle follows the textbook form at every ratio", "[nozzle]") {
  for (const double gamma : {1.05, 1.289, 1.4, 5.0 / 3.0}) {
    const double psi = std::sqrt(gamma * std::pow(2 / (gamma + 1), (gamma + 1) / (gamma - 1)));
    const double r_c = std::pow(2 / (gamma + 1), gamma / (gamma - 1));
    // The textbook powers lose digits as gamma nears 1: 1e-16/(gamma - 1).
    CHECK(choked_flow_function(gamma) == Approx(psi).epsilon(rounding));
    CHECK(critical_ratio(gamma) == Approx(r_c).epsilon(rounding));
    for (double r = r_c + 1e-6; r < 0.9999; r += 0.01)
      CHECK(subcritical_flow_function(r, gamma) == Approx(textbook_phi(r, gamma)).epsilon(1e-11));
    CHECK(nozzle_flow_function(1.0 - 0.5 * r_c, gamma, band) == choked_flow_function(gamma));
  }
}

TEST_CASE("gamma = 1 is the isothermal nozzle", "[nozzle]") {
  // Limits: r_c = psi = exp(-1/2), phi = r sqrt(-2 ln r).
  CHECK(critical_ratio(1.0) == Approx(std::exp(-0.5)).epsilon(rounding));
  CHECK(choked_flow_function(1.0) == Approx(std::exp(-0.5)).epsilon(rounding));
  CHECK(subcritical_flow_function(0.8, 1.0) == Approx(0.8 * std::sqrt(-2 * std::log(0.8))).epsilon(rounding));
  // The series near gamma = 1 and the closed form meet where one takes over from the other.
  const double below = choked_flow_function(1.0 + 1.999999e-3), above = choked_flow_function(1.0 + 2.000001e-3);
  CHECK(below == Approx(above).epsilon(1e-9));  // d ln(psi)/d gamma is below 0.3 and the step is 2e-9
}

TEST_CASE("nothing flows uphill, nothing at equal pressures", "[nozzle]") {
  CHECK(air_flux(1e5, 1e5) == 0.0);
  CHECK(air_flux(1e5, 1.1e5) == 0.0);
  CHECK(air_flux(1e5, 0.0) == Approx(1e5 / std::sqrt(287.0 * 300.0) * choked_flow_function(1.4)).epsilon(rounding));
}

TEST_CASE("the patch near equal pressure meets the law in value and slope", "[nozzle]") {
  for (const double width : {1e-3, 1e-5}) {
    const double p_edge = 1e5 * (1.0 - width);
    const double inside = 1e5 * (1.0 - width * (1 - 1e-9)), outside = 1e5 * (1.0 - width * (1 + 1e-9));
    const auto in = dual_flux({1e5, 300, 287, 1.4, inside}, width);
    const auto out = dual_flux({1e5, 300, 287, 1.4, outside}, width);
    // Value and slope change by about 1e-9 over the gap; the drop itself is rounded to 1e-16/width.
    CHECK(in.v == Approx(out.v).epsilon(5e-9));
    for (int i = 0; i < 5; ++i) CHECK(in.d[i] == Approx(out.d[i]).epsilon(2e-8));
    CHECK(nozzle_flux(1e5, 300.0, 287.0, 1.4, p_edge, width) ==
          Approx(1e5 / std::sqrt(287.0 * 300.0) * textbook_phi(1 - width, 1.4)).epsilon(1e-9));
  }
}

TEST_CASE("the flow and its slope are continuous where the throat turns sonic", "[nozzle]") {
  const double r_c = critical_ratio(1.4);
  const auto above = dual_flux({1e5, 300, 287, 1.4, 1e5 * (r_c + 1e-7)}, band);
  const auto below = dual_flux({1e5, 300, 287, 1.4, 1e5 * (r_c - 1e-7)}, band);
  CHECK(above.v == Approx(below.v).epsilon(1e-12));  // phi is flat there: the difference is of second order
  CHECK(below.d[4] == 0.0);
  CHECK(std::abs(above.d[4]) * 1e5 < 1e-6 * above.v);  // slope = phi'' times 1e-7, phi'' of order 1
  for (int i = 0; i < 4; ++i) CHECK(above.d[i] == Approx(below.d[i]).epsilon(1e-6));
}

TEST_CASE("derivatives are finite and agree with differences in every regime", "[nozzle]") {
  const auto ratio = GENERATE(1.5, 1.0, 1.0 - 1e-7, 1.0 - 5e-6, 1.0 - 2e-4, 0.9, 0.6, 0.3, 0.0);
  const std::array<double, 5> x{1e5, 300, 287, 1.4, 1e5 * ratio};
  const auto flux = dual_flux(x, band);
  for (int i = 0; i < 5; ++i) {
    CAPTURE(ratio, i);
    REQUIRE(std::isfinite(flux.d[i]));
    if (ratio == 1.0 && (i == 0 || i == 4)) continue;  // one-sided there, tested below
    // Small enough to stay within one regime; two percent of the distance to equal pressure. Central difference:
    // error about 0.02^2 of the slope, plus rounding of the values over the step.
    const double step = (i == 0 || i == 4) ? 1e5 * std::max(std::abs(1 - ratio), 1e-7) * 0.02 : x[i] * 1e-5;
    auto high = x, low = x;
    high[i] += step;
    low[i] -= step;
    if (low[i] < 0) continue;
    const double slope = (dual_flux(high, band).v - dual_flux(low, band).v) / (2 * step);
    CHECK(flux.d[i] == Approx(slope).epsilon(2e-3).margin(1e-9 * flux.v / x[i]));
  }
}

TEST_CASE("at equal pressure the slope is that of a drop, and the same on both sides", "[nozzle]") {
  const auto at = dual_flux({1e5, 300, 287, 1.4, 1e5}, band);
  // 5/4 of the secant to the band's edge, where the law's logarithmic slope is 1/2 to within the band.
  const double secant = air_flux(1e5, 1e5 * (1 - band)) / (1e5 * band);
  CHECK(at.d[0] == Approx(1.25 * secant).epsilon(1e-4));
  CHECK(at.d[4] == Approx(-1.25 * secant).epsilon(1e-4));

  using D = Dual<2>;
  D p_a(1e5), p_b(1e5);
  p_a.d[0] = 1.0;
  p_b.d[1] = 1.0;
  const NozzleSide<D> a{p_a, 300.0, 287.0, 1.4}, b{p_b, 300.0, 287.0, 1.4};
  const auto flow = nozzle_flux_both_ways(a, b, band);
  const D net = flow.forward - flow.backward;
  CHECK(net.v == 0.0);
  CHECK(net.d[0] == at.d[0]);
  CHECK(net.d[1] == at.d[4]);
}

TEST_CASE("both ways: one direction flows, and swapping the sides swaps the flows", "[nozzle]") {
  const NozzleSide<double> hot{2e5, 400.0, 287.0, 1.4}, cold{1e5, 250.0, 2077.0, 5.0 / 3.0};
  const auto down = nozzle_flux_both_ways(hot, cold, band), up = nozzle_flux_both_ways(cold, hot, band);
  CHECK(down.forward == nozzle_flux(2e5, 400.0, 287.0, 1.4, 1e5, band));
  CHECK(down.backward == 0.0);
  CHECK(up.backward == down.forward);
  CHECK(up.forward == 0.0);
}

TEST_CASE("what the flow depends on does not follow the regime", "[nozzle]") {
  const auto p_down = GENERATE(2e5, 1e5, 1e5 * (1 - 1e-6), 0.9e5, 0.1e5);
  std::array<DependencySet, 5> x;
  const std::array<double, 5> at{1e5, 300, 287, 1.4, p_down};
  for (int i = 0; i < 5; ++i) x[i] = DependencySet::input(at[i], i);
  const auto flux = nozzle_flux(x[0], x[1], x[2], x[3], x[4], band);
  for (int i = 0; i < 5; ++i) CHECK(flux.depends_on(i));
  // Both directions, even that with no flow.
  const NozzleSide<DependencySet> a{x[0], x[1], x[2], x[3]}, b{x[4], 300.0, 287.0, 1.4};
  const auto flow = nozzle_flux_both_ways(a, b, band);
  CHECK((flow.forward.depends_on(1) && flow.forward.depends_on(4)));
  CHECK((flow.backward.depends_on(0) && flow.backward.depends_on(4)));
}

TEST_CASE("the flow grows with the drop, within the patch too", "[nozzle]") {
  double last = 0.0;
  for (double drop = 1e-8; drop < 0.4; drop *= 1.2) {
    const double flux = air_flux(1e5, 1e5 * (1 - drop));
    CHECK(flux > last);
    last = flux;
  }
}
