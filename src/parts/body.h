/// A solid inside the gas of a space: workpiece, rack, packing.
///
///   C dT/dt = h A (T_gas - T) + radiation from heaters
/// One temperature where the Biot number h L / k is small; with `half_thickness` L
/// the core lags the face: conduction nodes over the half thickness, none across
/// the middle. The film coefficient is given. Bodies radiate with the walls around
/// the space by the two-surface formula, shared by wall area.
/// Source: F. P. Incropera et al., Fundamentals of Heat and Mass Transfer, 6th ed.,
/// chapter 5 (lumped body, Biot number), chapter 13 (two-surface enclosure).
#pragma once
#include "laws/conduction_grid.h"
#include "laws/radiation.h"
#include "model/materials.h"
#include "model/workspace.h"

namespace gaskettle {

class Body {
public:
  static constexpr const char* section = "bodies";
  static constexpr const char* kind = "body";
  static constexpr const char* meaning = "a solid inside the gas: workpiece, rack, packing";

  std::string name;
  Place place;

  void read(Section& s);
  void declare(Layout& layout);
  void connect(Layout& layout);

  template <class S>
  void prepare(Workspace<S>& w) const {
    for (std::size_t i = 0; i < store_.size(); ++i)
      w.temperature[store_[i]] = start_ + w.y[state_[i]] * inverse_capacity_[i];
    w.out[channel_] = w.temperature[store_[0]];
    if (store_.size() > 1) w.out[channel_ + 1] = w.temperature[store_.back()];
  }

  template <class S>
  void exchange(Workspace<S>& w) const {
    const S difference = w.temperature[gas_store_] - w.temperature[store_[0]];
    w.heat(gas_store_, store_[0], film_conductance_ * difference, Mechanism::film);
    for (std::size_t i = 0; i + 1 < store_.size(); ++i)
      w.heat(store_[i], store_[i + 1], link_[i] * (w.temperature[store_[i]] - w.temperature[store_[i + 1]]),
             Mechanism::conduction);
    for (const auto& [store, area] : radiating_)
      w.heat(store_[0], store, radiant_heat<S>(S(area), w.temperature[store_[0]], w.temperature[store]),
             Mechanism::radiation);
  }

private:
  Reference in_;
  double mass_ = 0.0, specific_heat_ = 0.0, area_ = 0.0, film_ = 0.0, emissivity_ = 0.0, conductivity_ = 0.0,
         density_ = 0.0;
  std::optional<Value> half_thickness_, stated_start_;
  std::string temperature_unit_;
  long count_ = 1;

  int gas_store_ = 0, channel_ = 0;
  double start_ = 0.0, film_conductance_ = 0.0;
  std::vector<int> store_, state_;
  std::vector<double> inverse_capacity_, link_;
  std::vector<std::pair<int, double>> radiating_;  // wall store, exchange area
};

}  // namespace gaskettle
