// Models and study files from disk.
#include "input/study_file.h"

#include <unistd.h>

#include <catch2/catch.hpp>
#include <filesystem>
#include <fstream>

#include "input/overrides.h"

using namespace gaskettle;
using Catch::Contains;
namespace fs = std::filesystem;

namespace {
// models/ and configs/ side by side in a folder that goes away with the test.
class Folder {
public:
  Folder() : root_(fs::temp_directory_path() / ("gaskettle_study_" + std::to_string(getpid()))) {
    fs::create_directories(root_ / "models");
    fs::create_directories(root_ / "configs");
    write("models/m.yaml", "gaskettle: 1\nheaters:\n  element: {rating: 6 kW}\n");
  }
  Folder(const Folder&) = delete;
  Folder& operator=(const Folder&) = delete;
  ~Folder() { fs::remove_all(root_); }
  std::string write(const std::string& name, const std::string& text) const {
    std::ofstream(root_ / name, std::ios::binary) << text;
    return path(name);
  }
  std::string path(const std::string& name) const { return (root_ / name).string(); }

private:
  fs::path root_;
};

std::string problems_of(const std::string& path, const std::vector<std::string>& set = {}) {
  Problems problems;
  load_model(path, set, problems);
  return problems.text();
}
std::string rating(const LoadedModel& loaded) {
  return loaded.root.find("heaters")->find("element")->find("rating")->text;
}
}  // namespace

TEST_CASE("a model file is loaded as it stands") {
  const Folder folder;
  Problems problems;
  const LoadedModel loaded = load_model(folder.path("models/m.yaml"), {}, problems);
  REQUIRE(problems.empty());
  CHECK(rating(loaded) == "6 kW");
  CHECK(loaded.model_path == folder.path("models/m.yaml"));
  CHECK(loaded.model_text == "gaskettle: 1\nheaters:\n  element: {rating: 6 kW}\n");
  CHECK(loaded.config_path.empty());
  CHECK(loaded.overrides.empty());
  CHECK(loaded.sweep.kind == Node::Kind::missing);
}

TEST_CASE("a study file finds its model from its own folder, and the command line has the last word") {
  const Folder folder;
  const std::string config = folder.write("configs/c.yaml",
                                          "gaskettle: 1\nmodel: ../models/m.yaml\n"
                                          "set: {heaters.element.rating: 8 kW, run: {until: 4 h}}\n"
                                          "sweep: {heaters.element.rating: {values: [4 kW]}}\n"
                                          "spread: {samples: 8}\nkeep: [chamber.temperature]\n");
  Problems problems;
  const LoadedModel plain = load_model(config, {}, problems);
  INFO(problems.text());
  REQUIRE(problems.empty());
  CHECK(rating(plain) == "8 kW");
  CHECK(plain.root.find("heaters")->find("element")->find("rating")->place.text() == config + ":3:31");
  CHECK(plain.model_path == folder.path("models/m.yaml"));
  CHECK(plain.config_path == config);
  CHECK_THAT(plain.config_text, Catch::StartsWith("gaskettle: 1\nmodel:"));
  CHECK(flow_text(plain.sweep) == "{heaters.element.rating: {values: [4 kW]}}");
  CHECK(plain.spread.find("samples")->text == "8");
  CHECK(plain.keep.items.size() == 1);

  const LoadedModel set = load_model(config, {"heaters.element.rating=9 kW"}, problems);
  REQUIRE(problems.empty());
  CHECK(rating(set) == "9 kW");
  using Pairs = std::vector<std::pair<std::string, std::string>>;
  CHECK(set.overrides ==
        Pairs{{"heaters.element.rating", "8 kW"}, {"run", "{until: 4 h}"}, {"heaters.element.rating", "9 kW"}});
}

TEST_CASE("a relative path works from the current folder and an absolute one anywhere") {
  const Folder folder;
  folder.write("configs/c.yaml", "gaskettle: 1\nmodel: ../models/m.yaml\n");
  folder.write("configs/absolute.yaml", "gaskettle: 1\nmodel: " + folder.path("models/m.yaml") + "\n");
  const fs::path before = fs::current_path();
  fs::current_path(folder.path("configs"));
  Problems problems;
  const LoadedModel loaded = load_model("c.yaml", {}, problems);
  const LoadedModel absolute = load_model("absolute.yaml", {}, problems);
  fs::current_path(before);
  CHECK(problems.empty());
  CHECK(loaded.model_path == "../models/m.yaml");
  CHECK(absolute.model_path == folder.path("models/m.yaml"));
}

TEST_CASE("the version of the format is asked for in both files") {
  const Folder folder;
  const std::string old = folder.write("models/old.yaml", "gaskettle: 2\n");
  const std::string bare = folder.write("models/bare.yaml", "# first\ntitle: x\n");
  CHECK_THAT(problems_of(old), Catch::StartsWith(old + ":1:12: error: this program reads version 1"));
  CHECK_THAT(problems_of(bare), Catch::StartsWith(bare + ":2:1: error: the version of the model format is missing"));
  const std::string config = folder.write("configs/c.yaml", "model: ../models/old.yaml\n");
  CHECK_THAT(problems_of(config), Contains(config + ":1:1: error: the version") && Contains(old + ":1:12:"));
}

TEST_CASE("a study file is refused where it is wrong, all in one pass") {
  const Folder folder;
  const std::string config =
      folder.write("configs/c.yaml",
                   "gaskettle: 1\nmodel: ../models/m.yaml\nsett: {}\nheaters: {}\n"
                   "set: {heaters.elment.rating: 8 kW, run: }\nsweep: [1]\nspread: 3\nkeep: {}\n");
  const std::string text = problems_of(config);
  CHECK_THAT(text, Contains(config + ":3:1: error: unknown key 'sett'") && Contains("did you mean 'set'?"));
  CHECK_THAT(text,
             Contains(config + ":4:1: error: unknown key 'heaters'") && Contains("its keys are gaskettle, model"));
  CHECK_THAT(text, Contains(config + ":5:7: error: cannot set") && Contains("did you mean 'element'?"));
  CHECK_THAT(text, Contains(config + ":5:36: error: a value is due after 'run:'"));
  CHECK_THAT(text, Contains(config + ":6:8: error: 'sweep' takes a map"));
  CHECK_THAT(text, Contains(config + ":7:9: error: 'spread' takes a map"));
  CHECK_THAT(text, Contains(config + ":8:7: error: 'keep' takes a list"));
}

TEST_CASE("a study file without a usable model is refused at that place") {
  const Folder folder;
  const std::string config = folder.path("configs/c.yaml");
  const auto with = [&](const std::string& model) {
    folder.write("configs/c.yaml", "gaskettle: 1\nmodel: " + model + "\n");
    return problems_of(config);
  };
  CHECK_THAT(with("none.yaml"), Catch::StartsWith(config + ":2:8: error: cannot read"));
  CHECK_THAT(with("../models"), Catch::StartsWith(config + ":2:8: error: cannot read") && Contains("folder"));
  CHECK_THAT(with("c.yaml"), Catch::StartsWith(config + ":2:8: error:") && Contains("not another study file"));
  CHECK_THAT(with("''"), Contains(":2:8: error: 'model' takes the path"));
  CHECK_THAT(with("[a]"), Contains(":2:8: error: 'model' takes the path"));
  CHECK_THAT(with(""), Contains(":2:1: error: 'model' takes the path"));
}

TEST_CASE("what is no model is refused, together with wrong arguments") {
  const Folder folder;
  const std::string list = folder.write("models/list.yaml", "- a\n");
  CHECK_THAT(problems_of(list, {"x"}),
             Contains(list + ":1:1: error: this is no model") && Contains("'x' is not PATH=VALUE"));
  CHECK_THAT(problems_of(folder.path("none.yaml")), Contains("cannot read"));
}
