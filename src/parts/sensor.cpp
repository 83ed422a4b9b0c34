#include "parts/sensor.h"

#include <fmt/format.h>

#include <algorithm>

namespace gaskettle {

void Sensor::read(Section& s) {
  reads_ = s.reference("reads", "channel", "what it measures, such as chamber.temperature", true);
  if (const auto tau = s.optional_quantity("time_constant", unit_kinds::time,
                                           "of the first-order lag; starts at the true value", Range::positive))
    time_constant_ = *tau;
  // What unit these carry depends on the channel, which is known only when all parts are connected.
  offset_node_ = s.raw("offset", "difference in the channel's unit", "added to the reading", false);
  range_node_ = s.raw("range", "[low, high] in the channel's unit", "the reading stays within it", false);
  s.not_built_yet("resolution", "smallest step of a sampled reading");
  path_ = s.path();
  context_ = &s.context();
}

void Sensor::declare(Layout&) {}

void Sensor::connect(Layout& layout) {
  channel_read_ = layout.channel(reads_);
  if (channel_read_ < 0) return;
  const ChannelDoc read = layout.channels[channel_read_];
  if (read.phase == ChannelPhase::observed) {
    layout.error(reads_.place, fmt::format("'{}' is worked out for the record only; a sensor can read temperatures, "
                                           "pressures, volumes, masses, positions, flows and powers",
                                           reads_.name));
    return;
  }
  late_ = read.phase == ChannelPhase::flow;
  if (offset_node_ != nullptr)
    if (const auto v = read_value(*context_, *offset_node_, path_ + ".offset", difference_kind(read.kind), Range::any))
      offset_ = *v;
  if (range_node_ != nullptr) {
    if (!range_node_->is_list() || range_node_->items.size() != 2) {
      layout.error(range_node_->place, fmt::format("'{}.range' should be [low, high]", path_));
    } else {
      const auto low = read_value(*context_, range_node_->items[0], path_ + ".range", read.kind, Range::any);
      const auto high = read_value(*context_, range_node_->items[1], path_ + ".range", read.kind, Range::any);
      if (low && high && low->si >= high->si)
        layout.error(range_node_->place, fmt::format("'{}.range' must rise", path_));
      if (low && high) {
        low_ = *low;
        high_ = *high;
        ranged_ = true;
      }
    }
  }
  if (time_constant_ > 0.0) {
    const double typical = read.kind.flavour == UnitFlavour::temperature
                               ? 100.0
                               : (read.kind.flavour == UnitFlavour::pressure ? layout.atmosphere_pressure : 1.0);
    state_ = layout.add_state(name + ".lagged", typical);
  }
  channel_ = layout.add_channel(name + ".reading", read.kind, "reading of " + reads_.name,
                                time_constant_ > 0.0 || !late_ ? ChannelPhase::state : ChannelPhase::flow, read.unit);
}

void Sensor::start(Event& e) {
  if (state_ >= 0) e.y[state_] = e.before->out[channel_read_];
  if (!ranged_) return;
  const double raw = e.before->out[channel_read_] + offset_;
  clip_ = raw < low_ ? Clip::low : (raw > high_ ? Clip::high : Clip::none);
}

void Sensor::guards(const Workspace<double>& w, double* g) const {
  g[0] = g[1] = -1.0;
  if (!ranged_) return;
  const double raw = (state_ >= 0 ? w.y[state_] : w.out[channel_read_]) + offset_;
  g[0] = clip_ == Clip::high ? high_ - raw : (clip_ == Clip::none ? raw - high_ : -1.0);
  g[1] = clip_ == Clip::low ? raw - low_ : (clip_ == Clip::none ? low_ - raw : -1.0);
}

void Sensor::on_guard(int which, Event& e) {
  const double reading = e.before->out[channel_];
  const Clip end = which == 0 ? Clip::high : Clip::low;
  clip_ = clip_ == Clip::none ? end : Clip::none;
  e.log(name, clip_ == Clip::none ? "reading back in range" : "reading at the end of its range", reading, reading);
}

}  // namespace gaskettle
