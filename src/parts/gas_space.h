/// A well-mixed volume of gas, rigid or closed by pistons.
///
/// States: energy U (J, zero: ideal gas h = 0 at 298.15 K) and the mass m_k (kg) of
/// each species that can be in it, both as departures from the start.
///   dm_k/dt = sum over ports of the flow of species k into the space
///   dU/dt   = heat + shaft work + sum(flow * upstream enthalpy) - p dV/dt
/// T follows from u(T, v) = U/m, p from the equation of state. Assumed: uniform T, p
/// and composition (well mixed); kinetic and potential energy of the gas neglected.
/// Source of the balance: Y. A. Cengel and M. A. Boles, Thermodynamics: An Engineering
/// Approach, chapter 5, uniform-flow energy balance of a control volume.
#pragma once
#include "model/workspace.h"

namespace gaskettle {

class GasSpace {
public:
  static constexpr const char* section = "gas_spaces";
  static constexpr const char* kind = "gas space";
  static constexpr const char* meaning = "a well-mixed volume of gas, rigid or closed by pistons";

  std::string name;
  Place place;

  void read(Section& s);
  void declare(Layout& layout);
  void connect(Layout& layout);

  template <class S>
  void prepare(Workspace<S>& w) const {
    w.volume[index_] = S(volume_);
    w.volume_rate[index_] = S(0.0);
    S* mass = w.space_mass(index_);
    for (int k = 0; k < w.species_count; ++k) {
      mass[k] = S(mass_[k]);
      if (mass_state_[k] >= 0) mass[k] = mass[k] + w.y[mass_state_[k]];
      w.mass_rate[index_ * w.species_count + k] = S(0.0);
    }
  }

  template <class S>
  void evaluate(Workspace<S>& w) const {
    const S energy = energy_ + w.y[energy_state_];
    const S total = w.total_mass(index_);
    // A straight line from the start: near enough that a few Newton steps do.
    const double guess = temperature_ + (value(energy) / value(total) - start_energy_) / start_cv_;
    w.gas[index_] = w.layout->mixture.from_energy(w.space_mass(index_), energy, w.volume[index_], guess);
    w.temperature[store_] = w.gas[index_].temperature;
    w.out[channel_] = w.gas[index_].temperature;
    w.out[channel_ + 1] = w.gas[index_].pressure;
    w.out[channel_ + 2] = w.volume[index_];
    w.out[channel_ + 3] = total;
  }

  template <class S>
  void finish(Workspace<S>& w) const {
    for (int k = 0; k < w.species_count; ++k)
      if (mass_state_[k] >= 0) w.f[mass_state_[k]] = w.mass_rate[index_ * w.species_count + k];
  }

  template <class S>
  void observe(Workspace<S>& w) const {
    w.out[channel_ + 4] = energy_ + w.y[energy_state_];
    w.out[channel_ + 5] = w.gas[index_].entropy;
    w.out[channel_ + 6] = w.gas[index_].density;
    S moles = S(0.0);
    const S* mass = w.space_mass(index_);
    for (int k = 0; k < w.species_count; ++k) moles = moles + mass[k] / w.layout->mixture.species(k).molar_mass;
    for (std::size_t i = 0; i < fraction_species_.size(); ++i) {
      const int k = fraction_species_[i];
      w.out[channel_ + 7 + static_cast<int>(i)] = mass[k] / w.layout->mixture.species(k).molar_mass / moles;
    }
  }

  /// Observers: leaving the published range of the gas data.
  static constexpr std::array guard_names = {"leaves the published range upward",
                                             "leaves the published range downward"};
  static constexpr bool guards_disturb = false;
  void guards(const Workspace<double>& w, double* g) const {
    g[0] = w.gas[index_].temperature - highest_;
    g[1] = lowest_ - w.gas[index_].temperature;
  }
  void on_guard(int which, Event& e) const;

  int index() const { return index_; }

private:
  Shape shape_;
  std::optional<Value> stated_volume_, stated_pressure_, stated_mass_;
  Value start_temperature_;
  Composition composition_;
  long count_ = 1;
  bool has_content_ = false;  // states pressure or mass, readable or not

  int index_ = 0, store_ = 0, energy_state_ = 0, channel_ = 0;
  double volume_ = 0.0, energy_ = 0.0, temperature_ = 0.0, start_energy_ = 0.0, start_cv_ = 1.0;
  double lowest_ = 0.0, highest_ = 1e9;
  std::vector<double> mass_;
  std::vector<int> mass_state_, fraction_species_;
  std::string temperature_unit_, pressure_unit_;
};

}  // namespace gaskettle
