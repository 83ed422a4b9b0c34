/// What an instrument would read: a channel with a first-order lag, an offset and a range.
///
///   time_constant d(lagged)/dt = true - lagged;  reading = lagged + offset, held at the
///   ends of its range. The lagged value starts at the true one. Leaving and entering the
///   range are modes, so that a controller sees no kink within a step.
/// Source: D. E. Seborg et al., Process Dynamics and Control, chapter 5 (first-order lag).
#pragma once
#include "model/workspace.h"

namespace gaskettle {

class Sensor {
public:
  static constexpr const char* section = "sensors";
  static constexpr const char* kind = "sensor";
  static constexpr const char* meaning = "what an instrument would read";

  std::string name;
  Place place;

  void read(Section& s);
  void declare(Layout& layout);
  void connect(Layout& layout);
  void start(Event& e);

  template <class S>
  void sense(Workspace<S>& w) const {
    const S raw = (state_ >= 0 ? S(w.y[state_]) : w.out[channel_read_]) + offset_;
    S reading = raw;
    if (clip_ == Clip::low) reading = S(low_ + 0.0 * raw);
    if (clip_ == Clip::high) reading = S(high_ + 0.0 * raw);
    w.out[channel_] = reading;
  }
  template <class S>
  void finish(Workspace<S>& w) const {
    if (state_ >= 0)
      w.f[state_] = (w.out[channel_read_] - w.y[state_]) / time_constant_;
    else if (late_)
      sense(w);
  }

  int mode() const { return static_cast<int>(clip_); }
  static constexpr std::array guard_names = {"upper end of range", "lower end of range"};
  static constexpr bool guards_disturb = true;
  void guards(const Workspace<double>& w, double* g) const;
  void on_guard(int which, Event& e);

private:
  enum class Clip { none, low, high };
  Reference reads_;
  double time_constant_ = 0.0, offset_ = 0.0, low_ = 0.0, high_ = 0.0;
  bool ranged_ = false, late_ = false;
  const Node *offset_node_ = nullptr, *range_node_ = nullptr;
  std::string path_;
  ReadContext* context_ = nullptr;
  Clip clip_ = Clip::none;
  int state_ = -1, channel_read_ = 0, channel_ = 0;
};

}  // namespace gaskettle
