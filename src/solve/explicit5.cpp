#include "solve/explicit5.h"

#include <cmath>

namespace gaskettle {
namespace {

void evaluate_explicit5(const void* stepper, double t, double* y) {
  static_cast<const Explicit5*>(stepper)->interpolate(t, y);
}

}  // namespace

void Explicit5::resize(int n) {
  if (n == n_) return;
  n_ = n;
  for (auto* v : {&y0_, &y1_, &f0_, &f1_, &error_, &u6_, &f6_}) v->assign(n, 0.0);
  formulas_.adjust_size(y0_);
}

double Explicit5::stiffness(const double* typical) const {
  double rates = 0, states = 0;
  for (int i = 0; i < n_; ++i) {
    const double weight = std::max(typical[i], std::fabs(y0_[i]));
    const double df = (f1_[i] - f6_[i]) / weight, dy = (y1_[i] - u6_[i]) / weight;
    rates += df * df;
    states += dy * dy;
  }
  return states > 0 ? (end_ - begin_) * std::sqrt(rates / states) : 0;
}

DenseStep Explicit5::curve() { return {begin_, end_, this, evaluate_explicit5}; }

void Explicit5::interpolate(double t, double* y) const {
  if (t == end_) {  // the formula agrees only to rounding
    std::copy(y1_.begin(), y1_.end(), y);
    return;
  }
  boost::iterator_range<double*> out(y, y + n_);
  formulas_.calc_state(t, out, y0_, f0_, begin_, y1_, f1_, end_);
}

}  // namespace gaskettle
