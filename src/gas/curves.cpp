#include "gas/curves.h"

#include <cmath>
#include <limits>
#include <stdexcept>
#include <utility>

namespace gaskettle {

namespace {

constexpr double zero_temperature = enthalpy_zero_temperature;

ThermalPoint evaluate(const Nasa9Range& range, double t, double log_t) {
  const auto& a = range.a;
  const double inverse = 1.0 / t;
  ThermalPoint p;
  p.cp = (a[0] * inverse + a[1]) * inverse + a[2] + t * (a[3] + t * (a[4] + t * (a[5] + t * a[6])));
  p.cp_slope =
      -(2.0 * a[0] * inverse + a[1]) * inverse * inverse + a[3] + t * (2.0 * a[4] + t * (3.0 * a[5] + t * 4.0 * a[6]));
  p.enthalpy = -a[0] * inverse + a[1] * log_t +
               t * (a[2] + t * (a[3] / 2.0 + t * (a[4] / 3.0 + t * (a[5] / 4.0 + t * a[6] / 5.0)))) + range.b[0];
  p.entropy = -(a[0] * inverse / 2.0 + a[1]) * inverse + a[2] * log_t +
              t * (a[3] + t * (a[4] / 2.0 + t * (a[5] / 3.0 + t * a[6] / 4.0))) + range.b[1];
  return p;
}

double raw(const TransportRange& r, double t, double log_t) {
  const double inverse = 1.0 / t;
  return r.factor * std::exp(r.a * log_t + (r.b + r.c * inverse) * inverse) / (1.0 + (r.d + r.e * inverse) * inverse);
}

// d ln(value) / d ln(T)
double exponent(const TransportRange& r, double t) {
  const double inverse = 1.0 / t;
  const double fall = (r.d + 2.0 * r.e * inverse) * inverse;
  return r.a - (r.b + 2.0 * r.c * inverse) * inverse + fall / (1.0 + (r.d + r.e * inverse) * inverse);
}

}  // namespace

HeatCapacityCurve::HeatCapacityCurve(const Nasa9Range& lower, const Nasa9Range& upper, double lowest, double join,
                                     double highest)
    : lower_(lower), upper_(upper), lowest_(lowest), join_(join), highest_(highest) {
  if (!(lowest < zero_temperature && zero_temperature < join && join < highest))
    throw std::invalid_argument("the ranges of a heat capacity fit must rise, with 298.15 K in the lower one");
  // The same arithmetic as in `at`, so that h cancels to exactly zero.
  lower_.b[0] = 0.0;
  lower_.b[0] = -evaluate(lower_, zero_temperature, std::log(zero_temperature)).enthalpy;
  const ThermalPoint below = evaluate(lower_, join, std::log(join));
  const ThermalPoint above = evaluate(upper_, join, std::log(join));
  upper_.b[0] += below.enthalpy - above.enthalpy;
  upper_.b[1] += below.entropy - above.entropy;
  hold_outside(lowest, highest);
}

HeatCapacityCurve HeatCapacityCurve::constant(double cp_over_r) {
  // Held on both sides of 298.15 K, where h and s are zero.
  HeatCapacityCurve c;
  c.lower_.a[2] = cp_over_r;
  c.lower_.b = {-cp_over_r * zero_temperature, -cp_over_r * std::log(zero_temperature)};
  c.upper_ = c.lower_;
  c.join_ = zero_temperature;
  c.hold_outside(zero_temperature, zero_temperature);
  c.lowest_ = 0.0;
  c.highest_ = std::numeric_limits<double>::infinity();
  return c;
}

void HeatCapacityCurve::hold_outside(double low, double high) {
  low_ = {low, std::log(low), inside(low, std::log(low))};
  high_ = {high, std::log(high), inside(high, std::log(high))};
}

ThermalPoint HeatCapacityCurve::inside(double temperature, double log_temperature) const {
  return evaluate(temperature <= join_ ? lower_ : upper_, temperature, log_temperature);
}

ThermalPoint HeatCapacityCurve::at(double temperature, double log_temperature) const {
  if (temperature >= low_.temperature && temperature <= high_.temperature) return inside(temperature, log_temperature);
  const Held& limit = temperature < low_.temperature ? low_ : high_;
  const double cp = limit.point.cp;
  return {cp, 0.0, limit.point.enthalpy + cp * (temperature - limit.temperature),
          limit.point.entropy + cp * (log_temperature - limit.log_temperature)};
}

TransportCurve::TransportCurve(std::vector<TransportRange> ranges) : ranges_(std::move(ranges)) {
  if (ranges_.empty()) throw std::invalid_argument("a transport curve needs at least one range");
  for (std::size_t i = 0; i < ranges_.size(); ++i) {
    TransportRange& r = ranges_[i];
    if (!(r.lowest < r.highest) || (i > 0 && r.lowest != ranges_[i - 1].highest))
      throw std::invalid_argument("the ranges of a transport curve must rise and touch");
    const double log_t = std::log(r.lowest);
    if (i > 0) r.factor *= raw(ranges_[i - 1], r.lowest, log_t) / raw(r, r.lowest, log_t);
  }
}

TransportCurve TransportCurve::constant(double value) {
  return TransportCurve({{0.0, std::numeric_limits<double>::infinity(), value, 0.0, 0.0, 0.0, 0.0, 0.0}});
}

Slope TransportCurve::at(double temperature, double log_temperature) const {
  const bool held = temperature < lowest() || temperature > highest();
  if (held) {
    const bool below = temperature < lowest();
    const TransportRange& r = below ? ranges_.front() : ranges_.back();
    const double limit = below ? r.lowest : r.highest;
    const double n = exponent(r, limit);
    const double log_limit = std::log(limit);
    const double v = raw(r, limit, log_limit) * std::exp(n * (log_temperature - log_limit));
    return {v, n * v / temperature};
  }
  std::size_t i = 0;
  while (i + 1 < ranges_.size() && temperature > ranges_[i].highest) ++i;
  const double v = raw(ranges_[i], temperature, log_temperature);
  return {v, exponent(ranges_[i], temperature) * v / temperature};
}

}  // namespace gaskettle
