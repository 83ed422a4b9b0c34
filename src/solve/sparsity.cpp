#include "solve/sparsity.h"

#include <algorithm>
#include <numeric>
#include <stdexcept>

namespace gaskettle {

Sparsity make_sparsity(const std::vector<std::vector<int>>& columns_of_row) {
  Sparsity pattern;
  const int n = static_cast<int>(columns_of_row.size());
  for (int i = 0; i < n; ++i) {
    std::vector<int> columns = columns_of_row[i];
    columns.push_back(i);
    std::sort(columns.begin(), columns.end());
    columns.erase(std::unique(columns.begin(), columns.end()), columns.end());
    if (columns.front() < 0 || columns.back() >= n)
      throw std::invalid_argument("a pattern of " + std::to_string(n) + " rows has columns 0.." +
                                  std::to_string(n - 1) + "; row " + std::to_string(i) + " names another");
    pattern.columns.insert(pattern.columns.end(), columns.begin(), columns.end());
    pattern.row_start.push_back(static_cast<int>(pattern.columns.size()));
  }
  return pattern;
}

Sparsity dense_sparsity(int n) {
  std::vector<int> all(n);
  std::iota(all.begin(), all.end(), 0);
  return make_sparsity(std::vector<std::vector<int>>(n, all));
}

}  // namespace gaskettle
