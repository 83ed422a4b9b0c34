// The books of every shipped model at every tolerance.
#include <algorithm>
#include <catch2/catch.hpp>
#include <cmath>

#include "record/record_reader.h"
#include "system/program.h"

using namespace gaskettle;
using namespace gaskettle::testing;

namespace {
const std::vector<std::string> files = {"models/bakeout_chamber.yaml", "models/blocked_in_bottle.yaml",
                                        "models/bottle_fill.yaml",     "models/gas_accumulator.yaml",
                                        "models/gas_spring.yaml",      "models/stirred_ram.yaml",
                                        "configs/heavy_load.yaml",     "configs/hot_day.yaml"};

/// Largest size that a ledger term had in a run: the scale on which its error counts.
double greatest(const RecordReader& record, const std::string& channel) {
  double most = 0;
  for (const double x : record.channel(channel)) most = std::max(most, std::abs(x));
  return most;
}

Json answer(const std::string& file, const std::string& rtol) {
  const Folder folder;
  const Ran ran = gaskettle_in(folder, {"run", shipped(file), "--json", "-o", "out.h5", "--set", "run.rtol=" + rtol});
  CAPTURE(ran.err);
  REQUIRE((ran.status == 0 || ran.status == 3));
  Json a = ran.json();
  const RecordReader record(folder / "out.h5");
  a["greatest_work"] = std::max(greatest(record, "energy.kinetic"), greatest(record, "energy.spring"));
  return a;
}

double until_of(const Json& answer) { return answer.at("end_time").get<double>(); }
}  // namespace

TEST_CASE("the list of this test names every shipped file", "[models][books]") {
  std::vector<std::string> found;
  for (const std::string folder : {"models", "configs"})
    for (const auto& entry : std::filesystem::directory_iterator(shipped(folder)))
      if (entry.path().extension() == ".yaml") found.push_back(folder + "/" + entry.path().filename().string());
  CHECK_THAT(found, Catch::UnorderedEquals(files));
}

TEST_CASE("books close, entropy is generated and accounted for, at every tolerance", "[models][books]") {
  const std::string file = GENERATE(from_range(files));
  const Json finest = answer(file, "1e-10");
  for (const std::string rtol_text : {"1e-4", "1e-6", "1e-8", "1e-10"}) {
    CAPTURE(file, rtol_text);
    const double rtol = std::stod(rtol_text);
    const Json a = rtol_text == "1e-10" ? finest : answer(file, rtol_text);
    // Linear invariants: to rounding whatever the tolerance.
    CHECK(a["closure_energy"].get<double>() <= 1e-10);
    CHECK(a["closure_mass"].get<double>() <= 1e-10);
    CHECK(a["closed"] == true);
    const double generated = a["entropy"]["generated"];
    CHECK(generated > 0.0);
    for (const auto& [mechanism, amount] : a["entropy"].items())
      if (mechanism != "generated" && mechanism != "imbalance") {
        CAPTURE(mechanism);
        CHECK(amount.get<double>() >= -rtol * generated);
      }
    CHECK(std::abs(a["entropy"]["imbalance"].get<double>()) <= 10 * rtol * generated);
    // Quadratures beside state functions: an accuracy, of the order of the tolerance on the scale of what was stored.
    for (const Json& work : a["work_against_state"]) {
      CAPTURE(work);
      CHECK(std::abs(work["ledger"].get<double>() - work["state"].get<double>()) <=
            100 * rtol * std::max(work["scale"].get<double>(), a["greatest_work"].get<double>()));
    }
    // Times converge: each step's error is below rtol on every state's own scale, some hundred steps add up.
    for (std::size_t i = 0; i < a["targets"].size(); ++i) {
      const Json &here = a["targets"][i], &fine = finest["targets"][i];
      CAPTURE(here, fine);
      REQUIRE(here["reached"] == fine["reached"]);
      CHECK(std::abs(here["time"].get<double>() - fine["time"].get<double>()) <= 100 * rtol * until_of(finest));
    }
    for (std::size_t i = 0; i < a["limits"].size(); ++i) CHECK(a["limits"][i]["kept"] == finest["limits"][i]["kept"]);
    // A run of a model of ours is a matter of some hundred steps; tens of thousands mean that a method is stuck.
    CHECK(a["solver"]["steps"].get<long>() < 10000);
  }
}

TEST_CASE("stiff, explicit and automatic choice give one answer", "[models][books]") {
  const std::string file = GENERATE(from_range(files));
  if (file == "models/bottle_fill.yaml") return;  // equal pressures: the explicit method needs 50000 steps there
  const Json reference = answer(file, "1e-10");
  for (const std::string method : {"stiff", "explicit"}) {
    CAPTURE(file, method);
    const Folder folder;
    const Ran ran = gaskettle_in(folder, {"run", shipped(file), "--json", "--set", "run.method=" + method});
    REQUIRE((ran.status == 0 || ran.status == 3));
    const Json a = ran.json();
    CHECK(a["solver"][method == "stiff" ? "steps_explicit" : "steps_stiff"] == 0);
    for (std::size_t i = 0; i < a["targets"].size(); ++i)
      CHECK(std::abs(a["targets"][i]["time"].get<double>() - reference["targets"][i]["time"].get<double>()) <=
            100 * 1e-8 * until_of(reference));
    CHECK(a["events"].size() == reference["events"].size());
  }
}

TEST_CASE("a stay that ends inside a long step is still noticed", "[models][books]") {
  // With large steps the band is entered, and the stay of 5 min is over, within one step of the stiff method.
  const Folder folder;
  for (const std::string rtol : {"1e-5", "1e-7"}) {
    const Ran ran = gaskettle_in(folder, {"run", shipped("models/bottle_fill.yaml"), "--json", "--overwrite", "--set",
                                          "run.method=stiff", "--set", "run.rtol=" + rtol});
    CAPTURE(rtol, ran.err);
    REQUIRE(ran.status == 0);
    const Json a = ran.json();
    const double entered = a["targets"][0]["time"];
    CHECK(count_events(a, "settled", "target settled") == 1);
    for (const Json& e : a["events"])
      if (e["what"] == "target settled") CHECK(e["time"].get<double>() == Approx(entered + 300.0).epsilon(1e-12));
  }
}
