#include "parts/stirrer.h"

#include <fmt/format.h>

namespace gaskettle {

void Stirrer::read(Section& s) {
  in_ = s.reference("in", "gas space", "the gas it stirs", true);
  const bool one_way = s.exactly_one_of({"power", "torque", "power_number"});
  power_spec_ = s.signal("power", unit_kinds::power, "shaft power into the gas", Range::not_negative);
  torque_spec_ = s.signal("torque", unit_kinds::torque, "shaft torque, with speed", Range::not_negative);
  if (const auto np = s.optional_quantity("power_number", unit_kinds::number,
                                          "of the impeller, with diameter and speed", Range::not_negative))
    power_number_ = *np;
  if (const auto d = s.optional_quantity("diameter", unit_kinds::length, "of the impeller", Range::positive))
    diameter_ = *d;
  speed_spec_ = s.signal("speed", unit_kinds::rotation, "of the shaft", Range::not_negative);
  top_speed_ =
      s.optional_quantity("top_speed", unit_kinds::rotation, "what a controller may ask for at most", Range::positive);
  if (s.describing() || !one_way) return;
  way_ = s.has("power") ? Way::power : (s.has("torque") ? Way::torque : Way::impeller);
  if (way_ == Way::impeller && !s.has("diameter"))
    s.error_here(fmt::format("'{}' needs 'diameter' beside 'power_number'", s.path()));
  if (way_ != Way::power && !s.has("speed") && !s.has("top_speed"))
    s.error_here(fmt::format("'{}' needs 'speed' (or 'top_speed' where a controller drives it)", s.path()));
  for (const char* key : {"speed", "top_speed"})
    if (way_ == Way::power && s.has(key))
      s.error(key, fmt::format("'{}': with 'power' given, '{}' has no use", s.path(), key));
  if (way_ == Way::power && s.has("diameter"))
    s.error("diameter", fmt::format("'{}': 'diameter' goes with a speed", s.path()));
}

void Stirrer::declare(Layout&) {}

void Stirrer::connect(Layout& layout) {
  const SpaceInfo* space = layout.space(in_);
  if (space == nullptr) return;
  space_ = space->index;
  store_ = space->store;
  if (way_ == Way::power) power_input_ = layout.add_input(name + ".power", unit_kinds::power, power_spec_, 0.0, place);
  if (way_ == Way::torque)
    torque_input_ = layout.add_input(name + ".torque", unit_kinds::torque, torque_spec_, 0.0, place);
  if (way_ != Way::power) {
    speed_input_ = layout.add_input(name + ".speed", unit_kinds::rotation, speed_spec_, 0.0, place);
    layout.inputs[speed_input_].high = top_speed_ ? top_speed_->si : 0.0;
  }
  if (diameter_ > 0.0 && speed_input_ >= 0) layout.impellers.push_back({space_, diameter_, speed_input_});
  shaft_entry_ = layout.ledger(LedgerTerm::shaft, name);
  channel_ = layout.add_channel(name + ".power", unit_kinds::power, "shaft power into the gas", ChannelPhase::flow);
  if (way_ == Way::power) return;
  layout.add_channel(name + ".torque", unit_kinds::torque, "shaft torque", ChannelPhase::flow);
  layout.add_channel(name + ".speed", unit_kinds::rotation, "shaft speed", ChannelPhase::flow);
}

}  // namespace gaskettle
