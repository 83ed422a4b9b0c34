#include <algorithm>
#include <catch2/catch.hpp>
#include <cmath>
#include <map>
#include <random>
#include <set>

#include "solve/integrate.h"
#include "support/plant_of.h"
#include "unit/plant/contract_checks.h"
#include "unit/plant/contract_plants.h"

// What every part keeps, looked at along runs that go through all modes.
using namespace gaskettle;
using namespace gaskettle::testing;

namespace {
using ModesSeen = std::map<std::string, std::set<int>>;

void note_modes(const Plant& plant, ModesSeen& seen) {
  for_each_part(plant.model().parts, [&](const auto& p) {
    using Part = std::decay_t<decltype(p)>;
    std::string kind = Part::kind;
    if constexpr (std::is_same_v<Part, Piston>)
      kind += p.motion() == Piston::Motion::balanced
                  ? " balanced"
                  : (p.motion() == Piston::Motion::inertial ? " inertial" : " driven");
    if constexpr (requires { p.mode(); })
      seen[kind].insert(p.mode());
    else
      seen[kind].insert(0);
  });
}

/// Looks at the plant where new modes begin, and now and then in between.
class Inspector {
public:
  Inspector(Plant& plant, ModesSeen& seen) : plant_(plant), seen_(seen) {}
  void start(double t, const double* y) { look(t, y); }
  void piece(const DenseStep& step, double, double to) {
    if (++pieces_ % 10 != 1 && !fresh_) return;
    fresh_ = false;
    std::vector<double> y(static_cast<std::size_t>(plant_.size()));
    step.interpolate(to, y.data());
    look(to, y.data());
  }
  void before_event(double, const double*, const std::vector<int>&, bool) {}
  void after_event(double, const double*, const std::vector<int>&, bool) { fresh_ = true; }
  bool interrupted() const { return false; }

private:
  void look(double t, const double* states) {
    const ModesSeen before = seen_;
    note_modes(plant_, seen_);
    const std::vector<double> y(states, states + plant_.size());
    const std::vector<double> f = rates(plant_, t, y);
    CHECK(std::all_of(f.begin(), f.end(), [](double x) { return std::isfinite(x); }));
    check_ledger(plant_, f);
    for (const int s : plant_.layout().entropy_state) CHECK(f[s] >= -1e-9);  // W/K, of some W/K: rounding at rest
    if (seen_ != before || ++looks_ % 8 == 0) check_jacobian(plant_, t, y);
  }
  Plant& plant_;
  ModesSeen& seen_;
  long pieces_ = 0, looks_ = 0;
  bool fresh_ = false;
};

Ending integrate_inspected(Plant& plant, ModesSeen& seen) {
  std::vector<double> y = plant.start();
  Inspector inspector(plant, seen);
  Settings settings;
  settings.t_end = plant.model().run.until;
  settings.rtol = plant.model().run.rtol;
  return integrate(plant, inspector, settings, y);
}
}  // namespace

TEST_CASE("every part in every mode: finite rates, closed ledger, exact Jacobian") {
  ModesSeen seen;
  for (const ContractPlant& c : contract_plants()) {
    INFO(c.name);
    PlantOf model(c.yaml);
    const Ending ending = integrate_inspected(*model.plant, seen);
    INFO(ending.message);
    CHECK(ending.reason == EndReason::end_time);
  }
  using Modes = std::set<int>;
  CHECK(seen["gas space"] == Modes{0});
  CHECK(seen["stirrer"] == Modes{0});
  CHECK(seen["wall"] == Modes{0});
  CHECK(seen["body"] == Modes{0});
  CHECK(seen["heater"] == Modes{0});
  CHECK(seen["port"] == Modes{0, 1});
  CHECK(seen["relief device"] == Modes{0, 1, 2});
  CHECK(seen["sensor"] == Modes{0, 1, 2});
  CHECK(seen["controller"] == Modes{0, 1, 2, 3, 4, 5, 6});
  // free, outward, inward, stuck, low stop, high stop; driven ones know no friction modes.
  CHECK(seen["piston balanced"] == Modes{0, 1, 2, 3, 4, 5});
  CHECK(seen["piston inertial"] == Modes{0, 1, 2, 3, 4, 5});
  CHECK(seen["piston driven"] == Modes{0, 4, 5});
}

TEST_CASE("no guard of a mode that parts choose at the start is up") {
  for (const ContractPlant& c : contract_plants()) {
    INFO(c.name);
    PlantOf model(c.yaml);
    const std::vector<double> y = model.plant->start();
    std::vector<double> g(static_cast<std::size_t>(model.plant->guard_count()));
    model.plant->guards(0.0, y.data(), g.data());
    for (int i = 0; i < model.plant->guard_count(); ++i) {
      INFO(model.plant->guard_name(i));
      CHECK(g[static_cast<std::size_t>(i)] <= 0.0);
    }
  }
}

TEST_CASE("derivatives are finite where things vanish") {
  // Equal temperatures and pressures, speed 0, opening 0, gases absent that can come in.
  PlantOf model(R"(gaskettle: 1
surroundings: {temperature: 300 K, pressure: 1 bar abs, wind: 0 m/s}
gas_spaces:
  a: {shape: {cylinder: {bore: 300 mm, length: 500 mm}}, gas: nitrogen, temperature: 300 K, pressure: 1 bar abs}
  b: {shape: {sphere: {bore: 300 mm}}, gas: argon, temperature: 300 K, pressure: 1 bar abs}
walls:
  one: {around: a, layers: [{material: carbon_steel, thickness: 5 mm}], inside: {film: stirred, emissivity: 0.8}, outside: {film: wind, emissivity: 0.8}}
  two: {around: b, layers: [{material: carbon_steel, thickness: 5 mm}], inside: {film: enclosed}, outside: {film: still_air}}
bodies: {block: {in: a, material: copper, mass: 3 kg, area: 0.1 m2, film: 20 W/m2/K, emissivity: 0.5}}
heaters: {coil: {in: a, power: 0 W, heat_capacity: 100 J/K, conductance: 3 W/K, area: 0.1 m2, emissivity: 0.9}}
stirrers: {fan: {in: a, diameter: 100 mm, power_number: 0.5, speed: 0 rpm}}
ports:
  link: {from: a, to: b, orifice: {bore: 5 mm, discharge_coefficient: 0.8}}
  shut: {from: a, to: b, orifice: {bore: 5 mm, discharge_coefficient: 0.8}, opening: 0}
  sonic: {from: b, to: atmosphere, iso6358: {C: 1 l/s/bar, b: 0.3}}
  feed: {from: {supply: {gas: helium, pressure: 1 bar abs, temperature: 300 K}}, to: b, orifice: {bore: 2 mm, discharge_coefficient: 0.8}}
relief_devices: {disc: {protects: a, burst: 1 bar gauge, flow_area: 5 mm2, discharge_coefficient: 0.6}}
pistons:
  ram: {closes: a, area: 50 cm2, at: 500 mm, mass: 0 kg}
  hammer: {closes: b, area: 50 cm2, at: 500 mm, tilt: 90 deg, mass: 1 kg, motion: inertial, friction: {breakaway: 2 N, kinetic: 1 N, stribeck_velocity: 10 mm/s}}
run: {until: 100 s})");
  Plant& plant = *model.plant;
  const std::vector<double> y = plant.start();
  const std::vector<double> f = rates(plant, 0.0, y);
  for (const double x : f) CHECK(std::isfinite(x));
  check_pattern(plant, 0.0, y);
  std::vector<double> end = y;
  struct {
    void start(double, const double*) {}
    void piece(const DenseStep&, double, double) {}
    void before_event(double, const double*, const std::vector<int>&, bool) {}
    void after_event(double, const double*, const std::vector<int>&, bool) {}
    bool interrupted() const { return false; }
  } nobody;
  Settings settings;
  settings.t_end = plant.model().run.until;
  CHECK(integrate(plant, nobody, settings, end).reason == EndReason::end_time);
}

TEST_CASE("no mechanism destroys entropy in any state that can be") {
  std::mt19937 random(20240607);
  std::uniform_real_distribution<double> part(-0.3, 0.3);
  for (const ContractPlant& c : contract_plants()) {
    INFO(c.name);
    PlantOf model(c.yaml);
    Plant& plant = *model.plant;
    const Layout& layout = plant.layout();
    const std::vector<double> start = plant.start();
    for (int draw = 0; draw < 50; ++draw) {
      std::vector<double> y = start;
      for (const StoreInfo& s : layout.stores) {
        // Solids by up to 30 % of their temperature; gas by as much of its energy above 0 K.
        const double room = s.space >= 0 ? plant.typical_size()[s.state] : s.capacity * s.temperature;
        y[s.state] = part(random) * room;
      }
      for (const SpaceInfo& s : layout.spaces)
        for (std::size_t k = 0; k < s.mass_state.size(); ++k)
          if (s.mass_state[k] >= 0)
            y[s.mass_state[k]] = s.mass[k] > 0.0 ? 0.3 * part(random) * s.mass[k]
                                                 : std::abs(part(random)) * plant.typical_size()[s.mass_state[k]];
      const double t = 0.0;
      if (!plant.admissible(t, y.data())) continue;
      const std::vector<double> f = rates(plant, t, y);
      for (int m = 0; m < mechanism_count; ++m) {
        if (m == static_cast<int>(Mechanism::friction)) continue;  // a drawn state need not move as its mode says
        INFO(mechanism_names[m]);
        double sum = 0.0;
        for (const int s : layout.entropy_state) sum += std::abs(f[s]);
        CHECK(f[layout.entropy_state[m]] >= -1e-12 * sum);
      }
      check_ledger(plant, f);
    }
  }
}

TEST_CASE("what parts declare can be read and has a meaning") {
  namespace uk = unit_kinds;
  std::map<std::string, UnitKind> kinds;
  for (const UnitKind& k : {uk::number,
                            uk::percentage,
                            uk::count,
                            uk::length,
                            uk::area,
                            uk::volume,
                            uk::mass,
                            uk::time,
                            uk::temperature,
                            uk::temperature_difference,
                            uk::pressure,
                            uk::pressure_difference,
                            uk::force,
                            uk::torque,
                            uk::power,
                            uk::energy,
                            uk::angle,
                            uk::frequency,
                            uk::rotation,
                            uk::velocity,
                            uk::acceleration,
                            uk::heat_capacity,
                            uk::entropy,
                            uk::specific_heat,
                            uk::molar_specific_heat,
                            uk::conductivity,
                            uk::film_coefficient,
                            uk::conductance,
                            uk::contact_resistance,
                            uk::heat_flux,
                            uk::density,
                            uk::molar_mass,
                            uk::stiffness,
                            uk::viscous_coefficient,
                            uk::sonic_conductance,
                            uk::viscosity,
                            uk::gas_flow,
                            uk::liquid_flow})
    kinds[k.name] = k;
  const std::vector<KeyDoc> docs = describe_model();
  CHECK(docs.size() > 100);
  for (const KeyDoc& d : docs) {
    INFO(d.section << "." << d.key);
    CHECK_FALSE(d.key.empty());
    CHECK_FALSE(d.type.empty());
    CHECK_FALSE(d.meaning.empty());
    const auto kind = kinds.find(d.type);
    if (kind == kinds.end() || d.units.empty()) continue;
    for (std::size_t from = 0; from < d.units.size();) {
      const std::size_t to = std::min(d.units.find(", ", from), d.units.size());
      CHECK_NOTHROW(parse_quantity("1 " + d.units.substr(from, to - from), kind->second));
      from = to + 2;
    }
    if (!d.fallback.empty()) CHECK_NOTHROW(parse_quantity(d.fallback, kind->second));
  }
  for (const ContractPlant& c : contract_plants()) {
    PlantOf model(c.yaml);
    std::set<std::string> names;
    for (const ChannelDoc& d : model.plant->layout().channels) {
      INFO(d.name);
      CHECK(names.insert(d.name).second);
      CHECK_FALSE(d.meaning.empty());
      CHECK_NOTHROW(from_si(300.0, d.kind, d.unit));
      CHECK(from_si(300.0, d.kind, d.kind.si) == 300.0);
    }
    for (int i = 0; i < model.plant->size(); ++i) {
      INFO(model.plant->state_name(i));
      CHECK_FALSE(model.plant->state_name(i).empty());
      CHECK(model.plant->typical_size()[i] > 0.0);
    }
  }
}
