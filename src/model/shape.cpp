#include "model/shape.h"

#include <cmath>
#include <numbers>

namespace gaskettle {

using std::numbers::pi;

double Shape::cross_section() const { return pi / 4.0 * bore * bore; }

double Shape::end_area() const {
  if (kind != Kind::cylinder) return 0.0;
  switch (ends) {
    case Ends::flat:
      return cross_section();
    case Ends::hemispherical:
      return pi / 2.0 * bore * bore;
    case Ends::ellipsoidal:
      break;
  }
  // Half of an oblate spheroid with axes D, D, D/2 (2:1 head): A = pi a^2 (1 + (1 - e^2)/e atanh e), halved,
  // with a = D/2 and e^2 = 3/4; geometry, e.g. Bronstein, Taschenbuch der Mathematik, solids of revolution.
  const double a = bore / 2.0, e = std::sqrt(0.75);
  return pi * a * a * (1.0 + (1.0 - e * e) / e * std::atanh(e));
}

double Shape::side_area() const { return kind == Kind::cylinder ? pi * bore * length : 0.0; }

double Shape::area() const {
  if (kind == Kind::sphere) return pi * bore * bore;
  return side_area() + 2.0 * end_area();
}

double Shape::volume() const {
  if (kind == Kind::sphere) return pi / 6.0 * bore * bore * bore;
  if (kind == Kind::unknown) return 0.0;
  const double cylinder = cross_section() * length;
  switch (ends) {
    case Ends::flat:
      return cylinder;
    case Ends::hemispherical:
      return cylinder + pi / 6.0 * bore * bore * bore;
    case Ends::ellipsoidal:
      return cylinder + pi / 12.0 * bore * bore * bore;
  }
  return cylinder;
}

Shape read_shape(Section& section) {
  Shape shape;
  section.exactly_one_of({"cylinder", "sphere"});
  if (auto cylinder = section.child("cylinder", "a cylinder with two alike ends")) {
    shape.kind = Shape::Kind::cylinder;
    shape.bore = cylinder->quantity("bore", unit_kinds::length, "inner diameter", Range::positive);
    shape.length =
        cylinder->quantity("length", unit_kinds::length,
                           "of the cylindrical part; with a piston, of the gas at the start", Range::positive);
    const std::string ends = cylinder->choice("ends", {"flat", "hemispherical", "ellipsoidal"},
                                              "shape of the two ends (ellipsoidal: 2:1)", "flat");
    shape.ends = ends == "flat" ? Shape::Ends::flat
                                : (ends == "hemispherical" ? Shape::Ends::hemispherical : Shape::Ends::ellipsoidal);
    shape.upright = cylinder->choice("axis", {"upright", "level"}, "direction of the axis", "upright") == "upright";
  }
  if (auto sphere = section.child("sphere", "a sphere")) {
    const double bore = sphere->quantity("bore", unit_kinds::length, "inner diameter", Range::positive);
    if (shape.kind == Shape::Kind::unknown) {
      shape.kind = Shape::Kind::sphere;
      shape.bore = bore;
    }
  }
  return shape;
}

}  // namespace gaskettle
