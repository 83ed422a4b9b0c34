#include "solve/sparse_lu.h"

#include <cmath>

namespace gaskettle {
namespace {
constexpr double smallest_pivot = 1e-13;      // of the terms that cancelled in it
constexpr std::size_t most_plans_kept = 256;  // a model has far fewer patterns; this only bounds memory
}  // namespace

void SparseLu::use(const Sparsity& pattern, int version) {
  if (plan_ && version == version_) return;
  auto found = plans_.find(version);
  if (found == plans_.end()) {
    if (plans_.size() >= most_plans_kept) plans_.clear();
    found = plans_.emplace(version, std::make_shared<const EliminationPlan>(plan_elimination(pattern))).first;
  }
  plan_ = found->second;
  version_ = version;
  lower_.resize(plan_->lower_columns.size());
  upper_.resize(plan_->upper_columns.size());
  inverse_pivot_.resize(plan_->size());
  work_.resize(plan_->size());
}

bool SparseLu::factor(const double* jacobian, double shift) {
  for (int row = 0; row < plan_->size(); ++row)
    if (!eliminate_row(row, jacobian, shift)) return false;
  return true;
}

// Row by row: the row is spread out in work_, the rows above are subtracted in
// order, and what is left goes back into the packed factors.
bool SparseLu::eliminate_row(int row, const double* jacobian, double shift) {
  const EliminationPlan& p = *plan_;
  const int lower_begin = p.lower_start[row], lower_end = p.lower_start[row + 1];
  const int upper_begin = p.upper_start[row], upper_end = p.upper_start[row + 1];
  for (int e = lower_begin; e < lower_end; ++e) work_[p.lower_columns[e]] = 0;
  for (int e = upper_begin; e < upper_end; ++e) work_[p.upper_columns[e]] = 0;
  for (int e = p.source_start[row]; e < p.source_start[row + 1]; ++e)
    work_[p.source_column[e]] = -jacobian[p.source_entry[e]];
  const double size = shift + std::fabs(work_[row]);
  work_[row] += shift;
  for (int e = lower_begin; e < lower_end; ++e) {
    const int k = p.lower_columns[e];
    const double factor = work_[k] * inverse_pivot_[k];
    lower_[e] = factor;
    for (int u = p.upper_start[k]; u < p.upper_start[k + 1]; ++u) work_[p.upper_columns[u]] -= factor * upper_[u];
  }
  for (int e = upper_begin; e < upper_end; ++e) upper_[e] = work_[p.upper_columns[e]];
  inverse_pivot_[row] = 1.0 / work_[row];
  return std::fabs(work_[row]) > smallest_pivot * size && std::isfinite(work_[row]);
}

void SparseLu::solve(double* b) const {
  const EliminationPlan& p = *plan_;
  const int n = p.size();
  for (int row = 0; row < n; ++row) {
    double sum = b[p.order[row]];
    for (int e = p.lower_start[row]; e < p.lower_start[row + 1]; ++e) sum -= lower_[e] * work_[p.lower_columns[e]];
    work_[row] = sum;
  }
  for (int row = n - 1; row >= 0; --row) {
    double sum = work_[row];
    for (int e = p.upper_start[row]; e < p.upper_start[row + 1]; ++e) sum -= upper_[e] * work_[p.upper_columns[e]];
    work_[row] = sum * inverse_pivot_[row];
    b[p.order[row]] = work_[row];
  }
}

}  // namespace gaskettle
