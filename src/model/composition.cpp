#include "model/composition.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <map>

#include "gas/catalogue.h"

namespace gaskettle {

namespace {
bool known_gas(ReadContext& context, const std::string& name, const Place& place) {
  const auto& own = context.own_gases;
  if (std::find(own.begin(), own.end(), name) != own.end() || find_gas(name)) return true;
  std::vector<std::string> names = gas_names();
  names.insert(names.end(), own.begin(), own.end());
  const std::string near = nearest_name(name, names);
  context.problems.add(place, fmt::format("there is no gas '{}'{}; 'gaskettle explain gases' lists them", name,
                                          near.empty() ? "" : "; did you mean '" + near + "'?"));
  return false;
}
}  // namespace

Composition read_composition(Section& section, const std::string& key, const std::string& meaning,
                             const std::string& fallback) {
  const Node* node =
      section.raw(key, "name of a gas, or {gas: mole fraction, ...}", meaning, fallback.empty(), fallback);
  const Composition safe = {{fallback.empty() ? "nitrogen" : fallback, 1.0}};
  if (node == nullptr) return safe;
  ReadContext& context = section.context();
  if (node->is_scalar()) {
    if (!known_gas(context, node->text, node->place)) return safe;
    return {{node->text, 1.0}};
  }
  if (!node->is_map() || node->entries.empty()) {
    section.error(key,
                  fmt::format("'{}.{}' should be the name of a gas or a map of mole fractions", section.path(), key));
    return safe;
  }
  Composition composition;
  double sum = 0.0;
  bool good = true;
  std::map<std::string, std::string> seen;  // a gas's own name, to the one used here
  for (const Node::Entry& e : node->entries) {
    good = known_gas(context, e.key, e.key_place) && good;
    const auto gas = find_gas(e.key);
    const auto [first, fresh] = seen.emplace(gas ? gas->name : e.key, e.key);
    if (!fresh) {
      context.problems.add(e.key_place,
                           fmt::format("'{}' is the same gas as '{}'; name it once", e.key, first->second));
      good = false;
    }
    const auto x = read_number(context, e.value, section.path() + "." + key + "." + e.key);
    if (x && (*x < 0.0 || *x > 1.0)) {
      context.problems.add(e.value.place, fmt::format("the mole fraction of {} is {}; it must lie between 0 and 1",
                                                      e.key, e.value.text));
      good = false;
    }
    if (!x) good = false;
    if (x && *x > 0.0) composition.emplace_back(e.key, *x);
    sum += x.value_or(0.0);
  }
  if (good && std::abs(sum - 1.0) > 1e-6) {
    section.error(
        key, fmt::format("the mole fractions of '{}.{}' add to {:.6g}; they must add to 1", section.path(), key, sum));
    good = false;
  }
  if (!good || composition.empty()) return safe;
  for (auto& [name, x] : composition) x /= sum;
  return composition;
}

}  // namespace gaskettle
