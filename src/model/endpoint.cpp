#include "model/endpoint.h"

#include <fmt/format.h>

namespace gaskettle {

void Endpoint::read(Section& s, const std::string& key, const std::string& meaning) {
  const Node* node = s.raw(key, "gas space, 'atmosphere', or {supply: {gas, pressure, temperature}}", meaning, true);
  given_ = node != nullptr;
  if (s.describing()) {
    Section supply(s.context(), s.path() + "." + key + ".supply");
    read_supply(supply);
    return;
  }
  if (node == nullptr) return;
  if (node->is_scalar()) {
    if (node->text == "atmosphere") return;
    kind_ = Kind::space;
    or_atmosphere_ = true;
    reference_ = {node->text, node->place};
    return;
  }
  Section map(s.context(), node, s.path() + "." + key);
  if (auto supply = map.child("supply", "an unlimited source at a stated state", true)) {
    kind_ = Kind::supply;
    read_supply(*supply);
  }
}

void Endpoint::read_supply(Section& supply) {
  composition_ = read_composition(supply, "gas", "what it delivers");
  pressure_spec_ = supply.required_signal("pressure", unit_kinds::pressure, "of the supply", Range::positive);
  temperature_spec_ = supply.required_signal("temperature", unit_kinds::temperature, "of the supply", Range::positive);
}

Endpoint Endpoint::at_atmosphere() {
  Endpoint e;
  e.given_ = true;
  return e;
}

Endpoint Endpoint::at_space(Reference reference, bool or_atmosphere) {
  Endpoint e;
  e.kind_ = Kind::space;
  e.given_ = true;
  e.or_atmosphere_ = or_atmosphere;
  e.reference_ = std::move(reference);
  return e;
}

void Endpoint::declare(Layout& layout) {
  if (kind_ == Kind::space) {
    if (const SpaceInfo* space = layout.space(reference_, or_atmosphere_))
      space_ = space->index;
    else
      space_ = 0;
    return;
  }
  if (kind_ == Kind::atmosphere) composition_ = layout.surroundings_gas;
  layout.use_gas(composition_, {});
}

void Endpoint::connect(Layout& layout, const std::string& part, const std::string& which) {
  if (kind_ == Kind::space) return;
  fraction_ = layout.mass_fractions(composition_);
  if (kind_ != Kind::supply) return;
  pressure_input_ = layout.add_input(part + "." + which + ".supply.pressure", unit_kinds::pressure, pressure_spec_,
                                     layout.atmosphere_pressure, {});
  temperature_input_ = layout.add_input(part + "." + which + ".supply.temperature", unit_kinds::temperature,
                                        temperature_spec_, layout.ambient_temperature_start, {});
}

void FlowEntries::connect(Layout& layout, const std::string& part, const Endpoint& from, const Endpoint& to) {
  // Either direction may occur, so an outer end needs both entries.
  if (from.is_space() && to.is_space()) return;
  enthalpy_in = layout.ledger(LedgerTerm::enthalpy_in, part);
  enthalpy_out = layout.ledger(LedgerTerm::enthalpy_out, part);
}

}  // namespace gaskettle
