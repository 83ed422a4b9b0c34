#include "parts/port.h"

#include <fmt/format.h>

#include <numbers>

namespace gaskettle {

void Port::read_way(Section& s) {
  s.exactly_one_of({"orifice", "flow", "iso6358", "iec60534"});
  s.not_built_yet("iec60534", "control valve by IEC 60534");
  if (auto orifice = s.child("orifice", "isentropic nozzle with a discharge coefficient")) {
    way_ = Way::orifice;
    orifice->exactly_one_of({"bore", "area"});
    double area = 0.0;
    if (const auto bore = orifice->optional_quantity("bore", unit_kinds::length, "of a round opening", Range::positive))
      area = std::numbers::pi / 4.0 * bore->si * bore->si;
    if (const auto a = orifice->optional_quantity("area", unit_kinds::area, "of the opening", Range::positive))
      area = *a;
    const Value cd =
        orifice->quantity("discharge_coefficient", unit_kinds::number, "of the opening, 0 to 1", Range::fraction);
    if (cd.given && cd.si == 0.0)
      orifice->error("discharge_coefficient",
                     "a discharge coefficient of 0 lets nothing through; it lies between 0 and 1");
    scale_ = cd.si * area;
  }
  if (auto sonic = s.child("iso6358", "a component rated by ISO 6358")) {
    way_ = Way::sonic;
    scale_ = 1.0;
    conductance_ = sonic->quantity("C", unit_kinds::sonic_conductance, "sonic conductance, at ANR", Range::positive);
    critical_ratio_ =
        sonic->quantity("b", unit_kinds::number, "critical pressure ratio, from 0 to below 1", Range::fraction);
    if (critical_ratio_ >= 1.0 && !s.describing()) {
      sonic->error("b", "the critical pressure ratio b must be below 1");
      critical_ratio_ = 0.5;
    }
  }
  flow_spec_ = s.flow_signal("flow", "a stated mass, molar or volume flow", basis_);
  if (flow_spec_.given) {
    way_ = Way::stated;
    scale_ = 1.0;
  }
}

void Port::read(Section& s) {
  from_.read(s, "from", "where the gas comes from");
  to_.read(s, "to", "where it goes");
  read_way(s);
  opening_spec_ = s.signal("opening", unit_kinds::number, "0 shut to 1 open", Range::fraction, "1");
  one_way_ = s.flag("one_way", "never flows backward", false);
  if (s.describing()) return;
  if (from_.given() && to_.given() && !from_.is_space() && !to_.is_space())
    s.error_here(fmt::format("'{}' touches no gas space: at least one end must be one", s.path()));
  if (from_.is_space() && to_.is_space() && from_.space_name() == to_.space_name())
    s.error_here(fmt::format("'{}' goes from '{}' to itself", s.path(), from_.space_name()));
}

void Port::declare(Layout& layout) {
  from_.declare(layout);
  to_.declare(layout);
  const auto index = [](const Endpoint& e) { return e.is_space() ? e.space() : -1; };
  layout.can_flow(index(from_), index(to_), from_.composition());
  if (!one_way_ && way_ != Way::stated) layout.can_flow(index(to_), index(from_), to_.composition());
}

void Port::connect(Layout& layout) {
  from_.connect(layout, name, "from");
  to_.connect(layout, name, "to");
  opening_input_ = layout.add_input(name + ".opening", unit_kinds::number, opening_spec_, 0.0, place);
  layout.inputs[opening_input_].high = 1.0;
  if (way_ == Way::stated) flow_input_ = layout.add_input(name + ".flow", unit_kinds::gas_flow, flow_spec_, 0.0, place);
  entries_.connect(layout, name, from_, to_);
  channel_ = layout.add_channel(name + ".flow", unit_kinds::gas_flow, "mass flow, positive from 'from' to 'to'",
                                ChannelPhase::flow);
  layout.add_channel(name + ".opening", unit_kinds::number, "0 shut to 1 open", ChannelPhase::flow);
}

void Port::start(Event& e) {
  if (way_ != Way::stated) return;
  running_ = from_.pressure(*e.before) > to_.pressure(*e.before);
  if (!running_) {
    e.log(name, "stated flow needs a pump", 0.0, 0.0);
    e.layout->warnings.push_back(fmt::format(
        "{}: its source does not exceed its sink at the start; the stated flow needs a pump and does not run", name));
  }
}

void Port::guards(const Workspace<double>& w, double* g) const {
  g[0] = -1.0;
  if (way_ != Way::stated) return;
  const double up = from_.pressure(w), down = to_.pressure(w);
  g[0] = running_ ? down - up : up - 1.01 * down;
}

void Port::on_guard(int, Event& e) {
  const double before = e.before->out[channel_];
  running_ = !running_;
  e.log(name, running_ ? "stated flow runs again" : "stated flow needs a pump and ends", before, e.now().out[channel_]);
}

}  // namespace gaskettle
