#include "plant/cautions.h"

#include <algorithm>

namespace gaskettle {

namespace {
constexpr double oxygen_rich = 0.235;  // mole fraction: common practice for oxygen-enriched atmospheres
constexpr double fire_temperature =
    673.15;                        // K: carbon steel begins to lose strength at 400 degC, EN 1993-1-2:2005 table 3.1
constexpr double fire_flux = 1e4;  // W/m2: ten times the sun

bool oxygen_above_air(const Layout& layout) {
  const auto rich = [&](const Composition& c) {
    double x = 0.0;
    for (const auto& [name, fraction] : c)
      if (name == "oxygen" || name == "O2") x += fraction;
    return x > oxygen_rich;
  };
  const auto& used = layout.compositions_used();
  return std::any_of(used.begin(), used.end(), rich);
}

bool fire_possible(const Layout& layout) {
  for (const InputInfo& i : layout.inputs) {
    const double most = i.signal.range().second;
    if (i.path.find(".outside.flux") != std::string::npos && most > fire_flux) return true;
    if (i.path.find(".outside.temperature") != std::string::npos && most > fire_temperature) return true;
  }
  return false;
}
}  // namespace

std::vector<std::string> cautions(const Plant& plant) {
  const Layout& layout = plant.layout();
  std::vector<std::string> list = {
      "A lumped model, not a design approval: local codes and licensed practice decide. Gas is taken as well mixed, so "
      "local gas and metal can be hotter; wall strength is not assessed."};
  if (!layout.reliefs.empty())
    list.emplace_back(
        "Not a relief sizing under ISO 4126 or API 520 (take the relief inputs to those standards): inlet loss, back "
        "pressure build-up and chatter of the real device are not modelled.");
  if (fire_possible(layout))
    list.emplace_back("In fire the wall may lose strength and fail before the relief device opens.");
  if (plant.watch().limits().empty())
    list.emplace_back("No limit was checked: exit status 0 says nothing about safety.");
  if (oxygen_above_air(layout))
    list.emplace_back("Oxygen above 23.5 %: ignition by compression heating, friction or particles is not assessed.");
  const bool discharges = layout.discharges_to_atmosphere;
  if (discharges)
    list.emplace_back("Gas may be discharged: asphyxiation, toxicity, noise, cold and thrust are not assessed.");
  return list;
}

}  // namespace gaskettle
