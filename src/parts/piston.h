/// A piston between a gas space and the atmosphere, a stated pressure, or a second space.
///
///   inertial  m dv/dt = net - friction,  net = p A - p_back A_b - m g cos(tilt) - k (x - x_free) - F
///   balanced  net = friction at all times (quasi-static): x follows from the balance
///   driven    x (or the liquid's flow behind it) is given; the drive does what is missing
/// x grows with the volume of the space it closes: V = V_start + A (x - at).
///
/// Balanced: differentiating the balance gives dx/dt, and after each step and event x is
/// put back onto the balance (piston_balance.h), so that it never drifts. Gas work is
/// (sum of the opposing forces) dx. With viscous friction b: b dx/dt = net - kinetic.
///
/// Friction is a mode: stuck until the net force beats breakaway, sliding one way or the
/// other with kinetic (Coulomb), Stribeck and viscous friction (laws/friction.h). A stop is
/// a mode: contact is an event (restitution where inertial), release when the net force
/// turns. Loads arrive at rest (momentum kept, the loss is impact) and leave with their
/// kinetic energy. Friction heat goes to gas, wall or surroundings; impact heat outside.
/// Sources: B. Armstrong-Helouvry, P. Dupont and C. Canudas de Wit, Automatica 30 (1994)
/// 1083 (friction modes); Y. A. Cengel and M. A. Boles, Thermodynamics, chapter 4
/// (moving-boundary work).
#pragma once
#include <span>

#include "laws/friction.h"
#include "model/workspace.h"

namespace gaskettle {

class Piston {
public:
  static constexpr const char* section = "pistons";
  static constexpr const char* kind = "piston";
  static constexpr const char* meaning = "moves between a gas space and the atmosphere, or between two spaces";
  enum class Motion { balanced, inertial, driven };
  enum class Mode { free, outward, inward, stuck, low_stop, high_stop };

  std::string name;
  Place place;

  void read(Section& s);
  void declare(Layout& layout);
  void connect(Layout& layout);
  void start(Event& e);

  template <class S>
  void prepare(Workspace<S>& w) const {
    const S travel = this->travel(w);
    w.volume[space_] = w.volume[space_] + area_ * travel;
    if (back_space_ >= 0) w.volume[back_space_] = w.volume[back_space_] - back_area_ * travel;
    w.out[channel_] = at_ + travel;
    const S v = velocity(w);
    w.out[channel_ + 1] = v;
    w.volume_rate[space_] = w.volume_rate[space_] + area_ * v;
    if (back_space_ >= 0) w.volume_rate[back_space_] = w.volume_rate[back_space_] - back_area_ * v;
  }

  /// All pistons at once: those whose velocity is known first, then the balanced ones together.
  template <class S>
  static void move_all(std::span<const Piston> pistons, Workspace<S>& w);

  int mode() const { return static_cast<int>(mode_); }
  static constexpr std::array guard_names = {"reaches low stop", "reaches high stop", "comes to rest", "starts outward",
                                             "starts inward"};
  static constexpr bool guards_disturb = true;
  void guards(const Workspace<double>& w, double* g) const;
  void on_guard(int which, Event& e);
  /// Loads, forces or back pressures have jumped.
  void on_inputs_changed(Event& e);
  /// Puts balanced pistons back onto their balance; `sudden` after a jump of forces. True where states changed.
  static bool settle_all(std::span<Piston> pistons, Event& e, bool sudden);

  /// Kinetic and spring energy now (J), and what loads that left took with them: state functions that the ledger's
  /// quadratures are compared with.
  double kinetic_energy(const Workspace<double>& w) const;
  double spring_energy(const Workspace<double>& w) const;
  double kinetic_energy_at_start() const { return kinetic_at_start_; }
  double spring_energy_at_start() const { return spring_at_start_; }
  double kinetic_carried_away() const { return kinetic_carried_away_; }
  /// The scale of its kinetic energy, J: that of moving by its reach at its natural frequency.
  double greatest_kinetic_energy() const { return kinetic_scale_; }
  bool kinetic_comparable() const { return motion_ == Motion::inertial && !mass_ramps_; }
  bool has_spring() const { return stiffness_ > 0.0; }
  int kinetic_entry() const { return kinetic_entry_; }
  int spring_entry() const { return spring_entry_; }
  Motion motion() const { return motion_; }

private:
  friend class PistonBalance;
  bool moving() const { return mode_ == Mode::free || mode_ == Mode::outward || mode_ == Mode::inward; }
  /// Balanced without viscous friction and free to move: part of the coupled balance.
  bool follows_balance() const { return motion_ == Motion::balanced && friction_.viscous <= 0.0 && moving(); }
  bool has_static_friction() const { return friction_.breakaway > 0.0 || friction_.kinetic > 0.0; }
  double direction() const { return mode_ == Mode::outward ? 1.0 : (mode_ == Mode::inward ? -1.0 : 0.0); }

  template <class S>
  S travel(const Workspace<S>& w) const {
    if (motion_ == Motion::driven && !driven_by_flow_) return w.input[position_input_] - at_;
    return S(w.y[position_state_]);
  }
  /// Known before the forces are: zero for balanced pistons.
  template <class S>
  S velocity(const Workspace<S>& w) const {
    if (motion_ == Motion::inertial) return moving() ? S(w.y[velocity_state_]) : S(0.0);
    if (motion_ == Motion::driven) {
      if (!driven_by_flow_) return w.slope_of_input(position_input_);
      return moving() ? S(w.input[flow_input_] * (-1.0 / area_)) : S(0.0);
    }
    return S(0.0);
  }
  template <class S>
  S back_pressure(const Workspace<S>& w) const {
    if (back_space_ >= 0) return w.gas[back_space_].pressure;
    return back_input_ >= 0 ? w.input[back_input_] : S(w.layout->atmosphere_pressure);
  }
  /// Outward forces less opposing ones, friction left out.
  template <class S>
  S net_force(const Workspace<S>& w) const {
    return w.gas[space_].pressure * area_ - opposing_force(w);
  }
  template <class S>
  S opposing_force(const Workspace<S>& w) const {
    return back_pressure(w) * back_area_ + weight(w) + spring_force(w) + w.input[force_input_];
  }
  template <class S>
  S weight(const Workspace<S>& w) const {
    return w.input[mass_input_] * gravity_;
  }
  template <class S>
  S spring_force(const Workspace<S>& w) const {
    return stiffness_ * (w.out[channel_] - free_at_);
  }

  template <class S>
  void move_known(Workspace<S>& w) const;
  template <class S>
  void book_work(Workspace<S>& w, const S& v, const S& friction_force) const;
  template <class S>
  static void move_balanced(std::span<const Piston> pistons, Workspace<S>& w);
  template <class S>
  void move_viscous(Workspace<S>& w) const;
  void read_friction(Section& s);
  void read_back(Section& s);
  void check(Section& s);
  void find_receiver(Layout& layout);
  void advise(Layout& layout, const SpaceInfo& space) const;
  void lie_on(Mode stop, Event& e);
  void rest_at(Mode stop, Event& e);
  void collide(bool low, Event& e);
  void come_to_rest(Event& e);
  double balance_pressure(const Layout& layout, double back_pressure) const;

  Reference closes_, back_reference_;
  double area_ = 0.0, at_ = 0.0, back_area_ = 0.0;
  double low_ = -1e300, high_ = 1e300;
  Motion motion_ = Motion::balanced;
  double start_velocity_ = 0.0, restitution_ = 0.0, tilt_ = 0.0, stiffness_ = 0.0, free_at_ = 0.0;
  SlidingFriction friction_;
  std::string heat_to_;
  SignalSpec mass_spec_, force_spec_, position_spec_, flow_spec_, back_spec_;
  bool driven_by_flow_ = false, has_stops_ = false;
  std::string length_unit_;
  Place stops_place_, heat_to_place_;

  int space_ = 0, back_space_ = -1, space_store_ = 0, back_store_ = -1, heat_store_ = -1;
  int position_state_ = -1, velocity_state_ = -1, channel_ = 0, guard_offset_ = 0;
  int mass_input_ = 0, force_input_ = 0, position_input_ = -1, flow_input_ = -1, back_input_ = -1;
  int lifting_entry_ = 0, spring_entry_ = 0, atmosphere_entry_ = -1, back_entry_ = -1, applied_entry_ = 0;
  int friction_entry_ = 0, kinetic_entry_ = 0, impact_entry_ = 0, returned_entry_ = 0;
  double gravity_ = 0.0;  // g cos(tilt)
  double contact_slack_ = 0.0;
  bool mass_ramps_ = false;
  Mode mode_ = Mode::free;
  double kinetic_carried_away_ = 0.0, kinetic_at_start_ = 0.0, spring_at_start_ = 0.0, kinetic_scale_ = 0.0;
};

}  // namespace gaskettle

#include "parts/piston_rates.h"
