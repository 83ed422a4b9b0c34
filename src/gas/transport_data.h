/// Published viscosity and conductivity fits, as printed (units in the .cpp).
#pragma once
#include <span>

namespace gaskettle {

enum class TransportKind { viscosity, conductivity };

struct NasaTransportRow {
  const char* gas;
  TransportKind kind;
  double lowest, highest;  ///< K
  double a, b, c, d;
};

struct HandbookTransportRow {
  const char* gas;
  TransportKind kind;
  double lowest, highest;  ///< K
  double c1, c2, c3, c4;
};

std::span<const NasaTransportRow> nasa_transport();
std::span<const HandbookTransportRow> handbook_transport();

}  // namespace gaskettle
