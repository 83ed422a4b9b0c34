/// Published Nusselt relations, each as a plain function of dimensionless numbers.
///
/// Symbols: Nu = h L / k, Ra = g beta |dT| L^3 / (nu alpha), Gr = Ra / Pr, Re = speed L / nu, Pr = mu cp / k, all
/// with properties at the film temperature (mean of wall and gas) and the length L each function names.
/// Single relations of this kind scatter by 15 to 25 % about measurements.
///
/// Where a source gives a laminar and a turbulent branch with a jump between them, they are joined as
/// (a^n + b^n)^(1/n) after S. W. Churchill and R. Usagi, "A general expression for the correlation of rates of
/// transfer", AIChE J. 18 (1972); the deviation from the branches stands with the function.
#pragma once
#include "base/scalar.h"

namespace gaskettle {

/// |x|^p for p > 0 without a kink or a steep start: x^2 (x^2 + r^2)^(p/2 - 1). Even, zero with slope zero at 0;
/// relative to |x|^p it is lower by (1 - p/2) (r/x)^2.
template <Scalar S>
S soft_power(const S& x, double p, double r = 1.0) {
  using std::pow;
  const S square_of_x = x * x;
  return square_of_x * pow(S(square_of_x + r * r), 0.5 * p - 1.0);
}

/// (a^n + b^n)^(1/n) for a, b >= 0 and not both zero: the larger, raised where both are alike, at most by 2^(1/n).
template <Scalar S>
S join(const S& a, const S& b, double n) {
  using std::pow;
  const S& high = value(a) > value(b) ? a : b;
  const S& low = value(a) > value(b) ? b : a;
  const S ratio = low / high;
  return high * pow(S(1.0 + power_from_zero(ratio, n)), 1.0 / n);
}

/// Vertical plate on its height, all Ra up to about 1e12, any Pr. S. W. Churchill and H. H. S. Chu, "Correlating
/// equations for laminar and turbulent free convection from a vertical plate", Int. J. Heat Mass Transfer 18 (1975)
/// 1323, the single expression for all Ra.
template <Scalar S>
S nusselt_vertical_plate(const S& ra, const S& pr) {
  using std::pow;
  const S prandtl_part = pow(S(1.0 + pow(S(0.492 / pr), 9.0 / 16.0)), 8.0 / 27.0);
  return square(S(0.825 + 0.387 * power_from_zero(ra, 1.0 / 6.0) / prandtl_part));
}

/// The same source's closer fit for the laminar range alone, Ra <= 1e9. The one above lies higher in air,
/// by 15 % at Ra = 7e7 and 33 % at 1e9: use one of them throughout, switching would make a jump.
template <Scalar S>
S nusselt_vertical_plate_laminar(const S& ra, const S& pr) {
  using std::pow;
  const S prandtl_part = pow(S(1.0 + pow(S(0.492 / pr), 9.0 / 16.0)), 4.0 / 9.0);
  return 0.68 + 0.670 * power_from_zero(ra, 0.25) / prandtl_part;
}

/// Nu of a slender upright cylinder over Nu of a vertical plate of the same height. Laminar, 0.01 < Pr < 100.
/// C. O. Popiel, J. Wojtkowiak and K. Bober, "Laminar free convective heat transfer from isothermal vertical
/// slender cylinder", Exp. Thermal Fluid Sci. 32 (2007) 607 (square root of 32: two later reviews misprint 32 squared).
/// A plate will do where D/L >= 35 / Gr^(1/4). Gr + 1 stands for Gr, so that the slope at 0 is finite.
template <Scalar S>
S slender_cylinder_factor(const S& gr, const S& pr, const S& length_over_diameter) {
  using std::log;
  using std::pow;
  using std::sqrt;
  const S b = 0.0571322 + 0.20305 * pow(pr, -0.43);
  const S c = 0.9165 - 0.0043 * sqrt(pr) + 0.01333 * log(pr) + 0.0004809 / pr;
  const S slenderness = std::sqrt(32.0) * length_over_diameter * pow(S(gr + 1.0), -0.25);
  return 1.0 + b * pow(slenderness, c);
}

/// Long horizontal cylinder on its diameter, 1e-5 <= Ra <= 1e12. S. W. Churchill and H. H. S. Chu, "Correlating
/// equations for laminar and turbulent free convection from a horizontal cylinder", Int. J. Heat Mass Transfer 18
/// (1975) 1049.
template <Scalar S>
S nusselt_level_cylinder(const S& ra, const S& pr) {
  using std::pow;
  const S prandtl_part = pow(S(1.0 + pow(S(0.559 / pr), 9.0 / 16.0)), 8.0 / 27.0);
  return square(S(0.60 + 0.387 * power_from_zero(ra, 1.0 / 6.0) / prandtl_part));
}

/// Sphere on its diameter, Pr >= 0.7, Ra <= 1e11. S. W. Churchill, "Free convection around immersed bodies", in Heat
/// Exchanger Design Handbook (1983), as given by F. P. Incropera et al., Fundamentals of Heat and Mass Transfer,
/// eq. 9.35 (quoted from memory).
template <Scalar S>
S nusselt_sphere(const S& ra, const S& pr) {
  using std::pow;
  return 2.0 + 0.589 * power_from_zero(ra, 0.25) / pow(S(1.0 + pow(S(0.469 / pr), 9.0 / 16.0)), 4.0 / 9.0);
}

/// Horizontal plate, hot face up or cold face down, on area / perimeter, laminar: 1e4 to 1e7. W. H. McAdams, Heat
/// Transmission, 3rd ed. 1954; F. P. Incropera et al., Fundamentals of Heat and Mass Transfer, 6th ed., eq. 9.30.
template <Scalar S>
S nusselt_unstable_plate_laminar(const S& ra) {
  return 0.54 * power_from_zero(ra, 0.25);
}
/// The same, turbulent: 1e7 to 1e11. Incropera eq. 9.31.
template <Scalar S>
S nusselt_unstable_plate_turbulent(const S& ra) {
  return 0.15 * power_from_zero(ra, 1.0 / 3.0);
}
/// Rayleigh number where the two meet: (0.54 / 0.15)^12.
inline constexpr double unstable_plate_transition = 4.74e6;
/// Both joined with n = 10: above the larger by 7.2 % at their meeting point Ra = 4.74e6 and by less
/// than 1 % outside 3e5 to 8e7.
template <Scalar S>
S nusselt_unstable_plate(const S& ra) {
  using std::pow;
  // The laminar branch times (1 + (turbulent / laminar)^10)^(1/10): no quotient of two zeros without gravity.
  const double over_laminar = std::pow(0.15 / 0.54, 10.0);
  return nusselt_unstable_plate_laminar(ra) * pow(S(1.0 + over_laminar * power_from_zero(ra, 10.0 / 12.0)), 0.1);
}
/// Horizontal plate, hot face down or cold face up, on area / perimeter, 1e5 to 1e10. McAdams; Incropera eq. 9.32.
template <Scalar S>
S nusselt_stable_plate(const S& ra) {
  return 0.27 * power_from_zero(ra, 0.25);
}

/// Cylinder in cross flow on its diameter, Re Pr > 0.2. S. W. Churchill and M. Bernstein, "A correlating equation for
/// forced convection from gases and liquids to a circular cylinder in crossflow", J. Heat Transfer 99 (1977) 300.
/// The powers of Re are soft_power with r = 1 (3e-5 low at Re = 100).
template <Scalar S>
S nusselt_cross_flow(const S& re, const S& pr) {
  using std::pow;
  const S prandtl_part = pow(S(1.0 + pow(S(0.4 / pr), 2.0 / 3.0)), 0.25);
  const S laminar = 0.62 * soft_power(re, 0.5) * pow(pr, 1.0 / 3.0) / prandtl_part;
  const double to_turbulent = std::pow(1.0 / 282000.0, 0.625);
  return 0.3 + laminar * pow(S(1.0 + to_turbulent * soft_power(re, 0.625)), 0.8);
}

/// Sphere in a stream on its diameter, 3.5 <= Re <= 7.6e4, 0.7 <= Pr <= 380, viscosity ratio taken as 1 for a gas.
/// S. Whitaker, "Forced convection heat transfer correlations", AIChE J. 18 (1972) 361 (quoted from memory).
template <Scalar S>
S nusselt_sphere_in_stream(const S& re, const S& pr) {
  using std::pow;
  return 2.0 + (0.4 * soft_power(re, 0.5) + 0.06 * soft_power(re, 2.0 / 3.0)) * pow(pr, 0.4);
}

/// Flat plate along a stream on its length in the stream, mean, up to Re = 1e7: laminar 0.664 Re^(1/2) Pr^(1/3) and
/// turbulent 0.037 Re^0.8 Pr / (1 + 2.443 Re^-0.1 (Pr^(2/3) - 1)) as the root of the sum of squares. V. Gnielinski,
/// "Berechnung mittlerer Waerme- und Stoffuebergangskoeffizienten ...", Forsch. Ing.-Wes. 41 (1975) 145 (quoted from
/// memory).
template <Scalar S>
S nusselt_plate_in_stream(const S& re, const S& pr) {
  using std::pow;
  using std::sqrt;
  const S cube_root = pow(pr, 1.0 / 3.0);
  const S laminar_squared = 0.664 * 0.664 * soft_power(re, 1.0) * square(cube_root);
  const S buffer = 1.0 + 2.443 * pow(S(re * re + 1.0), -0.05) * (square(cube_root) - 1.0);
  const S turbulent_squared = 0.037 * 0.037 * soft_power(re, 1.6) * square(S(pr / buffer));
  return sqrt(S(laminar_squared + turbulent_squared + 1e-6));
}

/// Cube of Nu = C Re^(2/3) Pr^(1/3) for the wall of a stirred vessel: on the vessel's diameter, Re on the impeller's
/// with revolutions per second, the viscosity ratio taken as 1 for a gas. C = 0.36: T. H. Chilton, T. B. Drew and R. H.
/// Jebens, "Heat transfer coefficients in agitated vessels", Ind. Eng. Chem. 36 (1944) 510, Re > 400. Measured
/// in liquids: for a gas this is an extrapolation. The cube is what the join with natural convection needs; it is
/// smooth at standstill, where the power 2/3 is not.
template <Scalar S>
S nusselt_stirred_cubed(const S& re, const S& pr, double coefficient = 0.36) {
  return coefficient * coefficient * coefficient * re * re * pr;
}

/// Forced and natural convection together, transverse or assisting: (forced^3 + natural^3)^(1/3). F. P. Incropera et
/// al., Fundamentals of Heat and Mass Transfer, 6th ed., eq. 9.64 with n = 3.
template <Scalar S>
S nusselt_mixed(const S& forced, const S& natural) {
  return join(forced, natural, 3.0);
}

}  // namespace gaskettle
