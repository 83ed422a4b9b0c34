/// Finds the first instant inside a step at which guards rise through zero.
///
/// Guards are looked at on the step's curve, at both ends and at a few times inside.
/// Between two looks a guard may have come up and gone again: where a parabola
/// through three of them peaks near zero, that peak is looked at too. Once a root is
/// known, everything is looked at again on the shorter span, so that an event that
/// came and went before it is not lost.
///
/// A guard is armed while it may fire: from when it has been below zero until it
/// fires. Steps are open on the left and closed on the right: a zero at the end of a
/// step belongs to it. One that is exactly zero where its first step starts, and
/// positive just after, fires at the start.
#pragma once
#include <algorithm>
#include <vector>

#include "solve/bracketing.h"

namespace gaskettle {

/// The first event in a span, if any.
struct FoundEvent {
  bool any = false;
  double time = 0;         ///< s
  int leading = -1;        ///< the guard whose root `time` is
  double level = 0;        ///< what it rises through: 0, or a trace above it (see bracket_after_firing)
  std::vector<int> fired;  ///< all within the time tolerance of zero, ascending
};

class EventSearch {
public:
  /// All guards start armed. `samples` >= 1 looks inside each step.
  EventSearch(int guards, int samples, double run_length);

  /// Arms every guard that is below zero; `g` are the guards where the state is settled.
  void rearm(const double* g);
  /// The guard has fired at a root, where its value is g, which rounding may have left just below zero.
  void disarm(int q, double g);
  /// The guard has fired because an event made it jump above zero.
  void disarm_jumped(int q);
  /// The run has moved on to where the guards are g: those that are still exactly where they fired count as just
  /// fired; any that is below zero may be armed.
  void moved_on(const double* g);
  /// Armed guards above zero: they fire where the state is.
  void pending(const double* g, std::vector<int>& fired) const;

  /// Samples the span from..to: look(t, g) writes all guards at t; those at the ends are known.
  template <class Look>
  void sample(Look&& look, double from, double to, const double* g_from, const double* g_to) {
    rows_ = samples_ + 2;
    end_ = to;
    for (int r = 0; r < rows_; ++r) times_[r] = from + (to - from) * r / (rows_ - 1);
    times_[rows_ - 1] = to;
    std::copy_n(g_from, guards_, row(0));
    std::copy_n(g_to, guards_, row(rows_ - 1));
    for (int r = 1; r + 1 < rows_; ++r) look(times_[r], row(r));
  }

  /// The first event among guards with wanted(q) in the span last sampled. Without one
  /// the samples stay as they are; with one they are used up.
  template <class Look, class Wanted>
  void earliest(Look&& look, Wanted&& wanted, FoundEvent& found) {
    found.any = false;
    found.fired.clear();
    bool shorter = true;
    while (shorter) {
      shorter = false;
      for (int q = 0; q < guards_; ++q)
        if (wanted(q) && !(found.any && found.leading == q) && improve(look, q, found)) shorter = true;
    }
    if (found.any) collect(look, wanted, found);
  }

private:
  struct Bracket {
    double a = 0, b = 0, ga = 0, gb = 0;
    double level = 0;
    bool at_start = false;
  };

  double tolerance(double t) const { return time_tolerance(t, run_length_, t - times_[0]); }
  /// Where a guard fired it must be clearly below zero to be armed; at any later look, below zero.
  double margin_at(int r, int q) const { return r == 0 ? margin_[q] : 0; }
  double* row(int r) { return values_.data() + static_cast<std::size_t>(r) * guards_; }
  double at(int r, int q) const { return values_[static_cast<std::size_t>(r) * guards_ + q]; }
  Bracket between(int r, int q) const { return {times_[r], times_[r + 1], at(r, q), at(r + 1, q), 0, false}; }
  /// Armed and below zero at some look before the last one.
  bool came_from_below(int q) const;
  /// The event left the guard where it fired.
  bool still_at_root(int q, double g) const;
  template <class Look>
  double one(Look&& look, int q, double t) {
    look(t, scratch_.data());
    return scratch_[q];
  }

  /// Lowers found.time if guard q has an earlier root, and shortens the span to it.
  template <class Look>
  bool improve(Look&& look, int q, FoundEvent& found) {
    Bracket in;
    if (!bracket(look, q, in)) return false;
    double root = times_[0];
    if (!in.at_start) {
      root = rising_root([&](double t) { return one(look, q, t) - in.level; }, in.a, in.b, in.ga - in.level,
                         in.gb - in.level, [&](double t) { return tolerance(t); });
    }
    if (found.any && root >= found.time) return false;
    found.any = true;
    found.time = root;
    found.leading = q;
    found.level = in.level;
    shorten(look, root);
    return true;
  }

  /// Drops samples beyond t, makes t the last one, and keeps at least one look inside.
  template <class Look>
  void shorten(Look&& look, double t) {
    int last = 0;
    while (last + 1 < rows_ && times_[last] < t) ++last;
    if (last == 1) {
      times_[1] = 0.5 * (times_[0] + t);
      look(times_[1], row(1));
      last = 2;
    }
    times_[last] = t;
    look(t, row(last));
    rows_ = last + 1;
  }

  /// The first interval in which guard q, being armed, comes up to zero.
  template <class Look>
  bool bracket(Look&& look, int q, Bracket& out) {
    if (rows_ < 2) return false;
    if (armed_[q] && at(0, q) == 0 && bracket_from_zero(look, q, out)) return true;
    if (just_fired_[q] && still_at_root(q, at(0, q)) && bracket_after_firing(look, q, out)) return true;
    bool armed = armed_[q];
    for (int r = 0; r + 1 < rows_; ++r) {
      armed = armed || at(r, q) < -margin_at(r, q);
      const bool ends_below = at(r + 1, q) < 0;
      if (armed && at(r, q) < 0) {
        out = between(r, q);
        if (!ends_below || hidden_peak(look, q, r, out)) return true;
      } else if (!armed && !ends_below && hidden_dip(look, q, r, out)) {
        return true;
      }
    }
    return false;
  }

  /// Exactly zero where the span starts: what it does next decides.
  template <class Look>
  bool bracket_from_zero(Look&& look, int q, Bracket& out) {
    out = between(0, q);
    out.a += 1e-6 * (out.b - out.a);
    out.ga = one(look, q, out.a);
    out.at_start = out.ga > 0;
    return out.at_start || (out.ga < 0 && out.gb >= 0);
  }

  /// A guard that fired where the span starts and is up again at the first look: did it
  /// come down in between (a ball that bounces within one step)? Its slope at the start
  /// tells. Looks go closer and closer; a guard that simply keeps rising shows the same
  /// slope twice. One whose slope vanishes down to the resolution of numbers has come
  /// back faster than can be seen: it fires as soon as it is above its start. The
  /// level is the value at the start, which rounding may have left above zero by more
  /// than a short excursion is deep.
  template <class Look>
  bool bracket_after_firing(Look&& look, int q, Bracket& out) {
    const double start = times_[0], first = at(0, q);
    int r = 1;
    while (r + 1 < rows_ && at(r, q) == first) ++r;
    out = {start, times_[r], first, at(r, q), std::max(first, 0.0), false};
    if (out.gb < out.level) return false;
    double slope = (out.gb - first) / (out.b - start);
    // Slope at the start if the next two looks lie on a parabola: none is the first sign of a return.
    const double wide = r + 1 < rows_ ? (at(r + 1, q) - first) / (times_[r + 1] - start) : slope;
    int bends = r > 1 || 2 * slope - wide <= 0.05 * slope ? 1 : 0;
    bool unseen = false;
    for (int closer = 0; closer < 12 && slope > 0; ++closer) {
      const double t = start + (out.b - start) / 16;
      unseen = !(t > start);
      if (unseen) break;
      const double g = one(look, q, t), next_slope = (g - first) / (t - start);
      if (g < first) {
        out.a = t;
        out.ga = g;
        return true;
      }
      if (next_slope > 0.6 * slope) return false;
      if (g <= out.level) break;
      if (next_slope < 0.3 * slope) ++bends;
      slope = next_slope;
      out.b = t;
      out.gb = g;
    }
    if (first >= 0) out.level = std::nextafter(first, std::numeric_limits<double>::max());
    return (unseen || bends > 0) && out.gb >= out.level;
  }

  /// Below zero at both ends of interval r, but perhaps not in between.
  template <class Look>
  bool hidden_peak(Look&& look, int q, int r, Bracket& out) {
    const auto g = [&](double t) { return one(look, q, t); };
    double found = 0;
    for (int left = std::max(0, r - 1); left <= r && left + 2 < rows_; ++left)
      if (const Vertex top = peak_of(q, left, 1, 0); in_interval(top, r))
        if (may_reach_zero(top.height, std::max(out.ga, out.gb)) &&
            find_peak(g, out.a, top.time, out.b, out.ga, out.gb, tolerance(out.b), found)) {
          out.b = found;
          out.gb = one(look, q, found);
          return true;
        }
    return false;
  }

  /// Not below zero at both ends of interval r, but perhaps in between, and then up again.
  template <class Look>
  bool hidden_dip(Look&& look, int q, int r, Bracket& out) {
    out = between(r, q);
    const double depth = margin_[q] + std::numeric_limits<double>::min();
    const auto below = [&](double t) { return -one(look, q, t) - depth; };
    double found = 0;
    for (int left = std::max(0, r - 1); left <= r && left + 2 < rows_; ++left)
      if (const Vertex top = peak_of(q, left, -1, -depth); in_interval(top, r))
        if (may_reach_zero(top.height, std::max(-out.ga, -out.gb) - depth) &&
            find_peak(below, out.a, top.time, out.b, -out.ga - depth, -out.gb - depth, tolerance(out.b), found)) {
          out.a = found;
          out.ga = one(look, q, found);
          return true;
        }
    return false;
  }

  /// Peak of the parabola through three samples of sign g + shift.
  Vertex peak_of(int q, int left, double sign, double shift) const {
    return parabola_peak(times_[left], times_[left + 1], times_[left + 2], sign * at(left, q) + shift,
                         sign * at(left + 1, q) + shift, sign * at(left + 2, q) + shift);
  }
  bool in_interval(const Vertex& top, int r) const {
    return top.peak && top.time > times_[r] && top.time < times_[r + 1];
  }

  /// All wanted guards that are armed and within the time tolerance of zero.
  template <class Look, class Wanted>
  void collect(Look&& look, Wanted&& wanted, FoundEvent& found) {
    const double later = std::min(end_, found.time + tolerance(found.time));
    look(later, scratch_.data());
    const bool at_start = rows_ == 1;
    for (int q = 0; q < guards_; ++q) {
      if (!wanted(q)) continue;
      const bool up = at_start ? scratch_[q] > 0 : scratch_[q] >= 0 || at(rows_ - 1, q) >= 0;
      if (q == found.leading || (up && (at_start ? armed_[q] : came_from_below(q)))) found.fired.push_back(q);
    }
  }

  int guards_, samples_, rows_ = 0;
  double run_length_, end_ = 0;
  std::vector<char> armed_, just_fired_;
  std::vector<double> fired_at_;  // value of the guard when it fired
  std::vector<double> margin_;    // a disarmed guard must fall below minus this to be armed
  std::vector<double> times_, values_, scratch_;
};

}  // namespace gaskettle
