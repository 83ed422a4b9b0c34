/// Attempts until one is good enough: the loop shared by every stepper.
#pragma once
#include <algorithm>

#include "solve/error_norm.h"
#include "solve/problem.h"
#include "solve/settings.h"
#include "solve/step_control.h"

namespace gaskettle {

/// How a step went. When it was not accepted, `reason` says why the run cannot go on.
struct StepReport {
  bool accepted = true;
  EndReason reason = EndReason::end_time;
  Failure failure = Failure::none;  ///< of the last attempt
  int state = -1;                   ///< state at fault or limiting the step
};

/// What bounds a step.
struct StepLimits {
  double latest = 0;  ///< the step ends at or before this time, s
  double rtol = 1e-8;
  double run_length = 0;  ///< s, scale of the smallest step
  long most_attempts = 0;
};

/// One accepted step of `core`, which has been started. `h` is the planned length and
/// becomes that of the next step.
template <class Core, OdeProblem P>
StepReport take_step(Core& core, P& problem, StepControl& control, double& h, const StepLimits& limits,
                     Statistics& stats) {
  StepReport report;
  const int n = problem.size();
  for (;;) {
    if (stats.steps + stats.rejected >= limits.most_attempts)
      return {false, EndReason::budget, report.failure, report.state};
    const double t1 = step_end(core.begin(), h, limits.latest), tried = t1 - core.begin();
    const Attempt attempt = core.attempt(problem, t1, stats);
    report.failure = attempt.failure;
    report.state = attempt.state;
    if (attempt.failure != Failure::none) {
      h = control.after_failure(tried);
    } else {
      const ErrorSize error =
          error_size(n, core.error(), core.begin_state(), core.end_state(), problem.typical_size(), limits.rtol);
      report.state = error.limiting;
      if (error.limiting >= 0) ++stats.limiting[error.limiting];
      if (error.value <= 1) {
        const double next = control.after_accepted(tried, error.value);
        // A step cut by the limit says nothing against the longer one that was planned.
        h = next > tried ? std::max(next, h) : next;
        ++stats.steps;
        return report;
      }
      h = control.after_rejected(tried, error.value);
    }
    ++stats.rejected;
    if (h < smallest_step(core.begin(), limits.run_length)) break;
  }
  report.accepted = false;
  report.reason = report.failure == Failure::rates_not_finite ? EndReason::not_finite : EndReason::step_too_small;
  return report;
}

}  // namespace gaskettle
