/// What a gas is made of, as written in a model.
#pragma once
#include "model/layout.h"

namespace gaskettle {

/// Reads a gas: a name, or a map of mole fractions that add to 1. Reports unknown
/// names with the nearest known one. `fallback` empty: required.
Composition read_composition(Section& section, const std::string& key, const std::string& meaning,
                             const std::string& fallback = "");

}  // namespace gaskettle
