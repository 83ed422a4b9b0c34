/// The plant being laid out: what parts declare, and where they find each other.
///
/// Parts never include each other. In `declare` a part announces what others refer
/// to; in `connect` it resolves its references and claims states, inputs, ledger
/// entries, guards and channels. The rate code then works on flat arrays through
/// the indices it got here.
#pragma once
#include <map>
#include <optional>
#include <set>
#include <string>
#include <vector>

#include "base/problems.h"
#include "base/units.h"
#include "gas/mixture.h"
#include "laws/conduction_grid.h"
#include "model/section.h"
#include "model/shape.h"
#include "model/signal.h"
#include "model/terms.h"

namespace gaskettle {

/// Mole fractions by name of gas.
using Composition = std::vector<std::pair<std::string, double>>;

/// One integrated number. Extensive states are departures from the start and begin at 0.
struct StateInfo {
  std::string name;
  double typical = 1.0;  ///< a typical size, the base of the error weight
  double initial = 0.0;
};

/// Anything that holds energy at a temperature: the gas of a space, a wall node, a body, an element.
struct StoreInfo {
  std::string name;
  int state = -1;            ///< energy departure, J
  double capacity = 0.0;     ///< J/K; 0 for gas, whose temperature follows from its energy
  double temperature = 0.0;  ///< K at the start
  int space = -1;            ///< the gas space, for gas
};

struct SpaceInfo {
  std::string name;
  Place place;
  int index = -1;
  int store = -1;
  Shape shape;
  double count = 1.0;                ///< so many alike
  double volume = 0.0;               ///< m3 at the start, all of them
  double temperature = 0.0;          ///< K at the start
  std::optional<double> pressure;    ///< Pa absolute at the start, once known
  Place pressure_place;              ///< where it is stated
  std::optional<double> given_mass;  ///< kg of all of them
  Composition composition;
  std::vector<bool> carries;      ///< which species can ever be in here
  std::vector<int> mass_state;    ///< per species, -1 where it cannot be
  std::vector<double> mass;       ///< kg at the start, per species
  double energy = 0.0;            ///< J at the start (zero: ideal gas h = 0 at 298.15 K)
  double stated_wall_area = 0.0;  ///< m2 that walls with an area of their own take
  int whole_walls = 0;            ///< walls that take what is left of the shape; more than one is a mistake
  bool closed_by_piston = false;
};

/// A face inside a space that films and radiation reach: a wall or a body.
struct FaceInfo {
  std::string part;
  int space = -1;
  int store = -1;
  double area = 0.0;        ///< m2
  double emissivity = 0.0;  ///< 0: does not radiate
  bool wall = false;
  int core_store = -1;  ///< innermost node of a body
};

/// A time-varying input: from the model or from a controller.
struct InputInfo {
  std::string path;  ///< "element.power"
  UnitKind kind;
  Signal signal;
  int driver = -1;               ///< output slot of the controller that drives it
  bool given = true;             ///< the model states it
  double low = 0.0, high = 0.0;  ///< what a controller may ask for
  Place place;
};

/// When in the evaluation of the rates a channel gets its value.
enum class ChannelPhase { state, flow, observed };

/// Something that can be recorded, watched or read by a sensor.
struct ChannelDoc {
  std::string name;  ///< "chamber.temperature"
  UnitKind kind;
  std::string meaning;
  ChannelPhase phase = ChannelPhase::state;
  std::string unit;  ///< how the model's author writes it; empty: SI
};

/// A second dimension of a record: a wall's temperatures over its depth.
struct ProfileDoc {
  std::string part;
  std::vector<double> depth;  ///< m
  std::vector<int> store;
};

/// The conduction nodes of a wall, as chosen.
struct WallGrid {
  std::string wall;
  ConductionGrid grid;
  std::vector<int> store;
};

/// A stirrer with an impeller that a `stirred` film can refer to.
struct ImpellerInfo {
  int space = -1;
  double diameter = 0.0;  ///< m
  int speed_input = -1;
};

/// What the answer tells of a relief device.
struct ReliefInfo {
  std::string name;
  int space = -1;
  int flow_channel = -1, opening_channel = -1, released_channel = -1;
  double set_pressure = 0.0;  ///< Pa absolute at the inlet
  double area = 0.0, discharge_coefficient = 0.0;
  bool disc = false;
  int outlet_space = -1;  ///< -1: the atmosphere
};

/// A figure that `check` prints of a part.
struct Fact {
  std::string part, what;
  double value = 0.0;  ///< SI
  UnitKind kind;
};

class Layout {
public:
  Layout(Problems& problems, double atmosphere) : problems_(&problems), atmosphere_pressure(atmosphere) {}

  // --- claimed in connect ---
  int add_state(const std::string& name, double typical, double initial = 0.0);
  /// A solid store; claims its energy state. capacity in J/K, temperature in K.
  int add_store(const std::string& name, double capacity, double temperature);
  int add_gas_store(int space, double typical_energy);
  int add_input(const std::string& path, const UnitKind& kind, const SignalSpec& spec, double start, Place place);
  /// The quadrature state of one term of one part; `typical` (J) 0: of the whole plant.
  int ledger(LedgerTerm term, const std::string& part, double typical = 0.0);
  int add_channel(const std::string& name, const UnitKind& kind, const std::string& meaning, ChannelPhase phase,
                  const std::string& unit = "");

  // --- found by name; problems are reported, and -1 or nullptr returned ---
  /// `or_atmosphere`: the atmosphere would do as well, and is suggested too.
  SpaceInfo* space(const Reference& reference, bool or_atmosphere = false);
  int channel(const Reference& reference);
  int pressure_channel(int space) const { return pressure_channels[static_cast<std::size_t>(space)]; }
  int input(const Reference& reference);
  std::optional<std::string> kind_of_part(const std::string& name) const;
  bool sound(const std::string& part) const { return unsound.count(part) == 0; }
  bool any_unsound(const std::string& kind) const;
  /// Whether `reference` names what a part would have, had it been read without mistake; counts it as trouble.
  bool excuse(const std::string& reference);
  /// Grows with every problem and every excuse.
  std::size_t troubles() const { return problems_->count() + excused_; }

  // --- gases ---
  /// Registers the gases of a composition as part of the plant.
  void use_gas(const Composition& composition, const Place& place);
  /// Gas can pass from one space to another (-1: from outside, with `composition`).
  void can_flow(int from, int to, const Composition& composition = {});
  /// Makes the mixture and spreads species along the flow paths. After all `declare`s.
  void close_gases();
  const std::vector<Composition>& compositions_used() const { return compositions_used_; }
  /// Mass fractions in the order of the mixture.
  std::vector<double> mass_fractions(const Composition& composition) const;
  std::vector<double> mole_fractions(const Composition& composition) const;

  Problems& problems() const { return *problems_; }
  void error(const Place& place, const std::string& message) const { problems_->add(place, message); }

  GasMixture mixture;
  std::map<std::string, Species> own_gases;  ///< from the `gases` section
  Composition surroundings_gas;
  std::vector<double> surroundings_fractions;  ///< mass fractions in the mixture; empty if it cannot enter
  GasMixture outside_air;                      ///< for outside films
  std::vector<double> outside_air_fractions;   ///< mass fractions of it

  std::vector<StateInfo> states;
  std::vector<StoreInfo> stores;
  std::vector<SpaceInfo> spaces;
  std::vector<FaceInfo> faces;
  std::vector<InputInfo> inputs;
  std::vector<ChannelDoc> channels;
  std::vector<ProfileDoc> profiles;
  std::vector<ReliefInfo> reliefs;
  std::vector<int> pressure_channels;  ///< by space
  std::vector<WallGrid> wall_grids;
  std::vector<ImpellerInfo> impellers;
  std::vector<std::string> part_names, part_kinds;  ///< for messages
  std::set<std::string> unsound;                    ///< parts with a mistake
  bool loose_piston = false;  ///< a balanced piston with a mistake may be what a pressure would follow from
  struct LedgerEntry {
    LedgerTerm term;
    std::string part;
    int state;
  };
  std::vector<LedgerEntry> ledger_entries;
  std::vector<int> entropy_state;                  ///< per mechanism
  int entropy_transfer_state = -1;                 ///< net entropy carried in across the plant's boundary
  int mixing_carried_state = -1;                   ///< net ideal-mixing entropy carried into spaces
  int throughput_state = -1;                       ///< integral of the sum of |ledger rates|
  std::vector<int> mass_in_state, mass_out_state;  ///< per species
  std::vector<std::string> warnings, advice;
  std::vector<Fact> facts;

private:
  Problems* problems_;
  std::size_t excused_ = 0;

public:
  double atmosphere_pressure;  ///< Pa
  double gravity = 9.80665;    ///< m/s2
  int ambient_temperature_input = -1, wind_input = -1;
  double ambient_temperature_start = 293.15;
  double run_length = 0.0;  ///< s
  double rtol = 1e-8;
  bool discharges_to_atmosphere = false;
  std::size_t scratch_size = 0;  ///< of a workspace

private:
  struct Flow {
    int from, to;
    Composition composition;
  };
  std::vector<Flow> flows_;
  std::vector<std::pair<std::string, Place>> gas_names_;
  std::vector<Composition> compositions_used_;
};

}  // namespace gaskettle
