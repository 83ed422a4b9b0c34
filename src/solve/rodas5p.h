/// The stiff method: one step of Rodas5P with exact derivatives.
///
/// A linearly implicit Rosenbrock-Wanner step from (t0, y0) of length h solves, with
/// W = I/(gamma h) - df/dy, for s = 1..8
///
///     W k_s = f(t0 + c_s h, y0 + sum_j a_sj k_j) + sum_j (cc_sj / h) k_j + h d_s df/dt
///
/// and ends at y1 = y0 + sum_j a_8j k_j + k_8; the error estimate is k_8. The method
/// has order 5 only with the true Jacobian and the true df/dt, both taken afresh
/// from the problem for every step. Source: see rodas5p_table.h.
#pragma once
#include <vector>

#include "solve/combine.h"
#include "solve/problem.h"
#include "solve/rodas5p_table.h"
#include "solve/settings.h"
#include "solve/sparse_lu.h"
#include "solve/step_control.h"

namespace gaskettle {

class Rodas5p {
public:
  static constexpr int order = 5;

  /// Takes the rates and derivatives at (t, y), from where attempts start.
  template <OdeProblem P>
  Attempt start(P& problem, double t, const double* y, Statistics& stats) {
    resize(problem.size(), problem.sparsity().entries());
    begin_ = t;
    y0_.assign(y, y + n_);
    problem.rates(t, y, f0_.data());
    problem.jacobian(t, y, jacobian_.data(), f_t_.data());
    ++stats.rate_calls;
    ++stats.jacobians;
    pattern_ = &problem.sparsity();
    lu_.use(*pattern_, problem.sparsity_version());
    return check_start();
  }

  /// Tries one step to t1. On success end_state() and error() are set.
  template <OdeProblem P>
  Attempt attempt(P& problem, double t1, Statistics& stats) {
    end_ = t1;
    const double h = t1 - begin_;
    ++stats.factorisations;
    if (!lu_.factor(jacobian_.data(), 1 / (rodas5p_table::gamma * h))) return {Failure::singular_matrix, -1};
    for (int s = 0; s < rodas5p_table::stages; ++s) {
      if (s > 0) {
        form_stage_state(s);
        const double time = rodas5p_table::c[s] == 1 ? t1 : begin_ + rodas5p_table::c[s] * h;
        if (const Attempt bad = stage_rates(problem, time, stats); bad.failure != Failure::none) return bad;
      }
      solve_stage(s, s == 0 ? f0_.data() : f_.data(), h);
    }
    finish();
    if (!problem.admissible(t1, y1_.data())) return {Failure::not_physical, -1};
    return {};
  }

  /// The step as a curve; the coefficients are worked out on the first call.
  DenseStep curve();
  /// The state at t in the last step. After curve() only.
  void interpolate(double t, double* y) const;

  double begin() const { return begin_; }
  double end() const { return end_; }
  const double* begin_state() const { return y0_.data(); }
  const double* begin_rates() const { return f0_.data(); }
  const double* end_state() const { return y1_.data(); }
  const double* error() const { return k(rodas5p_table::stages - 1); }
  /// d2y/dt2 = J f + df/dt at the start, written to out[n].
  void second_derivative(double* out) const;
  /// out = J v.
  void multiply_jacobian(const double* v, double* out) const;

private:
  void resize(int n, int entries);
  Attempt check_start() const;
  void form_stage_state(int s);
  void solve_stage(int s, const double* rates, double h);
  void finish();
  const double* k(int s) const { return k_.data() + static_cast<std::size_t>(s) * n_; }
  double* k(int s) { return k_.data() + static_cast<std::size_t>(s) * n_; }

  template <OdeProblem P>
  Attempt stage_rates(P& problem, double t, Statistics& stats) {
    if (const int i = first_not_finite(n_, u_.data()); i >= 0) return {Failure::rates_not_finite, i};
    if (!problem.admissible(t, u_.data())) return {Failure::not_physical, -1};
    problem.rates(t, u_.data(), f_.data());
    ++stats.rate_calls;
    if (const int i = first_not_finite(n_, f_.data()); i >= 0) return {Failure::rates_not_finite, i};
    return {};
  }

  int n_ = -1;
  double begin_ = 0, end_ = 0;
  bool curve_ready_ = false;
  const Sparsity* pattern_ = nullptr;
  SparseLu lu_;
  std::vector<double> y0_, y1_, f0_, f_t_, f_, u_, jacobian_;
  std::vector<double> k_;      // 8 stages, one after the other
  std::vector<double> dense_;  // 3 rows of the continuous output
};

}  // namespace gaskettle
