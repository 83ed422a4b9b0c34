/// From a file on disk to a plant, with every problem printed.
#pragma once
#include <memory>
#include <string>
#include <vector>

#include "input/study_file.h"
#include "plant/plant.h"

namespace gaskettle {

/// A loaded model and its plant; `plant` is null where there were problems, which then stand in `problems_text`.
struct Loaded {
  Problems problems;
  std::unique_ptr<ReadContext> context;
  LoadedModel source;
  std::unique_ptr<Plant> plant;
};

/// Reads, checks and lays out; never throws for what a user may have written.
std::unique_ptr<Loaded> load_plant(const std::string& file, const std::vector<std::string>& set);

}  // namespace gaskettle
