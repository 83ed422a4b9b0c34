#include "model/film_use.h"

#include <fmt/format.h>
#include <fmt/ranges.h>

#include <cmath>

namespace gaskettle {

void FilmUse::read(Section& s, bool inside) {
  inside_ = inside;
  std::vector<std::string> names = {"none"};
  for (const FilmEntry& e : film_catalogue())
    if (inside ? e.inside : e.outside) names.emplace_back(e.name);
  const std::string type = fmt::format("film coefficient, or one of {}", fmt::join(names, ", "));
  const Node* node = s.raw("film", type, "between the gas and the face", true);
  if (node == nullptr) return;
  place_ = node->place;
  if (node->is_scalar()) {
    name_ = node->text;
    if (name_ == "none") return;
    if (const FilmEntry* entry = find_film(name_)) {
      if (!(inside ? entry->inside : entry->outside)) {
        s.error("film", fmt::format("the film '{}' is for {} faces; here it may be a value or {}", name_,
                                    inside ? "outer" : "inner", fmt::join(names, ", ")));
        return;
      }
      switch (entry->kind) {
        case FilmKind::still_air:
          kind_ = Kind::still_air;
          break;
        case FilmKind::wind:
          kind_ = Kind::wind;
          break;
        case FilmKind::enclosed:
          kind_ = Kind::enclosed;
          break;
        case FilmKind::stirred:
          kind_ = Kind::stirred;
          break;
      }
      return;
    }
    const bool word = !name_.empty() && std::isalpha(static_cast<unsigned char>(name_[0])) != 0;
    if (word) {
      const std::string near = nearest_name(name_, names);
      s.error("film", fmt::format("there is no film '{}'; it may be a value such as '20 W/m2/K' or {}{}", name_,
                                  fmt::join(names, ", "), near.empty() ? "" : " (did you mean '" + near + "'?)"));
      return;
    }
  }
  if (const auto v =
          read_value(s.context(), *node, s.path() + ".film", unit_kinds::film_coefficient, Range::not_negative)) {
    kind_ = Kind::given;
    given_ = *v;
  }
}

void FilmUse::connect(Layout& layout, const SpaceInfo& space, double area, double wall_thickness,
                      const Place& wall_place) {
  const Place& place = place_.file ? place_ : wall_place;
  if (kind_ == Kind::given || kind_ == Kind::none) return;
  const bool transport = inside_ ? layout.mixture.has_transport() : layout.outside_air.has_transport();
  if (!transport)
    layout.error(place,
                 "a film by correlation needs viscosity and conductivity of every gas; state them in `gases`, or give "
                 "the film a value");
  const Shape& shape = space.shape;
  const double outward = inside_ ? 0.0 : 2.0 * wall_thickness;
  const double bore = shape.bore + outward;
  // Faces of one vessel: `area` only weighs them against each other.
  switch (shape.kind) {
    case Shape::Kind::sphere:
      faces_ = {{FilmGeometry::sphere, bore, area, inside_ ? bore : 0.0}};
      break;
    case Shape::Kind::cylinder: {
      const double height = shape.length + outward, end = shape.end_area();
      if (shape.upright)
        faces_ = {{FilmGeometry::upright_cylinder, height, shape.side_area(), bore},
                  {FilmGeometry::gas_above, bore / 4.0, end, inside_ ? height : 0.0},
                  {FilmGeometry::gas_below, bore / 4.0, end, inside_ ? height : 0.0}};
      else
        faces_ = {{FilmGeometry::level_cylinder, bore, shape.side_area(), inside_ ? bore : 0.0},
                  {FilmGeometry::vertical_plate, bore, 2.0 * end, inside_ ? height : 0.0}};
      break;
    }
    case Shape::Kind::unknown: {
      const double length = std::cbrt(space.volume / space.count);
      faces_ = {{FilmGeometry::vertical_plate, length, area, inside_ ? length : 0.0}};
      break;
    }
  }
  if (kind_ != Kind::stirred) return;
  vessel_diameter_ = shape.kind == Shape::Kind::unknown ? std::cbrt(space.volume / space.count) : shape.bore;
  for (const ImpellerInfo& impeller : layout.impellers)
    if (impeller.space == space.index) {
      impeller_diameter_ = impeller.diameter;
      speed_input_ = impeller.speed_input;
    }
  // A stirrer with a mistake may be the one.
  if (speed_input_ < 0 && !layout.any_unsound("stirrer"))
    layout.error(place, fmt::format("the film 'stirred' needs a stirrer with 'diameter' and 'speed' in '{}'; use "
                                    "'enclosed', or give the film a value",
                                    space.name));
}

}  // namespace gaskettle
