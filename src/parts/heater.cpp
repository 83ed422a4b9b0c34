#include "parts/heater.h"

#include <fmt/format.h>

#include <cmath>

#include "model/enclosure.h"

namespace gaskettle {

void Heater::read(Section& s) {
  s.exactly_one_of({"in", "wall", "body"});
  in_ = s.reference("in", "gas space", "the gas it heats", false);
  wall_ = s.reference("wall", "wall", "the wall it lies on or in (a mat, a band)", false);
  after_layer_ = s.integer("after_layer", "behind which layer it lies, from inside: 0 is the inner face", 0, 0);
  after_layer_place_ = s.place_of("after_layer");
  body_ = s.reference("body", "body", "the body it sits in", false);
  if (const auto r =
          s.optional_quantity("rating", unit_kinds::power, "greatest power; a cooler has a negative one", Range::any)) {
    rating_ = *r;
    has_rating_ = true;
  }
  power_spec_ =
      s.signal("power", unit_kinds::power, "electrical power (the rating, where nothing drives it)", Range::any);
  heat_capacity_ = s.optional_quantity("heat_capacity", unit_kinds::heat_capacity,
                                       "of the element (none: straight into the receiver)", Range::positive);
  conductance_spec_ = s.optional_quantity("conductance", unit_kinds::conductance,
                                          "from the element to the gas (or wall, or body)", Range::positive);
  area_ = s.optional_quantity("area", unit_kinds::area, "of the element, for radiation to the walls", Range::positive);
  emissivity_ =
      s.quantity("emissivity", unit_kinds::number, "of the element, for radiation to the walls", Range::fraction, "0");
  stated_start_ = s.optional_quantity("temperature", unit_kinds::temperature,
                                      "of the element at the start (that of its receiver)", Range::positive);
  if (s.describing()) return;
  if (!s.has("rating") && !s.has("power")) s.error_here(fmt::format("'{}' needs 'rating' or 'power'", s.path()));
  if (has_rating_ && rating_ == 0.0)
    s.error("rating", fmt::format("'{}.rating' is zero; it would never heat or cool", s.path()));
  if (heat_capacity_ && !s.has("conductance"))
    s.error(
        "heat_capacity",
        fmt::format("'{}' needs 'conductance': with a heat capacity of its own it must pass the heat on", s.path()));
  if (emissivity_ > 0.0 && (!s.has("area") || !s.has("heat_capacity")))
    s.error("emissivity", fmt::format("'{}': radiation needs 'area' and 'heat_capacity' of the element", s.path()));
  if (s.has("after_layer") && !s.has("wall"))
    s.error("after_layer", fmt::format("'{}': 'after_layer' goes with 'wall'", s.path()));
  if (has_rating_ && power_spec_.given && power_spec_.sound) {
    const auto [low, high] = power_spec_.make(0.0).range();
    if (low < std::min(0.0, rating_) * (1 + 1e-12) || high > std::max(0.0, rating_) * (1 + 1e-12))
      s.error("power", fmt::format("'{}.power' goes beyond the rating", s.path()));
  }
}

int Heater::receiver(Layout& layout) {
  const auto missing = [&](const Reference& r, const char* what, const std::vector<std::string>& known) {
    if (layout.excuse(r.name)) return -1;
    const std::string near = nearest_name(r.name, known);
    layout.error(r.place, fmt::format("there is no {} '{}'{}", what, r.name,
                                      near.empty() ? "" : "; did you mean '" + near + "'?"));
    return -1;
  };
  std::vector<std::string> known;
  if (wall_.given()) {
    for (const WallGrid& g : layout.wall_grids) {
      known.push_back(g.wall);
      if (g.wall != wall_.name) continue;
      const int node = g.grid.node_after_layer(static_cast<int>(after_layer_));
      if (node >= 0) return g.store[node];
      if (layout.sound(wall_.name))
        layout.error(after_layer_place_,
                     fmt::format("heater '{}': wall '{}' has {} layers, so 'after_layer' goes from 0 to {}", name,
                                 wall_.name, g.grid.layer_count(), g.grid.layer_count()));
      return -1;
    }
    return missing(wall_, "wall", known);
  }
  if (body_.given()) {
    for (const FaceInfo& f : layout.faces) {
      if (f.wall) continue;
      known.push_back(f.part);
      if (f.part == body_.name) return f.core_store;
    }
    return missing(body_, "body", known);
  }
  const SpaceInfo* space = layout.space(in_);
  if (space == nullptr) return -1;
  space_ = space->index;
  return space->store;
}

void Heater::connect(Layout& layout) {
  receiver_ = receiver(layout);
  if (receiver_ < 0) return;
  store_ = receiver_;
  if (heat_capacity_) {
    start_ = stated_start_ ? stated_start_->si : layout.stores[receiver_].temperature;
    store_ = layout.add_store(name, heat_capacity_->si, start_);
    state_ = layout.stores[store_].state;
    inverse_capacity_ = 1.0 / heat_capacity_->si;
    conductance_ = conductance_spec_ ? conductance_spec_->si : 1.0;
    if (emissivity_ > 0.0 && area_ && space_ >= 0) radiating_ = share_radiation(layout, space_, *area_, emissivity_);
  }
  SignalSpec spec = power_spec_;
  if (!spec.given) spec.level = rating_;
  power_input_ = layout.add_input(name + ".power", unit_kinds::power, spec, 0.0, place);
  layout.inputs[power_input_].low = std::min(0.0, rating_);
  layout.inputs[power_input_].high = std::max(0.0, rating_);
  heater_entry_ = layout.ledger(LedgerTerm::heater, name);
  channel_ = layout.add_channel(name + ".power", unit_kinds::power, "electrical power", ChannelPhase::flow);
  if (heat_capacity_)
    layout.add_channel(name + ".temperature", unit_kinds::temperature, "temperature of the element",
                       ChannelPhase::state);
}

}  // namespace gaskettle
