/// From a path on the command line to one model tree: a model file as it is, or a study
/// file (a second file that names its model) with its overrides applied.
#pragma once
#include <string>
#include <utility>
#include <vector>

#include "base/problems.h"
#include "model/document.h"

namespace gaskettle {

/// A model ready to be read, and all that is needed to say later what was read.
struct LoadedModel {
  Node root;                ///< the model, overrides applied
  std::string model_path;   ///< as messages show it
  std::string config_path;  ///< of the study file; empty without one
  std::string model_text;   ///< byte for byte as read
  std::string config_text;
  std::vector<std::pair<std::string, std::string>> overrides;  ///< path and value text, in the order applied
  /// Study settings, not read yet; Node::Kind::missing where the study file has none.
  Node sweep;   ///< a map
  Node spread;  ///< a map
  Node keep;    ///< a list
};

/// Loads a model or study file. A file is a study file if its top level has the key
/// `model` (relative to the folder of the study file). Its `set:` comes first, then `set_arguments` (`PATH=VALUE`
/// each). Checks `gaskettle: 1` and the top keys of a study file; the keys of a model are for its reader. All that is
/// wrong goes to `problems`; the result is of use only if nothing was added.
LoadedModel load_model(const std::string& path, const std::vector<std::string>& set_arguments, Problems& problems);

}  // namespace gaskettle
