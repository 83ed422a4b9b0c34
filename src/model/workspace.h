/// One evaluation of the plant: the arrays that parts read and add to.
///
/// The plant runs the parts' phases in this order, kind by kind:
///   prepare  own temperatures and volumes from the states
///   evaluate gas temperature and pressure from mass, energy and volume
///   sense    readings that controllers use
///   control  outputs, which become inputs
///   exchange heat, mass and work between stores
///   move     pistons, once all other flows are known
///   finish   derivatives of the part's own states
///   observe  channels that only a record wants
/// Every flow is stated once, as a transfer; balances, ledger and audit follow from
/// that one statement. Nothing here allocates once the plant has been laid out.
#pragma once
#include <array>
#include <vector>

#include "base/scalar.h"
#include "gas/mixture.h"
#include "model/layout.h"

namespace gaskettle {

template <Scalar S_>
struct Workspace {
  using S = S_;
  const Layout* layout = nullptr;
  S t{};
  const S* y = nullptr;
  S* f = nullptr;
  int species_count = 0;
  double band = 1e-5;  ///< fraction of pressure over which flow passes through zero

  std::vector<S> input;        ///< by input
  std::vector<S> temperature;  ///< K, by store
  std::vector<S> power;        ///< W into each store
  std::vector<S> volume;       ///< m3, by space
  std::vector<S> volume_rate;  ///< m3/s, of all but balanced pistons, by space
  std::vector<GasState<S>> gas;
  std::vector<S> mass;           ///< kg, [space * species_count + species]
  std::vector<S> mass_rate;      ///< kg/s, likewise
  std::vector<S> out;            ///< by channel, in SI
  std::vector<double> out_rate;  ///< per second, by channel, along the motion; filled only where a guard needs it
  std::vector<S> scratch;        ///< room for the balance of pistons
  S ambient_temperature{}, wind{};

  void prepare(const Layout& l);

  // --- reading ---
  S* space_mass(int space) { return mass.data() + space * species_count; }
  const S* space_mass(int space) const { return mass.data() + space * species_count; }
  S total_mass(int space) const {
    S sum = space_mass(space)[0];
    for (int k = 1; k < species_count; ++k) sum = sum + space_mass(space)[k];
    return sum;
  }
  S slope_of_input(int i) const { return layout->inputs[static_cast<std::size_t>(i)].signal.slope(t); }

  // --- stating flows ---
  /// Heat q (W) from one store to another.
  void heat(int from, int to, const S& q, Mechanism mechanism) {
    power[from] = power[from] - q;
    power[to] = power[to] + q;
    generate(mechanism, q * (1.0 / temperature[to] - 1.0 / temperature[from]));
  }
  /// Heat q (W) from a store out of the plant, to what has the temperature `there`.
  void heat_out(int from, const S& there, const S& q, Mechanism mechanism, int ledger_entry) {
    power[from] = power[from] - q;
    book(ledger_entry, q);
    generate(mechanism, q * (1.0 / there - 1.0 / temperature[from]));
    carry_entropy(-q / there);
  }
  /// Work-like energy (electrical, shaft, radiation of a source far hotter) into a store.
  /// Taken out (negative), it leaves as heat at the store's temperature.
  void supply(int to, const S& p, Mechanism mechanism, int ledger_entry) {
    power[to] = power[to] + p;
    book(ledger_entry, p);
    generate(mechanism, positive_part(p) / temperature[to]);
    carry_entropy(negative_part(p) / temperature[to]);
  }
  /// A rate (W) of a ledger term.
  void book(int ledger_entry, const S& rate) {
    f[ledger_entry] = f[ledger_entry] + rate;
    f[layout->throughput_state] = f[layout->throughput_state] + absolute(rate);
  }
  void generate(Mechanism mechanism, const S& rate) {
    const int i = layout->entropy_state[static_cast<std::size_t>(mechanism)];
    f[i] = f[i] + rate;
  }
  /// Entropy (W/K) carried into the plant from outside.
  void carry_entropy(const S& rate) {
    const int i = layout->entropy_transfer_state;
    f[i] = f[i] + rate;
  }
};

template <Scalar S>
void Workspace<S>::prepare(const Layout& l) {
  layout = &l;
  species_count = l.mixture.count();
  input.assign(l.inputs.size(), S(0.0));
  temperature.assign(l.stores.size(), S(0.0));
  power.assign(l.stores.size(), S(0.0));
  volume.assign(l.spaces.size(), S(0.0));
  volume_rate.assign(l.spaces.size(), S(0.0));
  gas.assign(l.spaces.size(), GasState<S>{});
  mass.assign(l.spaces.size() * static_cast<std::size_t>(species_count), S(0.0));
  mass_rate = mass;
  out.assign(l.channels.size(), S(0.0));
  scratch.assign(l.scratch_size, S(0.0));
}

/// What a part may do at an event: look at the plant before it, change its own mode
/// and its states, book what that costs, and say what happened.
class Event {
public:
  virtual ~Event() = default;
  double time = 0.0;
  double* y = nullptr;                        ///< the states, to be changed
  const Workspace<double>* before = nullptr;  ///< at this time, old modes and inputs
  Layout* layout = nullptr;

  /// Adds `amount` (J) to a ledger term.
  virtual void book(int ledger_entry, double amount) = 0;
  virtual void generate(Mechanism mechanism, double amount) = 0;
  virtual void carry_entropy(double amount) = 0;
  /// An event row: what happened to which part, with its main quantity before and after.
  virtual void log(const std::string& part, const std::string& what, double value_before, double value_after) = 0;
  /// The plant evaluated anew, with the states, modes and inputs as they are now.
  virtual const Workspace<double>& now() = 0;
  /// Rate of change (per second) of a channel along the motion, as things are now.
  virtual double channel_rate(int channel) = 0;
};

}  // namespace gaskettle
