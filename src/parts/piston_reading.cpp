/// What a model says of a piston, checked as far as the piston alone can tell.
#include <fmt/format.h>

#include <cmath>
#include <numbers>

#include "parts/piston.h"

namespace gaskettle {

void Piston::read_friction(Section& s) {
  auto f = s.child("friction", "none where left out");
  if (!f) return;
  friction_.kinetic =
      f->quantity("kinetic", unit_kinds::force, "Coulomb friction while it slides", Range::not_negative, "0 N");
  const auto breakaway = f->optional_quantity("breakaway", unit_kinds::force, "force that starts it (that of kinetic)",
                                              Range::not_negative);
  friction_.breakaway = breakaway ? breakaway->si : friction_.kinetic;
  friction_.viscous =
      f->quantity("viscous", unit_kinds::viscous_coefficient, "force per velocity", Range::not_negative, "0 N s/m");
  if (const auto v = f->optional_quantity("stribeck_velocity", unit_kinds::velocity,
                                          "over which breakaway falls to kinetic", Range::positive))
    friction_.stribeck_velocity = *v;
  heat_to_ = f->choice("heat_to", {"gas", "wall", "surroundings"},
                       "who gets the friction heat (wall, or surroundings where there is none)", "");
  if (s.describing()) return;
  heat_to_place_ = f->place_of("heat_to");
  if (friction_.breakaway < friction_.kinetic)
    f->error("breakaway", fmt::format("'{}': breakaway must not be below kinetic friction", f->path()));
  if (friction_.stribeck_velocity > 0.0 && motion_ == Motion::balanced)
    f->error(
        "stribeck_velocity",
        fmt::format("'{}': a balanced piston has no velocity of its own to speak of; use motion: inertial", f->path()));
}

void Piston::read_back(Section& s) {
  auto back = s.child("back", "what stands behind it (the atmosphere)");
  back_area_ = area_;
  if (!back) return;
  back->at_most_one_of({"pressure", "space"});
  back_spec_ = back->signal("pressure", unit_kinds::pressure, "a stated pressure", Range::not_negative);
  back_reference_ = back->reference("space", "gas space", "a second gas space", false);
  if (const auto a =
          back->optional_quantity("area", unit_kinds::area, "on which it acts: the rod side", Range::positive))
    back_area_ = *a;
}

void Piston::read(Section& s) {
  closes_ = s.reference("closes", "gas space", "the space whose volume grows with x", true);
  s.exactly_one_of({"bore", "area"});
  area_ = 1.0;
  if (const auto bore = s.optional_quantity("bore", unit_kinds::length, "of the cylinder", Range::positive))
    area_ = std::numbers::pi / 4.0 * bore->si * bore->si;
  if (const auto area = s.optional_quantity("area", unit_kinds::area, "of the piston", Range::positive)) area_ = *area;
  const Value at = s.quantity("at", unit_kinds::length, "position x at the start", Range::any);
  at_ = at;
  length_unit_ = at.unit;
  const std::string motion =
      s.choice("motion", {"balanced", "inertial", "driven"}, "quasi-static, with inertia, or given", "balanced");
  motion_ = motion == "inertial" ? Motion::inertial : (motion == "driven" ? Motion::driven : Motion::balanced);
  mass_spec_ = s.signal("mass", unit_kinds::mass, "of the piston and the loads that stand on it", Range::not_negative);
  if (const auto v =
          s.optional_quantity("velocity", unit_kinds::velocity, "at the start, of an inertial piston", Range::any))
    start_velocity_ = *v;
  position_spec_ = s.signal("position", unit_kinds::length, "of a driven piston", Range::any);
  flow_spec_ = s.signal("flow", unit_kinds::liquid_flow,
                        "of the liquid behind a driven piston; positive pushes toward smaller x", Range::any);
  if (const Node* stops = s.raw("stops", "[low, high], two lengths", "positions it cannot pass", false)) {
    stops_place_ = stops->place;
    if (!stops->is_list() || stops->items.size() != 2) {
      s.error("stops", fmt::format("'{}.stops' should be [low, high]", s.path()));
    } else {
      const auto low = read_value(s.context(), stops->items[0], s.path() + ".stops", unit_kinds::length, Range::any);
      const auto high = read_value(s.context(), stops->items[1], s.path() + ".stops", unit_kinds::length, Range::any);
      if (low && high) {
        low_ = *low;
        high_ = *high;
        has_stops_ = true;
        if (low_ >= high_)
          s.error("stops", fmt::format("'{}.stops' must rise", s.path()));
        else if (at.given && (at_ < low_ || at_ > high_))
          s.error("at", fmt::format("'{}.at' lies outside its stops", s.path()));
      }
    }
  }
  restitution_ = s.quantity("restitution", unit_kinds::number, "speed after hitting a stop over speed before",
                            Range::fraction, "0");
  tilt_ = s.quantity("tilt", unit_kinds::angle, "from upright; upright: the gas below carries the weight", Range::any,
                     "0 deg");
  if (auto spring = s.child("spring", "pushes toward the position where it is free")) {
    stiffness_ = spring->quantity("stiffness", unit_kinds::stiffness, "force per length", Range::positive);
    free_at_ = spring->quantity("free_at", unit_kinds::length, "position where it exerts no force", Range::any);
  }
  read_friction(s);
  force_spec_ = s.signal("force", unit_kinds::force, "pushes toward smaller x", Range::any);
  read_back(s);
  if (!s.describing()) check(s);
}

void Piston::check(Section& s) {
  const bool driven = motion_ == Motion::driven;
  driven_by_flow_ = flow_spec_.given;
  if (driven && s.has("position") == s.has("flow"))
    s.error_here(fmt::format("'{}' is driven: it needs 'position' or 'flow', one of them", s.path()));
  if (!driven)
    for (const char* key : {"position", "flow"})
      if (s.has(key)) s.error(key, fmt::format("'{}': '{}' goes with motion: driven", s.path(), key));
  if (motion_ != Motion::inertial && s.has("velocity"))
    s.error("velocity", fmt::format("'{}': 'velocity' goes with motion: inertial", s.path()));
  if (motion_ == Motion::inertial && mass_spec_.sound) {
    const double least = mass_spec_.given ? mass_spec_.make(mass_spec_.level).range().first : 0.0;
    if (!(least > 0.0)) s.error("mass", fmt::format("'{}' is inertial: its mass must always be above zero", s.path()));
  }
  if (driven && position_spec_.given && position_spec_.sound) {
    const Signal path = position_spec_.make(at_);
    if (s.has("at") && std::abs(path.at(0.0) - at_) > 1e-9 * std::max(1.0, std::abs(at_)))
      s.error("position",
              fmt::format("'{}.position' starts at {:.6g} m, but 'at' is {:.6g} m", s.path(), path.at(0.0), at_));
    const auto [low, high] = path.range();
    if (has_stops_ && (low < low_ - 1e-12 || high > high_ + 1e-12))
      s.error("position", fmt::format("'{}.position' goes beyond the stops", s.path()));
  }
}

double Piston::balance_pressure(const Layout& layout, double back_pressure) const {
  const double g = layout.gravity * std::cos(tilt_);
  const double opposing = back_pressure * back_area_ + mass_spec_.initial(0.0) * g + stiffness_ * (at_ - free_at_) +
                          force_spec_.initial(0.0);
  return opposing / area_;
}

void Piston::declare(Layout& layout) {
  SpaceInfo* space = layout.space(closes_);
  SpaceInfo* back = layout.space(back_reference_);
  // With a mistake in it, or in what it touches, its balance would only echo that.
  const bool sound = layout.sound(name) && (space == nullptr || layout.sound(space->name)) &&
                     (back == nullptr || layout.sound(back->name));
  if (motion_ == Motion::balanced && (space == nullptr || !sound)) layout.loose_piston = true;
  if (space == nullptr) return;
  space->closed_by_piston = true;
  if (back != nullptr) {
    back->closed_by_piston = true;
    if (back == space)
      layout.error(back_reference_.place, fmt::format("piston '{}' has '{}' on both sides", name, space->name));
  }
  for (const SpaceInfo* s : {static_cast<const SpaceInfo*>(space), static_cast<const SpaceInfo*>(back)})
    if (s != nullptr && s->count != 1.0)
      layout.error(
          place, fmt::format("piston '{}' closes '{}', which has a count; state the spaces one by one", name, s->name));
  if (has_stops_ && sound) {
    const double least = space->volume + area_ * (low_ - at_);
    if (least <= 0.0)
      layout.error(stops_place_, fmt::format("piston '{}': at its low stop '{}' would have no volume ({:.4g} m3)", name,
                                             space->name, least));
    if (back != nullptr && back->volume - back_area_ * (high_ - at_) <= 0.0)
      layout.error(stops_place_,
                   fmt::format("piston '{}': at its high stop '{}' would have no volume", name, back->name));
  }
  if (motion_ != Motion::balanced || friction_.viscous > 0.0 || !sound) return;
  if (back != nullptr && !back->pressure) return;
  const double behind = back != nullptr ? *back->pressure
                                        : (back_spec_.given ? back_spec_.initial(layout.atmosphere_pressure)
                                                            : layout.atmosphere_pressure);
  const double right = balance_pressure(layout, behind);
  if (!(right > 0.0)) {
    layout.error(place,
                 fmt::format("piston '{}': its balance needs a pressure of {:.6g} Pa in '{}', which is not above zero",
                             name, right, space->name));
    layout.loose_piston = true;
    return;
  }
  if (!space->pressure && !space->given_mass) {
    space->pressure = right;
    return;
  }
  if (!space->pressure) return;
  const double net = (*space->pressure - right) * area_;
  const double held = friction_.breakaway;
  const bool on_low = has_stops_ && at_ <= low_ * (1 + 1e-12) + 1e-15 && net < held;
  const bool on_high = has_stops_ && at_ >= high_ * (1 - 1e-12) - 1e-15 && net > -held;
  if (on_low || on_high || (held > 0.0 && std::abs(net) <= held)) return;
  if (std::abs(*space->pressure - right) > 1e-3 * right) {
    layout.error(space->pressure_place,
                 fmt::format("gas space '{}': the balanced piston '{}' needs {:.6g} Pa abs ({:.6g} Pa gauge) at the "
                             "start; leave 'pressure' out, or use motion: inertial",
                             space->name, name, right, right - layout.atmosphere_pressure));
    return;
  }
  if (*space->pressure != right)
    layout.advice.push_back(
        fmt::format("{}: starts at {:.7g} Pa abs, the balance of piston {}, instead of the {:.7g} Pa stated",
                    space->name, right, name, *space->pressure));
  space->pressure = right;
}

}  // namespace gaskettle
