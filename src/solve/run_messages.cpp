#include "solve/run_messages.h"

#include <fmt/format.h>

namespace gaskettle {
namespace {

std::string of_state(const std::string& state) { return state.empty() ? "" : fmt::format(" of {}", state); }

std::string too_small(const StepReport& report, double t, const std::string& state, double smallest) {
  const std::string step = fmt::format("no step longer than {:.3g} s can be taken at t = {:.12g} s", smallest, t);
  switch (report.failure) {
    case Failure::not_physical:
      return step + ": every one leaves the range of physical states";
    case Failure::singular_matrix:
      return step + ": the linear equations of the step have no solution";
    case Failure::rates_not_finite:
      return step + fmt::format(": the rates{} are not finite", of_state(state));
    case Failure::none:
      break;
  }
  return step + fmt::format(": the error{} stays too large", of_state(state));
}

}  // namespace

std::string failed_step_message(const StepReport& report, double t, const std::string& state,
                                const Settings& settings) {
  switch (report.reason) {
    case EndReason::not_finite:
      return fmt::format("a state, rate or derivative{} is not finite at t = {:.12g} s", of_state(state), t);
    case EndReason::budget:
      return fmt::format("all {} steps are used up at t = {:.12g} s", settings.max_steps, t);
    default:
      return too_small(report, t, state, smallest_step(t, settings.t_end));
  }
}

std::string bad_guard_message(const std::string& guard, double t) {
  return fmt::format("the event condition {} has no finite value at t = {:.12g} s", guard, t);
}

std::string storm_message(int events, double since, double t, const std::vector<std::string>& guards) {
  return fmt::format("{} events in a row without time moving on, t = {:.12g}..{:.12g} s, by {}", events, since, t,
                     fmt::join(guards, ", "));
}

std::string too_many_events_message(long events, double t, const std::string& busiest_guard) {
  return fmt::format("{} events by t = {:.12g} s, most of them {}", events, t, busiest_guard);
}

std::string interrupted_message(double t) { return fmt::format("interrupted at t = {:.12g} s", t); }

}  // namespace gaskettle
