/// Published heat capacity fits, as printed; the catalogue builds species of them.
#pragma once
#include <span>

#include "gas/curves.h"

namespace gaskettle {

struct Nasa9Gas {
  const char* name;
  const char* formula;     ///< empty for air
  const char* other_name;  ///< empty where there is none
  double molar_mass_g;     ///< g/mol
  Nasa9Range lower;        ///< 200 to 1000 K
  Nasa9Range upper;        ///< 1000 to 6000 K
};

std::span<const Nasa9Gas> nasa9_gases();

}  // namespace gaskettle
