/// One evaluation of all parts, phase by phase, kind by kind (see model/workspace.h).
#pragma once
#include <algorithm>

#include "model/workspace.h"
#include "parts/catalogue.h"

namespace gaskettle {

/// Calls visit(list of parts of one kind) for every kind, in catalogue order.
template <class Lists, class F>
void for_each_kind(Lists& lists, F&& visit) {
  std::apply([&](auto&... list) { (visit(list), ...); }, lists);
}

/// Calls visit(part) for every part.
template <class Lists, class F>
void for_each_part(Lists& lists, F&& visit) {
  for_each_kind(lists, [&](auto& list) {
    for (auto& part : list) visit(part);
  });
}

/// Inputs and accumulators at time t with states y; rates will go to f.
template <class S>
void begin_evaluation(Workspace<S>& w, const S& t, const S* y, S* f) {
  const Layout& layout = *w.layout;
  w.t = t;
  w.y = y;
  w.f = f;
  std::fill(f, f + layout.states.size(), S(0.0));
  std::fill(w.power.begin(), w.power.end(), S(0.0));
  for (std::size_t i = 0; i < layout.inputs.size(); ++i)
    w.input[i] = layout.inputs[i].driver < 0 ? layout.inputs[i].signal.at(t) : S(0.0);
  w.ambient_temperature = w.input[layout.ambient_temperature_input];
  w.wind = w.input[layout.wind_input];
}

/// The whole evaluation. `observe` also fills the channels that only a record wants.
template <class S>
void evaluate(const Catalogue::Lists& parts, Workspace<S>& w, const S& t, const S* y, S* f, bool observe) {
  begin_evaluation(w, t, y, f);
  for_each_part(parts, [&](const auto& p) {
    if constexpr (requires { p.prepare(w); }) p.prepare(w);
  });
  for_each_part(parts, [&](const auto& p) {
    if constexpr (requires { p.evaluate(w); }) p.evaluate(w);
  });
  for_each_part(parts, [&](const auto& p) {
    if constexpr (requires { p.sense(w); }) p.sense(w);
  });
  for_each_part(parts, [&](const auto& p) {
    if constexpr (requires { p.control(w); }) p.control(w);
  });
  for_each_part(parts, [&](const auto& p) {
    if constexpr (requires { p.exchange(w); }) p.exchange(w);
  });
  for_each_kind(parts, [&]<class Part>(const std::vector<Part>& list) {
    if constexpr (requires { Part::move_all(std::span<const Part>(list), w); })
      Part::move_all(std::span<const Part>(list), w);
  });
  for (std::size_t i = 0; i < w.power.size(); ++i) f[w.layout->stores[i].state] = w.power[i];
  for_each_part(parts, [&](const auto& p) {
    if constexpr (requires { p.finish(w); }) p.finish(w);
  });
  if (observe)
    for_each_part(parts, [&](const auto& p) {
      if constexpr (requires { p.observe(w); }) p.observe(w);
    });
}

}  // namespace gaskettle
