// Runs that are interrupted or killed on their way.
#include <catch2/catch.hpp>
#include <cmath>
#include <cstdint>

#include "record/record_place.h"
#include "record/record_reader.h"
#include "system/program.h"

using namespace gaskettle;
using namespace gaskettle::testing;

namespace {
// A piston that swings on its cushion for days: far more steps than anyone waits for. Its limit is broken at once.
const std::string endless = R"(gaskettle: 1
title: swings for ever
gas_spaces: {cushion: {volume: 4 l, gas: nitrogen, temperature: 20 degC, pressure: 1 bar gauge}}
pistons: {plunger: {closes: cushion, bore: 100 mm, at: 400 mm, mass: 40 kg, motion: inertial, stops: [50 mm, 5 m]}}
targets: {never: {when: cushion.temperature, reaches: 500 degC}}
limits: {broken: {of: cushion.pressure, below: 0.5 bar gauge}}
run: {until: 50 h, record_every: 50 ms}
)";

/// Until the run has saved several times of its own accord (once a second); false where that takes too long. The file
/// itself is locked while it is written, so its growth must do.
bool wait_until_saved(const std::string& path) {
  std::uintmax_t size = 0;
  int grown = 0;
  for (int i = 0; i < 300 && grown < 3; ++i) {
    std::this_thread::sleep_for(std::chrono::milliseconds(700));
    std::error_code none;
    const std::uintmax_t now = std::filesystem::file_size(path, none);
    if (!none && now > size) ++grown;
    if (!none) size = now;
  }
  return grown == 3;
}

void check_rows(const RecordReader& record) {
  const std::vector<double>& t = record.time();
  const std::vector<double> p = record.channel("cushion.pressure");
  REQUIRE(t.size() == p.size());
  REQUIRE(t.front() == 0.0);
  for (std::size_t i = 1; i < t.size(); ++i) REQUIRE(t[i] > t[i - 1]);
  for (const double x : p) REQUIRE((x > 1e4 && x < 1e7));
}
}  // namespace

TEST_CASE("an interrupt ends a run where it is, with 130 before 3 and 4", "[interrupt]") {
  const int signal = GENERATE(SIGINT, SIGTERM);
  const Folder folder;
  write_text(folder / "endless.yaml", endless);
  Running run({GASKETTLE_PROGRAM, "run", "endless.yaml", "--json"}, folder.path());
  REQUIRE(wait_until_saved(partial_path(folder / "endless.h5")));
  run.send(signal);
  const Ran ran = run.wait(20);
  REQUIRE(ran.status == 130);
  CHECK(ran.err.empty());
  const Json answer = ran.json();
  CHECK(answer["exit_status"] == 130);
  CHECK(answer["partial"] == true);
  CHECK(answer["ended"] == "interrupted");
  CHECK(answer["limits"][0]["kept"] == false);
  CHECK(answer["targets"][0]["reached"] == false);
  CHECK(answer["closed"] == true);  // the books close at any moment

  const RecordReader record(folder / "endless.h5");
  CHECK(record.partial());
  check_rows(record);
  const double end = answer["end_time"];
  CHECK(record.time().back() == end);
  // Complete to that point: the regular rows k * 50 ms and those at events, none left out.
  const double every = 0.05;
  std::size_t regular = 0;
  for (const double t : record.time())
    if (std::abs(t - every * std::round(t / every)) <= 1e-12 * end) ++regular;
  CHECK(regular >= static_cast<std::size_t>(std::floor(end / every - 1e-9)) + 1);
  CHECK(record.events().size() == answer["events"].size());
  CHECK_FALSE(std::filesystem::exists(partial_path(folder / "endless.h5")));
}

TEST_CASE("a killed run leaves a readable partial file and no record", "[interrupt]") {
  const Folder folder;
  write_text(folder / "endless.yaml", endless);
  const std::string partial = partial_path(folder / "endless.h5");
  Running run({GASKETTLE_PROGRAM, "run", "endless.yaml"}, folder.path());
  REQUIRE(wait_until_saved(partial));
  run.send(SIGKILL);
  CHECK(run.wait(20).status == -SIGKILL);
  CHECK_FALSE(std::filesystem::exists(folder / "endless.h5"));
  REQUIRE(std::filesystem::exists(partial));
  std::size_t rows = 0;
  {  // a reader keeps the file open, which the next run must find free
    const RecordReader record(partial);
    CHECK(record.partial());
    rows = record.rows();
    CHECK(rows >= 100);
    check_rows(record);
  }

  // What was computed is not thrown away for a run with other settings, unless that is asked for.
  const Ran refused = gaskettle_in(folder, {"run", "endless.yaml", "--set", "run.until=1 s"});
  CHECK(refused.status == 2);
  CHECK(contains(refused.err, "--overwrite"));
  CHECK(RecordReader(partial).rows() == rows);
  const Ran next = gaskettle_in(folder, {"run", "endless.yaml", "--set", "run.until=1 s", "--overwrite"});
  CHECK(next.status == 3);
  CHECK_FALSE(std::filesystem::exists(partial));
  CHECK_FALSE(RecordReader(folder / "endless.h5").partial());
}

TEST_CASE("two runs into one record: the second is refused, the first goes on", "[interrupt]") {
  const Folder folder;
  write_text(folder / "endless.yaml", endless);
  Running first({GASKETTLE_PROGRAM, "run", "endless.yaml"}, folder.path());
  REQUIRE(wait_until_saved(partial_path(folder / "endless.h5")));
  const Ran second = gaskettle_in(folder, {"run", "endless.yaml"});
  CHECK(second.status == 2);
  CHECK(contains(second.err, "endless.h5"));
  CHECK_FALSE(first.ended());
  first.send(SIGINT);
  CHECK(first.wait(20).status == 130);
}
