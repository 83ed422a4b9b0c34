#include "gas/mixture.h"

#include <algorithm>
#include <limits>
#include <stdexcept>

namespace gaskettle {

namespace {

std::string amount(int n) { return n == 0 ? "no gas" : std::to_string(n) + " gases"; }

}  // namespace

GasMixture::GasMixture(std::vector<Species> species) : species_(std::move(species)) {
  if (species_.empty() || species_.size() > static_cast<std::size_t>(max_species))
    throw std::invalid_argument("a plant has between 1 and " + std::to_string(max_species) + " gases; this one has " +
                                amount(count()));
  for (std::size_t i = 0; i < species_.size(); ++i)
    for (std::size_t j = 0; j < i; ++j)
      if (species_[i].name == species_[j].name)
        throw std::invalid_argument("the gas " + species_[i].name + " stands twice in one plant; name it once");
  has_transport_ = std::all_of(species_.begin(), species_.end(),
                               [](const Species& s) { return s.viscosity_curve && s.conductivity_curve; });
  for (const Species& a : species_)
    for (const Species& b : species_) {
      wilke_scale_.push_back(1.0 / std::sqrt(8.0 * (1.0 + a.molar_mass / b.molar_mass)));
      wilke_mass_.push_back(std::sqrt(std::sqrt(b.molar_mass / a.molar_mass)));
    }
}

std::optional<int> GasMixture::index_of(std::string_view name) const {
  for (int k = 0; k < count(); ++k)
    if (species(k).name == name) return k;
  return std::nullopt;
}

double GasMixture::molar_mass(const double* mole_fraction) const {
  double sum = 0.0, mass = 0.0;
  for (int k = 0; k < count(); ++k) {
    sum += mole_fraction[k];
    mass += mole_fraction[k] * species(k).molar_mass;
  }
  return mass / sum;
}

std::vector<double> GasMixture::mass_fractions(const double* mole_fraction) const {
  std::vector<double> y(species_.size());
  double sum = 0.0;
  for (int k = 0; k < count(); ++k) sum += y[k] = mole_fraction[k] * species(k).molar_mass;
  for (double& v : y) v /= sum;
  return y;
}

std::vector<double> GasMixture::mole_fractions(const double* mass) const {
  std::vector<double> x(species_.size());
  double sum = 0.0;
  for (int k = 0; k < count(); ++k) sum += x[k] = mass[k] / species(k).molar_mass;
  for (double& v : x) v /= sum;
  return x;
}

double GasMixture::mass_in(double volume, const double* mole_fraction, double temperature, double pressure) const {
  return pressure * volume * molar_mass(mole_fraction) / (molar_gas_constant * temperature);
}

double GasMixture::lowest_temperature(const double* mass) const {
  const double all = total(mass);
  double limit = 0.0;
  for (int k = 0; k < count(); ++k)
    if (mass[k] > 1e-9 * all) limit = std::max(limit, species(k).lowest_temperature());
  return limit;
}

double GasMixture::highest_temperature(const double* mass) const {
  const double all = total(mass);
  double limit = std::numeric_limits<double>::infinity();
  for (int k = 0; k < count(); ++k)
    if (mass[k] > 1e-9 * all) limit = std::min(limit, species(k).highest_temperature());
  return limit;
}

double GasMixture::solve_temperature(const double* mass, double energy, double guess) const {
  constexpr double none = std::numeric_limits<double>::quiet_NaN();
  constexpr double unbounded = std::numeric_limits<double>::infinity();
  double excess = 0.0, capacity = 0.0;  // J above the wanted energy; J/K
  const auto look_at = [&](double t) {
    const double log_t = std::log(t);
    excess = -energy;
    capacity = 0.0;
    for (int k = 0; k < count(); ++k) {
      const ThermalPoint p = species(k).thermal(t, log_t);
      excess += mass[k] * (p.enthalpy - species(k).gas_constant * t);
      capacity += mass[k] * (p.cp - species(k).gas_constant);
    }
  };
  if (!std::isfinite(energy) || !(total(mass) > 0.0) || !std::isfinite(total(mass))) return none;
  look_at(0.0);
  if (!(excess < 0.0) || !(capacity > 0.0)) return none;

  // The bracket only guards: cv varies so little that Newton alone takes 3 to 5 steps.
  double low = 0.0, high = unbounded;
  double t = guess > 0.0 && std::isfinite(guess) ? guess : enthalpy_zero_temperature;
  for (int i = 0; i < 200; ++i) {
    look_at(t);
    const double step = -excess / capacity;
    // Quadratic convergence: after a step of 1e-7 T the error is at rounding.
    if (std::abs(step) <= 1e-7 * t) return t + step;
    (excess > 0.0 ? high : low) = t;
    t += step;
    if (!(t > low && t < high)) t = high == unbounded ? 2.0 * low : 0.5 * (low + high);
  }
  return t;
}

Slope GasMixture::wilke_factor(int i, int j, const Slope& viscosity_i, const Slope& viscosity_j) const {
  const double scale = wilke_scale_[pair(i, j)], by_mass = wilke_mass_[pair(i, j)];
  const double ratio = std::sqrt(viscosity_i.value / viscosity_j.value);
  const double ratio_slope =
      0.5 * ratio * (viscosity_i.by_temperature / viscosity_i.value - viscosity_j.by_temperature / viscosity_j.value);
  const double base = 1.0 + ratio * by_mass;
  return {scale * base * base, 2.0 * scale * base * by_mass * ratio_slope};
}

}  // namespace gaskettle
