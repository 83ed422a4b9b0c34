#include "solve/combine.h"

#include <cstddef>
#include <utility>

namespace gaskettle {
namespace {

template <std::size_t... j>
void combine_fixed(int n, double* out, const double* base, const double* c, const double* const* k,
                   std::index_sequence<j...>) {
  for (int i = 0; i < n; ++i) {
    double sum = base[i];
    ((sum += c[j] * k[j][i]), ...);
    out[i] = sum;
  }
}

template <std::size_t count>
void combine_count(int n, double* out, const double* base, const double* c, const double* const* k) {
  combine_fixed(n, out, base, c, k, std::make_index_sequence<count>{});
}

}  // namespace

void combine(int n, double* out, const double* base, int count, const double* c, const double* const* k) {
  using Kernel = void (*)(int, double*, const double*, const double*, const double* const*);
  static constexpr Kernel kernels[most_stages + 1] = {combine_count<0>, combine_count<1>, combine_count<2>,
                                                      combine_count<3>, combine_count<4>, combine_count<5>,
                                                      combine_count<6>, combine_count<7>, combine_count<8>};
  kernels[count](n, out, base, c, k);
}

}  // namespace gaskettle
