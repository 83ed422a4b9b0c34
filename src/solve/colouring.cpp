#include "solve/colouring.h"

#include <algorithm>
#include <numeric>

namespace gaskettle {
namespace {

std::vector<std::vector<int>> rows_of_column(const Sparsity& pattern) {
  std::vector<std::vector<int>> rows(pattern.size());
  for (int i = 0; i < pattern.size(); ++i)
    for (int e = pattern.row_start[i]; e < pattern.row_start[i + 1]; ++e) rows[pattern.columns[e]].push_back(i);
  return rows;
}

}  // namespace

std::vector<int> colour_columns(const Sparsity& pattern) {
  const int n = pattern.size();
  const auto rows = rows_of_column(pattern);
  std::vector<int> order(n);
  std::iota(order.begin(), order.end(), 0);
  std::stable_sort(order.begin(), order.end(), [&](int a, int b) { return rows[a].size() > rows[b].size(); });

  std::vector<int> colours(n, -1);
  std::vector<int> taken_by(n, -1);  // colour -> column being coloured that may not have it
  for (const int column : order) {
    for (const int i : rows[column])
      for (int e = pattern.row_start[i]; e < pattern.row_start[i + 1]; ++e)
        if (const int c = colours[pattern.columns[e]]; c >= 0) taken_by[c] = column;
    int colour = 0;
    while (taken_by[colour] == column) ++colour;
    colours[column] = colour;
  }
  return colours;
}

int colour_count(const std::vector<int>& colours) {
  return colours.empty() ? 0 : *std::max_element(colours.begin(), colours.end()) + 1;
}

}  // namespace gaskettle
