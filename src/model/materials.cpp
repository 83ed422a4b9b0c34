#include "model/materials.h"

#include <fmt/format.h>

namespace gaskettle {

const std::vector<Material>& material_catalogue() {
  // Building-physics table values hold near 20 degC; the wools' conductivity rises with temperature, so a
  // maker's curve is better where it is hot: write it as `conductivity: [[temperature, value], ...]`.
  static const std::string iso =
      "ISO 10456, table of design values (density, conductivity, specific heat near 20 degC)";
  static const std::string ashrae =
      "ASHRAE Handbook Fundamentals, table of building and insulating materials (near 24 degC)";
  static const std::vector<Material> list = {
      // k = 54 - 0.0333 T(degC) W/m/K from 20 to 800 degC, 27.3 above: EN 1993-1-2:2005, 3.4.1.3; rho 7850 ibid.;
      // c at 20 degC 440 (3.4.1.2), held constant here.
      {"carbon_steel",
       7850.0,
       440.0,
       {{293.15, 53.33}, {1073.15, 27.36}},
       0.8,
       "EN 1993-1-2:2005, 3.4.1.2 (440 J/kg/K at 20 degC) and 3.4.1.3 (54 - 0.0333 T); emissivity oxidised: common "
       "practice"},
      {"stainless_steel", 7900.0, 460.0, {{293.15, 17.0}}, 0.3, iso + "; emissivity cleaned: common practice"},
      {"aluminium", 2800.0, 880.0, {{293.15, 160.0}}, 0.1, iso + ", aluminium alloys; emissivity: common practice"},
      {"copper",
       8900.0,
       380.0,
       {{293.15, 380.0}},
       0.1,
       iso + " (from memory, unverified); emissivity: common practice"},
      {"brass", 8400.0, 380.0, {{293.15, 120.0}}, 0.2, iso + " (from memory, unverified); emissivity: common practice"},
      {"mineral_wool",
       97.5,
       840.0,
       {{293.15, 0.035}, {373.15, 0.047}, {473.15, 0.065}, {573.15, 0.09}},
       0.9,
       ashrae + ", 100 kg/m3; rise with temperature: common practice"},
      {"glass_wool", 12.0, 840.0, {{293.15, 0.043}}, 0.9, ashrae + ", glass-fibre batt"},
      {"calcium_silicate",
       240.0,
       1000.0,
       {{293.15, 0.054}, {473.15, 0.066}, {673.15, 0.087}},
       0.9,
       "pipe-insulation grade as in ASTM C533 type I (from memory, unverified)"},
  };
  return list;
}

namespace {
std::vector<std::pair<double, double>> read_conductivity(Section& s) {
  const Node* node =
      s.raw("conductivity", "thermal conductivity, or [[temperature, value], ...]", "of the material", true);
  const std::vector<std::pair<double, double>> safe = {{293.15, 1.0}};
  if (node == nullptr) return safe;
  ReadContext& c = s.context();
  const std::string path = s.path() + ".conductivity";
  if (!node->is_list()) {
    const auto k = read_value(c, *node, path, unit_kinds::conductivity, Range::positive);
    return k ? std::vector<std::pair<double, double>>{{293.15, k->si}} : safe;
  }
  std::vector<std::pair<double, double>> points;
  for (const Node& pair : node->items) {
    if (!pair.is_list() || pair.items.size() != 2) {
      c.problems.add(pair.place, fmt::format("a point of '{}' should be [temperature, value]", path));
      continue;
    }
    const auto t = read_value(c, pair.items[0], path, unit_kinds::temperature, Range::positive);
    const auto k = read_value(c, pair.items[1], path, unit_kinds::conductivity, Range::positive);
    if (!t || !k) continue;
    if (!points.empty() && t->si <= points.back().first)
      c.problems.add(pair.place, fmt::format("the temperatures of '{}' must rise", path));
    else
      points.emplace_back(t->si, k->si);
  }
  if (node->items.empty()) c.problems.add(node->place, fmt::format("'{}' is empty", path));
  return points.empty() ? safe : points;
}
}  // namespace

Material read_material_map(Section& s, const std::string& name) {
  Material m;
  m.name = name;
  m.density = s.quantity("density", unit_kinds::density, "of the material", Range::positive);
  m.specific_heat = s.quantity("specific_heat", unit_kinds::specific_heat, "of the material", Range::positive);
  m.conductivity = read_conductivity(s);
  if (const auto e = s.optional_quantity("emissivity", unit_kinds::number, "of a bare face", Range::fraction))
    m.emissivity = *e;
  m.source = "the model";
  return m;
}

std::optional<Material> read_material(Section& s, const std::string& key, const std::string& meaning, bool required) {
  const Node* node = s.raw(key, "name of a material, or {density, specific_heat, conductivity}", meaning, required);
  if (node == nullptr) return std::nullopt;
  ReadContext& context = s.context();
  if (node->is_map()) {
    Section map(context, node, s.path() + "." + key);
    return read_material_map(map, "stated");
  }
  if (!node->is_scalar()) {
    s.error(key,
            fmt::format("'{}.{}' should be the name of a material or a map {{density, specific_heat, conductivity}}",
                        s.path(), key));
    return std::nullopt;
  }
  std::vector<std::string> names;
  for (const Material& m : context.own_materials) {
    if (m.name == node->text) return m;
    names.push_back(m.name);
  }
  for (const Material& m : material_catalogue()) {
    if (m.name == node->text) return m;
    names.push_back(m.name);
  }
  const std::string near = nearest_name(node->text, names);
  s.error(key, fmt::format("there is no material '{}'{}; 'gaskettle explain materials' lists them", node->text,
                           near.empty() ? "" : "; did you mean '" + near + "'?"));
  return std::nullopt;
}

}  // namespace gaskettle
