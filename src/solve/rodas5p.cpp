#include "solve/rodas5p.h"

#include <algorithm>

namespace gaskettle {

namespace table = rodas5p_table;

namespace {

struct StagePointers {
  const double* at[table::stages];
  StagePointers(const double* k, int n) {
    for (int s = 0; s < table::stages; ++s) at[s] = k + static_cast<std::size_t>(s) * n;
  }
};

void evaluate_rodas5p(const void* stepper, double t, double* y) {
  static_cast<const Rodas5p*>(stepper)->interpolate(t, y);
}

}  // namespace

void Rodas5p::resize(int n, int entries) {
  jacobian_.resize(entries);
  if (n == n_) return;
  n_ = n;
  for (auto* v : {&y0_, &y1_, &f0_, &f_t_, &f_, &u_}) v->assign(n, 0.0);
  k_.assign(static_cast<std::size_t>(n) * table::stages, 0.0);
  dense_.assign(static_cast<std::size_t>(n) * table::dense_rows, 0.0);
}

Attempt Rodas5p::check_start() const {
  for (const auto* v : {&y0_, &f0_, &f_t_})
    if (const int i = first_not_finite(n_, v->data()); i >= 0) return {Failure::rates_not_finite, i};
  for (int i = 0; i < n_; ++i) {
    const int row = pattern_->row_start[i];
    if (first_not_finite(pattern_->row_start[i + 1] - row, jacobian_.data() + row) >= 0)
      return {Failure::rates_not_finite, i};
  }
  return {};
}

void Rodas5p::form_stage_state(int s) {
  if (table::a[s][s - 1] == 1.0) {  // the row before, and one whole stage more
    for (int i = 0; i < n_; ++i) u_[i] += k(s - 1)[i];
  } else {
    combine(n_, u_.data(), y0_.data(), s, table::a[s], StagePointers(k_.data(), n_).at);
  }
}

void Rodas5p::solve_stage(int s, const double* rates, double h) {
  double factors[table::stages] = {};
  for (int j = 0; j < s; ++j) factors[j] = table::cc[s][j] / h;
  double* ks = k(s);
  combine(n_, ks, rates, s, factors, StagePointers(k_.data(), n_).at);
  if (table::d[s] != 0) {
    const double hd = h * table::d[s];
    for (int i = 0; i < n_; ++i) ks[i] += hd * f_t_[i];
  }
  lu_.solve(ks);
}

void Rodas5p::finish() {
  const double* last = k(table::stages - 1);
  for (int i = 0; i < n_; ++i) y1_[i] = u_[i] + last[i];
  curve_ready_ = false;
}

DenseStep Rodas5p::curve() {
  if (!curve_ready_) {
    const StagePointers stages(k_.data(), n_);
    std::fill(dense_.begin(), dense_.end(), 0.0);
    for (int r = 0; r < table::dense_rows; ++r) {
      double* row = dense_.data() + static_cast<std::size_t>(r) * n_;
      combine(n_, row, row, table::stages, table::h[r], stages.at);
    }
    curve_ready_ = true;
  }
  return {begin_, end_, this, evaluate_rodas5p};
}

void Rodas5p::interpolate(double t, double* y) const {
  const double x = (t - begin_) / (end_ - begin_), rest = 1 - x;
  const double* first = dense_.data();
  const double* second = first + n_;
  const double* third = second + n_;
  for (int i = 0; i < n_; ++i) y[i] = y0_[i] * rest + x * (y1_[i] + rest * (first[i] + x * (second[i] + x * third[i])));
}

void Rodas5p::multiply_jacobian(const double* v, double* out) const {
  for (int i = 0; i < n_; ++i) {
    double sum = 0;
    for (int e = pattern_->row_start[i]; e < pattern_->row_start[i + 1]; ++e)
      sum += jacobian_[e] * v[pattern_->columns[e]];
    out[i] = sum;
  }
}

void Rodas5p::second_derivative(double* out) const {
  multiply_jacobian(f0_.data(), out);
  for (int i = 0; i < n_; ++i) out[i] += f_t_[i];
}

}  // namespace gaskettle
