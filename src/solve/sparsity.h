/// Which entries of a Jacobian can be non-zero.
#pragma once
#include <vector>

namespace gaskettle {

/// Compressed rows: the columns of row i are columns[row_start[i]] up to, not
/// including, columns[row_start[i + 1]], ascending, the diagonal always among
/// them. Jacobian values are stored in the same order.
struct Sparsity {
  std::vector<int> row_start{0};
  std::vector<int> columns;

  int size() const { return static_cast<int>(row_start.size()) - 1; }
  int entries() const { return row_start.back(); }
};

/// Builds a pattern from the columns of each row (any order, repeats allowed);
/// the diagonal is added. Throws std::invalid_argument for a column outside 0..n-1.
Sparsity make_sparsity(const std::vector<std::vector<int>>& columns_of_row);

/// Every entry present.
Sparsity dense_sparsity(int n);

}  // namespace gaskettle
