/// A plant laid out from model text, for tests that look inside.
#pragma once
#include <memory>
#include <stdexcept>
#include <string>
#include <vector>

#include "input/yaml_reader.h"
#include "plant/plant.h"

namespace gaskettle::testing {

/// Throws std::runtime_error with the problems where the model is refused.
struct PlantOf {
  explicit PlantOf(const std::string& yaml) : root(read_yaml_text(yaml, "model.yaml", problems)) {
    plant = std::make_unique<Plant>(read_model(root, context), context);
    if (!problems.empty()) throw std::runtime_error(problems.text());
  }
  Problems problems;
  ReadContext context{problems};
  Node root;
  std::unique_ptr<Plant> plant;
};

}  // namespace gaskettle::testing
