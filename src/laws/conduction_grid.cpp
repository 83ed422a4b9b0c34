#include "laws/conduction_grid.h"

#include <algorithm>
#include <cmath>
#include <numeric>
#include <stdexcept>

namespace gaskettle {
namespace {

void check_layer(const WallLayer& layer) {
  const auto good = [](double x) { return std::isfinite(x) && x > 0; };
  if (!(good(layer.thickness) && good(layer.conductivity) && good(layer.density) && good(layer.specific_heat)))
    throw std::invalid_argument("thickness, conductivity, density and specific heat of a layer must be above 0");
  if (!(std::isfinite(layer.contact) && layer.contact >= 0))
    throw std::invalid_argument("a contact resistance must be 0 m2 K/W or above");
}

void check_wall(const WallSpec& wall) {
  if (wall.layers.empty()) throw std::invalid_argument("a wall needs at least one layer");
  if (wall.shape != WallShape::flat && !(std::isfinite(wall.inner_radius) && wall.inner_radius > 0))
    throw std::invalid_argument("the inner radius of a curved wall must be above 0 m");
  std::for_each(wall.layers.begin(), wall.layers.end(), check_layer);
  if (wall.layers.front().contact > 0)
    throw std::invalid_argument("the first layer of a wall has no layer to be in contact with: count it to the film");
  if (!(wall.inner_film >= 0 && wall.outer_film >= 0))
    throw std::invalid_argument("film coefficients must be 0 W/(m2 K) or above");
}

void check_spacings(const WallLayer& layer, const std::vector<double>& spacings) {
  const double sum = std::accumulate(spacings.begin(), spacings.end(), 0.0);
  if (spacings.empty() || !(*std::min_element(spacings.begin(), spacings.end()) > 0) ||
      !(std::abs(sum - layer.thickness) <= 1e-9 * layer.thickness))
    throw std::invalid_argument("the node distances of a layer must be above 0 m and add up to its thickness");
}

/// Geometry per inner area of what lies between two depths.
struct Shell {
  WallShape shape;
  double inner_radius;  // of the wall

  double area(double depth) const {
    const double ratio = 1.0 + (shape == WallShape::flat ? 0.0 : depth / inner_radius);
    return shape == WallShape::sphere ? ratio * ratio : ratio;
  }
  double volume(double from, double to) const {
    const double width = to - from;
    if (shape == WallShape::flat) return width;
    const double a = 1.0 + from / inner_radius, b = 1.0 + to / inner_radius;
    return shape == WallShape::cylinder ? width * (a + b) / 2.0 : width * (a * a + a * b + b * b) / 3.0;
  }
  /// m; divided by the conductivity: resistance, m2 K/W
  double resistance_factor(double from, double to) const {
    const double width = to - from;
    if (shape == WallShape::flat) return width;
    const double r1 = inner_radius + from, r2 = inner_radius + to;
    if (shape == WallShape::cylinder) return inner_radius * std::log1p(width / r1);
    return inner_radius * inner_radius * width / (r1 * r2);
  }
};

/// Appends a node at depth `to`, and gives it and the one before the solid between them.
void add_solid(ConductionGrid& grid, const Shell& shell, const WallLayer& layer, int index, double to) {
  const double from = grid.nodes.back().depth, middle = from + 0.5 * (to - from);
  const double density = layer.density * layer.specific_heat;
  grid.nodes.back().heat_capacity += shell.volume(from, middle) * density;
  grid.nodes.push_back({to, shell.volume(middle, to) * density});
  grid.links.push_back({index, 1.0 / shell.resistance_factor(from, to)});
}

}  // namespace

int ConductionGrid::layer_count() const {
  int count = 0;
  for (const ConductionLink& link : links) count = std::max(count, link.layer + 1);
  return count;
}

int ConductionGrid::node_after_layer(int n) const {
  if (n < 0 || n > layer_count()) return -1;
  int node = 0;
  for (std::size_t i = 0; i < links.size(); ++i)
    if (links[i].layer >= 0 && links[i].layer < n) node = static_cast<int>(i) + 1;
  return node;
}

double conductance(const WallSpec& wall, const ConductionLink& link) {
  return link.layer < 0 ? link.geometry
                        : wall.layers[static_cast<std::size_t>(link.layer)].conductivity * link.geometry;
}

ConductionGrid make_grid(const WallSpec& wall, const std::vector<std::vector<double>>& spacings) {
  check_wall(wall);
  if (spacings.size() != wall.layers.size())
    throw std::invalid_argument("a wall grid needs one list of node distances a layer");
  const Shell shell{wall.shape, wall.inner_radius};
  ConductionGrid grid;
  grid.nodes.push_back({0.0, 0.0});
  for (std::size_t i = 0; i < spacings.size(); ++i) {
    const WallLayer& layer = wall.layers[i];
    check_spacings(layer, spacings[i]);
    const double start = grid.nodes.back().depth;
    if (layer.contact > 0) {
      grid.links.push_back({-1, shell.area(start) / layer.contact});
      grid.nodes.push_back({start, 0.0});
    }
    for (std::size_t j = 0; j < spacings[i].size(); ++j) {
      const bool last = j + 1 == spacings[i].size();
      const double to = last ? start + layer.thickness : grid.nodes.back().depth + spacings[i][j];
      add_solid(grid, shell, layer, static_cast<int>(i), to);
    }
  }
  grid.outer_area_ratio = shell.area(grid.nodes.back().depth);
  return grid;
}

}  // namespace gaskettle
