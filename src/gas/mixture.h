/// The gases of one plant, and the state of a mixture of them.
#pragma once
#include <array>
#include <optional>
#include <string_view>
#include <vector>

#include "base/scalar.h"
#include "gas/species.h"

namespace gaskettle {

/// Most gases in one plant: a fixed number keeps the rate code free of allocation.
inline constexpr int max_species = 16;

/// State of a mixture; J are per kilogram of mixture.
template <Scalar S>
struct GasState {
  S temperature{};   ///< K
  S pressure{};      ///< Pa, absolute
  S density{};       ///< kg/m3
  S gas_constant{};  ///< J/(kg K)
  S cp{};            ///< J/(kg K)
  S cv{};            ///< J/(kg K), cp - R
  S energy{};        ///< J/kg
  S enthalpy{};      ///< J/kg, 0 at 298.15 K
  S entropy{};       ///< J/(kg K), at T and p, ideal mixing included
};

/// How the pressure of a closed volume answers to its states.
template <Scalar S>
struct PressureSlopes {
  S by_energy{};                         ///< dp/dU at V, m: Pa/J
  S by_volume{};                         ///< dp/dV at U, m: Pa/m3
  std::array<S, max_species> by_mass{};  ///< dp/dm_k at U, V and the other masses: Pa/kg
};

/// Viscosity (Pa s) and conductivity (W/(m K)) of a dilute mixture.
template <Scalar S>
struct GasTransport {
  S viscosity{};
  S conductivity{};
};

/// The ordered gases of one plant. Compositions are arrays of count() numbers in
/// that order; amounts may be zero, or negative by rounding.
///
/// An ideal-gas mixture: h, cp and s of each gas at T, its own partial pressure.
/// A real-gas model belongs behind the same calls: keep an enum with the equation
/// of state here, and switch on it at the top of from_energy, from_temperature,
/// pressure_slopes, sound_speed and throttling_entropy; each branch takes every
/// figure from one Helmholtz energy a(T, v, x). The switch costs a predictable
/// branch; there is no virtual call, so any scalar passes. Callers therefore use
/// GasState's fields and these functions, never p = rho R T of their own.
class GasMixture {
public:
  static constexpr int max_species = gaskettle::max_species;

  GasMixture() = default;
  /// Throws std::invalid_argument for no gas, more than max_species, or a name twice.
  explicit GasMixture(std::vector<Species> species);

  int count() const { return static_cast<int>(species_.size()); }
  const Species& species(int k) const { return species_[static_cast<std::size_t>(k)]; }
  /// Place of the gas of this name (not alias), if it is here.
  std::optional<int> index_of(std::string_view name) const;

  // Compositions, in plain numbers. Fractions are normalised by their sum.
  double molar_mass(const double* mole_fraction) const;  ///< kg/mol
  std::vector<double> mass_fractions(const double* mole_fraction) const;
  std::vector<double> mole_fractions(const double* mass) const;
  /// kg of mixture in a volume (m3) at T (K) and p (Pa).
  double mass_in(double volume, const double* mole_fraction, double temperature, double pressure) const;
  /// The published range of the gases present (mass fraction above 1e-9): K.
  double lowest_temperature(const double* mass) const;
  double highest_temperature(const double* mass) const;
  /// Whether every gas has viscosity and conductivity.
  bool has_transport() const { return has_transport_; }

  /// T (K) at which the masses (kg) hold the energy U (J).
  ///
  /// A safeguarded Newton iteration in plain numbers, from `guess` (K; any value
  /// will do), then one Newton step in S, which makes the derivatives exact
  /// (implicit function theorem). cv > 0 makes the answer unique. Not a number
  /// where there is none: no mass, U below that of T -> 0, inputs not finite.
  template <Scalar S>
  S temperature(const S* mass, const S& energy, double guess) const;
  /// The state of the masses (kg, count() of them) with energy U (J) in a volume (m3).
  template <Scalar S>
  GasState<S> from_energy(const S* mass, const S& energy, const S& volume, double temperature_guess) const;
  /// The state at T (K), p (Pa); the fractions are normalised, so masses do as well.
  template <Scalar S>
  GasState<S> from_temperature(const S* mass_fraction, const S& temperature, const S& pressure) const;

  /// Slopes of the pressure at a state made by from_energy with these masses and volume.
  template <Scalar S>
  PressureSlopes<S> pressure_slopes(const GasState<S>& state, const S* mass, const S& volume) const;
  /// Speed of sound, m/s.
  template <Scalar S>
  S sound_speed(const GasState<S>& state) const;
  /// Entropy gained per kilogram (J/(kg K)) in throttling to a pressure (Pa) at the same enthalpy.
  template <Scalar S>
  S throttling_entropy(const GasState<S>& state, const S& pressure_after) const;

  /// Viscosity and conductivity at T (K); masses or mass fractions. Viscosity: C. R.
  /// Wilke, "A Viscosity Equation for Gas Mixtures", J. Chem. Phys. 18 (1950) 517,
  /// equations 13, 14. Conductivity: A. Wassiljewa, Phys. Z. 5 (1904) 737, with the factors of
  /// E. A. Mason, S. C. Saxena, Phys. Fluids 1 (1958) 361, in the form with factor 1
  /// of B. E. Poling, J. M. Prausnitz, J. P. O'Connell, "The Properties of Gases and Liquids",
  /// 5th ed. 2001, equations 10-6.1, 10-6.2: then one gas named twice conducts like
  /// one. Against measurements both are usually
  /// right within a few per cent; hydrogen and helium mixtures fare worst. Not a number unless has_transport().
  template <Scalar S>
  GasTransport<S> transport(const S* mass, const S& temperature) const;
  template <Scalar S>
  S viscosity(const S* mass, const S& t) const {
    return transport(mass, t).viscosity;
  }
  template <Scalar S>
  S conductivity(const S* mass, const S& t) const {
    return transport(mass, t).conductivity;
  }

private:
  using Columns = std::array<double, max_species>;
  double solve_temperature(const double* mass, double energy, double guess) const;
  template <Scalar S>
  GasState<S> state_at(const S* mass, const S& temperature) const;
  template <Scalar S>
  void complete_entropy(GasState<S>& state, const S* mass) const;
  template <Scalar S>
  S total(const S* mass) const;
  /// phi_ij of Wilke's equation 14 and its slope by temperature.
  Slope wilke_factor(int i, int j, const Slope& viscosity_i, const Slope& viscosity_j) const;
  std::size_t pair(int i, int j) const { return static_cast<std::size_t>(i * count() + j); }

  std::vector<Species> species_;
  bool has_transport_ = false;
  std::vector<double> wilke_scale_, wilke_mass_;  // per ordered pair, of the molar masses alone
};

/// cp / cv.
template <Scalar S>
S heat_capacity_ratio(const GasState<S>& state) {
  return state.cp / state.cv;
}
/// Prandtl number: viscosity * cp / conductivity.
template <Scalar S>
S prandtl(const GasState<S>& state, const GasTransport<S>& transport) {
  return transport.viscosity * state.cp / transport.conductivity;
}

}  // namespace gaskettle

#include "gas/mixture_impl.h"
