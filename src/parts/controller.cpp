#include "parts/controller.h"

#include <fmt/format.h>

#include <cmath>

namespace gaskettle {

void Controller::read(Section& s) {
  drives_ = s.reference("drives", "input of a part", "heater.power, port.opening, stirrer.speed, ...", true);
  holds_ = s.reference("holds", "sensor or channel", "what it compares with the setpoint", true);
  // The setpoint has the unit of what is held, the gain that of what is driven by it: known when all parts are
  // connected.
  at_node_ = s.raw("at", "setpoint in the unit of what is held; may vary in time",
                   "setpoint; a ramp starts from what the controller reads", true);
  reverse_ = s.choice("action", {"reverse", "direct"}, "reverse: the output falls as the reading rises", "reverse") ==
             "reverse";
  sense_ = reverse_ ? 1.0 : -1.0;
  path_ = s.path();
  context_ = &s.context();
  if (auto by = s.child("by", "the control law", true)) {
    by_node_ = by->node();
    by->exactly_one_of({"on_off", "pi", "pid"});
    by->raw("on_off", "{dead_band}", "full on or off; dead_band is its total width, centred on the setpoint; starts on",
            false);
    by->raw("pi", "{gain, reset_time}", "output = gain (e + integral of e dt / reset_time)", false);
    by->not_built_yet("pid", "PID in the standard form");
    if (s.describing()) {  // read once the units of what is held and driven are known
      Section(*context_, path_ + ".by.on_off")
          .raw("dead_band", "difference of what is held", "total width, centred on the setpoint", true);
      Section pi(*context_, path_ + ".by.pi");
      pi.raw("gain", "unit of what is driven per unit of what is held", "output per error", true);
      pi.raw("reset_time", "time", "of the integral", true);
    }
  }
}

void Controller::read_by(const UnitKind& held, const UnitKind& driven) {
  if (by_node_ == nullptr) return;
  if (const Node* n = by_node_->find("on_off")) {
    on_off_ = true;
    Section law(*context_, n, path_ + ".by.on_off");
    dead_band_ =
        law.quantity("dead_band", difference_kind(held), "total width, centred on the setpoint", Range::positive);
  } else if (const Node* pi = by_node_->find("pi")) {
    Section law(*context_, pi, path_ + ".by.pi");
    gain_ = law.quantity("gain", ratio(driven, held), "output per error", Range::positive);
    reset_time_ = law.quantity("reset_time", unit_kinds::time, "of the integral", Range::positive);
  }
}

void Controller::connect(Layout& layout) {
  if (!drives_.given() || !holds_.given() || at_node_ == nullptr) return;
  driven_ = layout.input(drives_);
  reading_ = layout.channel(holds_);
  if (driven_ < 0 || reading_ < 0) return;
  const InputInfo driven = layout.inputs[driven_];  // a copy: the list grows below
  const ChannelDoc held = layout.channels[reading_];
  if (driven.driver >= 0)
    layout.error(drives_.place, fmt::format("'{}' is already driven by another controller", drives_.name));
  if (driven.given)
    layout.error(drives_.place,
                 fmt::format("'{}' has a value of its own in the model and is driven by controller '{}': leave one out",
                             drives_.name, name));
  if (held.phase != ChannelPhase::state)
    layout.error(holds_.place,
                 fmt::format("controller '{}' cannot hold '{}' directly; put a sensor with a time_constant between",
                             name, holds_.name));
  low_ = driven.low;
  high_ = driven.high;
  // A cooler's power is negative: full output is the lower end.
  if (low_ < 0.0 && high_ == 0.0) std::swap(low_, high_);
  read_by(held.kind, driven.kind);
  // Falling output of a cooler is more cooling: "on" is its low end. A PI output has its sign already.
  if (on_off_ && high_ < low_) sense_ = -sense_;
  const SignalSpec at = read_signal(*context_, *at_node_, path_ + ".at", held.kind);
  setpoint_ = layout.add_input(name + ".setpoint", held.kind, at, 0.0, place);
  setpoint_spec_ = at;
  layout.inputs[driven_].driver = static_cast<int>(layout.channels.size());
  // The plant is evaluated once before any part's start: an on/off controller has no integral to look at then.
  mode_ = on_off_ ? Mode::on : Mode::free;
  if (!on_off_)
    integral_ =
        layout.add_state(name + ".integral", (held.kind.flavour == UnitFlavour::pressure ? 1e4 : 10.0) * reset_time_);
  channel_ =
      layout.add_channel(name + ".output", driven.kind, "output, as it drives " + drives_.name, ChannelPhase::state);
  layout.add_channel(name + ".setpoint", held.kind, "setpoint", ChannelPhase::state, held.unit);
}

void Controller::start(Event& e) {
  const double reading = e.before->out[reading_];
  if (setpoint_spec_.kind == SignalSpec::Kind::ramp) e.layout->inputs[setpoint_].signal = setpoint_spec_.make(reading);
  if (on_off_) {
    const double error = sense_ * (e.layout->inputs[setpoint_].signal.at(0.0) - reading);
    mode_ = error > -0.5 * dead_band_ ? Mode::on : Mode::off;
    return;
  }
  mode_ = Mode::free;
  const double output = unlimited(e.now());
  if ((output - high_) * (high_ - low_) >= 0.0)
    rest_on_limit(true, e);
  else if ((low_ - output) * (high_ - low_) > 0.0)
    rest_on_limit(false, e);
}

void Controller::guards(const Workspace<double>& w, double* g) const {
  g[0] = g[1] = -1.0;
  if (on_off_) {
    const double outward = error(w);
    g[0] = mode_ == Mode::on ? -outward - 0.5 * dead_band_ : outward - 0.5 * dead_band_;
    return;
  }
  // In terms of a direct, rising output: mirrored where the driven range falls (a cooler).
  const double up = high_ > low_ ? 1.0 : -1.0;
  if (mode_ == Mode::held_high || mode_ == Mode::held_low) {
    const double end = (mode_ == Mode::held_high ? 1.0 : -1.0) * up * (gain_ > 0.0 ? 1.0 : -1.0);
    const double rate = error_rate(w, w.out_rate[reading_]);
    g[0] = -end * (rate + error(w) / reset_time_);  // free again
    g[1] = end * rate;                              // limited
    return;
  }
  const double output = unlimited(w);
  if (mode_ == Mode::free) {
    g[0] = up * (output - high_);
    g[1] = up * (low_ - output);
  } else if (mode_ == Mode::limited_high) {
    g[0] = up * (high_ - output);
  } else {
    g[0] = up * (output - low_);
  }
}

/// At the limit, where freezing the integral would let the output fall back in, it follows the limit.
/// Well beyond the limit (a step of the setpoint) the integral is frozen as it is.
void Controller::rest_on_limit(bool high, Event& e) {
  const Workspace<double>& w = e.now();
  const double end = (high ? 1.0 : -1.0) * (high_ > low_ ? 1.0 : -1.0);
  const double beyond = end * (unlimited(w) - (high ? high_ : low_));
  const bool would_fall_back =
      beyond < 1e-6 * std::abs(high_ - low_) && end * error_rate(w, e.channel_rate(reading_)) < 0.0;
  if (would_fall_back)
    mode_ = high ? Mode::held_high : Mode::held_low;
  else
    mode_ = high ? Mode::limited_high : Mode::limited_low;
}

void Controller::on_guard(int which, Event& e) {
  const double before = e.before->out[channel_];
  if (on_off_) {
    mode_ = mode_ == Mode::on ? Mode::off : Mode::on;
    e.log(name, mode_ == Mode::on ? "switches on" : "switches off", before, e.now().out[channel_]);
    return;
  }
  const Mode old = mode_;
  const bool high = old == Mode::limited_high || old == Mode::held_high || (old == Mode::free && which == 0);
  const double end = (high ? 1.0 : -1.0) * (high_ > low_ ? 1.0 : -1.0);
  if (old == Mode::held_high || old == Mode::held_low) {
    // A hair to the side it goes on from: at the limit itself rounding would send it back at once, without end.
    const double hair = 1e-10 * std::abs(high_ - low_) * (which == 0 ? -end : end);
    e.y[integral_] = reset_time_ * (((high ? high_ : low_) + hair) / gain_ - error(*e.before));
  }
  if (old == Mode::free) {
    rest_on_limit(high, e);
    e.log(name, high ? "reaches its upper limit" : "reaches its lower limit", before, high ? high_ : low_);
    return;
  }
  if ((old == Mode::held_high || old == Mode::held_low) && which == 1) {
    mode_ = high ? Mode::limited_high : Mode::limited_low;
    return;
  }
  mode_ = Mode::free;
  const Workspace<double>& w = e.now();
  const double push = error_rate(w, e.channel_rate(reading_)) + error(w) / reset_time_;
  if (old != Mode::held_high && old != Mode::held_low && end * push > 0.0) {
    mode_ = high ? Mode::held_high : Mode::held_low;  // free would push out again at once
    return;
  }
  e.log(name, high ? "leaves its upper limit" : "leaves its lower limit", before, e.now().out[channel_]);
}

void Controller::on_inputs_changed(Event& e) {
  if (mode_ != Mode::held_high && mode_ != Mode::held_low) return;
  if (e.now().input[setpoint_] == e.before->input[setpoint_]) return;
  // The setpoint has jumped: the integral stays where the limit had led it, and the output answers to the jump.
  const bool high = mode_ == Mode::held_high;
  const double limit = high ? high_ : low_, end = (high ? 1.0 : -1.0) * (high_ > low_ ? 1.0 : -1.0);
  e.y[integral_] = reset_time_ * (limit / gain_ - error(*e.before));
  mode_ = Mode::free;
  const double output = unlimited(e.now());
  if (end * (output - limit) > 0.0)
    mode_ = high ? Mode::limited_high : Mode::limited_low;
  else
    e.log(name, high ? "leaves its upper limit" : "leaves its lower limit", limit, output);
}

}  // namespace gaskettle
