#include "laws/friction.h"

#include <stdexcept>
#include <string>

namespace gaskettle {
namespace {

void require_not_negative(double x, const char* what) {
  if (!(x >= 0.0) || !std::isfinite(x))
    throw std::invalid_argument(std::string(what) + " is " + std::to_string(x) + "; it must be 0 or more");
}

}  // namespace

void check_friction(const SlidingFriction& friction) {
  require_not_negative(friction.kinetic, "kinetic friction (N)");
  require_not_negative(friction.breakaway, "breakaway friction (N)");
  require_not_negative(friction.viscous, "viscous friction (N s/m)");
  require_not_negative(friction.stribeck_velocity, "stribeck velocity (m/s)");
  if (friction.breakaway < friction.kinetic)
    throw std::invalid_argument("breakaway friction " + std::to_string(friction.breakaway) +
                                " N is below the kinetic friction " + std::to_string(friction.kinetic) +
                                " N; it must be at least as large");
}

}  // namespace gaskettle
