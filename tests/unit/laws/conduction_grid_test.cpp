#include "laws/conduction_grid.h"

#include <catch2/catch.hpp>
#include <cmath>
#include <numbers>
#include <stdexcept>
#include <string>
#include <vector>

#include "laws/wall_response.h"

using namespace gaskettle;

namespace {

const WallLayer steel{0.010, 50.0, 7850.0, 450.0, 0.0};
const WallLayer wool{0.050, 0.04, 100.0, 840.0, 0.0};
const WallLayer sheet{0.0008, 160.0, 2800.0, 880.0, 1e-3};

WallSpec wall_of(WallShape shape, std::vector<WallLayer> layers, double inner_film, double outer_film) {
  return {shape, 0.25, std::move(layers), inner_film, outer_film, false};
}

/// 1 / (resistance from inner gas to outer gas) along the grid's links, per inner area.
double steady_conductance(const WallSpec& wall, const ConductionGrid& grid) {
  double resistance = 1.0 / wall.inner_film + 1.0 / (wall.outer_film * grid.outer_area_ratio);
  for (const ConductionLink& link : grid.links) resistance += 1.0 / conductance(wall, link);
  return 1.0 / resistance;
}

double total_capacity(const ConductionGrid& grid) {
  double sum = 0.0;
  for (const ConductionNode& node : grid.nodes) sum += node.heat_capacity;
  return sum;
}

using Matrix = std::vector<std::vector<double>>;
Matrix product(const Matrix& a, const Matrix& b) {
  Matrix c(a.size(), std::vector<double>(a.size(), 0.0));
  for (std::size_t i = 0; i < a.size(); ++i)
    for (std::size_t k = 0; k < a.size(); ++k)
      for (std::size_t j = 0; j < a.size(); ++j) c[i][j] += a[i][k] * b[k][j];
  return c;
}

/// exp(A) by Taylor series and squaring: A / 2^20 is tiny, 12 terms leave nothing but rounding times 2^20.
Matrix exponential(Matrix a) {
  const std::size_t n = a.size();
  for (auto& row : a)
    for (double& x : row) x /= 1048576.0;
  Matrix sum(n, std::vector<double>(n, 0.0));
  for (std::size_t i = 0; i < n; ++i) sum[i][i] = 1.0;
  Matrix term = sum;
  for (int order = 1; order <= 12; ++order) {
    term = product(term, a);
    for (std::size_t i = 0; i < n; ++i)
      for (std::size_t j = 0; j < n; ++j) sum[i][j] += (term[i][j] /= order);
  }
  for (int i = 0; i < 20; ++i) sum = product(sum, sum);
  return sum;
}

/// Heat flow from the inner gas at 1 K into the grid, started at 0 K, by the time-domain equations.
double flow_in_time(const WallSpec& wall, const ConductionGrid& grid, double t) {
  const std::size_t n = grid.nodes.size();
  Matrix a(n + 1, std::vector<double>(n + 1, 0.0));  // last row and column: the gas, at 1
  const auto exchange = [&](std::size_t j, std::size_t other, double g) {
    const double rate = g * t / grid.nodes[j].heat_capacity;
    a[j][j] -= rate;
    a[j][other] += rate;
  };
  exchange(0, n, wall.inner_film);
  for (std::size_t j = 0; j + 1 < n; ++j) {
    exchange(j, j + 1, conductance(wall, grid.links[j]));
    exchange(j + 1, j, conductance(wall, grid.links[j]));
  }
  a[n - 1][n - 1] -= wall.outer_film * grid.outer_area_ratio * t / grid.nodes[n - 1].heat_capacity;
  return wall.inner_film * (1.0 - exponential(a)[0][n]);
}

}  // namespace

TEST_CASE("nodes keep the heat capacity and the steady resistance of the wall, whatever the shape") {
  const double r = 0.25, ra = 0.26, rb = 0.31, h = 12.0, out = 7.0, contact = 2e-3;
  WallLayer wrapped = wool;
  wrapped.contact = contact;
  const double pi = std::numbers::pi, steel_density = 7850.0 * 450.0, wool_density = 100.0 * 840.0;
  const auto check = [&](WallShape shape, double inner_area, double middle_area, double outer_area, double steel_volume,
                         double wool_volume, double steel_resistance, double wool_resistance) {
    const WallSpec wall = wall_of(shape, {steel, wrapped}, h, out);
    const double capacity = (steel_volume * steel_density + wool_volume * wool_density) / inner_area;
    const double resistance =
        1.0 / (h * inner_area) + steel_resistance + contact / middle_area + wool_resistance + 1.0 / (out * outer_area);
    const auto check_grid = [&](const ConductionGrid& grid) {
      CHECK(total_capacity(grid) == Approx(capacity).epsilon(1e-13));
      CHECK(grid.outer_area_ratio == Approx(outer_area / inner_area).epsilon(1e-14));
      CHECK(steady_conductance(wall, grid) == Approx(1.0 / (resistance * inner_area)).epsilon(1e-12));
      CHECK(grid.links.size() + 1 == grid.nodes.size());
    };
    check_grid(make_grid(wall, {{0.01}, {0.05}}));
    check_grid(make_grid(wall, {{0.002, 0.008}, {0.01, 0.015, 0.025}}));
    check_grid(choose_conduction_grid(wall, 10.0));
    check_grid(choose_conduction_grid(wall, 10.0, 1e-3, 3.0));
  };
  check(WallShape::flat, 1.0, 1.0, 1.0, 0.01, 0.05, 0.01 / 50.0, 0.05 / 0.04);
  check(WallShape::cylinder, 2 * pi * r, 2 * pi * ra, 2 * pi * rb, pi * (ra * ra - r * r), pi * (rb * rb - ra * ra),
        std::log(ra / r) / (2 * pi * 50.0), std::log(rb / ra) / (2 * pi * 0.04));
  const auto ball = [&](double radius) { return 4 * pi / 3 * radius * radius * radius; };
  check(WallShape::sphere, 4 * pi * r * r, 4 * pi * ra * ra, 4 * pi * rb * rb, ball(ra) - ball(r), ball(rb) - ball(ra),
        (1 / r - 1 / ra) / (4 * pi * 50.0), (1 / ra - 1 / rb) / (4 * pi * 0.04));
}

TEST_CASE("nodes stand at the faces and at the interfaces, two at a contact") {
  const WallSpec wall = wall_of(WallShape::flat, {steel, wool, sheet}, 12.0, 7.0);  // the sheet has a contact
  const ConductionGrid grid = make_grid(wall, {{0.004, 0.006}, {0.01, 0.04}, {0.0008}});
  REQUIRE(grid.size() == 7);
  const std::vector<double> depths{0.0, 0.004, 0.01, 0.02, 0.06, 0.06, 0.0608};
  const std::vector<int> layers{0, 0, 1, 1, -1, 2};
  for (std::size_t i = 0; i < depths.size(); ++i) CHECK(grid.nodes[i].depth == Approx(depths[i]).margin(1e-15));
  for (std::size_t i = 0; i < layers.size(); ++i) CHECK(grid.links[i].layer == layers[i]);
  // The node between steel and wool owns half a spacing of each, those at the contact have one side only.
  CHECK(grid.nodes[0].heat_capacity == Approx(0.002 * 7850.0 * 450.0).epsilon(1e-13));
  CHECK(grid.nodes[2].heat_capacity == Approx(0.003 * 7850.0 * 450.0 + 0.005 * 100.0 * 840.0).epsilon(1e-13));
  CHECK(grid.nodes[4].heat_capacity == Approx(0.02 * 100.0 * 840.0).epsilon(1e-13));
  CHECK(grid.nodes[5].heat_capacity == Approx(0.0004 * 2800.0 * 880.0).epsilon(1e-12));
  CHECK(grid.links[4].geometry == Approx(1000.0).epsilon(1e-14));  // the contact's own conductance
  CHECK(conductance(wall, grid.links[0]) == Approx(50.0 / 0.004).epsilon(1e-14));

  CHECK(grid.layer_count() == 3);
  CHECK(grid.node_after_layer(0) == 0);
  CHECK(grid.node_after_layer(1) == 2);
  CHECK(grid.node_after_layer(2) == 4);
  CHECK(grid.node_after_layer(3) == 6);
  CHECK(grid.node_after_layer(4) == -1);
  CHECK(grid.node_after_layer(-1) == -1);

  const ConductionGrid chosen = choose_conduction_grid(wall, 1.0);
  CHECK(chosen.nodes.front().depth == 0.0);
  CHECK(chosen.nodes[chosen.node_after_layer(1)].depth == Approx(0.01).epsilon(1e-14));
  CHECK(chosen.nodes[chosen.node_after_layer(2)].depth == Approx(0.06).epsilon(1e-14));
  CHECK(chosen.nodes[chosen.node_after_layer(2) + 1].depth == chosen.nodes[chosen.node_after_layer(2)].depth);
  CHECK(chosen.node_after_layer(3) == chosen.size() - 1);
  CHECK(chosen.nodes.back().depth == Approx(0.0608).epsilon(1e-14));
}

TEST_CASE("the exact step response meets the closed form of a thick wall under a film") {
  // H. S. Carslaw and J. C. Jaeger, Conduction of Heat in Solids, 2nd ed. 1959, section 2.7: q = h exp(x^2) erfc(x), x
  // = h sqrt(D t) / k
  WallSpec wall;
  wall.layers = {{10.0, 0.5, 2000.0, 1000.0, 0.0}};
  wall.inner_film = 20.0;
  for (const double t : {1.0, 100.0, 1e4}) {
    const double x = 20.0 * std::sqrt(0.5 / 2e6 * t) / 0.5;
    CHECK(step_flow(wall, t) == Approx(20.0 * std::exp(x * x) * std::erfc(x)).epsilon(1e-9));
  }
}

TEST_CASE("the exact step response meets the series of an insulated slab and of a sphere") {
  // Carslaw and Jaeger, sections 3.4 and 9.3; faces held at the gas temperature. Inversion leaves 1e-8 of the first
  // flow.
  const double k = 0.5, length = 0.1, diffusivity = 0.5 / 2e6;
  WallSpec slab;
  slab.layers = {{length, k, 2000.0, 1000.0, 0.0}};
  slab.inner_film = perfect_film;
  for (const double t : {100.0, 1e4, 4e4}) {
    double q = 0.0;
    for (int n = 0; n < 300; ++n) {
      const double zeta = (n + 0.5) * std::numbers::pi;
      q += 2.0 * k / length * std::exp(-zeta * zeta * diffusivity * t / (length * length));
    }
    CHECK(step_flow(slab, t) == Approx(q).margin(1e-7));
  }
  WallSpec sphere = slab;  // a solid ball of radius 0.1 m, but for a hole of 1 micrometre, heated from outside
  sphere.shape = WallShape::sphere;
  sphere.inner_radius = 1e-6;
  sphere.layers[0].thickness = length - sphere.inner_radius;
  sphere.inner_film = 0.0;
  sphere.outer_film = perfect_film;
  const double outer_area = std::pow(length / 1e-6, 2);
  for (const double t : {100.0, 1e4}) {
    double q = 0.0;
    for (int n = 1; n < 300; ++n)
      q += 2.0 * k / length * std::exp(-std::pow(n * std::numbers::pi, 2) * diffusivity * t / (length * length));
    CHECK(step_flow(sphere, t, StepSide::outer) / outer_area ==
          Approx(q).epsilon(1e-7));  // the hole counts as its volume does, 1e-15; inversion 1e-8
  }
}

TEST_CASE("the exact step response of a hollow cylinder decays as its Bessel functions say") {
  // Insulated at r = b, held at r = a: J0(x a) Y1(x b) = Y0(x a) J1(x b) (Carslaw and Jaeger, section 7.10).
  const double a = 0.1, b = 0.25;
  WallSpec wall;
  wall.shape = WallShape::cylinder;
  wall.inner_radius = a;
  wall.layers = {{b - a, 1.0, 1.0, 1.0, 0.0}};
  wall.inner_film = perfect_film;
  const auto f = [&](double x) {
    return std::cyl_bessel_j(0, x * a) * std::cyl_neumann(1, x * b) -
           std::cyl_neumann(0, x * a) * std::cyl_bessel_j(1, x * b);
  };
  double low = 5.0, high = 12.0;  // brackets the first root: the slab's is pi / (2 * 0.15) = 10.5
  REQUIRE(f(low) * f(high) < 0.0);
  for (int i = 0; i < 60; ++i) {
    const double middle = 0.5 * (low + high);
    (f(low) * f(middle) <= 0.0 ? high : low) = middle;
  }
  const double t = 0.03, dt = 0.01;  // the second mode is down by exp(-25) by then
  const double rate = std::log(step_flow(wall, t) / step_flow(wall, t + dt)) / dt;
  CHECK(std::sqrt(rate) == Approx(low).epsilon(2e-6));  // annuli, see wall_response.cpp
}

TEST_CASE("the exact cylinder keeps its heat") {
  // Highly conducting, small radius, weak film, other face insulated: warms as one lump, q = h exp(-h t / C), but for
  // the time it takes to even out, h r ln(b/a) / k = 6e-6. What leaked from annulus to annulus would show here.
  WallSpec pipe;
  pipe.shape = WallShape::cylinder;
  pipe.inner_radius = 0.002;
  pipe.layers = {{0.010, 400.0, 8900.0, 385.0, 0.0}};
  pipe.inner_film = 0.5;
  const double capacity = 8900.0 * 385.0 * (0.012 * 0.012 - 0.002 * 0.002) / (2.0 * 0.002);
  for (const double t : {1e4, 1e5, 5e5})
    CHECK(step_flow(pipe, t) == Approx(0.5 * std::exp(-0.5 * t / capacity)).epsilon(3e-5));
  // And with both films the steady flow is that of the three resistances in series, to rounding and inversion.
  pipe.outer_film = 2.0;
  const double steady = 1.0 / (1.0 / 0.5 + 0.002 * std::log(6.0) / 400.0 + 1.0 / (2.0 * 6.0));
  CHECK(step_flow(pipe, 1e7) == Approx(steady).epsilon(1e-8));
}

TEST_CASE("grid and time-domain equations agree") {
  for (const WallShape shape : {WallShape::flat, WallShape::cylinder, WallShape::sphere}) {
    WallSpec wall = wall_of(shape, {steel, wool}, 40.0, 8.0);
    wall.layers[1].contact = 1e-2;
    const ConductionGrid grid = make_grid(wall, {{0.01}, {0.004, 0.008, 0.014, 0.024}});
    for (const double t : {5.0, 300.0, 2e4})
      CHECK(step_flow(wall, grid, t) == Approx(flow_in_time(wall, grid, t)).epsilon(1e-7));
  }
}

TEST_CASE("a chosen grid is within 1e-3 of the exact wall at every later time, and small") {
  struct Case {
    std::vector<WallLayer> layers;
    double inner_film, outer_film;
    int most;  // nodes
  };
  WallLayer loose = wool;
  loose.contact = 1e-2;
  const std::vector<Case> cases{{{steel, wool}, 10.0, 8.0, 10},        {{steel, loose}, 10.0, 8.0, 10},
                                {{steel, wool}, 300.0, 8.0, 32},       {{wool, steel}, 50.0, 8.0, 60},
                                {{wool}, perfect_film, 5.0, 60},       {{steel}, 10.0, 0.0, 2},
                                {{steel, wool, sheet}, 25.0, 10.0, 16}};
  for (const WallShape shape : {WallShape::flat, WallShape::cylinder, WallShape::sphere})
    for (const Case& c : cases)
      for (const double t_min : {0.3, 14.4}) {
        const WallSpec wall = wall_of(shape, c.layers, c.inner_film, c.outer_film);
        const ConductionGrid grid = choose_conduction_grid(wall, t_min);
        CAPTURE(static_cast<int>(shape), c.inner_film, t_min, grid.size());
        CHECK(grid.size() <= c.most);
        CHECK(grid.stated_error <= 1e-3);
        // Other times than those of the choice. Between them the error moves by a few parts in a hundred of itself, and
        // the choice aims at 95 % of the bound.
        CHECK(grid_error(wall, grid, 1.37 * t_min, 47) <= 1e-3);
        CHECK(grid.t_min == t_min);
      }
}

TEST_CASE("thin metal under a weak film needs its faces only; even nodes in wool are far off, graded ones are not") {
  WallLayer plate = steel;
  plate.thickness = 0.003;
  const WallSpec body = wall_of(WallShape::flat, {plate}, 5.0, 0.0);  // half the thickness of a body in gas
  const ConductionGrid faces = choose_conduction_grid(body, 10.0);
  REQUIRE(faces.size() == 2);
  CHECK(faces.nodes.back().depth == 0.003);
  CHECK(grid_error(body, faces, 10.0) <= 1e-3);

  const WallSpec bare = wall_of(WallShape::flat, {wool}, perfect_film, 5.0);
  const ConductionGrid even = make_grid(bare, {std::vector<double>(10, 0.005)});
  // At 1 s heat has reached sqrt(pi D t) = 1.2 mm: the first spacing of 5 mm conducts a quarter of what the wool draws.
  const double exact = 0.04 / std::sqrt(std::numbers::pi * 0.04 / 84000.0);
  CHECK(step_flow(bare, even, 1.0) / exact == Approx(0.0012231 / 0.005).margin(0.01));
  CHECK(grid_error(bare, choose_conduction_grid(bare, 1.0), 1.0) <= 1e-3);
}

TEST_CASE("refinement divides every spacing, and the error falls with its square") {
  const WallSpec wall = wall_of(WallShape::cylinder, {steel, wool}, 40.0, 8.0);
  const ConductionGrid once = choose_conduction_grid(wall, 10.0), twice = choose_conduction_grid(wall, 10.0, 1e-3, 2.0);
  REQUIRE(twice.links.size() == 2 * once.links.size());
  for (std::size_t i = 0; i < once.nodes.size(); ++i)  // the old nodes stay where they are
    CHECK(twice.nodes[2 * i].depth == Approx(once.nodes[i].depth).epsilon(1e-12));
  CHECK(twice.stated_error / once.stated_error == Approx(0.25).margin(0.05));  // second order
  CHECK(choose_conduction_grid(wall, 10.0, 1e-3, 0.01).size() == 3);           // one spacing a layer is the least
  CHECK_THROWS_AS(choose_conduction_grid(wall, 10.0, 1e-3, 0.0), std::invalid_argument);
}

TEST_CASE("where the bound is out of reach the best grid is given, with its true error") {
  WallLayer thick = wool;
  thick.thickness = 0.3;
  for (const WallShape shape : {WallShape::flat, WallShape::cylinder, WallShape::sphere})
    for (const double t_min : {1e-3, 1e-9}) {
      const WallSpec wall = wall_of(shape, {thick, sheet}, perfect_film, 5.0);
      const ConductionGrid grid = choose_conduction_grid(wall, t_min);
      CHECK(grid.node_after_layer(1) < most_nodes_per_layer);
      CHECK(grid.stated_error > 1e-3);
      CHECK(grid.stated_error == Approx(grid_error(wall, grid, t_min, 40)).epsilon(1e-3));
    }
  const WallSpec bare = wall_of(WallShape::flat, {wool}, perfect_film, 5.0);
  CHECK(choose_conduction_grid(bare, 1.0, 1e-8).stated_error < 1e-3);  // asked for too much: still better than usual
}

TEST_CASE("a wall driven from outside is judged from there") {
  WallSpec wall = wall_of(WallShape::cylinder, {steel, wool}, 10.0, 60.0);
  const int inside_only = choose_conduction_grid(wall, 5.0).size();
  wall.outside_driven = true;
  const ConductionGrid both = choose_conduction_grid(wall, 5.0);
  CHECK(both.size() > inside_only);
  for (const double t : {5.0, 40.0, 1e3, 1e5}) {
    CHECK(step_flow(wall, both, t, StepSide::outer) == Approx(step_flow(wall, t, StepSide::outer)).epsilon(1e-3));
    CHECK(step_flow(wall, both, t, StepSide::inner) == Approx(step_flow(wall, t, StepSide::inner)).epsilon(1e-3));
  }
  // No inner film: the outer step is what counts. No film at all: still a grid.
  const WallSpec from_outside = wall_of(WallShape::flat, {wool}, 0.0, 20.0);
  CHECK(grid_error(from_outside, choose_conduction_grid(from_outside, 5.0), 5.0) <= 1e-3);
  CHECK(choose_conduction_grid(wall_of(WallShape::flat, {steel}, 0.0, 0.0), 5.0).size() >= 2);
}

TEST_CASE("grids that make no sense are refused") {
  const WallSpec wall = wall_of(WallShape::flat, {steel}, 10.0, 0.0);
  CHECK_THROWS_AS(choose_conduction_grid(wall, 0.0), std::invalid_argument);
  CHECK_THROWS_AS(choose_conduction_grid(wall_of(WallShape::flat, {}, 10.0, 0.0), 1.0), std::invalid_argument);
  CHECK_THROWS_AS(choose_conduction_grid(wall_of(WallShape::flat, {steel}, -1.0, 0.0), 1.0), std::invalid_argument);
  CHECK_THROWS_AS(choose_conduction_grid(wall_of(WallShape::flat, {sheet}, 10.0, 0.0), 1.0), std::invalid_argument);
  WallSpec no_radius = wall_of(WallShape::sphere, {steel}, 10.0, 0.0);
  no_radius.inner_radius = 0.0;
  CHECK_THROWS_AS(choose_conduction_grid(no_radius, 1.0), std::invalid_argument);
  CHECK_THROWS_AS(make_grid(wall, {{0.004, 0.004}}), std::invalid_argument);
  CHECK_THROWS_AS(make_grid(wall, {{0.01}, {0.01}}), std::invalid_argument);
}
