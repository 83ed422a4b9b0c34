/// Sparse direct solution of (shift I - J) x = b with a fixed elimination order.
#pragma once
#include <map>
#include <memory>
#include <vector>

#include "solve/sparsity.h"

namespace gaskettle {

/// Everything about an elimination that depends on the pattern alone. Rows and
/// columns are renumbered by the order in which they are eliminated.
struct EliminationPlan {
  std::vector<int> order;                       ///< elimination step -> original index
  std::vector<int> lower_start, lower_columns;  ///< rows of L below the diagonal, ascending
  std::vector<int> upper_start, upper_columns;  ///< rows of U right of the diagonal, ascending
  std::vector<int> source_start, source_entry;  ///< Jacobian entries of each row ...
  std::vector<int> source_column;               ///< ... and the renumbered columns they belong to

  int size() const { return static_cast<int>(order.size()); }
};

/// Diagonal pivots in the order of the least product of remaining row and column
/// lengths, ties by index.
///
/// Source: H. M. Markowitz, The elimination form of the inverse and its application
/// to linear programming, Management Science 3 (1957) 255-269.
EliminationPlan plan_elimination(const Sparsity& pattern);

/// Factors and solves. The plan of each pattern version is made once and kept.
class SparseLu {
public:
  /// Selects the pattern; cheap when this version was seen before.
  void use(const Sparsity& pattern, int version);

  /// Factors shift I - J, J in the order of the pattern. False where a pivot is not
  /// finite or has cancelled to less than 1e-13 of the terms it came from: the
  /// factors are then of no use and a shorter step has to be taken.
  bool factor(const double* jacobian, double shift);

  /// Replaces b by the solution. Only after a successful factor().
  void solve(double* b) const;

  /// Entries of L and U off the diagonal.
  int fill() const { return static_cast<int>(lower_.size() + upper_.size()); }

private:
  bool eliminate_row(int row, const double* jacobian, double shift);

  std::map<int, std::shared_ptr<const EliminationPlan>> plans_;  // shared by copies
  std::shared_ptr<const EliminationPlan> plan_;
  int version_ = 0;
  std::vector<double> lower_, upper_, inverse_pivot_;
  mutable std::vector<double> work_;
};

}  // namespace gaskettle
