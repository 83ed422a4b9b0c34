#include "record/csv_export.h"

#include <catch2/catch.hpp>
#include <limits>
#include <sstream>

#include "unit/record/scratch.h"

using namespace gaskettle;
using namespace gaskettle::test;

namespace {

using Rows = std::vector<std::pair<double, double>>;

// The CSV text of a record of one channel.
std::string csv_of(const Rows& rows, double every = 0, const std::string& name = "a.b") {
  const Scratch scratch;
  RecordWriter::Settings settings;
  settings.path = scratch / "out.h5";
  settings.channels = {{name, "K", ""}};
  RecordWriter writer(settings);
  for (const auto& [time, value] : rows) writer.append(time, std::vector<double>{value});
  writer.finish({});
  std::ostringstream out;
  export_csv(RecordReader(settings.path), out, {}, every);
  return out.str();
}

}  // namespace

TEST_CASE("every channel is exported with its units", "[record][csv]") {
  const Scratch scratch;
  write_example(example_settings(scratch / "out.h5"), 2);
  const RecordReader record(scratch / "out.h5");
  std::ostringstream out;
  export_csv(record, out);
  CHECK(out.str() ==
        "time [s],chamber.temperature [K],chamber.mole_fraction.N₂ [1],energy.heater [J]\n"
        "0,300,0.75,0\n"
        "0.5,301,0.75,1000\n");
}

TEST_CASE("chosen channels are exported in the order asked for", "[record][csv]") {
  const Scratch scratch;
  write_example(example_settings(scratch / "out.h5"), 1);
  const RecordReader record(scratch / "out.h5");
  std::ostringstream out;
  export_csv(record, out, {"energy.heater", "chamber.temperature"});
  CHECK(out.str() == "time [s],energy.heater [J],chamber.temperature [K]\n0,0,300\n");

  std::ostringstream nothing;
  CHECK_THROWS_WITH(export_csv(record, nothing, {"energy.heaters"}), Catch::Contains("did you mean energy.heater?"));
  CHECK(nothing.str().empty());
}

TEST_CASE("exported numbers read back as the same doubles", "[record][csv]") {
  const double third = 1.0 / 3, tiny = std::numeric_limits<double>::denorm_min(), large = 1.7976931348623157e308;
  std::istringstream text(csv_of({{third, tiny}, {1.0, -large}, {2.0, 0.1 + 0.2}}));
  std::string header, line;
  std::getline(text, header);
  for (const auto& [time, value] : Rows{{third, tiny}, {1.0, -large}, {2.0, 0.1 + 0.2}}) {
    std::getline(text, line);
    const auto comma = line.find(',');
    CHECK(std::strtod(line.c_str(), nullptr) == time);
    CHECK(std::strtod(line.c_str() + comma + 1, nullptr) == value);
  }
}

TEST_CASE("names with commas and quotes are quoted", "[record][csv]") {
  CHECK(csv_of({}, 0, "a,\"b\"") == "time [s],\"a,\"\"b\"\" [K]\"\n");
}

TEST_CASE("rows at an interval are interpolated linearly", "[record][csv]") {
  const std::string header = "time [s],a.b [K]\n";
  // Values are binary fractions: the interpolation is exact.
  CHECK(csv_of({{0, 0}, {1, 4}, {3, 0}}, 0.5) == header + "0,0\n0.5,2\n1,4\n1.5,3\n2,2\n2.5,1\n3,0\n");
  CHECK(csv_of({{0, 0}, {1, 4}, {3, 0}}, 2) == header + "0,0\n2,2\n");
  CHECK(csv_of({{0.25, 1}, {1.25, 2}}, 0.5) == header + "0.5,1.25\n1,1.75\n");
  CHECK(csv_of({{0, 7}}, 1) == header + "0,7\n");
  CHECK(csv_of({{0.5, 7}}, 1) == header);
  CHECK(csv_of({}, 1) == header);
}

TEST_CASE("an interval that is no binary fraction keeps its multiples and its last row", "[record][csv]") {
  CHECK(csv_of({{0, 5}, {0.3, 5}}, 0.1) == "time [s],a.b [K]\n0,5\n0.1,5\n0.2,5\n0.3,5\n");
}

TEST_CASE("a multiple that falls on an event has the value after it", "[record][csv]") {
  const double event = 1.0;
  const Rows rows = {{0, 1}, {std::nextafter(event, 0.0), 1}, {event, 9}, {2, 9}};
  CHECK(csv_of(rows, 0.5) == "time [s],a.b [K]\n0,1\n0.5,1\n1,9\n1.5,9\n2,9\n");
}

TEST_CASE("an interval that is no time is refused", "[record][csv]") {
  const double bad = GENERATE(-1.0, std::numeric_limits<double>::infinity(), std::numeric_limits<double>::quiet_NaN());
  CHECK_THROWS_AS(csv_of({{0, 0}}, bad), RecordError);
}
