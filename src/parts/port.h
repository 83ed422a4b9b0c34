/// A flow path: feed, vent, leak or restrictor between spaces, a supply and the atmosphere.
///
///   orifice:  flow = opening * Cd A * nozzle flux (laws/nozzle.h), choked and unchoked
///   iso6358:  flow = opening * the component's flow (laws/iso6358.h)
///   flow:     a stated mass, molar or volume flow (volume at the state upstream)
/// Enthalpy travels with the gas at the upstream state. Direction is no event: forward
/// and backward flow are carried separately, each with its own upstream state, and at
/// most one is above zero. A stated flow ends where its source no longer exceeds its
/// sink (it would need a pump) and starts again 1 % above.
#pragma once
#include "laws/iso6358.h"
#include "laws/nozzle.h"
#include "model/endpoint.h"

namespace gaskettle {

class Port {
public:
  static constexpr const char* section = "ports";
  static constexpr const char* kind = "port";
  static constexpr const char* meaning = "a flow path: feed, vent, leak or restrictor";

  std::string name;
  Place place;

  void read(Section& s);
  void declare(Layout& layout);
  void connect(Layout& layout);
  void start(Event& e);

  template <class S>
  void exchange(Workspace<S>& w) const {
    const GasState<S> a = from_.state(w), b = to_.state(w);
    const S& opening = w.input[opening_input_];
    TwoWayFlow<S> flow{S(0.0), S(0.0)};
    switch (way_) {
      case Way::orifice:
        flow = nozzle_flux_both_ways(side(a), side(b), w.band);
        break;
      case Way::sonic:
        flow = sonic_flow(a, b, w.band);
        break;
      case Way::stated:
        flow.forward = stated_flow(w, a);
        break;
    }
    const S forward = opening * scale_ * flow.forward;
    carry_flow(w, forward, from_, to_, a, entries_);
    w.out[channel_] = forward;
    w.out[channel_ + 1] = opening;
    if (one_way_ || way_ == Way::stated) return;
    const S backward = opening * scale_ * flow.backward;
    carry_flow(w, backward, to_, from_, b, entries_);
    w.out[channel_] = forward - backward;
  }

  int mode() const { return running_ ? 1 : 0; }
  static constexpr std::array guard_names = {"source and sink change places"};
  static constexpr bool guards_disturb = true;
  void guards(const Workspace<double>& w, double* g) const;
  void on_guard(int which, Event& e);

private:
  enum class Way { orifice, sonic, stated };
  template <class S>
  static NozzleSide<S> side(const GasState<S>& g) {
    return {g.pressure, g.temperature, g.gas_constant, heat_capacity_ratio(g)};
  }
  template <class S>
  TwoWayFlow<S> sonic_flow(const GasState<S>& a, const GasState<S>& b, double band) const {
    const auto one = [&](const GasState<S>& up, const GasState<S>& down) {
      return S(iso6358_gas_factor(up.gas_constant, heat_capacity_ratio(up)) *
               iso6358_flow(up.pressure, up.temperature, down.pressure, conductance_, critical_ratio_, band));
    };
    return {one(a, b), value(a.pressure) >= value(b.pressure) ? S(0.0 * one(b, a)) : one(b, a)};
  }
  template <class S>
  S stated_flow(const Workspace<S>& w, const GasState<S>& up) const {
    if (!running_) return S(0.0);
    const S& stated = w.input[flow_input_];
    switch (basis_) {
      case FlowBasis::mass:
        return stated;
      case FlowBasis::molar:
        return stated * (molar_gas_constant / up.gas_constant);
      case FlowBasis::actual_volume:
        return stated * up.density;
    }
    return stated;
  }
  void read_way(Section& s);

  Endpoint from_, to_;
  FlowEntries entries_;
  Way way_ = Way::orifice;
  double scale_ = 1.0;  // effective area of an orifice, 1 otherwise
  double conductance_ = 0.0, critical_ratio_ = 0.0;
  SignalSpec flow_spec_, opening_spec_;
  FlowBasis basis_ = FlowBasis::mass;
  bool one_way_ = false, running_ = true;
  int opening_input_ = 0, flow_input_ = -1, channel_ = 0;
};

}  // namespace gaskettle
