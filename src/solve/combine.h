/// Sums of stage vectors, one pass over memory.
#pragma once
#include <cmath>

namespace gaskettle {

/// The most stages any method here has.
inline constexpr int most_stages = 8;

/// out[i] = base[i] + c[0] k[0][i] + ... + c[count-1] k[count-1][i], added in that
/// order for every i, so that a linear invariant of base and all k is one of out.
/// `out` may be `base`.
void combine(int n, double* out, const double* base, int count, const double* c, const double* const* k);

/// The first entry that is not finite, -1 if all are.
inline int first_not_finite(int n, const double* v) {
  double a = 0, b = 0;  // x - x is 0 for finite x and NaN otherwise
  int i = 0;
  for (; i + 1 < n; i += 2) {
    a += v[i] - v[i];
    b += v[i + 1] - v[i + 1];
  }
  if (i < n) a += v[i] - v[i];
  if (a == 0 && b == 0) return -1;
  for (i = 0; i < n; ++i)
    if (!std::isfinite(v[i])) return i;
  return -1;
}

}  // namespace gaskettle
