#include "model/surroundings.h"

#include "gas/catalogue.h"

namespace gaskettle {

namespace {
Surroundings read(Section& s) {
  Surroundings x;
  x.pressure = s.quantity("pressure", unit_kinds::pressure, "of the atmosphere", Range::positive, "101325 Pa abs");
  s.context().atmosphere = x.pressure;
  x.temperature =
      s.signal("temperature", unit_kinds::temperature, "of air and of what walls see", Range::positive, "20 degC");
  x.gravity = s.quantity("gravity", unit_kinds::acceleration, "of the place", Range::not_negative, "9.80665 m/s2");
  x.wind = s.signal("wind", unit_kinds::velocity, "past the vessel, for `wind` films", Range::not_negative, "0 m/s");
  x.gas = read_composition(s, "gas", "what flows in from the atmosphere", "air");
  return x;
}
}  // namespace

Surroundings read_surroundings(ReadContext& context, const Node* node) {
  static const Node nothing = [] {
    Node n;
    n.kind = Node::Kind::map;
    return n;
  }();
  Section s(context, node != nullptr ? node : &nothing, "surroundings");
  return read(s);
}

void describe_surroundings(ReadContext& context) {
  Section s(context, "surroundings");
  read(s);
}

void connect_surroundings(const Surroundings& x, Layout& layout) {
  layout.gravity = x.gravity;
  layout.ambient_temperature_start = x.temperature.initial(293.15);
  layout.ambient_temperature_input =
      layout.add_input("surroundings.temperature", unit_kinds::temperature, x.temperature, 293.15, {});
  layout.wind_input = layout.add_input("surroundings.wind", unit_kinds::velocity, x.wind, 0.0, {});
  std::vector<Species> species;
  std::vector<double> fractions;
  for (const auto& [name, fraction] : x.gas) {
    if (const auto own = layout.own_gases.find(name); own != layout.own_gases.end())
      species.push_back(own->second);
    else
      species.push_back(*find_gas(name));
    fractions.push_back(fraction);
  }
  layout.outside_air = GasMixture(species);
  layout.outside_air_fractions = layout.outside_air.mass_fractions(fractions.data());
}

}  // namespace gaskettle
