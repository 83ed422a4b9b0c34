/// What a plant is in numbers, before it runs: the answer of `check`.
#pragma once
#include <string>

#include "plant/plant.h"

namespace gaskettle {

/// Text: cautions, figures of each part, time constants, stored energy, defaults in use,
/// and what looks wrong. The plant must have been laid out without problems.
std::string facts_text(Plant& plant, const std::string& model_file);
/// The same as one JSON object, SI units inside.
std::string facts_json(Plant& plant, const std::string& model_file);

}  // namespace gaskettle
