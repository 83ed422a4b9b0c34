#include "parts/piston.h"

#include <fmt/format.h>

#include <cmath>

#include "laws/gas_spring.h"

namespace gaskettle {

namespace {
constexpr double rest_speed = 1e-4;  // m/s: contact with a stop below this is rest
}

void Piston::find_receiver(Layout& layout) {
  heat_store_ = -1;
  int wall = -1;
  for (const FaceInfo& f : layout.faces)
    if (f.wall && f.space == space_) {
      wall = f.store;
      break;
    }
  if (heat_to_ == "gas")
    heat_store_ = space_store_;
  else if (heat_to_ == "wall" || heat_to_.empty())
    heat_store_ = wall;
  if (heat_to_ == "wall" && wall < 0 && !layout.any_unsound("wall"))
    layout.error(heat_to_place_, fmt::format("piston '{}': there is no wall around '{}' to take its friction heat",
                                             name, layout.spaces[space_].name));
}

/// Balanced or inertial: the period of the gas spring against the time scale of the run.
void Piston::advise(Layout& layout, const SpaceInfo& space) const {
  const double mass = layout.inputs[mass_input_].signal.at(0.0);
  if (!(mass > 0.0) || motion_ == Motion::driven) return;
  const std::vector<double> fraction = layout.mass_fractions(space.composition);
  const double gamma =
      heat_capacity_ratio(layout.mixture.from_temperature(fraction.data(), space.temperature, *space.pressure));
  const double stiffness = gas_spring_stiffness(gamma, *space.pressure, area_, space.volume) + stiffness_;
  const double period = oscillation_period(mass, stiffness);
  layout.facts.push_back({name, "oscillation period on the gas", period, unit_kinds::time});
  layout.facts.push_back({name, "area", area_, unit_kinds::area});
  if (motion_ == Motion::balanced && period > 0.01 * layout.run_length)
    layout.advice.push_back(
        fmt::format("{}: it swings with a period of {:.3g} s, not far below the run's {:.3g} s: motion: inertial shows "
                    "what balanced hides",
                    name, period, layout.run_length));
  if (motion_ == Motion::inertial && period < 1e-5 * layout.run_length && friction_.viscous <= 0.0)
    layout.advice.push_back(fmt::format(
        "{}: it swings with a period of {:.3g} s in a run of {:.3g} s: motion: balanced is far quicker to compute",
        name, period, layout.run_length));
}

void Piston::connect(Layout& layout) {
  const SpaceInfo* space = layout.space(closes_);
  const SpaceInfo* back = layout.space(back_reference_);
  if (space == nullptr) return;
  space_ = space->index;
  space_store_ = space->store;
  if (back != nullptr) {
    back_space_ = back->index;
    back_store_ = back->store;
  }
  gravity_ = layout.gravity * std::cos(tilt_);
  const double column = space->volume / area_;
  const double reach = has_stops_ ? std::min(high_ - low_, column) : column;
  contact_slack_ = 1e-12 * std::max(reach, std::abs(at_));
  if (motion_ != Motion::driven || driven_by_flow_) position_state_ = layout.add_state(name + ".travel", 0.1 * reach);
  mass_input_ = layout.add_input(name + ".mass", unit_kinds::mass, mass_spec_, 0.0, place);
  force_input_ = layout.add_input(name + ".force", unit_kinds::force, force_spec_, 0.0, place);
  mass_ramps_ = mass_spec_.kind == SignalSpec::Kind::ramp || mass_spec_.kind == SignalSpec::Kind::sine ||
                (mass_spec_.kind == SignalSpec::Kind::schedule && !mass_spec_.held);
  if (motion_ == Motion::inertial) {
    const double gas_stiffness = *space->pressure * area_ / column;
    const double frequency = std::sqrt((gas_stiffness + stiffness_) / layout.inputs[mass_input_].signal.at(0.0));
    velocity_state_ = layout.add_state(name + ".velocity", 0.1 * reach * frequency, start_velocity_);
    const double speed = std::max(0.1 * reach * frequency, std::abs(start_velocity_));
    kinetic_scale_ = 0.5 * layout.inputs[mass_input_].signal.at(0.0) * speed * speed;
  }
  if (position_spec_.given)
    position_input_ = layout.add_input(name + ".position", unit_kinds::length, position_spec_, at_, place);
  if (flow_spec_.given) flow_input_ = layout.add_input(name + ".flow", unit_kinds::liquid_flow, flow_spec_, 0.0, place);
  if (back_spec_.given)
    back_input_ =
        layout.add_input(name + ".back.pressure", unit_kinds::pressure, back_spec_, layout.atmosphere_pressure, place);
  find_receiver(layout);

  advise(layout, *space);

  const double work = 0.1 * *space->pressure * space->volume;  // J: what the ledger's terms are judged by
  const auto entry = [&](LedgerTerm term) { return layout.ledger(term, name, work); };
  lifting_entry_ = entry(LedgerTerm::lifting);
  if (stiffness_ > 0.0) spring_entry_ = entry(LedgerTerm::spring);
  if (back_input_ >= 0)
    back_entry_ = entry(LedgerTerm::back);
  else if (back_space_ < 0)
    atmosphere_entry_ = entry(LedgerTerm::atmosphere);
  applied_entry_ = entry(LedgerTerm::applied);
  friction_entry_ = entry(LedgerTerm::friction);
  kinetic_entry_ = entry(LedgerTerm::kinetic);
  impact_entry_ = entry(LedgerTerm::impact);
  if (heat_store_ >= 0) returned_entry_ = entry(LedgerTerm::returned);
  channel_ = layout.add_channel(name + ".position", unit_kinds::length, "position x; grows with the space it closes",
                                ChannelPhase::state, length_unit_);
  layout.add_channel(name + ".velocity", unit_kinds::velocity, "velocity",
                     motion_ == Motion::balanced ? ChannelPhase::flow : ChannelPhase::state);
}

void Piston::start(Event& e) {
  const Workspace<double>& w = *e.before;
  const double x = w.out[channel_];
  mode_ = Mode::free;
  kinetic_carried_away_ = 0.0;
  spring_at_start_ = spring_energy(w);
  if (motion_ == Motion::driven) return;
  const double net = net_force(w), held = friction_.breakaway;
  const bool moves = motion_ == Motion::inertial && start_velocity_ != 0.0;
  if (moves)
    mode_ = has_static_friction() ? (start_velocity_ > 0.0 ? Mode::outward : Mode::inward) : Mode::free;
  else if (has_stops_ && x <= low_ + contact_slack_ && net <= held)
    mode_ = Mode::low_stop;
  else if (has_stops_ && x >= high_ - contact_slack_ && net >= -held)
    mode_ = Mode::high_stop;
  else if (!has_static_friction())
    mode_ = Mode::free;
  else if (std::abs(net) <= held)
    mode_ = Mode::stuck;
  else
    mode_ = net > 0.0 ? Mode::outward : Mode::inward;
  kinetic_at_start_ = kinetic_energy(w);
}

void Piston::guards(const Workspace<double>& w, double* g) const {
  for (int i = 0; i < 5; ++i) g[i] = -1.0;
  const double x = w.out[channel_], v = w.out[channel_ + 1];
  if (motion_ == Motion::driven) {
    if (!driven_by_flow_ || !has_stops_) return;
    const double push = -w.input[flow_input_];
    if (mode_ == Mode::low_stop)
      g[3] = push;
    else if (mode_ == Mode::high_stop)
      g[4] = -push;
    else {
      g[0] = low_ - x - contact_slack_;
      g[1] = x - high_ - contact_slack_;
    }
    return;
  }
  if (moving()) {
    if (has_stops_ && mode_ != Mode::outward) g[0] = low_ - x - contact_slack_;
    if (has_stops_ && mode_ != Mode::inward) g[1] = x - high_ - contact_slack_;
    if (direction() != 0.0) g[2] = -direction() * v;
    return;
  }
  const double net = net_force(w), held = friction_.breakaway;
  if (mode_ != Mode::high_stop) g[3] = net - held;
  if (mode_ != Mode::low_stop) g[4] = -net - held;
}

/// The contact is found a rounding beyond the stop: left there, the piston would meet the stop again on leaving it.
void Piston::lie_on(Mode stop, Event& e) {
  mode_ = stop;
  e.y[position_state_] = (stop == Mode::low_stop ? low_ : high_) - at_;
}

void Piston::rest_at(Mode stop, Event& e) {
  const double v = e.before->out[channel_ + 1];
  lie_on(stop, e);
  e.log(name, stop == Mode::low_stop ? "rests on low stop" : "rests on high stop", v, 0.0);
}

void Piston::collide(bool low, Event& e) {
  const Mode stop = low ? Mode::low_stop : Mode::high_stop;
  if (motion_ != Motion::inertial) {
    rest_at(stop, e);
    return;
  }
  const Workspace<double>& w = *e.before;
  const double before = w.out[channel_ + 1], mass = w.input[mass_input_];
  double after = -restitution_ * before;
  if (std::abs(after) < rest_speed) after = 0.0;
  e.y[velocity_state_] = after;
  const double lost = 0.5 * mass * (before * before - after * after);
  e.book(kinetic_entry_, -lost);
  e.book(impact_entry_, lost);
  e.generate(Mechanism::impact, lost / w.ambient_temperature);
  e.carry_entropy(-lost / w.ambient_temperature);
  if (after == 0.0)
    lie_on(stop, e);
  else if (has_static_friction())
    mode_ = low ? Mode::outward : Mode::inward;
  e.log(name,
        after == 0.0 ? (low ? "comes to rest on low stop" : "comes to rest on high stop")
                     : (low ? "hits low stop" : "hits high stop"),
        before, after);
}

void Piston::come_to_rest(Event& e) {
  const double net = net_force(*e.before), v = e.before->out[channel_ + 1];
  if (motion_ == Motion::inertial) {
    e.y[velocity_state_] = 0.0;
    if (std::abs(net) > friction_.breakaway) {
      mode_ = net > 0.0 ? Mode::outward : Mode::inward;
      e.log(name, "turns", v, 0.0);
      return;
    }
  }
  mode_ = Mode::stuck;
  e.log(name, "sticks", v, 0.0);
}

void Piston::on_guard(int which, Event& e) {
  if (which <= 1) {
    collide(which == 0, e);
    return;
  }
  if (which == 2) {
    come_to_rest(e);
    return;
  }
  const bool from_stop = mode_ == Mode::low_stop || mode_ == Mode::high_stop;
  mode_ =
      !has_static_friction() || motion_ == Motion::driven ? Mode::free : (which == 3 ? Mode::outward : Mode::inward);
  e.log(name,
        from_stop ? (which == 3 ? "leaves low stop" : "leaves high stop")
                  : (which == 3 ? "slips outward" : "slips inward"),
        0.0, 0.0);
}

void Piston::on_inputs_changed(Event& e) {
  const double mass_before = e.before->input[mass_input_];
  const Workspace<double>& w = e.now();
  const double mass_after = w.input[mass_input_];
  if (motion_ == Motion::inertial && mass_after != mass_before) {
    const double v = e.before->out[channel_ + 1];
    double v_after = v;
    if (mass_after > mass_before) {
      v_after = v * mass_before / mass_after;  // the load arrives at rest: momentum is kept
      const double lost = 0.5 * mass_before * v * v - 0.5 * mass_after * v_after * v_after;
      e.y[velocity_state_] = v_after;
      e.book(kinetic_entry_, -lost);
      e.book(impact_entry_, lost);
      e.generate(Mechanism::impact, lost / w.ambient_temperature);
      e.carry_entropy(-lost / w.ambient_temperature);
    } else {
      kinetic_carried_away_ += 0.5 * (mass_before - mass_after) * v * v;
    }
    e.log(name, mass_after > mass_before ? "load arrives" : "load leaves", v, v_after);
  }
  if (motion_ != Motion::balanced || friction_.viscous > 0.0 || !moving()) return;
  // Moving against friction: the jump may leave it stuck, or turn it round.
  if (!has_static_friction()) return;
  const double net = net_force(w);
  if (std::abs(net - direction() * friction_.kinetic) < 1e-9 * w.gas[space_].pressure * area_) return;
  if (net > friction_.breakaway)
    mode_ = Mode::outward;
  else if (net < -friction_.breakaway)
    mode_ = Mode::inward;
  else
    mode_ = Mode::stuck;
}

double Piston::kinetic_energy(const Workspace<double>& w) const {
  if (motion_ != Motion::inertial) return 0.0;
  const double v = moving() ? w.y[velocity_state_] : 0.0;
  return 0.5 * w.input[mass_input_] * v * v;
}

double Piston::spring_energy(const Workspace<double>& w) const {
  const double stretch = w.out[channel_] - free_at_;
  return 0.5 * stiffness_ * stretch * stretch;
}

}  // namespace gaskettle
