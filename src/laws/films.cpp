#include "laws/films.h"

#include <algorithm>
#include <array>
#include <cmath>

namespace gaskettle {
namespace {

constexpr std::array<FilmEntry, 4> catalogue{{
    {FilmKind::still_air, "still_air", false, true,
     "natural convection in wide still gas around the vessel, face by face, mean by area",
     "Ra up to 1e12 (upright faces, level cylinders), 1e4 to 1e11 (horizontal faces), up to 1e11 (spheres)",
     "Churchill & Chu 1975 (upright plate; level cylinder), Churchill 1983 (sphere), McAdams 1954 (horizontal faces), "
     "Popiel et al. 2007 (slender upright cylinder)"},
    {FilmKind::wind, "wind", false, true,
     "wind across the vessel joined with natural convection, (forced^3 + natural^3)^(1/3), face by face",
     "Re Pr above 0.2 (cylinder), Re 3.5 to 7.6e4 (sphere), up to 1e7 (flat faces)",
     "Churchill & Bernstein 1977 (cylinder), Whitaker 1972 (sphere), Gnielinski 1975 (flat faces), with those of "
     "still_air"},
    {FilmKind::enclosed, "enclosed", true, false,
     "natural convection of quiet gas in the vessel against its bulk temperature, face by face, never below conduction",
     "as still_air; no standard fixes the whole-vessel film, expect 25 % or worse",
     "Churchill & Chu 1975, Churchill 1983, McAdams 1954; conduction floor: Carslaw & Jaeger 1959, first eigenvalues"},
    {FilmKind::stirred, "stirred", true, false,
     "Nu = C Re^(2/3) Pr^(1/3), C = 0.36 unless given, joined with enclosed: (stirred^3 + enclosed^3)^(1/3)",
     "Re above 400; measured in liquids, for a gas an extrapolation", "Chilton, Drew & Jebens 1944"},
}};

double laminar_limit(FilmGeometry geometry) {
  // Upright plates: Churchill & Chu 1975; the same Ra is customary for level cylinders. Spheres: the relation used is
  // laminar over its whole range.
  switch (geometry) {
    case FilmGeometry::gas_above:
    case FilmGeometry::gas_below:
      return unstable_plate_transition;
    case FilmGeometry::sphere:
      return 1e11;
    default:
      return 1e9;
  }
}

bool stably_layered(FilmGeometry geometry, double wall_minus_gas) {
  return (geometry == FilmGeometry::gas_above && wall_minus_gas < 0) ||
         (geometry == FilmGeometry::gas_below && wall_minus_gas > 0);
}

struct Shares {
  double forced_cubed = 0.0, natural = 0.0, conduction = 0.0;
  double heat(double area) const {
    return std::cbrt(forced_cubed + natural * natural * natural + conduction * conduction * conduction) * area;
  }
};

Shares shares_of(FilmKind kind, const FilmSurface<double>& face, const FilmFluid<double>& fluid,
                 const film_detail::FilmNumbers<double>& numbers, double wind_speed, const Stirring<double>& stirring) {
  Shares shares;
  const bool outside = kind == FilmKind::still_air || kind == FilmKind::wind;
  shares.natural =
      outside ? film_detail::outside_natural(face, fluid, numbers) : film_detail::inside_natural(face, fluid, numbers);
  if (!outside && face.across > 0) shares.conduction = film_detail::inside_conduction(face, fluid);
  if (kind == FilmKind::wind)
    shares.forced_cubed = cube(film_detail::wind_forced(face, fluid, wind_speed, numbers.prandtl));
  if (kind == FilmKind::stirred) shares.forced_cubed = film_detail::stirred_cubed(fluid, stirring, numbers.prandtl);
  return shares;
}

}  // namespace

std::span<const FilmEntry> film_catalogue() { return catalogue; }

const FilmEntry* find_film(std::string_view name) {
  for (const FilmEntry& entry : catalogue)
    if (entry.name == name) return &entry;
  return nullptr;
}

std::string_view governing_branch(FilmKind kind, std::span<const FilmSurface<double>> faces,
                                  const FilmFluid<double>& fluid, double wall_temperature, double gas_temperature,
                                  double gravity, double wind_speed, const Stirring<double>& stirring) {
  const auto numbers = film_detail::film_numbers(fluid, wall_temperature, gas_temperature, gravity);
  const FilmSurface<double>* leading = nullptr;
  Shares shares;
  for (const FilmSurface<double>& face : faces) {
    const Shares of_face = shares_of(kind, face, fluid, numbers, wind_speed, stirring);
    if (leading != nullptr && of_face.heat(face.area) <= shares.heat(leading->area)) continue;
    leading = &face;
    shares = of_face;
  }
  if (leading == nullptr) return "none";
  const double quiet = std::max(shares.natural, shares.conduction);
  const double forced_share = shares.forced_cubed / (shares.forced_cubed + cube(quiet));
  if (forced_share > 0.9) return "forced";
  if (forced_share > 0.1) return "mixed";
  if (shares.conduction > shares.natural) return "conduction";
  const bool turbulent = film_detail::rayleigh(*leading, numbers) > laminar_limit(leading->geometry);
  return turbulent && !stably_layered(leading->geometry, numbers.difference) ? "turbulent natural" : "laminar natural";
}

}  // namespace gaskettle
