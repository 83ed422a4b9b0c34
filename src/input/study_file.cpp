#include "input/study_file.h"

#include <fmt/format.h>
#include <fmt/ranges.h>

#include <filesystem>
#include <optional>

#include "input/overrides.h"
#include "input/yaml_reader.h"

namespace gaskettle {
namespace {

constexpr const char* format_version = "1";
const std::vector<std::string> study_keys = {"gaskettle", "model", "set", "sweep", "spread", "keep"};

struct ReadFile {
  std::string text;
  Node root;
};

// The tree of a file, or nothing where it could not be followed or is no map.
// `place` is where the file was asked for; none on the command line.
std::optional<ReadFile> read_map(const std::string& path, Place place, Problems& problems) {
  auto text = read_text_file(path, std::move(place), problems);
  if (!text) return std::nullopt;
  ReadFile file{*text, read_yaml_text(*text, path, problems)};
  if (file.root.is_map()) return file;
  if (file.root.is_list() || file.root.is_scalar())
    problems.add(file.root.place, "this is no model: a model file is a map of keys that begins with 'gaskettle: 1'");
  return std::nullopt;
}

void check_version(const Node& root, Problems& problems) {
  const Node* version = root.find("gaskettle");
  if (!version)
    problems.add(root.place, "the version of the model format is missing; write 'gaskettle: 1' as the first line");
  else if (!version->is_scalar() || version->text != format_version)
    problems.add(version->place, fmt::format("this program reads version {} of the model format: 'gaskettle: {}'",
                                             format_version, format_version));
}

void check_keys(const Node& config, Problems& problems) {
  for (const Node::Entry& e : config.entries) {
    bool known = false;
    for (const std::string& key : study_keys) known = known || key == e.key;
    if (known) continue;
    const std::string near = nearest_name(e.key, study_keys);
    const std::string right = near.empty() ? fmt::format("its keys are {}", fmt::join(study_keys, ", "))
                                           : fmt::format("did you mean '{}'?", near);
    problems.add(e.key_place,
                 fmt::format("unknown key '{}' in a study file (one that names a 'model'); {}", e.key, right));
  }
}

// A setting of the study as it stands, if it is of the right kind.
Node setting(const Node& config, const std::string& key, Node::Kind kind, Problems& problems) {
  const Node* node = config.find(key);
  if (!node) return {};
  if (node->kind == kind) return *node;
  problems.add(node->place, kind == Node::Kind::map ? fmt::format("'{}' takes a map of paths and what they do", key)
                                                    : fmt::format("'{}' takes a list of channels", key));
  return {};
}

// The path of the model as messages show it; empty and a problem where there is none.
std::string model_path_of(const Node& config, const std::string& config_path, Problems& problems) {
  const Node& model = *config.find("model");
  if (!model.is_scalar() || model.text.empty()) {
    problems.add(model.place, "'model' takes the path of a model file, relative to the folder of this file");
    return {};
  }
  return (std::filesystem::path(config_path).parent_path() / model.text).lexically_normal().string();
}

void apply(LoadedModel& loaded, const Override& change, Problems& problems) {
  if (loaded.root.is_map()) apply_override(loaded.root, change.path, change.value, change.place, problems);
  loaded.overrides.emplace_back(change.path, change.text);
}

void apply_config_set(LoadedModel& loaded, const Node& config, Problems& problems) {
  const Node set = setting(config, "set", Node::Kind::map, problems);
  for (const Node::Entry& e : set.entries) {
    if (e.value.kind == Node::Kind::null)
      problems.add(e.key_place, fmt::format("a value is due after '{}:'", e.key));
    else
      apply(loaded, {e.key, flow_text(e.value), e.value, e.key_place}, problems);
  }
}

// The model a study file names, with its overrides; the other settings are kept as they stand.
void load_named_model(LoadedModel& loaded, const Node& config, Problems& problems) {
  check_keys(config, problems);
  loaded.sweep = setting(config, "sweep", Node::Kind::map, problems);
  loaded.spread = setting(config, "spread", Node::Kind::map, problems);
  loaded.keep = setting(config, "keep", Node::Kind::list, problems);
  loaded.model_path = model_path_of(config, loaded.config_path, problems);
  if (loaded.model_path.empty()) return;
  const Place asked = config.find("model")->place;
  auto model = read_map(loaded.model_path, asked, problems);
  if (!model) return;
  loaded.model_text = std::move(model->text);
  if (model->root.find("model")) {
    problems.add(asked, fmt::format("'{}' names a model itself; a study file names a model, not another study file",
                                    loaded.model_path));
    return;
  }
  check_version(model->root, problems);
  loaded.root = std::move(model->root);
  apply_config_set(loaded, config, problems);
}

}  // namespace

LoadedModel load_model(const std::string& path, const std::vector<std::string>& set_arguments, Problems& problems) {
  LoadedModel loaded;
  auto file = read_map(path, {}, problems);
  if (file) {
    check_version(file->root, problems);
    if (file->root.find("model")) {
      loaded.config_path = path;
      loaded.config_text = std::move(file->text);
      load_named_model(loaded, file->root, problems);
    } else {
      loaded.model_path = path;
      loaded.model_text = std::move(file->text);
      loaded.root = std::move(file->root);
    }
  }
  for (const std::string& argument : set_arguments)
    if (const auto change = parse_override(argument, problems)) apply(loaded, *change, problems);
  return loaded;
}

}  // namespace gaskettle
