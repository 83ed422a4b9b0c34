// Patterns of dependence come from the structure of the code, not from values.
#include "base/dependency_set.h"

#include <catch2/catch.hpp>

using namespace gaskettle;

namespace {
std::vector<int> inputs_of(const DependencySet& x) {
  std::vector<int> list;
  x.for_each([&list](int i) { list.push_back(i); });
  return list;
}
using List = std::vector<int>;
}  // namespace

TEST_CASE("an operation depends on what its operands depend on") {
  const DependencySet a = DependencySet::input(2.0, 0);
  const DependencySet b = DependencySet::input(5.0, 63);
  const DependencySet c = DependencySet::input(7.0, 64);
  const DependencySet far = DependencySet::input(1.0, 200);
  CHECK(inputs_of(DependencySet(3.0)).empty());
  CHECK(inputs_of(a) == List{0});
  CHECK(inputs_of(a + b) == List{0, 63});
  CHECK(inputs_of(b - c) == List{63, 64});
  CHECK(inputs_of(far * a) == List{0, 200});
  CHECK(inputs_of(a / far) == List{0, 200});
  CHECK(inputs_of(-c) == List{64});
  CHECK(inputs_of(a + 1.0) == List{0});
  CHECK(inputs_of(2.0 * (a + b) / (c - far)) == List{0, 63, 64, 200});
  CHECK_FALSE(a.depends_on(200));
  CHECK(far.depends_on(200));
  CHECK_FALSE(far.depends_on(199));
}

TEST_CASE("a zero in the values hides nothing") {
  const DependencySet zero = DependencySet::input(0.0, 4);
  const DependencySet b = DependencySet::input(5.0, 9);
  CHECK(inputs_of(zero * b) == List{4, 9});
  CHECK(inputs_of(0.0 * b) == List{9});
  CHECK(inputs_of(b - b) == List{9});
}

TEST_CASE("values are carried for choosing branches") {
  const DependencySet a = DependencySet::input(2.0, 0);
  const DependencySet b = DependencySet::input(5.0, 1);
  CHECK(value(a + b) == 7.0);
  CHECK(value(a - b) == -3.0);
  CHECK(value(a * b) == 10.0);
  CHECK(value(a / b) == 0.4);
  CHECK(value(-a) == -2.0);
  CHECK(value(exp(a)) == std::exp(2.0));
  CHECK(value(log(a)) == std::log(2.0));
  CHECK(value(sqrt(a)) == std::sqrt(2.0));
  CHECK(value(pow(a, 1.5)) == std::pow(2.0, 1.5));
  CHECK(value(sin(a)) == std::sin(2.0));
  CHECK(value(cos(a)) == std::cos(2.0));
  CHECK(value(tanh(a)) == std::tanh(2.0));
  CHECK(value(pow(a, b)) == 32.0);
  CHECK(inputs_of(pow(a, b)) == List{0, 1});
  CHECK(inputs_of(tanh(exp(a))) == List{0});
}
