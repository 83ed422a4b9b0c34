/// Walls against worked examples and tables of textbooks.
///
/// F. P. Incropera, D. P. DeWitt, T. L. Bergman and A. S. Lavine, Fundamentals of Heat and Mass Transfer, 6th ed.;
/// closed forms after H. S. Carslaw and J. C. Jaeger, Conduction of Heat in Solids, 2nd ed. 1959.
/// Grids are asked for 1e-3 of the heat flow, so what they give is held to 1e-3 of the temperature step; their
/// equations are integrated here by the trapezoidal rule in steps whose error is far below.
#include <algorithm>
#include <catch2/catch.hpp>
#include <cmath>
#include <numbers>
#include <vector>

#include "laws/conduction_grid.h"
#include "laws/wall_response.h"

using namespace gaskettle;

namespace {

/// A flat one-layer wall's node temperatures over time, driven by gas through the inner film; outer face insulated.
class SlabRun {
public:
  SlabRun(const WallSpec& wall, const ConductionGrid& grid, double start)
      : wall_(wall), grid_(grid), temperature_(static_cast<std::size_t>(grid.size()), start) {}

  void run(double gas, double time, int steps) {
    for (int i = 0; i < 4; ++i) step(gas, 0.25 * time / steps, 1.0);  // implicit Euler first: damps the sudden start
    for (int i = 1; i < steps; ++i) step(gas, time / steps, 0.5);
  }
  double flow(double gas) const { return wall_.inner_film * (gas - temperature_.front()); }
  double outer_face() const { return temperature_.back(); }
  double stored(double start) const {
    double sum = 0.0;
    for (std::size_t j = 0; j < temperature_.size(); ++j) sum += capacity(j) * (temperature_[j] - start);
    return sum;
  }
  /// Depth where the temperature is t, between nodes.
  double depth_of(double t) const {
    std::size_t j = 0;
    while ((temperature_[j] - t) * (temperature_[j + 1] - t) > 0.0) ++j;
    const double share = (t - temperature_[j]) / (temperature_[j + 1] - temperature_[j]);
    return grid_.nodes[j].depth + share * (grid_.nodes[j + 1].depth - grid_.nodes[j].depth);
  }

private:
  double capacity(std::size_t j) const { return grid_.nodes[j].heat_capacity; }
  /// Between node j and the one after, 0 at the insulated outer face.
  double link(std::size_t j) const { return j + 1 < temperature_.size() ? conductance(wall_, grid_.links[j]) : 0.0; }
  /// A face held at the gas temperature is a film without resistance, as far as rounding goes.
  double film() const { return std::min(wall_.inner_film, 1e9 * link(0)); }

  /// One step of the theta rule, by elimination of the tridiagonal system.
  void step(double gas, double dt, double theta) {
    const std::size_t n = temperature_.size();
    std::vector<double> below(n, 0.0), diagonal(n), above(n, 0.0), right(n);
    for (std::size_t j = 0; j < n; ++j) {
      const double in = j == 0 ? film() : link(j - 1), out = link(j);
      const double before = j == 0 ? gas : temperature_[j - 1], after = j + 1 == n ? 0.0 : temperature_[j + 1];
      const double rate = in * (before - temperature_[j]) + out * (after - temperature_[j]);
      diagonal[j] = capacity(j) / dt + theta * (in + out);
      if (j > 0) below[j] = -theta * in;
      above[j] = -theta * out;
      right[j] = rate;
    }
    for (std::size_t j = 1; j < n; ++j) {
      const double factor = below[j] / diagonal[j - 1];
      diagonal[j] -= factor * above[j - 1];
      right[j] -= factor * right[j - 1];
    }
    for (std::size_t j = n; j-- > 0;) {
      right[j] = (right[j] - (j + 1 < n ? above[j] * right[j + 1] : 0.0)) / diagonal[j];
      temperature_[j] += right[j];
    }
  }

  const WallSpec& wall_;
  const ConductionGrid& grid_;
  std::vector<double> temperature_;
};

/// First root of the decay sqrt(rate) L / sqrt(D) of a wall with L = k = D = 1 under an outer film of Bi = 1.
double first_root(WallShape shape) {
  WallSpec wall;
  wall.shape = shape;
  wall.inner_radius = shape == WallShape::flat ? 0.0 : 1e-4;  // as good as solid: the hole counts as its square
  // Cut into many layers of one material, which refines the annuli of a cylinder down to the axis.
  double inner = wall.inner_radius;
  const int layers = shape == WallShape::cylinder ? 600 : 1;
  for (int i = 1; i <= layers; ++i) {
    const double outer = i == layers ? 1.0 : std::pow(10.0, -4.0 + 4.0 * i / layers);
    wall.layers.push_back({outer - inner, 1.0, 1.0, 1.0, 0.0});
    inner = outer;
  }
  wall.outer_film = 1.0;
  const double early = step_flow(wall, 1.5, StepSide::outer), late = step_flow(wall, 2.5, StepSide::outer);
  return std::sqrt(std::log(early / late));  // one second apart; the second mode is down by exp(-15)
}

}  // namespace

TEST_CASE("Incropera table 5.1: first roots at Bi = 1") {
  CHECK(first_root(WallShape::flat) == Approx(0.8603).margin(5e-5));  // printed to four decimals
  CHECK(first_root(WallShape::flat) == Approx(0.860333589).epsilon(1e-6));
  CHECK(first_root(WallShape::cylinder) == Approx(1.2558).margin(5e-5));
  CHECK(first_root(WallShape::cylinder) == Approx(1.25578371).epsilon(1e-6));
  CHECK(first_root(WallShape::sphere) == Approx(std::numbers::pi / 2).epsilon(1e-6));
}

TEST_CASE("Incropera example 5.4: pipe wall warmed by hot oil, as a plane wall") {
  WallSpec wall;
  wall.layers = {{0.04, 63.9, 7832.0, 434.0, 0.0}};
  wall.inner_film = 500.0;
  const ConductionGrid grid = choose_conduction_grid(wall, 4.8);
  SlabRun slab(wall, grid, 253.0);
  slab.run(333.0, 480.0, 2000);
  // From the exact series with the tabulated diffusivity 1.88e-5; k / (rho c) is 1.87992e-5. The book rounds its
  // coefficients and prints 42.9 degree Celsius, -7400 W/m2 and -2.73e7 J/m.
  CHECK(slab.outer_face() == Approx(316.017451).margin(0.08));
  CHECK(slab.flow(333.0) == Approx(7318.22594).epsilon(0.002));
  CHECK(std::numbers::pi * slab.stored(253.0) == Approx(27254620.9).epsilon(0.002));
  // The exact wall of the program, without a grid: 5e-5 is what the rounded diffusivity changes.
  CHECK(step_flow(wall, 480.0) * 80.0 == Approx(7318.22594).epsilon(1e-4));
}

TEST_CASE("Incropera example 5.6: freezing depth in soil after sixty days") {
  WallSpec soil;
  soil.layers = {{6.0, 0.52, 2050.0, 1840.0, 0.0}};
  soil.inner_film = perfect_film;
  const ConductionGrid grid = choose_conduction_grid(soil, 51840.0);
  SlabRun run(soil, grid, 293.0);
  run.run(258.0, 5184000.0, 2000);
  // 0.6766 m from the error function; 1e-3 of the 35 K step is 2 mm at the slope there, and as much again for the
  // straight line between nodes.
  CHECK(run.depth_of(273.0) == Approx(0.676613228).margin(0.005));
  CHECK(step_flow(soil, 5184000.0) ==
        Approx(0.52 / std::sqrt(std::numbers::pi * 0.52 / (2050.0 * 1840.0) * 5184000.0)).epsilon(1e-6));
}

TEST_CASE("Incropera example 3.2: chip with a contact resistance") {
  // Chip loses 1e4 W/m2 upward through a film, and down through contact, aluminium and a second film.
  WallSpec plate;
  plate.layers = {{0.008, 239.0, 2700.0, 900.0, 0.0}};
  plate.inner_film = 1.0 / 0.9e-4;  // the contact
  plate.outer_film = 100.0;
  const ConductionGrid grid = choose_conduction_grid(plate, 1.0);
  double resistance = 1.0 / plate.inner_film + 1.0 / plate.outer_film;
  for (const ConductionLink& link : grid.links) resistance += 1.0 / conductance(plate, link);
  const double chip = 298.0 + 1e4 / (100.0 + 1.0 / resistance);
  CHECK(chip == Approx(348.306788).margin(1e-5));  // printed 75.3 degree Celsius
}

TEST_CASE("heat through cylindrical insulation") {
  // q = 2 pi k L dT / ln(r2 / r1): 61.985 W for 0.1 / 0.15 m, 0.04 W/(m K), 1 m, 100 K.
  WallSpec wrap;
  wrap.shape = WallShape::cylinder;
  wrap.inner_radius = 0.1;
  wrap.layers = {{0.05, 0.04, 100.0, 840.0, 0.0}};
  wrap.inner_film = wrap.outer_film = perfect_film;
  const ConductionGrid grid = choose_conduction_grid(wrap, 10.0);
  double resistance = 0.0;
  for (const ConductionLink& link : grid.links) resistance += 1.0 / conductance(wrap, link);
  CHECK(2.0 * std::numbers::pi * 0.1 * 100.0 / resistance == Approx(61.9849667).epsilon(1e-8));
  // The same from the exact wall long after the step; annuli and inversion leave 1e-7.
  CHECK(2.0 * std::numbers::pi * 0.1 * 100.0 * step_flow(wrap, 1e7) == Approx(61.9849667).epsilon(1e-6));
}
