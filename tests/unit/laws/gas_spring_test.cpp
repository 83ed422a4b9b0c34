#include "laws/gas_spring.h"

#include <catch2/catch.hpp>

#include "base/dual.h"

using namespace gaskettle;

TEST_CASE("the gas spring is the slope of the pressure force along p V^n", "[gas_spring]") {
  const double p = 5e5, A = 0.01, V = 0.002;
  for (const double n : {1.0, 1.4}) {
    Dual<1> x(0.0);
    x.d[0] = 1.0;
    const auto force = p * A * pow(V / (V + A * x), n);
    CHECK(gas_spring_stiffness(n, p, A, V) == Approx(-force.d[0]).epsilon(1e-14));
  }
}
