/// One case from start to end: integrate, record, watch, close the books.
#pragma once
#include <atomic>
#include <functional>
#include <limits>
#include <string>
#include <vector>

#include "plant/books.h"
#include "plant/plant.h"
#include "record/record_data.h"
#include "solve/settings.h"

namespace gaskettle {

struct CaseOptions {
  std::string record_path;  ///< empty: no record is written
  bool overwrite = false;
  Provenance provenance;
  std::string identity;                          ///< same model and settings: same text
  const std::atomic<bool>* interrupt = nullptr;  ///< set to end the run where it is
  std::function<void(double t, double until)> progress;
};

/// What a relief device did.
struct ReliefOutcome {
  std::string name;
  bool disc = false;
  long lifts = 0;
  double first_lift = std::numeric_limits<double>::quiet_NaN();  ///< s
  double greatest_opening = 0.0;
  double peak_pressure = 0.0;  ///< Pa absolute, the highest at its inlet
  double accumulation = 0.0;   ///< (peak gauge - set gauge) / set gauge
  double set_pressure = 0.0;   ///< Pa absolute
  double capacity = 0.0;       ///< kg/s fully open at the peak pressure
  double needed = 0.0;         ///< kg/s, the greatest flow that would have held the pressure while at or above set
  double released = 0.0;       ///< kg
};

/// How far a temperature, pressure or position went.
struct ChannelRange {
  std::string channel;
  UnitKind kind;
  std::string unit;                                                                      ///< as the model writes it
  double lowest = 0.0, lowest_time = 0.0, highest = 0.0, highest_time = 0.0, end = 0.0;  ///< SI, s
};

/// Where a gas was farthest from an ideal one.
struct IdealGasUse {
  std::string space;
  double departure = 0.0, time = 0.0;  ///< |Z - 1|, s
};

struct CaseResult {
  Ending ending;
  Books books;
  std::vector<Target> targets;
  std::vector<Limit> limits;
  std::vector<ReliefOutcome> reliefs;
  std::vector<ChannelRange> ranges;
  std::vector<IdealGasUse> ideal_gas;
  std::vector<LoggedEvent> events;
  std::vector<std::string> warnings;
  std::vector<std::pair<std::string, double>> end_values;  ///< channel, SI
  std::string record_path;
  double wall_seconds = 0.0;

  bool books_closed() const { return books.closure_energy <= closure_bound && books.closure_mass <= closure_bound; }
  bool limit_broken() const;
  bool target_missed() const;
  bool partial() const { return !ending.complete(); }
};

/// Runs the plant. Errors of the record (RecordError) are thrown before anything is computed
/// where that can be known; a run that cannot go on is a result, with its partial record.
CaseResult run_case(Plant& plant, const CaseOptions& options);

}  // namespace gaskettle
