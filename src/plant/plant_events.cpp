/// What the plant does at events and after steps.
#include <fmt/format.h>

#include <cmath>

#include "plant/evaluate.h"
#include "plant/plant.h"

namespace gaskettle {

/// An event in the making: books go straight into the states.
class Plant::EventAtWork : public Event {
public:
  EventAtWork(Plant& plant, double t, double* states) : plant_(plant) {
    time = t;
    y = states;
    layout = &plant.layout_;
    before = &plant.before_;
  }
  void book(int ledger_entry, double amount) override {
    y[ledger_entry] += amount;
    y[layout->throughput_state] += std::abs(amount);
  }
  void generate(Mechanism mechanism, double amount) override {
    y[layout->entropy_state[static_cast<std::size_t>(mechanism)]] += amount;
  }
  void carry_entropy(double amount) override { y[layout->entropy_transfer_state] += amount; }
  void log(const std::string& part, const std::string& what, double value_before, double value_after) override {
    plant_.events_.push_back({time, part, what, value_before, value_after});
  }
  const Workspace<double>& now() override {
    evaluate(plant_.model_.parts, plant_.look_, time, y, plant_.look_f_.data(), true);
    return plant_.look_;
  }
  double channel_rate(int channel) override {
    now();
    plant_.fill_rates_of_change(plant_.look_);
    return plant_.look_.out_rate[static_cast<std::size_t>(channel)];
  }

private:
  Plant& plant_;
};

std::vector<double> Plant::start() {
  std::vector<double> y;
  for (const StateInfo& s : layout_.states) y.push_back(s.initial);
  events_.clear();
  for (InputInfo& i : layout_.inputs) i.signal.advance(0.0);
  last_y_ = y;
  last_t_ = 0.0;
  evaluate(model_.parts, before_, 0.0, y.data(), before_f_.data(), true);
  EventAtWork e(*this, 0.0, y.data());
  for_each_part(model_.parts, [&](auto& p) {
    if constexpr (requires { p.start(e); }) {
      p.start(e);
      // The next part may build on what this one has set.
      evaluate(model_.parts, before_, 0.0, y.data(), before_f_.data(), true);
    }
  });
  last_y_ = y;
  current_ = nullptr;
  start_entropy_ = 0.0;
  for (const SpaceInfo& s : layout_.spaces)
    start_entropy_ += before_.total_mass(s.index) * before_.gas[s.index].entropy;
  if (rates_of_change_wanted()) fill_rates_of_change(before_);
  watch_.start(before_);
  return y;
}

void Plant::dispatch_guard(int i, Event& e) {
  if (i >= part_guards_) {
    watch_.on_guard(i - part_guards_, e);
    return;
  }
  int first = 0;
  for_each_part(model_.parts, [&](auto& p) {
    using Part = std::decay_t<decltype(p)>;
    if constexpr (requires { Part::guard_names; }) {
      constexpr int count = static_cast<int>(Part::guard_names.size());
      if (i >= first && i < first + count) p.on_guard(i - first, e);
      first += count;
    }
  });
}

EventResult Plant::on_events(double t, double* y, const std::vector<int>& fired, bool time_event) {
  evaluate(model_.parts, before_, t, y, before_f_.data(), true);
  if (rates_of_change_wanted()) fill_rates_of_change(before_);
  EventAtWork e(*this, t, y);
  EventResult result;
  if (time_event) {
    bool corner = false;
    for (InputInfo& i : layout_.inputs) {
      // A signal whose corner lies at t stands before it until it is advanced.
      const double level = i.signal.at(t), slope = i.signal.slope(t);
      i.signal.advance(t);
      corner = corner || i.signal.at(t) != level || i.signal.slope(t) != slope;
    }
    result.disturbed = corner;
    if (corner)
      for_each_part(model_.parts, [&](auto& p) {
        if constexpr (requires { p.on_inputs_changed(e); }) p.on_inputs_changed(e);
      });
    watch_.on_time(t, e);
  }
  for (const int i : fired) {
    result.disturbed = result.disturbed || guard_disturbs(i);
    dispatch_guard(i, e);
  }
  if (result.disturbed) {
    for_each_kind(model_.parts, [&]<class Part>(std::vector<Part>& list) {
      if constexpr (requires { Part::settle_all(std::span<Part>(list), e, true); })
        Part::settle_all(std::span<Part>(list), e, true);
    });
    last_y_.assign(y, y + size());
    last_t_ = t;
    current_ = nullptr;
  }
  if (watch_.stop_reached()) {
    result.stop = true;
    result.stop_reason = "target " + watch_.stop_name() + " reached";
  }
  return result;
}

bool Plant::after_step(double t, double* y) {
  bool changed = false;
  EventAtWork e(*this, t, y);
  for_each_kind(model_.parts, [&]<class Part>(std::vector<Part>& list) {
    if constexpr (requires { Part::settle_all(std::span<Part>(list), e, false); })
      changed = Part::settle_all(std::span<Part>(list), e, false) || changed;
  });
  return changed;
}

}  // namespace gaskettle
