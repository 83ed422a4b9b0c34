// Linear invariants survive steps and curves to rounding.
#include <catch2/catch.hpp>

#include "unit/solve/support.h"

using namespace gaskettle;
using namespace gaskettle::test;

namespace {

/// Four stores passing content round, forced by time: the sum of all rates is exactly zero
/// up to the rounding of each transfer's two signs.
struct Network : Textbook<Network, 4> {
  bool nonlinear = false;
  template <class S>
  void f(const S& t, const S* y, S* d) {
    using std::cos;
    for (int i = 0; i < 4; ++i) d[i] = S(0.0);
    for (int i = 0; i < 4; ++i) {
      const int j = (i + 1) % 4;
      const S pull = (i + 1.0) * (1.0 + 0.5 * cos(3.0 * t + 1.0 * i));
      const S flow = nonlinear ? pull * (y[i] * y[i] - 0.3 * y[j] * y[i]) : pull * (y[i] - 0.3 * y[j]);
      d[i] -= flow;
      d[j] += flow;
    }
  }
};

}  // namespace

TEST_CASE("the sum of a conservative network stays to rounding at any accuracy") {
  for (const bool nonlinear : {false, true})
    for (const Method method : {Method::stiff, Method::explicit_, Method::automatic})
      for (const double rtol : {1e-3, 1e-10}) {
        Network p;
        p.nonlinear = nonlinear;
        Watcher watcher(4);
        double worst = 0;
        watcher.look_ = [&](double, const double* y) {
          worst = std::max(worst, std::fabs(y[0] + y[1] + y[2] + y[3] - 1.0));
        };
        std::vector<double> y{0.4, 0.3, 0.2, 0.1};
        Settings s = settings(100, rtol, method);
        s.h_max = 0.01;  // at least 10 000 steps
        const Ending end = integrate(p, watcher, s, y);
        REQUIRE(end.reason == EndReason::end_time);
        CHECK(end.stats.steps >= 9800);
        INFO("method " << static_cast<int>(method) << " nonlinear " << nonlinear << " rtol " << rtol);
        // Each step rounds four states of size 0.3 at most once or twice in 1e-17..5e-17; 10^4 such roundings with
        // random signs make about 100 times that, 5e-15.
        CHECK(worst < 1e-14);
      }
}
