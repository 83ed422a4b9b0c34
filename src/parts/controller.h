/// An automatic controller: on/off with a dead band, or proportional-integral.
///
///   error e = setpoint - reading   (reverse action: output falls as the reading rises)
///   on/off: on where e rises through half the dead band, off where it falls through minus half
///   PI:     output = gain (e + I / reset_time), dI/dt = e, I = 0 at the start
/// At a limit of what it drives the output is held and the integral frozen ("limited").
/// Where freezing alone would make the free output fall back in and freeing it push out
/// again, the integral follows the limit ("held"): I = reset_time (limit / gain - e).
/// Source: K. J. Astrom and T. Hagglund, Advanced PID Control, 2006, chapter 3 (windup).
#pragma once
#include "model/workspace.h"

namespace gaskettle {

class Controller {
public:
  static constexpr const char* section = "controllers";
  static constexpr const char* kind = "controller";
  static constexpr const char* meaning = "drives a heater, an opening or a stirrer to hold a reading";
  enum class Mode { off, on, free, limited_high, held_high, limited_low, held_low };

  std::string name;
  Place place;

  void read(Section& s);
  void declare(Layout&) {}
  void connect(Layout& layout);
  void start(Event& e);

  template <class S>
  void control(Workspace<S>& w) const {
    S output = S(low_);
    switch (mode_) {
      case Mode::off:
      case Mode::limited_low:
      case Mode::held_low:
        break;
      case Mode::on:
      case Mode::limited_high:
      case Mode::held_high:
        output = S(high_);
        break;
      case Mode::free:
        output = unlimited(w);
        break;
    }
    w.input[driven_] = output;
    w.out[channel_] = output;
    w.out[channel_ + 1] = w.input[setpoint_];
  }
  template <class S>
  void finish(Workspace<S>& w) const {
    if (integral_ >= 0) w.f[integral_] = mode_ == Mode::free ? error(w) : S(0.0);
  }

  int mode() const { return static_cast<int>(mode_); }
  static constexpr std::array guard_names = {"switches, or meets or leaves a limit", "meets or leaves the other limit"};
  static constexpr bool guards_disturb = true;
  void guards(const Workspace<double>& w, double* g) const;
  /// The guards of a held output need rates of change.
  bool needs_rate() const { return mode_ == Mode::held_high || mode_ == Mode::held_low; }
  void on_guard(int which, Event& e);
  /// The setpoint may have jumped.
  void on_inputs_changed(Event& e);

private:
  template <class S>
  S error(const Workspace<S>& w) const {
    return sense_ * (w.input[setpoint_] - w.out[reading_]);
  }
  template <class S>
  S unlimited(const Workspace<S>& w) const {
    return gain_ * (error(w) + w.y[integral_] / reset_time_);
  }
  double error_rate(const Workspace<double>& w, double reading_rate) const {
    return sense_ * (w.slope_of_input(setpoint_) - reading_rate);
  }
  void read_by(const UnitKind& held, const UnitKind& driven);
  void rest_on_limit(bool high, Event& e);

  Reference drives_, holds_;
  SignalSpec setpoint_spec_;
  const Node *at_node_ = nullptr, *by_node_ = nullptr;
  std::string path_;
  ReadContext* context_ = nullptr;
  bool on_off_ = false, reverse_ = true;
  double sense_ = 1.0, dead_band_ = 0.0, gain_ = 0.0, reset_time_ = 1.0, low_ = 0.0, high_ = 0.0;
  Mode mode_ = Mode::free;
  int driven_ = 0, reading_ = 0, setpoint_ = 0, integral_ = -1, channel_ = 0;
};

}  // namespace gaskettle
