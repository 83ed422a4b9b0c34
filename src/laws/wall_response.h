/// Exact answer of a layered wall to a unit step of gas temperature, by Laplace transform.
///
/// In the Laplace variable s each layer obeys u'' = (s/D + m(m - 2)/(4 r^2)) u with T = u r^(-m/2), m = 0, 1, 2 for
/// flat, cylinder, sphere (H. S. Carslaw and J. C. Jaeger, Conduction of Heat in Solids, 2nd ed. 1959, chapters 12 and
/// 13): the layers are passed on as admittances (flow over temperature). For a cylinder the r-dependent term is held
/// constant over thin annuli and extrapolated (Richardson), otherwise the layer is exact. Back to time by the fixed
/// Talbot contour (J. Abate and P. P. Valko, "Multi-precision Laplace transform inversion", Int. J. Numer. Meth. Engng
/// 60, 2004): against closed forms the flow is right to 1e-8 (flat, sphere) and 1e-6 (cylinder).
#pragma once
#include <complex>
#include <vector>

#include "laws/conduction_grid.h"

namespace gaskettle {

using Complex = std::complex<double>;

/// Points s and weights w of the fixed Talbot inversion at one time: f(t) = Re sum w_k F(s_k).
struct TalbotPoints {
  std::vector<Complex> s, weight;
};
/// `order` M: truncation leaves about 10^(-0.6 M), rounding e^(0.4 M) times 1e-16; they are alike near M = 18.
TalbotPoints talbot_points(double t, int order = 18);

/// Which side's gas steps from 0 to 1.
enum class StepSide { inner, outer };

/// Flow into the wall per unit gas temperature at Laplace variable s, film included; W/(m2 K) per INNER area, no 1/s.
Complex wall_admittance(const WallSpec& wall, Complex s, StepSide side = StepSide::inner);
/// The same for the nodes of a grid.
Complex grid_admittance(const WallSpec& wall, const ConductionGrid& grid, Complex s, StepSide side = StepSide::inner);

/// Heat flow (W/m2 per inner area and K of step) at time t (s) after the step.
double step_flow(const WallSpec& wall, double t, StepSide side = StepSide::inner);
double step_flow(const WallSpec& wall, const ConductionGrid& grid, double t, StepSide side = StepSide::inner);

}  // namespace gaskettle
