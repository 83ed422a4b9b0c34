#include "model/shape.h"

#include <catch2/catch.hpp>
#include <numbers>

using namespace gaskettle;
using std::numbers::pi;

namespace {
Shape cylinder(Shape::Ends ends) {
  Shape s;
  s.kind = Shape::Kind::cylinder;
  s.ends = ends;
  s.bore = 0.6;
  s.length = 1.8;
  return s;
}
constexpr double r = 0.3, side = 2 * pi * r * 1.8, barrel = pi * r * r * 1.8;
}  // namespace

TEST_CASE("a cylinder with flat ends") {
  const Shape s = cylinder(Shape::Ends::flat);
  CHECK(s.volume() == Approx(barrel).epsilon(1e-14));
  CHECK(s.area() == Approx(side + 2 * pi * r * r).epsilon(1e-14));
  CHECK(s.cross_section() == Approx(pi * r * r).epsilon(1e-14));
  CHECK(s.side_area() == Approx(side).epsilon(1e-14));
  CHECK(s.side_area_per_volume() == Approx(2 / r).epsilon(1e-14));
}

TEST_CASE("hemispherical ends add a sphere") {
  const Shape s = cylinder(Shape::Ends::hemispherical);
  CHECK(s.volume() == Approx(barrel + 4.0 / 3.0 * pi * r * r * r).epsilon(1e-14));
  CHECK(s.area() == Approx(side + 4 * pi * r * r).epsilon(1e-14));
}

TEST_CASE("2:1 ellipsoidal ends add a spheroid of half height") {
  const Shape s = cylinder(Shape::Ends::ellipsoidal);
  CHECK(s.volume() == Approx(barrel + 2.0 / 3.0 * pi * r * r * r).epsilon(1e-14));
  // An oblate spheroid, c = a/2, e = sqrt(3)/2: 2 pi a^2 (1 + (1 - e^2)/e artanh e) (M. R. Spiegel, Mathematical
  // Handbook, spheroids).
  const double e = std::sqrt(3.0) / 2;
  CHECK(s.area() == Approx(side + 2 * pi * r * r * (1 + 0.25 / e * std::atanh(e))).epsilon(1e-12));
}

TEST_CASE("a sphere") {
  Shape s;
  s.kind = Shape::Kind::sphere;
  s.bore = 0.6;
  CHECK(s.volume() == Approx(4.0 / 3.0 * pi * r * r * r).epsilon(1e-14));
  CHECK(s.area() == Approx(4 * pi * r * r).epsilon(1e-14));
  CHECK(s.side_area_per_volume() == 0.0);
}

namespace {
Node scalar(const std::string& text) {
  Node n;
  n.kind = Node::Kind::scalar;
  n.text = text;
  return n;
}
Node map(std::vector<std::pair<std::string, Node>> entries) {
  Node n;
  n.kind = Node::Kind::map;
  for (auto& [key, value] : entries) n.entries.push_back({key, {}, value});
  return n;
}
}  // namespace

TEST_CASE("a shape as written") {
  Problems problems;
  ReadContext context(problems);
  SECTION("cylinder") {
    const Node node = map({{"cylinder", map({{"bore", scalar("600 mm")},
                                             {"length", scalar("1.8 m")},
                                             {"ends", scalar("ellipsoidal")},
                                             {"axis", scalar("level")}})}});
    Section section(context, &node, "gas_spaces.tank.shape");
    const Shape s = read_shape(section);
    CHECK(s.kind == Shape::Kind::cylinder);
    CHECK(s.ends == Shape::Ends::ellipsoidal);
    CHECK_FALSE(s.upright);
    CHECK(s.bore == Approx(0.6));
    CHECK(problems.empty());
  }
  SECTION("sphere") {
    const Node node = map({{"sphere", map({{"bore", scalar("60 cm")}})}});
    Section section(context, &node, "shape");
    CHECK(read_shape(section).volume() == Approx(0.036 * pi));
    CHECK(problems.empty());
  }
  SECTION("both, or an unknown end") {
    const Node node =
        map({{"sphere", map({{"bore", scalar("60 cm")}})},
             {"cylinder", map({{"bore", scalar("600 mm")}, {"length", scalar("1.8 m")}, {"ends", scalar("round")}})}});
    {
      Section section(context, &node, "shape");
      read_shape(section);
    }
    CHECK(problems.count() == 2);
    CHECK_THAT(problems.text(), Catch::Matchers::Contains("only one of cylinder, sphere"));
    CHECK_THAT(problems.text(), Catch::Matchers::Contains("flat, hemispherical, ellipsoidal"));
  }
}
