#include <algorithm>
#include <bit>
#include <cstdint>
#include <limits>

#include "solve/sparse_lu.h"

namespace gaskettle {
namespace {

/// n sets of numbers 0..n-1, one bit each: joining two costs n/64 operations.
class BitRows {
public:
  explicit BitRows(int n) : words_((n + 63) / 64), bits_(static_cast<std::size_t>(n) * words_) {}

  void insert(int row, int i) { word(row, i) |= bit(i); }
  void erase(int row, int i) { word(row, i) &= ~bit(i); }
  void join(int row, const BitRows& other, int other_row) {
    for (int w = 0; w < words_; ++w) at(row)[w] |= other.at(other_row)[w];
  }
  int count(int row) const {
    int total = 0;
    for (int w = 0; w < words_; ++w) total += std::popcount(at(row)[w]);
    return total;
  }
  /// Members, ascending.
  void list(int row, std::vector<int>& out) const {
    out.clear();
    for (int w = 0; w < words_; ++w)
      for (std::uint64_t rest = at(row)[w]; rest != 0; rest &= rest - 1) out.push_back(64 * w + std::countr_zero(rest));
  }

private:
  static std::uint64_t bit(int i) { return std::uint64_t{1} << (i % 64); }
  std::uint64_t& word(int row, int i) { return at(row)[i / 64]; }
  std::uint64_t* at(int row) { return bits_.data() + static_cast<std::size_t>(row) * words_; }
  const std::uint64_t* at(int row) const { return bits_.data() + static_cast<std::size_t>(row) * words_; }

  int words_;
  std::vector<std::uint64_t> bits_;
};

/// The graph of what is left to eliminate; diagonals are implied.
class Elimination {
public:
  explicit Elimination(const Sparsity& pattern)
      : n_(pattern.size()),
        in_row_(n_),
        in_column_(n_),
        row_length_(n_),
        column_length_(n_),
        done_(n_),
        upper_(n_),
        lower_(n_) {
    for (int i = 0; i < n_; ++i)
      for (int e = pattern.row_start[i]; e < pattern.row_start[i + 1]; ++e)
        if (const int j = pattern.columns[e]; j != i) {
          in_row_.insert(i, j);
          in_column_.insert(j, i);
          ++row_length_[i];
          ++column_length_[j];
        }
  }

  int cheapest() const {
    int best = -1;
    long least = std::numeric_limits<long>::max();
    for (int k = 0; k < n_; ++k) {
      const long product = static_cast<long>(row_length_[k]) * column_length_[k];
      if (!done_[k] && product < least) {
        least = product;
        best = k;
      }
    }
    return best;
  }

  void eliminate(int k) {
    done_[k] = true;
    in_row_.list(k, columns_);
    in_column_.list(k, rows_);
    for (const int i : rows_) {
      in_row_.join(i, in_row_, k);
      in_row_.erase(i, k);
      in_row_.erase(i, i);
      row_length_[i] = in_row_.count(i);
      lower_[i].push_back(k);
    }
    for (const int j : columns_) {
      in_column_.join(j, in_column_, k);
      in_column_.erase(j, k);
      in_column_.erase(j, j);
      column_length_[j] = in_column_.count(j);
    }
    upper_[k] = columns_;
  }

  const std::vector<int>& upper(int k) const { return upper_[k]; }
  const std::vector<int>& lower(int k) const { return lower_[k]; }

private:
  int n_;
  BitRows in_row_, in_column_;
  std::vector<int> row_length_, column_length_;
  std::vector<char> done_;
  std::vector<std::vector<int>> upper_, lower_;
  std::vector<int> rows_, columns_;
};

void append_sorted(const std::vector<int>& originals, const std::vector<int>& step_of, std::vector<int>& start,
                   std::vector<int>& columns) {
  std::vector<int> steps;
  for (const int i : originals) steps.push_back(step_of[i]);
  std::sort(steps.begin(), steps.end());
  columns.insert(columns.end(), steps.begin(), steps.end());
  start.push_back(static_cast<int>(columns.size()));
}

}  // namespace

EliminationPlan plan_elimination(const Sparsity& pattern) {
  const int n = pattern.size();
  Elimination left(pattern);
  EliminationPlan plan;
  std::vector<int> step_of(n);
  for (int s = 0; s < n; ++s) {
    const int k = left.cheapest();
    left.eliminate(k);
    plan.order.push_back(k);
    step_of[k] = s;
  }
  plan.lower_start = plan.upper_start = plan.source_start = {0};
  for (const int k : plan.order) {
    append_sorted(left.lower(k), step_of, plan.lower_start, plan.lower_columns);
    append_sorted(left.upper(k), step_of, plan.upper_start, plan.upper_columns);
    for (int e = pattern.row_start[k]; e < pattern.row_start[k + 1]; ++e) {
      plan.source_entry.push_back(e);
      plan.source_column.push_back(step_of[pattern.columns[e]]);
    }
    plan.source_start.push_back(static_cast<int>(plan.source_entry.size()));
  }
  return plan;
}

}  // namespace gaskettle
