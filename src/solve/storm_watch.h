/// Notices events that keep time from moving on.
#pragma once
#include <set>
#include <vector>

namespace gaskettle {

/// 100 events while time advances by no more than 1e-12 of the run are a storm.
class StormWatch {
public:
  static constexpr int most_events = 100;

  explicit StormWatch(double run_length) : resolution_(1e-12 * run_length) {}

  /// Counts one event; true when it makes a storm.
  bool note(double t, const std::vector<int>& fired) {
    if (t - since_ > resolution_) {
      since_ = t;
      count_ = 0;
      guards_.clear();
    }
    guards_.insert(fired.begin(), fired.end());
    return ++count_ >= most_events;
  }

  double since() const { return since_; }
  int count() const { return count_; }
  /// Guards that took part, ascending.
  const std::set<int>& guards() const { return guards_; }

private:
  double resolution_, since_ = 0;
  int count_ = 0;
  std::set<int> guards_;
};

}  // namespace gaskettle
