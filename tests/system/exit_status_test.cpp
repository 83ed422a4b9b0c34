// What the program's exit status says, each status by a real case, and which one wins.
#include <catch2/catch.hpp>

#include "record/record_reader.h"
#include "system/program.h"

using namespace gaskettle;
using namespace gaskettle::testing;

namespace {
const std::string ram = shipped("models/stirred_ram.yaml");

// A cooler with a fixed power in a vessel without a wall: sooner or later the gas leaves its model's physical range.
const std::string cooled_out = R"(gaskettle: 1
title: cooled without end
gas_spaces: {can: {volume: 100 l, gas: nitrogen, temperature: 20 degC, pressure: 1 bar abs}}
heaters: {cold: {in: can, rating: -1 kW, power: -1 kW}}
targets: {boiling: {when: can.temperature, reaches: 100 degC}}
limits: {frost: {of: can.temperature, above: -10 degC}}
run: {until: 10 min}
)";
}  // namespace

TEST_CASE("exit status 0: limits kept, targets reached", "[exit]") {
  const Folder folder;
  const Ran ran = gaskettle_in(folder, {"run", ram});
  CHECK(ran.status == 0);
  CHECK(contains(ran.out, "All 2 limits were kept; the target was reached"));
}

TEST_CASE("exit status 1: a run that cannot go on keeps what it has, before 3 and 4", "[exit]") {
  const Folder folder;
  write_text(folder / "cold.yaml", cooled_out);
  const Ran ran = gaskettle_in(folder, {"run", "cold.yaml", "--json"});
  REQUIRE(ran.status == 1);
  const Json answer = ran.json();
  CHECK(answer["exit_status"] == 1);
  CHECK(answer["partial"] == true);
  // The limit is broken and the target missed as well: 1 wins over both.
  CHECK(answer["limits"][0]["kept"] == false);
  CHECK(answer["targets"][0]["reached"] == false);
  // m cv (T0 - T) = P t: nitrogen at 1 bar, 293 K in 100 l holds p V / (gamma - 1) = 1e4 J / 0.4 = 25 kJ, so all of
  // it is gone in 25 s; cv rises by less than 1 % towards warm, hence at most that later.
  CHECK(answer["end_time"].get<double>() > 1.0);
  CHECK(answer["end_time"].get<double>() < 25.3);
  // The wall of frost is met by the same balance, m cv = 85.3 J/K: 30.0 K at 1 kW (cv of nitrogen 743 J/kg/K, 0.2 %).
  CHECK(answer["limits"][0]["crossed_time"].get<double>() ==
        Approx(1e4 / (296.80 * 293.15) * 742.9 * 30.0 / 1000.0).epsilon(2e-3));
  const RecordReader record(folder / "cold.h5");
  CHECK(record.partial());
  CHECK(record.time().back() == answer["end_time"].get<double>());
}

TEST_CASE("exit status 2: input and usage are refused", "[exit]") {
  const Folder folder;
  const auto refused = [&](std::vector<std::string> arguments) {
    const Ran ran = gaskettle_in(folder, arguments);
    CAPTURE(arguments, ran.out, ran.err);
    CHECK(ran.status == 2);
    CHECK(ran.out.empty());
    CHECK_FALSE(ran.err.empty());
    CHECK(folder.files().empty());
  };
  refused({});
  refused({"fly"});
  refused({"run"});
  refused({"run", "nowhere.yaml"});
  refused({"run", folder.path()});
  refused({"run", ram, "--colour"});
  refused({"run", ram, "--set", "pistons.ram.mass"});
  refused({"run", ram, "--set", "pistons.ram.mass=heavy"});
  refused({"run", ram, "--set", "pistons.rum.mass=3 kg"});
  refused({"run", ram, "-o", "no/such/folder/out.h5"});
  refused({"run", ram, "-o", "/proc/out.h5"});
  refused({"check", "nowhere.yaml"});
  refused({"new", "stirred_rum"});
  refused({"export", "nowhere.h5"});
  refused({"gas", "nitrogen", "--temperature", "300 K"});
  refused({"gas", "nitrogen", "--temperature", "300 K", "--pressure", "1 bar"});
  refused({"gas", "nitrogen", "--temperature", "0 K", "--pressure", "1 bar abs"});
  refused({"gas", "nitrogen", "--temperature", "300 K", "--pressure", "1 bar abs", "--density", "1 kg/m3"});
  refused({"gas", "phlogiston", "--temperature", "300 K", "--pressure", "1 bar abs"});
  refused({"explain", "xyzzy"});
}

TEST_CASE("exit status 3: a limit was exceeded, the record is complete", "[exit]") {
  const Folder folder;
  const Ran ran = gaskettle_in(folder, {"run", ram, "--set", "limits.gas_hot.below=100 degC"});
  REQUIRE(ran.status == 3);
  // The broken limit is the verdict's first word.
  CHECK(contains(ran.out, "Limit 'gas_hot' EXCEEDED"));
  CHECK_FALSE(RecordReader(folder / "stirred_ram.h5").partial());
}

TEST_CASE("exit status 4: a target was not reached", "[exit]") {
  const Folder folder;
  const Ran ran = gaskettle_in(folder, {"run", ram, "--set", "targets.top.reaches=560 mm", "--set", "run.until=1 min"});
  REQUIRE(ran.status == 4);
  CHECK(contains(ran.out, "NOT REACHED"));
  const RecordReader record(folder / "stirred_ram.h5");
  CHECK_FALSE(record.partial());
  CHECK(record.outcome().targets.at(0).time != record.outcome().targets.at(0).time);
  CHECK(record.time().back() == 60.0);
}

TEST_CASE("exit status 3 wins over 4", "[exit]") {
  const Folder folder;
  const Ran ran = gaskettle_in(
      folder, {"run", ram, "--json", "--set", "targets.top.reaches=560 mm", "--set", "limits.gas_hot.below=100 degC"});
  CHECK(ran.status == 3);
  CHECK(ran.json()["targets"][0]["reached"] == false);
}
