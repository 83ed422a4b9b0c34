#include <algorithm>
#include <catch2/catch.hpp>
#include <cmath>
#include <map>
#include <random>
#include <set>

#include "plant/evaluate.h"
#include "solve/integrate.h"
#include "support/plant_of.h"
#include "unit/plant/contract_plants.h"

// What every part keeps, looked at along runs that go through all modes.
using namespace gaskettle;
using namespace gaskettle::testing;

namespace {
/// Jacobian taken column by column with duals, without colouring or pattern.
class DenseJacobian {
public:
  explicit DenseJacobian(Plant& plant) : plant_(plant) {
    w_.prepare(plant.layout());
    w_.band = std::max(smallest_pressure_band, plant.layout().rtol);
  }
  std::vector<double> operator()(double t, const std::vector<double>& y) {
    const auto n = y.size();
    std::vector<Dual<8>> state(n), rate(n);
    std::vector<double> J(n * n);
    for (std::size_t first = 0; first < n; first += 8) {
      for (std::size_t j = 0; j < n; ++j) {
        state[j] = Dual<8>(y[j]);
        if (j >= first && j < first + 8) state[j].d[j - first] = 1.0;
      }
      evaluate(plant_.model().parts, w_, Dual<8>(t), state.data(), rate.data(), false);
      for (std::size_t i = 0; i < n; ++i)
        for (std::size_t k = 0; k < 8 && first + k < n; ++k) J[i * n + first + k] = rate[i].d[k];
    }
    return J;
  }

private:
  Plant& plant_;
  Workspace<Dual<8>> w_;
};

std::vector<double> rates(Plant& plant, double t, const std::vector<double>& y) {
  std::vector<double> f(y.size());
  plant.rates(t, y.data(), f.data());
  return f;
}

/// Ledger rates against the rates of what is stored.
void check_ledger(Plant& plant, const std::vector<double>& f) {
  const Layout& layout = plant.layout();
  double sum = 0.0, size = f[layout.throughput_state];
  for (const auto& e : layout.ledger_entries) sum += ledger_sign(e.term) * f[e.state];
  for (const StoreInfo& s : layout.stores) {
    sum -= f[s.state];
    size += std::abs(f[s.state]);  // exchanges within the plant cancel to rounding of their own size
  }
  CHECK(std::abs(sum) <= 1e-13 * size + 1e-300);
  for (int k = 0; k < layout.mixture.count(); ++k) {
    double mass = f[layout.mass_in_state[k]] - f[layout.mass_out_state[k]],
           flow = f[layout.mass_in_state[k]] + f[layout.mass_out_state[k]];
    for (const SpaceInfo& s : layout.spaces)
      if (s.mass_state[k] >= 0) {
        mass -= f[s.mass_state[k]];
        flow += std::abs(f[s.mass_state[k]]);
      }
    CHECK(std::abs(mass) <= 1e-13 * flow);
  }
}

/// One column of differences, forward and backward, with a step of `relative` times the size of the state.
struct Differences {
  std::vector<double> forward, backward;
};
Differences differences(Plant& plant, double t, const std::vector<double>& y, std::size_t j, double step) {
  const std::vector<double> here = rates(plant, t, y);
  std::vector<double> moved = y;
  moved[j] = y[j] + step;
  const double up = moved[j] - y[j];
  Differences d{rates(plant, t, moved), {}};
  moved[j] = y[j] - step;
  const double down = y[j] - moved[j];
  d.backward = rates(plant, t, moved);
  for (std::size_t i = 0; i < y.size(); ++i) {
    d.forward[i] = (d.forward[i] - here[i]) / up;
    d.backward[i] = (here[i] - d.backward[i]) / down;
  }
  return d;
}

/// The coloured Jacobian against the dense one: equal to the last bit, finite, nothing outside the pattern.
std::vector<double> check_pattern(Plant& plant, double t, const std::vector<double>& y) {
  const auto n = y.size();
  const std::vector<double> dense = DenseJacobian(plant)(t, y);
  const Sparsity& pattern = plant.sparsity();
  std::vector<double> sparse(static_cast<std::size_t>(pattern.entries())), in_time(n), spread(n * n, 0.0);
  plant.jacobian(t, y.data(), sparse.data(), in_time.data());
  for (std::size_t i = 0; i < n; ++i)
    for (int q = pattern.row_start[i]; q < pattern.row_start[i + 1]; ++q)
      spread[i * n + static_cast<std::size_t>(pattern.columns[q])] = sparse[q];
  std::size_t unlike = 0;
  for (std::size_t k = 0; k < n * n; ++k) unlike += dense[k] == spread[k] ? 0 : 1;
  const auto finite = [](double x) { return std::isfinite(x); };
  CHECK(unlike == 0);
  CHECK(std::all_of(dense.begin(), dense.end(), finite));
  CHECK(std::all_of(in_time.begin(), in_time.end(), finite));
  return dense;
}

/// Against differences. Where a rate has a kink (a flow that turns) the exact derivative lies between both sides. A
/// short step sees narrow curves (the band about equal pressures), a long one is less troubled by rounding: one of
/// them has to agree, to 1e-5 of the row.
void check_jacobian(Plant& plant, double t, const std::vector<double>& y) {
  const auto n = y.size();
  const std::vector<double> dense = check_pattern(plant, t, y);
  const double* typical = plant.typical_size();
  const auto size = [&](std::size_t j) {
    return std::isfinite(typical[j]) ? std::max(typical[j], std::abs(y[j])) : 1.0;
  };
  std::vector<double> most(n, 0.0);
  for (std::size_t k = 0; k < n * n; ++k) most[k / n] = std::max(most[k / n], std::abs(dense[k]) * size(k % n));
  std::string wrong;
  for (std::size_t j = 0; j < n; ++j) {
    const Differences tries[] = {differences(plant, t, y, j, 1e-7 * size(j)),
                                 differences(plant, t, y, j, 1e-9 * size(j))};
    for (std::size_t i = 0; i < n; ++i) {
      // The throughput adds sizes: with many at zero any mixture of signs may be met. Nothing depends on it.
      if (static_cast<int>(i) == plant.layout().throughput_state) continue;
      const double row = most[i] / size(j), d = dense[i * n + j];
      const bool agrees = std::any_of(std::begin(tries), std::end(tries), [&](const Differences& x) {
        const auto [low, high] = std::minmax(x.forward[i], x.backward[i]);
        const double slack = 1e-5 * std::max({row, std::abs(low), std::abs(high)});
        return d >= low - slack && d <= high + slack;
      });
      if (!agrees)
        wrong += plant.state_name(static_cast<int>(i)) + " by " + plant.state_name(static_cast<int>(j)) + ": " +
                 std::to_string(d) + " not " + std::to_string(tries[0].forward[i]) + " or " +
                 std::to_string(tries[0].backward[i]) + "\n";
    }
  }
  INFO("t = " << t << " s");
  CHECK(wrong == "");
}

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
