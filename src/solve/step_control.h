/// From the error of one step to the length of the next.
#pragma once

namespace gaskettle {

/// Why an attempt at a step gave no state to judge.
enum class Failure { none, rates_not_finite, not_physical, singular_matrix };

/// The outcome of one attempt, before its error is judged.
struct Attempt {
  Failure failure = Failure::none;
  int state = -1;  ///< the state at fault, where one is known
};

/// Proportional-integral control of the step for error estimates of order h^5.
///
/// Source: K. Gustafsson, Control-theoretic techniques for stepsize selection in
/// explicit Runge-Kutta methods, ACM Trans. Math. Softw. 17 (1991) 533-554. The
/// exponents 0.7/5 and 0.4/5 are those given in E. Hairer, G. Wanner, Solving Ordinary
/// Differential Equations II, section IV.2.
class StepControl {
public:
  /// Forgets the past: after an event the error before it says nothing.
  void restart();
  /// Length of the next step after one of length h with error size <= 1.
  double after_accepted(double h, double error);
  /// Length to try after an error size > 1; +infinity (or NaN) shortens most.
  double after_rejected(double h, double error);
  /// Length to try after an attempt that failed altogether.
  double after_failure(double h);

private:
  double previous_error_ = 1e-4;
  bool rejected_ = false;
};

/// Steps shorter than this make no progress worth having at time t in a run of that length, s.
double smallest_step(double t, double run_length);

/// End of a step of about h from t: never beyond `limit`, on it rather than just
/// short of it, and with the rest of the way shared evenly when two steps would do.
double step_end(double t, double h, double limit);

}  // namespace gaskettle
