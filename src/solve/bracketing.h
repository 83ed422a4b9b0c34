/// One root between two signs, and one peak between two lower points.
#pragma once
#include <algorithm>
#include <cmath>
#include <limits>

namespace gaskettle {

/// Resolution of event times at t in a run of that length, s: 4 units in the last
/// place of t plus 1e-13 of the run. Soon after the start of a step the second part
/// gives way to a thousandth of the time since then: events that follow each other
/// ever faster must not be spaced by the search itself.
inline double time_tolerance(double t, double run_length, double since_start) {
  return 4 * std::numeric_limits<double>::epsilon() * std::fabs(t) + std::min(1e-13 * run_length, 1e-3 * since_start);
}

/// Where g first reaches zero between a (g < 0) and b (g >= 0): the upper end of a
/// bracket no wider than tolerance(b), so that g >= 0 there. Regula falsi with the
/// Illinois weighting; whenever three steps have not halved the bracket it is
/// bisected, which bounds the work at four calls a binary digit.
///
/// Source: M. Dowell, P. Jarratt, A modified regula falsi method for computing the
/// root of an equation, BIT 11 (1971) 168-174.
template <class G, class Tolerance>
double rising_root(G&& g, double a, double b, double ga, double gb, Tolerance&& tolerance) {
  int side = 0, slow = 0;
  double target = 0.5 * (b - a);
  for (double width = tolerance(b); b - a > width; width = tolerance(b)) {
    double c = slow >= 3 ? 0.5 * (a + b) : (a * gb - b * ga) / (gb - ga);
    if (!(c > a + 0.25 * width)) c = a + 0.25 * width;
    if (!(c < b - 0.25 * width)) c = b - 0.25 * width;
    const double gc = g(c);
    if (gc >= 0) {
      b = c;
      gb = gc;
      if (side == 1) ga *= 0.5;
      side = 1;
    } else {
      a = c;
      ga = gc;
      if (side == -1) gb *= 0.5;
      side = -1;
    }
    ++slow;
    if (b - a <= target || slow > 3) {
      target = 0.5 * (b - a);
      slow = 0;
    }
  }
  return b;
}

struct Vertex {
  double time = 0, height = 0;
  bool peak = false;  ///< false where the parabola has no highest point
};

/// Vertex of the parabola through three points, a < b < c.
inline Vertex parabola_peak(double a, double b, double c, double ga, double gb, double gc) {
  const double left = (gb - ga) / (b - a), right = (gc - gb) / (c - b);
  const double curvature = (right - left) / (c - a);
  if (!(curvature < 0)) return {};
  const double slope_at_b = (left * (c - b) + right * (b - a)) / (c - a);
  const double shift = -0.5 * slope_at_b / curvature;
  return {b + shift, gb + 0.5 * slope_at_b * shift, true};
}

/// Whether a peak predicted at `height` may reach zero although the best sample is `best` < 0:
/// the rise above that sample may be twice what the parabola says.
inline bool may_reach_zero(double height, double best) { return height + std::fabs(height - best) >= 0; }

/// Looks for g >= 0 around the peak of a bump between a and c (both below zero) from a
/// first guess b. True with that time in `found`; gives up when the parabola says that
/// the top stays below zero.
template <class G>
bool find_peak(G&& g, double a, double b, double c, double ga, double gc, double tolerance, double& found) {
  double gb = g(b);
  for (int pass = 0; pass < 10; ++pass) {
    if (gb >= 0) {
      found = b;
      return true;
    }
    if (gb <= ga && gb <= gc) return false;
    const Vertex top = parabola_peak(a, b, c, ga, gb, gc);
    if (!top.peak || !(top.time > a && top.time < c)) return false;
    if (!may_reach_zero(top.height, gb)) return false;
    if (std::fabs(top.time - b) <= 0.1 * tolerance) return false;
    const double gt = g(top.time);
    if (gt > gb) {  // the better point becomes the middle
      (top.time > b ? a : c) = b;
      (top.time > b ? ga : gc) = gb;
      b = top.time;
      gb = gt;
    } else {
      (top.time > b ? c : a) = top.time;
      (top.time > b ? gc : ga) = gt;
    }
  }
  return false;
}

}  // namespace gaskettle
