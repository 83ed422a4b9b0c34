#include "solve/sparse_lu.h"

#include <catch2/catch.hpp>
#include <cmath>
#include <random>

#include "solve/colouring.h"

using namespace gaskettle;

namespace {

Sparsity random_pattern(int n, int per_row, std::mt19937& random) {
  std::vector<std::vector<int>> rows(n);
  for (auto& row : rows)
    for (int k = 0; k < per_row; ++k) row.push_back(static_cast<int>(random() % n));
  return make_sparsity(rows);
}

std::vector<double> random_values(const Sparsity& pattern, std::mt19937& random) {
  std::uniform_real_distribution<double> value(-1, 1);
  std::vector<double> values(pattern.entries());
  for (double& v : values) v = value(random);
  return values;
}

/// (shift I - J) x - b, in units of the rounding of its largest terms.
double residual(const Sparsity& p, const std::vector<double>& j, double shift, const std::vector<double>& x,
                const std::vector<double>& b) {
  double worst = 0, scale = 0;
  for (int i = 0; i < p.size(); ++i) {
    double sum = shift * x[i] - b[i];
    for (int e = p.row_start[i]; e < p.row_start[i + 1]; ++e) sum -= j[e] * x[p.columns[e]];
    worst = std::max(worst, std::fabs(sum));
    scale = std::max({scale, std::fabs(shift * x[i]), std::fabs(b[i])});
  }
  return worst / (scale * std::numeric_limits<double>::epsilon());
}

}  // namespace

TEST_CASE("sparse LU solves random systems to rounding") {
  std::mt19937 random(7);
  for (const int n : {1, 2, 5, 17, 60, 200})
    for (int repeat = 0; repeat < 10; ++repeat) {
      const Sparsity pattern = random_pattern(n, 3, random);
      const auto j = random_values(pattern, random);
      // A shift above any row sum keeps every pivot of size 1: what remains is rounding, at
      // most a few units for each of the n operations in a row.
      const double shift = 6;
      SparseLu lu;
      lu.use(pattern, repeat);
      REQUIRE(lu.factor(j.data(), shift));
      std::vector<double> b(n);
      for (double& v : b) v = static_cast<double>(random() % 1000) - 500;
      std::vector<double> x = b;
      lu.solve(x.data());
      CHECK(residual(pattern, j, shift, x, b) < 8 + n);
    }
}

TEST_CASE("sparse LU keeps plans of several pattern versions apart") {
  std::mt19937 random(11);
  SparseLu lu;
  const Sparsity a = random_pattern(12, 2, random), b = random_pattern(12, 4, random);
  const auto ja = random_values(a, random), jb = random_values(b, random);
  for (int round = 0; round < 3; ++round)
    for (const bool first : {true, false}) {
      const Sparsity& p = first ? a : b;
      const auto& j = first ? ja : jb;
      lu.use(p, first ? 1 : 2);
      REQUIRE(lu.factor(j.data(), 9));
      std::vector<double> rhs(12, 1.0), x = rhs;
      lu.solve(x.data());
      CHECK(residual(p, j, 9, x, rhs) < 20);
    }
}

TEST_CASE("sparse LU reports pivots that vanish or are not finite") {
  SparseLu lu;
  lu.use(dense_sparsity(2), 0);
  const double singular[] = {1, 0, 0, 1};
  CHECK_FALSE(lu.factor(singular, 1.0));  // 1 I - I
  const double nan[] = {1, 0, 0, std::numeric_limits<double>::quiet_NaN()};
  CHECK_FALSE(lu.factor(nan, 1.0));
  // Rank one plus a shift lost to rounding: the second pivot is what 1e20 cannot hold.
  const double lost[] = {-1e20, 1e20, 1e20, -1e20};
  CHECK_FALSE(lu.factor(lost, 1.0));
  CHECK(lu.factor(lost, 1e19));
}

TEST_CASE("a chain and an arrow are eliminated without fill") {
  const int n = 3000;
  std::vector<std::vector<int>> chain(n), arrow(n);
  for (int i = 0; i < n; ++i) {
    if (i > 0) chain[i].push_back(i - 1);
    if (i + 1 < n) chain[i].push_back(i + 1);
    arrow[i].push_back(0);
    arrow[0].push_back(i);
  }
  for (const auto& rows : {chain, arrow}) {
    SparseLu lu;
    lu.use(make_sparsity(rows), 0);
    CHECK(lu.fill() == 2 * (n - 1));
  }
}

TEST_CASE("ledger rows that nothing depends on cost no fill") {
  const int n = 50;
  std::vector<std::vector<int>> rows(n);
  for (int i = 1; i + 1 < n; ++i) rows[i].push_back(i - 1);
  for (int i = 0; i < n; ++i) rows[n - 1].push_back(i);
  const Sparsity pattern = make_sparsity(rows);
  SparseLu lu;
  lu.use(pattern, 0);
  CHECK(lu.fill() == pattern.entries() - n);
}

TEST_CASE("columns of one colour share no row") {
  std::mt19937 random(3);
  for (const int n : {1, 4, 40, 300}) {
    const Sparsity p = random_pattern(n, 4, random);
    const auto colour = colour_columns(p);
    int widest = 0;
    for (int i = 0; i < n; ++i) {
      std::vector<int> seen;
      for (int e = p.row_start[i]; e < p.row_start[i + 1]; ++e) seen.push_back(colour[p.columns[e]]);
      widest = std::max(widest, static_cast<int>(seen.size()));
      std::sort(seen.begin(), seen.end());
      CHECK(std::adjacent_find(seen.begin(), seen.end()) == seen.end());
      CHECK(seen.front() >= 0);
    }
    CHECK(colour_count(colour) >= widest);
  }
  CHECK(colour_count(colour_columns(make_sparsity(std::vector<std::vector<int>>(9)))) == 1);
  std::vector<std::vector<int>> chain(30);
  for (int i = 1; i < 30; ++i) chain[i].push_back(i - 1), chain[i - 1].push_back(i);
  CHECK(colour_count(colour_columns(make_sparsity(chain))) <= 4);  // 3 are enough; greedy may need one more
}

TEST_CASE("patterns refuse columns that do not exist") {
  CHECK_THROWS_WITH(make_sparsity({{0}, {2}}), Catch::Contains("row 1"));
  CHECK_THROWS_AS(make_sparsity({{-1}}), std::invalid_argument);
}
