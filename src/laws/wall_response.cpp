#include "laws/wall_response.h"

#include <algorithm>
#include <cmath>
#include <numbers>
#include <stdexcept>

namespace gaskettle {
namespace {

// Stands for an infinite admittance; its square is still far from overflow.
constexpr double huge_admittance = 1e30;
// Annuli of a cylinder per unit of ln(radius); with the extrapolation below this leaves 1e-6 of the flow, 4e-6 where an
// insulated wall's flow has nearly died away (measured against 64 times as many, radius ratios 1.05 to 50).
constexpr double annuli_per_log = 12.0;

/// std::complex division guards against overflow that cannot happen here, at several times the cost.
Complex inverse(const Complex& z) { return std::conj(z) / std::norm(z); }
double admittance_of_film(double film) { return std::min(film, huge_admittance); }
/// Admittance behind a resistance.
Complex behind(const Complex& y, double resistance) { return resistance > 0 ? y * inverse(1.0 + y * resistance) : y; }
/// Admittance behind a film of admittance h.
Complex behind_film(const Complex& y, double h) { return h > 0 ? y * inverse(1.0 + y / h) : Complex(0.0); }

int shape_order(WallShape shape) {
  switch (shape) {
    case WallShape::flat:
      return 0;
    case WallShape::cylinder:
      return 1;
    case WallShape::sphere:
      return 2;
  }
  return 0;
}

/// tanh for real part >= 0, without overflow.
Complex safe_tanh(const Complex& z) {
  if (z.real() > 20.0) return 1.0;
  const Complex e = std::exp(-2.0 * z);
  return (1.0 - e) * inverse(1.0 + e);
}

/// u'' = (s/D + curve) u between two radii; at its ends -T'/T, looking to the far one, is -u'/u + tilt.
struct Liouville {
  double curve, near_tilt, far_tilt;
};
Liouville exact_curve(int order, double near, double far) {
  if (order == 0) return {0.0, 0.0, 0.0};
  const double sign = near < far ? 1.0 : -1.0;
  return {0.0, sign * order / (2.0 * near), sign * order / (2.0 * far)};
}
/// Cylinder: curve is -1/(4 r^2), held constant here. Curve and tilts are made such that the annulus is exact at s = 0
/// (conductance 1/ln(r2/r1), no leak): sin(x)/x = v/sinh(v) with curve = -(x/width)^2, v = ln(r2/r1)/2. The series for
/// x^2 leaves 1e-15 at v = 1/24. Otherwise a weak film on a well conducting wall would drown in what the annuli leak.
Liouville annulus_curve(double near, double far) {
  const double width = std::abs(far - near);
  const double log_ratio = std::log1p(width / std::min(near, far)), v2 = 0.25 * log_ratio * log_ratio;
  const double x2 = v2 * (1.0 - v2 / 15.0 * (1.0 - v2 / 15.0)), x = std::sqrt(x2);
  const double own = (x2 > 0 ? x / std::tan(x) : 1.0) / width;
  return {-x2 / (width * width), 1.0 / (near * log_ratio) - own, own - 1.0 / (far * log_ratio)};
}

/// Passes an admittance through homogeneous solid, from the far boundary to the near one.
struct LayerPass {
  int order;            // m of the shape
  double inner_radius;  // of the wall: areas are per inner area

  double area(double r) const { return order == 0 ? 1.0 : std::pow(r / inner_radius, order); }

  Complex through(const Complex& far_y, const WallLayer& layer, const Complex& s, double near, double far) const {
    const Liouville form = order == 1 ? annulus_curve(near, far) : exact_curve(order, near, far);
    const double diffusivity = layer.conductivity / (layer.density * layer.specific_heat);
    const Complex kappa = std::sqrt(s / diffusivity + form.curve);
    const Complex t = safe_tanh(kappa * std::abs(far - near));
    const double k = layer.conductivity;
    const Complex y = far_y / (k * area(far)) - form.far_tilt;
    const Complex near_ratio = kappa * (y + kappa * t) * inverse(kappa + y * t);
    return k * area(near) * (near_ratio + form.near_tilt);
  }
};

/// Wall admittance with `refinement` times the base number of annuli; film of the driven side not included.
Complex bare_admittance(const WallSpec& wall, const Complex& s, StepSide side, int refinement) {
  const bool outward = side == StepSide::inner;
  const int order = shape_order(wall.shape);
  const LayerPass pass{order, wall.inner_radius};
  const int count = static_cast<int>(wall.layers.size());
  double radius = order == 0 ? 0.0 : wall.inner_radius;
  if (outward)
    for (const WallLayer& layer : wall.layers) radius += layer.thickness;
  Complex y = admittance_of_film(outward ? wall.outer_film * pass.area(radius) : wall.inner_film);
  for (int i = 0; i < count; ++i) {
    const WallLayer& layer = wall.layers[static_cast<std::size_t>(outward ? count - 1 - i : i)];
    if (!outward) y = behind(y, layer.contact / pass.area(radius));
    const double end = outward ? radius - layer.thickness : radius + layer.thickness;
    const int annuli =
        order == 1 ? refinement * static_cast<int>(std::ceil(annuli_per_log * std::abs(std::log(end / radius)))) : 1;
    const double ratio = order == 1 ? std::pow(end / radius, 1.0 / annuli) : 1.0;
    for (int j = 0; j < annuli; ++j) {
      const double next = j + 1 == annuli ? end : radius * ratio;
      y = pass.through(y, layer, s, next, radius);
      radius = next;
    }
    if (outward) y = behind(y, layer.contact / pass.area(radius));
  }
  return y;
}

double outer_area_ratio(const WallSpec& wall) {
  double outer = wall.inner_radius;
  for (const WallLayer& layer : wall.layers) outer += layer.thickness;
  return wall.shape == WallShape::flat ? 1.0 : std::pow(outer / wall.inner_radius, shape_order(wall.shape));
}

double film_of(const WallSpec& wall, StepSide side) {
  return admittance_of_film(side == StepSide::inner ? wall.inner_film : wall.outer_film * outer_area_ratio(wall));
}

template <class Admittance>
double invert_step(double t, Admittance&& admittance) {
  const TalbotPoints points = talbot_points(t);
  double flow = 0.0;
  for (std::size_t k = 0; k < points.s.size(); ++k)
    flow += (points.weight[k] * admittance(points.s[k]) / points.s[k]).real();
  return flow;
}

}  // namespace

TalbotPoints talbot_points(double t, int order) {
  if (!(t > 0)) throw std::invalid_argument("the time of a step response must be above 0 s");
  const double r = 2.0 * order / (5.0 * t);
  TalbotPoints points;
  points.s.push_back(r);
  points.weight.push_back(0.5 * r / order * std::exp(r * t));
  for (int k = 1; k < order; ++k) {
    const double theta = k * std::numbers::pi / order;
    const double cot = std::cos(theta) / std::sin(theta);
    const Complex s = r * theta * Complex(cot, 1.0);
    const double sigma = theta + (theta * cot - 1.0) * cot;
    points.s.push_back(s);
    points.weight.push_back(r / order * std::exp(s * t) * Complex(1.0, sigma));
  }
  return points;
}

Complex wall_admittance(const WallSpec& wall, Complex s, StepSide side) {
  Complex y = bare_admittance(wall, s, side, 1);
  if (wall.shape == WallShape::cylinder) y += (bare_admittance(wall, s, side, 2) - y) * (4.0 / 3.0);
  return behind_film(y, film_of(wall, side));
}

Complex grid_admittance(const WallSpec& wall, const ConductionGrid& grid, Complex s, StepSide side) {
  const bool outward = side == StepSide::inner;
  const std::size_t count = grid.nodes.size();
  Complex y = film_of(wall, outward ? StepSide::outer : StepSide::inner);
  for (std::size_t i = 0; i < count; ++i) {
    const std::size_t node = outward ? count - 1 - i : i;
    if (i > 0) y = behind(y, 1.0 / conductance(wall, grid.links[outward ? node : node - 1]));
    // A face held at the gas temperature fills its node in the instant of the step: later flow has no part of it.
    if (i + 1 < count || std::isfinite(outward ? wall.inner_film : wall.outer_film))
      y += s * grid.nodes[node].heat_capacity;
  }
  return behind_film(y, film_of(wall, side));
}

double step_flow(const WallSpec& wall, double t, StepSide side) {
  return invert_step(t, [&](const Complex& s) { return wall_admittance(wall, s, side); });
}

double step_flow(const WallSpec& wall, const ConductionGrid& grid, double t, StepSide side) {
  return invert_step(t, [&](const Complex& s) { return grid_admittance(wall, grid, s, side); });
}

}  // namespace gaskettle
