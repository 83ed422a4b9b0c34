/// Film coefficients between a gas and the faces of a vessel, inside and outside.
///
/// A vessel is a list of faces. For each the published relation of its shape (laws/nusselt.h) gives a coefficient;
/// the result is their mean by area, in W/(m2 K). Nothing jumps: |dT| is taken as sqrt(dT^2 + (0.01 K)^2)
/// (natural convection changed by less than 2e-5 from 1 K up), and a horizontal face passes between its hot-side-up
/// and hot-side-down relations as (1 + tanh(dT / 0.1 K)) / 2. Values and slopes are finite at equal temperatures and
/// at standstill.
///
/// At fixed temperature density goes with pressure, so natural convection goes with p^(1/2) where laminar and p^(2/3)
/// where turbulent: a coefficient known at 1 bar is several times too low at 100 bar.
#pragma once
#include <span>
#include <string_view>

#include "laws/nusselt.h"

namespace gaskettle {

/// Properties of the gas at the film temperature (mean of wall and gas).
template <Scalar S>
struct FilmFluid {
  S density;       ///< kg/m3
  S viscosity;     ///< Pa s
  S conductivity;  ///< W/(m K)
  S cp;            ///< J/(kg K)
  S expansion;     ///< 1/K; 1/T for an ideal gas
};

/// Shape and position of a face, seen from the gas.
enum class FilmGeometry {
  vertical_plate,  ///< length: height
  gas_above,       ///< horizontal face with the gas above it (floor inside, roof outside); length: area / perimeter
  gas_below,       ///< horizontal face with the gas below it (roof inside, underside outside); length: area / perimeter
  upright_cylinder,  ///< length: height
  level_cylinder,    ///< length: diameter
  sphere             ///< length: diameter
};

/// One face. L is double, or S where the lengths move with a piston.
template <class L = double>
struct FilmSurface {
  FilmGeometry geometry = FilmGeometry::vertical_plate;
  L length{1.0};  ///< m, see FilmGeometry; above 0
  L area{1.0};    ///< m2
  /// m. Inside: distance across the gas from this face to the one opposite (diameter, height), for the conduction
  /// floor. Outside: diameter of an upright cylinder, which the wind blows across and which thickens the film where it
  /// is slender. 0: not known, the term is left out.
  L across{0.0};
};

template <Scalar S>
struct Stirring {
  S speed{0.0};                    ///< rev/s; the sign does not matter
  double impeller_diameter = 0.0;  ///< m
  double vessel_diameter = 0.0;    ///< m
  double coefficient = 0.36;       ///< C, see nusselt_stirred_cubed
};

// `faces` below is any range of FilmSurface (vector, array, span), not empty, with areas that are not all zero.

/// Natural convection in wide still gas around a vessel. T in K, gravity in m/s2.
template <Scalar S, class Faces>
S still_air_film(const Faces& faces, const FilmFluid<S>& fluid, const S& wall_temperature, const S& gas_temperature,
                 double gravity);

/// Wind of a speed (m/s) on the outside, joined with natural convection as (forced^3 + natural^3)^(1/3), face by face.
template <Scalar S, class Faces>
S wind_film(const Faces& faces, const FilmFluid<S>& fluid, const S& speed, const S& wall_temperature,
            const S& gas_temperature, double gravity);

/// Natural convection of quiet gas in a vessel, face by face against the bulk gas temperature (common practice; no
/// standard fixes it). Below it lies what conduction alone carries: Nu on `across` = 2 pi^2/3 in a sphere, 2.4048^2
/// in a cylinder, pi^2/2 between flat faces, the late-time values for gas cooling from its mean temperature
/// (first eigenvalues, H. S. Carslaw and J. C. Jaeger, Conduction of Heat in Solids, 2nd ed. 1959), joined with n = 6
/// (12 % above either where both are equal).
template <Scalar S, class Faces>
S enclosed_film(const Faces& faces, const FilmFluid<S>& fluid, const S& wall_temperature, const S& gas_temperature,
                double gravity);

/// Stirred gas in a vessel, with enclosed_film as the floor: (stirred^3 + enclosed^3)^(1/3). At standstill it is
/// enclosed_film.
template <Scalar S, class Faces>
S stirred_film(const Faces& faces, const FilmFluid<S>& fluid, const Stirring<S>& stirring, const S& wall_temperature,
               const S& gas_temperature, double gravity);

/// The film correlations by the names users write.
enum class FilmKind { still_air, wind, enclosed, stirred };

struct FilmEntry {
  FilmKind kind;
  std::string_view name;
  bool inside, outside;  ///< where it may be used
  std::string_view meaning, range, source;
};
/// All of them, for the reader and for `explain`.
std::span<const FilmEntry> film_catalogue();
/// The entry of a name, or nullptr.
const FilmEntry* find_film(std::string_view name);

/// What carries the heat: "conduction", "laminar natural", "turbulent natural", "mixed" or "forced", judged at the face
/// with the largest share (coefficient times area). Forced: its cube is above 90 % of the sum; natural: below 10 %.
/// `wind_speed` (m/s) is used by `wind`, `stirring` by `stirred`.
std::string_view governing_branch(FilmKind kind, std::span<const FilmSurface<double>> faces,
                                  const FilmFluid<double>& fluid, double wall_temperature, double gas_temperature,
                                  double gravity, double wind_speed = 0.0, const Stirring<double>& stirring = {});

}  // namespace gaskettle

#include "laws/films_impl.h"
