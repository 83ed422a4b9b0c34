// What a YAML text becomes, and the places of its parts.
#include <catch2/catch.hpp>

#include "input/yaml_reader.h"

using namespace gaskettle;

namespace {
Node good(const std::string& text) {
  Problems problems;
  Node root = read_yaml_text(text, "m.yaml", problems);
  INFO(text << "\n" << problems.text());
  REQUIRE(problems.empty());
  return root;
}
const Node::Entry& entry(const Node& map, const std::string& key) {
  for (const Node::Entry& e : map.entries)
    if (e.key == key) return e;
  throw std::runtime_error("no key " + key);
}
}  // namespace

TEST_CASE("keys and values carry their line and column, counted from 1") {
  const Node root = good(
      "# comment\ngaskettle: 1\nheaters:\n  element: {in: chamber, rating: 6 kW}\n"
      "list:\n  - a\n  - [b, c]\n");
  CHECK(root.kind == Node::Kind::map);
  CHECK(root.place.text() == "m.yaml:2:1");
  CHECK(root.keys() == std::vector<std::string>{"gaskettle", "heaters", "list"});
  CHECK(entry(root, "gaskettle").key_place.text() == "m.yaml:2:1");
  CHECK(entry(root, "gaskettle").value.place.text() == "m.yaml:2:12");
  const Node& element = *root.find("heaters")->find("element");
  CHECK(element.place.text() == "m.yaml:4:12");
  CHECK(entry(element, "rating").key_place.text() == "m.yaml:4:26");
  CHECK(entry(element, "rating").value.place.text() == "m.yaml:4:34");
  CHECK(element.find("rating")->text == "6 kW");
  const Node& list = *root.find("list");
  REQUIRE(list.items.size() == 2);
  CHECK(list.place.text() == "m.yaml:6:3");
  CHECK(list.items[0].place.text() == "m.yaml:6:5");
  CHECK(list.items[1].items[1].place.text() == "m.yaml:7:9");
}

TEST_CASE("columns count characters, not bytes") {
  // Before the value: 4 characters of 7 bytes (é, °, colon, blank), then in the map one more two-byte character.
  const Node root = good("é°: ü\nb: {µ: 20 °C, k: 1}\n");
  CHECK(entry(root, "é°").value.place.text() == "m.yaml:1:5");
  CHECK(entry(*root.find("b"), "k").key_place.text() == "m.yaml:2:15");
}

TEST_CASE("a byte order mark and other line breaks change no place") {
  for (const std::string text : {"a: 1\nb: 2\n",
                                 "\xEF\xBB\xBF"
                                 "a: 1\r\nb: 2\r\n",
                                 "a: 1\rb: 2\r"}) {
    const Node root = good(text);
    CHECK(root.place.text() == "m.yaml:1:1");
    CHECK(entry(root, "b").value.place.text() == "m.yaml:2:4");
    CHECK(root.find("b")->text == "2");
  }
}

TEST_CASE("values stay text, and quotes are remembered") {
  const Node root = good("a: 010\nb: .nan\nc: no\nd: 'no'\ne: \"x\\ty\"\nf: |\n  two\n  lines\ng: ''\n");
  CHECK(root.find("a")->text == "010");
  CHECK(root.find("b")->text == ".nan");
  CHECK(root.find("c")->text == "no");
  CHECK_FALSE(root.find("c")->quoted);
  CHECK(root.find("d")->quoted);
  CHECK(root.find("e")->text == "x\ty");
  CHECK(root.find("f")->text == "two\nlines\n");
  CHECK(root.find("g")->is_scalar());
}

TEST_CASE("an empty value stands at its key, an empty item at its list") {
  const Node root = good("a:\nb: ~\nc:\n  -\n  - null\n  - x\nd: {e: , f}\nlast:\n");
  CHECK(root.find("a")->kind == Node::Kind::null);
  CHECK(root.find("a")->place.text() == "m.yaml:1:1");
  CHECK(root.find("b")->place.text() == "m.yaml:2:4");
  CHECK(root.find("c")->items[0].kind == Node::Kind::null);
  CHECK(root.find("c")->items[0].place.text() == "m.yaml:4:3");
  CHECK(root.find("c")->items[1].place.text() == "m.yaml:5:5");
  CHECK(root.find("d")->find("e")->place.text() == "m.yaml:7:5");
  CHECK(root.find("d")->find("f")->kind == Node::Kind::null);
  CHECK(root.find("last")->place.text() == "m.yaml:8:1");
}

TEST_CASE("a last line without a line break is a line") {
  CHECK(good("a: 1\nlast:").find("last")->kind == Node::Kind::null);
  CHECK(good("last:").find("last")->place.text() == "m.yaml:1:1");
  CHECK(good("a: 'x'").find("a")->text == "x");
}

TEST_CASE("an alias repeats the value and the place of its anchor") {
  const Node root = good("a: &film {inside: 5}\nb: *film\nc: [*film, &t 'x', *t]\n");
  CHECK(root.find("b")->find("inside")->text == "5");
  CHECK(root.find("b")->place.text() == "m.yaml:1:4");
  CHECK(root.find("c")->items[0].find("inside")->place.text() == "m.yaml:1:19");
  CHECK(root.find("c")->items[2].quoted);
}

TEST_CASE("one document may have its markers") { CHECK(good("---\na: 1\n...\n").find("a")->text == "1"); }
