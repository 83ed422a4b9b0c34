#include "run/sampling.h"

#include <algorithm>
#include <boost/math/tools/minima.hpp>
#include <cmath>
#include <limits>

#include "laws/nozzle.h"

namespace gaskettle {

namespace {
constexpr int samples_per_piece = 6;
constexpr double infinity = std::numeric_limits<double>::infinity();
}  // namespace

RowSampler::RowSampler(Plant& plant, RecordWriter* writer, double every)
    : plant_(plant), writer_(writer), every_(every) {
  y_.resize(static_cast<std::size_t>(plant.size()));
}

void RowSampler::row(double t, const double* y) {
  if (writer_ == nullptr || t <= last_) return;
  const Workspace<double>& w = plant_.observe(t, y);
  values_.assign(w.out.begin(), w.out.end());
  book_values(plant_, w, values_);
  profile_.clear();
  for (const ProfileDoc& p : plant_.layout().profiles)
    for (const int store : p.store) profile_.push_back(w.temperature[store]);
  writer_->append(t, values_, profile_);
  last_ = t;
}

void RowSampler::flush_pending() {
  if (!pending_) return;
  pending_ = false;
  row(pending_time_, pending_y_.data());
}

void RowSampler::start(double t, const double* y) {
  pending_ = true;  // events at time 0 still may change the first row
  pending_time_ = t;
  pending_y_.assign(y, y + plant_.size());
  next_ = 1;
}

void RowSampler::piece(const DenseStep& step, double from, double to) {
  flush_pending();
  (void)from;
  for (double t = static_cast<double>(next_) * every_; t < to; t = static_cast<double>(++next_) * every_) {
    if (t <= last_) continue;
    step.interpolate(t, y_.data());
    row(t, y_.data());
  }
}

void RowSampler::before_event(double t, const double* y) {
  if (pending_ && pending_time_ == t) return;  // a further event at one instant: the row before is written
  flush_pending();
  const double just_before = std::nextafter(t, -infinity);
  if (just_before > 0.0) row(just_before, y);
}

void RowSampler::after_event(double t, const double* y) {
  pending_ = true;
  pending_time_ = t;
  pending_y_.assign(y, y + plant_.size());
}

void RowSampler::finish(double t, const double* y) {
  if (pending_ && pending_time_ == t) pending_y_.assign(y, y + plant_.size());
  flush_pending();
  row(t, y);
}

ExtremeTracker::ExtremeTracker(Plant& plant) : plant_(plant) {
  y_.resize(static_cast<std::size_t>(plant.size()));
  for (const ReliefInfo& info : plant.layout().reliefs) {
    ReliefOutcome r;
    r.name = info.name;
    r.disc = info.disc;
    r.set_pressure = info.set_pressure;
    reliefs_.push_back(r);
  }
  const std::vector<ChannelDoc>& channels = plant.layout().channels;
  for (std::size_t c = 0; c < channels.size(); ++c) {
    const UnitKind& kind = channels[c].kind;
    const bool told =
        kind.flavour == UnitFlavour::temperature || kind.flavour == UnitFlavour::pressure || kind.si == "m";
    if (!told || channels[c].name.find(".setpoint") != std::string::npos) continue;
    ranged_channels_.push_back(static_cast<int>(c));
    ranges_.push_back({channels[c].name, kind, channels[c].unit, infinity, 0.0, -infinity, 0.0, 0.0});
  }
  for (const SpaceInfo& s : plant.layout().spaces) {
    ideal_gas_.push_back({s.name, 0.0, 0.0});
    departure_.emplace_back(s.composition);
  }
}

/// Lowest, highest and latest of what people ask for first; how far each gas is from ideal.
void ExtremeTracker::take_ranges(double t, const Workspace<double>& w) {
  for (std::size_t i = 0; i < ranges_.size(); ++i) {
    ChannelRange& r = ranges_[i];
    const double x = w.out[ranged_channels_[i]], rounding = 1e-12 * std::abs(x);
    if (x < r.lowest - rounding) {
      r.lowest = x;
      r.lowest_time = t;
    }
    if (x > r.highest + rounding) {
      r.highest = x;
      r.highest_time = t;
    }
    r.end = x;
  }
  for (std::size_t s = 0; s < departure_.size(); ++s) {
    const double d = departure_[s].at(w.gas[s].temperature, w.gas[s].pressure);
    if (d <= ideal_gas_[s].departure) continue;
    ideal_gas_[s].departure = d;
    ideal_gas_[s].time = t;
  }
}

void ExtremeTracker::take(double t, const Workspace<double>& w) {
  take_ranges(t, w);
  for (Limit& l : plant_.watch().limits()) {
    const double x = plant_.watch().limit_value(l, w);
    // A constant quantity has no later extreme: rounding is not worth a new time.
    const double rounding = 1e-12 * std::abs(l.extreme);
    const bool worse = l.below ? x > l.extreme + rounding : x < l.extreme - rounding;
    if (!worse && l.extreme == l.extreme) continue;
    l.extreme = x;
    l.extreme_time = t;
  }
}

void ExtremeTracker::take_relief(double t, const double* y, const Workspace<double>& w) {
  const Layout& layout = plant_.layout();
  for (std::size_t i = 0; i < reliefs_.size(); ++i) {
    const ReliefInfo& info = layout.reliefs[i];
    ReliefOutcome& r = reliefs_[i];
    const GasState<double>& gas = w.gas[info.space];
    const double opening = w.out[info.opening_channel];
    r.greatest_opening = std::max(r.greatest_opening, opening);
    r.released = w.out[info.released_channel];
    if (gas.pressure > r.peak_pressure) {
      r.peak_pressure = gas.pressure;
      const double behind = info.outlet_space >= 0 ? w.gas[info.outlet_space].pressure : layout.atmosphere_pressure;
      r.capacity =
          info.area * info.discharge_coefficient *
          nozzle_flux(gas.pressure, gas.temperature, gas.gas_constant, heat_capacity_ratio(gas), behind, w.band);
    }
    if (opening <= 0.0 && gas.pressure < info.set_pressure) continue;
    // What else raises the pressure, as a flow of this gas: the relief device's own share is added back.
    const PressureSlopes<double> slope =
        layout.mixture.pressure_slopes(gas, w.space_mass(info.space), w.volume[info.space]);
    const double total = w.total_mass(info.space);
    double per_mass = slope.by_energy * gas.enthalpy;
    for (int k = 0; k < w.species_count; ++k) per_mass += slope.by_mass[k] * w.space_mass(info.space)[k] / total;
    const double flow = w.out[info.flow_channel];
    const int pressure = plant_.layout().pressure_channel(info.space);
    const double rise = plant_.observe_with_rates(t, y).out_rate[pressure];
    r.needed = std::max(r.needed, rise / per_mass + flow);
  }
}

void ExtremeTracker::look(double t, const double* y) {
  const Workspace<double>& w = plant_.observe(t, y);
  take(t, w);
  if (!reliefs_.empty()) take_relief(t, y, w);
}

void ExtremeTracker::refine(const DenseStep& step, double low, double high, std::size_t i) {
  Limit& l = plant_.watch().limits()[i];
  const double sign = l.below ? -1.0 : 1.0;
  const auto f = [&](double t) {
    step.interpolate(t, y_.data());
    return sign * plant_.watch().limit_value(l, plant_.observe(t, y_.data()));
  };
  std::uintmax_t most = 30;
  const auto [t, x] = boost::math::tools::brent_find_minima(f, low, high, 26, most);
  const double rounding = 1e-12 * std::abs(l.extreme);
  if (l.below ? sign * x > l.extreme + rounding : sign * x < l.extreme - rounding) {
    l.extreme = sign * x;
    l.extreme_time = t;
  }
}

void ExtremeTracker::piece(const DenseStep& step, double from, double to) {
  std::vector<Limit>& limits = plant_.watch().limits();
  const std::size_t n = limits.size();
  std::vector<double> before(n), here(n);
  std::vector<double> times;
  for (int s = 0; s <= samples_per_piece; ++s)
    times.push_back(s == samples_per_piece ? to : from + (to - from) * s / samples_per_piece);
  std::vector<std::vector<double>> values(times.size(), std::vector<double>(n));
  for (std::size_t s = 0; s < times.size(); ++s) {
    step.interpolate(times[s], y_.data());
    const Workspace<double>& w = plant_.observe(times[s], y_.data());
    for (std::size_t i = 0; i < n; ++i) values[s][i] = plant_.watch().limit_value(limits[i], w);
    take(times[s], w);
    if (!reliefs_.empty()) take_relief(times[s], y_.data(), w);
  }
  for (std::size_t i = 0; i < n; ++i)
    for (std::size_t s = 1; s + 1 < times.size(); ++s) {
      const double sign = limits[i].below ? 1.0 : -1.0;
      const double a = sign * values[s - 1][i], b = sign * values[s][i], c = sign * values[s + 1][i];
      // Only a peak near the record can beat it.
      const bool peak = b >= a && b >= c && (b > a || b > c);
      if (peak && b + std::max(b - a, b - c) >= sign * limits[i].extreme) refine(step, times[s - 1], times[s + 1], i);
    }
}

void ExtremeTracker::finish(double t, const double* y) {
  look(t, y);
  for (ReliefOutcome& r : reliefs_) {
    for (const LoggedEvent& e : plant_.events())
      if (e.part == r.name && (e.what == "lifts" || e.what == "bursts") && r.lifts++ == 0) r.first_lift = e.time;
    const double atmosphere = plant_.layout().atmosphere_pressure;
    r.accumulation = (r.peak_pressure - r.set_pressure) / (r.set_pressure - atmosphere);
  }
}

}  // namespace gaskettle
