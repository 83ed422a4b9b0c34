/// Two histories of one transient side by side: the program's record and CVODE's.
///
/// Both integrate at a relative tolerance of 1e-11 or less a step. Thousands of steps and the
/// program's interpolation between step ends (fourth order) leave a few 1e-9 of a channel's
/// range; the bound of 1e-7 leaves room for transients that amplify. A wrong term in any
/// equation shows at 1e-3 and above.
#pragma once
#include <algorithm>
#include <catch2/catch.hpp>
#include <cmath>
#include <map>

#include "cross_check/cvode_run.h"
#include "support/run_model.h"

namespace gaskettle::testing {

inline constexpr double agreement_bound = 1e-7;

/// The hand-written model's channels at one time.
using Values = std::vector<std::pair<std::string, double>>;

struct HandEvent {
  double time;
  std::string part, what;
};

/// Greatest difference of each channel over its range in the record, at the regular rows
/// that no event is near (within 1e-6 of the run).
inline std::map<std::string, double> differences(const ModelRun& model, double every, CvodeRun& run,
                                                 const std::function<void()>& on_event,
                                                 const std::function<Values()>& values) {
  const double until = model.time.back();
  std::map<std::string, double> worst;
  std::size_t row = 0;
  for (long k = 1;; ++k) {
    const double t = std::min(static_cast<double>(k) * every, until);
    while (!run.advance(t)) {
      on_event();
      run.restart();
    }
    while (row < model.time.size() && model.time[row] < t) ++row;
    const bool near_event = std::any_of(model.result.events.begin(), model.result.events.end(),
                                        [&](const LoggedEvent& e) { return std::abs(e.time - t) <= 1e-6 * until; });
    if (!near_event) {
      REQUIRE(model.time.at(row) == t);
      for (const auto& [name, value] : values()) {
        double& w = worst[name];
        w = std::max(w, std::abs(model[name][row] - value));
      }
    }
    if (t >= until) break;
  }
  for (auto& [name, w] : worst) {
    const auto [low, high] = std::minmax_element(model[name].begin(), model[name].end());
    w /= *high > *low ? *high - *low : std::abs(*high);
  }
  return worst;
}

inline void check_agreement(const std::map<std::string, double>& worst) {
  for (const auto& [name, difference] : worst) {
    INFO(name << ": " << std::scientific << difference);
    CHECK(difference < agreement_bound);
  }
}

/// The same events in the same order, each time within 1e-7 of the run.
inline void check_events(const ModelRun& model, const std::string& part, const std::vector<HandEvent>& hand) {
  const double until = model.time.back();
  std::vector<LoggedEvent> logged;
  for (const LoggedEvent& e : model.result.events)
    if (e.part == part) logged.push_back(e);
  double worst = 0.0;
  std::size_t i = 0;
  for (const HandEvent& e : hand) {
    if (e.part != part) continue;
    INFO(part << " event " << i << " at " << e.time << " s: " << e.what);
    REQUIRE(i < logged.size());
    REQUIRE(logged[i].what == e.what);
    worst = std::max(worst, std::abs(logged[i++].time - e.time) / until);
  }
  CHECK(logged.size() == i);
  INFO(part << ": times of " << i << " events over the run: " << std::scientific << worst);
  CHECK(worst < agreement_bound);
}

/// A run that must have come to its end with its books closed.
inline ModelRun completed(const std::string& yaml) {
  ModelRun model = run_model(yaml);
  REQUIRE_FALSE(model.result.partial());
  REQUIRE(model.result.books_closed());
  return model;
}

}  // namespace gaskettle::testing
