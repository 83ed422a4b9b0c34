/// Runs a hybrid problem from t = 0 to its end: steps, events, restarts.
#pragma once
#include <stdexcept>
#include <string>
#include <vector>

#include "solve/hybrid_run.h"

namespace gaskettle {

/// Integrates from t = 0 until settings.t_end, a stop condition, or something that
/// makes going on pointless (see EndReason). `y` holds the initial state and is
/// left holding the last one. The problem is in a consistent mode at the start; guards
/// above zero there fire at t = 0. Time events and guards at t_end itself still happen.
/// Throws std::invalid_argument for settings out of range or a state of the wrong size; a run that
/// cannot go on is an Ending, not an exception.
template <HybridProblem P, RunObserver O>
Ending integrate(P& problem, O& observer, const Settings& settings, std::vector<double>& y) {
  check_settings(settings);
  if (static_cast<int>(y.size()) != problem.size())
    throw std::invalid_argument("an initial state of " + std::to_string(y.size()) + " values for a problem of " +
                                std::to_string(problem.size()) + " states");
  return HybridRun<P, O>(problem, observer, settings, y).run();
}

}  // namespace gaskettle
