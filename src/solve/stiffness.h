/// Whether the stiff method is still needed.
#pragma once
#include <vector>

#include "solve/rodas5p.h"

namespace gaskettle {

/// Size of the largest eigenvalue of the Jacobian, 1/s: one step of the power method
/// at every time step, averaged. Enough to tell a stiff spell from a mild one.
class SpectralEstimate {
public:
  /// Follows the Jacobian with which `stepper` has just started; returns the estimate.
  double update(const Rodas5p& stepper, int n, const double* typical);

private:
  double noise();

  std::vector<double> direction_, image_;
  double log_size_ = 0;
  bool known_ = false;
  unsigned seed_ = 1;
};

/// When to change the method in automatic mode. Each return to the stiff method
/// doubles the patience asked for before the next try without it.
class MethodChoice {
public:
  /// After a stiff step: true to go on without the stiff method.
  /// `speed` is the planned step times the largest eigenvalue.
  bool leave_stiff(double speed);
  /// After an explicit step: true to go back.
  bool leave_explicit(double speed);

private:
  int easy_ = 0, hard_ = 0, easy_again_ = 0;
  int patience_ = 10;
};

}  // namespace gaskettle
