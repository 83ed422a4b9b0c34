#include "parts/wall.h"

#include <fmt/format.h>

#include <cmath>
#include <numbers>

#include "laws/conduction_grid.h"

namespace gaskettle {

void Wall::read(Section& s) {
  around_ = s.reference("around", "gas space", "the gas it encloses", true);
  has_area_ = s.has("area");
  stated_area_ = s.optional_quantity(
      "area", unit_kinds::area, "of the inner face (the whole wetted area of the shape, less what other walls state)",
      Range::positive);
  s.list("layers", "from inside out", true, [this](Section& layer, int i) {
    Layer l;
    if (const auto m = read_material(layer, "material", "of this layer", true))
      l.material = *m;
    else
      l.material = {"", 1.0, 1.0, {{293.15, 1.0}}, 0.0, ""};
    l.thickness = layer.quantity("thickness", unit_kinds::length, "of this layer", Range::positive);
    if (const auto c = layer.optional_quantity("contact", unit_kinds::contact_resistance, "to the layer before",
                                               Range::not_negative))
      l.contact = *c;
    if (i == 0 && l.contact > 0.0 && !layer.describing()) {
      layer.error("contact", fmt::format("'{}': the first layer has no layer before it", layer.path()));
      l.contact = 0.0;
    }
    layers_.push_back(l);
  });
  if (const auto b = s.optional_quantity("bridges", unit_kinds::conductance,
                                         "from face to face past the layers: flanges, supports", Range::not_negative))
    bridges_ = *b;
  stated_start_ = s.optional_quantity("temperature", unit_kinds::temperature, "at the start (that of the surroundings)",
                                      Range::positive);
  if (auto inside = s.child("inside", "the face towards the gas", true)) {
    inside_.read(*inside, true);
    inside_emissivity_ = inside->quantity("emissivity", unit_kinds::number, "for radiation from heaters and bodies",
                                          Range::fraction, "0");
  }
  auto to = s.child("to", "another gas space on the other side, instead of the surroundings");
  if (to) to_ = to->reference("space", "gas space", "on the other side", true);
  if (to_.given() && to_.name == around_.name)
    to->error("space", fmt::format("'{}' has '{}' on both sides, the same gas space", s.path(), around_.name));
  if (auto outside = s.child("outside", "the face away from the gas", true)) {
    outside_.read(*outside, to.has_value() && !s.describing());
    outside_emissivity_ =
        outside->quantity("emissivity", unit_kinds::number, "of the outer face", Range::fraction, "0");
    facing_spec_ =
        outside->signal("temperature", unit_kinds::temperature,
                        "what this face sees and exchanges heat with (that of the surroundings)", Range::positive);
    flux_spec_ = outside->signal("flux", unit_kinds::heat_flux, "absorbed from sun or fire", Range::any);
    if (to && !s.describing())
      for (const char* key : {"temperature", "flux", "emissivity"})
        if (outside->has(key))
          outside->error(key, fmt::format("'{}' does not go with 'to': the other side is a gas space", key));
  }
}

void Wall::declare(Layout& layout) {
  for (SpaceInfo& space : layout.spaces) {
    if (space.name != around_.name) continue;
    if (stated_area_)
      space.stated_wall_area += stated_area_->si;
    else if (!has_area_ && ++space.whole_walls > 1 && space.shape.kind != Shape::Kind::unknown)
      layout.error(
          place,
          fmt::format("wall '{}' needs 'area': only one wall of '{}' can take what the others leave of its shape", name,
                      space.name));
  }
}

void Wall::connect(Layout& layout) {
  const SpaceInfo* space = layout.space(around_);
  const SpaceInfo* other = layout.space(to_);
  if (space == nullptr || layers_.empty()) return;
  space_ = space->index;
  if (other != nullptr) other_space_ = other->index;
  double area = stated_area_ ? stated_area_->si : space->shape.area() - space->stated_wall_area;
  if (!(area > 0.0)) {
    const std::string why = space->shape.kind == Shape::Kind::unknown
                                ? "its gas space states a volume, not a shape"
                                : fmt::format("the other walls take {:.4g} m2, the whole shape has {:.4g} m2",
                                              space->stated_wall_area, space->shape.area());
    if (!has_area_ && layout.sound(space->name))
      layout.error(place, fmt::format("wall '{}' needs 'area': {}", name, why));
    area = 1.0;
  }
  area_ = area * space->count;
  volume_start_ = space->volume;
  if (!stated_area_ && space->closed_by_piston) area_per_volume_ = space->shape.side_area_per_volume();
  start_ = stated_start_ ? stated_start_->si : layout.ambient_temperature_start;

  double thickness = 0.0;
  WallSpec spec;
  spec.shape = space->shape.kind == Shape::Kind::sphere
                   ? WallShape::sphere
                   : (space->shape.kind == Shape::Kind::cylinder ? WallShape::cylinder : WallShape::flat);
  spec.inner_radius = space->shape.bore / 2.0;
  for (const Layer& l : layers_) {
    thickness += l.thickness;
    std::vector<double> t, k;
    for (const auto& [temperature, conductivity] : l.material.conductivity) {
      t.push_back(temperature);
      k.push_back(conductivity);
    }
    tables_.emplace_back(t, k);
    spec.layers.push_back(
        {l.thickness, tables_.back().at(start_), l.material.density, l.material.specific_heat, l.contact});
  }
  inside_.connect(layout, *space, area, 0.0, place);
  if (other != nullptr)
    outside_.connect(layout, *other, area, 0.0, place);
  else
    outside_.connect(layout, *space, area, thickness, place);
  spec.inner_film = inside_.typical();
  spec.outer_film = outside_.typical();
  spec.outside_driven = other != nullptr || flux_spec_.given || facing_spec_.given;
  ConductionGrid grid = choose_conduction_grid(spec, layout.run_length / 1000.0);
  outer_area_ = area_ * grid.outer_area_ratio;
  for (std::size_t i = 0; i < grid.nodes.size(); ++i) {
    store_.push_back(layout.add_store(fmt::format("{}.node{}", name, i), grid.nodes[i].heat_capacity * area_, start_));
    state_.push_back(layout.stores[store_.back()].state);
    inverse_capacity_.push_back(1.0 / layout.stores[store_.back()].capacity);
  }
  for (const ConductionLink& l : grid.links) {
    const int table = l.layer >= 0 && !tables_[l.layer].constant() ? l.layer : -1;
    const double k = l.layer < 0 || table >= 0 ? 1.0 : tables_[l.layer].at(start_);
    link_.push_back({table, k * l.geometry * area_});
  }
  layout.faces.push_back({name, space_, store_.front(), area_, inside_emissivity_, true, -1});
  if (other != nullptr)
    layout.faces.push_back({name, other_space_, store_.back(), outer_area_, outside_emissivity_, true, -1});
  layout.wall_grids.push_back({name, grid, store_});
  double capacity = 0.0;
  for (const int s : store_) capacity += layout.stores[s].capacity;
  layout.facts.push_back({name, "inner area", area_, unit_kinds::area});
  layout.facts.push_back({name, "outer area", outer_area_, unit_kinds::area});
  layout.facts.push_back({name, "heat capacity", capacity, unit_kinds::heat_capacity});
  layout.facts.push_back({name, "conduction nodes", static_cast<double>(store_.size()), unit_kinds::number});
  layout.facts.push_back(
      {name, "greatest error of the heat it draws after a step", grid.stated_error, unit_kinds::number});
  if (!inside_.is_none() && std::abs(start_ - space->temperature) > 5.0)
    layout.advice.push_back(
        fmt::format("{}: starts at {:.1f} K, its gas at {:.1f} K: is that meant?", name, start_, space->temperature));

  const std::string unit = stated_start_ ? stated_start_->unit : "";
  channel_ = layout.add_channel(name + ".temperature", unit_kinds::temperature, "temperature of the inner face",
                                ChannelPhase::state, unit);
  layout.add_channel(name + ".outer_temperature", unit_kinds::temperature, "temperature of the outer face",
                     ChannelPhase::state, unit);
  if (other == nullptr) {
    layout.add_channel(name + ".loss", unit_kinds::power, "heat leaving the outer face", ChannelPhase::flow);
    loss_entry_ = layout.ledger(LedgerTerm::wall_loss, name);
    if (facing_spec_.given)
      facing_input_ = layout.add_input(name + ".outside.temperature", unit_kinds::temperature, facing_spec_,
                                       layout.ambient_temperature_start, place);
    if (flux_spec_.given) {
      flux_input_ = layout.add_input(name + ".outside.flux", unit_kinds::heat_flux, flux_spec_, 0.0, place);
      flux_entry_ = layout.ledger(LedgerTerm::flux, name);
    }
  }
  ProfileDoc profile{name, {}, store_};
  for (const ConductionNode& n : grid.nodes) profile.depth.push_back(n.depth);
  layout.profiles.push_back(profile);
}

}  // namespace gaskettle
