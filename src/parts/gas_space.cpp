#include "parts/gas_space.h"

#include <fmt/format.h>

#include <algorithm>

#include "model/composition.h"

namespace gaskettle {

void GasSpace::read(Section& s) {
  s.exactly_one_of({"volume", "shape"});
  stated_volume_ = s.optional_quantity("volume", unit_kinds::volume, "of the gas at the start", Range::positive);
  if (auto shape = s.child("shape", "instead of volume: its form, which also gives areas and lengths"))
    shape_ = read_shape(*shape);
  composition_ = read_composition(s, "gas", "what it holds at the start");
  start_temperature_ = s.quantity("temperature", unit_kinds::temperature, "of the gas at the start", Range::positive);
  s.at_most_one_of({"pressure", "mass"});
  stated_pressure_ =
      s.optional_quantity("pressure", unit_kinds::pressure,
                          "at the start; may be left out where a balanced piston closes the space", Range::positive);
  stated_mass_ =
      s.optional_quantity("mass", unit_kinds::mass, "of gas at the start, instead of pressure", Range::positive);
  has_content_ = s.has("pressure") || s.has("mass");
  count_ = s.integer("count", "so many alike, walls and bodies with them", 1, 1);
}

void GasSpace::declare(Layout& layout) {
  index_ = static_cast<int>(layout.spaces.size());
  SpaceInfo info;
  info.name = name;
  info.place = place;
  info.index = index_;
  info.shape = shape_;
  info.count = static_cast<double>(count_);
  info.volume = info.count * (stated_volume_ ? stated_volume_->si : shape_.volume());
  info.temperature = start_temperature_;
  if (!(info.volume > 0.0)) info.volume = info.count;  // reported already; the checks go on with 1 m3
  if (stated_pressure_) {
    info.pressure = stated_pressure_->si;
    info.pressure_place = stated_pressure_->place;
  }
  if (stated_mass_) info.given_mass = info.count * stated_mass_->si;
  info.composition = composition_;
  layout.use_gas(composition_, place);
  layout.spaces.push_back(info);
}

void GasSpace::connect(Layout& layout) {
  SpaceInfo& info = layout.spaces[index_];
  const GasMixture& mixture = layout.mixture;
  const std::vector<double> x = layout.mole_fractions(composition_);
  const std::vector<double> fraction = layout.mass_fractions(composition_);
  const double molar_mass = mixture.molar_mass(x.data());
  if (info.given_mass)
    info.pressure = *info.given_mass / molar_mass * molar_gas_constant * info.temperature / info.volume;
  if (!info.pressure) {
    if (!has_content_ && !layout.loose_piston)
      layout.error(place, fmt::format("gas space '{}' needs 'pressure' or 'mass'", name));
    info.pressure = layout.atmosphere_pressure;
  }
  volume_ = info.volume;
  temperature_ = info.temperature;
  const double total = mixture.mass_in(volume_, x.data(), temperature_, *info.pressure);
  const GasState<double> start = mixture.from_temperature(fraction.data(), temperature_, *info.pressure);
  start_energy_ = start.energy;
  start_cv_ = start.cv;
  energy_ = info.energy = total * start.energy;

  // An evacuated vessel is judged as if it held gas at 1 kPa.
  const double size = total * std::max(1.0, 1e3 / *info.pressure);
  info.store = store_ = layout.add_gas_store(index_, size * start.cv * temperature_);
  energy_state_ = layout.stores[store_].state;
  info.mass.assign(x.size(), 0.0);
  info.mass_state.assign(x.size(), -1);
  for (std::size_t k = 0; k < x.size(); ++k) {
    if (!info.carries[k]) continue;
    info.mass[k] = total * fraction[k];
    info.mass_state[k] =
        layout.add_state(fmt::format("{}.mass.{}", name, mixture.species(static_cast<int>(k)).name), size);
    fraction_species_.push_back(static_cast<int>(k));
  }
  mass_ = info.mass;
  mass_state_ = info.mass_state;
  lowest_ = mixture.lowest_temperature(mass_.data());
  // A gas of constant cp has no upper end: a finite one keeps the guard finite.
  highest_ = std::min(1e9, mixture.highest_temperature(mass_.data()));

  layout.facts.push_back({name, "gas mass", total, unit_kinds::mass});
  layout.facts.push_back({name, "p V", *info.pressure * volume_, unit_kinds::energy});
  layout.facts.push_back(
      {name, "heat capacity of the gas at constant volume", total * start.cv, unit_kinds::heat_capacity});
  const std::string tu = start_temperature_.unit;
  const std::string pu = stated_pressure_ ? stated_pressure_->unit : "";
  const auto channel = [&](const std::string& q, const UnitKind& k, const std::string& m, ChannelPhase p,
                           const std::string& u) { return layout.add_channel(name + "." + q, k, m, p, u); };
  channel_ = channel("temperature", unit_kinds::temperature, "gas temperature", ChannelPhase::state, tu);
  layout.pressure_channels.push_back(
      channel("pressure", unit_kinds::pressure, "gas pressure, absolute", ChannelPhase::state, pu));
  channel("volume", unit_kinds::volume, "gas volume", ChannelPhase::state, stated_volume_ ? stated_volume_->unit : "");
  channel("mass", unit_kinds::mass, "mass of gas", ChannelPhase::state, "");
  channel("energy", unit_kinds::energy, "internal energy of the gas; ideal gas at 298.15 K has h = 0",
          ChannelPhase::observed, "");
  channel("specific_entropy", unit_kinds::specific_heat, "entropy of the gas per mass", ChannelPhase::observed, "");
  channel("density", unit_kinds::density, "density of the gas", ChannelPhase::observed, "");
  for (const int k : fraction_species_)
    channel("mole_fraction." + mixture.species(k).name, unit_kinds::number,
            "mole fraction of " + mixture.species(k).name, ChannelPhase::observed, "");
}

void GasSpace::on_guard(int which, Event& e) const {
  const double t = e.before->gas[index_].temperature;
  e.log(name, which == 0 ? "above the published range of the gas data" : "below the published range of the gas data", t,
        t);
  e.layout->warnings.push_back(fmt::format(
      "{}: gas at {:.6g} K leaves the published range {:.0f} to {:.0f} K of its data at {:.6g} s; cp is held outside",
      name, t, lowest_, highest_, e.time));
}

}  // namespace gaskettle
