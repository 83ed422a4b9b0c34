#include "report/plant_facts.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <nlohmann/json.hpp>

#include "gas/catalogue.h"
#include "plant/cautions.h"
#include "plant/ideal_departure.h"
#include "report/presenter.h"

namespace gaskettle {

namespace {
/// Energy set free by reversible adiabatic expansion to the surroundings' pressure, J:
/// m (u(T1) - u(T2)) with s equal at both ends; found by bisection on T2.
/// Source: definition as used for stored energy of gas vessels, e.g. ASME PCC-2 part 5, mandatory appendix II
/// (isentropic expansion; clause from memory, unverified).
double stored_energy(const Layout& layout, const SpaceInfo& space) {
  const GasMixture& mixture = layout.mixture;
  const GasState<double> now = mixture.from_temperature(space.mass.data(), space.temperature, *space.pressure);
  double total = 0.0;
  for (const double m : space.mass) total += m;
  if (now.pressure <= layout.atmosphere_pressure) return 0.0;
  double low = 1.0, high = now.temperature;
  for (int i = 0; i < 200; ++i) {
    const double middle = 0.5 * (low + high);
    const GasState<double> then = mixture.from_temperature(space.mass.data(), middle, layout.atmosphere_pressure);
    (then.entropy < now.entropy ? low : high) = middle;
  }
  return total * (now.energy - mixture.from_temperature(space.mass.data(), low, layout.atmosphere_pressure).energy);
}

struct TimeConstant {
  std::string store;
  double seconds;
};

/// C / sum of conductances of each store at the start: how fast it follows its neighbours.
std::vector<TimeConstant> time_constants(Plant& plant) {
  const std::vector<double> y = plant.start();
  const Sparsity& pattern = plant.sparsity();
  std::vector<double> values(pattern.entries()), dfdt(plant.size());
  plant.jacobian(0.0, y.data(), values.data(), dfdt.data());
  std::vector<TimeConstant> list;
  for (const StoreInfo& s : plant.layout().stores)
    for (int q = pattern.row_start[s.state]; q < pattern.row_start[s.state + 1]; ++q)
      if (pattern.columns[q] == s.state && values[q] < 0.0) list.push_back({s.name, -1.0 / values[q]});
  return list;
}

/// One line a part: the nodes of a wall or body by their fastest and slowest.
std::string time_constant_block(const std::vector<TimeConstant>& all, const Presenter& p) {
  struct Span {
    std::string part;
    double fastest, slowest;
    int nodes;
  };
  std::vector<Span> spans;
  for (const TimeConstant& t : all) {
    const std::string part = t.store.substr(0, t.store.find(".node"));
    if (spans.empty() || spans.back().part != part) spans.push_back({part, t.seconds, t.seconds, 0});
    Span& s = spans.back();
    s.fastest = std::min(s.fastest, t.seconds);
    s.slowest = std::max(s.slowest, t.seconds);
    ++s.nodes;
  }
  std::vector<std::vector<std::string>> rows;
  for (const Span& s : spans) {
    const std::string fastest = p.scaled(s.fastest, unit_kinds::time);
    rows.push_back({s.part, s.nodes == 1 ? fastest
                                         : fmt::format("{} to {} ({} nodes)", fastest,
                                                       p.scaled(s.slowest, unit_kinds::time), s.nodes)});
  }
  return rows.empty() ? "" : "\nTime constants at the start\n" + table(rows);
}

std::vector<std::string> advice(const Plant& plant) {
  const Layout& layout = plant.layout();
  std::vector<std::string> list = layout.advice;
  for (const SpaceInfo& s : layout.spaces) {
    const bool faced =
        std::any_of(layout.faces.begin(), layout.faces.end(), [&](const FaceInfo& f) { return f.space == s.index; });
    if (!faced) list.push_back(fmt::format("{}: no wall: it is taken as perfectly insulated", s.name));
    if (const double d = IdealDeparture(s.composition).at(s.temperature, *s.pressure); d > departure_worth_saying)
      list.push_back(fmt::format("{}: at the start {}", s.name, departure_text(d)));
  }
  const auto on_pressure = [](const Limit& l) { return l.kind.flavour == UnitFlavour::pressure; };
  if (std::none_of(plant.watch().limits().begin(), plant.watch().limits().end(), on_pressure))
    list.emplace_back("no pressure limit: nothing says whether the pressure reached is allowed");
  return list;
}
}  // namespace

std::string facts_text(Plant& plant, const std::string& model_file) {
  const Layout& layout = plant.layout();
  const Presenter p(layout.atmosphere_pressure, plant.model().run.time_unit);
  std::string out;
  for (const std::string& c : cautions(plant)) out += wrapped("CAUTION: " + c, 100, "");
  out += fmt::format("\n{}: read and laid out without a problem\n",
                     plant.model().title.empty() ? model_file : plant.model().title);
  std::vector<std::vector<std::string>> rows;
  for (const Fact& f : layout.facts) rows.push_back({f.part, f.what, p.scaled(f.value, f.kind)});
  for (const SpaceInfo& s : layout.spaces) {
    rows.push_back({s.name, "pressure at the start", p.scaled(*s.pressure, unit_kinds::pressure)});
    rows.push_back({s.name, "volume at the start", p.scaled(s.volume, unit_kinds::volume)});
    rows.push_back({s.name, "stored energy (isentropic expansion to the surroundings)",
                    p.scaled(stored_energy(layout, s), unit_kinds::energy)});
  }
  std::stable_sort(rows.begin(), rows.end(), [](const auto& a, const auto& b) { return a[0] < b[0]; });
  out += "\nThe plant in numbers\n" + table(rows, {2});
  out += time_constant_block(time_constants(plant), p);
  out += "\nGas models\n";
  for (const SpaceInfo& s : layout.spaces)
    out += fmt::format("  {}: ideal gas, gas data version {}\n", s.name, gas_data_version());
  if (!plant.model().defaults_used.empty()) {
    out += "\nDefaults in use\n";
    for (const std::string& d : plant.model().defaults_used) out += "  " + d + "\n";
  }
  const std::vector<std::string> list = advice(plant);
  out += list.empty() ? "\nNothing looks wrong.\n" : "\nTo look at\n";
  for (const std::string& a : list) out += wrapped("- " + a, 100, "  ");
  return out;
}

std::string facts_json(Plant& plant, const std::string& model_file) {
  using Json = nlohmann::ordered_json;
  const Layout& layout = plant.layout();
  Json facts = Json::array(), times = Json::array(), spaces = Json::object();
  for (const Fact& f : layout.facts)
    facts.push_back({{"part", f.part}, {"what", f.what}, {"value", f.value}, {"unit", f.kind.si}});
  for (const TimeConstant& t : time_constants(plant)) times.push_back({{"store", t.store}, {"seconds", t.seconds}});
  for (const SpaceInfo& s : layout.spaces) {
    double mass = 0.0;
    for (const double m : s.mass) mass += m;
    spaces[s.name] = {{"volume", s.volume},
                      {"temperature", s.temperature},
                      {"pressure", *s.pressure},
                      {"mass", mass},
                      {"stored_energy", stored_energy(layout, s)},
                      {"pressure_times_volume", *s.pressure * s.volume},
                      {"gas_model", "ideal"}};
  }
  const Json all = {{"model", model_file},
                    {"title", plant.model().title},
                    {"cautions", cautions(plant)},
                    {"gas_spaces", spaces},
                    {"facts", facts},
                    {"time_constants", times},
                    {"defaults", plant.model().defaults_used},
                    {"advice", advice(plant)}};
  return all.dump(2) + "\n";
}

}  // namespace gaskettle
