/// Friction of a sliding seal or guide.
///
/// Magnitude of the force that opposes a motion of speed v >= 0:
///
///     F = F_c + (F_s - F_c) exp(-(v/v_s)^2) + b v
///
/// Coulomb, static and viscous friction with the Stribeck curve, exponent 2.
/// Sources: B. Armstrong-Helouvry, P. Dupont and C. Canudas de Wit, A survey of
/// models, analysis tools and compensation methods for the control of machines
/// with friction, Automatica 30 (1994) 1083; S. Andersson, A. Soderberg and
/// S. Bjorklund, Friction models for sliding dry, boundary and mixed lubricated
/// contacts, Tribology International 40 (2007) 580.
///
/// Sticking is not in this law: at rest friction balances what acts, up to F_s,
/// which is a mode of the moving part.
#pragma once
#include "base/scalar.h"

namespace gaskettle {

struct SlidingFriction {
  double kinetic = 0.0;            ///< F_c, N, >= 0
  double breakaway = 0.0;          ///< F_s, N, >= kinetic
  double viscous = 0.0;            ///< b, N s/m, >= 0
  double stribeck_velocity = 0.0;  ///< v_s, m/s; 0: none, the force drops to F_c at once

  /// F in N at `speed` along the direction of motion, m/s. Smooth through zero, so
  /// that a step slightly past the turning point still sees this direction's curve.
  template <Scalar S>
  S force(const S& speed) const {
    using std::exp;
    if (stribeck_velocity <= 0.0) return kinetic + viscous * speed;
    const S reduced = speed / stribeck_velocity;
    return kinetic + (breakaway - kinetic) * exp(-reduced * reduced) + viscous * speed;
  }

  /// F just after motion starts, N: F_s with a Stribeck curve, else F_c.
  double force_at_start() const { return stribeck_velocity > 0.0 ? breakaway : kinetic; }
};

/// Throws std::invalid_argument, naming the value, unless 0 <= kinetic <= breakaway,
/// viscous >= 0 and stribeck_velocity >= 0, all finite.
void check_friction(const SlidingFriction& friction);

}  // namespace gaskettle
