/// Rows of a record and the extremes between them, from the steps of a run.
#pragma once
#include <string>
#include <vector>

#include "plant/ideal_departure.h"
#include "plant/plant.h"
#include "record/record_writer.h"
#include "run/case.h"
#include "solve/dense_step.h"

namespace gaskettle {

/// Writes rows at regular times and one on each side of every event, with times that rise
/// strictly: the row before an event stands at the last double below its time.
class RowSampler {
public:
  RowSampler(Plant& plant, RecordWriter* writer, double every);
  void start(double t, const double* y);
  void piece(const DenseStep& step, double from, double to);
  void before_event(double t, const double* y);
  void after_event(double t, const double* y);
  void finish(double t, const double* y);

private:
  void flush_pending();
  void row(double t, const double* y);
  Plant& plant_;
  RecordWriter* writer_;
  double every_;
  long next_ = 0;
  double last_ = -1.0;
  bool pending_ = false;
  double pending_time_ = 0.0;
  std::vector<double> pending_y_, y_, values_, profile_;
};

/// Follows limits and relief devices between rows: samples inside each step, a local
/// extreme refined on the interpolant.
class ExtremeTracker {
public:
  explicit ExtremeTracker(Plant& plant);
  void look(double t, const double* y);
  void piece(const DenseStep& step, double from, double to);
  const std::vector<ReliefOutcome>& reliefs() const { return reliefs_; }
  const std::vector<ChannelRange>& ranges() const { return ranges_; }
  const std::vector<IdealGasUse>& ideal_gas() const { return ideal_gas_; }
  void finish(double t, const double* y);

private:
  void take(double t, const Workspace<double>& w);
  void take_ranges(double t, const Workspace<double>& w);
  void take_relief(double t, const double* y, const Workspace<double>& w);
  void refine(const DenseStep& step, double low, double high, std::size_t limit);
  Plant& plant_;
  std::vector<ReliefOutcome> reliefs_;
  std::vector<ChannelRange> ranges_;
  std::vector<int> ranged_channels_;
  std::vector<IdealGasUse> ideal_gas_;
  std::vector<IdealDeparture> departure_;
  std::vector<double> y_;
};

}  // namespace gaskettle
