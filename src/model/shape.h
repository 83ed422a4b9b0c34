/// The shape of a gas space: volume, wetted faces, lengths for films.
#pragma once
#include <string>
#include <vector>

#include "model/section.h"

namespace gaskettle {

/// A cylinder (upright or level, three kinds of ends), a sphere, or a bare volume.
struct Shape {
  enum class Kind { unknown, cylinder, sphere };
  enum class Ends { flat, hemispherical, ellipsoidal };
  Kind kind = Kind::unknown;
  Ends ends = Ends::flat;
  bool upright = true;
  double bore = 0.0;    ///< m
  double length = 0.0;  ///< m, of the cylindrical part, of the gas at the start

  double volume() const;         ///< m3
  double area() const;           ///< m2, ends included
  double cross_section() const;  ///< m2
  double side_area() const;      ///< m2, without the ends
  double end_area() const;       ///< m2, one end
  /// m2 of side gained per m3 of volume gained at a flat end: 4 / bore; 0 for others.
  double side_area_per_volume() const { return kind == Kind::cylinder ? 4.0 / bore : 0.0; }
};

/// Reads the `shape` map of a gas space.
Shape read_shape(Section& section);

}  // namespace gaskettle
