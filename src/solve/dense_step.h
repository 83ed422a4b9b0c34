/// One accepted step as a curve: the state at any time inside it.
#pragma once

namespace gaskettle {

/// A light view of a stepper's last step; valid until that stepper steps again.
/// The curve is a linear combination of stage values, so it keeps the linear
/// invariants of the rates, and it meets the states at both ends exactly.
class DenseStep {
public:
  /// Writes the state at time t to y.
  using Evaluate = void (*)(const void* stepper, double t, double* y);

  DenseStep(double begin, double end, const void* stepper, Evaluate evaluate)
      : begin_(begin), end_(end), stepper_(stepper), evaluate_(evaluate) {}

  /// Time at which the step starts, s.
  double begin() const { return begin_; }
  /// Time at which the step ends, s. An event may cut a step short: then only
  /// the piece up to the event belongs to the run.
  double end() const { return end_; }
  /// The state at t in [begin(), end()], accurate to fourth order, written to y[0..n-1].
  void interpolate(double t, double* y) const { evaluate_(stepper_, t, y); }

private:
  double begin_, end_;
  const void* stepper_;
  Evaluate evaluate_;
};

}  // namespace gaskettle
