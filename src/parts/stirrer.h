/// Shaft work into the gas of a space: fixed power, torque at a speed, or an
/// impeller of known power number.
///
///   P = power  |  P = torque * omega  |  P = Np rho N^3 D^5, N = omega / (2 pi)
/// Np, the power number, is a pure number of the impeller; rho is the current
/// density. All shaft power that crosses the wall ends as heat in the gas (the
/// kinetic energy of the swirl decays in seconds and is neglected); it is work in
/// the first law and is booked as such.
/// Source: M. Zlokarnik, Stirring: Theory and Practice, 2001, chapter 1 (power number).
#pragma once
#include "laws/stirring.h"
#include "model/workspace.h"

namespace gaskettle {

class Stirrer {
public:
  static constexpr const char* section = "stirrers";
  static constexpr const char* kind = "stirrer";
  static constexpr const char* meaning = "shaft work into the gas of a space";

  std::string name;
  Place place;

  void read(Section& s);
  void declare(Layout& layout);
  void connect(Layout& layout);

  template <class S>
  void exchange(Workspace<S>& w) const {
    S power = S(0.0), torque = S(0.0), speed = S(0.0);
    switch (way_) {
      case Way::power:
        power = w.input[power_input_];
        break;
      case Way::torque:
        torque = w.input[torque_input_];
        speed = w.input[speed_input_];
        power = shaft_power(torque, speed);
        break;
      case Way::impeller:
        speed = w.input[speed_input_];
        power = impeller_power(power_number_, w.gas[space_].density, speed, diameter_);
        break;
    }
    w.supply(store_, power, Mechanism::stirrer, shaft_entry_);
    w.out[channel_] = power;
    if (way_ == Way::power) return;
    // At standstill an impeller's torque Np rho N^2 D^5 / (2 pi) vanishes with its power.
    if (way_ == Way::impeller) torque = impeller_torque(power, speed);
    w.out[channel_ + 1] = torque;
    w.out[channel_ + 2] = speed;
  }

private:
  enum class Way { power, torque, impeller };
  template <class S>
  static S impeller_torque(const S& power, const S& speed) {
    if (absolute(value(speed)) < 1e-9) return 0.0 * (power + speed);
    return power / speed;
  }

  Reference in_;
  Way way_ = Way::power;
  SignalSpec power_spec_, torque_spec_, speed_spec_;
  std::optional<Value> top_speed_;
  double power_number_ = 0.0, diameter_ = 0.0;
  int space_ = 0, store_ = 0, power_input_ = -1, torque_input_ = -1, speed_input_ = -1, shaft_entry_ = 0, channel_ = 0;
};

}  // namespace gaskettle
