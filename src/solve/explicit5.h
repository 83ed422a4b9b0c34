/// The non-stiff method: one step of the explicit 5(4) pair of Dormand and Prince.
///
/// The formulas are those of boost::numeric::odeint::runge_kutta_dopri5, continuous
/// output included. The judgement of the step is ours: odeint's own control takes a
/// step with a NaN error as a success.
///
/// Source of the pair: J. R. Dormand, P. J. Prince, A family of embedded Runge-Kutta
/// formulae, J. Comput. Appl. Math. 6 (1980) 19-26.
#pragma once
#include <algorithm>
#include <boost/numeric/odeint/stepper/runge_kutta_dopri5.hpp>
#include <boost/range/iterator_range.hpp>
#include <vector>

#include "solve/combine.h"
#include "solve/problem.h"
#include "solve/settings.h"
#include "solve/step_control.h"

namespace gaskettle {

class Explicit5 {
public:
  static constexpr int order = 5;
  using State = std::vector<double>;

  /// Takes the rates at (t, y), from where attempts start.
  template <OdeProblem P>
  Attempt start(P& problem, double t, const double* y, Statistics& stats) {
    resize(problem.size());
    begin_ = t;
    y0_.assign(y, y + n_);
    if (const int i = first_not_finite(n_, y); i >= 0) return {Failure::rates_not_finite, i};
    problem.rates(t, y, f0_.data());
    ++stats.rate_calls;
    if (const int i = first_not_finite(n_, f0_.data()); i >= 0) return {Failure::rates_not_finite, i};
    return {};
  }

  /// Starts where the last step ended; its last stage already holds the rates there.
  void start_at_end() {
    begin_ = end_;
    y0_.swap(y1_);
    f0_.swap(f1_);
  }

  /// Tries one step to t1. On success end_state() and error() are set.
  template <OdeProblem P>
  Attempt attempt(P& problem, double t1, Statistics& stats) {
    end_ = t1;
    Attempt result;
    int stage = 1;
    // odeint cannot be stopped between stages: after a failure the rest is skipped.
    const auto system = [&](const State& u, State& dudt, double t) {
      ++stage;
      if (result.failure != Failure::none) return;
      result = stage_rates(problem, std::min(t, t1), u, dudt, stats);
      if (stage == 6) {
        u6_ = u;
        f6_ = dudt;
      }
    };
    formulas_.do_step(system, y0_, f0_, begin_, y1_, f1_, t1 - begin_, error_);
    return result;
  }

  /// Estimate of h |lambda| for the fastest decay, from the last two stages, which lie
  /// at one time; the pair is stable up to about 3.3. In weighted states.
  ///
  /// Source: E. Hairer, G. Wanner, Solving Ordinary Differential Equations II,
  /// section IV.2, equation (2.27).
  double stiffness(const double* typical) const;

  DenseStep curve();
  void interpolate(double t, double* y) const;

  double begin() const { return begin_; }
  double end() const { return end_; }
  const double* begin_state() const { return y0_.data(); }
  const double* begin_rates() const { return f0_.data(); }
  const double* end_state() const { return y1_.data(); }
  const double* error() const { return error_.data(); }

private:
  void resize(int n);

  template <OdeProblem P>
  Attempt stage_rates(P& problem, double t, const State& u, State& dudt, Statistics& stats) const {
    if (const int i = first_not_finite(n_, u.data()); i >= 0) return {Failure::rates_not_finite, i};
    if (!problem.admissible(t, u.data())) return {Failure::not_physical, -1};
    problem.rates(t, u.data(), dudt.data());
    ++stats.rate_calls;
    if (const int i = first_not_finite(n_, dudt.data()); i >= 0) return {Failure::rates_not_finite, i};
    return {};
  }

  int n_ = -1;
  double begin_ = 0, end_ = 0;
  boost::numeric::odeint::runge_kutta_dopri5<State> formulas_;
  State y0_, y1_, f0_, f1_, error_, u6_, f6_;
};

}  // namespace gaskettle
