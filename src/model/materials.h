/// Solid materials of walls and bodies.
#pragma once
#include <optional>
#include <string>
#include <utility>
#include <vector>

#include "model/section.h"

namespace gaskettle {

struct Material {
  std::string name;
  double density = 0.0;                                 ///< kg/m3
  double specific_heat = 0.0;                           ///< J/kg/K
  std::vector<std::pair<double, double>> conductivity;  ///< (K, W/m/K); one point: constant
  double emissivity = 0.0;                              ///< 0: not stated
  std::string source;
};

/// The built-in materials, each with its source.
const std::vector<Material>& material_catalogue();

/// Reads a material key: a name (built in or the model's own), or a map of properties.
std::optional<Material> read_material(Section& section, const std::string& key, const std::string& meaning,
                                      bool required);
/// Reads the properties of one material from its map.
Material read_material_map(Section& section, const std::string& name);

}  // namespace gaskettle
