/// Putting balanced pistons back onto their balance.
///
/// The pistons that can move are shifted until, for each, pressure times area equals
/// the opposing forces. On the way the gas of the space it closes gives
/// (opposing forces) dx: weights, forces and stated pressures are constant, a spring
/// gives its energy difference, a second gas space is worked on at its final pressure.
/// After a step this removes rounding and integration drift; after a sudden change of
/// load it is the jump to the new balance (or the stop) at the new forces, and what the
/// gas loses less than reversibly shows as entropy of the mechanism `sudden`.
#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "parts/piston.h"

namespace gaskettle {

/// Newton iteration on the travel of all balanced pistons together.
class PistonBalance {
public:
  PistonBalance(std::span<Piston> pistons, Event& e, const Workspace<double>& w) : pistons_(pistons), event_(e), w_(w) {
    volume_ = w.volume;
    for (const SpaceInfo& s : e.layout->spaces) departure_.push_back(w.y[e.layout->stores[s.store].state]);
    gas_ = w.gas;
    shift_.assign(pistons.size(), 0.0);
  }

  /// Largest imbalance, as a fraction of pressure times area.
  double worst() const {
    double most = 0.0;
    for (const Piston& p : pistons_)
      if (p.follows_balance()) most = std::max(most, std::abs(residual(p)) / (gas_[p.space_].pressure * p.area_));
    return most;
  }

  bool solve() {
    for (int pass = 0; pass < 200; ++pass) {
      double largest = 0.0;
      // One piston after the other, each seeing what the last one did: pistons that share gas then converge.
      for (std::size_t i = 0; i < pistons_.size(); ++i) {
        const Piston& p = pistons_[i];
        if (!p.follows_balance()) continue;
        const double column = volume_[p.space_] / p.area_;
        double step = std::clamp(residual(p) / stiffness(p), -0.3 * column, 0.3 * column);
        if (p.back_space_ >= 0) step = std::min(step, 0.3 * volume_[p.back_space_] / p.back_area_);
        if (step != 0.0) apply(i, step);
        largest = std::max(largest, std::abs(step) / column);
      }
      if (largest < 4e-16 || (pass > 3 && largest < 1e-14)) return true;
    }
    return false;
  }

  /// Holds a piston at a stop it would pass; true where one was held.
  bool hold_at_stops() {
    bool held = false;
    for (std::size_t i = 0; i < pistons_.size(); ++i) {
      Piston& p = pistons_[i];
      if (!p.follows_balance() || !p.has_stops_) continue;
      const double x = w_.out[p.channel_] + shift_[i];
      if (x >= p.low_ - p.contact_slack_ && x <= p.high_ + p.contact_slack_) continue;
      const bool low = x < p.low_;
      apply(i, (low ? p.low_ : p.high_) - x);
      p.mode_ = low ? Piston::Mode::low_stop : Piston::Mode::high_stop;
      stopped_.push_back(i);
      held = true;
    }
    return held;
  }

  void commit(bool sudden) {
    const Layout& layout = *event_.layout;
    double entropy_before = 0.0, entropy_after = 0.0;
    for (const SpaceInfo& s : layout.spaces) {
      const double mass = w_.total_mass(s.index);
      entropy_before += mass * w_.gas[s.index].entropy;
      entropy_after += mass * gas_[s.index].entropy;
      event_.y[layout.stores[s.store].state] = departure_[s.index];
    }
    double returned = 0.0;
    for (std::size_t i = 0; i < pistons_.size(); ++i)
      if (shift_[i] != 0.0) returned += book(pistons_[i], shift_[i]);
    if (sudden) event_.generate(Mechanism::sudden, entropy_after - entropy_before - returned);
  }
  double shift(std::size_t i) const { return shift_[i]; }

private:
  double back_pressure(const Piston& p) const {
    return p.back_space_ >= 0 ? gas_[p.back_space_].pressure : p.back_pressure(w_);
  }
  double friction(const Piston& p) const { return p.direction() * p.friction_.kinetic; }
  double spring_at(const Piston& p, double shift) const {
    return p.stiffness_ * (w_.out[p.channel_] + shift - p.free_at_);
  }
  double constant_force(const Piston& p) const { return p.weight(w_) + w_.input[p.force_input_]; }
  std::size_t index(const Piston& p) const { return static_cast<std::size_t>(&p - pistons_.data()); }

  double residual(const Piston& p) const {
    return gas_[p.space_].pressure * p.area_ - back_pressure(p) * p.back_area_ - constant_force(p) -
           spring_at(p, shift_[index(p)]) - friction(p);
  }
  /// -d(residual)/dx of this piston alone.
  double stiffness(const Piston& p) const {
    const auto one = [&](int space, double area, double force) {
      const PressureSlopes<double> s =
          event_.layout->mixture.pressure_slopes(gas_[space], w_.space_mass(space), volume_[space]);
      return area * (s.by_energy * force - s.by_volume * area);
    };
    double k = p.stiffness_ + one(p.space_, p.area_, gas_[p.space_].pressure * p.area_);
    if (p.back_space_ >= 0) k += one(p.back_space_, p.back_area_, gas_[p.back_space_].pressure * p.back_area_);
    return k;
  }

  void apply(std::size_t i, double dx) {
    const Piston& p = pistons_[i];
    const double before = shift_[i], after = before + dx;
    const double spring = 0.5 * (spring_at(p, before) + spring_at(p, after)) * dx;
    double work = constant_force(p) * dx + spring + friction(p) * dx;
    if (p.back_space_ < 0) work += back_pressure(p) * p.back_area_ * dx;
    if (p.heat_store_ == p.space_store_) work -= friction(p) * dx;
    volume_[p.space_] += p.area_ * dx;
    if (p.back_space_ >= 0) {
      volume_[p.back_space_] -= p.back_area_ * dx;
      // Worked on at its final pressure: repeat until that pressure and the work agree.
      const double start = departure_[p.back_space_];
      double given = back_pressure(p) * p.back_area_ * dx;
      for (int pass = 0; pass < 60; ++pass) {
        departure_[p.back_space_] = start + given;
        refresh(p.back_space_);
        const double again = back_pressure(p) * p.back_area_ * dx;
        const bool settled = std::abs(again - given) <= 1e-16 * std::abs(given);
        given = again;
        if (settled) break;
      }
      work += given;
    }
    departure_[p.space_] -= work;
    refresh(p.space_);
    shift_[i] = after;
  }

  void refresh(int space) {
    const double energy = event_.layout->spaces[space].energy + departure_[space];
    gas_[space] =
        event_.layout->mixture.from_energy(w_.space_mass(space), energy, volume_[space], gas_[space].temperature);
  }

  /// Ledger entries of a shift; returns the entropy that friction heat put into the gas.
  double book(const Piston& p, double dx) {
    event_.y[p.position_state_] += dx;
    event_.book(p.lifting_entry_, p.weight(w_) * dx);
    event_.book(p.applied_entry_, w_.input[p.force_input_] * dx);
    if (p.stiffness_ > 0.0) event_.book(p.spring_entry_, 0.5 * (spring_at(p, 0.0) + spring_at(p, dx)) * dx);
    if (p.atmosphere_entry_ >= 0) event_.book(p.atmosphere_entry_, p.back_pressure(w_) * p.back_area_ * dx);
    if (p.back_entry_ >= 0) event_.book(p.back_entry_, p.back_pressure(w_) * p.back_area_ * dx);
    const double heat = friction(p) * dx;
    if (heat == 0.0) return 0.0;
    event_.book(p.friction_entry_, heat);
    if (p.heat_store_ < 0) {
      event_.generate(Mechanism::friction, heat / w_.ambient_temperature);
      event_.carry_entropy(-heat / w_.ambient_temperature);
      return 0.0;
    }
    event_.book(p.returned_entry_, heat);
    const double generated = heat / w_.temperature[p.heat_store_];
    event_.generate(Mechanism::friction, generated);
    if (p.heat_store_ == p.space_store_) return generated;
    event_.y[event_.layout->stores[p.heat_store_].state] += heat;
    return 0.0;
  }

  std::span<Piston> pistons_;
  Event& event_;
  const Workspace<double>& w_;
  std::vector<double> volume_, departure_,
      shift_;  // departure: of energy from the start, exact however large the energy
  std::vector<GasState<double>> gas_;
  std::vector<std::size_t> stopped_;
};

bool Piston::settle_all(std::span<Piston> pistons, Event& e, bool sudden) {
  const bool any = std::any_of(pistons.begin(), pistons.end(), [](const Piston& p) { return p.follows_balance(); });
  if (!any) return false;
  const Workspace<double>& w = e.now();
  PistonBalance balance(pistons, e, w);
  // Rounding of the balance itself is not worth a move.
  if (balance.worst() < 2e-16) return false;
  const bool jump = sudden && balance.worst() > 1e-9;
  std::vector<Mode> modes;
  std::vector<double> position;
  for (const Piston& p : pistons) {
    modes.push_back(p.mode_);
    position.push_back(w.out[p.channel_]);
  }
  bool good = balance.solve();
  if (jump)
    while (good && balance.hold_at_stops()) good = balance.solve();
  if (!good) {
    if (sudden) e.layout->warnings.push_back(fmt::format("balanced pistons found no new balance at {:.6g} s", e.time));
    return false;
  }
  balance.commit(sudden);
  for (std::size_t i = 0; jump && i < pistons.size(); ++i) {
    if (std::abs(balance.shift(i)) <= 1e-9 * (e.layout->spaces[pistons[i].space_].volume / pistons[i].area_)) continue;
    const bool stopped = pistons[i].mode_ != modes[i];
    e.log(pistons[i].name, stopped ? "jumps to its stop" : "jumps to its new balance", position[i],
          position[i] + balance.shift(i));
  }
  return true;
}

}  // namespace gaskettle
