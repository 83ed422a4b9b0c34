/// Conduction nodes for a layered wall, chosen by measured error.
///
/// Vertex-centred finite volumes: a node stands at the inner face, at the outer face and at every interface between
/// layers (two where there is a contact resistance), others between them. A node owns the half cells on its sides, up
/// to the surface midway to its neighbour, so the heat capacity is exact; neighbours are joined by the exact
/// resistance of the solid between them (flat: thickness; cylinder: logarithm of radii; sphere: difference of 1/r),
/// so the steady heat flow is exact too, on any grid. Spacings grow geometrically away from the face where the heat
/// enters, because a change that started a time t ago has spread over about sqrt(diffusivity t).
///
/// How good a grid is gets measured, not assumed: see ConductionGrid::stated_error.
#pragma once
#include <limits>
#include <vector>

namespace gaskettle {

enum class WallShape { flat, cylinder, sphere };

/// One layer of solid. `conductivity` is the value at a reference temperature: it is used for choosing the grid only.
struct WallLayer {
  double thickness = 0.0;      ///< m, above 0
  double conductivity = 0.0;   ///< W/(m K), above 0
  double density = 0.0;        ///< kg/m3, above 0
  double specific_heat = 0.0;  ///< J/(kg K), above 0
  double contact = 0.0;        ///< m2 K/W, resistance towards the layer before, 0 for none; 0 in the first layer
};

/// Film coefficient of a face that is held at the gas temperature.
inline constexpr double perfect_film = std::numeric_limits<double>::infinity();

struct WallSpec {
  WallShape shape = WallShape::flat;
  double inner_radius = 0.0;      ///< m, of the inner face; not used where flat
  std::vector<WallLayer> layers;  ///< from inside out
  double inner_film = 0.0;        ///< W/(m2 K) of the inner face; 0 insulated, perfect_film allowed
  double outer_film = 0.0;        ///< W/(m2 K) of the outer face, per m2 of that face; 0 insulated
  /// Also measure the heat drawn by a step on the outer side (a second gas space, a fire).
  bool outside_driven = false;
};

/// A place in the wall with a temperature.
struct ConductionNode {
  double depth = 0.0;          ///< m from the inner face; equal for the two sides of a contact
  double heat_capacity = 0.0;  ///< J/(m2 K), per m2 of INNER face, of all the material the node owns
};

/// What joins node i and node i + 1.
struct ConductionLink {
  int layer = 0;  ///< whose conductivity applies; -1: a contact resistance
  /// Per m2 of inner face: 1/m, conductance = conductivity * geometry; for a contact the conductance, W/(m2 K).
  double geometry = 0.0;
};

struct ConductionGrid {
  std::vector<ConductionNode> nodes;  ///< from inside out: the first at the inner face, the last at the outer face
  std::vector<ConductionLink> links;  ///< one fewer than nodes
  double outer_area_ratio = 1.0;      ///< outer face area over inner face area
  /// Largest error found of the heat flow q(t) that the wall, films included, draws after a unit step of the gas
  /// temperature, for t >= t_min: |q_grid - q_exact| / max(q_exact, 1 % of the mean flow since the step). The second
  /// term takes over where an insulated wall is nearly warm and its flow dies away.
  double stated_error = 0.0;
  double t_min = 0.0;  ///< s, from when on stated_error holds

  int size() const { return static_cast<int>(nodes.size()); }
  int layer_count() const;
  /// Node at the outer boundary of layer n, counted from 1; 0: the inner face. Where a contact follows, the inner one
  /// of the two. -1 where there is no such layer.
  int node_after_layer(int n) const;
};

/// W/(m2 K) per inner area of a link, at the conductivities of `wall`.
double conductance(const WallSpec& wall, const ConductionLink& link);

/// A grid with the given distances between nodes (m; one list a layer, adding up to the layer, at least one each).
/// stated_error is left at 0. Throws std::invalid_argument where the wall or the spacings make no sense.
ConductionGrid make_grid(const WallSpec& wall, const std::vector<std::vector<double>>& spacings);

/// Largest number of nodes that choose_conduction_grid spends on a layer, both its boundaries counted, before
/// refinement.
inline constexpr int most_nodes_per_layer = 60;

/// A grid with few nodes whose stated_error is at most `tolerance` for all t >= t_min (s, above 0). Where that is out
/// of reach of most_nodes_per_layer, the best one found: its stated_error then says how far off it is.
/// A side with film 0 draws nothing: the step is then taken on the other side, and with both films 0 as if the inner
/// film were 10 W/(m2 K). `refinement` (above 0) divides every spacing after the choice: 2 gives twice as many; at
/// least one a layer is kept. Throws std::invalid_argument where the wall, t_min or refinement make no sense.
ConductionGrid choose_conduction_grid(const WallSpec& wall, double t_min, double tolerance = 1e-3,
                                      double refinement = 1.0);

/// Error of a grid as defined for stated_error, measured at `per_decade` times a decade from t_min until the wall is
/// steady (ten decades at most).
double grid_error(const WallSpec& wall, const ConductionGrid& grid, double t_min, int per_decade = 20);

}  // namespace gaskettle
