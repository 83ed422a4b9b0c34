// Ranges, relief summary and ideal-gas departure: what the printed answer rests on beside limits and targets.
#include <algorithm>
#include <catch2/catch.hpp>
#include <cmath>
#include <string>

#include "plant/ideal_departure.h"
#include "support/run_model.h"

using gaskettle::testing::ModelRun;
using gaskettle::testing::run_model;

namespace {
/// A rigid nitrogen vessel heated at constant power, with a pop valve.
const std::string heated = R"(
gaskettle: 1
surroundings: {temperature: 20 degC}
gas_spaces:
  vessel: {volume: 50 l, gas: nitrogen, temperature: 20 degC, pressure: 6 bar gauge}
heaters:
  coil: {in: vessel, rating: 500 W}
relief_devices:
  valve: {protects: vessel, set: 9 bar gauge, blowdown: 10 %, flow_area: 20 mm2, discharge_coefficient: 0.8}
limits:
  pressure: {of: vessel.pressure, below: 9 bar gauge}
run: {until: 200 s}
)";
}  // namespace

TEST_CASE("a limit that equals the set pressure of a pop valve is kept when the valve lifts there") {
  const ModelRun run = run_model(heated);
  REQUIRE(run.event_count("valve", "lifts") >= 2);
  const gaskettle::Limit& limit = run.result.limits.at(0);
  CHECK_FALSE(limit.broken());
  CHECK(limit.margin() == 0.0);
  CHECK(std::isnan(limit.crossed));
  // The slack is rounding's, no more: a bound 1e-6 of gauge lower is exceeded.
  const ModelRun lower = run_model(heated, {"limits.pressure.below=8.999991 bar gauge"});
  CHECK(lower.result.limits.at(0).broken());
}

TEST_CASE("the relief summary counts lifts and tells the first") {
  const ModelRun run = run_model(heated);
  const gaskettle::ReliefOutcome& valve = run.result.reliefs.at(0);
  CHECK(valve.lifts == static_cast<long>(run.event_count("valve", "lifts")));
  CHECK(valve.first_lift == run.event_time("valve", "lifts"));
  // What left the vessel went through the valve: quadrature against the states, both at the run's accuracy.
  CHECK(valve.released == Approx(run["vessel.mass"].front() - run.last("vessel.mass")).epsilon(1e-6));
}

TEST_CASE("ranges hold the lowest, highest and last value of a channel with their times") {
  const ModelRun run = run_model(heated);
  const auto& ranges = run.result.ranges;
  const auto found =
      std::find_if(ranges.begin(), ranges.end(), [](const auto& r) { return r.channel == "vessel.temperature"; });
  REQUIRE(found != ranges.end());
  const std::vector<double>& recorded = run["vessel.temperature"];
  CHECK(found->lowest == recorded.front());
  CHECK(found->lowest_time == 0.0);
  // Rows are a subset of what is looked at, and stand on both sides of every lift, where the peaks are.
  const double highest = *std::max_element(recorded.begin(), recorded.end());
  CHECK(found->highest >= highest);
  CHECK(found->highest == Approx(highest).epsilon(1e-6));
  CHECK(found->end == recorded.back());
}

TEST_CASE("the departure from the ideal gas is that of the second virial coefficient") {
  // B of carbon dioxide at 298 K: -122 cm3/mol, CRC Handbook of Chemistry and Physics (from memory, unverified);
  // the correlation is good to a few cm3/mol there.
  const double z = 122e-6 * 1e5 / (8.314462618 * 298.15);
  CHECK(gaskettle::IdealDeparture({{"carbon_dioxide", 1.0}}).at(298.15, 1e5) == Approx(z).epsilon(0.05));
  CHECK(gaskettle::IdealDeparture({{"helium", 1.0}}).at(300.0, 1e5) < 1e-3);
  CHECK(gaskettle::departure_text(0.058).find("5.8 %") != std::string::npos);
  CHECK(gaskettle::departure_text(6.0).find("liquid") != std::string::npos);
}

TEST_CASE("a run far from ideal says so, one near it does not") {
  CHECK(run_model(heated).result.warnings.empty());
  const ModelRun dense =
      run_model(heated, {"gas_spaces.vessel.pressure=250 bar gauge", "relief_devices.valve.set=400 bar gauge",
                         "limits.pressure.below=500 bar gauge"});
  REQUIRE(dense.result.warnings.size() == 1);
  CHECK(dense.result.warnings[0].find("the ideal gas is off") != std::string::npos);
}
