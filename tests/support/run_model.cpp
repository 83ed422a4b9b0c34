#include "support/run_model.h"

#include <unistd.h>

#include <atomic>
#include <cmath>
#include <filesystem>
#include <fstream>
#include <stdexcept>

#include "input/study_file.h"
#include "plant/plant.h"
#include "record/record_reader.h"

namespace gaskettle::testing {

namespace {
std::filesystem::path scratch(const std::string& ending) {
  static std::atomic<int> count{0};
  return std::filesystem::temp_directory_path() /
         ("gaskettle_test_" + std::to_string(getpid()) + "_" + std::to_string(count++) + ending);
}

ModelRun run_path(const std::string& path, const std::vector<std::string>& set, bool refusal_expected) {
  ModelRun run;
  Problems problems;
  const LoadedModel source = load_model(path, set, problems);
  ReadContext context(problems);
  if (!problems.empty() && !source.root.is_map()) {
    run.problems = problems.text();
    if (refusal_expected) return run;
    throw std::runtime_error(run.problems);
  }
  Plant plant(read_model(source.root, context), context);
  run.problems = problems.text();
  if (!run.problems.empty()) {
    if (refusal_expected) return run;
    throw std::runtime_error(run.problems);
  }
  const std::filesystem::path record = scratch(".h5");
  CaseOptions options;
  options.record_path = record.string();
  run.result = run_case(plant, options);
  {
    RecordReader reader(record.string());
    run.time = reader.time();
    for (const ChannelInfo& c : reader.channels()) run.channel[c.name] = reader.channel(c.name);
  }
  std::filesystem::remove(record);
  return run;
}
}  // namespace

const std::vector<double>& ModelRun::operator[](const std::string& name) const {
  const auto found = channel.find(name);
  if (found == channel.end()) throw std::runtime_error("no channel " + name);
  return found->second;
}

double ModelRun::at(const std::string& name, double t) const {
  const std::vector<double>& x = (*this)[name];
  for (std::size_t i = 0; i < time.size(); ++i) {
    if (std::abs(time[i] - t) <= 1e-12 * std::max(1.0, std::abs(t))) return x[i];
    if (time[i] > t) return i == 0 ? x[0] : x[i - 1] + (x[i] - x[i - 1]) * (t - time[i - 1]) / (time[i] - time[i - 1]);
  }
  return x.back();
}

double ModelRun::event_time(const std::string& part, const std::string& what, std::size_t n) const {
  for (const LoggedEvent& e : result.events)
    if (e.part == part && e.what == what && n-- == 0) return e.time;
  throw std::runtime_error("no event '" + what + "' of " + part);
}

std::size_t ModelRun::event_count(const std::string& part, const std::string& what) const {
  std::size_t n = 0;
  for (const LoggedEvent& e : result.events) n += e.part == part && e.what == what ? 1 : 0;
  return n;
}

ModelRun run_model(const std::string& yaml, const std::vector<std::string>& set, bool refusal_expected) {
  const std::filesystem::path file = scratch(".yaml");
  std::ofstream(file) << yaml;
  try {
    ModelRun run = run_path(file.string(), set, refusal_expected);
    std::filesystem::remove(file);
    return run;
  } catch (...) {
    std::filesystem::remove(file);
    throw;
  }
}

ModelRun run_model_file(const std::string& path, const std::vector<std::string>& set) {
  return run_path(std::string(GASKETTLE_SOURCE_DIR) + "/" + path, set, false);
}

}  // namespace gaskettle::testing
