#include "model/signal.h"

#include <algorithm>
#include <limits>
#include <numbers>

namespace gaskettle {

Signal Signal::constant(double level) {
  Signal s;
  s.level_ = level;
  s.points_ = {{0.0, level}};
  return s;
}

Signal Signal::schedule(std::vector<std::pair<double, double>> points, bool held, long repeats) {
  Signal s;
  s.points_ = std::move(points);
  s.held_ = held;
  s.repeats_ = repeats;
  s.advance(0.0);
  return s;
}

Signal Signal::ramp(double from, double to, double rate) {
  const double duration = std::abs(to - from) / rate;
  if (duration <= 0.0) return constant(to);
  return schedule({{0.0, from}, {duration, to}}, false, 0);
}

Signal Signal::sine(double mean, double amplitude, double frequency_hz) {
  Signal s;
  s.sine_ = true;
  s.mean_ = mean;
  s.amplitude_ = amplitude;
  s.omega_ = 2.0 * std::numbers::pi * frequency_hz;
  return s;
}

/// The repetition that holds at t >= the first point, in the same arithmetic as `time_of`.
double Signal::repetition(double t) const {
  if (repeats_ == 0) return 0.0;
  const double first = points_.front().first, period = points_.back().first - first;
  if (period <= 0.0) return 0.0;
  double n = std::floor((t - first) / period);
  if (first + (n + 1.0) * period <= t) n += 1.0;
  if (first + n * period > t) n -= 1.0;
  return repeats_ > 0 ? std::min(n, static_cast<double>(repeats_ - 1)) : n;
}

/// Time of point i in repetition n. One repetition ends exactly where the next begins, whatever the rounding.
double Signal::time_of(std::size_t i, double n) const {
  const double first = points_.front().first, last = points_.back().first, time = points_[i].first;
  if (repeats_ == 0) return time;
  return time == last ? first + (n + 1.0) * (last - first) : time + n * (last - first);
}

double Signal::next_corner(double t) const {
  constexpr double never = std::numeric_limits<double>::infinity();
  if (sine_ || points_.size() < 2) return never;
  const double n = t < points_.front().first ? 0.0 : repetition(t);
  for (std::size_t i = 0; i < points_.size(); ++i)
    if (const double corner = time_of(i, n); corner > t) return corner;
  // No point after t in the repetition that holds: it is the last one.
  return never;
}

void Signal::advance(double t) {
  if (sine_ || points_.empty()) return;
  slope_ = 0.0;
  start_ = t;
  level_ = points_.front().second;
  if (t < points_.front().first) return;
  const double n = repetition(t);
  std::size_t next = points_.size();  // the first point after t
  while (next > 0 && time_of(next - 1, n) > t) --next;
  if (next == 0) return;
  level_ = points_[next - 1].second;
  if (held_ || next == points_.size()) return;
  const auto& [t0, v0] = points_[next - 1];
  const auto& [t1, v1] = points_[next];
  slope_ = (v1 - v0) / (t1 - t0);
  start_ = time_of(next - 1, n);
}

std::pair<double, double> Signal::range() const {
  if (sine_) return {mean_ - std::abs(amplitude_), mean_ + std::abs(amplitude_)};
  double low = std::numeric_limits<double>::infinity(), high = -low;
  for (const auto& p : points_) {
    low = std::min(low, p.second);
    high = std::max(high, p.second);
  }
  return {low, high};
}

Signal SignalSpec::make(double start) const {
  switch (kind) {
    case Kind::schedule:
      return Signal::schedule(points, held, repeats);
    case Kind::ramp:
      return Signal::ramp(has_ramp_from ? ramp_from : start, ramp_to, ramp_rate);
    case Kind::sine:
      return Signal::sine(level, amplitude, frequency);
    case Kind::constant:
      break;
  }
  return Signal::constant(level);
}

double SignalSpec::initial(double start) const { return make(start).at(0.0); }

}  // namespace gaskettle
