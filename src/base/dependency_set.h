/// A number that remembers which inputs it depends on.
///
/// Sent through the rate code once per mode, it yields the sparsity pattern of
/// the Jacobian from the structure of the code, never from values that happen to
/// be zero. It carries a plain value only so that branches can be chosen.
#pragma once
#include <cstdint>
#include <vector>

#include "base/scalar.h"

namespace gaskettle {

class DependencySet {
public:
  DependencySet() = default;
  DependencySet(double x) : value_(x) {}
  static DependencySet input(double x, int index) {
    DependencySet r(x);
    r.words_.assign(static_cast<std::size_t>(index) / 64 + 1, 0);
    r.words_.back() = std::uint64_t{1} << (index % 64);
    return r;
  }

  double plain() const { return value_; }
  bool depends_on(int index) const {
    const std::size_t w = static_cast<std::size_t>(index) / 64;
    return w < words_.size() && ((words_[w] >> (index % 64)) & 1U) != 0;
  }
  /// Calls visit(index) for every input this number depends on, ascending.
  template <class F>
  void for_each(F&& visit) const {
    for (std::size_t w = 0; w < words_.size(); ++w)
      for (int b = 0; b < 64; ++b)
        if ((words_[w] >> b) & 1U) visit(static_cast<int>(w) * 64 + b);
  }

  DependencySet& operator+=(const DependencySet& b) { return merge(b, value_ + b.value_); }
  DependencySet& operator-=(const DependencySet& b) { return merge(b, value_ - b.value_); }
  DependencySet& operator*=(const DependencySet& b) { return merge(b, value_ * b.value_); }
  DependencySet& operator/=(const DependencySet& b) { return merge(b, value_ / b.value_); }
  friend DependencySet operator+(DependencySet a, const DependencySet& b) { return a += b; }
  friend DependencySet operator-(DependencySet a, const DependencySet& b) { return a -= b; }
  friend DependencySet operator*(DependencySet a, const DependencySet& b) { return a *= b; }
  friend DependencySet operator/(DependencySet a, const DependencySet& b) { return a /= b; }
  friend DependencySet operator-(DependencySet a) { return a.with_value(-a.value_); }

  /// The same dependencies, another value.
  DependencySet with_value(double x) const {
    DependencySet r = *this;
    r.value_ = x;
    return r;
  }

private:
  DependencySet& merge(const DependencySet& b, double x) {
    if (b.words_.size() > words_.size()) words_.resize(b.words_.size(), 0);
    for (std::size_t w = 0; w < b.words_.size(); ++w) words_[w] |= b.words_[w];
    value_ = x;
    return *this;
  }
  double value_ = 0.0;
  std::vector<std::uint64_t> words_;
};

inline double value(const DependencySet& x) { return x.plain(); }
inline DependencySet log(const DependencySet& a) { return a.with_value(std::log(a.plain())); }
inline DependencySet exp(const DependencySet& a) { return a.with_value(std::exp(a.plain())); }
inline DependencySet sqrt(const DependencySet& a) { return a.with_value(std::sqrt(a.plain())); }
inline DependencySet pow(const DependencySet& a, double p) { return a.with_value(std::pow(a.plain(), p)); }
inline DependencySet pow(const DependencySet& a, const DependencySet& p) {
  return (a + p).with_value(std::pow(a.plain(), p.plain()));
}
inline DependencySet sin(const DependencySet& a) { return a.with_value(std::sin(a.plain())); }
inline DependencySet cos(const DependencySet& a) { return a.with_value(std::cos(a.plain())); }
inline DependencySet tanh(const DependencySet& a) { return a.with_value(std::tanh(a.plain())); }

}  // namespace gaskettle
