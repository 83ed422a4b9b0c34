// The automatic method changes with the problem, and gives the same answer.
#include <catch2/catch.hpp>

#include "unit/solve/support.h"

using namespace gaskettle;
using namespace gaskettle::test;

namespace {

/// Source: B. van der Pol, On relaxation-oscillations, Phil. Mag. 2 (1926) 978-992.
struct VanDerPol : Textbook<VanDerPol, 2> {
  double mu = 1000;
  template <class S>
  void f(const S&, const S* y, S* d) {
    d[0] = y[1];
    d[1] = mu * (1.0 - y[0] * y[0]) * y[1] - y[0];
  }
};

struct Oscillator : Textbook<Oscillator, 2> {
  template <class S>
  void f(const S&, const S* y, S* d) {
    d[0] = y[1];
    d[1] = -1.0 * y[0];
  }
};

/// An oscillator beside a film whose rate is fast in the middle third of a 300 s run.
struct Spell : Textbook<Spell, 3> {
  double rate = 0.5;
  template <class S>
  void f(const S&, const S* y, S* d) {
    d[0] = y[1];
    d[1] = -1.0 * y[0];
    d[2] = rate * (y[0] - y[2]);
  }
  double next_time_event(double t) const { return t < 100 ? 100 : t < 200 ? 200 : 1e300; }
  EventResult on_events(double t, double*, const std::vector<int>&, bool) {
    rate = t < 150 ? 1e5 : 0.5;
    return {true, false, ""};
  }
};

}  // namespace

TEST_CASE("a problem that is not stiff is soon left to the explicit pair") {
  Oscillator p;
  Watcher watcher(2);
  std::vector<double> y{1.0, 0.0};
  const Ending end = integrate(p, watcher, settings(200, 1e-8, Method::automatic), y);
  CHECK(end.stats.steps_explicit > 0.9 * end.stats.steps);
  CHECK(end.stats.method_changes == 1);
  CHECK(y[0] == Approx(std::cos(200.0)).margin(1e-5));
}

TEST_CASE("a stiff spell in the middle brings the stiff method back, and no longer") {
  Spell p;
  Watcher watcher(3);
  std::vector<double> y{1.0, 0.0, 1.0};
  const Ending end = integrate(p, watcher, settings(300, 1e-7, Method::automatic), y);
  REQUIRE(end.reason == EndReason::end_time);
  CHECK(end.stats.method_changes >= 3);
  CHECK(end.stats.method_changes <= 7);
  CHECK(end.stats.steps_stiff > 100);
  CHECK(end.stats.steps_explicit > 100);
  CHECK(y[0] == Approx(std::cos(300.0)).margin(1e-4));

  Spell again;
  Watcher other(3);
  std::vector<double> z{1.0, 0.0, 1.0};
  const Ending stiff = integrate(again, other, settings(300, 1e-7, Method::stiff), z);
  CHECK(z[2] == Approx(y[2]).margin(1e-4));
  // An explicit pair would need 1e5 x 100 s / 3.3 = 3 million steps in the spell.
  CHECK(end.stats.steps < 4 * stiff.stats.steps);
}

TEST_CASE("Van der Pol's relaxation ends with the same period from every method") {
  double period[2];
  int k = 0;
  for (const Method method : {Method::automatic, Method::stiff}) {
    struct Crossing : VanDerPol {
      int guard_count() const { return 1; }
      void guards(double, const double* y, double* g) { g[0] = y[0]; }
      bool guard_disturbs(int) const { return false; }
    } p;
    Watcher watcher(2);
    std::vector<double> y{-2.0, 0.0};
    const Ending end = integrate(p, watcher, settings(4000, 1e-8, method), y);
    REQUIRE(end.reason == EndReason::end_time);
    const auto up = times_of(watcher, 0);
    REQUIRE(up.size() >= 2);
    period[k++] = up[1] - up[0];
    CHECK(end.stats.steps < 20000);  // the explicit pair would need a million and more
  }
  CHECK(period[0] == Approx(period[1]).epsilon(1e-6));
  // T = (3 - 2 ln 2) mu + 7.0143 mu^(-1/3) + ...: A. A. Dorodnicyn (1947), as quoted in J. Grasman, Asymptotic
  // Methods for Relaxation Oscillations and Applications (1987), section 2.1. The next term is of size ln(mu)/mu.
  CHECK(period[1] == Approx((3 - 2 * std::log(2.0)) * 1000 + 7.0143 * 0.1).margin(0.02));
}

TEST_CASE("the same run gives the same numbers") {
  std::vector<double> last;
  for (int repeat = 0; repeat < 2; ++repeat) {
    Spell p;
    Watcher watcher(3);
    std::vector<double> y{1.0, 0.0, 1.0};
    integrate(p, watcher, settings(300, 1e-6, Method::automatic), y);
    if (repeat == 1) CHECK(y == last);
    last = y;
  }
}
