/// Published critical points, as printed.
#pragma once
#include <span>

namespace gaskettle {

struct CriticalRow {
  const char* gas;
  double temperature;      ///< K
  double pressure;         ///< Pa
  double molar_density;    ///< mol/m3
  double acentric_factor;  ///< 1
  const char* source;
};

std::span<const CriticalRow> critical_rows();

}  // namespace gaskettle
