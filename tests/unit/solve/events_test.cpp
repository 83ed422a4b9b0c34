// Events with known times: where they are found, in what order, and what they do.
#include <catch2/catch.hpp>

#include "unit/solve/support.h"

using namespace gaskettle;
using namespace gaskettle::test;

namespace {

constexpr double gravity = 9.81;

/// Height and speed of a ball over a floor, with restitution and, if wanted, a rest rule.
struct Ball : Textbook<Ball, 2> {
  double restitution = 0.8, rest_speed = 0;
  bool resting = false;
  template <class S>
  void f(const S&, const S* y, S* d) {
    d[0] = resting ? S(0.0) : y[1];
    d[1] = resting ? S(0.0) : S(-gravity);
  }
  int guard_count() const { return 1; }
  void guards(double, const double* y, double* g) { g[0] = resting ? -1 : -y[0]; }
  std::string guard_name(int) const { return "floor"; }
  EventResult on_events(double, double* y, const std::vector<int>&, bool) {
    y[1] *= -restitution;
    if (std::fabs(y[1]) < rest_speed) {
      resting = true;
      y[1] = 0;
    }
    return {true, false, ""};
  }
};

/// y' = 1, y = t, watched by guards given as functions of time and state.
struct Clock : Textbook<Clock, 1> {
  using Guard = std::function<double(double, const double*)>;
  std::vector<Guard> conditions;
  std::vector<char> observer;
  std::vector<double> scheduled;
  std::function<EventResult(double, double*, const std::vector<int>&, bool)> reaction;

  void watch(Guard g, bool disturbs = true) {
    conditions.push_back(std::move(g));
    observer.push_back(!disturbs);
  }
  template <class S>
  void f(const S&, const S*, S* d) {
    d[0] = S(1.0);
  }
  int guard_count() const { return static_cast<int>(conditions.size()); }
  void guards(double t, const double* y, double* g) {
    for (std::size_t q = 0; q < conditions.size(); ++q) g[q] = conditions[q](t, y);
  }
  bool guard_disturbs(int q) const { return !observer[q]; }
  double next_time_event(double t) const {
    for (const double s : scheduled)
      if (s > t) return s;
    return std::numeric_limits<double>::infinity();
  }
  EventResult on_events(double t, double* y, const std::vector<int>& fired, bool time_event) {
    if (reaction) return reaction(t, y, fired, time_event);
    bool disturbed = time_event;
    for (const int q : fired) disturbed = disturbed || !observer[q];
    return {disturbed, false, ""};
  }
};

/// Pushed up below 1 and down above it: a switch without hysteresis.
struct Relay : Textbook<Relay, 1> {
  double push = 1;
  template <class S>
  void f(const S&, const S*, S* d) {
    d[0] = S(push);
  }
  int guard_count() const { return 2; }
  void guards(double, const double* y, double* g) {
    g[0] = push > 0 ? y[0] - 1 : -1;
    g[1] = push < 0 ? 1 - y[0] : -1;
  }
  std::string guard_name(int q) const { return q == 0 ? "upper" : "lower"; }
  EventResult on_events(double, double*, const std::vector<int>&, bool) {
    push = -push;
    return {true, false, ""};
  }
};

struct Decay : Textbook<Decay, 1> {
  double rate = 1, threshold = 0.5;
  template <class S>
  void f(const S&, const S* y, S* d) {
    d[0] = -rate * y[0];
  }
  int guard_count() const { return 1; }
  void guards(double, const double* y, double* g) { g[0] = threshold - y[0]; }
  EventResult on_events(double, double*, const std::vector<int>&, bool) { return {true, true, "half is left"}; }
};

constexpr Method methods[] = {Method::stiff, Method::explicit_, Method::automatic};

/// One run over `t_end` with steps as long as they like.
Watcher run(Clock& clock, double t_end, Method method, double h_max = std::numeric_limits<double>::infinity()) {
  Watcher watcher(1);
  std::vector<double> y{0.0};
  Settings s = settings(t_end, 1e-6, method);
  s.first_step = t_end;
  s.h_max = h_max;
  const Ending end = integrate(clock, watcher, s, y);
  CHECK(end.reason == EndReason::end_time);
  CHECK(watcher.covered() == t_end);
  CHECK_FALSE(watcher.gap());
  return watcher;
}

}  // namespace

TEST_CASE("a falling ball meets the floor when it should") {
  for (const Method method : methods) {
    Ball ball;
    Watcher watcher(2);
    std::vector<double> y{10.0, 0.0};
    const Ending end = integrate(ball, watcher, settings(2, 1e-8, method), y);
    REQUIRE(end.reason == EndReason::end_time);
    const double fall = std::sqrt(2 * 10 / gravity);
    REQUIRE(watcher.events().size() == 1);
    // The motion is exact for methods of order 2 and more: what is left is the resolution of event times.
    CHECK(watcher.events()[0].time == Approx(fall).margin(2e-12));
    CHECK(watcher.events()[0].before[1] == Approx(-gravity * fall).epsilon(1e-12));
    CHECK(watcher.events()[0].after[1] == Approx(0.8 * gravity * fall).epsilon(1e-12));
  }
}

TEST_CASE("a decay reaches half its value after ln 2, as accurately as it is integrated") {
  for (const Method method : methods) {
    Decay decay;
    Watcher watcher(1);
    std::vector<double> y{1.0};
    const Ending end = integrate(decay, watcher, settings(5, 1e-12, method), y);
    CHECK(end.reason == EndReason::stop_condition);
    CHECK(end.message == "half is left");
    CHECK(end.time == Approx(std::log(2.0)).margin(1e-11));
    CHECK(y[0] == Approx(0.5).margin(1e-11));
    CHECK(watcher.covered() == end.time);
  }
  // At a coarse accuracy the curve inside the step is worse than the step: the repeated step mends that.
  Decay decay;
  Watcher watcher(1);
  std::vector<double> y{1.0};
  const Ending end = integrate(decay, watcher, settings(5, 1e-4, Method::stiff), y);
  CHECK(end.time == Approx(std::log(2.0)).margin(1e-4));
  CHECK(y[0] >= 0.5 - 1e-13);
  CHECK(y[0] <= 0.5 + 1e-15);
}

TEST_CASE("a bouncing ball comes to rest at the sum of its flights") {
  for (const Method method : methods) {
    Ball ball;
    ball.rest_speed = 1e-3;
    Watcher watcher(2);
    std::vector<double> y{1.0, 0.0};
    const Ending end = integrate(ball, watcher, settings(10, 1e-9, method), y);
    REQUIRE(end.reason == EndReason::end_time);
    double t = std::sqrt(2 / gravity), speed = gravity * t;
    std::vector<double> expected{t};
    for (speed *= 0.8; speed >= 1e-3; speed *= 0.8) expected.push_back(t += 2 * speed / gravity);
    REQUIRE(times_of(watcher, 0).size() == expected.size());
    // Each impact resolves to 1e-12 s (1e-13 of the run), and each error in time is carried on.
    for (std::size_t k = 0; k < expected.size(); ++k)
      CHECK(times_of(watcher, 0)[k] == Approx(expected[k]).margin(1e-12 * (k + 1) * 2));
    CHECK(y[1] == 0.0);
    CHECK(std::fabs(y[0]) < 1e-10);
  }
}

TEST_CASE("a ball without a rest rule ends in a storm instead of falling through the floor") {
  for (const Method method : methods) {
    Ball ball;
    ball.restitution = 0.5;
    Watcher watcher(2);
    double lowest = 0;
    watcher.look_ = [&](double, const double* y) { lowest = std::min(lowest, y[0]); };
    std::vector<double> y{1.0, 0.0};
    const Ending end = integrate(ball, watcher, settings(10, 1e-9, method), y);
    CHECK(end.reason == EndReason::event_storm);
    CHECK_THAT(end.message, Catch::Contains("floor"));
    CHECK(end.time == Approx(3 * std::sqrt(2 / gravity)).margin(1e-9));  // t0 (1 + 2r/(1-r)) = 3 t0
    CHECK(lowest > -1e-10);
  }
}

TEST_CASE("chatter ends the run, naming the guards") {
  for (const Method method : methods) {
    Relay relay;
    Watcher watcher(1);
    std::vector<double> y{0.0};
    const Ending end = integrate(relay, watcher, settings(3, 1e-6, method), y);
    CHECK(end.reason == EndReason::event_storm);
    CHECK_THAT(end.message, Catch::Contains("upper") && Catch::Contains("lower"));
    CHECK(end.time == Approx(1.0).margin(1e-11));
    CHECK(y[0] == Approx(1.0).margin(1e-11));
    CHECK(end.stats.events <= 200);
  }
}

TEST_CASE("a zero exactly at the end of a step belongs to that step, once") {
  for (const Method method : methods) {
    Clock clock;
    clock.watch([](double, const double* y) { return y[0] - 0.5; });
    const Watcher watcher = run(clock, 1.0, method, 0.25);
    REQUIRE(watcher.events().size() == 1);
    CHECK(watcher.events()[0].time == Approx(0.5).margin(2e-13));
  }
}

TEST_CASE("a zero at the start fires at the start if it ends positive, and not otherwise") {
  for (const Method method : methods) {
    Clock clock;
    clock.watch([](double, const double* y) { return y[0]; });                 // rises from zero
    clock.watch([](double, const double* y) { return -y[0]; });                // falls from zero
    clock.watch([](double, const double* y) { return y[0] * (y[0] - 0.5); });  // falls, then rises at 0.5
    clock.watch([](double, const double*) { return 0.0; });                    // stays at zero
    const Watcher watcher = run(clock, 1.0, method);
    REQUIRE(watcher.events().size() == 2);
    CHECK(watcher.events()[0].time == 0.0);
    CHECK(watcher.events()[0].fired == std::vector<int>{0});
    CHECK(watcher.events()[1].time == Approx(0.5).margin(1e-12));
    CHECK(watcher.events()[1].fired == std::vector<int>{2});
  }
}

TEST_CASE("guards above zero at the start fire at the start, and once") {
  Clock clock;
  clock.watch([](double, const double* y) { return 1 + y[0]; });
  const Watcher watcher = run(clock, 1.0, Method::stiff);
  REQUIRE(watcher.events().size() == 1);
  CHECK(watcher.events()[0].time == 0.0);
}

TEST_CASE("two guards in one step come in order, two at once come together") {
  for (const Method method : methods)
    for (const bool disturbs : {true, false}) {
      Clock clock;
      clock.watch([](double, const double* y) { return y[0] - 0.7; }, disturbs);
      clock.watch([](double, const double* y) { return y[0] - 0.3; }, disturbs);
      clock.watch([](double, const double* y) { return 2 * (y[0] - 0.7); }, disturbs);
      const Watcher watcher = run(clock, 1.0, method);
      REQUIRE(watcher.events().size() == 2);
      CHECK(watcher.events()[0].time == Approx(0.3).margin(2e-13));
      CHECK(watcher.events()[0].fired == std::vector<int>{1});
      CHECK(watcher.events()[1].time == Approx(0.7).margin(2e-13));
      CHECK(watcher.events()[1].fired == std::vector<int>{0, 2});
    }
}

TEST_CASE("events caused by an event happen at the same instant, in order") {
  Clock clock;
  bool lit = false;
  clock.watch([&](double, const double*) { return lit ? 1.0 : -1.0; });
  clock.watch([](double, const double* y) { return y[0] - 0.5; });
  clock.reaction = [&](double, double*, const std::vector<int>& fired, bool) {
    if (fired[0] == 1) lit = true;
    return EventResult{true, false, ""};
  };
  const Watcher watcher = run(clock, 1.0, Method::automatic);
  REQUIRE(watcher.events().size() == 2);
  CHECK(watcher.events()[0].fired == std::vector<int>{1});
  CHECK(watcher.events()[1].fired == std::vector<int>{0});
  CHECK(watcher.events()[0].time == watcher.events()[1].time);
}

TEST_CASE("known times are reached exactly, also a pulse far shorter than a step") {
  for (const Method method : methods) {
    Clock clock;
    clock.scheduled = {0.3, 0.3 + 1e-6, 0.9, 1.0};
    std::vector<double> seen;
    clock.reaction = [&](double t, double*, const std::vector<int>&, bool time_event) {
      CHECK(time_event);
      seen.push_back(t);
      return EventResult{seen.size() < 3, false, ""};
    };
    run(clock, 1.0, method);
    CHECK(seen == clock.scheduled);
  }
}

TEST_CASE("a guard and a known time at one instant are one event") {
  for (const Method method : methods)
    for (const bool disturbs : {true, false}) {
      Clock clock;
      clock.scheduled = {0.5};
      clock.watch([](double t, const double*) { return t - 0.5; }, disturbs);
      const Watcher watcher = run(clock, 1.0, method);
      REQUIRE(watcher.events().size() == 1);
      CHECK(watcher.events()[0].time == 0.5);
      CHECK(watcher.events()[0].time_event);
      CHECK(watcher.events()[0].fired == std::vector<int>{0});
    }
}

TEST_CASE("observers do not disturb the integration") {
  for (const Method method : methods) {
    Ball plain, watched;
    struct Observed : Ball {
      int guard_count() const { return 3; }
      void guards(double t, const double* y, double* g) {
        Ball::guards(t, y, g);
        g[1] = y[0] - 0.9;  // high, on every flight that gets there
        g[2] = 0.9 - y[0];
      }
      bool guard_disturbs(int q) const { return q == 0; }
      EventResult on_events(double t, double* y, const std::vector<int>& fired, bool time_event) {
        if (fired[0] != 0) return {};
        return Ball::on_events(t, y, fired, time_event);
      }
    } observed;
    Watcher a(2), b(2);
    std::vector<double> ya{2.0, 0.0}, yb = ya;
    const Ending ea = integrate(plain, a, settings(3, 1e-6, method), ya);
    const Ending eb = integrate(observed, b, settings(3, 1e-6, method), yb);
    CHECK(ya == yb);  // same steps, same numbers
    CHECK(ea.stats.steps == eb.stats.steps);
    CHECK(ea.stats.rate_calls == eb.stats.rate_calls);
    CHECK(times_of(a, 0) == times_of(b, 0));
    CHECK_FALSE(b.gap());
    REQUIRE(times_of(b, 2).size() >= 2);
    CHECK(times_of(b, 2)[0] == Approx(std::sqrt(2 * 1.1 / gravity)).margin(1e-12));
    const double fall = std::sqrt(4 / gravity), up = 0.8 * gravity * fall;
    CHECK(times_of(b, 1)[1] == Approx(fall + (up - std::sqrt(up * up - 2 * gravity * 0.9)) / gravity).margin(1e-11));
    CHECK(b.events()[1].before == b.events()[1].after);
  }
}

TEST_CASE("an observer may stop the run") {
  Clock clock;
  clock.watch([](double, const double* y) { return y[0] - 0.4; }, false);
  clock.reaction = [](double, double*, const std::vector<int>&, bool) { return EventResult{false, true, "there"}; };
  Watcher watcher(1);
  std::vector<double> y{0.0};
  const Ending end = integrate(clock, watcher, settings(1, 1e-6, Method::stiff), y);
  CHECK(end.reason == EndReason::stop_condition);
  CHECK(end.complete());
  CHECK(end.time == Approx(0.4).margin(1e-12));
  CHECK(y[0] == Approx(0.4).margin(1e-12));
  CHECK(watcher.covered() == end.time);
}

TEST_CASE("a guard without a value ends the run, naming it") {
  Clock clock;
  clock.watch([](double t, const double*) { return std::sqrt(0.5 - t) - 10; });
  Watcher watcher(1);
  std::vector<double> y{0.0};
  const Ending end = integrate(clock, watcher, settings(1, 1e-6, Method::explicit_), y);
  CHECK(end.reason == EndReason::not_finite);
  CHECK_THAT(end.message, Catch::Contains("guard 0"));
  CHECK(end.time == Approx(0.5).margin(1e-9));
}

TEST_CASE("a projection after each step is taken into account") {
  struct Projected : Clock {
    bool after_step(double, double* y) {
      y[0] += 1e-3;
      return true;
    }
  } clock;
  clock.watch([](double, const double* y) { return y[0] - 0.5; });
  Watcher watcher(1);
  std::vector<double> y{0.0};
  Settings s = settings(1, 1e-6, Method::explicit_);
  s.h_max = 0.0101;
  const Ending end = integrate(clock, watcher, s, y);
  CHECK(end.reason == EndReason::end_time);
  CHECK(y[0] == Approx(1 + 1e-3 * end.stats.steps).epsilon(1e-12));
  CHECK(watcher.events().size() == 1);
}

TEST_CASE("flights that shrink without end become a storm at any rate of shrinking") {
  for (const Method method : methods)
    for (const double restitution : {0.3, 0.6, 0.8}) {
      Ball ball;
      ball.restitution = restitution;
      Watcher watcher(2);
      std::vector<double> y{0.3, 0.0};
      const Ending end = integrate(ball, watcher, settings(4, 1e-6, method), y);
      CHECK(end.reason == EndReason::event_storm);
      CHECK(end.stats.events < 1000);
      const double fall = std::sqrt(2 * 0.3 / gravity);
      CHECK(end.time == Approx(fall * (1 + restitution) / (1 - restitution)).margin(1e-10));
    }
}
