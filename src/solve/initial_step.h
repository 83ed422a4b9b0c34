/// A first step from how fast the state and its rates change.
#pragma once

namespace gaskettle {

/// Root mean square of v in units of max(typical, |y|) rtol; the scale of step guesses.
double weighted_size(int n, const double* v, const double* y, const double* typical, double rtol);

/// A length over which the state moves by about a hundredth of itself, s; for probing. 1e-6 where nothing moves.
double probe_step(int n, const double* y, const double* rates, const double* typical, double rtol);

/// First step for a method of order 5, s, from y, dy/dt and d2y/dt2, at most a hundred probe steps.
///
/// Source: E. Hairer, S. P. Norsett, G. Wanner, Solving Ordinary Differential Equations
/// I, section II.4, "Starting step size".
double initial_step(int n, const double* y, const double* rates, const double* second_derivative, const double* typical,
                    double rtol);

}  // namespace gaskettle
