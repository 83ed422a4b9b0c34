#include "parts/relief_device.h"

#include <fmt/format.h>

namespace gaskettle {

void ReliefDevice::read_valve(Section& s) {
  const double atmosphere = s.context().atmosphere;
  const auto set = s.optional_quantity("set", unit_kinds::pressure, "set pressure of a valve", Range::positive);
  s.at_most_one_of({"reseat", "blowdown"});
  const auto reseat = s.optional_quantity("reseat", unit_kinds::pressure, "where a valve shuts again", Range::positive);
  const auto blowdown = s.optional_quantity("blowdown", unit_kinds::percentage,
                                            "set minus reseat, percent of gauge set", Range::positive);
  proportional_ = s.choice("action", {"pop", "proportional"}, "opens at once, or in proportion to the overpressure",
                           "pop") == "proportional";
  const Value full =
      s.quantity("full_lift_at", unit_kinds::percentage,
                 "overpressure at full lift of a proportional valve, percent of gauge set", Range::positive, "10 %");
  balanced_ = s.flag("balanced", "back pressure does not act on it", false);
  if (disc_ || s.describing()) return;
  if (!set) return;
  pressure_unit_ = set->unit;
  set_ = set->si - atmosphere;
  if (set_ <= 0.0) {
    s.error("set", fmt::format("'{}.set' is not above the surroundings: set pressures are gauge pressures", s.path()));
    return;
  }
  lift_range_ = full.si * set_;
  if (reseat)
    reseat_ = reseat->si - atmosphere;
  else if (blowdown)
    reseat_ = set_ * (1.0 - blowdown->si);
  else if (!proportional_ && !s.has("reseat") && !s.has("blowdown"))
    s.error_here(fmt::format("'{}' needs 'reseat' or 'blowdown': a pop valve shuts below its set pressure", s.path()));
  if ((reseat || blowdown) && reseat_ >= set_)
    s.error(
        reseat ? "reseat" : "blowdown",
        fmt::format("'{}': reseat must be below set; at or above it the valve would chatter without end", s.path()));
  if (blowdown && blowdown->si >= 1.0) s.error("blowdown", fmt::format("'{}.blowdown' must be below 100 %", s.path()));
  if (proportional_ && (reseat || blowdown))
    s.error(reseat ? "reseat" : "blowdown",
            fmt::format("'{}': a proportional valve shuts where it opens; 'reseat' and 'blowdown' go with action: pop",
                        s.path()));
}

void ReliefDevice::read(Section& s) {
  protects_ = s.reference("protects", "gas space", "the space it sits on", true);
  to_reference_ = s.reference("to", "'atmosphere' or a gas space", "where it discharges (atmosphere)", false);
  area_ = s.quantity("flow_area", unit_kinds::area, "smallest flow area when fully open", Range::positive);
  const Value kd =
      s.quantity("discharge_coefficient", unit_kinds::number, "that belongs to this area, 0 to 1", Range::fraction);
  coefficient_ = kd.si;
  if (kd.given && kd.si == 0.0)
    s.error("discharge_coefficient", "a discharge coefficient of 0 lets nothing through; it lies between 0 and 1");
  effective_area_ = area_ * coefficient_;
  s.exactly_one_of({"set", "burst"});
  if (const auto burst =
          s.optional_quantity("burst", unit_kinds::pressure, "burst pressure of a disc", Range::positive)) {
    disc_ = !s.describing();
    set_ = burst->si - s.context().atmosphere;
    pressure_unit_ = burst->unit;
    if (set_ <= 0.0 && !s.describing())
      s.error("burst", fmt::format("'{}.burst' is not above the surroundings", s.path()));
    if (!s.describing())
      for (const char* key : {"reseat", "blowdown", "action", "full_lift_at"})
        if (s.has(key)) s.error(key, fmt::format("'{}': '{}' goes with a valve, not with a disc", s.path(), key));
  }
  read_valve(s);
}

void ReliefDevice::declare(Layout& layout) {
  from_ = Endpoint::at_space(protects_);
  to_ = to_reference_.given() && to_reference_.name != "atmosphere" ? Endpoint::at_space(to_reference_, true)
                                                                    : Endpoint::at_atmosphere();
  if (to_.is_space() && protects_.given() && to_reference_.name == protects_.name)
    layout.error(to_reference_.place,
                 fmt::format("relief device '{}' discharges from '{}' to itself", name, protects_.name));
  from_.declare(layout);
  to_.declare(layout);
  const int outlet = to_.is_space() ? to_.space() : -1;
  layout.can_flow(from_.space(), outlet);
  if (disc_) layout.can_flow(outlet, from_.space(), to_.composition());
}

void ReliefDevice::connect(Layout& layout) {
  from_.connect(layout, name, "protects");
  to_.connect(layout, name, "to");
  entries_.connect(layout, name, from_, to_);
  channel_ = layout.add_channel(name + ".flow", unit_kinds::gas_flow, "mass flow relieved", ChannelPhase::flow);
  state_capacity(layout);
  const int opening =
      layout.add_channel(name + ".opening", unit_kinds::number, "0 shut to 1 fully open", ChannelPhase::flow);
  const int released =
      layout.add_channel(name + ".released", unit_kinds::mass, "mass relieved since the start", ChannelPhase::flow);
  released_state_ = layout.add_state(name + ".released", -1.0);
  layout.reliefs.push_back({name, from_.space(), channel_, opening, released, set_ + layout.atmosphere_pressure, area_,
                            coefficient_, disc_, to_.is_space() ? to_.space() : -1});
}

/// Capacity fully open at 10 % overpressure, for `check`.
void ReliefDevice::state_capacity(Layout& layout) const {
  const SpaceInfo& space = layout.spaces[from_.space()];
  const double inlet = 1.1 * set_ + layout.atmosphere_pressure;
  const std::vector<double> fraction = layout.mass_fractions(space.composition);
  const GasState<double> gas = layout.mixture.from_temperature(fraction.data(), space.temperature, inlet);
  const double flow = effective_area_ * nozzle_flux(inlet, gas.temperature, gas.gas_constant, heat_capacity_ratio(gas),
                                                    layout.atmosphere_pressure, smallest_pressure_band);
  layout.facts.push_back(
      {name, "capacity at 10 % overpressure, gas as at the start", flow, UnitKind{"mass flow", "kg s-1"}});
}

void ReliefDevice::start(Event& e) {
  const double p = driving_pressure(*e.before);
  if (p < set_) return;
  opening_ = disc_ || !proportional_ || p - set_ >= lift_range_ ? Opening::full : Opening::lifting;
  e.log(name, disc_ ? "bursts" : "lifts", 0.0, e.now().out[channel_ + 1]);
}

void ReliefDevice::guards(const Workspace<double>& w, double* g) const {
  const double p = driving_pressure(w);
  g[0] = g[1] = -1.0;
  switch (opening_) {
    case Opening::shut:
      g[0] = p - set_;
      break;
    case Opening::lifting:
      g[0] = p - set_ - lift_range_;
      g[1] = set_ - p;
      break;
    case Opening::full:
      if (disc_) break;
      g[1] = (proportional_ ? set_ + lift_range_ : reseat_) - p;
      break;
  }
}

void ReliefDevice::on_guard(int which, Event& e) {
  const double before = e.before->out[channel_ + 1];
  const Opening old = opening_;
  if (which == 0)
    opening_ = old == Opening::shut && proportional_ ? Opening::lifting : Opening::full;
  else
    opening_ = old == Opening::full && proportional_ ? Opening::lifting : Opening::shut;
  const char* what = disc_ ? "bursts" : "lifts";
  if (opening_ == Opening::shut)
    what = "reseats";
  else if (old == Opening::lifting)
    what = "reaches full lift";
  else if (old == Opening::full)
    what = "leaves full lift";
  e.log(name, what, before, e.now().out[channel_ + 1]);
}

}  // namespace gaskettle
