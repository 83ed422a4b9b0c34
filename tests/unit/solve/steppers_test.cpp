// Error control, refusals, and Boost.Odeint as the driver.
#include <boost/numeric/odeint/integrate/integrate_adaptive.hpp>
#include <boost/numeric/odeint/integrate/integrate_const.hpp>
#include <boost/ref.hpp>
#include <catch2/catch.hpp>

#include "solve/odeint_stepper.h"
#include "unit/solve/support.h"

using namespace gaskettle;
using namespace gaskettle::test;

namespace {

struct Oscillator : Textbook<Oscillator, 2> {
  template <class S>
  void f(const S&, const S* y, S* d) {
    d[0] = y[1];
    d[1] = -1.0 * y[0];
  }
};

/// Solution 1/(1-t): blows up at t = 1.
struct BlowUp : Textbook<BlowUp, 1> {
  template <class S>
  void f(const S&, const S* y, S* d) {
    d[0] = y[0] * y[0];
  }
};

/// Rates that are NaN beyond y = 1, which the solution (y = t) reaches at t = 1.
struct EdgeOfRates : Textbook<EdgeOfRates, 1> {
  template <class S>
  void f(const S&, const S* y, S* d) {
    using std::sqrt;
    d[0] = 1.0 + 0.0 * sqrt(1.0 - y[0]);
  }
};

/// Decay towards zero whose rates must never be asked for below zero.
struct Tank : Textbook<Tank, 1> {
  bool asked_outside = false;
  template <class S>
  void f(const S&, const S* y, S* d) {
    if (value(y[0]) < 0) asked_outside = true;
    d[0] = -1.0 * y[0] * y[0] * y[0] * 1e4;
  }
  bool admissible(double, const double* y) const { return y[0] >= 0; }
};

/// Leaves the physical range for good at t = 1.
struct Wall : Textbook<Wall, 1> {
  template <class S>
  void f(const S&, const S*, S* d) {
    d[0] = S(1.0);
  }
  bool admissible(double, const double* y) const { return y[0] <= 1; }
};

constexpr Method methods[] = {Method::stiff, Method::explicit_, Method::automatic};

}  // namespace

TEST_CASE("the error follows the accuracy asked for, with all methods") {
  for (const Method method : methods) {
    double last_error = 1;
    long last_steps = 0;
    for (const double rtol : {1e-4, 1e-6, 1e-8, 1e-10}) {
      Oscillator p;
      Watcher watcher(2);
      std::vector<double> y{1.0, 0.0};
      const Ending end = integrate(p, watcher, settings(10, rtol, method), y);
      REQUIRE(end.reason == EndReason::end_time);
      CHECK(end.time == 10.0);
      CHECK(watcher.covered() == 10.0);
      CHECK_FALSE(watcher.gap());
      const double error = std::hypot(y[0] - std::cos(10.0), y[1] + std::sin(10.0));
      // Each of up to a few hundred steps may add its own tolerance; zero crossings have a typical size of 1e-6 only.
      CHECK(error < 100 * rtol);
      CHECK(error < last_error);
      CHECK(end.stats.steps > last_steps);
      last_error = error;
      last_steps = end.stats.steps;
    }
  }
}

TEST_CASE("rates that become NaN end the run where they do, naming the state") {
  for (const Method method : methods) {
    EdgeOfRates p;
    Watcher watcher(1);
    std::vector<double> y{0.0};
    const Ending end = integrate(p, watcher, settings(2, 1e-8, method), y);
    CHECK(end.reason == EndReason::not_finite);
    CHECK(end.time == Approx(1.0).margin(1e-9));
    CHECK(y[0] == Approx(1.0).margin(1e-9));
    CHECK_THAT(end.message, Catch::Contains("state 0") && Catch::Contains("not finite"));
    CHECK(end.stats.rejected > 0);
    CHECK(watcher.covered() == end.time);
  }
}

TEST_CASE("a start that is not finite ends the run at once") {
  for (const Method method : methods) {
    Oscillator p;
    Watcher watcher(2);
    std::vector<double> y{1.0, std::numeric_limits<double>::quiet_NaN()};
    const Ending end = integrate(p, watcher, settings(2, 1e-8, method), y);
    CHECK(end.reason == EndReason::not_finite);
    CHECK(end.time == 0.0);
    CHECK_THAT(end.message, Catch::Contains("state 1"));
  }
}

TEST_CASE("a solution that grows without bound ends with too small a step or a state that is not finite") {
  for (const Method method : methods) {
    BlowUp p;
    Watcher watcher(1);
    std::vector<double> y{1.0};
    const Ending end = integrate(p, watcher, settings(2, 1e-6, method), y);
    CHECK((end.reason == EndReason::step_too_small || end.reason == EndReason::not_finite));
    CHECK(end.time == Approx(1.0).epsilon(1e-4));  // 100 steps at 1e-6
    CHECK_THAT(end.message, Catch::Contains("state 0") && Catch::Contains("t = "));
  }
}

TEST_CASE("states that are not physical are never passed to the rates") {
  for (const Method method : methods) {
    Tank p;
    Watcher watcher(1);
    std::vector<double> y{1.0};
    Settings s = settings(10, 1e-4, method);
    s.first_step = 10;
    const Ending end = integrate(p, watcher, s, y);
    CHECK(end.reason == EndReason::end_time);
    CHECK_FALSE(p.asked_outside);
    CHECK(y[0] == Approx(1 / std::sqrt(1 + 2e4 * 10)).epsilon(1e-2));  // y^-2 = 1 + 2e4 t
  }
  for (const Method method : methods) {
    Wall p;
    Watcher watcher(1);
    std::vector<double> y{0.0};
    const Ending end = integrate(p, watcher, settings(2, 1e-6, method), y);
    CHECK(end.reason == EndReason::step_too_small);
    CHECK(end.time == Approx(1.0).margin(1e-12));
    CHECK_THAT(end.message, Catch::Contains("physical"));
  }
}

TEST_CASE("a run stops when its steps are used up or when it is interrupted") {
  Oscillator p;
  Watcher watcher(2);
  std::vector<double> y{1.0, 0.0};
  Settings s = settings(1e6, 1e-8, Method::explicit_);
  s.max_steps = 50;
  const Ending budget = integrate(p, watcher, s, y);
  CHECK(budget.reason == EndReason::budget);
  CHECK(budget.stats.steps + budget.stats.rejected == 50);
  CHECK_THAT(budget.message, Catch::Contains("50 steps"));

  Watcher impatient(2);
  impatient.interrupt_after_ = 7;
  y = {1.0, 0.0};
  const Ending stopped = integrate(p, impatient, settings(100, 1e-8, Method::stiff), y);
  CHECK(stopped.reason == EndReason::interrupted);
  CHECK(stopped.stats.steps == 7);
  CHECK(impatient.covered() == stopped.time);
}

TEST_CASE("settings out of range are refused by name") {
  Oscillator p;
  Watcher watcher(2);
  std::vector<double> y{1.0, 0.0}, wrong{1.0};
  CHECK_THROWS_WITH(integrate(p, watcher, settings(0, 1e-6, Method::stiff), y), Catch::Contains("t_end"));
  CHECK_THROWS_WITH(integrate(p, watcher, settings(1, 1e-15, Method::stiff), y), Catch::Contains("rtol"));
  CHECK_THROWS_AS(integrate(p, watcher, settings(1, 1e-6, Method::stiff), wrong), std::invalid_argument);
}

TEST_CASE("the longest step and the first step are kept to") {
  Oscillator p;
  Watcher watcher(2);
  std::vector<double> y{1.0, 0.0};
  Settings s = settings(1, 1e-3, Method::stiff);
  s.h_max = 0.01;
  double longest = 0, last = 0;
  watcher.look_ = [&](double t, const double*) {
    longest = std::max(longest, t - last);
    last = t;
  };
  integrate(p, watcher, s, y);
  CHECK(longest <= 0.01 / 4 * (1 + 1e-12) * 1.02);  // looks at quarters; the last step may stretch by 2 %
}

TEMPLATE_TEST_CASE("Boost.Odeint drives both steppers", "", Rodas5p, Explicit5) {
  namespace odeint = boost::numeric::odeint;
  Oscillator problem;
  OdeintStepper<TestType> stepper(1e-9);
  SECTION("integrate_adaptive ends on the end") {
    std::vector<double> y{1.0, 0.0};
    const std::size_t steps = odeint::integrate_adaptive(boost::ref(stepper), boost::ref(problem), y, 0.0, 5.0, 0.1);
    CHECK(steps > 10);
    CHECK(stepper.current_time() == Approx(5.0).epsilon(1e-14));
    CHECK(y[0] == Approx(std::cos(5.0)).margin(1e-7));
  }
  SECTION("integrate_const observes on the grid") {
    std::vector<double> y{1.0, 0.0};
    int seen = 0;
    double worst = 0;
    odeint::integrate_const(boost::ref(stepper), boost::ref(problem), y, 0.0, 5.0, 0.05,
                            [&](const std::vector<double>& at, double t) {
                              ++seen;
                              worst = std::max(worst, std::fabs(at[0] - std::cos(t)));
                            });
    CHECK(seen == 101);
    CHECK(worst < 1e-6);  // fourth-order curve inside steps that are right to 1e-9 at their ends
    CHECK(stepper.statistics().steps > 10);
  }
  SECTION("a NaN is an exception, not a success") {
    EdgeOfRates edge;
    std::vector<double> y{0.0};
    CHECK_THROWS_WITH(odeint::integrate_adaptive(boost::ref(stepper), boost::ref(edge), y, 0.0, 2.0, 0.3),
                      Catch::Contains("state 0"));
  }
}
