/// A perfect gas (constant cp, cp/cv = 1.4) in round surroundings: runs of it have closed forms.
#pragma once
#include <algorithm>
#include <catch2/catch.hpp>
#include <cmath>
#include <string>

#include "support/run_model.h"

namespace gaskettle::testing {

namespace perfect {
inline constexpr double kappa = 1.4;                   ///< cp / cv
inline constexpr double R = 8.31446261815324 / 0.028;  ///< J/(kg K)
inline constexpr double cp = 3.5 * R, cv = 2.5 * R;    ///< J/(kg K)
inline constexpr double atmosphere = 1e5;              ///< Pa
inline constexpr double gravity = 10.0;                ///< m/s2
inline constexpr double zero_of_enthalpy = 298.15;     ///< K

/// Choked mass flow per effective area, kg/(s m2).
inline double choked_flux(double p, double T) {
  return p * std::sqrt(kappa / (R * T)) * std::pow(2.0 / (kappa + 1.0), (kappa + 1.0) / (2.0 * (kappa - 1.0)));
}
}  // namespace perfect

/// A model of the perfect gas; `rest` has everything from `gas_spaces` on.
inline std::string perfect_model(const std::string& rest) {
  return "gaskettle: 1\n"
         "gases: {perfect: {molar_mass: 28 g/mol, cp: 29.10061916353634 J/mol/K}}\n"
         "surroundings: {temperature: 300 K, pressure: 100 kPa abs, gravity: 10 m/s2, gas: perfect}\n" +
         rest;
}

inline Approx within(double value, double relative) { return Approx(value).epsilon(relative).margin(0.0); }
inline Approx near(double value, double absolute) { return Approx(value).epsilon(0.0).margin(absolute); }

/// What every complete run keeps: closed ledgers (bound 1e-10 at any tolerance) and no mechanism that destroys entropy.
inline void check_books(const ModelRun& run) {
  CHECK(run.result.ending.complete());
  CHECK(run.result.books.closure_energy <= closure_bound);
  CHECK(run.result.books.closure_mass <= closure_bound);
  for (const double s : run.result.books.entropy) CHECK(s >= -1e-8 * run.result.books.generated - 1e-12);
}

/// Value at a time just after what happens then: the last row that stands no later.
inline double value_after(const ModelRun& run, const std::string& channel, double t) {
  const auto later = std::upper_bound(run.time.begin(), run.time.end(), t);
  return run[channel][static_cast<std::size_t>(later - run.time.begin()) - 1];
}

}  // namespace gaskettle::testing
