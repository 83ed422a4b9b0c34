/// An input that may vary in time: constant, schedule, ramp or sine.
#pragma once
#include <cmath>
#include <vector>

#include "base/scalar.h"

namespace gaskettle {

/// A known function of time, in SI units.
///
/// A schedule is evaluated on its active segment, continued smoothly past the
/// segment's end; the segment changes only in `advance`, which the run calls when
/// a time event has been reached. So no step ever crosses a corner.
class Signal {
public:
  Signal() = default;
  static Signal constant(double level);
  /// (time, value) points with times that do not decrease; two points at one time
  /// are a jump. Held: each value lasts until the next. `repeats` 0 runs once,
  /// n runs n times, -1 for ever. Before and after, the end values hold.
  static Signal schedule(std::vector<std::pair<double, double>> points, bool held, long repeats);
  /// From `from` at time 0 to `to` at `rate` (a magnitude, per second); then it stays.
  static Signal ramp(double from, double to, double rate);
  static Signal sine(double mean, double amplitude, double frequency_hz);

  /// Value at time t on the active segment.
  template <Scalar S>
  S at(const S& t) const {
    using std::sin;
    if (sine_) return mean_ + amplitude_ * sin(omega_ * t);
    return level_ + slope_ * (t - start_);
  }
  /// Rate of change at t, per second.
  template <Scalar S>
  S slope(const S& t) const {
    using std::cos;
    if (sine_) return amplitude_ * omega_ * cos(omega_ * t);
    return S(slope_);
  }
  /// The first corner strictly after t, or infinity.
  double next_corner(double t) const;
  /// Makes active the segment that holds from t on.
  void advance(double t);
  /// Least and greatest value it ever takes.
  std::pair<double, double> range() const;
  bool varies() const { return sine_ || points_.size() > 1; }

private:
  double repetition(double t) const;
  double time_of(std::size_t i, double n) const;

  std::vector<std::pair<double, double>> points_;
  bool held_ = false;
  long repeats_ = 0;
  double level_ = 0.0, slope_ = 0.0, start_ = 0.0;
  bool sine_ = false;
  double mean_ = 0.0, amplitude_ = 0.0, omega_ = 0.0;
};

/// A time-varying value as written in the model, before it is known what a ramp starts from.
struct SignalSpec {
  enum class Kind { constant, schedule, ramp, sine };
  Kind kind = Kind::constant;
  bool given = false;
  bool sound = true;   // false: its reading was reported, and its numbers mean nothing
  double level = 0.0;  // constant; mean of a sine
  std::vector<std::pair<double, double>> points;
  bool held = false;
  long repeats = 0;
  double ramp_to = 0.0, ramp_rate = 0.0;
  bool has_ramp_from = false;
  double ramp_from = 0.0;
  double amplitude = 0.0, frequency = 0.0;

  /// `start`: what a ramp without a start of its own begins at.
  Signal make(double start) const;
  /// Value at time 0 (of a ramp: `start`).
  double initial(double start) const;
};

}  // namespace gaskettle
