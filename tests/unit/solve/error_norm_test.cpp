#include "solve/error_norm.h"

#include <catch2/catch.hpp>
#include <cmath>
#include <limits>
#include <vector>

using namespace gaskettle;

TEST_CASE("each state is judged by the larger of its typical size and itself") {
  const double error[] = {3e-6, 4e-3}, y0[] = {0, 10}, y1[] = {0.5, -100}, typical[] = {2, 1};
  const ErrorSize e = error_size(2, error, y0, y1, typical, 1e-6);
  const double first = 3e-6 / 2e-6, second = 4e-3 / 1e-4;
  CHECK(e.value == Approx(std::sqrt((first * first + second * second) / 2)).epsilon(1e-14));
  CHECK(e.limiting == 1);
}

TEST_CASE("one bad state cannot hide among many good ones") {
  const int n = 5000;
  std::vector<double> error(n, 0.0), y(n, 1.0), typical(n, 1.0);
  error[77] = 10e-6;
  const ErrorSize e = error_size(n, error.data(), y.data(), y.data(), typical.data(), 1e-6);
  CHECK(e.value == Approx(10.0 / 4));  // the root mean square alone would say 0.14
  CHECK(e.limiting == 77);
}

TEST_CASE("an error that is not a number is larger than any") {
  for (const double bad : {std::numeric_limits<double>::quiet_NaN(), std::numeric_limits<double>::infinity()}) {
    const double error[] = {0, bad, 0}, y[] = {1, 1, 1};
    const ErrorSize e = error_size(3, error, y, y, y, 1e-6);
    CHECK(e.value == std::numeric_limits<double>::infinity());
    CHECK(e.limiting == 1);
  }
  const double error[] = {0.0}, y[] = {std::numeric_limits<double>::quiet_NaN()}, typical[] = {0.0};
  CHECK(error_size(1, error, y, y, typical, 1e-6).value == std::numeric_limits<double>::infinity());
}
