/// Bodies of the templates in films.h; include that one.
#pragma once
#include "laws/films.h"

namespace gaskettle::film_detail {

inline constexpr double soft_difference = 0.01;  // K, see films.h
inline constexpr double soft_orientation = 0.1;  // K
inline constexpr double conduction_exponent = 6.0;
// Nu on the distance across, for late conduction to walls: squares of the first zeros over the ratio of shapes.
inline constexpr double sphere_conduction = 6.5797;    // 2 pi^2 / 3
inline constexpr double cylinder_conduction = 5.7832;  // 2.4048^2
inline constexpr double flat_conduction = 4.9348;      // pi^2 / 2

template <Scalar S>
struct FilmNumbers {
  S difference;       // wall minus gas, K
  S prandtl;          //
  S rayleigh_per_m3;  // Ra / L^3
};

template <Scalar S>
FilmNumbers<S> film_numbers(const FilmFluid<S>& fluid, const S& wall_temperature, const S& gas_temperature,
                            double gravity) {
  using std::sqrt;
  const S difference = wall_temperature - gas_temperature;
  const S size = sqrt(S(difference * difference + soft_difference * soft_difference));
  const S per_m3 =
      gravity * fluid.expansion * size * square(fluid.density) * fluid.cp / (fluid.viscosity * fluid.conductivity);
  return {difference, fluid.viscosity * fluid.cp / fluid.conductivity, per_m3};
}

/// Nu of a horizontal face; `unstable_sign` is +1 where a hot wall drives the gas away (gas above it).
template <Scalar S>
S horizontal_face(const S& ra, const S& difference, double unstable_sign) {
  using std::tanh;
  const S unstable_share = 0.5 + 0.5 * tanh(S(difference * (unstable_sign / soft_orientation)));
  return unstable_share * nusselt_unstable_plate(ra) + (1.0 - unstable_share) * nusselt_stable_plate(ra);
}

template <Scalar S>
S natural_nusselt(FilmGeometry geometry, const S& ra, const FilmNumbers<S>& numbers) {
  switch (geometry) {
    case FilmGeometry::gas_above:
      return horizontal_face(ra, numbers.difference, 1.0);
    case FilmGeometry::gas_below:
      return horizontal_face(ra, numbers.difference, -1.0);
    case FilmGeometry::level_cylinder:
      return nusselt_level_cylinder(ra, numbers.prandtl);
    case FilmGeometry::sphere:
      return nusselt_sphere(ra, numbers.prandtl);
    case FilmGeometry::vertical_plate:
    case FilmGeometry::upright_cylinder:
      break;
  }
  return nusselt_vertical_plate(ra, numbers.prandtl);
}

inline double conduction_nusselt(FilmGeometry geometry) {
  switch (geometry) {
    case FilmGeometry::upright_cylinder:
    case FilmGeometry::level_cylinder:
      return cylinder_conduction;
    case FilmGeometry::sphere:
      return sphere_conduction;
    default:
      return flat_conduction;
  }
}

/// Length the wind passes along: the diameter of an upright cylinder where it is known.
template <class L>
L stream_length(const FilmSurface<L>& face) {
  return face.geometry == FilmGeometry::upright_cylinder && value(face.across) > 0 ? face.across : face.length;
}

template <Scalar S>
S forced_nusselt(FilmGeometry geometry, const S& re, const S& pr) {
  switch (geometry) {
    case FilmGeometry::upright_cylinder:
    case FilmGeometry::level_cylinder:
      return nusselt_cross_flow(re, pr);
    case FilmGeometry::sphere:
      return nusselt_sphere_in_stream(re, pr);
    default:
      return nusselt_plate_in_stream(re, pr);
  }
}

template <Scalar S, class L>
S rayleigh(const FilmSurface<L>& face, const FilmNumbers<S>& numbers) {
  return numbers.rayleigh_per_m3 * cube(face.length);
}

template <Scalar S, class L>
S outside_natural(const FilmSurface<L>& face, const FilmFluid<S>& fluid, const FilmNumbers<S>& numbers) {
  const S ra = rayleigh(face, numbers);
  S nu = natural_nusselt(face.geometry, ra, numbers);
  if (face.geometry == FilmGeometry::upright_cylinder && value(face.across) > 0)
    nu = nu * slender_cylinder_factor(S(ra / numbers.prandtl), numbers.prandtl, S(face.length / S(face.across)));
  return nu * fluid.conductivity / face.length;
}

template <Scalar S, class L>
S inside_natural(const FilmSurface<L>& face, const FilmFluid<S>& fluid, const FilmNumbers<S>& numbers) {
  return natural_nusselt(face.geometry, rayleigh(face, numbers), numbers) * fluid.conductivity / face.length;
}

template <Scalar S, class L>
S inside_conduction(const FilmSurface<L>& face, const FilmFluid<S>& fluid) {
  return conduction_nusselt(face.geometry) * fluid.conductivity / face.across;
}

template <Scalar S, class L>
S inside_face(const FilmSurface<L>& face, const FilmFluid<S>& fluid, const FilmNumbers<S>& numbers) {
  const S natural = inside_natural(face, fluid, numbers);
  if (!(value(face.across) > 0)) return natural;
  return join(natural, inside_conduction(face, fluid), conduction_exponent);
}

template <Scalar S, class L>
S wind_forced(const FilmSurface<L>& face, const FilmFluid<S>& fluid, const S& speed, const S& prandtl) {
  const L along = stream_length(face);
  const S reynolds = fluid.density * speed * along / fluid.viscosity;
  return forced_nusselt(face.geometry, reynolds, prandtl) * fluid.conductivity / along;
}

template <Scalar S>
S stirred_cubed(const FilmFluid<S>& fluid, const Stirring<S>& stirring, const S& prandtl) {
  const double diameter = stirring.impeller_diameter;
  const S reynolds = fluid.density * stirring.speed * (diameter * diameter) / fluid.viscosity;
  return nusselt_stirred_cubed(reynolds, prandtl, stirring.coefficient) *
         cube(S(fluid.conductivity / stirring.vessel_diameter));
}

/// Mean by area of film(face).
template <Scalar S, class Faces, class Film>
S mean_over(const Faces& faces, Film&& film) {
  S heat(0.0), area(0.0);
  for (const auto& face : faces) {
    heat += film(face) * face.area;
    area += face.area;
  }
  return heat / area;
}

}  // namespace gaskettle::film_detail

namespace gaskettle {

template <Scalar S, class Faces>
S still_air_film(const Faces& faces, const FilmFluid<S>& fluid, const S& wall_temperature, const S& gas_temperature,
                 double gravity) {
  const auto numbers = film_detail::film_numbers(fluid, wall_temperature, gas_temperature, gravity);
  return film_detail::mean_over<S>(
      faces, [&](const auto& face) { return film_detail::outside_natural(face, fluid, numbers); });
}

template <Scalar S, class Faces>
S wind_film(const Faces& faces, const FilmFluid<S>& fluid, const S& speed, const S& wall_temperature,
            const S& gas_temperature, double gravity) {
  const auto numbers = film_detail::film_numbers(fluid, wall_temperature, gas_temperature, gravity);
  return film_detail::mean_over<S>(faces, [&](const auto& face) {
    return nusselt_mixed(film_detail::wind_forced(face, fluid, speed, numbers.prandtl),
                         film_detail::outside_natural(face, fluid, numbers));
  });
}

template <Scalar S, class Faces>
S enclosed_film(const Faces& faces, const FilmFluid<S>& fluid, const S& wall_temperature, const S& gas_temperature,
                double gravity) {
  const auto numbers = film_detail::film_numbers(fluid, wall_temperature, gas_temperature, gravity);
  return film_detail::mean_over<S>(faces,
                                   [&](const auto& face) { return film_detail::inside_face(face, fluid, numbers); });
}

template <Scalar S, class Faces>
S stirred_film(const Faces& faces, const FilmFluid<S>& fluid, const Stirring<S>& stirring, const S& wall_temperature,
               const S& gas_temperature, double gravity) {
  using std::pow;
  const S floor = enclosed_film(faces, fluid, wall_temperature, gas_temperature, gravity);
  const S prandtl = fluid.viscosity * fluid.cp / fluid.conductivity;
  const double nothing = 1e-18;  // 1e-6 W/(m2 K), cubed: a finite slope where there is neither gravity nor stirring
  return pow(S(film_detail::stirred_cubed(fluid, stirring, prandtl) + cube(floor) + nothing), 1.0 / 3.0);
}

}  // namespace gaskettle
