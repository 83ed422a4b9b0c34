#include <cstdlib>
#include <utility>

#include "base/units.h"

namespace gaskettle {
namespace {

using Factors = std::vector<std::pair<std::string, int>>;

/// Takes the factors of an SI unit such as "J kg-1 K-1" into `factors`, to the power `sign`.
void multiply(Factors& factors, const std::string& si, int sign) {
  for (std::size_t i = 0; i < si.size();) {
    const std::size_t end = std::min(si.find(' ', i), si.size());
    const std::size_t digits = std::min(si.find_first_of("-0123456789", i), end);
    const std::string name = si.substr(i, digits - i);
    const int power = sign * (digits < end ? std::atoi(si.substr(digits, end - digits).c_str()) : 1);
    i = end + 1;
    if (name.empty()) continue;  // the "1" of a pure number
    bool merged = false;
    for (auto& [known, sum] : factors)
      if (known == name) {
        sum += power;
        merged = true;
      }
    if (!merged) factors.emplace_back(name, power);
  }
}

std::string text(const Factors& factors) {
  std::string s;
  for (const auto& [name, power] : factors) {
    if (power == 0) continue;
    if (!s.empty()) s += ' ';
    s += name + (power == 1 ? std::string() : std::to_string(power));
  }
  return s.empty() ? "1" : s;
}

std::string quotient(const UnitKind& a, const UnitKind& b) {
  Factors factors;
  multiply(factors, a.si, 1);
  multiply(factors, b.si, -1);
  return text(factors);
}

}  // namespace

UnitKind ratio(const UnitKind& numerator, const UnitKind& denominator) {
  return {numerator.name + " per " + denominator.name, quotient(numerator, denominator)};
}

UnitKind per_time(const UnitKind& kind) { return {"rate of change of " + kind.name, quotient(kind, unit_kinds::time)}; }

}  // namespace gaskettle
