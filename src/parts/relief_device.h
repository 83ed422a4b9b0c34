/// A safety valve or a rupture disc on a gas space.
///
/// Valve, pop: shut until the inlet reaches `set`, then fully open until it falls to
/// `reseat`. Valve, proportional: lift = (p - set) / (full_lift_at * gauge set), from 0
/// to 1. Disc: bursts once at `burst` and stays open, in both directions. `set` acts on
/// the difference across the device; a balanced one on the inlet alone. Flow is
///   opening * Kd A * nozzle flux  (laws/nozzle.h),
/// the same law as ISO 4126-1 and API 520-I for gas (laws/relief_capacity.h).
/// A lumped model, not a sizing under those standards.
#pragma once
#include "laws/nozzle.h"
#include "model/endpoint.h"

namespace gaskettle {

class ReliefDevice {
public:
  static constexpr const char* section = "relief_devices";
  static constexpr const char* kind = "relief device";
  static constexpr const char* meaning = "a safety valve or a rupture disc on a gas space";

  std::string name;
  Place place;

  void read(Section& s);
  void declare(Layout& layout);
  void connect(Layout& layout);
  void start(Event& e);

  template <class S>
  void exchange(Workspace<S>& w) const {
    S opening = S(opening_ == Opening::full ? 1.0 : 0.0);
    if (opening_ == Opening::lifting) opening = (driving_pressure(w) - set_) / lift_range_;
    w.out[channel_] = S(0.0);
    w.out[channel_ + 1] = opening;
    w.out[channel_ + 2] = w.y[released_state_];
    if (opening_ == Opening::shut) return;
    const GasState<S> up = from_.state(w), down = to_.state(w);
    const auto side = [](const GasState<S>& g) {
      return NozzleSide<S>{g.pressure, g.temperature, g.gas_constant, heat_capacity_ratio(g)};
    };
    const TwoWayFlow<S> flux = nozzle_flux_both_ways(side(up), side(down), w.band);
    const S forward = opening * effective_area_ * flux.forward;
    carry_flow(w, forward, from_, to_, up, entries_);
    w.out[channel_] = forward;
    w.f[released_state_] = forward;
    if (!disc_) return;
    const S backward = opening * effective_area_ * flux.backward;
    carry_flow(w, backward, to_, from_, down, entries_);
    w.out[channel_] = forward - backward;
  }

  int mode() const { return static_cast<int>(opening_); }
  static constexpr std::array guard_names = {"opens", "shuts"};
  static constexpr bool guards_disturb = true;
  void guards(const Workspace<double>& w, double* g) const;
  void on_guard(int which, Event& e);

private:
  enum class Opening { shut, lifting, full };
  /// What the device compares with its set pressure: Pa above the surroundings.
  template <class S>
  S driving_pressure(const Workspace<S>& w) const {
    const S inlet = from_.pressure(w);
    if (balanced_ || disc_ || !to_.is_space()) return inlet - w.layout->atmosphere_pressure;
    return inlet - to_.pressure(w);
  }
  void read_valve(Section& s);
  void state_capacity(Layout& layout) const;

  Reference protects_, to_reference_;
  Endpoint from_, to_;
  FlowEntries entries_;
  double effective_area_ = 0.0, area_ = 0.0, coefficient_ = 0.0;
  double set_ = 0.0, reseat_ = 0.0, lift_range_ = 1.0;  // Pa above the surroundings
  bool disc_ = false, proportional_ = false, balanced_ = false;
  std::string pressure_unit_;
  Opening opening_ = Opening::shut;
  int channel_ = 0, released_state_ = 0;
};

}  // namespace gaskettle
