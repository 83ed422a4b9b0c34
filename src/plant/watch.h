/// Targets and limits: what the run is watched for.
#pragma once
#include <limits>
#include <string>
#include <vector>

#include "model/workspace.h"
#include "plant/model.h"

namespace gaskettle {

/// The first time a quantity reaches a value, or enters a band and stays.
struct Target {
  std::string name;
  int channel = -1;
  bool settles = false;
  double level = 0.0;     ///< the value to reach, or the middle of the band
  double band = 0.0;      ///< half width, where it settles
  double duration = 0.0;  ///< s, how long it must stay
  std::string duration_unit;
  int direction = 0;                                       ///< +1 rising, -1 falling, 0 either
  int after = -1;                                          ///< the target that must come first
  std::string unit;                                        ///< as the model writes the level
  double time = std::numeric_limits<double>::quiet_NaN();  ///< when reached, s

  bool reached() const { return time == time; }
  // While running:
  bool armed = false;
  int side = 0;  ///< +1 below the level (waiting to rise), -1 above
  double inside_since = std::numeric_limits<double>::quiet_NaN();
};

/// A quantity that must stay below or above a value.
struct Limit {
  std::string name;
  int channel = -1, minus = -1;
  bool rate = false;  ///< on the rate of change of the channel
  bool below = true;
  double bound = 0.0;  ///< SI; pressures absolute
  UnitKind kind;
  std::string unit;  ///< as the model writes the bound
  std::string what;  ///< "chamber.pressure", "rate of chamber.temperature"
  double extreme = std::numeric_limits<double>::quiet_NaN(), extreme_time = 0.0;
  double crossed = std::numeric_limits<double>::quiet_NaN();  ///< first crossing, s

  /// What rounding and integration may add to a quantity that stands at its bound: equality keeps a limit.
  double slack() const { return 1e-11 * (bound < 0.0 ? -bound : bound); }
  bool broken() const { return margin() < 0.0; }
  /// Positive while kept; 0 at the bound.
  double margin() const {
    const double room = below ? bound - extreme : extreme - bound;
    return room > slack() || room < -slack() ? room : 0.0;
  }
};

class Watch {
public:
  /// Resolves channels and reads values in their units; problems go to the layout.
  void connect(const Model& model, ReadContext& context, Layout& layout);

  int guard_count() const { return static_cast<int>(targets_.size() + limits_.size()); }
  std::string guard_name(int i) const;
  bool needs_rates() const;
  /// Sets the state at time 0.
  void start(const Workspace<double>& w);
  void guards(const Workspace<double>& w, double* g) const;
  void on_guard(int i, Event& e);
  /// Targets whose stay is long enough by this time.
  void on_time(double t, Event& e);
  double next_time(double t) const;
  /// True once the target that ends the run is reached.
  bool stop_reached() const { return stop_ >= 0 && targets_[stop_].reached(); }
  std::string stop_name() const { return stop_ >= 0 ? targets_[stop_].name : ""; }

  double limit_value(const Limit& limit, const Workspace<double>& w) const;
  const std::vector<Target>& targets() const { return targets_; }
  std::vector<Limit>& limits() { return limits_; }
  const std::vector<Limit>& limits() const { return limits_; }

private:
  void connect_target(const WatchSpec& spec, ReadContext& context, Layout& layout);
  void connect_limit(const WatchSpec& spec, ReadContext& context, Layout& layout);
  void arm(Target& target, const Workspace<double>& w) const;
  void reach(Target& target, double time, Event& e);

  std::vector<Target> targets_;
  std::vector<Limit> limits_;
  int stop_ = -1;
};

void describe_watches(ReadContext& context);

}  // namespace gaskettle
