/// What every answer says about what it is not.
#pragma once
#include <string>
#include <vector>

#include "plant/plant.h"

namespace gaskettle {

/// The cautions that apply to a plant, the general one first. They stand in every printed
/// answer, in its JSON and in the record.
std::vector<std::string> cautions(const Plant& plant);

}  // namespace gaskettle
