#include "model/layout.h"

#include <fmt/format.h>
#include <fmt/ranges.h>

#include <algorithm>
#include <array>
#include <string_view>

#include "gas/catalogue.h"

namespace gaskettle {

int Layout::add_state(const std::string& name, double typical, double initial) {
  states.push_back({name, typical, initial});
  return static_cast<int>(states.size()) - 1;
}

int Layout::add_store(const std::string& name, double capacity, double temperature) {
  // A change of 10 K is the size that matters to an engineer; the error weight grows with larger ones.
  const int state = add_state(name + ".energy", capacity * 10.0);
  stores.push_back({name, state, capacity, temperature, -1});
  return static_cast<int>(stores.size()) - 1;
}

int Layout::add_gas_store(int space_index, double typical_energy) {
  const SpaceInfo& s = spaces[static_cast<std::size_t>(space_index)];
  const int state = add_state(s.name + ".energy", typical_energy);
  stores.push_back({s.name, state, 0.0, s.temperature, space_index});
  return static_cast<int>(stores.size()) - 1;
}

int Layout::add_input(const std::string& path, const UnitKind& kind, const SignalSpec& spec, double start,
                      Place place) {
  InputInfo info;
  info.path = path;
  info.kind = kind;
  info.signal = spec.make(start);
  info.given = spec.given;
  info.place = std::move(place);
  inputs.push_back(std::move(info));
  return static_cast<int>(inputs.size()) - 1;
}

int Layout::ledger(LedgerTerm term, const std::string& part, double typical) {
  for (const LedgerEntry& e : ledger_entries)
    if (e.term == term && e.part == part) return e.state;
  const std::string name = fmt::format("energy.{}.{}", ledger_names[static_cast<std::size_t>(term)], part);
  const int state = add_state(name, typical);  // 0 is replaced when all stores are known
  ledger_entries.push_back({term, part, state});
  return state;
}

int Layout::add_channel(const std::string& name, const UnitKind& kind, const std::string& meaning, ChannelPhase phase,
                        const std::string& unit) {
  channels.push_back({name, kind, meaning, phase, unit});
  return static_cast<int>(channels.size()) - 1;
}

namespace {
std::string suggestion(const std::string& wrong, const std::vector<std::string>& known, std::size_t problems) {
  // Only the first hundred are shown: a large, wholly wrong model is not searched for each of the rest.
  if (problems > 500) return "";
  const std::string near = nearest_name(wrong, known);
  if (!near.empty()) return fmt::format("; did you mean '{}'?", near);
  if (known.empty()) return "; there is none";
  constexpr std::size_t most = 20;
  if (known.size() <= most) return fmt::format("; there are: {}", fmt::join(known, ", "));
  return fmt::format("; there are: {} and {} more", fmt::join(known.begin(), known.begin() + most, ", "),
                     known.size() - most);
}

/// Names of channels and of inputs, after the name of their part.
constexpr std::array<std::string_view, 24> quantities = {"temperature",
                                                         "outer_temperature",
                                                         "core_temperature",
                                                         "pressure",
                                                         "volume",
                                                         "mass",
                                                         "energy",
                                                         "specific_entropy",
                                                         "density",
                                                         "mole_fraction",
                                                         "position",
                                                         "velocity",
                                                         "loss",
                                                         "profile",
                                                         "power",
                                                         "torque",
                                                         "speed",
                                                         "flow",
                                                         "opening",
                                                         "released",
                                                         "reading",
                                                         "output",
                                                         "setpoint",
                                                         "force"};
}  // namespace

bool Layout::any_unsound(const std::string& kind) const {
  for (std::size_t i = 0; i < part_names.size(); ++i)
    if (part_kinds[i] == kind && !sound(part_names[i])) return true;
  return false;
}

bool Layout::excuse(const std::string& reference) {
  const std::size_t dot = reference.find('.');
  if (sound(reference.substr(0, dot))) return false;
  if (dot != std::string::npos) {
    const std::string quantity = reference.substr(dot + 1, reference.find('.', dot + 1) - dot - 1);
    if (std::find(quantities.begin(), quantities.end(), quantity) == quantities.end()) return false;
  }
  ++excused_;
  return true;
}

SpaceInfo* Layout::space(const Reference& reference, bool or_atmosphere) {
  if (!reference.given()) return nullptr;
  std::vector<std::string> names;
  for (SpaceInfo& s : spaces) {
    if (s.name == reference.name) return &s;
    names.push_back(s.name);
  }
  if (excuse(reference.name)) return nullptr;
  if (or_atmosphere) names.emplace_back("atmosphere");
  error(reference.place, fmt::format("there is no gas space '{}'{}", reference.name,
                                     suggestion(reference.name, names, problems_->count())));
  return nullptr;
}

int Layout::channel(const Reference& reference) {
  if (!reference.given()) return -1;
  const std::string reading = reference.name + ".reading";
  for (std::size_t i = 0; i < channels.size(); ++i) {
    // A sensor's name alone stands for its reading.
    if (channels[i].name == reference.name || channels[i].name == reading) return static_cast<int>(i);
  }
  if (excuse(reference.name)) return -1;
  std::vector<std::string> names;
  for (const ChannelDoc& c : channels) names.push_back(c.name);
  const std::string part = reference.name.substr(0, reference.name.find('.'));
  std::vector<std::string> own;
  for (const std::string& n : names)
    if (n.rfind(part + ".", 0) == 0) own.push_back(n);
  error(reference.place, fmt::format("there is no channel '{}'{}", reference.name,
                                     suggestion(reference.name, own.empty() ? names : own, problems_->count())));
  return -1;
}

int Layout::input(const Reference& reference) {
  std::vector<std::string> names;
  for (std::size_t i = 0; i < inputs.size(); ++i) {
    if (inputs[i].high == inputs[i].low) continue;
    if (inputs[i].path == reference.name) return static_cast<int>(i);
    names.push_back(inputs[i].path);
  }
  if (excuse(reference.name)) return -1;
  error(reference.place, fmt::format("a controller cannot drive '{}'{}", reference.name,
                                     suggestion(reference.name, names, problems_->count())));
  return -1;
}

std::optional<std::string> Layout::kind_of_part(const std::string& name) const {
  for (std::size_t i = 0; i < part_names.size(); ++i)
    if (part_names[i] == name) return part_kinds[i];
  return std::nullopt;
}

void Layout::use_gas(const Composition& composition, const Place& place) {
  compositions_used_.push_back(composition);
  for (const auto& [name, fraction] : composition) {
    (void)fraction;
    const auto same = [&n = name](const auto& g) { return g.first == n; };
    if (std::none_of(gas_names_.begin(), gas_names_.end(), same)) gas_names_.emplace_back(name, place);
  }
}

void Layout::can_flow(int from, int to, const Composition& composition) {
  flows_.push_back({from, to, composition});
  if (to < 0) discharges_to_atmosphere = true;
}

void Layout::close_gases() {
  std::vector<Species> list;
  for (const auto& [name, place] : gas_names_) {
    if (const auto own = own_gases.find(name); own != own_gases.end()) {
      list.push_back(own->second);
    } else if (const auto found = find_gas(name)) {
      const bool twice = std::any_of(list.begin(), list.end(), [&](const Species& s) { return s.name == found->name; });
      if (!twice) list.push_back(*found);
    }
  }
  if (list.size() > static_cast<std::size_t>(GasMixture::max_species)) {
    error(gas_names_[GasMixture::max_species].second,
          fmt::format("the model uses {} gases; at most {} can be in one plant", list.size(), GasMixture::max_species));
    list.resize(GasMixture::max_species);
  }
  if (list.empty()) list.push_back(*find_gas("nitrogen"));
  mixture = GasMixture(std::move(list));
  const auto count = static_cast<std::size_t>(mixture.count());
  for (SpaceInfo& s : spaces) {
    s.carries.assign(count, false);
    const std::vector<double> x = mole_fractions(s.composition);
    for (std::size_t k = 0; k < count; ++k) s.carries[k] = x[k] > 0.0;
  }
  for (bool changed = true; changed;) {
    changed = false;
    for (const Flow& f : flows_) {
      if (f.to < 0) continue;
      std::vector<bool> source(count, false);
      if (f.from >= 0) {
        source = spaces[static_cast<std::size_t>(f.from)].carries;
      } else {
        const std::vector<double> x = mole_fractions(f.composition);
        for (std::size_t k = 0; k < count; ++k) source[k] = x[k] > 0.0;
      }
      std::vector<bool>& target = spaces[static_cast<std::size_t>(f.to)].carries;
      for (std::size_t k = 0; k < count; ++k)
        if (source[k] && !target[k]) target[k] = changed = true;
    }
  }
}

std::vector<double> Layout::mole_fractions(const Composition& composition) const {
  std::vector<double> x(static_cast<std::size_t>(mixture.count()), 0.0);
  for (const auto& [name, fraction] : composition) {
    std::string full = name;
    if (own_gases.count(name) == 0)
      if (const auto found = find_gas(name)) full = found->name;
    if (const auto k = mixture.index_of(full)) x[static_cast<std::size_t>(*k)] += fraction;
  }
  return x;
}

std::vector<double> Layout::mass_fractions(const Composition& composition) const {
  const std::vector<double> x = mole_fractions(composition);
  double sum = 0.0;
  for (const double f : x) sum += f;
  if (sum <= 0.0) return std::vector<double>(x.size(), 0.0);
  return mixture.mass_fractions(x.data());
}

}  // namespace gaskettle
