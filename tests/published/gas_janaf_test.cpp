// Ideal-gas cp, h and s against printed tables.
//
// M. W. Chase, Jr., "NIST-JANAF Thermochemical Tables", 4th ed., J. Phys. Chem. Ref.
// Data Monograph 9, 1998 (the table's number stands in each row), and D. R. Lide (ed.), "CRC
// Handbook of Chemistry and Physics", Standard Thermodynamic Properties of Chemical
// Substances. Ethane and propane have no JANAF table: theirs is the CRC row.
//
// The program uses the newer NASA fits (McBride, Zehe, Gordon, NASA/TP-2002-211556).
// Where the two sources are known to disagree the bound is their disagreement.
#include <catch2/catch.hpp>
#include <cmath>
#include <string_view>

#include "gas/catalogue.h"

using namespace gaskettle;

namespace {

struct Row {
  const char* formula;
  double temperature;  // K
  double cp;           // J/(mol K)
  double enthalpy;     // J/mol above 298.15 K; JANAF prints kJ with three decimals
  double entropy;      // J/(mol K), 1 bar
  const char* table;
};

// clang-format off
constexpr Row janaf[] = {
    {"N2", 298.15, 29.124, 0.0, 191.609, "N-023"},
    {"N2", 400.0, 29.249, 2971.0, 200.181, "N-023"},
    {"N2", 600.0, 30.110, 8894.0, 212.176, "N-023"},
    {"N2", 1000.0, 32.697, 21463.0, 228.170, "N-023"},
    {"N2", 1500.0, 34.843, 38405.0, 241.880, "N-023"},
    {"N2", 2000.0, 35.971, 56137.0, 252.074, "N-023"},
    {"O2", 298.15, 29.376, 0.0, 205.147, "O-029"},
    {"O2", 400.0, 30.106, 3025.0, 213.871, "O-029"},
    {"O2", 600.0, 32.090, 9244.0, 226.451, "O-029"},
    {"O2", 1000.0, 34.870, 22703.0, 243.578, "O-029"},
    {"O2", 1500.0, 36.544, 40599.0, 258.068, "O-029"},
    {"O2", 2000.0, 37.741, 59175.0, 268.748, "O-029"},
    {"Ar", 298.15, 20.786, 0.0, 154.845, "Ar-001"},
    {"Ar", 400.0, 20.786, 2117.0, 160.953, "Ar-001"},
    {"Ar", 600.0, 20.786, 6274.0, 169.381, "Ar-001"},
    {"Ar", 1000.0, 20.786, 14589.0, 179.999, "Ar-001"},
    {"Ar", 1500.0, 20.786, 24982.0, 188.427, "Ar-001"},
    {"Ar", 2000.0, 20.786, 35375.0, 194.407, "Ar-001"},
    {"He", 298.15, 20.786, 0.0, 126.152, "He-001"},
    {"He", 400.0, 20.786, 2117.0, 132.260, "He-001"},
    {"He", 600.0, 20.786, 6274.0, 140.688, "He-001"},
    {"He", 1000.0, 20.786, 14589.0, 151.306, "He-001"},
    {"He", 1500.0, 20.786, 24982.0, 159.734, "He-001"},
    {"He", 2000.0, 20.786, 35375.0, 165.714, "He-001"},
    {"Ne", 298.15, 20.786, 0.0, 146.327, "Ne-001"},
    {"Ne", 400.0, 20.786, 2117.0, 152.436, "Ne-001"},
    {"Ne", 600.0, 20.786, 6274.0, 160.864, "Ne-001"},
    {"Ne", 1000.0, 20.786, 14589.0, 171.482, "Ne-001"},
    {"Ne", 1500.0, 20.786, 24982.0, 179.910, "Ne-001"},
    {"Ne", 2000.0, 20.786, 35375.0, 185.889, "Ne-001"},
    {"Kr", 298.15, 20.786, 0.0, 164.084, "Kr-001"},
    {"Kr", 400.0, 20.786, 2117.0, 170.193, "Kr-001"},
    {"Kr", 600.0, 20.786, 6274.0, 178.621, "Kr-001"},
    {"Kr", 1000.0, 20.786, 14589.0, 189.239, "Kr-001"},
    {"Kr", 1500.0, 20.786, 24982.0, 197.667, "Kr-001"},
    {"Kr", 2000.0, 20.786, 35375.0, 203.646, "Kr-001"},
    {"Xe", 298.15, 20.786, 0.0, 169.684, "Xe-001"},
    {"Xe", 400.0, 20.786, 2117.0, 175.792, "Xe-001"},
    {"Xe", 600.0, 20.786, 6274.0, 184.220, "Xe-001"},
    {"Xe", 1000.0, 20.786, 14589.0, 194.838, "Xe-001"},
    {"Xe", 1500.0, 20.786, 24982.0, 203.266, "Xe-001"},
    {"Xe", 2000.0, 20.786, 35375.0, 209.246, "Xe-001"},
    {"H2", 298.15, 28.836, 0.0, 130.680, "H-050"},
    {"H2", 400.0, 29.181, 2959.0, 139.216, "H-050"},
    {"H2", 600.0, 29.327, 8811.0, 151.077, "H-050"},
    {"H2", 1000.0, 30.205, 20680.0, 166.216, "H-050"},
    {"H2", 1500.0, 32.298, 36290.0, 178.846, "H-050"},
    {"H2", 2000.0, 34.280, 52951.0, 188.418, "H-050"},
    {"CO2", 298.15, 37.129, 0.0, 213.795, "C-095"},
    {"CO2", 400.0, 41.325, 4003.0, 225.314, "C-095"},
    {"CO2", 600.0, 47.321, 12907.0, 243.283, "C-095"},
    {"CO2", 1000.0, 54.308, 33397.0, 269.299, "C-095"},
    {"CO2", 1500.0, 58.379, 61705.0, 292.199, "C-095"},
    {"CO2", 2000.0, 60.350, 91439.0, 309.293, "C-095"},
    {"CO", 298.15, 29.142, 0.0, 197.653, "C-093"},
    {"CO", 400.0, 29.342, 2976.0, 206.238, "C-093"},
    {"CO", 600.0, 30.443, 8942.0, 218.319, "C-093"},
    {"CO", 1000.0, 33.183, 21690.0, 234.538, "C-093"},
    {"CO", 1500.0, 35.217, 38850.0, 248.426, "C-093"},
    {"CO", 2000.0, 36.250, 56744.0, 258.714, "C-093"},
    {"H2O", 298.15, 33.590, 0.0, 188.834, "H-064"},
    {"H2O", 400.0, 34.262, 3452.0, 198.788, "H-064"},
    {"H2O", 600.0, 36.325, 10501.0, 213.052, "H-064"},
    {"H2O", 1000.0, 41.268, 26000.0, 232.738, "H-064"},
    {"H2O", 1500.0, 47.090, 48151.0, 250.620, "H-064"},
    {"H2O", 2000.0, 51.180, 72790.0, 264.769, "H-064"},
    {"CH4", 298.15, 35.639, 0.0, 186.251, "C-067"},
    {"CH4", 400.0, 40.500, 3861.0, 197.356, "C-067"},
    {"CH4", 600.0, 52.227, 13130.0, 215.987, "C-067"},
    {"CH4", 1000.0, 71.795, 38179.0, 247.549, "C-067"},
    {"CH4", 1500.0, 86.556, 78153.0, 279.763, "C-067"},
    {"CH4", 2000.0, 94.399, 123592.0, 305.853, "C-067"},
    {"C2H4", 298.15, 42.886, 0.0, 219.330, "C-128"},
    {"C2H4", 400.0, 53.048, 4882.0, 233.343, "C-128"},
    {"C2H4", 600.0, 70.663, 17335.0, 258.348, "C-128"},
    {"C2H4", 1000.0, 93.899, 50665.0, 300.408, "C-128"},
    {"C2H4", 1500.0, 109.974, 102074.0, 341.877, "C-128"},
    {"C2H4", 2000.0, 118.386, 159381.0, 374.791, "C-128"},
    {"NH3", 298.15, 35.652, 0.0, 192.774, "H-083"},
    {"NH3", 400.0, 38.716, 3781.0, 203.663, "H-083"},
    {"NH3", 600.0, 45.293, 12188.0, 220.615, "H-083"},
    {"NH3", 1000.0, 56.491, 32637.0, 246.486, "H-083"},
    {"NH3", 1500.0, 66.564, 63582.0, 271.442, "H-083"},
    {"NH3", 2000.0, 72.833, 98561.0, 291.525, "H-083"},
    {"SF6", 298.15, 96.960, 0.0, 291.535, "F-154"},
    {"SF6", 400.0, 116.373, 10940.0, 322.962, "F-154"},
    {"SF6", 600.0, 136.069, 36470.0, 374.450, "F-154"},
    {"SF6", 1000.0, 149.272, 94116.0, 447.786, "F-154"},
    {"SF6", 1500.0, 153.978, 170152.0, 509.382, "F-154"},
    {"SF6", 2000.0, 155.700, 247631.0, 553.949, "F-154"},
    {"N2O", 298.15, 38.617, 0.0, 219.957, "N-026"},
    {"N2O", 400.0, 42.680, 4149.0, 231.899, "N-026"},
    {"N2O", 600.0, 48.389, 13295.0, 250.363, "N-026"},
    {"N2O", 1000.0, 54.865, 34110.0, 276.804, "N-026"},
    {"N2O", 1500.0, 58.410, 62557.0, 299.825, "N-026"},
    {"N2O", 2000.0, 59.983, 92203.0, 316.871, "N-026"},
    {"SO2", 298.15, 39.878, 0.0, 248.212, "O-034"},
    {"SO2", 400.0, 43.493, 4250.0, 260.448, "O-034"},
    {"SO2", 600.0, 49.049, 13544.0, 279.214, "O-034"},
    {"SO2", 1000.0, 54.484, 34428.0, 305.767, "O-034"},
    {"SO2", 1500.0, 57.036, 62404.0, 328.419, "O-034"},
    {"SO2", 2000.0, 58.229, 91250.0, 345.007, "O-034"},
    {"NO", 298.15, 29.845, 0.0, 210.758, "N-005"},
    {"NO", 400.0, 29.944, 3040.0, 219.529, "N-005"},
    {"NO", 600.0, 31.238, 9144.0, 231.886, "N-005"},
    {"NO", 1000.0, 33.987, 22229.0, 248.536, "N-005"},
    {"NO", 1500.0, 35.780, 39729.0, 262.703, "N-005"},
    {"NO", 2000.0, 36.647, 57859.0, 273.128, "N-005"},
};

// 298.15 K: cp and s as printed, one decimal; 0 where there is no row.
constexpr Row crc[] = {
    {"N2", 298.15, 29.1, 0.0, 191.6, "CRC"},
    {"O2", 298.15, 29.4, 0.0, 205.2, "CRC"},
    {"Ar", 298.15, 20.8, 0.0, 154.8, "CRC"},
    {"He", 298.15, 20.8, 0.0, 126.2, "CRC"},
    {"Ne", 298.15, 20.8, 0.0, 146.3, "CRC"},
    {"Kr", 298.15, 20.8, 0.0, 164.1, "CRC"},
    {"Xe", 298.15, 20.8, 0.0, 169.7, "CRC"},
    {"H2", 298.15, 28.8, 0.0, 130.7, "CRC"},
    {"CO2", 298.15, 37.1, 0.0, 213.8, "CRC"},
    {"CO", 298.15, 29.1, 0.0, 197.7, "CRC"},
    {"H2O", 298.15, 33.6, 0.0, 188.8, "CRC"},
    {"CH4", 298.15, 35.7, 0.0, 186.3, "CRC"},
    {"C2H6", 298.15, 52.5, 0.0, 229.2, "CRC"},
    {"C3H8", 298.15, 73.6, 0.0, 270.3, "CRC"},
    {"C2H4", 298.15, 42.9, 0.0, 219.3, "CRC"},
    {"NH3", 298.15, 35.1, 0.0, 192.8, "CRC"},
    {"SF6", 298.15, 97.0, 0.0, 291.5, "CRC"},
    {"N2O", 298.15, 38.6, 0.0, 220.0, "CRC"},
    {"SO2", 298.15, 39.9, 0.0, 248.2, "CRC"},
    {"NO", 298.15, 29.9, 0.0, 210.8, "CRC"},
};
// clang-format on

// How far the two sources may differ.
struct Disagreement {
  double cp = 0.002;          // relative, up to 1000 K; h and s - s298 are integrals of it
  double cp_above = 0.002;    // relative, above 1000 K
  double entropy_298 = 0.02;  // J/(mol K), of the standard entropy itself
};

Disagreement disagreement(std::string_view gas) {
  // The fits rest on newer data than some of the tables. As cp of the fit minus cp of the table:
  // methane +0.5 % at 500 K, +2.6 % at 1000 K, +7.5 % at 2000 K; nitrous oxide, ammonia, sulfur dioxide
  // +0.7, -0.4, -0.36 % at 1000 K and three times as much at 2000 K or less; water +0.5 % at 1500 K,
  // +1.1 % at 2000 K. Standard entropies: sulfur hexafluoride 0.14, methane 0.12, nitrous oxide
  // 0.05 J/(mol K).
  if (gas == "CH4") return {0.027, 0.076, 0.13};
  if (gas == "N2O") return {0.007, 0.020, 0.06};
  if (gas == "NH3") return {0.0045, 0.011, 0.02};
  if (gas == "SO2") return {0.0037, 0.006, 0.02};
  if (gas == "H2O") return {0.002, 0.012, 0.02};
  if (gas == "SF6") return {0.002, 0.002, 0.15};
  return {};
}

double relative(const Row& row) {
  const Disagreement d = disagreement(row.formula);
  return row.temperature > 1000.0 ? d.cp_above : d.cp;
}

ThermalPoint molar(const Row& row, const Species& gas) {
  ThermalPoint p = gas.thermal(row.temperature);
  p.cp *= gas.molar_mass;
  p.enthalpy *= gas.molar_mass;
  p.entropy *= gas.molar_mass;
  return p;
}

}  // namespace

TEST_CASE("cp, h and s agree with the JANAF tables") {
  for (const Row& row : janaf) {
    INFO(row.formula << " at " << row.temperature << " K, JANAF table " << row.table);
    const Species gas = find_gas(row.formula).value();
    const ThermalPoint p = molar(row, gas);
    const double bound = relative(row);
    CHECK(p.cp == Approx(row.cp).epsilon(bound));
    // An integral of cp disagrees by no more than cp does; the table ends at 1 J/mol.
    CHECK(std::abs(p.enthalpy - row.enthalpy) <= bound * row.enthalpy + 1.0);
    const double rise = row.cp * std::log(row.temperature / 298.15);
    CHECK(std::abs(p.entropy - row.entropy) <= bound * rise + disagreement(row.formula).entropy_298);
  }
}

TEST_CASE("cp and standard entropy at 298.15 K agree with the CRC handbook") {
  for (const Row& row : crc) {
    INFO(row.formula << ", CRC");
    const Species gas = find_gas(row.formula).value();
    const ThermalPoint p = molar(row, gas);
    // Half of the last digit, and 0.2 %. The handbook's 35.1 for ammonia is 1.5 % below
    // both NASA and JANAF (35.65), which agree.
    const double bound = std::string_view(row.formula) == "NH3" ? 0.016 : 0.002;
    CHECK(std::abs(p.cp - row.cp) <= 0.05 + bound * row.cp);
    const double entropy_bound = std::string_view(row.formula) == "SF6" ? 0.18 : 0.08;  // rounding 0.05, and revisions
    CHECK(std::abs(p.entropy - row.entropy) <= entropy_bound);
  }
}

TEST_CASE("air agrees with its reference equation") {
  // Ideal part of E. W. Lemmon, R. T. Jacobsen, S. G. Penoncello, D. G. Friend, J. Phys. Chem. Ref.
  // Data 29 (2000) 331: cp/R from its second derivative. Uncertainty of cp 0.1 %.
  const auto cp_over_r = [](double t) {
    const auto einstein = [](double theta) { return theta * theta * std::exp(theta) / std::pow(std::expm1(theta), 2); };
    const double tau = 132.6312 / t;
    const double theta = 87.31279 * tau;
    const double twisted =
        theta * theta * (2.0 / 3.0) * std::exp(-theta) / std::pow(1.0 + 2.0 / 3.0 * std::exp(-theta), 2);
    const double powers = 12 * 6.057194e-8 / (tau * tau * tau) - 6 * 2.10274769e-5 / (tau * tau) -
                          2 * 1.58860716e-4 / tau - 0.75 * 1.9536342e-4 * std::pow(tau, 1.5);
    return 1.0 + 2.490888032 - powers + 0.791309509 * einstein(25.36365 * tau) +
           0.212236768 * einstein(16.90741 * tau) + 0.197938904 * twisted;
  };
  const Species air = find_gas("air").value();
  for (const double t : {200.0, 250.0, 300.0, 500.0, 1000.0, 2000.0}) {
    INFO(t << " K");
    CHECK(air.cp(t) / air.gas_constant == Approx(cp_over_r(t)).epsilon(0.002));
  }
}
