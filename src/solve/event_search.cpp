#include "solve/event_search.h"

namespace gaskettle {

EventSearch::EventSearch(int guards, int samples, double run_length)
    : guards_(guards),
      samples_(samples),
      run_length_(run_length),
      armed_(guards, 1),
      just_fired_(guards, 0),
      fired_at_(guards, 0.0),
      margin_(guards, 0.0),
      times_(samples + 3),
      values_(static_cast<std::size_t>(samples + 3) * guards),
      scratch_(guards) {}

void EventSearch::rearm(const double* g) {
  for (int q = 0; q < guards_; ++q)
    if (g[q] < -margin_[q]) {
      armed_[q] = 1;
      margin_[q] = 0;
    }
}

void EventSearch::disarm(int q, double g) {
  armed_[q] = 0;
  just_fired_[q] = 1;
  fired_at_[q] = g;
  margin_[q] = g < 0 ? -2 * g : 0;
}

void EventSearch::moved_on(const double* g) {
  for (int q = 0; q < guards_; ++q) {
    just_fired_[q] = just_fired_[q] && still_at_root(q, g[q]);
    margin_[q] = 0;
  }
}

void EventSearch::disarm_jumped(int q) {
  armed_[q] = 0;
  just_fired_[q] = 0;
  margin_[q] = 0;
}

bool EventSearch::still_at_root(int q, double g) const {
  return std::fabs(g) <= 4 * std::fabs(fired_at_[q]) + std::numeric_limits<double>::min();
}

void EventSearch::pending(const double* g, std::vector<int>& fired) const {
  fired.clear();
  for (int q = 0; q < guards_; ++q)
    if (armed_[q] && g[q] > 0) fired.push_back(q);
}

bool EventSearch::came_from_below(int q) const {
  bool armed = armed_[q];
  for (int r = 0; r + 1 < rows_; ++r) {
    armed = armed || at(r, q) < -margin_at(r, q);
    if (armed && at(r, q) < 0) return true;
  }
  return false;
}

}  // namespace gaskettle
