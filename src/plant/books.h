/// The books of a run: energy and mass ledgers, entropy audit, work against state functions.
#pragma once
#include <array>
#include <string>
#include <vector>

#include "plant/plant.h"

namespace gaskettle {

/// A quadrature of the ledger beside the state function it should equal.
struct WorkComparison {
  std::string what;                  ///< "kinetic energy of ram"
  double ledger = 0.0, state = 0.0;  ///< J
  double scale = 0.0;                ///< J, what the difference is judged by
  double difference() const { return ledger - state; }
};

struct Books {
  std::array<double, ledger_term_count> term{};        ///< J, by LedgerTerm
  double boundary_work = 0.0, stored = 0.0;            ///< J
  double throughput = 0.0;                             ///< J
  double closure_energy = 0.0;                         ///< |residual| / throughput
  std::vector<double> mass_in, mass_out, mass_change;  ///< kg, per species
  double closure_mass = 0.0;                           ///< the worst species
  std::array<double, mechanism_count> entropy{};       ///< J/K generated, by Mechanism, mixing completed
  double generated = 0.0;                              ///< J/K
  double entropy_change = 0.0, entropy_carried = 0.0;  ///< J/K, of all stores; net across the boundary
  std::vector<WorkComparison> work;

  /// change - carried - generated, J/K: zero where gas model, wiring and integration agree.
  double entropy_imbalance() const { return entropy_change - entropy_carried - generated; }
};

/// The bound on closure that every plant keeps at any tolerance.
inline constexpr double closure_bound = 1e-10;

/// Closes the books at time t with states y.
Books close_books(Plant& plant, double t, const double* y);

/// One more column of a record: a total or a book.
struct BookColumn {
  std::string name, units, meaning;
};
/// Names of the ledger, mass and entropy columns, in the order of `book_values`.
std::vector<BookColumn> book_columns(const Plant& plant);
/// Their values for an evaluation `w` of the plant.
void book_values(const Plant& plant, const Workspace<double>& w, std::vector<double>& out);

}  // namespace gaskettle
