/// The rates of pistons (see piston.h).
#pragma once
#include "parts/piston.h"

namespace gaskettle {

/// Books the work done by the gas at velocity v, term by term, and where friction heat goes.
template <class S>
void Piston::book_work(Workspace<S>& w, const S& v, const S& friction_force) const {
  w.book(lifting_entry_, weight(w) * v);
  if (stiffness_ > 0.0) w.book(spring_entry_, spring_force(w) * v);
  if (atmosphere_entry_ >= 0) w.book(atmosphere_entry_, back_pressure(w) * back_area_ * v);
  if (back_entry_ >= 0) w.book(back_entry_, back_pressure(w) * back_area_ * v);
  w.book(applied_entry_, w.input[force_input_] * v);
  const S heat = friction_force * v;
  w.book(friction_entry_, heat);
  if (heat_store_ >= 0) {
    w.power[heat_store_] = w.power[heat_store_] + heat;
    w.book(returned_entry_, heat);
    w.generate(Mechanism::friction, heat / w.temperature[heat_store_]);
  } else {
    w.generate(Mechanism::friction, heat / w.ambient_temperature);
    w.carry_entropy(-heat / w.ambient_temperature);
  }
}

/// Inertial and driven pistons: the velocity is a state or an input.
template <class S>
void Piston::move_known(Workspace<S>& w) const {
  const S v = w.out[channel_ + 1];
  const S pressure = w.gas[space_].pressure;
  w.power[space_store_] = w.power[space_store_] - pressure * area_ * v;
  if (back_space_ >= 0) w.power[back_store_] = w.power[back_store_] + back_pressure(w) * back_area_ * v;
  if (motion_ == Motion::driven) {
    if (driven_by_flow_) w.f[position_state_] = v;
    // The drive overcomes friction and supplies what the other forces lack.
    const S friction = value(v) == 0.0 ? S(0.0 * v) : S((value(v) > 0 ? 1.0 : -1.0) * friction_.force(absolute(v)));
    book_work(w, v, friction);
    w.book(applied_entry_, (net_force(w) - friction) * v);
    return;
  }
  w.f[position_state_] = v;
  if (!moving()) return;
  const double sign = direction();
  // Sliding friction as a function of speed in the sense of the motion; with viscous friction alone there is no sense.
  const S friction = sign == 0.0 ? S(friction_.viscous * v) : S(sign * friction_.force(S(sign * v)));
  const S net = net_force(w) - friction;
  const S& mass = w.input[mass_input_];
  const S arriving = positive_part(w.slope_of_input(mass_input_));
  w.f[velocity_state_] = (net - arriving * v) / mass;
  book_work(w, v, friction);
  const S impact = 0.5 * arriving * v * v;
  w.book(kinetic_entry_, net * v - impact);
  if (!mass_ramps_) return;
  w.book(impact_entry_, impact);
  w.generate(Mechanism::impact, impact / w.ambient_temperature);
  w.carry_entropy(-impact / w.ambient_temperature);
}

/// Balanced with viscous friction: b v = net - kinetic.
template <class S>
void Piston::move_viscous(Workspace<S>& w) const {
  if (!moving()) return;
  const S net = net_force(w);
  const S v = (net - direction() * friction_.kinetic) / friction_.viscous;
  w.out[channel_ + 1] = v;
  w.f[position_state_] = v;
  w.volume_rate[space_] = w.volume_rate[space_] + area_ * v;
  w.power[space_store_] = w.power[space_store_] - w.gas[space_].pressure * area_ * v;
  if (back_space_ >= 0) {
    w.volume_rate[back_space_] = w.volume_rate[back_space_] - back_area_ * v;
    w.power[back_store_] = w.power[back_store_] + back_pressure(w) * back_area_ * v;
  }
  book_work(w, v, net);  // at no acceleration friction takes the whole net force
}

/// Balanced pistons: with F the opposing force, friction included, and dU = -F dx,
///   A dp/dt - A_b dp_b/dt = dF/dt + k dx/dt
/// where each dp/dt has a part from everything else (heat, flows, other pistons) and a
/// part from every balanced piston that touches the space. A small linear system.
template <class S>
void Piston::move_balanced(std::span<const Piston> pistons, Workspace<S>& w) {
  const std::size_t n = pistons.size();
  S* const matrix = w.scratch.data();
  S* const right = matrix + n * n;
  const GasMixture& mixture = w.layout->mixture;
  const auto slopes = [&](int space) {
    return mixture.pressure_slopes(w.gas[space], w.space_mass(space), w.volume[space]);
  };
  // dp/dt of a space from everything but balanced pistons.
  const auto drift = [&](int space, const PressureSlopes<S>& slope) {
    S rate = slope.by_energy * w.power[w.layout->spaces[space].store] + slope.by_volume * w.volume_rate[space];
    for (int k = 0; k < w.species_count; ++k) rate = rate + slope.by_mass[k] * w.mass_rate[space * w.species_count + k];
    return rate;
  };
  // What a unit velocity of piston j does to the energy of a space it touches, and the volume it adds there.
  const auto energy_per_travel = [&](const Piston& p, int space) {
    if (p.space_ == space) {
      const double friction = p.direction() * p.friction_.kinetic;
      const double kept = p.heat_store_ == p.space_store_ ? 0.0 : friction;
      return S(-(p.opposing_force(w) + kept));
    }
    return S(p.back_pressure(w) * p.back_area_);
  };
  const auto volume_per_travel = [](const Piston& p, int space) { return p.space_ == space ? p.area_ : -p.back_area_; };

  for (std::size_t i = 0; i < n; ++i) {
    const Piston& p = pistons[i];
    for (std::size_t j = 0; j < n; ++j) matrix[i * n + j] = S(i == j ? 1.0 : 0.0);
    right[i] = S(0.0);
    if (!p.follows_balance()) continue;
    S push = -1.0 * (w.slope_of_input(p.mass_input_) * p.gravity_ + w.slope_of_input(p.force_input_));
    if (p.back_input_ >= 0) push = push - w.slope_of_input(p.back_input_) * p.back_area_;
    matrix[i * n + i] = S(p.stiffness_);
    for (const int space : {p.space_, p.back_space_}) {
      if (space < 0) continue;
      const PressureSlopes<S> slope = slopes(space);
      const double area = volume_per_travel(p, space);
      push = push + area * drift(space, slope);
      for (std::size_t j = 0; j < n; ++j) {
        const Piston& q = pistons[j];
        if (!q.follows_balance() || (q.space_ != space && q.back_space_ != space)) continue;
        matrix[i * n + j] = matrix[i * n + j] - area * (slope.by_energy * energy_per_travel(q, space) +
                                                        slope.by_volume * volume_per_travel(q, space));
      }
    }
    right[i] = push;
  }
  // Gaussian elimination without pivoting: the matrix is a stiffness, positive on its diagonal.
  for (std::size_t k = 0; k < n; ++k)
    for (std::size_t i = k + 1; i < n; ++i) {
      if (!pistons[i].follows_balance() || !pistons[k].follows_balance()) continue;
      const S factor = matrix[i * n + k] / matrix[k * n + k];
      for (std::size_t j = k; j < n; ++j) matrix[i * n + j] = matrix[i * n + j] - factor * matrix[k * n + j];
      right[i] = right[i] - factor * right[k];
    }
  for (std::size_t i = n; i-- > 0;) {
    for (std::size_t j = i + 1; j < n; ++j)
      if (pistons[i].follows_balance() && pistons[j].follows_balance())
        right[i] = right[i] - matrix[i * n + j] * right[j];
    right[i] = right[i] / matrix[i * n + i];
  }
  for (std::size_t i = 0; i < n; ++i) {
    const Piston& p = pistons[i];
    if (!p.follows_balance()) continue;
    const S v = right[i];
    const double friction = p.direction() * p.friction_.kinetic;
    w.out[p.channel_ + 1] = v;
    w.f[p.position_state_] = v;
    w.power[p.space_store_] = w.power[p.space_store_] - (p.opposing_force(w) + friction) * v;
    if (p.back_space_ >= 0) w.power[p.back_store_] = w.power[p.back_store_] + p.back_pressure(w) * p.back_area_ * v;
    p.book_work(w, v, S(friction));
  }
}

template <class S>
void Piston::move_all(std::span<const Piston> pistons, Workspace<S>& w) {
  bool any_balanced = false;
  for (const Piston& p : pistons) {
    if (p.motion_ != Motion::balanced)
      p.move_known(w);
    else if (p.friction_.viscous > 0.0)
      p.move_viscous(w);
    else
      any_balanced = any_balanced || p.follows_balance();
  }
  if (any_balanced) move_balanced(pistons, w);
}

}  // namespace gaskettle
