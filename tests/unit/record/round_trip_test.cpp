#include <catch2/catch.hpp>
#include <cmath>
#include <limits>

#include "record/record_reader.h"
#include "unit/record/scratch.h"

using namespace gaskettle;
using namespace gaskettle::test;

namespace {

const Attribute* find(const Attributes& attributes, const std::string& name) {
  for (const auto& [key, value] : attributes) {
    if (key == name) return &value;
  }
  return nullptr;
}

}  // namespace

TEST_CASE("a record reads back as it was written", "[record]") {
  const Scratch scratch;
  const auto settings = example_settings(scratch / "out.h5");
  write_example(settings);
  CHECK_FALSE(std::filesystem::exists(settings.path + ".partial"));

  const RecordReader record(settings.path);
  CHECK_FALSE(record.partial());
  CHECK(record.identity() == "example");
  CHECK(record.channel_names() ==
        std::vector<std::string>{"chamber.temperature", "chamber.mole_fraction.N₂", "energy.heater"});
  CHECK(record.channel_info("energy.heater").units == "J");
  CHECK(record.channel_info("energy.heater").long_name == "electrical energy into heaters");
  CHECK(record.time() == std::vector<double>{0, 0.5, 1, 1.5});
  CHECK(record.channel("chamber.temperature") == std::vector<double>{300, 301, 302, 303});
  CHECK(record.channel("energy.heater", 1, 2) == std::vector<double>{1000, 2000});
  CHECK(record.channel("chamber.mole_fraction.N₂") == std::vector<double>(4, 0.75));
  CHECK_THROWS_AS(record.channel("energy.heater", 3, 2), RecordError);
}

TEST_CASE("profiles read back with their depths", "[record]") {
  const Scratch scratch;
  write_example(example_settings(scratch / "out.h5"), 2);
  const RecordReader record(scratch / "out.h5");
  REQUIRE(record.profiles().size() == 1);
  CHECK(record.profiles()[0].name == "shell.profile");
  CHECK(record.profiles()[0].units == "K");
  CHECK(record.profiles()[0].depth_name == "shell.depth");
  CHECK(record.profiles()[0].depth == std::vector<double>{0, 0.01, 0.03});
  CHECK(record.profile("shell.profile") == std::vector<double>{300, 310, 320, 301, 311, 321});
  CHECK_THROWS_WITH(record.profile("shel.profile"), Catch::Contains("shell.profile"));
}

TEST_CASE("events, targets, limits and attributes read back", "[record]") {
  const Scratch scratch;
  write_example(example_settings(scratch / "out.h5"));
  const RecordReader record(scratch / "out.h5");
  const auto events = record.events();
  REQUIRE(events.size() == 1);
  CHECK(events[0].time == 1.0);
  CHECK(events[0].part == "relief");
  CHECK(events[0].what == "opened – wide");
  CHECK(events[0].before == 0.0);
  CHECK(events[0].after == 1.0);

  const Outcome outcome = record.outcome();
  REQUIRE(outcome.targets.size() == 2);
  CHECK(outcome.targets[0].name == "hot");
  CHECK(outcome.targets[0].time == 1.5);
  CHECK(std::isnan(outcome.targets[1].time));
  REQUIRE(outcome.limits.size() == 1);
  CHECK(outcome.limits[0].margin == 0.5e6);
  CHECK(std::isnan(outcome.limits[0].crossed_time));
  CHECK(*find(outcome.attributes, "closure_energy") == Attribute(1.25e-9));
  CHECK(*find(outcome.attributes, "ended") == Attribute(std::string("end time")));
  CHECK(*find(outcome.attributes, "steps") == Attribute(std::int64_t{42}));
  CHECK(*find(outcome.attributes, "partial") == Attribute(std::int64_t{0}));
}

TEST_CASE("an outcome can say that the run stopped early", "[record]") {
  const Scratch scratch;
  RecordWriter writer(example_settings(scratch / "out.h5"));
  append_example_row(writer, 0);
  writer.finish({{}, {}, {{"partial", std::int64_t{1}}}});
  CHECK(RecordReader(scratch / "out.h5").partial());
}

TEST_CASE("a model text of a megabyte and an empty text read back", "[record]") {
  const Scratch scratch;
  auto settings = example_settings(scratch / "out.h5");
  const std::string model(1'000'000, 'm'), notes(200'000, 'n');
  settings.provenance = {{"overrides", ""}, {"model_text", model}, {"notes", notes}};
  write_example(settings);
  const Provenance read = RecordReader(settings.path).provenance();
  CHECK(read == settings.provenance);
}

TEST_CASE("a record of nothing opens", "[record]") {
  const Scratch scratch;
  RecordWriter::Settings settings;
  settings.path = scratch / "empty.h5";
  RecordWriter(settings).finish({});
  const RecordReader record(settings.path);
  CHECK(record.rows() == 0);
  CHECK(record.channels().empty());
  CHECK(record.events().empty());
  CHECK(record.outcome().targets.empty());
  CHECK(record.provenance().empty());
  CHECK_FALSE(record.partial());
}

TEST_CASE("values that are not finite read back", "[record]") {
  const Scratch scratch;
  RecordWriter::Settings settings;
  settings.path = scratch / "out.h5";
  settings.channels = {{"a.b", "1", ""}};
  RecordWriter writer(settings);
  writer.append(0, std::vector<double>{std::numeric_limits<double>::quiet_NaN()});
  writer.append(1, std::vector<double>{-std::numeric_limits<double>::infinity()});
  writer.finish({});
  const auto values = RecordReader(settings.path).channel("a.b");
  CHECK(std::isnan(values[0]));
  CHECK(values[1] == -std::numeric_limits<double>::infinity());
}

TEST_CASE("rows before an event stand at the last double below it", "[record]") {
  const Scratch scratch;
  RecordWriter::Settings settings;
  settings.path = scratch / "out.h5";
  settings.channels = {{"a.b", "1", ""}};
  RecordWriter writer(settings);
  const double before = std::nextafter(10.0, 0.0);
  writer.append(before, std::vector<double>{0.0});
  writer.append(10.0, std::vector<double>{1.0});
  writer.finish({});
  CHECK(RecordReader(settings.path).time() == std::vector<double>{before, 10.0});
}

TEST_CASE("blocks and chunks of every size give the rows back in order", "[record]") {
  const Scratch scratch;
  // Around the block of 1024 rows and the chunk, with chunks below, at and above a block.
  const auto rows = GENERATE(1, 15, 16, 17, 1023, 1024, 1025, 5000);
  const auto expected = GENERATE(0, 1, 1500, 100000);
  auto settings = example_settings(scratch / "out.h5");
  settings.expected_rows = static_cast<std::size_t>(expected);
  write_example(settings, rows);
  const RecordReader record(settings.path);
  REQUIRE(record.rows() == static_cast<std::size_t>(rows));
  const auto values = record.channel("chamber.temperature");
  const auto profile = record.profile("shell.profile");
  bool right = true;
  for (std::size_t i = 0; i < values.size(); ++i) {
    const double n = static_cast<double>(i);
    right = right && values[i] == 300 + n && profile[3 * i + 2] == 320 + n && record.time()[i] == 0.5 * n;
  }
  CHECK(right);
}

TEST_CASE("an unknown channel is answered with the nearest name", "[record]") {
  const Scratch scratch;
  write_example(example_settings(scratch / "out.h5"));
  CHECK_THROWS_WITH(RecordReader(scratch / "out.h5").channel("chamber.temprature"),
                    Catch::Contains("did you mean chamber.temperature?"));
}
