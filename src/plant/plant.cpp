#include "plant/plant.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <limits>

#include "plant/evaluate.h"
#include "solve/colouring.h"

namespace gaskettle {

namespace {
constexpr double infinity = std::numeric_limits<double>::infinity();
}

Plant::Plant(Model model, ReadContext& context)
    : model_(std::move(model)), layout_(context.problems, context.atmosphere) {
  lay_out(context);
}

Plant::~Plant() = default;

/// One step of laying out one part. Who stumbles over a mistake is noted as unsound, so that those who refer to it
/// are not blamed in turn; and an exception after a reported problem is only its echo.
template <class Part, class Step>
void Plant::attempt(const Part& part, Step&& step) {
  const std::size_t before = layout_.troubles();
  bool failed = false;
  try {
    step();
  } catch (const std::exception& e) {
    failed = true;
    if (before == 0) layout_.error(part.place, fmt::format("{} '{}': {}", Part::kind, part.name, e.what()));
  }
  if (failed || layout_.troubles() > before) layout_.unsound.insert(part.name);
}

void Plant::lay_out(ReadContext& context) {
  layout_.own_gases = model_.own_gases;
  layout_.surroundings_gas = model_.surroundings.gas;
  layout_.run_length = model_.run.until;
  layout_.rtol = model_.run.rtol;
  layout_.unsound = context.unsound;
  connect_surroundings(model_.surroundings, layout_);
  for_each_part(model_.parts, [&](auto& p) { attempt(p, [&] { p.declare(layout_); }); });
  if (layout_.spaces.empty()) return;
  layout_.close_gases();
  claim_books();
  for_each_part(model_.parts, [&](auto& p) {
    attempt(p, [&] { p.connect(layout_); });
    layout_.part_names.push_back(p.name);
    layout_.part_kinds.emplace_back(std::decay_t<decltype(p)>::kind);
  });
  const auto pistons = std::get<std::vector<Piston>>(model_.parts).size();
  layout_.scratch_size = pistons * (pistons + 1);
  watch_.connect(model_, context, layout_);
  if (!context.problems.empty()) return;  // nobody will run it
  claim_guards();
  size_states();
  prepare_workspaces();
}

void Plant::claim_books() {
  for (const char* m : mechanism_names)
    layout_.entropy_state.push_back(layout_.add_state(std::string("entropy.") + m, 0.0));
  layout_.entropy_transfer_state = layout_.add_state("entropy.transfer", 0.0);
  layout_.throughput_state = layout_.add_state("energy.throughput", infinity);
  const int species = layout_.mixture.count();
  if (species > 1) layout_.mixing_carried_state = layout_.add_state("entropy.mixing_carried", 0.0);
  for (int k = 0; k < species; ++k) {
    layout_.mass_in_state.push_back(layout_.add_state("mass.in." + layout_.mixture.species(k).name, -1.0));
    layout_.mass_out_state.push_back(layout_.add_state("mass.out." + layout_.mixture.species(k).name, -1.0));
  }
}

void Plant::claim_guards() {
  for_each_part(model_.parts, [&](auto& p) {
    using Part = std::decay_t<decltype(p)>;
    if constexpr (requires { Part::guard_names; }) {
      for (const char* g : Part::guard_names) {
        guard_names_.push_back(p.name + ": " + g);
        guard_disturbs_.push_back(Part::guards_disturb);
      }
    }
  });
  part_guards_ = static_cast<int>(guard_names_.size());
  for (int i = 0; i < watch_.guard_count(); ++i) {
    guard_names_.push_back(watch_.guard_name(i));
    guard_disturbs_.push_back(false);
  }
}

/// Books are judged by what the plant holds: energies by its energy, entropies by that over a temperature.
void Plant::size_states() {
  double energy = 0.0, mass = 0.0, gas_energy = 0.0;
  for (const StoreInfo& s : layout_.stores) {
    energy += layout_.states[s.state].typical;
    if (s.space >= 0) gas_energy += layout_.states[s.state].typical;
  }
  for (const SpaceInfo& s : layout_.spaces)
    for (const double m : s.mass) mass += m;
  for (StateInfo& s : layout_.states) {
    const bool entropy = s.name.rfind("entropy.", 0) == 0;
    if (s.typical == 0.0) s.typical = entropy ? 1e-2 * gas_energy / 300.0 : energy;
    if (s.typical < 0.0) s.typical = mass;
    typical_.push_back(s.typical);
  }
}

void Plant::prepare_workspaces() {
  for (Workspace<double>* w : {&work_, &before_, &look_}) {
    w->prepare(layout_);
    w->out_rate.assign(layout_.channels.size(), 0.0);
    w->band = std::max(smallest_pressure_band, layout_.rtol);
  }
  dual_.prepare(layout_);
  dual_.band = work_.band;
  const auto n = layout_.states.size();
  dual_y_.resize(n);
  dual_f_.resize(n);
  before_f_.resize(n);
  look_f_.resize(n);
  scratch_rates_.resize(n);
}

void Plant::rates(double t, const double* y, double* f) { evaluate(model_.parts, work_, t, y, f, false); }

bool Plant::admissible(double t, const double* y) {
  begin_evaluation(work_, t, y, scratch_rates_.data());
  for_each_part(model_.parts, [&](const auto& p) {
    if constexpr (requires { p.prepare(work_); }) p.prepare(work_);
  });
  for (const SpaceInfo& s : layout_.spaces) {
    if (!(work_.volume[s.index] > 0.0)) return false;
    const double total = work_.total_mass(s.index);
    if (!(total > 0.0)) return false;
    for (int k = 0; k < work_.species_count; ++k)
      if (!(work_.space_mass(s.index)[k] > -1e-6 * total)) return false;
  }
  for (const StoreInfo& s : layout_.stores)
    if (s.space < 0 && !(work_.temperature[&s - layout_.stores.data()] > 0.0)) return false;
  return true;
}

std::vector<int> Plant::modes() const {
  std::vector<int> list;
  for_each_part(model_.parts, [&](const auto& p) {
    if constexpr (requires { p.mode(); }) list.push_back(p.mode());
  });
  return list;
}

Plant::Pattern Plant::make_pattern(double t, const double* y) {
  const auto n = static_cast<std::size_t>(size());
  Workspace<DependencySet> w;
  w.prepare(layout_);
  w.band = work_.band;
  std::vector<DependencySet> states(n), rates_of(n);
  for (std::size_t i = 0; i < n; ++i) states[i] = DependencySet::input(y[i], static_cast<int>(i));
  evaluate(model_.parts, w, DependencySet(t), states.data(), rates_of.data(), false);
  std::vector<std::vector<int>> columns(n);
  for (std::size_t i = 0; i < n; ++i) {
    rates_of[i].for_each([&](int j) { columns[i].push_back(j); });
    if (!rates_of[i].depends_on(static_cast<int>(i))) columns[i].push_back(static_cast<int>(i));
    std::sort(columns[i].begin(), columns[i].end());
  }
  Pattern p;
  p.version = static_cast<int>(patterns_.size()) + 1;
  p.sparsity = make_sparsity(columns);
  p.colour = colour_columns(p.sparsity);
  p.colours = colour_count(p.colour);
  return p;
}

const Plant::Pattern& Plant::pattern() {
  if (current_ != nullptr) return *current_;
  std::vector<int> key = modes();
  auto found = patterns_.find(key);
  if (found == patterns_.end()) found = patterns_.emplace(std::move(key), make_pattern(last_t_, last_y_.data())).first;
  current_ = &found->second;
  return *current_;
}

const Sparsity& Plant::sparsity() { return pattern().sparsity; }
int Plant::sparsity_version() { return pattern().version; }

void Plant::jacobian(double t, const double* y, double* values, double* dfdt) {
  const Pattern& p = pattern();
  const int n = size();
  // Time takes the lane after the last colour.
  const int columns = p.colours + 1;
  for (int first = 0; first < columns; first += lanes) {
    for (int i = 0; i < n; ++i) {
      dual_y_[i] = Dual<lanes>(y[i]);
      const int lane = p.colour[i] - first;
      if (p.colour[i] >= 0 && lane >= 0 && lane < lanes) dual_y_[i].d[lane] = 1.0;
    }
    Dual<lanes> time(t);
    const int time_lane = p.colours - first;
    if (time_lane >= 0 && time_lane < lanes) time.d[time_lane] = 1.0;
    evaluate(model_.parts, dual_, time, dual_y_.data(), dual_f_.data(), false);
    for (int i = 0; i < n; ++i)
      for (int q = p.sparsity.row_start[i]; q < p.sparsity.row_start[i + 1]; ++q) {
        const int lane = p.colour[p.sparsity.columns[q]] - first;
        if (lane >= 0 && lane < lanes) values[q] = dual_f_[i].d[lane];
      }
    if (time_lane >= 0 && time_lane < lanes)
      for (int i = 0; i < n; ++i) dfdt[i] = dual_f_[i].d[time_lane];
  }
}

bool Plant::rates_of_change_wanted() const {
  if (watch_.needs_rates()) return true;
  bool wanted = false;
  for (const Controller& c : std::get<std::vector<Controller>>(model_.parts)) wanted = wanted || c.needs_rate();
  return wanted;
}

/// d(channel)/dt along the motion: one dual pass with dy/dt = f.
void Plant::fill_rates_of_change(Workspace<double>& w) {
  for (std::size_t i = 0; i < layout_.states.size(); ++i) {
    dual_y_[i] = Dual<lanes>(w.y[i]);
    dual_y_[i].d[0] = w.f[i];
  }
  Dual<lanes> time(w.t);
  time.d[0] = 1.0;
  evaluate(model_.parts, dual_, time, dual_y_.data(), dual_f_.data(), true);
  for (std::size_t c = 0; c < layout_.channels.size(); ++c) w.out_rate[c] = dual_.out[c].d[0];
}

const Workspace<double>& Plant::observe(double t, const double* y) {
  evaluate(model_.parts, look_, t, y, look_f_.data(), true);
  if (rates_of_change_wanted()) fill_rates_of_change(look_);
  return look_;
}

const Workspace<double>& Plant::observe_with_rates(double t, const double* y) {
  evaluate(model_.parts, look_, t, y, look_f_.data(), true);
  fill_rates_of_change(look_);
  return look_;
}

void Plant::guards(double t, const double* y, double* g) {
  evaluate(model_.parts, work_, t, y, scratch_rates_.data(), true);
  if (rates_of_change_wanted()) fill_rates_of_change(work_);
  for_each_part(model_.parts, [&](const auto& p) {
    using Part = std::decay_t<decltype(p)>;
    if constexpr (requires { Part::guard_names; }) {
      p.guards(work_, g);
      g += Part::guard_names.size();
    }
  });
  watch_.guards(work_, g);
}

double Plant::next_time_event(double t) const {
  double next = watch_.next_time(t);
  for (const InputInfo& i : layout_.inputs) next = std::min(next, i.signal.next_corner(t));
  return next;
}

}  // namespace gaskettle
