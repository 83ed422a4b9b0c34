/// Runs a model written as text through the whole program path: reader, plant,
/// integration, HDF5 record, and back.
#pragma once
#include <map>
#include <string>
#include <vector>

#include "run/case.h"

namespace gaskettle::testing {

struct ModelRun {
  std::string problems;  ///< what the reader refused; empty where it ran
  CaseResult result;
  std::vector<double> time;                            ///< s
  std::map<std::string, std::vector<double>> channel;  ///< every channel of the record, SI

  const std::vector<double>& operator[](const std::string& name) const;
  double last(const std::string& name) const { return (*this)[name].back(); }
  /// Value at a time by the row that stands exactly there (1e-12 relative), else linear between rows.
  double at(const std::string& name, double t) const;
  /// Time of the n-th event (from 0) of this part with this text; throws where there is none.
  double event_time(const std::string& part, const std::string& what, std::size_t n = 0) const;
  std::size_t event_count(const std::string& part, const std::string& what) const;
};

/// `set` as on the command line: "run.rtol=1e-11". Throws std::runtime_error with the problems
/// where the model is refused, unless `refusal_expected`.
ModelRun run_model(const std::string& yaml, const std::vector<std::string>& set = {}, bool refusal_expected = false);
/// The same for a file, relative to the source folder: "models/gas_spring.yaml".
ModelRun run_model_file(const std::string& path, const std::vector<std::string>& set = {});

}  // namespace gaskettle::testing
