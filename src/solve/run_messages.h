/// The sentences with which a run ends early: what, where, when.
#pragma once
#include <string>
#include <vector>

#include "solve/take_step.h"

namespace gaskettle {

/// Why no step could be taken at t; `state` is the name of report.state or empty.
std::string failed_step_message(const StepReport& report, double t, const std::string& state, const Settings& settings);
/// A guard without a value at t.
std::string bad_guard_message(const std::string& guard, double t);
std::string storm_message(int events, double since, double t, const std::vector<std::string>& guards);
std::string too_many_events_message(long events, double t, const std::string& busiest_guard);
std::string interrupted_message(double t);

}  // namespace gaskettle
