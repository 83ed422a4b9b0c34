/// How large an error is, in units of what was asked for.
#pragma once

namespace gaskettle {

struct ErrorSize {
  double value = 0;   ///< accepted up to 1; +infinity where any entry is not a number
  int limiting = -1;  ///< the state with the largest error in its own weight; the first that is not finite
};

/// The one norm of every stepper. Each state has the weight
/// rtol max(typical size, |y0|, |y1|); the norm is the root mean square of the
/// weighted errors, but at least a quarter of the largest one, so that a single
/// bad state cannot hide among thousands of good ones.
ErrorSize error_size(int n, const double* error, const double* y0, const double* y1, const double* typical,
                     double rtol);

}  // namespace gaskettle
