/// A film coefficient as a wall uses it: given, none, or by a correlation.
#pragma once
#include <numbers>

#include "laws/films.h"
#include "model/workspace.h"

namespace gaskettle {

/// Properties of the gas of a space at the mean of gas and wall temperature.
template <class S>
FilmFluid<S> film_fluid(const Workspace<S>& w, int space, const S& film_temperature) {
  const GasMixture& mixture = w.layout->mixture;
  const S* mass = w.space_mass(space);
  const GasState<S> state = mixture.from_temperature(mass, film_temperature, w.gas[space].pressure);
  const GasTransport<S> transport = mixture.transport(mass, film_temperature);
  return {state.density, transport.viscosity, transport.conductivity, state.cp, 1.0 / film_temperature};
}

/// Properties of the surroundings' gas at a temperature.
template <class S>
FilmFluid<S> outside_fluid(const Workspace<S>& w, const S& film_temperature) {
  const GasMixture& air = w.layout->outside_air;
  S mass[GasMixture::max_species];
  for (int k = 0; k < air.count(); ++k) mass[k] = S(w.layout->outside_air_fractions[k]);
  const GasState<S> state = air.from_temperature(mass, film_temperature, S(w.layout->atmosphere_pressure));
  const GasTransport<S> transport = air.transport(mass, film_temperature);
  return {state.density, transport.viscosity, transport.conductivity, state.cp, 1.0 / film_temperature};
}

class FilmUse {
public:
  /// Reads the `film` key of a face; `inside`: which correlations are allowed.
  void read(Section& s, bool inside);
  /// Takes the lengths from the space's shape (inside) or the wall around it (outside).
  void connect(Layout& layout, const SpaceInfo& space, double area, double wall_thickness, const Place& wall_place);
  bool is_none() const { return kind_ == Kind::none; }
  const std::string& name() const { return name_; }
  /// A typical coefficient, W/m2/K, for choosing the conduction nodes.
  double typical() const {
    return kind_ == Kind::given ? given_ : (kind_ == Kind::none ? 0.0 : (inside_ ? 50.0 : 10.0));
  }

  /// W/m2/K between the gas of a space and a face.
  template <class S>
  S inside_coefficient(const Workspace<S>& w, int space, const S& face) const {
    if (kind_ == Kind::given || kind_ == Kind::none) return S(given_);
    const S& gas = w.gas[space].temperature;
    const FilmFluid<S> fluid = film_fluid(w, space, S(0.5 * (gas + face)));
    const double g = w.layout->gravity;
    if (kind_ == Kind::stirred && speed_input_ >= 0) {
      Stirring<S> stirring;
      stirring.speed = w.input[speed_input_] * (0.5 / std::numbers::pi);
      stirring.impeller_diameter = impeller_diameter_;
      stirring.vessel_diameter = vessel_diameter_;
      return stirred_film(faces_, fluid, stirring, face, gas, g);
    }
    return enclosed_film(faces_, fluid, face, gas, g);
  }

  /// W/m2/K between an outer face and what it sees.
  template <class S>
  S outside_coefficient(const Workspace<S>& w, const S& face, const S& there) const {
    if (kind_ == Kind::given || kind_ == Kind::none) return S(given_);
    const FilmFluid<S> fluid = outside_fluid(w, S(0.5 * (face + there)));
    if (kind_ == Kind::wind) return wind_film(faces_, fluid, w.wind, face, there, w.layout->gravity);
    return still_air_film(faces_, fluid, face, there, w.layout->gravity);
  }

  /// Heat between the gas of a space and a face of the area given.
  template <class S>
  void exchange(Workspace<S>& w, int space, int store, const S& area) const {
    if (kind_ == Kind::none) return;
    const S difference = w.gas[space].temperature - w.temperature[store];
    w.heat(w.layout->spaces[space].store, store, inside_coefficient(w, space, w.temperature[store]) * area * difference,
           Mechanism::film);
  }

private:
  enum class Kind { given, none, still_air, wind, enclosed, stirred };
  Kind kind_ = Kind::none;
  std::string name_;
  Place place_;
  bool inside_ = true;
  double given_ = 0.0;
  std::vector<FilmSurface<double>> faces_;
  int speed_input_ = -1;
  double impeller_diameter_ = 0.0, vessel_diameter_ = 0.0;
};

}  // namespace gaskettle
