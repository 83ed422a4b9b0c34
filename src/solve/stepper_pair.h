/// The two methods behind one face: which one steps is decided here.
#pragma once
#include <algorithm>
#include <cmath>
#include <vector>

#include "solve/explicit5.h"
#include "solve/initial_step.h"
#include "solve/rodas5p.h"
#include "solve/stiffness.h"
#include "solve/take_step.h"

namespace gaskettle {

/// Steps a problem between events. Sequence: restart, then any number of
/// (step, perhaps repeat or refuse, then go_on), then restart after a disturbance.
template <OdeProblem P>
class StepperPair {
public:
  StepperPair(P& problem, const Settings& settings, Statistics& stats)
      : problem_(problem), settings_(settings), stats_(stats), stiff_(settings.method != Method::explicit_) {
    stats_.limiting.assign(problem.size(), 0);
    second_.resize(problem.size());
    probe_.resize(problem.size());
  }

  /// Prepares at (t, y) and finds a step, since what came before says little now.
  /// The report is of the rates there.
  StepReport restart(double t, const double* y) {
    ready_ = false;
    control_.restart();
    const StepReport report = prepare(t, y);
    if (!report.accepted) return report;
    const double guess = std::max(first_guess(), 4 * smallest_step(t, settings_.t_end));
    if (h_ == 0)
      h_ = settings_.first_step > 0 ? settings_.first_step : std::min(guess, 1e-2 * settings_.t_end);
    else
      h_ = std::min(boldness * guess, 4 * h_);
    return report;
  }

  /// One accepted step from (t, y) to at most `latest`, or the reason why there is none.
  StepReport step(double t, const double* y, double latest) {
    StepReport report = prepare(t, y);
    if (!report.accepted) return report;
    h_ = std::min(h_, settings_.h_max);
    const StepLimits limits{latest, settings_.rtol, settings_.t_end, settings_.max_steps};
    with_core([&](auto& core) { report = take_step(core, problem_, control_, h_, limits, stats_); });
    if (report.accepted) ++(stiff_ ? stats_.steps_stiff : stats_.steps_explicit);
    return report;
  }

  /// The last step again, to another end. False where that fails; then only another repeat makes sense.
  bool repeat(double t1) {
    Attempt attempt;
    with_core([&](auto& core) { attempt = core.attempt(problem_, t1, stats_); });
    return attempt.failure == Failure::none;
  }

  /// Takes the last step back: the next one starts at the same place and is shorter.
  /// False when it would be too short.
  bool refuse() {
    h_ = control_.after_failure(end() - begin());
    --stats_.steps;
    --(stiff_ ? stats_.steps_stiff : stats_.steps_explicit);
    ++stats_.rejected;
    return h_ >= smallest_step(begin(), settings_.t_end);
  }

  /// Moves on to wherever the next step starts. `at_end`: exactly at the end of the last one.
  void go_on(bool at_end) {
    ready_ = false;
    if (settings_.method == Method::automatic && at_end && change_method()) return;
    if (!stiff_ && at_end) {
      explicit_.start_at_end();
      ready_ = true;
    }
  }

  DenseStep curve() { return stiff_ ? rodas_.curve() : explicit_.curve(); }
  double begin() const { return stiff_ ? rodas_.begin() : explicit_.begin(); }
  double end() const { return stiff_ ? rodas_.end() : explicit_.end(); }
  const double* end_state() const { return stiff_ ? rodas_.end_state() : explicit_.end_state(); }
  double planned_step() const { return h_; }

private:
  /// After an event the guess is stretched: the full-order step to each event and the
  /// error test stand behind it, and a rejection costs less than many short steps.
  static constexpr double boldness = 2.5;

  template <class F>
  void with_core(F&& f) {
    if (stiff_)
      f(rodas_);
    else
      f(explicit_);
  }

  StepReport prepare(double t, const double* y) {
    if (ready_) return {};
    Attempt start;
    with_core([&](auto& core) { start = core.start(problem_, t, y, stats_); });
    if (start.failure != Failure::none) return {false, EndReason::not_finite, start.failure, start.state};
    if (stiff_ && settings_.method == Method::automatic)
      fastest_rate_ = spectrum_.update(rodas_, problem_.size(), problem_.typical_size());
    ready_ = true;
    return {};
  }

  double first_guess() {
    const int n = problem_.size();
    const double* typical = problem_.typical_size();
    if (stiff_) {
      rodas_.second_derivative(second_.data());
      return initial_step(n, rodas_.begin_state(), rodas_.begin_rates(), second_.data(), typical, settings_.rtol);
    }
    const double* y = explicit_.begin_state();
    const double* f = explicit_.begin_rates();
    const double h = std::min(probe_step(n, y, f, typical, settings_.rtol), settings_.h_max);
    for (int i = 0; i < n; ++i) probe_[i] = y[i] + h * f[i];
    const double t = explicit_.begin() + h;
    if (!problem_.admissible(t, probe_.data())) return 0.1 * h;
    problem_.rates(t, probe_.data(), second_.data());
    ++stats_.rate_calls;
    for (int i = 0; i < n; ++i) second_[i] = (second_[i] - f[i]) / h;
    return initial_step(n, y, f, second_.data(), typical, settings_.rtol);
  }

  bool change_method() {
    const bool change = stiff_ ? choice_.leave_stiff(h_ * fastest_rate_)
                               : choice_.leave_explicit(explicit_.stiffness(problem_.typical_size()));
    if (!change) return false;
    stiff_ = !stiff_;
    ++stats_.method_changes;
    control_.restart();
    return true;
  }

  P& problem_;
  const Settings& settings_;
  Statistics& stats_;
  bool stiff_;
  bool ready_ = false;  // the method in use has been started at the current time and state
  double h_ = 0;        // planned, s
  double fastest_rate_ = 0;
  Rodas5p rodas_;
  Explicit5 explicit_;
  StepControl control_;
  SpectralEstimate spectrum_;
  MethodChoice choice_;
  std::vector<double> second_, probe_;
};

}  // namespace gaskettle
