// What the tests of records share: a folder that goes away, an example, other programs.
#pragma once
#include <unistd.h>

#include <array>
#include <cstdio>
#include <cstdlib>
#include <filesystem>
#include <limits>
#include <stdexcept>
#include <string>
#include <vector>

#include "record/record_writer.h"

namespace gaskettle::test {

class Scratch {
public:
  Scratch() {
    std::string pattern = (std::filesystem::temp_directory_path() / "gaskettle_record_XXXXXX").string();
    if (!mkdtemp(pattern.data())) throw std::runtime_error("no scratch folder");
    folder_ = pattern;
  }
  ~Scratch() {
    std::error_code ignored;
    std::filesystem::remove_all(folder_, ignored);
  }
  Scratch(const Scratch&) = delete;
  Scratch& operator=(const Scratch&) = delete;
  std::string operator/(const std::string& name) const { return (folder_ / name).string(); }

private:
  std::filesystem::path folder_;
};

struct Ran {
  int status;
  std::string output;  // both streams
};

inline Ran run(const std::string& command) {
  FILE* pipe = popen((command + " 2>&1").c_str(), "r");
  if (!pipe) throw std::runtime_error("cannot run " + command);
  Ran ran{0, {}};
  std::array<char, 4096> buffer;
  for (std::size_t n = 0; (n = fread(buffer.data(), 1, buffer.size(), pipe)) > 0;) ran.output.append(buffer.data(), n);
  ran.status = pclose(pipe);
  return ran;
}

inline RecordWriter::Settings example_settings(const std::string& path) {
  RecordWriter::Settings settings;
  settings.path = path;
  settings.identity = "example";
  settings.channels = {{"chamber.temperature", "K", "gas temperature"},
                       {"chamber.mole_fraction.N₂", "1", "mole fraction of N₂"},
                       {"energy.heater", "J", "electrical energy into heaters"}};
  settings.profiles = {{"shell.profile", "K", "temperature through the wall", "shell.depth", {0, 0.01, 0.03}}};
  settings.provenance = {{"program_version", "1.2.3"}, {"title", "an example"}, {"model_text", "gaskettle: 1\n"}};
  return settings;
}

// Row i of the example: times 0, 0.5, 1, ...; values exact in binary, so that tests compare without tolerance.
inline void append_example_row(RecordWriter& writer, int i) {
  const std::array<double, 3> values = {300.0 + i, 0.75, 1000.0 * i};
  const std::array<double, 3> profile = {300.0 + i, 310.0 + i, 320.0 + i};
  writer.append(0.5 * i, values, profile);
}

inline Outcome example_outcome() {
  const double never = std::numeric_limits<double>::quiet_NaN();
  return {{{"hot", 1.5}, {"very hot", never}},
          {{"pressure", 2.5e6, 1.0, 0.5e6, never}},
          {{"closure_energy", 1.25e-9}, {"ended", std::string("end time")}, {"steps", std::int64_t{42}}}};
}

inline void write_example(const RecordWriter::Settings& settings, int rows = 4) {
  RecordWriter writer(settings);
  for (int i = 0; i < rows; ++i) append_example_row(writer, i);
  writer.add_event({1.0, "relief", "opened – wide", 0.0, 1.0});
  writer.finish(example_outcome());
}

}  // namespace gaskettle::test
