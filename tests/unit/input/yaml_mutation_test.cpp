// A damaged model gives a tree or problems with a place; never a crash, never silence.
#include <catch2/catch.hpp>
#include <random>

#include "input/overrides.h"
#include "input/yaml_reader.h"

using namespace gaskettle;

namespace {
const std::string model = R"(gaskettle: 1
title: "Bake-out chamber, first warm-up"
notes: |
  Measured at the works:
    20 °C, 9 bar
surroundings: {temperature: 20 degC, pressure: 1013 hPa abs}
gas_spaces:
  chamber:
    shape: {cylinder: {bore: 600 mm, length: 1.8 m}}
    gas: {nitrogen: 0.79, oxygen: 0.21}
walls:
  shell:
    around: chamber
    layers:
      - &steel {material: carbon_steel, thickness: 10 mm}
      - {material: mineral_wool, thickness: 50 mm}
      - *steel
    inside: {film: 'stirred'}   # comment
ports:
  fill: {to: chamber, opening: {schedule: [[0 s, 0], [10 s, 1]]}}
pistons: {}
run: {until: 4 h, record_every: 1 s}
)";

bool same(const Node& a, const Node& b) {
  if (a.kind != b.kind || a.text != b.text || a.items.size() != b.items.size()) return false;
  if (a.entries.size() != b.entries.size()) return false;
  for (std::size_t i = 0; i < a.items.size(); ++i)
    if (!same(a.items[i], b.items[i])) return false;
  for (std::size_t i = 0; i < a.entries.size(); ++i)
    if (a.entries[i].key != b.entries[i].key || !same(a.entries[i].value, b.entries[i].value)) return false;
  return true;
}

std::string mutated(std::mt19937& random) {
  static const std::string pieces[] = {"[",  "]",  "{",     "}",     ": ", "- ",   "? ", "\n", "  ",
                                       "\t", "\"", "'",     "&a ",   "*a", "!x ",  "|",  ">",  "#",
                                       "%",  "@",  "---\n", "...\n", ",",  "<<: ", "\\", "~",  "\r"};
  std::string text = model;
  for (unsigned changes = 1 + random() % 4; changes > 0; --changes) {
    const std::size_t at = random() % text.size();
    switch (random() % 5) {
      case 0:
        text.erase(at, 1 + random() % 20);
        break;
      case 1:
        text.insert(at, pieces[random() % std::size(pieces)]);
        break;
      case 2:
        text[at] = static_cast<char>(random() % 256);
        break;
      case 3:
        text.insert(at, text.substr(random() % text.size(), random() % 60));
        break;
      default:
        text.resize(at);
        break;
    }
    if (text.empty()) text.push_back(' ');
  }
  return text;
}
}  // namespace

TEST_CASE("3000 damaged models give a tree or problems with a place") {
  std::mt19937 random(20240607);
  for (int i = 0; i < 3000; ++i) {
    const std::string text = mutated(random);
    Problems problems;
    const Node root = read_yaml_text(text, "m.yaml", problems);
    if (problems.empty()) {
      // And what is recorded of a tree reads back as that tree.
      if (same(read_yaml_text(flow_text(root), "again", problems), root) && problems.empty()) continue;
      INFO(text << "\n" << flow_text(root) << "\n" << problems.text());
      FAIL("flow text is another tree");
    }
    for (const Problem& p : problems.sorted()) {
      const bool placed = p.place.file && *p.place.file == "m.yaml" && p.place.line > 0 && p.place.column > 0;
      if (placed && !p.message.empty()) continue;
      INFO(text << "\n" << p.message);
      FAIL("a problem without a place");
    }
  }
}

TEST_CASE("every beginning of a model gives a tree or problems") {
  for (std::size_t length = 0; length <= model.size(); ++length) {
    Problems problems;
    const Node root = read_yaml_text(model.substr(0, length), "m.yaml", problems);
    INFO("after " << length << " bytes");
    CHECK((root.kind != Node::Kind::missing || !problems.empty()));
  }
}
