#include "solve/error_norm.h"

#include <algorithm>
#include <cmath>
#include <limits>

namespace gaskettle {

ErrorSize error_size(int n, const double* error, const double* y0, const double* y1, const double* typical,
                     double rtol) {
  double squares = 0, largest = 0;
  int limiting = n > 0 ? 0 : -1;
  for (int i = 0; i < n; ++i) {
    const double weight = rtol * std::max(typical[i], std::max(std::fabs(y0[i]), std::fabs(y1[i])));
    const double ratio = error[i] / weight;
    const double square = ratio * ratio;
    // Written so that a NaN, for which every comparison is false, ends up here.
    if (!(square <= std::numeric_limits<double>::max())) return {std::numeric_limits<double>::infinity(), i};
    squares += square;
    if (square > largest) {
      largest = square;
      limiting = i;
    }
  }
  if (n == 0) return {};
  return {std::sqrt(std::max(squares / n, largest / 16)), limiting};
}

}  // namespace gaskettle
