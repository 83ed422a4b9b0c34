/// Time-varying values of a model file: schedules, ramps, sines.
#include <fmt/format.h>

#include "model/section.h"

namespace gaskettle {

namespace {
class SignalReader {
public:
  SignalReader(ReadContext& context, const UnitKind& kind, Range range, std::string path)
      : context_(context), kind_(kind), range_(range), path_(std::move(path)) {}

  SignalSpec read(const Node& node) {
    const std::size_t before = context_.problems.count();
    spec_.given = true;
    read_any(node);
    spec_.sound = context_.problems.count() == before;
    return spec_;
  }
  bool mixed_bases() const { return mixed_; }
  FlowBasis basis() const { return basis_; }

private:
  void read_any(const Node& node) {
    if (!node.is_map()) {
      if (const auto v = value(node)) spec_.level = *v;
      return;
    }
    Section map(context_, &node, path_);
    map.exactly_one_of({"schedule", "ramp", "sine", "csv"});
    map.not_built_yet("csv", "a column of a CSV file");
    if (const Node* n = map.raw("schedule", "list of [time, value]", "", false)) read_schedule(map, *n);
    if (auto ramp = map.child("ramp", "")) read_ramp(*ramp);
    if (auto sine = map.child("sine", "")) read_sine(*sine);
  }

  std::optional<double> value(const Node& node) {
    FlowBasis basis = FlowBasis::mass;
    const auto v = read_value(context_, node, path_, kind_, range_, &basis);
    if (v && kind_.flavour == UnitFlavour::gas_flow) {
      if (seen_ && basis != basis_) mixed_ = true;
      basis_ = basis;
      seen_ = true;
    }
    return v ? std::optional<double>(v->si) : std::nullopt;
  }

  void read_schedule(Section& map, const Node& node) {
    spec_.kind = SignalSpec::Kind::schedule;
    spec_.held = map.flag("held", "each value lasts until the next", false);
    if (const Node* n = map.raw("repeat", "whole number or 'forever'", "", false)) {
      if (n->is_scalar() && n->text == "forever") {
        spec_.repeats = -1;
      } else if (const auto x = read_number(context_, *n, path_ + ".repeat")) {
        if (*x < 1.0 || *x != static_cast<double>(static_cast<long>(*x)))
          context_.problems.add(n->place,
                                fmt::format("'{}.repeat' should be a whole number from 1, or 'forever'", path_));
        spec_.repeats = static_cast<long>(*x);
      }
    }
    if (!node.is_list() || node.items.empty()) {
      context_.problems.add(node.place, fmt::format("'{}.schedule' should be a list of [time, value] pairs", path_));
      return;
    }
    for (const Node& pair : node.items) read_point(pair);
    if (spec_.points.empty()) spec_.points = {{0.0, 0.0}};
  }

  void read_point(const Node& pair) {
    if (!pair.is_list() || pair.items.size() != 2) {
      context_.problems.add(pair.place, fmt::format("a point of '{}.schedule' should be [time, value]", path_));
      return;
    }
    const auto t = read_value(context_, pair.items[0], path_ + ".schedule", unit_kinds::time, Range::not_negative);
    const auto v = value(pair.items[1]);
    if (!t || !v) return;
    const std::size_t n = spec_.points.size();
    if (n > 0 && t->si < spec_.points[n - 1].first)
      context_.problems.add(pair.place, fmt::format("the times of '{}.schedule' must not go back", path_));
    else if (n > 1 && t->si == spec_.points[n - 2].first)
      context_.problems.add(pair.place, fmt::format("'{}.schedule' has more than two points at one time", path_));
    else
      spec_.points.emplace_back(t->si, *v);
  }

  void read_ramp(Section& ramp) {
    spec_.kind = SignalSpec::Kind::ramp;
    if (const Node* n = ramp.raw("to", kind_.name, "where it ends", true))
      if (const auto v = value(*n)) spec_.ramp_to = *v;
    spec_.ramp_rate = ramp.quantity("at", per_time(kind_), "how fast", Range::positive);
    if (const Node* n = ramp.raw("from", kind_.name, "where it starts", false))
      if (const auto v = value(*n)) {
        spec_.ramp_from = *v;
        spec_.has_ramp_from = true;
      }
  }

  void read_sine(Section& sine) {
    spec_.kind = SignalSpec::Kind::sine;
    if (const Node* n = sine.raw("mean", kind_.name, "middle value", true))
      if (const auto v = value(*n)) spec_.level = *v;
    spec_.amplitude = sine.quantity("amplitude", difference_kind(kind_), "half of peak to peak", Range::not_negative);
    spec_.frequency = sine.quantity("frequency", unit_kinds::frequency, "cycles a second", Range::positive);
    const bool below = (range_ == Range::positive && spec_.level - spec_.amplitude <= 0.0) ||
                       (range_ != Range::any && spec_.level - spec_.amplitude < 0.0);
    if (below) sine.error_here(fmt::format("'{}' would go below zero: the amplitude exceeds the mean", path_));
    if (range_ == Range::fraction && spec_.level + spec_.amplitude > 1.0)
      sine.error_here(fmt::format("'{}' would go above 1", path_));
  }

  ReadContext& context_;
  const UnitKind& kind_;
  Range range_;
  std::string path_;
  SignalSpec spec_;
  FlowBasis basis_ = FlowBasis::mass;
  bool seen_ = false, mixed_ = false;
};
}  // namespace

SignalSpec read_signal(ReadContext& context, const Node& node, const std::string& path, const UnitKind& kind,
                       Range range) {
  return SignalReader(context, kind, range, path).read(node);
}

SignalSpec Section::signal(const std::string& key, const UnitKind& kind, const std::string& meaning, Range range,
                           const std::string& fallback) {
  document(key, kind.name, &kind, fallback, meaning, false, true);
  const std::string path = path_.empty() ? key : path_ + "." + key;
  const Node* n = take(key);
  if (n != nullptr) return SignalReader(*context_, kind, range, path).read(*n);
  SignalSpec spec;
  if (!fallback.empty()) {
    const Quantity q = parse_quantity(fallback, kind);
    spec.level = q.value + (q.gauge ? context_->atmosphere : 0.0);
    if (node_ != nullptr) context_->defaults_used.push_back(path + " = " + fallback);
  }
  return spec;
}

SignalSpec Section::required_signal(const std::string& key, const UnitKind& kind, const std::string& meaning,
                                    Range range) {
  if (node_ != nullptr && node_->find(key) == nullptr)
    missing(key, example_units(kind).empty() ? "1" : "1 " + example_units(kind).front());
  SignalSpec spec = signal(key, kind, meaning, range);
  if (describing() && !context_->docs->empty()) context_->docs->back().required = true;
  if (!spec.given) spec.level = 1.0;
  return spec;
}

SignalSpec Section::flow_signal(const std::string& key, const std::string& meaning, FlowBasis& basis) {
  const UnitKind& kind = unit_kinds::gas_flow;
  document(key, kind.name, &kind, "", meaning, false, true);
  const std::string path = path_ + "." + key;
  const Node* n = take(key);
  if (n == nullptr) return {};
  SignalReader reader(*context_, kind, Range::not_negative, path);
  SignalSpec spec = reader.read(*n);
  basis = reader.basis();
  if (reader.mixed_bases())
    error(key,
          fmt::format("all values of '{}' must be of one kind: mass, molar (or normal, anr), or actual volume flow",
                      path));
  return spec;
}

}  // namespace gaskettle
