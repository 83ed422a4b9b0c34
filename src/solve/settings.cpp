#include "solve/settings.h"

#include <fmt/format.h>

#include <cmath>
#include <stdexcept>

namespace gaskettle {

void check_settings(const Settings& s) {
  const auto refuse = [](const char* what, double value, const char* right) {
    throw std::invalid_argument(fmt::format("integration setting {} is {}; it must be {}", what, value, right));
  };
  if (!(s.t_end > 0) || !std::isfinite(s.t_end)) refuse("t_end", s.t_end, "a time above 0 s");
  if (!(s.rtol >= 1e-13 && s.rtol <= 0.1)) refuse("rtol", s.rtol, "in 1e-13..0.1");
  if (!(s.first_step >= 0) || !std::isfinite(s.first_step)) refuse("first_step", s.first_step, "0 s (found) or more");
  if (!(s.h_max > 0)) refuse("h_max", s.h_max, "above 0 s");
  if (s.max_steps < 1) refuse("max_steps", static_cast<double>(s.max_steps), "1 or more");
  if (s.guard_samples < 1) refuse("guard_samples", s.guard_samples, "1 or more");
}

std::string_view name(EndReason reason) {
  switch (reason) {
    case EndReason::end_time:
      return "end time";
    case EndReason::stop_condition:
      return "stop condition";
    case EndReason::event_storm:
      return "event storm";
    case EndReason::too_many_events:
      return "too many events";
    case EndReason::step_too_small:
      return "step too small";
    case EndReason::not_finite:
      return "not finite";
    case EndReason::interrupted:
      return "interrupted";
    case EndReason::budget:
      return "budget";
  }
  return "unknown";
}

}  // namespace gaskettle
