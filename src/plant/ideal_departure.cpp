#include "plant/ideal_departure.h"

#include <fmt/format.h>

#include <cmath>

#include "gas/catalogue.h"

namespace gaskettle {

IdealDeparture::IdealDeparture(const Composition& composition) {
  for (const auto& [name, x] : composition) {
    const auto species = find_gas(name);
    if (!species || !species->critical) {
      known_ = false;
      return;
    }
    critical_temperature_ += x * species->critical->temperature;
    critical_pressure_ += x * species->critical->pressure;
    acentric_ += x * species->critical->acentric_factor;
  }
}

double IdealDeparture::at(double temperature, double pressure) const {
  if (!known_ || !(temperature > 0.0)) return 0.0;
  const double tr = temperature / critical_temperature_, pr = pressure / critical_pressure_;
  const double b0 = 0.083 - 0.422 / std::pow(tr, 1.6), b1 = 0.139 - 0.172 / std::pow(tr, 4.2);
  return std::abs((b0 + acentric_ * b1) * pr / tr);
}

std::string departure_text(double departure) {
  if (departure > departure_beyond_estimate) return "far from an ideal gas, or a liquid: do not trust this model of it";
  return fmt::format("the ideal gas is off by about {:.1f} % (|Z - 1| by the second virial coefficient)",
                     100.0 * departure);
}

}  // namespace gaskettle
