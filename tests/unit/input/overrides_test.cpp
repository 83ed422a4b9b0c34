// Changes by path, from the command line and from a tree.
#include "input/overrides.h"

#include <catch2/catch.hpp>

#include "input/yaml_reader.h"

using namespace gaskettle;
using Catch::Contains;

namespace {
Node model() {
  Problems problems;
  Node root = read_yaml_text(
      "gaskettle: 1\nheaters:\n  element: {rating: 6 kW}\nwalls:\n  shell:\n    layers:\n"
      "      - {thickness: 10 mm}\n      - {thickness: 50 mm}\npistons: {}\nbodies:\n",
      "m.yaml", problems);
  REQUIRE(problems.empty());
  return root;
}

// Sets, and returns what was reported.
std::string set(Node& root, const std::string& argument) {
  Problems problems;
  if (const auto change = parse_override(argument, problems))
    apply_override(root, change->path, change->value, change->place, problems);
  return problems.text();
}
std::string refused(const std::string& argument) {
  Node root = model();
  const std::string before = flow_text(root);
  const std::string text = set(root, argument);
  CHECK(flow_text(root) == before);
  return text;
}
}  // namespace

TEST_CASE("a path sets a value, a list item, a whole section or a key left to its default") {
  Node root = model();
  CHECK(set(root, "heaters.element.rating=8 kW").empty());
  CHECK(root.find("heaters")->find("element")->find("rating")->text == "8 kW");
  CHECK(root.find("heaters")->find("element")->find("rating")->place.text() == "--set heaters.element.rating:1:1");
  CHECK(set(root, " walls.shell.layers.1.thickness = 70 mm ").empty());
  CHECK(flow_text(*root.find("walls")) == "{shell: {layers: [{thickness: 10 mm}, {thickness: 70 mm}]}}");
  CHECK(set(root, "heaters.element.conductance=12 W/K").empty());
  CHECK(root.find("heaters")->find("element")->entries[1].key_place.text() == "--set heaters.element.conductance:1:1");
  CHECK(set(root, "walls.shell.layers.0={material: brass}").empty());
  CHECK(set(root, "pistons.ram={bore: 200 mm}").empty());
  CHECK(set(root, "bodies.rack={mass: 40 kg}").empty());
  CHECK(flow_text(*root.find("bodies")) == "{rack: {mass: 40 kg}}");
  CHECK(set(root, "surroundings={temperature: 10 degC}").empty());
  CHECK(root.find("surroundings")->find("temperature")->place.text() == "--set surroundings:1:15");
}

TEST_CASE("a value may be a list or a map, hold an equals sign, or be negative") {
  Problems problems;
  const auto change = parse_override("ports.fill.opening={schedule: [[0 s, 0],[1 s,1]]}", problems);
  REQUIRE(change);
  CHECK(change->path == "ports.fill.opening");
  CHECK(flow_text(change->value) == "{schedule: [[0 s, 0], [1 s, 1]]}");
  CHECK(parse_override("title='a=b'", problems)->value.text == "a=b");
  CHECK(parse_override("heaters.element.rating=-5 kW", problems)->value.text == "-5 kW");
  CHECK(parse_override("walls.shell.outside.emissivity=5 %", problems)->value.text == "5 %");
  CHECK(problems.empty());
}

TEST_CASE("a path that leads nowhere is refused with the nearest name") {
  CHECK(refused("heters.element.rating=8 kW") ==
        "--set heters.element.rating:1:1: error: cannot set 'heters.element.rating': the model has no 'heters'; "
        "did you mean 'heaters'?\n");
  CHECK_THAT(refused("heaters.elment.rating=8 kW"), Contains("'heaters' has no 'elment'; did you mean 'element'?"));
  CHECK_THAT(refused("heaters.q.rating=8 kW"), Contains("it has: element; to add it, set 'heaters.q' as a whole"));
  CHECK_THAT(refused("pistons.ram.at=1 m"), Contains("'pistons' has no 'ram'; it is empty"));
  CHECK_THAT(refused("heaters.element.rating.x=1"), Contains("'heaters.element.rating' is the value '6 kW'"));
  for (const char* item : {"2", "-1", "one", "1x", "99999999999999999999", "01x"})
    CHECK_THAT(refused(std::string("walls.shell.layers.") + item + "={material: brass}"),
               Contains("its items are 0 to 1"));
}

TEST_CASE("what is not PATH=VALUE is refused") {
  CHECK_THAT(refused("heaters.element.rating"), Contains("is not PATH=VALUE"));
  CHECK_THAT(refused("=8 kW"), Contains("is not PATH=VALUE"));
  CHECK_THAT(refused(""), Contains("is not PATH=VALUE"));
  CHECK_THAT(refused("heaters.element.rating= "), Contains("a value is due"));
  CHECK_THAT(refused("heaters.element.rating=~"), Contains("nothing in it"));
  CHECK_THAT(refused("heaters..rating=1"), Contains("single dots"));
  CHECK_THAT(refused(".heaters=1"), Contains("single dots"));
  CHECK_THAT(refused("gaskettle=2"), Contains("version"));
  CHECK_THAT(refused("heaters.element.rating=[1"), Contains("--set heaters.element.rating:1:") && Contains("'['"));
}

TEST_CASE("flow text quotes what flow style would misread") {
  Problems problems;
  const std::string text = "a: [x, 'y, z', \"q\\\"\\\\\", '', 'null', ~, '- d', 'e: f', '#g', ' h ']\n'&k': {}\n";
  const Node root = read_yaml_text(text, "m", problems);
  const Node again = read_yaml_text(flow_text(root), "m", problems);
  CHECK(problems.empty());
  CHECK(flow_text(root) == flow_text(again));
  CHECK(again.find("a")->items[2].text == "q\"\\");
  CHECK(again.find("a")->items[4].is_scalar());
  CHECK(again.find("&k") != nullptr);
}
