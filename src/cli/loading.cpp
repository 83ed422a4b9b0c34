#include "cli/loading.h"

namespace gaskettle {

std::unique_ptr<Loaded> load_plant(const std::string& file, const std::vector<std::string>& set) {
  auto loaded = std::make_unique<Loaded>();
  loaded->source = load_model(file, set, loaded->problems);
  if (!loaded->source.root.is_map()) {
    if (loaded->problems.empty()) loaded->problems.add({}, file + ": there is no model in this file");
    return loaded;
  }
  loaded->context = std::make_unique<ReadContext>(loaded->problems);
  Model model = read_model(loaded->source.root, *loaded->context);
  try {
    auto plant = std::make_unique<Plant>(std::move(model), *loaded->context);
    if (loaded->problems.empty()) loaded->plant = std::move(plant);
  } catch (const std::exception& e) {
    // After a reported problem this is only its echo.
    if (loaded->problems.empty()) loaded->problems.add(loaded->source.root.place, e.what());
  }
  return loaded;
}

}  // namespace gaskettle
