/// An end of a flow path: a gas space, the atmosphere, or a supply.
#pragma once
#include "model/composition.h"
#include "model/workspace.h"

namespace gaskettle {

class Endpoint {
public:
  /// Reads `from` or `to`: a name, `atmosphere`, or `{supply: {gas, pressure, temperature}}`.
  void read(Section& s, const std::string& key, const std::string& meaning);
  /// Makes the end at the atmosphere.
  static Endpoint at_atmosphere();
  static Endpoint at_space(Reference reference, bool or_atmosphere = false);
  void declare(Layout& layout);
  void connect(Layout& layout, const std::string& part, const std::string& which);

  bool is_space() const { return kind_ == Kind::space; }
  bool given() const { return given_; }
  int space() const { return space_; }
  const Composition& composition() const { return composition_; }
  const std::string& space_name() const { return reference_.name; }

  /// The state of the gas that would flow out of this end.
  template <class S>
  GasState<S> state(const Workspace<S>& w) const {
    if (kind_ == Kind::space) return w.gas[space_];
    S fraction[GasMixture::max_species];
    for (int k = 0; k < w.species_count; ++k) fraction[k] = S(fraction_[k]);
    return w.layout->mixture.from_temperature(fraction, temperature(w), pressure(w));
  }
  template <class S>
  S pressure(const Workspace<S>& w) const {
    if (kind_ == Kind::space) return w.gas[space_].pressure;
    return kind_ == Kind::supply ? w.input[pressure_input_] : S(w.layout->atmosphere_pressure);
  }
  /// Mass fraction of a species in what would flow out of this end.
  template <class S>
  S fraction(const Workspace<S>& w, int k) const {
    if (kind_ != Kind::space) return S(fraction_[k]);
    return w.space_mass(space_)[k] / w.total_mass(space_);
  }

private:
  enum class Kind { space, atmosphere, supply };
  void read_supply(Section& supply);
  template <class S>
  S temperature(const Workspace<S>& w) const {
    return kind_ == Kind::supply ? w.input[temperature_input_] : w.ambient_temperature;
  }
  Kind kind_ = Kind::atmosphere;
  bool given_ = false, or_atmosphere_ = false;
  Reference reference_;
  Composition composition_;
  SignalSpec pressure_spec_, temperature_spec_;
  int space_ = -1, pressure_input_ = -1, temperature_input_ = -1;
  std::vector<double> fraction_;
};

/// Where the flows of one path are booked.
struct FlowEntries {
  int enthalpy_in = -1, enthalpy_out = -1;  ///< ledger entries; -1 between two spaces
  void connect(Layout& layout, const std::string& part, const Endpoint& from, const Endpoint& to);
};

/// Ideal-mixing entropy of a stream, J/kg/K: -sum(R_k y_k ln x_k).
template <class S>
S mixing_entropy_of(const Workspace<S>& w, const Endpoint& end) {
  S moles = S(0.0), fraction[GasMixture::max_species];
  for (int k = 0; k < w.species_count; ++k) {
    fraction[k] = end.fraction(w, k) / w.layout->mixture.species(k).molar_mass;
    moles = moles + fraction[k];
  }
  S sum = S(0.0);
  for (int k = 0; k < w.species_count; ++k) sum = sum - x_log_x(S(fraction[k] / moles));
  return molar_gas_constant * moles * sum;
}

/// States a flow (kg/s, >= 0) from one end to the other: mass, energy, ledger and audit.
///
/// Entropy: throttling to the pressure at the far end at constant enthalpy; then, in a
/// space, the equalising of temperature with what is there,
///   (h_in - h(T))/T + s(T) - s(T_in)  at one pressure and composition.
/// The mixing of species is audited as a difference of states (see Plant).
template <class S>
void carry_flow(Workspace<S>& w, const S& flow, const Endpoint& from, const Endpoint& to, const GasState<S>& up,
                const FlowEntries& entries) {
  const Layout& layout = *w.layout;
  const S enthalpy = flow * up.enthalpy;
  S fraction[GasMixture::max_species];
  for (int k = 0; k < w.species_count; ++k) fraction[k] = from.fraction(w, k);
  const S throttled = layout.mixture.throttling_entropy(up, to.pressure(w));
  w.generate(Mechanism::throttling, flow * throttled);
  const bool mixture = w.species_count > 1;
  const S mixing = mixture ? S(flow * mixing_entropy_of(w, from)) : S(0.0);

  if (from.is_space()) {
    w.power[layout.spaces[from.space()].store] = w.power[layout.spaces[from.space()].store] - enthalpy;
    for (int k = 0; k < w.species_count; ++k) {
      S& rate = w.mass_rate[from.space() * w.species_count + k];
      rate = rate - flow * fraction[k];
    }
    if (mixture) w.f[layout.mixing_carried_state] = w.f[layout.mixing_carried_state] - mixing;
  } else {
    w.book(entries.enthalpy_in, enthalpy);
    w.carry_entropy(flow * up.entropy);
    for (int k = 0; k < w.species_count; ++k)
      w.f[layout.mass_in_state[k]] = w.f[layout.mass_in_state[k]] + flow * fraction[k];
  }
  if (to.is_space()) {
    const int store = layout.spaces[to.space()].store;
    w.power[store] = w.power[store] + enthalpy;
    for (int k = 0; k < w.species_count; ++k) {
      S& rate = w.mass_rate[to.space() * w.species_count + k];
      rate = rate + flow * fraction[k];
    }
    const S& here = w.gas[to.space()].temperature;
    const GasState<S> warmed = layout.mixture.from_temperature(fraction, here, up.pressure);
    w.generate(Mechanism::mixing, flow * ((up.enthalpy - warmed.enthalpy) / here + warmed.entropy - up.entropy));
    if (mixture) w.f[layout.mixing_carried_state] = w.f[layout.mixing_carried_state] + mixing;
  } else {
    w.book(entries.enthalpy_out, enthalpy);
    w.carry_entropy(-flow * (up.entropy + throttled));
    for (int k = 0; k < w.species_count; ++k)
      w.f[layout.mass_out_state[k]] = w.f[layout.mass_out_state[k]] + flow * fraction[k];
  }
}

}  // namespace gaskettle
