/// Our steppers in the clothes of Boost.Odeint's dense-output stepper concept, so
/// that its integrate functions can drive them on problems without events.
#pragma once
#include <boost/numeric/odeint/stepper/stepper_categories.hpp>
#include <boost/numeric/odeint/util/unwrap_reference.hpp>
#include <limits>
#include <stdexcept>
#include <string>
#include <utility>
#include <vector>

#include "solve/explicit5.h"
#include "solve/rodas5p.h"
#include "solve/take_step.h"

namespace gaskettle {

/// `Core` is Rodas5p or Explicit5. The `system` given to odeint is an OdeProblem in
/// std::ref. odeint copies the stepper it is given: pass boost::ref to read it later.
template <class Core>
class OdeintStepper {
public:
  using state_type = std::vector<double>;
  using deriv_type = state_type;
  using value_type = double;
  using time_type = double;
  using order_type = unsigned short;
  using stepper_category = boost::numeric::odeint::dense_output_stepper_tag;

  explicit OdeintStepper(double rtol) : rtol_(rtol) {}

  order_type order() const { return Core::order; }

  void initialize(const state_type& y, double t, double h) {
    current_ = previous_ = y;
    t_ = previous_t_ = t;
    h_ = h;
    control_.restart();
  }

  /// One accepted step; returns the times between which it lies. Throws
  /// std::runtime_error where no step is short enough.
  template <class System>
  std::pair<double, double> do_step(System system) {
    typename boost::numeric::odeint::unwrap_reference<System>::type& problem = system;
    stats_.limiting.resize(problem.size());
    const StepLimits limits{std::numeric_limits<double>::infinity(), rtol_, h_, std::numeric_limits<long>::max()};
    const Attempt start = core_.start(problem, t_, current_.data(), stats_);
    if (start.failure != Failure::none) fail(problem, "the rates are not finite", start.state);
    const StepReport report = take_step(core_, problem, control_, h_, limits, stats_);
    if (!report.accepted) fail(problem, "no step is short enough", report.state);
    core_.curve();
    previous_.swap(current_);
    current_.assign(core_.end_state(), core_.end_state() + problem.size());
    previous_t_ = t_;
    t_ = core_.end();
    return {previous_t_, t_};
  }

  template <class State>
  void calc_state(double t, State& y) const {
    if (t == t_) {
      y = current_;
      return;
    }
    y.resize(current_.size());
    core_.interpolate(t, y.data());
  }

  const state_type& current_state() const { return current_; }
  const state_type& previous_state() const { return previous_; }
  double current_time() const { return t_; }
  double previous_time() const { return previous_t_; }
  double current_time_step() const { return h_; }
  const Statistics& statistics() const { return stats_; }

private:
  template <class P>
  [[noreturn]] void fail(P& problem, const std::string& what, int state) const {
    throw std::runtime_error("integration cannot go on from t = " + std::to_string(t_) + " s: " + what +
                             (state >= 0 ? " (state " + std::string(problem.state_name(state)) + ")" : ""));
  }

  double rtol_;
  Core core_;
  StepControl control_;
  Statistics stats_;
  state_type current_, previous_;
  double t_ = 0, previous_t_ = 0, h_ = 0;
};

using Rodas5pStepper = OdeintStepper<Rodas5p>;
using Explicit5Stepper = OdeintStepper<Explicit5>;

}  // namespace gaskettle
