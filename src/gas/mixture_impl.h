/// Templates of mixture.h. Sums over gases carry plain numbers of each gas (a value
/// and a slope at T) times masses in S; T enters through its departure from its own
/// plain value, which is zero with derivative one.
#pragma once
#include <cmath>

#include "gas/mixture.h"

namespace gaskettle {

template <Scalar S>
S GasMixture::total(const S* mass) const {
  S sum = mass[0];
  for (int k = 1; k < count(); ++k) sum += mass[k];
  return sum;
}

template <Scalar S>
S GasMixture::temperature(const S* mass, const S& energy, double guess) const {
  Columns plain{};
  for (int k = 0; k < count(); ++k) plain[k] = value(mass[k]);
  const double t = solve_temperature(plain.data(), value(energy), guess);
  const double log_t = std::log(t);
  S excess = -energy;
  S capacity = 0.0 * mass[0];
  for (int k = 0; k < count(); ++k) {
    const ThermalPoint p = species(k).thermal(t, log_t);
    const double r = species(k).gas_constant;
    excess += (p.enthalpy - r * t) * mass[k];
    capacity += (p.cp - r) * mass[k];
  }
  return t - excess / capacity;
}

/// Everything but density, pressure and the pressure's and mixing's share of s.
template <Scalar S>
GasState<S> GasMixture::state_at(const S* mass, const S& temperature) const {
  const double t = value(temperature);
  const double log_t = std::log(t);
  const S departure = temperature - t;
  const S zero = 0.0 * mass[0];
  S r = zero, cp = zero, h = zero, s = zero;
  double cp_slope = 0.0;
  for (int k = 0; k < count(); ++k) {
    const ThermalPoint p = species(k).thermal(t, log_t);
    r += species(k).gas_constant * mass[k];
    cp += p.cp * mass[k];
    h += p.enthalpy * mass[k];
    s += p.entropy * mass[k];
    cp_slope += p.cp_slope * value(mass[k]);
  }
  const double cp_plain = value(cp);
  const S per_mass = 1.0 / total(mass);
  GasState<S> state;
  state.temperature = temperature;
  state.gas_constant = r * per_mass;
  state.cp = (cp + cp_slope * departure) * per_mass;
  state.cv = state.cp - state.gas_constant;
  state.enthalpy = (h + cp_plain * departure) * per_mass;
  state.energy = state.enthalpy - state.gas_constant * temperature;
  state.entropy = (s + cp_plain / t * departure) * per_mass;
  return state;
}

/// s of the ideal mixture: -R (ln(p / 1 bar) + sum x ln x), x the mole fractions.
template <Scalar S>
void GasMixture::complete_entropy(GasState<S>& state, const S* mass) const {
  using std::log;
  S sum = log(state.pressure / entropy_pressure);
  if (count() > 1) {
    const S per_mole = 1.0 / (total(mass) * state.gas_constant);
    for (int k = 0; k < count(); ++k) sum += x_log_x(S(species(k).gas_constant * mass[k] * per_mole));
  }
  state.entropy -= state.gas_constant * sum;
}

template <Scalar S>
GasState<S> GasMixture::from_energy(const S* mass, const S& energy, const S& volume, double temperature_guess) const {
  GasState<S> state = state_at(mass, temperature(mass, energy, temperature_guess));
  state.density = total(mass) / volume;
  state.pressure = state.density * state.gas_constant * state.temperature;
  complete_entropy(state, mass);
  return state;
}

template <Scalar S>
GasState<S> GasMixture::from_temperature(const S* mass_fraction, const S& temperature, const S& pressure) const {
  GasState<S> state = state_at(mass_fraction, temperature);
  state.pressure = pressure;
  state.density = pressure / (state.gas_constant * temperature);
  complete_entropy(state, mass_fraction);
  return state;
}

template <Scalar S>
PressureSlopes<S> GasMixture::pressure_slopes(const GasState<S>& state, const S* mass, const S& volume) const {
  // p = (sum m R) T / V with T from U = sum m u(T): dT/dU = 1/C, dT/dm_k = -u_k/C.
  PressureSlopes<S> slopes;
  const S& temperature = state.temperature;
  const double t = value(temperature);
  const double log_t = std::log(t);
  const S by_temperature = state.density * state.gas_constant;
  slopes.by_energy = by_temperature / (total(mass) * state.cv);
  slopes.by_volume = -state.pressure / volume;
  const S t_over_v = temperature / volume;
  for (int k = 0; k < count(); ++k) {
    const ThermalPoint p = species(k).thermal(t, log_t);
    const double r = species(k).gas_constant;
    const S energy = along(temperature, {p.enthalpy - r * t, p.cp - r});
    slopes.by_mass[k] = r * t_over_v - slopes.by_energy * energy;
  }
  return slopes;
}

template <Scalar S>
S GasMixture::sound_speed(const GasState<S>& state) const {
  using std::sqrt;
  return sqrt(heat_capacity_ratio(state) * state.gas_constant * state.temperature);
}

template <Scalar S>
S GasMixture::throttling_entropy(const GasState<S>& state, const S& pressure_after) const {
  using std::log;
  return state.gas_constant * log(state.pressure / pressure_after);
}

template <Scalar S>
GasTransport<S> GasMixture::transport(const S* mass, const S& temperature) const {
  if (!has_transport_) return {along(temperature, {std::nan(""), 0.0}), along(temperature, {std::nan(""), 0.0})};
  if (count() == 1) return {species(0).viscosity(temperature), species(0).conductivity(temperature)};
  const int n = count();
  const double t = value(temperature);
  const double log_t = std::log(t);
  std::array<Slope, max_species> viscosity, conductivity;
  for (int k = 0; k < n; ++k) {
    viscosity[k] = species(k).viscosity_curve->at(t, log_t);
    conductivity[k] = species(k).conductivity_curve->at(t, log_t);
  }
  // The fractions' common factor cancels between numerator and denominator.
  const S departure = temperature - t;
  const S zero = 0.0 * mass[0];
  GasTransport<S> mix{zero, zero};
  for (int i = 0; i < n; ++i) {
    S shadow = zero;  // sum of x_j phi_ij
    double slope = 0.0;
    for (int j = 0; j < n; ++j) {
      const Slope phi = wilke_factor(i, j, viscosity[i], viscosity[j]);
      const double r = species(j).gas_constant;
      shadow += phi.value * r * mass[j];
      slope += phi.by_temperature * r * value(mass[j]);
    }
    const S share = species(i).gas_constant * mass[i] / (shadow + slope * departure);
    mix.viscosity += share * along(temperature, viscosity[i]);
    mix.conductivity += share * along(temperature, conductivity[i]);
  }
  return mix;
}

}  // namespace gaskettle
