/// An independent integrator for the cross-checks: CVODE of SUNDIALS, variable-order
/// Adams or BDF, root finding included.
///
/// Source: A. C. Hindmarsh et al., SUNDIALS: Suite of Nonlinear and
/// Differential/Algebraic Equation Solvers, ACM TOMS 31 (2005) 363.
#pragma once
#include <cvode/cvode.h>
#include <nvector/nvector_serial.h>
#include <sundials/sundials_context.h>
#include <sunlinsol/sunlinsol_dense.h>
#include <sunmatrix/sunmatrix_dense.h>

#include <cmath>
#include <functional>
#include <memory>
#include <stdexcept>
#include <string>
#include <vector>

namespace gaskettle::testing {

enum class Multistep { adams = CV_ADAMS, bdf = CV_BDF };

/// One transient. The right-hand side may hold modes: change them only between `advance`
/// and `restart`. A guard fires where it rises through zero.
class CvodeRun {
public:
  using Rates = std::function<void(double t, const double* y, double* rate)>;
  using Guards = std::function<void(double t, const double* y, double* guard)>;

  /// `size` holds a typical size of each state: its absolute tolerance is 1e-13 of it, beside
  /// the relative 1e-12.
  CvodeRun(Multistep method, const std::vector<double>& start, const std::vector<double>& size, Rates rates)
      : rates_(std::move(rates)) {
    SUNContext context = nullptr;
    check(SUNContext_Create(nullptr, &context), "SUNContext_Create");
    context_.reset(context);
    const sunindextype n = static_cast<sunindextype>(start.size());
    state_.reset(N_VNew_Serial(n, context));
    tolerance_.reset(N_VNew_Serial(n, context));
    for (std::size_t i = 0; i < start.size(); ++i) {
      y()[i] = start[i];
      N_VGetArrayPointer(tolerance_.get())[i] = 1e-13 * size.at(i);
    }
    memory_.reset(CVodeCreate(static_cast<int>(method), context));
    check(CVodeInit(memory_.get(), &CvodeRun::call_rates, 0.0, state_.get()), "CVodeInit");
    check(CVodeSVtolerances(memory_.get(), 1e-12, tolerance_.get()), "CVodeSVtolerances");
    check(CVodeSetUserData(memory_.get(), this), "CVodeSetUserData");
    matrix_.reset(SUNDenseMatrix(n, n, context));
    linear_.reset(SUNLinSol_Dense(state_.get(), matrix_.get(), context));
    check(CVodeSetLinearSolver(memory_.get(), linear_.get(), matrix_.get()), "CVodeSetLinearSolver");
    check(CVodeSetMaxNumSteps(memory_.get(), 5'000'000), "CVodeSetMaxNumSteps");
  }

  void watch(int count, Guards guards) {
    guards_ = std::move(guards);
    guard_count_ = count;
    check(CVodeRootInit(memory_.get(), count, &CvodeRun::call_guards), "CVodeRootInit");
    std::vector<int> rising(static_cast<std::size_t>(count), 1);
    check(CVodeSetRootDirection(memory_.get(), rising.data()), "CVodeSetRootDirection");
    check(CVodeSetNoInactiveRootWarn(memory_.get()), "CVodeSetNoInactiveRootWarn");
  }
  /// Times, rising, at which the rates have a corner: no step crosses one. `at_each` is called there.
  void corners(std::vector<double> times, std::function<void()> at_each = {}) {
    corners_ = std::move(times);
    at_corner_ = std::move(at_each);
  }

  /// Integrates to t. False where a guard fired first: see time() and fired(); go on with restart().
  bool advance(double t) {
    while (t - time_ > 1e-13 * std::max(1.0, std::abs(t))) {
      if (!corners_.empty()) check(CVodeSetStopTime(memory_.get(), next_corner()), "CVodeSetStopTime");
      const int flag = CVode(memory_.get(), t, state_.get(), &time_, CV_NORMAL);
      check(flag, "CVode");
      if (flag == CV_ROOT_RETURN) {
        std::vector<int> found(static_cast<std::size_t>(guard_count_));
        check(CVodeGetRootInfo(memory_.get(), found.data()), "CVodeGetRootInfo");
        fired_ = 0;
        while (found[static_cast<std::size_t>(fired_)] == 0) ++fired_;
        return false;
      }
      // A time asked for that is a corner too returns as the former.
      if (time_ >= next_corner()) {
        ++corner_;
        if (at_corner_) at_corner_();
        restart();
        if (fired_at_corner()) return false;
      }
    }
    return true;
  }
  /// Starts afresh from the state as it now stands.
  void restart() { check(CVodeReInit(memory_.get(), time_, state_.get()), "CVodeReInit"); }

  double time() const { return time_; }
  int fired() const { return fired_; }
  double* y() { return N_VGetArrayPointer(state_.get()); }
  std::vector<double> rates() {
    std::vector<double> f(static_cast<std::size_t>(N_VGetLength_Serial(state_.get())));
    rates_(time_, y(), f.data());
    return f;
  }

private:
  double next_corner() const { return corner_ < corners_.size() ? corners_[corner_] : 1e300; }
  static int call_rates(realtype t, N_Vector y, N_Vector rate, void* self) {
    static_cast<CvodeRun*>(self)->rates_(t, N_VGetArrayPointer(y), N_VGetArrayPointer(rate));
    return 0;
  }
  static int call_guards(realtype t, N_Vector y, realtype* guard, void* self) {
    static_cast<CvodeRun*>(self)->guards_(t, N_VGetArrayPointer(y), guard);
    return 0;
  }
  /// A corner may turn a guard over at once (a setpoint that begins to fall).
  bool fired_at_corner() {
    std::vector<double> g(static_cast<std::size_t>(guard_count_), -1.0);
    if (guard_count_ > 0) guards_(time_, y(), g.data());
    for (int i = 0; i < guard_count_; ++i)
      if (g[static_cast<std::size_t>(i)] > 0.0) {
        fired_ = i;
        return true;
      }
    return false;
  }
  static void check(int flag, const char* what) {
    if (flag < 0) throw std::runtime_error(std::string(what) + " failed with " + std::to_string(flag));
  }

  struct FreeContext {
    void operator()(SUNContext c) const { SUNContext_Free(&c); }
  };
  struct FreeVector {
    void operator()(N_Vector v) const { N_VDestroy(v); }
  };
  struct FreeMatrix {
    void operator()(SUNMatrix m) const { SUNMatDestroy(m); }
  };
  struct FreeLinear {
    void operator()(SUNLinearSolver s) const { SUNLinSolFree(s); }
  };
  struct FreeMemory {
    void operator()(void* m) const { CVodeFree(&m); }
  };
  // The context goes last, after all that was made in it.
  std::unique_ptr<std::remove_pointer_t<SUNContext>, FreeContext> context_;
  std::unique_ptr<std::remove_pointer_t<N_Vector>, FreeVector> state_, tolerance_;
  std::unique_ptr<std::remove_pointer_t<SUNMatrix>, FreeMatrix> matrix_;
  std::unique_ptr<std::remove_pointer_t<SUNLinearSolver>, FreeLinear> linear_;
  std::unique_ptr<void, FreeMemory> memory_;
  Rates rates_;
  Guards guards_;
  int guard_count_ = 0, fired_ = -1;
  std::vector<double> corners_;
  std::function<void()> at_corner_;
  std::size_t corner_ = 0;
  double time_ = 0.0;
};

}  // namespace gaskettle::testing
