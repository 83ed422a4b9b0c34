// Dilute-gas viscosity and conductivity against printed values.
#include <catch2/catch.hpp>
#include <vector>

#include "gas/catalogue.h"
#include "gas/mixture.h"

using namespace gaskettle;

namespace {

struct Row {
  const char* gas;
  double temperature;   // K
  double viscosity;     // 1e-6 Pa s; 0: no row
  double conductivity;  // 1e-3 W/(m K); 0: no row
};

// clang-format off
// The NASA fits (R. A. Svehla, NASA TM-4647, 1995) evaluated by other hands, six digits.
constexpr Row nasa[] = {
    {"N2", 300.0, 17.9059, 26.1505},
    {"N2", 600.0, 0.0, 43.9375},
    {"N2", 1000.0, 41.624, 64.7593},
    {"O2", 300.0, 0.0, 26.5964},
    {"O2", 600.0, 34.6924, 47.1714},
    {"O2", 1000.0, 49.0868, 0.0},
    {"Ar", 300.0, 22.73, 17.7938},
    {"Ar", 600.0, 0.0, 30.409},
    {"Ar", 1000.0, 55.5155, 43.4846},
    {"He", 300.0, 19.9266, 155.712},
    {"He", 600.0, 0.0, 251.303},
    {"He", 1000.0, 46.254, 0.0},
    {"Ne", 300.0, 31.9235, 49.5222},
    {"Ne", 600.0, 50.7008, 0.0},
    {"Ne", 1000.0, 71.3115, 110.595},
    {"Kr", 300.0, 25.5597, 0.0},
    {"Kr", 600.0, 45.7421, 17.0673},
    {"Kr", 1000.0, 66.6912, 0.0},
    {"Xe", 300.0, 23.2205, 5.55496},
    {"Xe", 600.0, 43.5039, 0.0},
    {"Xe", 1000.0, 65.0897, 15.5022},
    {"H2", 300.0, 8.97383, 0.0},
    {"H2", 600.0, 14.3771, 303.416},
    {"H2", 1000.0, 20.5575, 443.896},
    {"CO2", 300.0, 15.0146, 16.6136},
    {"CO2", 600.0, 27.9872, 40.3408},
    {"CO2", 1000.0, 0.0, 67.9686},
    {"CO", 300.0, 0.0, 26.1505},
    {"CO", 600.0, 29.5231, 43.9375},
    {"CO", 1000.0, 41.624, 0.0},
    {"H2O", 500.0, 0.0, 35.8957},
    {"H2O", 600.0, 21.4088, 46.3287},
    {"H2O", 1000.0, 37.6123, 97.24},
    {"CH4", 300.0, 11.2002, 0.0},
    {"CH4", 600.0, 19.3834, 89.8269},
    {"CH4", 1000.0, 27.6547, 175.843},
    {"C2H6", 300.0, 0.0, 23.4762},
    {"C2H6", 600.0, 0.0, 71.7283},
    {"C2H6", 1000.0, 25.5616, 143.226},
    {"C2H4", 300.0, 10.34, 0.0},
    {"C2H4", 600.0, 19.2156, 67.3678},
    {"C2H4", 1000.0, 28.4001, 131.984},
    {"NH3", 300.0, 10.1897, 0.0},
    {"NH3", 600.0, 21.3737, 0.0},
    {"NH3", 1000.0, 34.4687, 0.0},
    {"SF6", 300.0, 15.3417, 0.0},
    {"SF6", 600.0, 27.6297, 30.8871},
    {"SF6", 1000.0, 40.1645, 0.0},
    {"N2O", 300.0, 0.0, 17.4693},
    {"N2O", 600.0, 28.2871, 42.917},
    {"N2O", 1000.0, 42.1259, 73.2937},
    {"SO2", 300.0, 0.0, 9.66487},
    {"SO2", 600.0, 0.0, 25.0683},
    {"SO2", 1000.0, 40.1353, 45.7668},
    {"NO", 300.0, 19.1669, 0.0},
    {"NO", 600.0, 32.3113, 47.9467},
    {"NO", 1000.0, 45.8257, 0.0},
};
// clang-format on

double viscosity(const char* gas, double t) { return 1e6 * find_gas(gas).value().viscosity(t); }
double conductivity(const char* gas, double t) { return 1e3 * find_gas(gas).value().conductivity(t); }

}  // namespace

TEST_CASE("the transport fits give the digits of their source") {
  for (const Row& row : nasa) {
    INFO(row.gas << " at " << row.temperature << " K");
    // Six printed digits.
    if (row.viscosity > 0.0) CHECK(viscosity(row.gas, row.temperature) == Approx(row.viscosity).epsilon(6e-6));
    if (row.conductivity > 0.0) CHECK(conductivity(row.gas, row.temperature) == Approx(row.conductivity).epsilon(6e-6));
  }
}

TEST_CASE("nitrogen, argon, oxygen and air agree with their reference correlation at zero density") {
  // E. W. Lemmon, R. T. Jacobsen, "Viscosity and Thermal Conductivity Equations for Nitrogen,
  // Oxygen, Argon, and Air", Int. J. Thermophys. 25 (2004) 21, table V. Its uncertainty
  // in the dilute gas: viscosity 0.5 to 1 %, conductivity 1 to 2 %.
  CHECK(viscosity("N2", 300.0) == Approx(17.8771).epsilon(0.01));
  CHECK(viscosity("Ar", 300.0) == Approx(22.7241).epsilon(0.01));
  CHECK(viscosity("O2", 300.0) == Approx(20.6307).epsilon(0.01));
  CHECK(conductivity("N2", 300.0) == Approx(25.9361).epsilon(0.02));
  CHECK(conductivity("Ar", 300.0) == Approx(17.8042).epsilon(0.02));
  CHECK(conductivity("O2", 300.0) == Approx(26.4403).epsilon(0.02));
  CHECK(conductivity("air", 300.0) == Approx(26.3529).epsilon(0.02));
  // 100 K is below the fits, which start at 200 K: the power law that goes on there is off by less than
  // 5 %. Air's own fit reaches down to 80 K.
  CHECK(viscosity("N2", 100.0) == Approx(6.90349).epsilon(0.05));
  CHECK(viscosity("Ar", 100.0) == Approx(8.1894).epsilon(0.05));
  CHECK(viscosity("O2", 100.0) == Approx(7.70243).epsilon(0.05));
  CHECK(conductivity("N2", 100.0) == Approx(9.27749).epsilon(0.05));
  CHECK(conductivity("Ar", 100.0) == Approx(6.36587).epsilon(0.05));
  CHECK(conductivity("O2", 100.0) == Approx(8.94334).epsilon(0.05));
  CHECK(conductivity("air", 100.0) == Approx(9.35902).epsilon(0.02));
}

TEST_CASE("carbon dioxide, hexafluoride and hydrogen agree with the papers' check values") {
  // A. Laesecke, C. D. Muzny, J. Phys. Chem. Ref. Data 46 (2017) 013107: zero density, 2000 K.
  CHECK(viscosity("CO2", 2000.0) == Approx(66.079).epsilon(0.03));
  // S. E. Quinones-Cisneros, M. L. Huber, U. K. Deiters, J. Phys. Chem. Ref. Data 41 (2012) 023102:
  // zero density; the fit and the paper each claim 1 %.
  CHECK(viscosity("SF6", 300.0) == Approx(15.2887).epsilon(0.02));
  CHECK(viscosity("SF6", 400.0) == Approx(19.6796).epsilon(0.02));
  // M. J. Assael et al., J. Phys. Chem. Ref. Data 41 (2012) 023104 (hexafluoride, 2 %), and 40 (2011)
  // 033101 (normal hydrogen, 2 %): zero density, 298.15 K.
  CHECK(conductivity("SF6", 298.15) == Approx(12.952).epsilon(0.04));
  CHECK(conductivity("H2", 298.15) == Approx(185.67).epsilon(0.02));
}

TEST_CASE("mixture rules reproduce the worked examples of a textbook") {
  // R. B. Bird, W. E. Stewart, E. N. Lightfoot, "Transport Phenomena", 1960, examples on the
  // viscosity and the conductivity of gas mixtures at low density: CO2, O2, N2 at 293 K with mole
  // fractions 0.133, 0.039, 0.828; viscosities 1462, 2031, 1754e-8 Pa s; conductivities 383, 612,
  // 627e-7 cal/(cm s K). Printed answers 1714e-8 Pa s and 584e-7 cal/(cm s K), rounded to the unit.
  constexpr double cal = 418.4;  // W/(m K) in cal/(cm s K)
  const GasMixture mix({constant_cp_gas("co2", 44.010e-3, 850.0, 1462e-8, 383e-7 * cal),
                        constant_cp_gas("o2", 32.000e-3, 920.0, 2031e-8, 612e-7 * cal),
                        constant_cp_gas("n2", 28.016e-3, 1040.0, 1754e-8, 627e-7 * cal)});
  const double x[3] = {0.133, 0.039, 0.828};
  const std::vector<double> y = mix.mass_fractions(x);
  CHECK(mix.viscosity(y.data(), 293.0) * 1e8 == Approx(1714.0).margin(1.0));
  CHECK(mix.conductivity(y.data(), 293.0) / cal * 1e7 == Approx(584.0).margin(1.0));
}
