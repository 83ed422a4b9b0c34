// Order, text and suggestions of collected problems.
#include "base/problems.h"

#include <catch2/catch.hpp>

using namespace gaskettle;

namespace {
Place at(int line, int column, const char* file = "bake.yaml") {
  return {std::make_shared<const std::string>(file), line, column};
}
}  // namespace

TEST_CASE("a place is told as file, line and column") {
  CHECK(at(3, 7).text() == "bake.yaml:3:7");
  CHECK(at(0, 0).text() == "bake.yaml");
  CHECK(Place{}.text() == "input");
}

TEST_CASE("problems come in the order of the file, each once") {
  Problems problems;
  CHECK(problems.empty());
  CHECK(problems.text().empty());
  problems.add(at(9, 1), "third");
  problems.add(at(2, 5), "second");
  problems.add(at(2, 1), "first");
  problems.add(at(9, 1), "third");
  problems.add(at(9, 1), "fourth, at the same place");
  CHECK(problems.count() == 5);
  const std::vector<Problem> list = problems.sorted();
  REQUIRE(list.size() == 4);
  CHECK(list[0].message == "first");
  CHECK(list[1].message == "second");
  CHECK(list[2].message == "third");
  CHECK(problems.text() ==
        "bake.yaml:2:1: error: first\nbake.yaml:2:5: error: second\n"
        "bake.yaml:9:1: error: third\nbake.yaml:9:1: error: fourth, at the same place\n");
}

TEST_CASE("duplicates are dropped also when others stand between them") {
  Problems problems;
  problems.add(at(1, 1), "a");
  problems.add(at(1, 1), "b");
  problems.add(at(1, 1), "a");
  CHECK(problems.sorted().size() == 2);
}

TEST_CASE("the same line of two files is two problems") {
  Problems problems;
  problems.add(at(1, 1, "a.yaml"), "missing");
  problems.add(at(1, 1, "b.yaml"), "missing");
  CHECK(problems.sorted().size() == 2);
}

TEST_CASE("after a hundred problems the rest are counted") {
  Problems problems;
  for (int line = 1; line <= 103; ++line) problems.add(at(line, 1), "wrong");
  const std::string text = problems.text();
  CHECK(text.find("bake.yaml:100:1: error") != std::string::npos);
  CHECK(text.find("bake.yaml:101:1: error") == std::string::npos);
  CHECK(text.find("3 more") != std::string::npos);
}

TEST_CASE("the nearest known name is suggested, if near") {
  const std::vector<std::string> known{"temperature", "pressure", "volume", "mass"};
  CHECK(nearest_name("temprature", known) == "temperature");
  CHECK(nearest_name("presure", known) == "pressure");
  CHECK(nearest_name("volumes", known) == "volume");
  CHECK(nearest_name("Mass", known) == "mass");
  CHECK(nearest_name("enthalpy", known).empty());
  CHECK(nearest_name("", {}).empty());
  CHECK(nearest_name(std::string(1000, 'x'), known).empty());
}
