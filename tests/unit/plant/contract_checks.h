/// What holds for the rates of any plant in any state: closed ledgers, an exact Jacobian within its pattern.
#pragma once
#include <algorithm>
#include <catch2/catch.hpp>
#include <cmath>
#include <string>
#include <vector>

#include "plant/evaluate.h"
#include "plant/plant.h"

namespace gaskettle::testing {

/// Jacobian taken column by column with duals, without colouring or pattern.
class DenseJacobian {
public:
  explicit DenseJacobian(Plant& plant) : plant_(plant) {
    w_.prepare(plant.layout());
    w_.band = std::max(smallest_pressure_band, plant.layout().rtol);
  }
  std::vector<double> operator()(double t, const std::vector<double>& y) {
    const auto n = y.size();
    std::vector<Dual<8>> state(n), rate(n);
    std::vector<double> J(n * n);
    for (std::size_t first = 0; first < n; first += 8) {
      for (std::size_t j = 0; j < n; ++j) {
        state[j] = Dual<8>(y[j]);
        if (j >= first && j < first + 8) state[j].d[j - first] = 1.0;
      }
      evaluate(plant_.model().parts, w_, Dual<8>(t), state.data(), rate.data(), false);
      for (std::size_t i = 0; i < n; ++i)
        for (std::size_t k = 0; k < 8 && first + k < n; ++k) J[i * n + first + k] = rate[i].d[k];
    }
    return J;
  }

private:
  Plant& plant_;
  Workspace<Dual<8>> w_;
};

inline std::vector<double> rates(Plant& plant, double t, const std::vector<double>& y) {
  std::vector<double> f(y.size());
  plant.rates(t, y.data(), f.data());
  return f;
}

/// Ledger rates against the rates of what is stored.
inline void check_ledger(Plant& plant, const std::vector<double>& f) {
  const Layout& layout = plant.layout();
  double sum = 0.0, size = f[layout.throughput_state];
  for (const auto& e : layout.ledger_entries) sum += ledger_sign(e.term) * f[e.state];
  for (const StoreInfo& s : layout.stores) {
    sum -= f[s.state];
    size += std::abs(f[s.state]);  // exchanges within the plant cancel to rounding of their own size
  }
  CHECK(std::abs(sum) <= 1e-13 * size + 1e-300);
  for (int k = 0; k < layout.mixture.count(); ++k) {
    double mass = f[layout.mass_in_state[k]] - f[layout.mass_out_state[k]],
           flow = f[layout.mass_in_state[k]] + f[layout.mass_out_state[k]];
    for (const SpaceInfo& s : layout.spaces)
      if (s.mass_state[k] >= 0) {
        mass -= f[s.mass_state[k]];
        flow += std::abs(f[s.mass_state[k]]);
      }
    CHECK(std::abs(mass) <= 1e-13 * flow);
  }
}

/// One column of differences, forward and backward, with a step of `relative` times the size of the state.
struct Differences {
  std::vector<double> forward, backward;
};
inline Differences differences(Plant& plant, double t, const std::vector<double>& y, std::size_t j, double step) {
  const std::vector<double> here = rates(plant, t, y);
  std::vector<double> moved = y;
  moved[j] = y[j] + step;
  const double up = moved[j] - y[j];
  Differences d{rates(plant, t, moved), {}};
  moved[j] = y[j] - step;
  const double down = y[j] - moved[j];
  d.backward = rates(plant, t, moved);
  for (std::size_t i = 0; i < y.size(); ++i) {
    d.forward[i] = (d.forward[i] - here[i]) / up;
    d.backward[i] = (here[i] - d.backward[i]) / down;
  }
  return d;
}

/// The coloured Jacobian against the dense one: equal to the last bit, finite, nothing outside the pattern.
inline std::vector<double> check_pattern(Plant& plant, double t, const std::vector<double>& y) {
  const auto n = y.size();
  const std::vector<double> dense = DenseJacobian(plant)(t, y);
  const Sparsity& pattern = plant.sparsity();
  std::vector<double> sparse(static_cast<std::size_t>(pattern.entries())), in_time(n), spread(n * n, 0.0);
  plant.jacobian(t, y.data(), sparse.data(), in_time.data());
  for (std::size_t i = 0; i < n; ++i)
    for (int q = pattern.row_start[i]; q < pattern.row_start[i + 1]; ++q)
      spread[i * n + static_cast<std::size_t>(pattern.columns[q])] = sparse[q];
  std::size_t unlike = 0;
  for (std::size_t k = 0; k < n * n; ++k) unlike += dense[k] == spread[k] ? 0 : 1;
  const auto finite = [](double x) { return std::isfinite(x); };
  CHECK(unlike == 0);
  CHECK(std::all_of(dense.begin(), dense.end(), finite));
  CHECK(std::all_of(in_time.begin(), in_time.end(), finite));
  return dense;
}

/// Against differences. Where a rate has a kink (a flow that turns) the exact derivative lies between both sides. A
/// short step sees narrow curves (the band about equal pressures), a long one is less troubled by rounding: one of
/// them has to agree, to 1e-5 of the row.
inline void check_jacobian(Plant& plant, double t, const std::vector<double>& y) {
  const auto n = y.size();
  const std::vector<double> dense = check_pattern(plant, t, y);
  const double* typical = plant.typical_size();
  const auto size = [&](std::size_t j) {
    return std::isfinite(typical[j]) ? std::max(typical[j], std::abs(y[j])) : 1.0;
  };
  std::vector<double> most(n, 0.0);
  for (std::size_t k = 0; k < n * n; ++k) most[k / n] = std::max(most[k / n], std::abs(dense[k]) * size(k % n));
  std::string wrong;
  for (std::size_t j = 0; j < n; ++j) {
    const Differences tries[] = {differences(plant, t, y, j, 1e-7 * size(j)),
                                 differences(plant, t, y, j, 1e-9 * size(j))};
    for (std::size_t i = 0; i < n; ++i) {
      // The throughput adds sizes: with many at zero any mixture of signs may be met. Nothing depends on it.
      if (static_cast<int>(i) == plant.layout().throughput_state) continue;
      const double row = most[i] / size(j), d = dense[i * n + j];
      const bool agrees = std::any_of(std::begin(tries), std::end(tries), [&](const Differences& x) {
        const auto [low, high] = std::minmax(x.forward[i], x.backward[i]);
        const double slack = 1e-5 * std::max({row, std::abs(low), std::abs(high)});
        return d >= low - slack && d <= high + slack;
      });
      if (!agrees)
        wrong += plant.state_name(static_cast<int>(i)) + " by " + plant.state_name(static_cast<int>(j)) + ": " +
                 std::to_string(d) + " not " + std::to_string(tries[0].forward[i]) + " or " +
                 std::to_string(tries[0].backward[i]) + "\n";
    }
  }
  INFO("t = " << t << " s");
  CHECK(wrong == "");
}

}  // namespace gaskettle::testing
