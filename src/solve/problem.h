/// What an initial value problem offers to the steppers and to the hybrid driver,
/// and what whoever watches the run offers. All of it is duck-typed: any class
/// with these members will do, and nothing is called through a virtual table.
///
/// Every call is made from one thread. Times are in s from the start of the run.
#pragma once
#include <concepts>
#include <string>
#include <vector>

#include "solve/dense_step.h"
#include "solve/sparsity.h"

namespace gaskettle {

/// dy/dt = f(t, y), smooth between events.
///
/// - size(): number of states n.
/// - rates(t, y, dydt): f. Non-finite values reject the step.
/// - sparsity(): pattern of df/dy with its diagonal; the reference stays valid until the next event.
/// - sparsity_version(): names the pattern; equal numbers promise equal patterns.
/// - jacobian(t, y, values, dfdt): exact df/dy in the order of sparsity(), and df/dt[n]. Every value is written.
/// - typical_size()[n]: size > 0 of each state below which its error is absolute, in the state's unit.
///   Read before each step; may change at events.
/// - admissible(t, y): whether y is a physical state. Stages that are not are never passed to rates.
/// - state_name(i): for messages.
template <class P>
concept OdeProblem = requires(P& p, double t, const double* y, double* out, int i) {
  { p.size() } -> std::convertible_to<int>;
  p.rates(t, y, out);
  { p.sparsity() } -> std::convertible_to<const Sparsity&>;
  { p.sparsity_version() } -> std::convertible_to<int>;
  p.jacobian(t, y, out, out);
  { p.typical_size() } -> std::convertible_to<const double*>;
  { p.admissible(t, y) } -> std::convertible_to<bool>;
  { p.state_name(i) } -> std::convertible_to<std::string>;
};

/// What the events of one instant did.
struct EventResult {
  bool disturbed = false;   ///< modes or states changed: integration restarts here
  bool stop = false;        ///< the run ends here, with reason stop_condition
  std::string stop_reason;  ///< why, for the reader of the record
};

/// An OdeProblem whose rates switch at events.
///
/// - guard_count(); guards(t, y, g): an event happens when a guard rises through zero, reaching zero included. Inactive
///   guards are -1. A guard that has fired fires again only after it has been below zero.
/// - guard_disturbs(q): false for an observer (a limit, a target): it is located and reported, the
///   step goes on. If on_events reports a disturbance for one all the same, integration restarts there.
/// - guard_name(q): for messages and counts.
/// - next_time_event(t): first known event time strictly after t, +infinity if none. Reached exactly.
/// - on_events(t, y, fired, time_event): applies everything due at this instant: the guards in `fired`
///   (ascending) and, if time_event, what is scheduled for t. May change y.
/// - after_step(t, y): after each accepted step; may project y; true where it did.
template <class P>
concept HybridProblem = OdeProblem<P> &&
    requires(P& p, double t, const double* y, double* out, int q, const std::vector<int>& fired) {
  { p.guard_count() } -> std::convertible_to<int>;
  p.guards(t, y, out);
  { p.guard_disturbs(q) } -> std::convertible_to<bool>;
  { p.guard_name(q) } -> std::convertible_to<std::string>;
  { p.next_time_event(t) } -> std::convertible_to<double>;
  { p.on_events(t, out, fired, true) } -> std::convertible_to<EventResult>;
  { p.after_step(t, out) } -> std::convertible_to<bool>;
};

/// Whoever watches a run.
///
/// - start(t, y): once, before any event at the start.
/// - piece(step, from, to): consecutive pieces cover the run exactly once; step.interpolate is valid
///   in [from, to]. A projection by after_step is not part of the curve.
/// - before_event(t, y, fired, time_event): the state at the event in the old mode.
/// - after_event(t, y, fired, time_event): the state after it.
/// - interrupted(): asked at every step; true ends the run.
template <class O>
concept RunObserver = requires(O& o, const DenseStep& step, double t, const double* y, const std::vector<int>& fired,
                               bool time_event) {
  o.start(t, y);
  o.piece(step, t, t);
  o.before_event(t, y, fired, time_event);
  o.after_event(t, y, fired, time_event);
  { o.interrupted() } -> std::convertible_to<bool>;
};

}  // namespace gaskettle
