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

namespace {
/// Start of the repetition that holds at t, and whether repeating is over.
double repetition_start(double t, double first, double last, long repeats) {
  const double period = last - first;
  if (repeats == 0 || period <= 0.0 || t < first) return 0.0;
  double n = std::floor((t - first) / period);
  // Rounding may leave t a hair below the boundary that it stands for.
  if (first + (n + 1.0) * period <= t) n += 1.0;
  if (repeats > 0) n = std::min(n, static_cast<double>(repeats - 1));
  return n * period;
}
}  // namespace

double Signal::next_corner(double t) const {
  constexpr double never = std::numeric_limits<double>::infinity();
  if (sine_ || points_.size() < 2) return never;
  const double first = points_.front().first, last = points_.back().first;
  const double shift = repetition_start(t, first, last, repeats_);
  for (const double s : {shift, shift + (last - first)}) {
    if (s > 0.0 && repeats_ >= 0 && s > (last - first) * static_cast<double>(std::max(repeats_ - 1, 0L)) * (1 + 1e-12)) break;
    for (const auto& p : points_)
      if (p.first + s > t) return p.first + s;
    if (repeats_ == 0) break;
  }
  return never;
}

void Signal::advance(double t) {
  if (sine_ || points_.empty()) return;
  const double first = points_.front().first, last = points_.back().first;
  const double shift = repetition_start(t, first, last, repeats_);
  // The last point whose time is not after t, as next_corner computes that time.
  std::size_t i = points_.size();
  while (i > 0 && points_[i - 1].first + shift > t) --i;
  slope_ = 0.0;
  start_ = t;
  if (i == 0) {
    level_ = points_.front().second;
  } else if (i == points_.size()) {
    level_ = points_.back().second;
  } else if (held_) {
    level_ = points_[i - 1].second;
  } else {
    const auto& [t0, v0] = points_[i - 1];
    const auto& [t1, v1] = points_[i];
    slope_ = (v1 - v0) / (t1 - t0);
    level_ = v0;
    start_ = t0 + shift;
  }
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
    case Kind::schedule: return Signal::schedule(points, held, repeats);
    case Kind::ramp: return Signal::ramp(has_ramp_from ? ramp_from : start, ramp_to, ramp_rate);
    case Kind::sine: return Signal::sine(level, amplitude, frequency);
    case Kind::constant: break;
  }
  return Signal::constant(level);
}

double SignalSpec::initial(double start) const { return make(start).at(0.0); }

}  // namespace gaskettle
