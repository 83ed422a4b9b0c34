/// The models of the models/ folder, compiled in.
#pragma once
#include <string_view>
#include <vector>

namespace gaskettle {

struct ShippedModel {
  std::string_view name, text;
};
const std::vector<ShippedModel>& shipped_models();

}  // namespace gaskettle
