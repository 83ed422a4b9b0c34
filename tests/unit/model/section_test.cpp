#include "model/section.h"

#include <catch2/catch.hpp>
#include <memory>

using namespace gaskettle;
using Catch::Matchers::Contains;

namespace {
std::shared_ptr<const std::string> model_file() { return std::make_shared<const std::string>("m.yaml"); }

Node scalar(const std::string& text, int line = 1) {
  Node n;
  n.kind = Node::Kind::scalar;
  n.text = text;
  n.place = {model_file(), line, 9};
  return n;
}
Node list(std::vector<Node> items) {
  Node n;
  n.kind = Node::Kind::list;
  n.items = std::move(items);
  return n;
}
Node map(std::vector<std::pair<std::string, Node>> entries) {
  Node n;
  n.kind = Node::Kind::map;
  int line = 1;
  for (auto& [key, value] : entries) {
    Node::Entry entry;
    entry.key = key;
    entry.key_place = {model_file(), line++, 3};
    entry.value = std::move(value);
    n.entries.push_back(std::move(entry));
  }
  return n;
}

/// A map under "part", read by the test; what is wrong is told when it has been read.
struct Reading {
  explicit Reading(Node n) : node(std::move(n)) {}
  template <class F>
  std::string problems_of(F&& read) {
    {
      Section s(context, &node, "part");
      read(s);
    }
    return problems.text();
  }
  Node node;
  Problems problems;
  ReadContext context{problems};
};
}  // namespace

TEST_CASE("a quantity is read in its unit and keeps how it was written") {
  Reading r(map({{"bore", scalar("250 mm")}, {"set", scalar("14 bar gauge")}}));
  r.context.atmosphere = 1e5;
  CHECK(r.problems_of([](Section& s) {
           const Value bore = s.quantity("bore", unit_kinds::length, "inner", Range::positive);
           CHECK(bore.si == Approx(0.25));
           CHECK(bore.unit == "mm");
           CHECK(bore.given);
           const Value set = s.quantity("set", unit_kinds::pressure, "set", Range::positive);
           CHECK(set.si == Approx(15e5));  // absolute
           CHECK(set.gauge);
         }).empty());
}

TEST_CASE("defaults are told, missing keys named with an example") {
  Reading r(map({}));
  const std::string text = r.problems_of([](Section& s) {
    CHECK(s.quantity("tilt", unit_kinds::angle, "from upright", Range::any, "90 deg").si == Approx(1.5707963267948966));
    CHECK_FALSE(s.optional_quantity("bore", unit_kinds::length, "inner", Range::positive));
    s.quantity("mass", unit_kinds::mass, "of it", Range::positive);
  });
  CHECK(r.context.defaults_used == std::vector<std::string>{"part.tilt = 90 deg"});
  CHECK(r.problems.count() == 1);
  CHECK_THAT(text, Contains("'mass' is missing in 'part'") && Contains("kg"));
}

TEST_CASE("values outside their range, of the wrong dimension or form, are all told with their place") {
  Reading r(map({{"mass", scalar("-2 kg", 7)},
                 {"bore", scalar("3 kg", 8)},
                 {"area", list({})},
                 {"emissivity", scalar("1.2", 10)},
                 {"speed", scalar("20 Hz", 11)},
                 {"number", scalar("12")},
                 {"length", scalar("12")}}));
  const std::string text = r.problems_of([](Section& s) {
    s.quantity("mass", unit_kinds::mass, "", Range::not_negative);
    s.quantity("bore", unit_kinds::length, "", Range::positive);
    s.quantity("area", unit_kinds::area, "", Range::positive);
    s.quantity("emissivity", unit_kinds::number, "", Range::fraction);
    s.quantity("speed", unit_kinds::rotation, "", Range::any);
    CHECK(s.quantity("number", unit_kinds::number, "", Range::any).si == 12.0);
    s.quantity("length", unit_kinds::length, "", Range::any);
  });
  CHECK(r.problems.count() == 6);
  CHECK_THAT(text, Contains("m.yaml:7:9: error: 'part.mass' is -2 kg: it must not be negative"));
  CHECK_THAT(text, Contains("m.yaml:8:9"));
  CHECK_THAT(text, Contains("'part.area' should be a area") || Contains("'part.area' should be an area"));
  CHECK_THAT(text, Contains("between 0 and 1"));
  CHECK_THAT(text, Contains("rpm"));
}

TEST_CASE("keys nobody asked for are told, with the nearest known one") {
  Reading r(map({{"mas", scalar("2 kg")}, {"colour", scalar("red")}}));
  const std::string text =
      r.problems_of([](Section& s) { s.optional_quantity("mass", unit_kinds::mass, "", Range::positive); });
  CHECK(r.problems.count() == 2);
  CHECK_THAT(text, Contains("m.yaml:1:3: error: unknown key 'mas' in 'part'; did you mean 'mass'?"));
  CHECK_THAT(text, Contains("unknown key 'colour' in 'part'; known here: mass"));
}

TEST_CASE("choices, flags, whole numbers, references") {
  Reading r(
      map({{"motion", scalar("inertail")}, {"one_way", scalar("yes")}, {"count", scalar("2.5")}, {"in", list({})}}));
  const std::string text = r.problems_of([](Section& s) {
    CHECK(s.choice("motion", {"balanced", "inertial", "driven"}, "", "balanced") == "balanced");
    CHECK_FALSE(s.flag("one_way", "", false));
    CHECK(s.integer("count", "", 1, 1) == 1);
    CHECK_FALSE(s.reference("in", "gas space", "", true).given());
  });
  CHECK(r.problems.count() == 4);
  CHECK_THAT(text, Contains("did you mean 'inertial'?"));
  CHECK_THAT(text, Contains("'part.one_way' should be true or false"));
  CHECK_THAT(text, Contains("whole number from 1"));
  CHECK_THAT(text, Contains("'part.in' should be the gas space"));
}

TEST_CASE("exactly one of some keys") {
  const auto read = [](Section& s) {
    s.exactly_one_of({"bore", "area"});
    s.optional_quantity("bore", unit_kinds::length, "", Range::positive);
    s.optional_quantity("area", unit_kinds::area, "", Range::positive);
  };
  CHECK_THAT(Reading(map({})).problems_of(read), Contains("'part' needs one of bore, area"));
  CHECK_THAT(Reading(map({{"bore", scalar("1 m")}, {"area", scalar("1 m2")}})).problems_of(read),
             Contains("only one of bore, area"));
  CHECK(Reading(map({{"bore", scalar("1 m")}})).problems_of(read).empty());
}

TEST_CASE("a key without a value, and one that is not built yet") {
  Node nothing;
  nothing.kind = Node::Kind::null;
  Reading r(map({{"mass", nothing}, {"pid", map({})}}));
  const std::string text = r.problems_of([](Section& s) {
    s.optional_quantity("mass", unit_kinds::mass, "", Range::positive);
    s.not_built_yet("pid", "");
  });
  CHECK_THAT(text, Contains("'part.mass' has no value") && Contains("'part.pid' is not built yet"));
}

TEST_CASE("time-varying values") {
  const auto spec_of = [](Node node, const UnitKind& kind, Range range, std::string* text = nullptr) {
    Reading r(map({{"power", std::move(node)}}));
    SignalSpec spec;
    const std::string told = r.problems_of([&](Section& s) { spec = s.signal("power", kind, "", range); });
    if (text != nullptr)
      *text = told;
    else
      CHECK(told == "");
    return spec;
  };
  const auto point = [](const char* t, const char* v) { return list({scalar(t), scalar(v)}); };
  SECTION("a plain value") {
    const SignalSpec s = spec_of(scalar("6 kW"), unit_kinds::power, Range::any);
    CHECK(s.given);
    CHECK(s.level == Approx(6000.0));
  }
  SECTION("a schedule, held and repeated") {
    Node held = map({{"schedule", list({point("0 s", "1 kW"), point("5 min", "2 kW")})},
                     {"held", scalar("true")},
                     {"repeat", scalar("forever")}});
    const SignalSpec s = spec_of(held, unit_kinds::power, Range::any);
    REQUIRE(s.points.size() == 2);
    CHECK(s.points[1].first == Approx(300.0));
    CHECK(s.points[1].second == Approx(2000.0));
    CHECK(s.held);
    CHECK(s.repeats == -1);
  }
  SECTION("a ramp has a rate per time, a sine a difference and cycles a second") {
    const SignalSpec ramp = spec_of(map({{"ramp", map({{"to", scalar("180 degC")}, {"at", scalar("3 K/min")}})}}),
                                    unit_kinds::temperature, Range::positive);
    CHECK(ramp.ramp_to == Approx(453.15));
    CHECK(ramp.ramp_rate == Approx(0.05));
    const SignalSpec sine = spec_of(
        map({{"sine",
              map({{"mean", scalar("20 degC")}, {"amplitude", scalar("4 degC")}, {"frequency", scalar("0.1 Hz")}})}}),
        unit_kinds::temperature, Range::positive);
    CHECK(sine.level == Approx(293.15));
    CHECK(sine.amplitude == Approx(4.0));
  }
  SECTION("what is wrong with one") {
    std::string text;
    spec_of(map({{"schedule", list({point("5 s", "1 kW"), point("2 s", "2 kW")})}}), unit_kinds::power, Range::any,
            &text);
    CHECK_THAT(text, Contains("must not go back"));
    spec_of(map({{"schedule", list({point("5 s", "1 kW"), point("5 s", "2 kW"), point("5 s", "3 kW")})}}),
            unit_kinds::power, Range::any, &text);
    CHECK_THAT(text, Contains("more than two points at one time"));
    spec_of(map({{"schedule", list({point("5 s", "-1 kW")})}}), unit_kinds::power, Range::not_negative, &text);
    CHECK_THAT(text, Contains("must not be negative"));
    spec_of(
        map({{"sine", map({{"mean", scalar("1 kW")}, {"amplitude", scalar("2 kW")}, {"frequency", scalar("1 Hz")}})}}),
        unit_kinds::power, Range::not_negative, &text);
    CHECK_THAT(text, Contains("would go below zero"));
    spec_of(map({{"csv", map({})}}), unit_kinds::power, Range::any, &text);
    CHECK_THAT(text, Contains("not built yet"));
    spec_of(map({{"schedule", list({})}}), unit_kinds::power, Range::any, &text);
    CHECK_THAT(text, Contains("list of [time, value]"));
  }
}

TEST_CASE("gas flows of one basis") {
  const auto read = [](const char* first, const char* second, FlowBasis& basis) {
    Reading r(map(
        {{"flow",
          map({{"schedule", list({list({scalar("0 s"), scalar(first)}), list({scalar("1 s"), scalar(second)})})}})}}));
    return r.problems_of([&](Section& s) { s.flow_signal("flow", "", basis); });
  };
  FlowBasis basis = FlowBasis::mass;
  CHECK(read("1 g/s", "2 g/s", basis).empty());
  CHECK(basis == FlowBasis::mass);
  CHECK(read("30 l/min normal", "0.1 mol/s", basis).empty());
  CHECK(basis == FlowBasis::molar);
  CHECK_THAT(read("1 g/s", "0.1 mol/s", basis), Contains("must be of one kind"));
}

TEST_CASE("describing visits every key and reads nothing") {
  Problems problems;
  ReadContext context(problems);
  std::vector<KeyDoc> docs;
  context.docs = &docs;
  {
    Section s(context, "part");
    CHECK(s.describing());
    s.quantity("mass", unit_kinds::mass, "of it", Range::positive);
    s.signal("power", unit_kinds::power, "that drives it", Range::any, "0 W");
    auto inner = s.child("friction", "of the seal");
    REQUIRE(inner);
    inner->flag("dry", "without oil", false);
  }
  REQUIRE(docs.size() == 4);
  CHECK(docs[0].required);
  CHECK(docs[1].varies);
  CHECK(docs[1].fallback == "0 W");
  CHECK(docs[3].section == "part.friction");
  CHECK(problems.empty());
}
