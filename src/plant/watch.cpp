#include "plant/watch.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

namespace gaskettle {

namespace {
constexpr double infinity = std::numeric_limits<double>::infinity();

struct TargetKeys {
  Reference when, after;
  const Node *reaches, *within, *of;
  std::string direction;
  std::optional<Value> duration;
  bool one_kind = true;  ///< reaches or settles_within, not both or neither
};

TargetKeys read_target(Section& s) {
  TargetKeys k;
  k.when = s.reference("when", "channel", "the quantity watched", true);
  k.one_kind = s.exactly_one_of({"reaches", "settles_within"});
  k.reaches = s.raw("reaches", "value in the channel's unit", "the first time it has this value", false);
  k.direction =
      s.choice("direction", {"rising", "falling", "either"}, "in which direction it reaches the value", "either");
  k.after = s.reference("after", "target", "only after this one was reached", false);
  k.within =
      s.raw("settles_within", "difference in the channel's unit", "half width of the band it must stay in", false);
  k.of = s.raw("of", "value in the channel's unit", "middle of the band", false);
  k.duration = s.optional_quantity("for", unit_kinds::time, "how long it must stay", Range::positive);
  return k;
}

struct LimitKeys {
  Reference of, minus, rate_of;
  const Node *below, *above, *design;
  std::optional<Value> accumulation;
  bool one_quantity = true, one_bound = true;
};

LimitKeys read_limit(Section& s) {
  LimitKeys k;
  k.one_quantity = s.exactly_one_of({"of", "rate_of"});
  k.of = s.reference("of", "channel", "the quantity limited", false);
  k.minus = s.reference("minus", "channel", "subtracted: the limit is on the difference", false);
  k.rate_of = s.reference("rate_of", "channel", "the limit is on its rate of change", false);
  k.one_bound = s.exactly_one_of({"below", "above", "design"});
  k.below = s.raw("below", "value in the channel's unit", "it stays at or below this", false);
  k.above = s.raw("above", "value in the channel's unit", "it stays at or above this", false);
  k.design = s.raw("design", "pressure", "design pressure, with accumulation", false);
  k.accumulation =
      s.optional_quantity("accumulation", unit_kinds::percentage,
                          "allowed rise above design while relieving, percent of gauge design", Range::not_negative);
  return k;
}
}  // namespace

void describe_watches(ReadContext& context) {
  Section target(context, "targets.NAME");
  read_target(target);
  Section limit(context, "limits.NAME");
  read_limit(limit);
}

void Watch::connect_target(const WatchSpec& spec, ReadContext& context, Layout& layout) {
  Section s(context, spec.node, "targets." + spec.name);
  const TargetKeys k = read_target(s);
  Target t;
  t.name = spec.name;
  t.channel = layout.channel(k.when);
  t.direction = k.direction == "rising" ? 1 : (k.direction == "falling" ? -1 : 0);
  if (k.after.given()) {
    std::vector<std::string> names;
    for (std::size_t i = 0; i < targets_.size(); ++i) {
      names.push_back(targets_[i].name);
      if (targets_[i].name == k.after.name) t.after = static_cast<int>(i);
    }
    const std::string near = nearest_name(k.after.name, names);
    if (t.after < 0 && !layout.excuse(k.after.name))
      layout.error(k.after.place, fmt::format("there is no target '{}' before this one{}", k.after.name,
                                              near.empty() ? "" : "; did you mean '" + near + "'?"));
  }
  if (t.channel >= 0 && k.one_kind) {
    const UnitKind kind = layout.channels[t.channel].kind;
    const auto value = [&](const Node* n, const char* key, const UnitKind& u, Range range = Range::any) {
      const auto v = n == nullptr ? std::nullopt : read_value(context, *n, s.path() + "." + key, u, range);
      if (v) t.unit = v->unit;
      return v ? v->si : 0.0;
    };
    if (k.within != nullptr) {
      t.settles = true;
      t.band = value(k.within, "settles_within", difference_kind(kind), Range::positive);
      t.level = value(k.of, "of", kind);
      if (k.of == nullptr) s.error_here(fmt::format("'{}' needs 'of', the middle of its band", s.path()));
      if (!s.has("for")) s.error_here(fmt::format("'{}' needs 'for', how long it must stay", s.path()));
      if (k.duration) {
        t.duration = *k.duration;
        t.duration_unit = k.duration->unit;
      }
      if (s.has("direction")) s.error("direction", fmt::format("'{}': 'direction' goes with 'reaches'", s.path()));
    } else {
      t.level = value(k.reaches, "reaches", kind);
      for (const char* key : {"of", "for"})
        if (s.has(key)) s.error(key, fmt::format("'{}': '{}' goes with 'settles_within'", s.path(), key));
    }
  }
  targets_.push_back(t);
}

void Watch::connect_limit(const WatchSpec& spec, ReadContext& context, Layout& layout) {
  Section s(context, spec.node, "limits." + spec.name);
  const LimitKeys k = read_limit(s);
  Limit l;
  l.name = spec.name;
  l.rate = k.rate_of.given();
  l.channel = layout.channel(l.rate ? k.rate_of : k.of);
  if (k.minus.given()) l.minus = layout.channel(k.minus);
  if (l.rate && k.minus.given()) s.error("minus", fmt::format("'{}': 'minus' goes with 'of'", s.path()));
  if (k.accumulation && k.design == nullptr)
    s.error("accumulation", fmt::format("'{}': 'accumulation' goes with 'design'", s.path()));
  if (l.channel < 0 || (k.minus.given() && l.minus < 0) || !k.one_quantity || !k.one_bound) return;
  const ChannelDoc& channel = layout.channels[l.channel];
  l.kind = l.rate ? per_time(channel.kind) : (l.minus >= 0 ? difference_kind(channel.kind) : channel.kind);
  l.what = l.rate ? "rate of " + channel.name : channel.name;
  if (l.minus >= 0) {
    l.what += " - " + layout.channels[l.minus].name;
    if (layout.channels[l.minus].kind.si != channel.kind.si)
      s.error("minus", fmt::format("'{}': '{}' and '{}' are not of one kind", s.path(), channel.name,
                                   layout.channels[l.minus].name));
  }
  l.below = k.above == nullptr;
  const Node* node = k.above != nullptr ? k.above : (k.below != nullptr ? k.below : k.design);
  const char* key = k.above != nullptr ? "above" : (k.below != nullptr ? "below" : "design");
  if (node == nullptr) return;
  if (k.design != nullptr && (l.rate || l.minus >= 0 || channel.kind.flavour != UnitFlavour::pressure)) {
    s.error("design", fmt::format("'{}.design' is for a pressure; use 'below'", s.path()));
    return;
  }
  if (const auto v = read_value(context, *node, s.path() + "." + key, l.kind, Range::any)) {
    l.bound = *v;
    l.unit = v->unit;
    if (k.design != nullptr && k.accumulation) l.bound += k.accumulation->si * (v->si - layout.atmosphere_pressure);
  }
  limits_.push_back(l);
}

void Watch::connect(const Model& model, ReadContext& context, Layout& layout) {
  for (const WatchSpec& t : model.targets) connect_target(t, context, layout);
  for (const WatchSpec& l : model.limits) connect_limit(l, context, layout);
  if (!model.run.stop_when.given()) return;
  std::vector<std::string> names;
  for (std::size_t i = 0; i < targets_.size(); ++i) {
    names.push_back(targets_[i].name);
    if (targets_[i].name == model.run.stop_when.name) stop_ = static_cast<int>(i);
  }
  if (stop_ >= 0 || layout.excuse(model.run.stop_when.name)) return;
  const std::string near = nearest_name(model.run.stop_when.name, names);
  layout.error(model.run.stop_when.place, fmt::format("there is no target '{}'{}", model.run.stop_when.name,
                                                      near.empty() ? "" : "; did you mean '" + near + "'?"));
}

std::string Watch::guard_name(int i) const {
  const auto n = static_cast<std::size_t>(i);
  return n < targets_.size() ? "target " + targets_[n].name : "limit " + limits_[n - targets_.size()].name;
}

bool Watch::needs_rates() const {
  return std::any_of(limits_.begin(), limits_.end(), [](const Limit& l) { return l.rate; });
}

double Watch::limit_value(const Limit& l, const Workspace<double>& w) const {
  if (l.rate) return w.out_rate[l.channel];
  return w.out[l.channel] - (l.minus >= 0 ? w.out[l.minus] : 0.0);
}

void Watch::arm(Target& t, const Workspace<double>& w) const {
  t.armed = true;
  const double x = w.out[t.channel];
  if (t.settles) {
    if (std::abs(x - t.level) <= t.band) t.inside_since = w.t;
    return;
  }
  t.side = t.direction != 0 ? t.direction : (x <= t.level ? 1 : -1);
  // On the far side already, it must come back before it can be reached in its direction.
  if (t.direction * (x - t.level) >= 0.0 && t.direction != 0) t.side = -t.direction;
}

void Watch::start(const Workspace<double>& w) {
  for (Target& t : targets_) {
    t.time = t.inside_since = std::numeric_limits<double>::quiet_NaN();
    t.armed = false;
    if (t.channel < 0 || t.after >= 0) continue;
    arm(t, w);
    // Standing at the level is reaching it, unless a direction is asked for.
    const bool there = std::abs(w.out[t.channel] - t.level) <= 1e-12 * std::abs(t.level);  // but for rounding
    if (!t.settles && t.direction == 0 && there) t.time = w.t;
  }
  for (Limit& l : limits_) {
    l.extreme = limit_value(l, w);
    l.extreme_time = w.t;
    l.crossed = l.broken() ? w.t : std::numeric_limits<double>::quiet_NaN();
  }
}

void Watch::guards(const Workspace<double>& w, double* g) const {
  for (const Target& t : targets_) {
    double value = -1.0;
    if (t.armed && t.settles) {
      const double outside = std::abs(w.out[t.channel] - t.level) - t.band;
      value = t.inside_since == t.inside_since ? outside : -outside;
    } else if (t.armed && !t.reached()) {
      value = t.side * (w.out[t.channel] - t.level);
    }
    *g++ = value;
  }
  for (const Limit& l : limits_) *g++ = (l.below ? 1.0 : -1.0) * (limit_value(l, w) - l.bound) - l.slack();
}

void Watch::reach(Target& t, double time, Event& e) {
  t.time = time;
  const double x = e.before->out[t.channel];
  e.log(t.name, t.settles ? "target settled" : "target reached", x, x);
  for (Target& next : targets_)
    if (next.after >= 0 && &targets_[next.after] == &t) arm(next, *e.before);
}

void Watch::on_guard(int i, Event& e) {
  const auto n = static_cast<std::size_t>(i);
  if (n < targets_.size()) {
    Target& t = targets_[n];
    const double x = e.before->out[t.channel];
    if (!t.settles && t.direction != 0 && t.side != t.direction) {
      t.side = t.direction;
    } else if (!t.settles) {
      reach(t, e.time, e);
    } else if (t.inside_since == t.inside_since) {
      t.inside_since = std::numeric_limits<double>::quiet_NaN();
      e.log(t.name, "leaves its band", x, x);
    } else {
      t.inside_since = e.time;
      e.log(t.name, "enters its band", x, x);
    }
    return;
  }
  Limit& l = limits_[n - targets_.size()];
  if (l.crossed != l.crossed) l.crossed = e.time;
  const double x = limit_value(l, *e.before);
  e.log(l.name, l.below ? "limit exceeded" : "limit undercut", x, x);
}

double Watch::next_time(double t) const {
  double next = infinity;
  for (const Target& target : targets_) {
    if (!target.settles || target.reached() || target.inside_since != target.inside_since) continue;
    const double due = target.inside_since + target.duration;
    if (due > t) next = std::min(next, due);
  }
  return next;
}

void Watch::on_time(double t, Event& e) {
  for (Target& target : targets_) {
    if (!target.settles || target.reached() || target.inside_since != target.inside_since) continue;
    if (target.inside_since + target.duration <= t) reach(target, target.inside_since, e);
  }
}

}  // namespace gaskettle
