/// One run of a hybrid problem. Use it through integrate() in solve/integrate.h.
///
/// One turn of the loop, with t the settled time and y its state:
///
///     step      one accepted step from t, ending at or before the next known time event
///     search    the first disturbing guard on its curve; the step is then repeated to that
///               time at full order, and the root taken on the repeated curve
///     walk      observer guards up to there: each splits the curve, is reported, and the
///               walk goes on along the same curve
///     commit    t, y move to the end of the span; after_step may project y
///     fire      everything due at t together: before_event, on_events, after_event
///     settle    guards are looked at again; armed ones above zero fire at once, and so on;
///               after a disturbance the stepper restarts
#pragma once
#include <cmath>
#include <string>
#include <vector>

#include "solve/event_search.h"
#include "solve/run_messages.h"
#include "solve/stepper_pair.h"
#include "solve/storm_watch.h"

namespace gaskettle {

template <HybridProblem P, RunObserver O>
class HybridRun {
public:
  HybridRun(P& problem, O& observer, const Settings& settings, std::vector<double>& y)
      : problem_(problem),
        observer_(observer),
        settings_(settings),
        y_(y),
        guards_(problem.guard_count()),
        stepper_(problem, settings, ending_.stats),
        search_(guards_, settings.guard_samples, settings.t_end),
        storm_(settings.t_end),
        g_(guards_),
        g_end_(guards_),
        look_state_(y.size()) {
    ending_.stats.events_per_guard.assign(guards_, 0);
  }

  Ending run() {
    observer_.start(t_, y_.data());
    read_guards(t_, y_.data(), g_.data());
    disturbed_ = true;
    settle();
    while (!done_ && t_ < settings_.t_end) {
      if (observer_.interrupted())
        finish(EndReason::interrupted, interrupted_message(t_));
      else
        turn();
    }
    ending_.time = t_;
    return ending_;
  }

private:
  static constexpr long most_events = 1'000'000;

  // ---- one turn -------------------------------------------------------------

  void turn() {
    double scheduled = problem_.next_time_event(t_);
    const double latest = std::min(scheduled, settings_.t_end);
    const StepReport report = stepper_.step(t_, y_.data(), latest);
    if (!report.accepted) return fail(report);
    if (!guards_have_values()) return;
    due_.clear();
    double to = search_disturbing(latest);
    if (!walk(to, scheduled)) return;
    commit(to, to == scheduled);
  }

  /// Guards at the end of the step; where one has no value the step is taken back.
  bool guards_have_values() {
    if (guards_ == 0) return true;
    const int bad = read_guards(stepper_.end(), stepper_.end_state(), g_end_.data());
    if (bad < 0) return true;
    if (!stepper_.refuse()) finish(EndReason::not_finite, bad_guard_message(problem_.guard_name(bad), t_));
    return false;
  }

  /// Where this turn ends: at the first disturbing event, which is then due, or with the step.
  double search_disturbing(double latest) {
    if (guards_ == 0) return stepper_.end();
    sample(stepper_.end());
    search_.earliest(
        look(), [&](int q) { return problem_.guard_disturbs(q); }, found_);
    if (!found_.any) return stepper_.end();
    due_ = found_.fired;
    double to = stepper_.end();
    if (found_.time < to - tolerance(to)) {
      to = meet_event(latest);
      if (to == stepper_.end())
        read_guards(to, stepper_.end_state(), g_end_.data());
      else
        look()(to, g_end_.data());
    }
    sample(to);
    return to;
  }

  /// Observer guards up to `to`. False where one of them ended the run or this turn.
  /// One may set a time event that is due before `to`: both are then moved to it.
  bool walk(double& to, double& scheduled) {
    double from = t_;
    while (guards_ > 0) {
      search_.earliest(
          look(), [&](int q) { return !problem_.guard_disturbs(q); }, found_);
      if (!found_.any) break;
      if (found_.time >= to - tolerance(to)) {
        due_.insert(due_.end(), found_.fired.begin(), found_.fired.end());
        std::sort(due_.begin(), due_.end());
        break;
      }
      if (found_.time > from) observer_.piece(stepper_.curve(), from, found_.time);
      from = t_ = found_.time;
      stepper_.curve().interpolate(t_, y_.data());
      read_guards(t_, y_.data(), g_.data());
      search_.moved_on(g_.data());
      fire(found_.fired, false);
      cascade();
      if (done_) return false;
      if (disturbed_) {
        stepper_.go_on(false);
        settle();
        return false;
      }
      if (const double set = problem_.next_time_event(t_); set < to) {
        to = scheduled = set;
        due_.clear();  // still armed, and found again from there
      }
      look()(to, g_end_.data());  // what is active may have changed
      sample(to);
    }
    if (to > from) observer_.piece(stepper_.curve(), from, to);
    return true;
  }

  void commit(double to, bool time_event) {
    const bool at_end = to == stepper_.end();
    if (at_end)
      std::copy_n(stepper_.end_state(), y_.size(), y_.data());
    else
      stepper_.curve().interpolate(to, y_.data());
    t_ = to;
    const bool projected = problem_.after_step(t_, y_.data());
    stepper_.go_on(at_end && !projected);
    read_guards(t_, y_.data(), g_.data());
    search_.moved_on(g_.data());
    if (time_event || !due_.empty()) fire(due_, time_event);
    settle();
  }

  // ---- meeting an event -------------------------------------------------------

  /// The curve inside a step is one order less accurate than its end. So the step is
  /// repeated to the event, or just past it, where the curve is as good as the end; the
  /// root is then taken there, on the side where the guard is up. Returns its time.
  double meet_event(double latest) {
    const double on_curve = found_.time, old_end = stepper_.end();
    const double span = on_curve - t_, resolution = tolerance(on_curve);
    if (span < std::max(64 * resolution, 1e-12 * settings_.t_end)) return on_curve;
    if (!stepper_.repeat(on_curve)) {
      stepper_.repeat(old_end);
      return on_curve;
    }
    double value = leading_at_end();
    if (value < 0) {
      const double short_of = 1e-4 * span;
      const double slope = (value - leading_on_curve(on_curve - short_of)) / short_of;
      const double missing = -value / slope;  // negative, infinite or huge for a guard that barely touches
      const double past = on_curve + 1.5 * missing + resolution;
      if (!(missing > 0 && missing < 0.25 * span) || past > latest) return on_curve;
      if (!stepper_.repeat(past)) {
        stepper_.repeat(on_curve);
        return on_curve;
      }
      value = leading_at_end();
      if (value < 0) return stepper_.end();
    }
    return root_before_end(value, resolution);
  }

  /// Root of the leading guard just before the end of the repeated step, where it is up.
  double root_before_end(double value, double resolution) {
    const double end = stepper_.end();
    for (double back = 4 * resolution; back < 0.5 * (end - t_); back *= 8)
      if (const double before = leading_on_curve(end - back); before < 0)
        return rising_root([&](double t) { return leading_on_curve(t); }, end - back, end, before, value,
                           [&](double t) { return tolerance(t); });
    return end;
  }

  double leading_on_curve(double t) {
    look()(t, g_end_.data());
    return g_end_[found_.leading] - found_.level;
  }
  double leading_at_end() {
    read_guards(stepper_.end(), stepper_.end_state(), g_end_.data());
    return g_end_[found_.leading] - found_.level;
  }

  // ---- events -----------------------------------------------------------------

  void fire(const std::vector<int>& fired, bool time_event) {
    for (const int q : fired) search_.disarm(q, g_[q]);
    handle(fired, time_event);
  }

  void handle(const std::vector<int>& fired, bool time_event) {
    Statistics& stats = ending_.stats;
    ++stats.events;
    for (const int q : fired) ++stats.events_per_guard[q];
    observer_.before_event(t_, y_.data(), fired, time_event);
    const EventResult result = problem_.on_events(t_, y_.data(), fired, time_event);
    observer_.after_event(t_, y_.data(), fired, time_event);
    disturbed_ = disturbed_ || result.disturbed;
    read_guards(t_, y_.data(), g_.data());
    if (result.stop)
      finish(EndReason::stop_condition, result.stop_reason);
    else if (storm_.note(t_, fired))
      finish(EndReason::event_storm, storm_message(storm_.count(), storm_.since(), t_, storm_guards()));
    else if (stats.events >= most_events)
      finish(EndReason::too_many_events, too_many_events_message(stats.events, t_, busiest_guard()));
  }

  /// Events that the last ones caused, at the same instant.
  void cascade() {
    while (!done_) {
      search_.rearm(g_.data());
      search_.pending(g_.data(), pending_);
      if (pending_.empty()) return;
      for (const int q : pending_) search_.disarm_jumped(q);
      handle(pending_, false);
    }
  }

  void settle() {
    cascade();
    if (done_ || !disturbed_ || t_ >= settings_.t_end) return;
    disturbed_ = false;
    const StepReport report = stepper_.restart(t_, y_.data());
    if (!report.accepted) fail(report);
  }

  double tolerance(double t) const { return time_tolerance(t, settings_.t_end, t - stepper_.begin()); }

  // ---- guards -----------------------------------------------------------------

  /// Writes all guards; one without a value counts as inactive. Returns the first such, or -1.
  int read_guards(double t, const double* y, double* g) {
    if (guards_ == 0) return -1;
    problem_.guards(t, y, g);
    ++ending_.stats.guard_calls;
    int bad = -1;
    for (int q = guards_ - 1; q >= 0; --q)
      if (!std::isfinite(g[q])) {
        g[q] = -1;
        bad = q;
      }
    return bad;
  }

  auto look() {
    return [this, curve = stepper_.curve()](double t, double* g) {
      curve.interpolate(t, look_state_.data());
      read_guards(t, look_state_.data(), g);
    };
  }

  void sample(double to) { search_.sample(look(), t_, to, g_.data(), g_end_.data()); }

  // ---- ends -------------------------------------------------------------------

  void finish(EndReason reason, std::string message) {
    done_ = true;
    ending_.reason = reason;
    ending_.message = std::move(message);
  }

  void fail(const StepReport& report) {
    const std::string state = report.state >= 0 ? std::string(problem_.state_name(report.state)) : std::string();
    finish(report.reason, failed_step_message(report, t_, state, settings_));
  }

  std::vector<std::string> storm_guards() {
    std::vector<std::string> names;
    for (const int q : storm_.guards()) names.push_back(problem_.guard_name(q));
    return names;
  }

  std::string busiest_guard() {
    const auto& counts = ending_.stats.events_per_guard;
    const auto most = std::max_element(counts.begin(), counts.end());
    return most == counts.end() || *most == 0
               ? std::string("time events")
               : std::string(problem_.guard_name(static_cast<int>(most - counts.begin())));
  }

  P& problem_;
  O& observer_;
  const Settings& settings_;
  std::vector<double>& y_;
  double t_ = 0;
  bool done_ = false, disturbed_ = false;
  Ending ending_;
  int guards_;
  StepperPair<P> stepper_;
  EventSearch search_;
  StormWatch storm_;
  FoundEvent found_;
  std::vector<int> due_, pending_;
  std::vector<double> g_, g_end_, look_state_;
};

}  // namespace gaskettle
