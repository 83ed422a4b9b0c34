// Events that come and go between the ends of one step.
#include <catch2/catch.hpp>

#include "unit/solve/support.h"

using namespace gaskettle;
using namespace gaskettle::test;

namespace {

constexpr Method methods[] = {Method::stiff, Method::explicit_, Method::automatic};

/// States t and its powers are not needed: guards see time, and steps are as long as the run.
struct Still : Textbook<Still, 1> {
  std::vector<std::function<double(double)>> conditions;
  bool disturb = true;
  template <class S>
  void f(const S&, const S*, S* d) {
    d[0] = S(1.0);
  }
  int guard_count() const { return static_cast<int>(conditions.size()); }
  void guards(double t, const double*, double* g) {
    for (std::size_t q = 0; q < conditions.size(); ++q) g[q] = conditions[q](t);
  }
  bool guard_disturbs(int) const { return disturb; }
  EventResult on_events(double, double*, const std::vector<int>&, bool) { return {disturb, false, ""}; }
};

Watcher run(Still& p, Method method, double h_max = 1) {
  Watcher watcher(1);
  std::vector<double> y{0.0};
  Settings s = settings(1, 1e-6, method);
  s.first_step = 1;
  s.h_max = h_max;
  const Ending end = integrate(p, watcher, s, y);
  CHECK(end.reason == EndReason::end_time);
  CHECK_FALSE(watcher.gap());
  return watcher;
}

}  // namespace

TEST_CASE("a cubic with three roots in one step: all are found, rising and falling") {
  for (const Method method : methods)
    for (const bool disturb : {true, false}) {
      Still p;
      p.disturb = disturb;
      const auto cubic = [](double t) { return (t - 0.31) * (t - 0.47) * (t - 0.62); };
      p.conditions = {cubic, [=](double t) { return -cubic(t); }};
      const Watcher watcher = run(p, method);
      REQUIRE(times_of(watcher, 0).size() == 2);
      CHECK(times_of(watcher, 0)[0] == Approx(0.31).margin(5e-12));
      CHECK(times_of(watcher, 0)[1] == Approx(0.62).margin(5e-12));
      REQUIRE(times_of(watcher, 1).size() == 2);
      CHECK(times_of(watcher, 1)[0] == 0.0);  // above zero at the start
      CHECK(times_of(watcher, 1)[1] == Approx(0.47).margin(5e-12));
    }
}

TEST_CASE("two crossings between two looks are found by the bump between them") {
  // The bump is 0.06 wide; with four looks inside the step they are 0.2 apart.
  for (const double centre : {0.05, 0.13, 0.31, 0.5, 0.71, 0.87, 0.95})
    for (const Method method : methods) {
      Still p;
      p.conditions = {[=](double t) { return 0.03 * 0.03 - (t - centre) * (t - centre); }};
      const Watcher watcher = run(p, method);
      INFO("centre " << centre);
      REQUIRE(watcher.events().size() == 1);
      CHECK(watcher.events()[0].time == Approx(centre - 0.03).margin(1e-11));
    }
}

TEST_CASE("a dip below zero between two looks arms a guard again") {
  for (const double centre : {0.3, 0.5, 0.77})
    for (const Method method : methods)
      for (const bool disturb : {true, false}) {
        Still p;
        p.disturb = disturb;
        p.conditions = {[=](double t) { return (t - centre) * (t - centre) - 0.03 * 0.03; }};
        const Watcher watcher = run(p, method);
        INFO("centre " << centre);
        REQUIRE(watcher.events().size() == 2);  // above zero at the start, and after the dip
        CHECK(watcher.events()[1].time == Approx(centre + 0.03).margin(1e-11));
      }
}

TEST_CASE("a guard that stays above zero while it rises and falls fires once, and again after a dip") {
  for (const Method method : methods)
    for (const bool disturb : {true, false}) {
      Still p;
      p.disturb = disturb;
      p.conditions = {[](double t) { return t - 0.2 + 0.02 * std::sin(30 * t); }};
      const Watcher watcher = run(p, method);
      // 30 x 0.02 = 0.6 < 1: monotone, one root.
      CHECK(watcher.events().size() == 1);
      p.conditions = {[](double t) { return t < 0.2 ? t - 0.2 : 0.3 * std::sin(20 * (t - 0.2)) + 1.2 * (t - 0.2); }};
      // sin drops below -4 (t - 0.2) once, for 0.034 s; the looks are 0.05 s apart.
      CHECK(run(p, method, 0.25).events().size() == 2);
    }
}

namespace {

/// Piston towards a stop: touches at height 0 and is thrown back by a stiff cushion-free impact;
/// a second guard sees its speed change sign. In one long step both happen, and the speed alone shows at its end.
struct Grazer : Textbook<Grazer, 2> {
  double overlap = 1e-4;  // m, how far the free path would pass the stop
  int impacts = 0, turns = 0;
  template <class S>
  void f(const S&, const S* y, S* d) {
    d[0] = y[1];
    d[1] = S(2.0);
  }
  int guard_count() const { return 2; }
  void guards(double, const double* y, double* g) {
    g[0] = -y[0];
    g[1] = y[1];
  }
  std::string guard_name(int q) const { return q == 0 ? "stop" : "turn"; }
  EventResult on_events(double, double* y, const std::vector<int>& fired, bool) {
    for (const int q : fired) {
      if (q == 0) {
        ++impacts;
        y[1] = -0.5 * y[1];
      } else {
        ++turns;
      }
    }
    return {true, false, ""};
  }
};

}  // namespace

TEST_CASE("a grazing impact is not lost to the turn that follows it in the same step") {
  for (const Method method : methods)
    for (const double overlap : {1e-2, 1e-4, 1e-6, 1e-8}) {
      // Free path (t - 0.47)^2 - overlap: below zero for 2 sqrt(overlap) only.
      Grazer p;
      Watcher watcher(2);
      std::vector<double> y{0.47 * 0.47 - overlap, -0.94};
      Settings s = settings(1, 1e-6, method);
      s.first_step = 1;
      const Ending end = integrate(p, watcher, s, y);
      INFO("overlap " << overlap);
      CHECK(end.reason == EndReason::end_time);
      CHECK(p.impacts == 1);
      REQUIRE_FALSE(watcher.events().empty());
      CHECK(watcher.events()[0].fired == std::vector<int>{0});
      // A root of width sqrt(overlap) magnifies rounding of the height (1e-17) by 1/(2 sqrt(overlap)).
      CHECK(watcher.events()[0].time == Approx(0.47 - std::sqrt(overlap)).margin(1e-12 + 1e-15 / std::sqrt(overlap)));
    }
}
