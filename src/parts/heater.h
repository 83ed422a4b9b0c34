/// An electrical element, or a cooler: in the gas, on a wall (mat, band) or in a body.
///
/// With a heat capacity the element has a temperature of its own:
///   C dT/dt = P - G (T - T_receiver) - radiation to the walls
/// without one the power goes straight into the receiver. G is the conductance to the
/// receiver (the gas, the wall node or the body). Radiation by the two-surface formula,
/// shared by wall area. A cooler has a negative rating; what it takes out leaves the
/// plant. Power follows `power`, else the rating, else the controller that drives it.
/// Source of the radiation formula: Incropera et al., Fundamentals of Heat and Mass
/// Transfer, 6th ed., eq. 13.23.
#pragma once
#include "laws/radiation.h"
#include "model/workspace.h"

namespace gaskettle {

class Heater {
public:
  static constexpr const char* section = "heaters";
  static constexpr const char* kind = "heater";
  static constexpr const char* meaning = "a heating element or cooler in the gas, on a wall or in a body";

  std::string name;
  Place place;

  void read(Section& s);
  void declare(Layout&) {}
  void connect(Layout& layout);

  template <class S>
  void prepare(Workspace<S>& w) const {
    if (state_ < 0) return;
    w.temperature[store_] = start_ + w.y[state_] * inverse_capacity_;
    w.out[channel_ + 1] = w.temperature[store_];
  }

  template <class S>
  void exchange(Workspace<S>& w) const {
    const S& power = w.input[power_input_];
    w.out[channel_] = power;
    w.supply(store_, power, Mechanism::heater, heater_entry_);
    if (state_ < 0) return;
    w.heat(store_, receiver_, conductance_ * (w.temperature[store_] - w.temperature[receiver_]), Mechanism::film);
    for (const auto& [store, area] : radiating_)
      w.heat(store_, store, radiant_heat<S>(S(area), w.temperature[store_], w.temperature[store]),
             Mechanism::radiation);
  }

private:
  int receiver(Layout& layout);

  Reference in_, wall_, body_;
  long after_layer_ = 0;
  Place after_layer_place_;
  double rating_ = 0.0;
  bool has_rating_ = false;
  SignalSpec power_spec_;
  std::optional<Value> heat_capacity_, conductance_spec_, area_, stated_start_;
  double emissivity_ = 0.0;

  int space_ = -1, store_ = 0, receiver_ = 0, state_ = -1, power_input_ = 0, heater_entry_ = 0, channel_ = 0;
  double start_ = 0.0, inverse_capacity_ = 0.0, conductance_ = 0.0;
  std::vector<std::pair<int, double>> radiating_;  // wall store, exchange area
};

}  // namespace gaskettle
