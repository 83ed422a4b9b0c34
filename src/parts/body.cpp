#include "parts/body.h"

#include <fmt/format.h>

#include <cmath>

#include "model/enclosure.h"

namespace gaskettle {

void Body::read(Section& s) {
  in_ = s.reference("in", "gas space", "the gas around it", true);
  mass_ = s.quantity("mass", unit_kinds::mass, "of one body", Range::positive);
  s.exactly_one_of({"material", "specific_heat"});
  if (const auto material = read_material(s, "material", "a built-in or own material, or its properties", false)) {
    specific_heat_ = material->specific_heat;
    conductivity_ = material->conductivity.front().second;
    density_ = material->density;
    emissivity_ = material->emissivity;
  }
  if (const auto c =
          s.optional_quantity("specific_heat", unit_kinds::specific_heat, "instead of a material", Range::positive))
    specific_heat_ = *c;
  area_ = s.quantity("area", unit_kinds::area, "in touch with the gas, of one body", Range::positive);
  film_ = s.quantity("film", unit_kinds::film_coefficient, "film coefficient from the gas", Range::not_negative);
  emissivity_ = s.quantity("emissivity", unit_kinds::number, "for radiation with the walls", Range::fraction, "0");
  half_thickness_ =
      s.optional_quantity("half_thickness", unit_kinds::length, "then the core lags the face", Range::positive);
  count_ = s.integer("count", "so many alike", 1, 1);
  stated_start_ =
      s.optional_quantity("temperature", unit_kinds::temperature, "at the start (that of the gas)", Range::positive);
  if (half_thickness_ && s.has("specific_heat"))
    s.error("half_thickness", fmt::format("'{}': 'half_thickness' needs a 'material', for its conductivity", s.path()));
}

void Body::declare(Layout&) {}

void Body::connect(Layout& layout) {
  const SpaceInfo* space = layout.space(in_);
  if (space == nullptr) return;
  gas_store_ = space->store;
  const double number = static_cast<double>(count_) * space->count;
  const double area = area_ * number, capacity = mass_ * specific_heat_ * number;
  start_ = stated_start_ ? stated_start_->si : space->temperature;
  film_conductance_ = film_ * area;

  ConductionGrid grid;
  grid.nodes = {{0.0, capacity / area}};
  if (half_thickness_ && conductivity_ > 0.0) {
    WallSpec slab;
    // Mass and area may speak of another thickness than a slab's: the capacity is kept, the path is as stated.
    slab.layers = {{half_thickness_->si, conductivity_, capacity / area / specific_heat_ / half_thickness_->si,
                    specific_heat_, 0.0}};
    slab.inner_film = film_;
    grid = choose_conduction_grid(slab, layout.run_length / 1000.0);
  }
  for (std::size_t i = 0; i < grid.nodes.size(); ++i) {
    const std::string node = grid.nodes.size() == 1 ? name : fmt::format("{}.node{}", name, i);
    store_.push_back(layout.add_store(node, grid.nodes[i].heat_capacity * area, start_));
    state_.push_back(layout.stores[store_.back()].state);
    inverse_capacity_.push_back(1.0 / layout.stores[store_.back()].capacity);
    if (i + 1 < grid.nodes.size()) link_.push_back(grid.links[i].geometry * conductivity_ * area);
  }
  layout.facts.push_back({name, "heat capacity", capacity, unit_kinds::heat_capacity});
  layout.facts.push_back({name, "area", area, unit_kinds::area});
  if (conductivity_ > 0.0) {
    const double length = half_thickness_ ? half_thickness_->si : mass_ / density_ / area_;
    const double biot = film_ * length / conductivity_;
    layout.facts.push_back({name, "Biot number", biot, unit_kinds::number});
    if (biot > 0.1 && !half_thickness_)
      layout.advice.push_back(
          fmt::format("{}: Biot number {:.2g} is above 0.1: its core lags; state 'half_thickness'", name, biot));
  }
  if (emissivity_ > 0.0) radiating_ = share_radiation(layout, space->index, area, emissivity_);
  layout.faces.push_back({name, space->index, store_[0], area, emissivity_, false, store_.back()});
  const std::string unit = stated_start_ ? stated_start_->unit : "";
  channel_ = layout.add_channel(name + ".temperature", unit_kinds::temperature, "temperature of the face",
                                ChannelPhase::state, unit);
  if (store_.size() > 1)
    layout.add_channel(name + ".core_temperature", unit_kinds::temperature, "temperature of the core",
                       ChannelPhase::state, unit);
}

}  // namespace gaskettle
