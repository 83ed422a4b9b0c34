/// What a caller asks of the integration, and what it gets back.
#pragma once
#include <limits>
#include <string>
#include <string_view>
#include <vector>

namespace gaskettle {

/// How to step. `automatic` starts with the stiff method and changes between the
/// two during the run, by measured stiffness.
enum class Method { automatic, stiff, explicit_ };

struct Settings {
  double t_end = 0;                                        ///< end of the run, s, > 0
  double rtol = 1e-8;                                      ///< relative accuracy of one step, in [1e-13, 0.1]
  double first_step = 0;                                   ///< s; 0 finds one
  double h_max = std::numeric_limits<double>::infinity();  ///< longest step, s
  Method method = Method::automatic;
  long max_steps = 50'000'000;  ///< attempted steps before the run gives up
  int guard_samples = 4;        ///< times inside each step at which guards are looked at, >= 1
};

/// Throws std::invalid_argument naming the first setting outside its range.
void check_settings(const Settings& settings);

struct Statistics {
  long steps = 0;           ///< accepted, cut or repeated to meet an event counted once
  long rejected = 0;        ///< attempts that were not accepted
  long steps_stiff = 0;     ///< accepted by Rodas5P
  long steps_explicit = 0;  ///< accepted by the explicit pair
  long method_changes = 0;  ///< between the two
  long rate_calls = 0;
  long jacobians = 0;
  long factorisations = 0;
  long guard_calls = 0;
  long events = 0;                     ///< instants with at least one event
  std::vector<long> events_per_guard;  ///< by guard index
  std::vector<long> limiting;          ///< by state: attempts in which it had the largest error
};

enum class EndReason {
  end_time,
  stop_condition,
  event_storm,
  too_many_events,
  step_too_small,
  not_finite,
  interrupted,
  budget
};

/// "end time", "stop condition", ... as the record spells it.
std::string_view name(EndReason reason);

/// How a run ended. The state at `time` is what the caller's y holds.
struct Ending {
  EndReason reason = EndReason::end_time;
  std::string message;  ///< what happened, where and when; the stop reason for a stop condition
  double time = 0;      ///< s
  Statistics stats;

  /// Whether the run did what it was asked to: end time or a stop condition.
  bool complete() const { return reason == EndReason::end_time || reason == EndReason::stop_condition; }
};

}  // namespace gaskettle
