#include "laws/radiation.h"

#include <stdexcept>
#include <string>

namespace gaskettle {

void check_emissivity(double emissivity, const char* what) {
  if (!(emissivity >= 0.0 && emissivity <= 1.0))
    throw std::invalid_argument(std::string(what) + " is " + std::to_string(emissivity) + "; it must be from 0 to 1");
}

}  // namespace gaskettle
