#include "model/signal.h"

#include <catch2/catch.hpp>
#include <limits>
#include <numbers>

#include "base/dual.h"

using namespace gaskettle;

namespace {
constexpr double never = std::numeric_limits<double>::infinity();

/// The corners from t on, at most so many.
std::vector<double> corners(const Signal& s, double t, std::size_t most) {
  std::vector<double> list;
  while (list.size() < most && (t = s.next_corner(t)) < never) list.push_back(t);
  return list;
}
double after(Signal& s, double t) {
  s.advance(t);
  return s.at(t);
}
}  // namespace

TEST_CASE("a constant has no corners") {
  const Signal s = Signal::constant(3.5);
  CHECK(s.at(0.0) == 3.5);
  CHECK(s.at(1e9) == 3.5);
  CHECK(s.slope(7.0) == 0.0);
  CHECK(s.next_corner(0.0) == never);
  CHECK_FALSE(s.varies());
}

TEST_CASE("straight lines between points, end values outside") {
  Signal s = Signal::schedule({{10.0, 1.0}, {20.0, 5.0}, {30.0, -3.0}}, false, 0);
  CHECK(corners(s, 0.0, 9) == std::vector<double>{10.0, 20.0, 30.0});
  CHECK(after(s, 0.0) == 1.0);
  CHECK(s.at(5.0) == 1.0);
  CHECK(after(s, 10.0) == 1.0);
  CHECK(s.slope(10.0) == 0.4);
  CHECK(s.at(15.0) == 3.0);
  CHECK(s.at(20.0) == 5.0);
  CHECK(s.at(25.0) == 7.0);  // the segment goes on smoothly until it is advanced
  CHECK(after(s, 20.0) == 5.0);
  CHECK(s.at(25.0) == 1.0);
  CHECK(after(s, 30.0) == -3.0);
  CHECK(s.at(99.0) == -3.0);
  CHECK(s.range() == std::pair{-3.0, 5.0});
}

TEST_CASE("held values jump") {
  Signal s = Signal::schedule({{0.0, 1.0}, {20.0, 5.0}}, true, 0);
  CHECK(s.at(0.0) == 1.0);
  CHECK(s.at(19.0) == 1.0);
  CHECK(s.slope(19.0) == 0.0);
  CHECK(after(s, 20.0) == 5.0);
}

TEST_CASE("two points at one time are a jump") {
  Signal s = Signal::schedule({{0.0, 0.0}, {10.0, 1.0}, {10.0, 4.0}, {20.0, 4.0}}, false, 0);
  CHECK(s.at(10.0) == 1.0);
  CHECK(after(s, 10.0) == 4.0);
  CHECK(s.slope(10.0) == 0.0);
  CHECK(corners(s, 0.0, 9) == std::vector<double>{10.0, 20.0});
}

TEST_CASE("a schedule repeats, and ends with its last value") {
  Signal s = Signal::schedule({{0.0, 0.0}, {4.0, 8.0}, {10.0, 2.0}}, false, 3);
  CHECK(corners(s, 0.0, 99) == std::vector<double>{4.0, 10.0, 14.0, 20.0, 24.0, 30.0});
  CHECK(after(s, 10.0) == 0.0);  // the next run begins
  CHECK(s.at(12.0) == 4.0);
  CHECK(after(s, 24.0) == 8.0);
  CHECK(after(s, 30.0) == 2.0);
  CHECK(s.at(1e6) == 2.0);
  CHECK(s.next_corner(30.0) == never);
}

TEST_CASE("a schedule repeated for ever meets every corner once, far out as well") {
  // 0.1 is no binary number: rounding must neither lose nor double a corner.
  const Signal s = Signal::schedule({{0.0, 0.0}, {0.1, 1.0}, {0.3, 0.0}}, false, -1);
  double t = 0.0;
  for (int n = 0; n < 20000; ++n) {
    const double next = s.next_corner(t), gap = next - t;
    const double due = n % 2 == 0 ? 0.1 : 0.2;
    if (std::abs(gap - due) > 1e-9) FAIL("corner " << n << ": " << gap);
    t = next;
  }
  CHECK(t == Approx(3000.0).epsilon(1e-12));
}

TEST_CASE("advancing to each corner in turn never leaves a value of the wrong run") {
  Signal s = Signal::schedule({{0.0, 1.0}, {0.1, 7.0}, {0.3, 7.0}}, true, -1);
  double t = 0.0;
  for (int n = 0; n < 20000; ++n) {
    t = s.next_corner(t);
    s.advance(t);
    const double due = n % 2 == 0 ? 7.0 : 1.0;
    if (s.at(t) != due) FAIL("corner " << n << " at " << t << " s: " << s.at(t));
  }
}

TEST_CASE("a repeated schedule that starts late") {
  Signal s = Signal::schedule({{5.0, 1.0}, {8.0, 2.0}, {9.0, 1.0}}, true, 2);
  CHECK(after(s, 0.0) == 1.0);
  CHECK(corners(s, 0.0, 9) == std::vector<double>{5.0, 8.0, 9.0, 12.0, 13.0});
  CHECK(after(s, 8.0) == 2.0);
  CHECK(after(s, 9.0) == 1.0);
  CHECK(after(s, 12.0) == 2.0);
  CHECK(after(s, 13.0) == 1.0);
}

TEST_CASE("a ramp goes at its rate, up or down, and stays") {
  for (const double to : {50.0, -50.0}) {
    Signal s = Signal::ramp(20.0, to, 2.0);
    const double sign = to > 20.0 ? 1.0 : -1.0, duration = std::abs(to - 20.0) / 2.0;
    CHECK(s.at(3.0) == Approx(20.0 + sign * 6.0));
    CHECK(s.slope(3.0) == Approx(sign * 2.0));
    CHECK(s.next_corner(0.0) == Approx(duration));
    CHECK(after(s, s.next_corner(0.0)) == to);
  }
  CHECK_FALSE(Signal::ramp(20.0, 20.0, 2.0).varies());
}

TEST_CASE("a sine and its slope") {
  const Signal s = Signal::sine(3.0, 2.0, 0.25);
  CHECK(s.at(0.0) == 3.0);
  CHECK(s.at(1.0) == Approx(5.0));
  CHECK(s.at(3.0) == Approx(1.0));
  CHECK(s.slope(0.0) == Approx(2.0 * 2.0 * std::numbers::pi * 0.25));
  CHECK(s.next_corner(0.0) == never);
  CHECK(s.range() == std::pair{1.0, 5.0});
  // The slope is the derivative, by duals.
  Dual<1> t(0.7);
  t.d[0] = 1.0;
  CHECK(s.at(t).d[0] == Approx(s.slope(0.7)).epsilon(1e-14));
}

TEST_CASE("a specification makes its signal once a ramp's start is known") {
  SignalSpec spec;
  spec.kind = SignalSpec::Kind::ramp;
  spec.ramp_to = 10.0;
  spec.ramp_rate = 1.0;
  CHECK(spec.make(4.0).at(0.0) == 4.0);
  CHECK(spec.initial(4.0) == 4.0);
  spec.has_ramp_from = true;
  spec.ramp_from = 7.0;
  CHECK(spec.make(4.0).at(0.0) == 7.0);
  SignalSpec constant;
  constant.level = 2.5;
  CHECK(constant.make(99.0).at(123.0) == 2.5);
}
