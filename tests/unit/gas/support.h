/// What the tests of the gas floor share.
#pragma once
#include <random>
#include <string>
#include <vector>

#include "gas/catalogue.h"
#include "gas/mixture.h"

namespace gaskettle {

inline Species gas(const std::string& name) { return find_gas(name).value(); }

inline GasMixture mixture_of(const std::vector<std::string>& names) {
  std::vector<Species> all;
  for (const std::string& n : names) all.push_back(gas(n));
  return GasMixture(all);
}

/// Five gases, light and heavy, one of one's own.
inline GasMixture five_gases() {
  return GasMixture({gas("nitrogen"), gas("helium"), gas("propane"), gas("sulfur_hexafluoride"),
                     constant_cp_gas("mine", 0.030, 1200.0, 1.5e-5, 0.02)});
}

/// Seeded, so that a failure can be repeated; the distribution is our own arithmetic.
class Draw {
public:
  double operator()(double low, double high) {
    return low + (high - low) * (static_cast<double>(engine_()) / 4294967296.0);
  }

private:
  std::mt19937 engine_{20240229u};
};

}  // namespace gaskettle
