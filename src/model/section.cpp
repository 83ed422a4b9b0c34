#include "model/section.h"

#include <fmt/format.h>
#include <fmt/ranges.h>

#include <algorithm>
#include <cmath>

#include "model/materials.h"

namespace gaskettle {

ReadContext::ReadContext(Problems& p) : problems(p) {}
ReadContext::~ReadContext() = default;

namespace {
std::string join_path(const std::string& path, const std::string& key) { return path.empty() ? key : path + "." + key; }

std::string shown(const Node& node) {
  if (node.is_scalar()) return "'" + (node.text.size() > 60 ? node.text.substr(0, 60) + "..." : node.text) + "'";
  if (node.is_map()) return "a map";
  return node.is_list() ? "a list" : "nothing";
}

/// What is wrong with the size of a value, or empty.
std::string range_fault(double si, Range range, const UnitKind& kind) {
  const bool pressure = kind.flavour == UnitFlavour::pressure;
  if (pressure && si < 0.0) return "lies below vacuum; an absolute pressure cannot be below zero";
  switch (range) {
    case Range::positive:
      if (!(si > 0.0)) return "must be greater than zero";
      break;
    case Range::not_negative:
      if (!(si >= 0.0)) return "must not be negative";
      break;
    case Range::fraction:
      if (!(si >= 0.0 && si <= 1.0)) return "must lie between 0 and 1";
      break;
    case Range::any:
      break;
  }
  return "";
}
}  // namespace

std::optional<Value> read_value(ReadContext& context, const Node& node, const std::string& path, const UnitKind& kind,
                                Range range, FlowBasis* basis) {
  if (!node.is_scalar()) {
    context.problems.add(
        node.place, fmt::format("'{}' should be a {} such as '{}', not {}", path, kind.name,
                                example_units(kind).empty() ? "1" : "1 " + example_units(kind).front(), shown(node)));
    return std::nullopt;
  }
  try {
    const Quantity q = parse_quantity(node.text, kind);
    Value v{q.value + (q.gauge ? context.atmosphere : 0.0), q.unit, node.place, true, q.gauge};
    if (basis != nullptr) *basis = q.basis;
    if (const std::string fault = range_fault(v.si, range, kind); !fault.empty()) {
      context.problems.add(node.place, fmt::format("'{}' is {}: it {}", path, node.text, fault));
      return std::nullopt;
    }
    return v;
  } catch (const UnitError& e) {
    context.problems.add(node.place, fmt::format("'{}': {}", path, e.what()));
    return std::nullopt;
  }
}

const UnitKind& difference_kind(const UnitKind& kind) {
  if (kind.flavour == UnitFlavour::temperature) return unit_kinds::temperature_difference;
  if (kind.flavour == UnitFlavour::pressure) return unit_kinds::pressure_difference;
  return kind;
}

std::optional<double> read_number(ReadContext& context, const Node& node, const std::string& path) {
  const std::optional<Value> v = read_value(context, node, path, unit_kinds::number, Range::any);
  return v ? std::optional<double>(v->si) : std::nullopt;
}

Section::Section(ReadContext& context, const Node* node, std::string path)
    : context_(&context), node_(node), path_(std::move(path)) {
  if (node_ == nullptr) return;
  place_ = node_->place;
  if (!node_->is_map()) {
    context_->problems.add(place_, fmt::format("'{}' should be a map of keys, not {}", path_, shown(*node_)));
    node_ = nullptr;
    owner_ = false;
  }
}

Section::Section(ReadContext& context, std::string path) : context_(&context), path_(std::move(path)) {}

Section::Section(Section&& other) noexcept
    : context_(other.context_),
      node_(other.node_),
      place_(std::move(other.place_)),
      path_(std::move(other.path_)),
      known_(std::move(other.known_)),
      owner_(std::exchange(other.owner_, false)) {}

Section::~Section() {
  if (!owner_ || node_ == nullptr) return;
  const std::vector<std::string> known(known_.begin(), known_.end());
  for (const Node::Entry& e : node_->entries) {
    if (known_.count(e.key) != 0) continue;
    const std::string near = nearest_name(e.key, known);
    std::string message = fmt::format("unknown key '{}' in {}", e.key, path_.empty() ? "the model" : "'" + path_ + "'");
    message += near.empty() ? fmt::format("; known here: {}", fmt::join(known, ", "))
                            : fmt::format("; did you mean '{}'?", near);
    context_->problems.add(e.key_place, message);
  }
}

Place Section::place_of(const std::string& key) const {
  const Node* n = node_ == nullptr ? nullptr : node_->find(key);
  return n == nullptr ? place_ : n->place;
}

const Node* Section::take(const std::string& key) {
  known_.insert(key);
  const Node* n = node_ == nullptr ? nullptr : node_->find(key);
  if (n != nullptr && n->kind == Node::Kind::null) {
    context_->problems.add(n->place,
                           fmt::format("'{}' has no value; give it one, or take the key out", join_path(path_, key)));
    return nullptr;
  }
  return n;
}

void Section::document(const std::string& key, const std::string& type, const UnitKind* kind,
                       const std::string& fallback, const std::string& meaning, bool required, bool varies) {
  if (!describing()) return;
  KeyDoc doc{path_, key, type, "", fallback, meaning, required, varies};
  if (kind != nullptr) doc.units = fmt::format("{}", fmt::join(example_units(*kind), ", "));
  context_->docs->push_back(std::move(doc));
}

void Section::missing(const std::string& key, const std::string& example) {
  if (node_ == nullptr) return;
  context_->problems.add(place_,
                         fmt::format("'{}' is missing in {}{}", key, path_.empty() ? "the model" : "'" + path_ + "'",
                                     example.empty() ? "" : "; write for example '" + key + ": " + example + "'"));
}

Value Section::quantity(const std::string& key, const UnitKind& kind, const std::string& meaning, Range range) {
  document(key, kind.name, &kind, "", meaning, true);
  const Node* n = take(key);
  if (n == nullptr) {
    if (!has(key)) missing(key, example_units(kind).empty() ? "1" : "1 " + example_units(kind).front());
    return Value{1.0, "", place_, false, false};
  }
  return read_value(*context_, *n, join_path(path_, key), kind, range).value_or(Value{1.0, "", n->place, false, false});
}

Value Section::quantity(const std::string& key, const UnitKind& kind, const std::string& meaning, Range range,
                        const std::string& fallback) {
  document(key, kind.name, &kind, fallback, meaning, false);
  const Node* n = take(key);
  if (n == nullptr) {
    const Quantity q = parse_quantity(fallback, kind);
    if (node_ != nullptr) context_->defaults_used.push_back(join_path(path_, key) + " = " + fallback);
    return Value{q.value + (q.gauge ? context_->atmosphere : 0.0), q.unit, place_, false, q.gauge};
  }
  if (const auto v = read_value(*context_, *n, join_path(path_, key), kind, range)) return *v;
  return Value{parse_quantity(fallback, kind).value, "", n->place, false, false};
}

std::optional<Value> Section::optional_quantity(const std::string& key, const UnitKind& kind,
                                                const std::string& meaning, Range range) {
  document(key, kind.name, &kind, "", meaning, false);
  const Node* n = take(key);
  if (n == nullptr) return std::nullopt;
  return read_value(*context_, *n, join_path(path_, key), kind, range);
}

std::string Section::text(const std::string& key, const std::string& meaning, const std::string& fallback) {
  document(key, "text", nullptr, fallback, meaning, false);
  const Node* n = take(key);
  if (n == nullptr) return fallback;
  if (!n->is_scalar()) {
    error(key, fmt::format("'{}' should be text, not {}", join_path(path_, key), shown(*n)));
    return fallback;
  }
  return n->text;
}

std::string Section::required_choice(const std::string& key, const std::vector<std::string>& options,
                                     const std::string& meaning) {
  if (node_ != nullptr && node_->find(key) == nullptr) missing(key, options.front());
  const std::string chosen = choice(key, options, meaning, "");
  return chosen.empty() ? options.front() : chosen;
}

std::string Section::choice(const std::string& key, const std::vector<std::string>& options, const std::string& meaning,
                            const std::string& fallback) {
  document(key, fmt::format("one of {}", fmt::join(options, ", ")), nullptr, fallback, meaning, false);
  const Node* n = take(key);
  if (n == nullptr) {
    if (node_ != nullptr && !fallback.empty())
      context_->defaults_used.push_back(join_path(path_, key) + " = " + fallback);
    return fallback;
  }
  if (n->is_scalar() && std::find(options.begin(), options.end(), n->text) != options.end()) return n->text;
  const std::string near = n->is_scalar() ? nearest_name(n->text, options) : "";
  error(key, fmt::format("'{}' is {}; it may be {}{}", join_path(path_, key), shown(*n), fmt::join(options, ", "),
                         near.empty() ? "" : " (did you mean '" + near + "'?)"));
  return fallback;
}

bool Section::flag(const std::string& key, const std::string& meaning, bool fallback) {
  document(key, "true or false", nullptr, fallback ? "true" : "false", meaning, false);
  const Node* n = take(key);
  if (n == nullptr) return fallback;
  if (n->is_scalar() && (n->text == "true" || n->text == "false")) return n->text == "true";
  error(key, fmt::format("'{}' should be true or false, not {}", join_path(path_, key), shown(*n)));
  return fallback;
}

long Section::integer(const std::string& key, const std::string& meaning, long least, long fallback) {
  document(key, "whole number", nullptr, std::to_string(fallback), meaning, false);
  const Node* n = take(key);
  if (n == nullptr) return fallback;
  const std::optional<double> x = read_number(*context_, *n, join_path(path_, key));
  if (!x) return fallback;
  if (*x != std::floor(*x) || *x < static_cast<double>(least) || *x > 1e6) {
    error(key, fmt::format("'{}' is {}; it should be a whole number from {} to 1000000", join_path(path_, key), n->text,
                           least));
    return fallback;
  }
  return static_cast<long>(*x);
}

Reference Section::reference(const std::string& key, const std::string& what, const std::string& meaning,
                             bool required) {
  document(key, what, nullptr, "", meaning, required);
  const Node* n = take(key);
  if (n == nullptr) {
    if (required && !has(key)) missing(key, "");
    return {};
  }
  if (!n->is_scalar() || n->text.empty()) {
    error(key, fmt::format("'{}' should be the {}, not {}", join_path(path_, key), what, shown(*n)));
    return {};
  }
  return {n->text, n->place};
}

std::optional<Section> Section::child(const std::string& key, const std::string& meaning, bool required) {
  document(key, "map", nullptr, "", meaning, required);
  if (describing()) return Section(*context_, join_path(path_, key));
  const Node* n = take(key);
  if (n == nullptr) {
    if (required && !has(key)) missing(key, "");
    return std::nullopt;
  }
  if (!n->is_map()) {
    error(key, fmt::format("'{}' should be a map of keys, not {}", join_path(path_, key), shown(*n)));
    return std::nullopt;
  }
  return Section(*context_, n, join_path(path_, key));
}

const Node* Section::raw(const std::string& key, const std::string& type, const std::string& meaning, bool required,
                         const std::string& fallback) {
  document(key, type, nullptr, fallback, meaning, required);
  const Node* n = take(key);
  if (n == nullptr && required && !has(key)) missing(key, "");
  return n;
}

void Section::list(const std::string& key, const std::string& meaning, bool required,
                   const std::function<void(Section&, int)>& read) {
  document(key, "list of maps", nullptr, "", meaning, required);
  const std::string path = join_path(path_, key);
  if (describing()) {
    Section item(*context_, path + ".N");
    read(item, 0);
    return;
  }
  const Node* n = take(key);
  if (n == nullptr) {
    if (required && !has(key)) missing(key, "");
    return;
  }
  if (!n->is_list()) {
    error(key, fmt::format("'{}' should be a list, not {}", path, shown(*n)));
    return;
  }
  if (required && n->items.empty()) error(key, fmt::format("'{}' is empty; it needs at least one item", path));
  for (std::size_t i = 0; i < n->items.size(); ++i) {
    Section item(*context_, &n->items[i], fmt::format("{}.{}", path, i));
    read(item, static_cast<int>(i));
  }
}

void Section::not_built_yet(const std::string& key, const std::string& meaning) {
  document(key, "not built yet", nullptr, "", meaning, false);
  if (take(key) != nullptr) error(key, fmt::format("'{}' is not built yet", join_path(path_, key)));
}

bool Section::exactly_one_of(std::initializer_list<const char*> keys) {
  if (node_ == nullptr) return true;
  int found = 0;
  for (const char* k : keys) found += node_->find(k) != nullptr ? 1 : 0;
  if (found == 0) error_here(fmt::format("'{}' needs one of {}", path_, fmt::join(keys, ", ")));
  return at_most_one_of(keys) && found == 1;
}

bool Section::at_most_one_of(std::initializer_list<const char*> keys) {
  if (node_ == nullptr) return true;
  bool before = false, good = true;
  for (const char* k : keys) {
    if (node_->find(k) == nullptr) continue;
    if (before) error(k, fmt::format("'{}' takes only one of {}", path_, fmt::join(keys, ", ")));
    good = good && !before;
    before = true;
  }
  return good;
}

void Section::error(const std::string& key, const std::string& message) {
  context_->problems.add(place_of(key), message);
}

void Section::error_here(const std::string& message) { context_->problems.add(place_, message); }

}  // namespace gaskettle
