/// Changes of a model by path: `heaters.element.rating`, `walls.shell.layers.1.thickness`.
#pragma once
#include <optional>
#include <string>

#include "base/problems.h"
#include "model/document.h"

namespace gaskettle {

/// One change as asked for.
struct Override {
  std::string path;  ///< keys and list numbers (from 0), joined by dots; a key with a dot in it cannot be reached
  std::string text;  ///< the value as written
  Node value;
  Place place;  ///< where the path stands
};

/// Reads `PATH=VALUE` of the command line; VALUE is YAML, so lists and maps work:
/// `ports.fill.opening={schedule: [[0 s, 0], [1 s, 1]]}`. Places are `--set PATH:line:column`
/// of VALUE. Nothing, and a problem, where it is not of that form.
std::optional<Override> parse_override(const std::string& argument, Problems& problems);

/// Puts `value` at `path`. The last key may be new (one that the model leaves to its
/// default); all before it must be there, and so must a list item. Otherwise a problem at `place`,
/// with the nearest name, and `root` stays as it was. The format version cannot be set.
void apply_override(Node& root, const std::string& path, const Node& value, Place place, Problems& problems);

/// A tree on one line, in YAML's flow style, that reads back as the same tree (apart from
/// places, and from quotes where flow style needs them). For what is recorded of an override.
std::string flow_text(const Node& node);

}  // namespace gaskettle
