// What the reader refuses, where it points and what it says.
#include <fmt/format.h>
#include <sys/stat.h>
#include <unistd.h>

#include <catch2/catch.hpp>
#include <filesystem>
#include <fstream>

#include "input/yaml_reader.h"

using namespace gaskettle;
using Catch::Contains;

namespace {
std::string problems_of(const std::string& text) {
  Problems problems;
  read_yaml_text(text, "m.yaml", problems);
  return problems.text();
}
std::string repeated(const std::string& text, int times) {
  std::string out;
  for (int i = 0; i < times; ++i) out += text;
  return out;
}
}  // namespace

TEST_CASE("a key given twice is refused at the second, the first is named, the rest is kept") {
  Problems problems;
  const Node root = read_yaml_text("a: 1\nb: {c: 1, c: 2}\na: 3\nd: 4\n", "m.yaml", problems);
  CHECK(problems.text() ==
        "m.yaml:2:11: error: the key 'c' stands here a second time; the first is in line 2, column 5\n"
        "m.yaml:3:1: error: the key 'a' stands here a second time; the first is in line 1, column 1\n");
  CHECK(root.keys() == std::vector<std::string>{"a", "b", "d"});
  CHECK(root.find("a")->text == "1");
}

TEST_CASE("what YAML allows and a model has no use for is refused by name") {
  struct Case {
    const char *text, *place, *words;
  };
  const Case cases[] = {
      {"a: 1\n---\nb: 2\n", "m.yaml:2:1:", "second document"},
      {"a: 1\n...\nb: 2\n", "m.yaml:3:1:", "left over"},
      {"x: &m {a: 1}\ny: {<<: *m, b: 2}\n", "m.yaml:2:5:", "write the keys out"},
      {"a: !!python/object:os.system x\n", "m.yaml:1:4:", "tag"},
      {"a: ! x\n", "m.yaml:1:4:", "tag"},
      {"a: !!map {b: 1}\n", "m.yaml:1:4:", "tag"},
      {"a: !\n", "m.yaml:1:4:", "tag"},
      {"a:\n  ? [b]\n  : 1\n", "m.yaml:2:5:", "as a key"},
      {"a: {{b: 1}: 2}\n", "m.yaml:1:5:", "as a key"},
      {"a: {~: 2}\n", "m.yaml:1:5:", "key is missing"},
      {"%YAML 1.2\n---\na: 1\n", "m.yaml:1:1:", "directive"},
      {"a: 1\n%b: 2\n", "m.yaml:2:1:", "directive"},
      {"a:\n\tb: 1\n", "m.yaml:2:1:", "tab"},
      {"a:\n  \tb: 1\n", "m.yaml:2:3:", "tab"},
      {"a: &x [1, *x]\n", "m.yaml:1:11:", "inside the very value"},
  };
  for (const Case& c : cases) {
    const std::string text = problems_of(c.text);
    INFO(c.text);
    CHECK_THAT(text, Catch::StartsWith(c.place));
    CHECK_THAT(text, Contains(c.words));
  }
}

TEST_CASE("text that is not YAML is refused with the place and a plain word") {
  struct Case {
    const char *text, *place, *words;
  };
  const Case cases[] = {
      {"a: [1, 2\nb: 3\n", "m.yaml:2:2:", "'[' is not closed"},
      {"a: {b: 1\n", "m.yaml:2:1:", "'{' is not closed"},
      {"a: {b: 1\n", "m.yaml:2:1:", "it opens in line 1, column 4"},
      {"a: {b: 1}}\n", "m.yaml:1:10:", "nothing opens"},
      {"a:\n  b: 1\n c: 2\n", "m.yaml:3:2:", "indentation"},
      {"a: 1\n  b: 2\n", "m.yaml:2:4:", "no value can begin"},
      {"a: @x\n", "m.yaml:1:4:", "quotes"},
      {"a: *x\n", "m.yaml:1:4:", "'&name'"},
      {"a: \"\\q\"\n", "m.yaml:1:", "escape"},
      // The library takes this for a key without a value: a file cut short would pass.
      {"a: 1\nsurround", "m.yaml:2:1:", "a ':' is missing after 'surround'"},
      {"a:\n  b: 1\n  c\n", "m.yaml:3:3:", "a ':' is missing after 'c'"},
      // The library closes both without a word.
      {"a: 1\nb: \"never closed\n", "m.yaml:2:4:", "never closed"},
      {"b: 'it''s open\n", "m.yaml:1:4:", "never closed"},
  };
  for (const Case& c : cases) {
    const std::string text = problems_of(c.text);
    INFO(c.text);
    CHECK_THAT(text, Catch::StartsWith(c.place));
    CHECK_THAT(text, Contains(c.words));
  }
}

TEST_CASE("bytes that are no text are refused where they stand") {
  const auto at = [](const std::string& bytes) { return problems_of("é: x" + bytes + "y\n"); };
  CHECK_THAT(at(std::string(1, '\0')), Catch::StartsWith("m.yaml:1:5: error: control or invisible character U+0000"));
  for (const char* control : {"\x01", "\x04", "\x1B", "\x7F", "\xC2\x80", "\xEF\xBB\xBF", "\xEF\xBF\xBE"})
    CHECK_THAT(at(control), Catch::StartsWith("m.yaml:1:5: error: control or invisible character"));
  // RFC 3629: stray and missing continuation, overlong, surrogate, beyond U+10FFFF, cut short.
  for (const char* bytes :
       {"\x80", "\xC3", "\xC0\xAF", "\xE0\x80\xAF", "\xED\xA0\x80", "\xF4\x90\x80\x80", "\xFF", "\xE2\x82"})
    CHECK_THAT(at(bytes), Catch::StartsWith("m.yaml:1:5: error: byte 0x"));
  CHECK(at("\xE2\x82\xAC\xF0\x9F\x94\xA5").empty());
  CHECK_THAT(problems_of("a: \"x\\0\"\n"), Contains("m.yaml:1:4: error: this text holds a control"));
  CHECK_THAT(problems_of(std::string("\xFF\xFE"
                                     "a\0:\0",
                                     6)),
             Contains("not UTF-8"));
}

TEST_CASE("an empty text is refused") {
  for (const char* text : {"", "\n\n", "# only this\n", "---\n", "~\n", "\xEF\xBB\xBF"})
    CHECK(problems_of(text) == "m.yaml:1:1: error: there is nothing in it\n");
}

TEST_CASE("depth is bounded at 64 before it costs anything") {
  const auto nested = [](int depth) {
    return fmt::format("a: {}{}\n", repeated("[", depth - 1), repeated("]", depth - 1));
  };
  CHECK(problems_of(nested(64)).empty());
  CHECK_THAT(problems_of(nested(65)), Contains("more than 64 deep"));
  for (const char* opener : {"[", "{", "{a: ", "- ", "? ", "[{", "- ? ", "!a [", "&a ["})
    CHECK_THAT(problems_of(repeated(opener, 100'000)), Contains("m.yaml:1:"));
  std::string steps;
  for (int i = 0; i < 2000; ++i) steps += std::string(static_cast<std::size_t>(i), ' ') + "a:\n";
  CHECK_THAT(problems_of(steps), Catch::StartsWith("m.yaml:65:65: error: maps and lists stand more than 64"));
  // Aliases cannot add up to it either.
  std::string chain = "a0: &a0 " + repeated("[", 40) + repeated("]", 40) + "\na1: " + repeated("[", 40) + "*a0" +
                      repeated("]", 40) + "\n";
  CHECK_THAT(problems_of(chain), Catch::StartsWith("m.yaml:2:45: error: this alias"));
}

TEST_CASE("sizes are bounded") {
  CHECK(problems_of("a: " + std::string(YamlLimits::scalar_bytes, 'x')).empty());
  CHECK_THAT(problems_of("a: " + std::string(YamlLimits::scalar_bytes + 1, 'x')), Contains("m.yaml:1:4:"));
  CHECK_THAT(problems_of(std::string(YamlLimits::text_bytes + 1, '\n')), Contains("longer than 4194304 bytes"));
  CHECK_THAT(problems_of(fmt::format("a: [{}1]\n", repeated("1,", 200'000))), Contains("more than 200000 values"));
  CHECK_THAT(problems_of(std::string(YamlLimits::text_bytes, '[')), Contains("opens more than 200000 brackets"));
}

TEST_CASE("an alias bomb is refused") {
  std::string bomb = "a0: &a0 [x, x, x, x, x, x, x, x, x, x]\n";
  for (int i = 1; i < 12; ++i) {
    bomb += fmt::format("a{0}: &a{0} [{1}x]\n", i, repeated(fmt::format("*a{}, ", i - 1), 9));
  }
  CHECK_THAT(problems_of(bomb), Contains("more than 200000 values, each alias counted"));
  // Long text repeated is bounded too: 400 times 64 kB.
  const std::string text(YamlLimits::scalar_bytes, 'x');
  CHECK_THAT(problems_of(fmt::format("a: &a {}\nb: [{}]\n", text, repeated("*a, ", 400))), Contains("bytes of values"));
}

TEST_CASE("a file that cannot be read is a problem, not an exception") {
  const auto folder = std::filesystem::temp_directory_path() / ("gaskettle_yaml_" + std::to_string(getpid()));
  std::filesystem::create_directories(folder);
  const auto text_of = [](const std::string& path) {
    Problems problems;
    const Node root = read_yaml_file(path, problems);
    CHECK(root.kind == Node::Kind::missing);
    return problems.text();
  };
  const std::string here = folder.string();
  CHECK_THAT(text_of(here), Catch::StartsWith(here + ": error: cannot read '" + here + "': it is a folder"));
  CHECK_THAT(text_of(here + "/none.yaml"), Contains("cannot read") && Contains("No such file"));
  CHECK_THAT(text_of(""), Contains("cannot read"));
  std::ofstream(here + "/closed.yaml") << "a: 1\n";
  chmod((here + "/closed.yaml").c_str(), 0);
  if (geteuid() != 0) CHECK_THAT(text_of(here + "/closed.yaml"), Contains("Permission denied"));
  std::ofstream(here + "/big.yaml") << std::string(YamlLimits::text_bytes + 1, '\n');
  CHECK_THAT(text_of(here + "/big.yaml"), Contains("longer than 4194304 bytes"));
  std::ofstream(here + "/model.yaml") << "a: 1\n";
  Problems problems;
  CHECK(read_yaml_file(here + "/model.yaml", problems).find("a")->place.text() == here + "/model.yaml:1:4");
  CHECK(problems.empty());
  std::filesystem::remove_all(folder);
}
