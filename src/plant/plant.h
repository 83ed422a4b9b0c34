/// A plant: parts laid out in one state vector, as a problem for the integrator.
///
/// Models the solve floor's hybrid problem: rates, exact Jacobian, guards, events. Every
/// mode is held by the part it belongs to; the sparsity pattern is found once for each
/// combination of modes met, by sending dependency sets through the rates.
#pragma once
#include <map>
#include <memory>
#include <string>
#include <vector>

#include "base/dependency_set.h"
#include "base/dual.h"
#include "plant/model.h"
#include "plant/watch.h"
#include "solve/problem.h"
#include "solve/sparsity.h"

namespace gaskettle {

/// One line of the event log.
struct LoggedEvent {
  double time = 0.0;  ///< s
  std::string part, what;
  double before = 0.0, after = 0.0;  ///< the part's main quantity, SI
};

class Plant {
public:
  /// Lays the model out. Problems (unknown references, impossible combinations) go to the
  /// context; the plant is usable only where there are none.
  Plant(Model model, ReadContext& context);
  Plant(const Plant&) = delete;
  Plant& operator=(const Plant&) = delete;
  ~Plant();

  /// Sets all modes for time 0 and returns the states to start from.
  std::vector<double> start();

  // --- the hybrid problem ---
  int size() const { return static_cast<int>(layout_.states.size()); }
  void rates(double t, const double* y, double* f);
  const Sparsity& sparsity();
  int sparsity_version();
  void jacobian(double t, const double* y, double* values, double* dfdt);
  const double* typical_size() const { return typical_.data(); }
  bool admissible(double t, const double* y);
  std::string state_name(int i) const { return layout_.states[static_cast<std::size_t>(i)].name; }
  int guard_count() const { return static_cast<int>(guard_names_.size()); }
  void guards(double t, const double* y, double* g);
  bool guard_disturbs(int i) const { return guard_disturbs_[static_cast<std::size_t>(i)]; }
  std::string guard_name(int i) const { return guard_names_[static_cast<std::size_t>(i)]; }
  double next_time_event(double t) const;
  EventResult on_events(double t, double* y, const std::vector<int>& fired, bool time_event);
  bool after_step(double t, double* y);

  // --- looking at it ---
  /// All channels at a time and state; valid until the next call.
  const Workspace<double>& observe(double t, const double* y);
  /// As `observe`, and also the rate of change of every channel along the motion.
  const Workspace<double>& observe_with_rates(double t, const double* y);
  const Layout& layout() const { return layout_; }
  Layout& layout() { return layout_; }
  const Model& model() const { return model_; }
  Watch& watch() { return watch_; }
  const Watch& watch() const { return watch_; }
  const std::vector<LoggedEvent>& events() const { return events_; }
  double gas_entropy_at_start() const { return start_entropy_; }

private:
  class EventAtWork;
  struct Pattern {
    int version = 0;
    Sparsity sparsity;
    std::vector<int> colour;
    int colours = 0;
  };
  static constexpr int lanes = 8;

  void lay_out(ReadContext& context);
  template <class Part, class Step>
  void attempt(const Part& part, Step&& step);
  void claim_books();
  void claim_guards();
  void size_states();
  void prepare_workspaces();
  std::vector<int> modes() const;
  const Pattern& pattern();
  Pattern make_pattern(double t, const double* y);
  void fill_rates_of_change(Workspace<double>& w);
  bool rates_of_change_wanted() const;
  void dispatch_guard(int i, Event& e);

  Model model_;
  Layout layout_;
  Watch watch_;
  std::vector<double> typical_, scratch_rates_;
  std::vector<std::string> guard_names_;
  std::vector<bool> guard_disturbs_;
  int part_guards_ = 0;
  Workspace<double> work_, before_, look_;
  Workspace<Dual<lanes>> dual_;
  std::vector<Dual<lanes>> dual_y_, dual_f_;
  std::vector<double> before_f_, look_f_;
  std::map<std::vector<int>, Pattern> patterns_;
  const Pattern* current_ = nullptr;
  std::vector<double> last_y_;
  double last_t_ = 0.0;
  std::vector<LoggedEvent> events_;
  double start_entropy_ = 0.0;
};

}  // namespace gaskettle
