#include "laws/films.h"

#include <algorithm>
#include <catch2/catch.hpp>
#include <cmath>
#include <limits>
#include <numbers>
#include <string>
#include <vector>

#include "base/dependency_set.h"
#include "base/dual.h"
#include "laws/wall_response.h"

using namespace gaskettle;

namespace {

constexpr double g0 = 9.80665;

/// An upright vessel of 0.5 m bore and 1 m height with flat ends, seen from inside.
const std::vector<FilmSurface<>> inside{{FilmGeometry::upright_cylinder, 1.0, 1.5708, 0.5},
                                        {FilmGeometry::gas_above, 0.125, 0.19635, 1.0},
                                        {FilmGeometry::gas_below, 0.125, 0.19635, 1.0}};
const std::vector<FilmSurface<>> outside{{FilmGeometry::upright_cylinder, 1.0, 1.5708, 0.5},
                                         {FilmGeometry::gas_above, 0.125, 0.19635},
                                         {FilmGeometry::gas_below, 0.125, 0.19635}};
const std::vector<FilmGeometry> geometries{FilmGeometry::vertical_plate, FilmGeometry::gas_above,
                                           FilmGeometry::gas_below,      FilmGeometry::upright_cylinder,
                                           FilmGeometry::level_cylinder, FilmGeometry::sphere};

/// Air as an ideal gas near 320 K with fixed transport properties; only for these tests.
template <Scalar S>
FilmFluid<S> air(const S& pressure, const S& temperature) {
  return {pressure / (287.05 * temperature), S(1.94e-5), S(0.0278), S(1007.0), 1.0 / temperature};
}

/// A film as a function of wall and gas temperature, pressure and speed.
template <Scalar S>
S film_at(FilmKind kind, const S& wall, const S& gas, const S& pressure, const S& speed) {
  const FilmFluid<S> fluid = air<S>(pressure, 0.5 * (wall + gas));
  switch (kind) {
    case FilmKind::still_air:
      return still_air_film(outside, fluid, wall, gas, g0);
    case FilmKind::wind:
      return wind_film(outside, fluid, speed, wall, gas, g0);
    case FilmKind::enclosed:
      return enclosed_film(inside, fluid, wall, gas, g0);
    case FilmKind::stirred:
      break;
  }
  return stirred_film(inside, fluid, Stirring<S>{speed, 0.2, 0.5, 0.36}, wall, gas, g0);
}

Dual<1> seeded(double x, bool seed) {
  Dual<1> r(x);
  r.d[0] = seed ? 1.0 : 0.0;
  return r;
}

const std::vector<FilmKind> kinds{FilmKind::still_air, FilmKind::wind, FilmKind::enclosed, FilmKind::stirred};

}  // namespace

TEST_CASE("film coefficients and their slopes are finite at equal temperatures and at standstill") {
  for (const FilmKind kind : kinds)
    for (const double difference : {0.0, 1e-9, -20.0, 20.0})
      for (const double speed : {0.0, 3.0})
        for (int input = 0; input < 4; ++input) {
          const auto h = film_at(kind, seeded(320.0 + difference, input == 0), seeded(320.0, input == 1),
                                 seeded(1e5, input == 2), seeded(speed, input == 3));
          CAPTURE(static_cast<int>(kind), difference, speed, input);
          CHECK(h.v > 0.0);
          CHECK(std::isfinite(h.v));
          CHECK(std::isfinite(h.d[0]));
        }
}

TEST_CASE("film slopes by dual numbers agree with differences") {
  for (const FilmKind kind : kinds)
    for (const double wall : {300.0, 319.95, 320.02, 360.0}) {
      const double gas = 320.0, p = 3e5, speed = 2.0, step = 1e-4;
      const auto central = [&](double dw, double ds) {
        return (film_at(kind, wall + dw, gas, p, speed + ds) - film_at(kind, wall - dw, gas, p, speed - ds)) /
               (2.0 * (dw + ds));
      };
      // Steepest scale is 0.01 K: third derivative times step^2 / 6 is 1e-5 of the slope there.
      const double by_wall =
          film_at(kind, seeded(wall, true), seeded(gas, false), seeded(p, false), seeded(speed, false)).d[0];
      CHECK(by_wall == Approx(central(step, 0.0)).epsilon(1e-3).margin(1e-7));
      const double by_speed =
          film_at(kind, seeded(wall, false), seeded(gas, false), seeded(p, false), seeded(speed, true)).d[0];
      CHECK(by_speed == Approx(central(0.0, step)).epsilon(1e-6).margin(1e-7));
    }
}

TEST_CASE("films depend on temperatures and pressure, forced ones on speed too") {
  for (const FilmKind kind : kinds) {
    const auto h = film_at(kind, DependencySet::input(330.0, 0), DependencySet::input(320.0, 1),
                           DependencySet::input(1e5, 2), DependencySet::input(0.0, 3));
    CHECK(h.depends_on(0));
    CHECK(h.depends_on(1));
    CHECK(h.depends_on(2));
    CHECK(h.depends_on(3) == (kind == FilmKind::wind || kind == FilmKind::stirred));
  }
}

TEST_CASE("the heat of a film rises with the temperature difference and never jumps") {
  for (const double pressure : {1e4, 1e5, 1e7})
    for (const FilmKind kind : kinds) {
      double before = -std::numeric_limits<double>::infinity(), h_before = 0.0;
      for (double difference = -3.0; difference <= 3.0; difference += 1e-3) {
        const double h = film_at(kind, 320.0 + difference, 320.0, pressure, 0.0);
        CHECK(h * difference > before);
        // The steepest turn is that of horizontal faces: a factor of 6 spread over 0.2 K, 1e-3 K apart.
        if (h_before > 0.0) CHECK(std::abs(h / h_before - 1.0) < 0.05);
        before = h * difference;
        h_before = h;
      }
    }
}

TEST_CASE("without speed forced films are the natural ones") {
  const FilmFluid<double> fluid = air(2e5, 330.0);
  const double quiet = enclosed_film(inside, fluid, 350.0, 310.0, g0);
  CHECK(stirred_film(inside, fluid, Stirring<double>{0.0, 0.2, 0.5, 0.36}, 350.0, 310.0, g0) ==
        Approx(quiet).epsilon(1e-14));
  // Cross flow keeps Nu = 0.3 at Re = 0; its cube beside that of Nu of some 100 is nothing.
  const double still = still_air_film(outside, fluid, 350.0, 310.0, g0);
  CHECK(wind_film(outside, fluid, 0.0, 350.0, 310.0, g0) == Approx(still).epsilon(1e-6));
  CHECK(wind_film(outside, fluid, -4.0, 350.0, 310.0, g0) == wind_film(outside, fluid, 4.0, 350.0, 310.0, g0));
  // Fast stirring: the forced relation alone, h = 0.36 Re^(2/3) Pr^(1/3) k / D.
  const double re = fluid.density * 100.0 * 0.04 / fluid.viscosity;
  const double forced = 0.36 * std::pow(re, 2.0 / 3.0) * std::cbrt(1.94e-5 * 1007.0 / 0.0278) * 0.0278 / 0.5;
  const double mixed = stirred_film(inside, fluid, Stirring<double>{100.0, 0.2, 0.5, 0.36}, 350.0, 310.0, g0);
  CHECK(mixed == Approx(std::cbrt(cube(forced) + cube(quiet))).epsilon(1e-12));
}

TEST_CASE("quiet gas without gravity is left with conduction") {
  // The floor is that of a ball cooling slowly from its mean temperature: h = decay rate times heat capacity per area.
  WallSpec ball;
  ball.shape = WallShape::sphere;
  ball.inner_radius = 1e-6;
  ball.layers = {{0.25 - 1e-6, 0.0278, 1.1, 1007.0, 0.0}};
  ball.outer_film = perfect_film;
  const double time = 0.3 * 0.0625 * 1.1 * 1007.0 / 0.0278;  // Fourier number 0.3: the second mode is down by exp(-9)
  const double rate =
      std::log(step_flow(ball, time, StepSide::outer) / step_flow(ball, 1.5 * time, StepSide::outer)) / (0.5 * time);
  const double conduction = rate * 1.1 * 1007.0 * 0.25 / 3.0;
  const std::vector<FilmSurface<>> sphere{{FilmGeometry::sphere, 0.5, 1.0, 0.5}};
  FilmFluid<double> fluid = air(1e5, 320.0);
  // The join with Nu = 2 of the outer relation adds (2/6.58)^6 / 6 = 1.3e-4; the second mode less.
  CHECK(enclosed_film(sphere, fluid, 330.0, 310.0, 0.0) == Approx(conduction).epsilon(3e-4));
  for (const FilmGeometry geometry : geometries) {
    const std::vector<FilmSurface<>> face{{geometry, 0.5, 1.0, 0.5}};
    CHECK(enclosed_film(face, fluid, 330.0, 310.0, 0.0) >= 4.9348 * 0.0278 / 0.5 * (1.0 - 1e-5));
    Dual<1> wall(310.0);
    wall.d[0] = 1.0;
    const FilmFluid<Dual<1>> lifted{Dual<1>(1.1), Dual<1>(1.94e-5), Dual<1>(0.0278), Dual<1>(1007.0),
                                    Dual<1>(1.0 / 310.0)};
    CHECK(std::isfinite(enclosed_film(face, lifted, wall, Dual<1>(310.0), 0.0).d[0]));
    CHECK(std::isfinite(still_air_film(face, lifted, wall, Dual<1>(310.0), 0.0).d[0]));
    const std::vector<FilmSurface<>> alone{{geometry, 0.5, 1.0}};
    CHECK(std::isfinite(
        stirred_film(alone, lifted, Stirring<Dual<1>>{seeded(0.0, true), 0.2, 0.5}, wall, Dual<1>(310.0), 0.0).d[0]));
  }
}

TEST_CASE("natural convection grows with pressure as its relations say") {
  // Ra goes with p^2: Nu with p^(1/2) where laminar, p^(2/3) where turbulent. The single expression for all Ra reaches
  // the latter from below.
  const auto exponent = [](double p) {
    return std::log(film_at(FilmKind::enclosed, 340.0, 310.0, 1.1 * p, 0.0) /
                    film_at(FilmKind::enclosed, 340.0, 310.0, p, 0.0)) /
           std::log(1.1);
  };
  CHECK(exponent(1e5) > 0.5);
  CHECK(exponent(1e7) > 0.6);
  CHECK(exponent(1e7) < 2.0 / 3.0);
}

TEST_CASE("horizontal faces take the relation of their side") {
  const FilmFluid<double> fluid = air(1e5, 320.0);
  const std::vector<FilmSurface<>> floor{{FilmGeometry::gas_above, 0.2, 1.0}},
      roof{{FilmGeometry::gas_below, 0.2, 1.0}};
  const double hot_floor = still_air_film(floor, fluid, 340.0, 300.0, g0);
  const double cold_floor = still_air_film(floor, fluid, 300.0, 340.0, g0);
  CHECK(hot_floor > 2.0 * cold_floor);
  CHECK(still_air_film(roof, fluid, 300.0, 340.0, g0) == Approx(hot_floor).epsilon(1e-14));
  CHECK(still_air_film(roof, fluid, 340.0, 300.0, g0) == Approx(cold_floor).epsilon(1e-14));
}

TEST_CASE("joined branches stay as near as their descriptions say") {
  const double meeting = std::pow(0.54 / 0.15, 12.0);
  CHECK(meeting == Approx(unstable_plate_transition).epsilon(1e-3));
  for (double ra = 1e4; ra < 1e11; ra *= 1.3) {
    const double higher = std::max(nusselt_unstable_plate_laminar(ra), nusselt_unstable_plate_turbulent(ra));
    const double ratio = nusselt_unstable_plate(ra) / higher;
    CHECK(ratio >= 1.0);
    CHECK(ratio <= std::pow(2.0, 0.1) + 1e-12);
    if (ra < 3e5 || ra > 8e7) CHECK(ratio < 1.01);
  }
  for (const double re : {10.0, 100.0, 1e5})
    for (const double p : {0.5, 0.625, 0.8})
      CHECK(1.0 - soft_power(re, p) / std::pow(re, p) ==
            Approx((1.0 - 0.5 * p) / (re * re)).epsilon(0.02).margin(1e-14));
  CHECK(join(3.0, 4.0, 2.0) == Approx(5.0).epsilon(1e-15));
  CHECK(join(5.0, 0.0, 3.0) == 5.0);
}

TEST_CASE("the label says what carries the heat") {
  const FilmFluid<double> fluid = air(1e5, 320.0), thin = air(100.0, 320.0);
  FilmFluid<double> dense = air(1e7, 320.0);
  const auto label = [&](FilmKind kind, const FilmFluid<double>& gas, double wind, double stir) {
    const bool out = kind == FilmKind::still_air || kind == FilmKind::wind;
    return std::string(
        governing_branch(kind, out ? outside : inside, gas, 325.0, 315.0, g0, wind, {stir, 0.2, 0.5, 0.36}));
  };
  CHECK(label(FilmKind::still_air, fluid, 0.0, 0.0) == "laminar natural");  // Ra = 9e8 on 1 m
  CHECK(label(FilmKind::enclosed, dense, 0.0, 0.0) == "turbulent natural");
  CHECK(label(FilmKind::enclosed, thin, 0.0, 0.0) == "conduction");
  CHECK(label(FilmKind::wind, fluid, 10.0, 0.0) == "forced");
  CHECK(label(FilmKind::wind, fluid, 0.0, 0.0) == "laminar natural");
  CHECK(label(FilmKind::stirred, fluid, 0.0, 0.0) == "laminar natural");
  CHECK(label(FilmKind::stirred, fluid, 0.0, 200.0) == "forced");
  bool mixed = false;
  for (double speed = 0.1; speed < 10.0; speed *= 1.2)
    mixed = mixed || label(FilmKind::wind, fluid, speed, 0.0) == "mixed";
  CHECK(mixed);
}

TEST_CASE("every film name has its entry") {
  CHECK(film_catalogue().size() == 4);
  for (const FilmEntry& entry : film_catalogue()) {
    CHECK(find_film(entry.name) == &entry);
    CHECK(entry.inside != entry.outside);
    CHECK(!entry.meaning.empty());
    CHECK(!entry.range.empty());
    CHECK(!entry.source.empty());
  }
  CHECK(find_film("breeze") == nullptr);
}
