// Textbook problems for the solver tests: rates written once, derivatives exact.
#pragma once
#include <array>
#include <cmath>
#include <functional>
#include <limits>
#include <string>
#include <vector>

#include "base/dual.h"
#include "solve/integrate.h"

namespace gaskettle::test {

/// Offers everything of a HybridProblem for N states, without events. `Self` adds
/// template <class S> void f(const S& t, const S* y, S* dydt) and hides what it needs otherwise.
template <class Self, int N>
class Textbook {
public:
  Textbook() { typical_.fill(1e-6); }

  int size() const { return N; }
  void rates(double t, const double* y, double* dydt) { self().f(t, y, dydt); }
  const Sparsity& sparsity() const { return sparsity_; }
  int sparsity_version() const { return 0; }
  void jacobian(double t, const double* y, double* values, double* dfdt) {
    using D = Dual<N + 1>;
    D time(t);
    time.d[N] = 1;
    std::array<D, N> state, rates;
    for (int i = 0; i < N; ++i) {
      state[i] = D(y[i]);
      state[i].d[i] = 1;
    }
    self().f(time, state.data(), rates.data());
    for (int i = 0; i < N; ++i) {
      for (int j = 0; j < N; ++j) values[i * N + j] = rates[i].d[j];
      dfdt[i] = rates[i].d[N];
    }
  }
  const double* typical_size() const { return typical_.data(); }
  bool admissible(double, const double*) const { return true; }
  std::string state_name(int i) const { return "state " + std::to_string(i); }

  int guard_count() const { return 0; }
  void guards(double, const double*, double*) {}
  bool guard_disturbs(int) const { return true; }
  std::string guard_name(int q) const { return "guard " + std::to_string(q); }
  double next_time_event(double) const { return std::numeric_limits<double>::infinity(); }
  EventResult on_events(double, double*, const std::vector<int>&, bool) { return {}; }
  bool after_step(double, double*) { return false; }

  std::array<double, N> typical_;

private:
  Self& self() { return static_cast<Self&>(*this); }
  Sparsity sparsity_ = dense_sparsity(N);
};

struct SeenEvent {
  double time;
  std::vector<double> before, after;
  std::vector<int> fired;
  bool time_event;
};

/// Keeps what it is shown and checks that pieces cover the run.
class Watcher {
public:
  explicit Watcher(int n) : n_(n), scratch_(n) {}

  void start(double t, const double*) { covered_ = t; }
  void piece(const DenseStep& step, double from, double to) {
    gap_ = gap_ || from != covered_ || !(to > from) || from < step.begin() || to > step.end();
    covered_ = to;
    ++pieces_;
    if (!look_) return;
    for (int k = 0; k <= 4; ++k) {
      const double t = k == 4 ? to : from + (to - from) * k / 4;
      step.interpolate(t, scratch_.data());
      look_(t, scratch_.data());
    }
  }
  void before_event(double t, const double* y, const std::vector<int>& fired, bool time_event) {
    events_.push_back({t, std::vector<double>(y, y + n_), {}, fired, time_event});
  }
  void after_event(double, const double* y, const std::vector<int>&, bool) { events_.back().after.assign(y, y + n_); }
  bool interrupted() { return interrupt_after_ >= 0 && pieces_ >= interrupt_after_; }

  double covered() const { return covered_; }
  bool gap() const { return gap_; }
  const std::vector<SeenEvent>& events() const { return events_; }

  std::function<void(double, const double*)> look_;  ///< called at five times in each piece
  int interrupt_after_ = -1;                         ///< pieces

private:
  int n_;
  double covered_ = -1;
  bool gap_ = false;
  int pieces_ = 0;
  std::vector<double> scratch_;
  std::vector<SeenEvent> events_;
};

/// Times at which guard q fired.
inline std::vector<double> times_of(const Watcher& watcher, int q) {
  std::vector<double> times;
  for (const SeenEvent& e : watcher.events())
    if (std::find(e.fired.begin(), e.fired.end(), q) != e.fired.end()) times.push_back(e.time);
  return times;
}

inline Settings settings(double t_end, double rtol, Method method) {
  Settings s;
  s.t_end = t_end;
  s.rtol = rtol;
  s.method = method;
  return s;
}

}  // namespace gaskettle::test
