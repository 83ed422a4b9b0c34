#include "plant/books.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

namespace gaskettle {

namespace {
/// -R sum(n ln x) of the gas of a space, J/K.
double mixing_entropy(const Layout& layout, const double* mass) {
  const int count = layout.mixture.count();
  double moles = 0.0, sum = 0.0;
  for (int k = 0; k < count; ++k) moles += mass[k] / layout.mixture.species(k).molar_mass;
  for (int k = 0; k < count; ++k) sum -= x_log_x(mass[k] / layout.mixture.species(k).molar_mass / moles);
  return molar_gas_constant * moles * sum;
}

double stored_energy(const Layout& layout, const double* y) {
  double sum = 0.0;
  for (const StoreInfo& s : layout.stores) sum += y[s.state];
  return sum;
}

/// Entropy gained by all stores since the start, J/K.
double entropy_change(const Plant& plant, const Workspace<double>& w) {
  const Layout& layout = plant.layout();
  double gas = -plant.gas_entropy_at_start(), solid = 0.0;
  for (const SpaceInfo& s : layout.spaces) gas += w.total_mass(s.index) * w.gas[s.index].entropy;
  for (const StoreInfo& s : layout.stores)
    if (s.space < 0) solid += s.capacity * std::log1p(w.y[s.state] / (s.capacity * s.temperature));
  return gas + solid;
}

/// Species mixing generated so far: what the spaces hold less what was carried in.
double species_mixing(const Plant& plant, const Workspace<double>& w) {
  const Layout& layout = plant.layout();
  if (layout.mixing_carried_state < 0) return 0.0;
  double sum = -w.y[layout.mixing_carried_state];
  for (const SpaceInfo& s : layout.spaces)
    sum += mixing_entropy(layout, w.space_mass(s.index)) - mixing_entropy(layout, s.mass.data());
  return sum;
}

void close_energy(const Plant& plant, const double* y, Books& b) {
  const Layout& layout = plant.layout();
  double residual = 0.0;
  for (const auto& e : layout.ledger_entries) {
    b.term[static_cast<std::size_t>(e.term)] += y[e.state];
    residual += ledger_sign(e.term) * y[e.state];
    if (static_cast<int>(e.term) >= first_work_term) b.boundary_work += y[e.state];
  }
  b.stored = stored_energy(layout, y);
  residual -= b.stored;
  b.throughput = y[layout.throughput_state];
  b.closure_energy = b.throughput > 0.0 ? std::abs(residual) / b.throughput : 0.0;
}

void close_mass(const Plant& plant, const double* y, Books& b) {
  const Layout& layout = plant.layout();
  for (int k = 0; k < layout.mixture.count(); ++k) {
    double change = 0.0;
    for (const SpaceInfo& s : layout.spaces)
      if (s.mass_state[k] >= 0) change += y[s.mass_state[k]];
    const double in = y[layout.mass_in_state[k]], out = y[layout.mass_out_state[k]];
    b.mass_in.push_back(in);
    b.mass_out.push_back(out);
    b.mass_change.push_back(change);
    if (in + out > 0.0) b.closure_mass = std::max(b.closure_mass, std::abs(in - out - change) / (in + out));
  }
}

/// J; no less than a piston's greatest kinetic energy where stops took it.
double lost_at_stops(const Layout& layout, const std::string& piston, const double* y) {
  for (const auto& e : layout.ledger_entries)
    if (e.term == LedgerTerm::impact && e.part == piston) return y[e.state];
  return 0.0;
}

void compare_work(const Plant& plant, const Workspace<double>& w, Books& b) {
  for (const Piston& p : std::get<std::vector<Piston>>(plant.model().parts)) {
    if (p.has_spring()) {
      const double start = p.spring_energy_at_start(), now = p.spring_energy(w);
      b.work.push_back({"spring energy of " + p.name, w.y[p.spring_entry()], now - start,
                        std::max({start, now, std::abs(now - start)})});
    }
    if (p.kinetic_comparable()) {
      const double start = p.kinetic_energy_at_start(), now = p.kinetic_energy(w) + p.kinetic_carried_away();
      b.work.push_back({"kinetic energy of " + p.name, w.y[p.kinetic_entry()], now - start,
                        std::max(p.greatest_kinetic_energy(), lost_at_stops(plant.layout(), p.name, w.y))});
    }
  }
}
}  // namespace

Books close_books(Plant& plant, double t, const double* y) {
  const Workspace<double>& w = plant.observe(t, y);
  const Layout& layout = plant.layout();
  Books b;
  close_energy(plant, y, b);
  close_mass(plant, y, b);
  for (int m = 0; m < mechanism_count; ++m) b.entropy[m] = y[layout.entropy_state[m]];
  b.entropy[static_cast<std::size_t>(Mechanism::mixing)] += species_mixing(plant, w);
  for (const double s : b.entropy) b.generated += s;
  b.entropy_carried = y[layout.entropy_transfer_state];
  b.entropy_change = entropy_change(plant, w);
  compare_work(plant, w, b);
  return b;
}

std::vector<BookColumn> book_columns(const Plant& plant) {
  const Layout& layout = plant.layout();
  std::vector<BookColumn> list;
  for (int i = 0; i < ledger_term_count; ++i)
    list.push_back({std::string("energy.") + ledger_names[i], "J", ledger_meanings[i]});
  list.push_back({"energy.boundary_work", "J", "work done by the gas on its moving boundaries"});
  list.push_back({"energy.stored", "J", "gained by gas, walls, bodies and elements since the start"});
  for (const auto& e : layout.ledger_entries) {
    const auto i = static_cast<std::size_t>(e.term);
    list.push_back(
        {fmt::format("energy.{}.{}", ledger_names[i], e.part), "J", fmt::format("{}: {}", e.part, ledger_meanings[i])});
  }
  for (int k = 0; k < layout.mixture.count(); ++k) {
    const std::string& gas = layout.mixture.species(k).name;
    list.push_back({"mass.in." + gas, "kg", gas + " that came in"});
    list.push_back({"mass.out." + gas, "kg", gas + " that went out"});
  }
  for (int m = 0; m < mechanism_count; ++m)
    list.push_back({std::string("entropy.") + mechanism_names[m], "J K-1",
                    std::string("entropy generated by ") + mechanism_meanings[m]});
  list.push_back({"entropy.generated", "J K-1", "entropy generated, all mechanisms"});
  return list;
}

void book_values(const Plant& plant, const Workspace<double>& w, std::vector<double>& out) {
  const Layout& layout = plant.layout();
  std::array<double, ledger_term_count> total{};
  double work = 0.0;
  for (const auto& e : layout.ledger_entries) {
    total[static_cast<std::size_t>(e.term)] += w.y[e.state];
    if (static_cast<int>(e.term) >= first_work_term) work += w.y[e.state];
  }
  out.insert(out.end(), total.begin(), total.end());
  out.push_back(work);
  out.push_back(stored_energy(layout, w.y));
  for (const auto& e : layout.ledger_entries) out.push_back(w.y[e.state]);
  for (int k = 0; k < layout.mixture.count(); ++k) {
    out.push_back(w.y[layout.mass_in_state[k]]);
    out.push_back(w.y[layout.mass_out_state[k]]);
  }
  double generated = 0.0;
  for (int m = 0; m < mechanism_count; ++m) {
    double s = w.y[layout.entropy_state[m]];
    if (m == static_cast<int>(Mechanism::mixing)) s += species_mixing(plant, w);
    out.push_back(s);
    generated += s;
  }
  out.push_back(generated);
}

}  // namespace gaskettle
