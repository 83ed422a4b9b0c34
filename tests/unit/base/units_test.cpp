// Values with units into SI and back. Factors come from definitions, each with
// its source; sums and products of doubles are compared within a few roundings.
#include "base/units.h"

#include <catch2/catch.hpp>
#include <cmath>
#include <thread>

using namespace gaskettle;
namespace uk = gaskettle::unit_kinds;

namespace {

// One product and one sum on factors that are themselves rounded: a few units
// in the last place, 2.2e-16 each.
constexpr double rounding = 2e-15;

struct Case {
  const char* text;
  const UnitKind& kind;
  double si;
};

void check(const std::vector<Case>& cases) {
  for (const Case& c : cases) {
    INFO(c.text << " as " << c.kind.name);
    Quantity q;
    REQUIRE_NOTHROW(q = parse_quantity(c.text, c.kind));
    CHECK(q.value == Approx(c.si).epsilon(rounding).margin(0));
    // Back into the unit it was written in, and read again: the same SI value.
    const double back = from_si(q.value, c.kind, q.unit);
    const double number = std::stod(c.text);
    CHECK(back == Approx(number).epsilon(1e-12).margin(1e-12));
  }
}

// International yard and pound agreement of 1959: 1 in = 25.4 mm, 1 lb = 0.45359237 kg.
constexpr double inch = 0.0254;
constexpr double foot = 12 * inch;
constexpr double pound = 0.45359237;
constexpr double standard_gravity = 9.80665;  // 3rd CGPM, 1901
constexpr double pound_force = pound * standard_gravity;
constexpr double psi = pound_force / (inch * inch);
constexpr double pi = 3.14159265358979323846;

}  // namespace

TEST_CASE("lengths, areas, volumes, masses and times") {
  check({{"250 mm", uk::length, 0.25},    {"250mm", uk::length, 0.25},
         {"1.8 m", uk::length, 1.8},      {"4 cm", uk::length, 0.04},
         {"12 µm", uk::length, 12e-6},    {"12 μm", uk::length, 12e-6},
         {"12 um", uk::length, 12e-6},    {"10 in", uk::length, 10 * inch},
         {"3 ft", uk::length, 3 * foot},  {"20 mm2", uk::area, 20e-6},
         {"20 mm²", uk::area, 20e-6},     {"20 mm^2", uk::area, 20e-6},
         {"20 mm**2", uk::area, 20e-6},   {"0.5 in2", uk::area, 0.5 * inch * inch},
         {"0.5 m³", uk::volume, 0.5},     {"50 l", uk::volume, 0.05},
         {"50 L", uk::volume, 0.05},      {"200 ml", uk::volume, 200e-6},
         {"30 dm3", uk::volume, 0.03},    {"2 ft3", uk::volume, 2 * foot * foot * foot},
         {"40 kg", uk::mass, 40},         {"250 g", uk::mass, 0.25},
         {"3 t", uk::mass, 3000},         {"12 lbm", uk::mass, 12 * pound},
         {"12 lb", uk::mass, 12 * pound}, {"8 s", uk::time, 8},
         {"10 min", uk::time, 600},       {"4 h", uk::time, 14400},
         {"20 ms", uk::time, 0.02},       {"2 day", uk::time, 172800}});
}

TEST_CASE("temperatures are points on a scale and differences are intervals") {
  check({{"20 degC", uk::temperature, 293.15},
         {"20 °C", uk::temperature, 293.15},
         {"20 deg C", uk::temperature, 293.15},
         {"20 ℃", uk::temperature, 293.15},
         {"-40 degC", uk::temperature, 233.15},
         {"-40 degF", uk::temperature, 233.15},
         {"68 °F", uk::temperature, 293.15},
         {"010 K", uk::temperature, 10},
         {"0 K", uk::temperature, 0},
         {"4 K", uk::temperature_difference, 4},
         {"4 degC", uk::temperature_difference, 4},
         {"4 °C", uk::temperature_difference, 4},
         {"7.2 degF", uk::temperature_difference, 4},
         {"-50 mK", uk::temperature_difference, -0.05}});
  CHECK(parse_quantity("-459.67 degF", uk::temperature).value == Approx(0).margin(1e-12));
}

TEST_CASE("pressures say abs or gauge, in every spelling") {
  struct PressureCase {
    const char* text;
    double pascal;
    bool gauge;
  };
  const std::vector<PressureCase> cases{{"14 bar abs", 14e5, false},
                                        {"14 bar absolute", 14e5, false},
                                        {"14 bara", 14e5, false},
                                        {"14 bar(a)", 14e5, false},
                                        {"14 bar a", 14e5, false},
                                        {"14 bar gauge", 14e5, true},
                                        {"14 barg", 14e5, true},
                                        {"14 bar(g)", 14e5, true},
                                        {"14 bar (gauge)", 14e5, true},
                                        {"14 bar Gauge", 14e5, true},
                                        {"200 psig", 200 * psi, true},
                                        {"200 psia", 200 * psi, false},
                                        {"200 psi gauge", 200 * psi, true},
                                        {"1013 hPa abs", 101300, false},
                                        {"300 kPa abs", 3e5, false},
                                        {"300 kPag", 3e5, true},
                                        {"1.2 MPa gauge", 1.2e6, true},
                                        {"1 atm abs", 101325, false},
                                        {"101325 Pa abs", 101325, false},
                                        {"5 mbarg", 500, true},
                                        {"2 N/mm2 abs", 2e6, false},
                                        {"0 bar abs", 0, false},
                                        {"-0.5 bar gauge", -5e4, true},
                                        {"3 kgf/cm2 gauge", 3 * standard_gravity * 1e4, true},
                                        {"100 mmH2O gauge", 980.665, true}};
  for (const PressureCase& c : cases) {
    INFO(c.text);
    const Quantity q = parse_quantity(c.text, uk::pressure);
    // psi is kept in UDUNITS with 14 digits of its definition.
    CHECK(q.value == Approx(c.pascal).epsilon(1e-13).margin(0));
    CHECK(q.gauge == c.gauge);
    CHECK(from_si(q.value, uk::pressure, q.unit) == Approx(std::stod(c.text)).epsilon(1e-13).margin(0));
  }
  check({{"0.2 bar", uk::pressure_difference, 2e4},
         {"20 kPa", uk::pressure_difference, 2e4},
         {"-3 mbar", uk::pressure_difference, -300}});
}

TEST_CASE("mechanics") {
  check({{"200 N", uk::force, 200},
         {"1.5 kN", uk::force, 1500},
         {"40 lbf", uk::force, 40 * pound_force},
         {"3 N m", uk::torque, 3},
         {"3 Nm", uk::torque, 3},
         {"3 N·m", uk::torque, 3},
         {"3 N⋅m", uk::torque, 3},
         {"3 N*m", uk::torque, 3},
         {"3 N-m", uk::torque, 3},
         {"0.2 kNm", uk::torque, 200},
         {"30 deg", uk::angle, pi / 6},
         {"30 degree", uk::angle, pi / 6},
         {"30°", uk::angle, pi / 6},
         {"0.5 rad", uk::angle, 0.5},
         {"2 Hz", uk::frequency, 2},
         {"0.5 1/s", uk::frequency, 0.5},
         {"3 1 / min", uk::frequency, 0.05},
         {"2 s-1", uk::frequency, 2},
         {"2 s⁻¹", uk::frequency, 2},
         {"1450 rpm", uk::rotation, 1450 * 2 * pi / 60},
         {"1450 rev/min", uk::rotation, 1450 * 2 * pi / 60},
         {"24 rev/s", uk::rotation, 24 * 2 * pi},
         {"24 rev / s", uk::rotation, 24 * 2 * pi},
         {"151.8 rad/s", uk::rotation, 151.8},
         {"151.8 rad s-1", uk::rotation, 151.8},
         {"20 mm/s", uk::velocity, 0.02},
         {"36 km/h", uk::velocity, 10},
         {"5 ft/s", uk::velocity, 5 * foot},
         {"9.80665 m/s2", uk::acceleration, 9.80665},
         {"9.80665 m/s/s", uk::acceleration, 9.80665},
         {"20 N/mm", uk::stiffness, 2e4},
         {"500 N s/m", uk::viscous_coefficient, 500},
         {"500 Ns/m", uk::viscous_coefficient, 500},
         {"500 N/(m/s)", uk::viscous_coefficient, 500}});
}

TEST_CASE("heat") {
  check({{"6 kW", uk::power, 6000},
         {"150 W", uk::power, 150},
         {"2 kJ", uk::energy, 2000},
         {"3 kWh", uk::energy, 3 * 3.6e6},
         {"5 Wh", uk::energy, 18000},
         {"4 kJ/K", uk::heat_capacity, 4000},
         {"4 kJ/degC", uk::heat_capacity, 4000},
         {"490 J/kg/K", uk::specific_heat, 490},
         {"0.49 kJ/kgK", uk::specific_heat, 490},
         {"490 J/(kg K)", uk::specific_heat, 490},
         {"490 J/(kg·K)", uk::specific_heat, 490},
         {"490 J/kg K", uk::specific_heat, 490},
         {"490 J/kg/degC", uk::specific_heat, 490},
         {"490 J kg-1 K-1", uk::specific_heat, 490},
         {"490 J.kg-1.K-1", uk::specific_heat, 490},
         {"29.1 J/mol/K", uk::molar_specific_heat, 29.1},
         {"29.1 kJ/kmolK", uk::molar_specific_heat, 29.1},
         {"300 kJ/kg", uk::specific_energy, 3e5},
         {"50 W/m/K", uk::conductivity, 50},
         {"50 W/mK", uk::conductivity, 50},
         {"50 W/(m K)", uk::conductivity, 50},
         {"50 W/(mK)", uk::conductivity, 50},
         {"50 mW/m/K", uk::conductivity, 0.05},
         {"35 W/m2K", uk::film_coefficient, 35},
         {"35 W/m2/K", uk::film_coefficient, 35},
         {"35 W/m²/K", uk::film_coefficient, 35},
         {"35 W/m²K", uk::film_coefficient, 35},
         {"35 W/(m2 K)", uk::film_coefficient, 35},
         {"35 W/(m²·K)", uk::film_coefficient, 35},
         {"35 W/m2 K", uk::film_coefficient, 35},
         {"35 W per m2 per K", uk::film_coefficient, 35},
         {"35 W m⁻² K⁻¹", uk::film_coefficient, 35},
         {"12 W/K", uk::conductance, 12},
         {"0.0002 m2 K/W", uk::contact_resistance, 0.0002},
         {"0.0002 m2K/W", uk::contact_resistance, 0.0002},
         {"5 kW/m2", uk::heat_flux, 5000}});
}

TEST_CASE("matter and flows of liquid") {
  check({{"7850 kg/m3", uk::density, 7850},
         {"1.2 g/l", uk::density, 1.2},
         {"40 mol/m3", uk::molar_density, 40},
         {"0.04 mol/l", uk::molar_density, 40},
         {"28.01 g/mol", uk::molar_mass, 0.02801},
         {"28.01 kg/kmol", uk::molar_mass, 0.02801},
         {"2 kmol", uk::amount, 2000},
         {"2 dm3/s/bar", uk::sonic_conductance, 2e-8},
         {"2 l/s/bar", uk::sonic_conductance, 2e-8},
         {"2 dm3/(s bar)", uk::sonic_conductance, 2e-8},
         {"2 dm³/(s·bar)", uk::sonic_conductance, 2e-8},
         {"18 uPa s", uk::viscosity, 18e-6},
         {"18 µPa·s", uk::viscosity, 18e-6},
         {"0.018 mPas", uk::viscosity, 18e-6},
         {"0.018 cP", uk::viscosity, 18e-6},
         {"30 l/min", uk::liquid_flow, 5e-4},
         {"-2 m3/h", uk::liquid_flow, -2.0 / 3600},
         {"0.2 K/bar", uk::joule_thomson, 2e-6}});
}

TEST_CASE("numbers without a unit, percentages and counts") {
  CHECK(parse_quantity("0.85", uk::number).value == 0.85);
  CHECK(parse_quantity("-1e-3", uk::number).value == -1e-3);
  CHECK(parse_quantity("+.5", uk::number).value == 0.5);
  CHECK(parse_quantity("5.", uk::number).value == 5);
  CHECK(parse_quantity("010", uk::number).value == 10);
  CHECK(parse_quantity("−2", uk::number).value == -2);  // the minus of typesetting
  CHECK(parse_quantity("7 %", uk::percentage).value == Approx(0.07).epsilon(rounding));
  CHECK(parse_quantity("7%", uk::percentage).value == Approx(0.07).epsilon(rounding));
  CHECK(parse_quantity("12", uk::count).value == 12);
  CHECK(parse_quantity(" \t12\n", uk::count).value == 12);
}

TEST_CASE("gas flows say what they count") {
  // Amount in a cubic metre, p / (R T), with R = 8.31446261815324 J/(mol K),
  // exact in the SI (BIPM, The International System of Units, 9th edition).
  // The program keeps R to ten digits.
  constexpr double gas_constant = 8.31446261815324;
  constexpr double digits_of_constant = 1e-10;
  constexpr double normal = 101325.0 / (gas_constant * 273.15);
  constexpr double anr = 1e5 / (gas_constant * 293.15);  // ISO 8778: 20 degC, 100 kPa
  constexpr double litre_a_minute = 1e-3 / 60;
  struct FlowCase {
    const char* text;
    double si;
    FlowBasis basis;
  };
  const std::vector<FlowCase> cases{{"2 g/s", 2e-3, FlowBasis::mass},
                                    {"5 kg/h", 5.0 / 3600, FlowBasis::mass},
                                    {"-1 kg/s", -1, FlowBasis::mass},
                                    {"3 lbm/h", 3 * pound / 3600, FlowBasis::mass},
                                    {"3 mol/s", 3, FlowBasis::molar},
                                    {"3 kmol/h", 3000.0 / 3600, FlowBasis::molar},
                                    {"30 l/min normal", 30 * litre_a_minute * normal, FlowBasis::molar},
                                    {"30 l/min (normal)", 30 * litre_a_minute * normal, FlowBasis::molar},
                                    {"30 Nl/min", 30 * litre_a_minute * normal, FlowBasis::molar},
                                    {"2 Nm3/h", 2.0 / 3600 * normal, FlowBasis::molar},
                                    {"2 Nm³/h", 2.0 / 3600 * normal, FlowBasis::molar},
                                    {"2 m3/h normal", 2.0 / 3600 * normal, FlowBasis::molar},
                                    {"30 l/min anr", 30 * litre_a_minute * anr, FlowBasis::molar},
                                    {"30 l/min ANR", 30 * litre_a_minute * anr, FlowBasis::molar},
                                    {"30 l/min (ANR)", 30 * litre_a_minute * anr, FlowBasis::molar},
                                    {"30 l/min actual", 30 * litre_a_minute, FlowBasis::actual_volume},
                                    {"2 ft3/min actual", 2 * foot * foot * foot / 60, FlowBasis::actual_volume}};
  for (const FlowCase& c : cases) {
    INFO(c.text);
    const Quantity q = parse_quantity(c.text, uk::gas_flow);
    CHECK(q.value == Approx(c.si).epsilon(digits_of_constant));
    CHECK(q.basis == c.basis);
    CHECK(from_si(q.value, uk::gas_flow, q.unit) == Approx(std::stod(c.text)).epsilon(1e-14));
  }
  // The known molar volume of an ideal gas at 0 degC and 101.325 kPa, 22.413969 l/mol
  // (CODATA 2018, NIST Special Publication 961), to its printed digits.
  CHECK(1.0 / parse_quantity("1 l/s normal", uk::gas_flow).value == Approx(22.41396954).epsilon(1e-9));
}

TEST_CASE("rates of change and gains are made of other kinds") {
  CHECK(per_time(uk::temperature).si == "K s-1");
  CHECK(per_time(uk::rotation).si == "rad s-2");
  CHECK(per_time(uk::power).si == "W s-1");
  CHECK(per_time(uk::number).si == "s-1");
  CHECK(per_time(uk::gas_flow).si == "kg s-2");
  CHECK(ratio(uk::power, uk::temperature).si == "W K-1");
  CHECK(ratio(uk::number, uk::pressure).si == "Pa-1");
  CHECK(ratio(uk::power, uk::film_coefficient).si == "m2 K");
  CHECK(ratio(uk::length, uk::length).si == "1");
  check({{"3 K/min", per_time(uk::temperature), 0.05},
         {"3 degC/min", per_time(uk::temperature), 0.05},
         {"5.4 degF/min", per_time(uk::temperature), 0.05},
         {"1.2 bar/min", per_time(uk::pressure), 2000},
         {"60 rpm/s", per_time(uk::rotation), 2 * pi},
         {"6 %/min", per_time(uk::number), 0.001},
         {"300 W/K", ratio(uk::power, uk::temperature), 300},
         {"0.1 1/K", ratio(uk::number, uk::temperature), 0.1},
         {"5 %/K", ratio(uk::number, uk::temperature), 0.05},
         {"2 1/bar", ratio(uk::number, uk::pressure), 2e-5},
         {"30 rpm/K", ratio(uk::rotation, uk::temperature), pi}});
  CHECK_THROWS_AS(parse_quantity("3 K", per_time(uk::temperature)), UnitError);
  CHECK_THROWS_AS(parse_quantity("25 Hz/K", ratio(uk::rotation, uk::temperature)), UnitError);
}

TEST_CASE("every example of every kind is read, and its SI unit is known") {
  const std::vector<UnitKind> all{uk::number,
                                  uk::percentage,
                                  uk::count,
                                  uk::length,
                                  uk::area,
                                  uk::volume,
                                  uk::mass,
                                  uk::time,
                                  uk::temperature,
                                  uk::temperature_difference,
                                  uk::pressure,
                                  uk::pressure_difference,
                                  uk::force,
                                  uk::torque,
                                  uk::power,
                                  uk::energy,
                                  uk::angle,
                                  uk::frequency,
                                  uk::rotation,
                                  uk::velocity,
                                  uk::acceleration,
                                  uk::heat_capacity,
                                  uk::entropy,
                                  uk::specific_heat,
                                  uk::molar_specific_heat,
                                  uk::specific_entropy,
                                  uk::specific_energy,
                                  uk::conductivity,
                                  uk::film_coefficient,
                                  uk::conductance,
                                  uk::contact_resistance,
                                  uk::heat_flux,
                                  uk::density,
                                  uk::molar_density,
                                  uk::molar_mass,
                                  uk::amount,
                                  uk::stiffness,
                                  uk::viscous_coefficient,
                                  uk::sonic_conductance,
                                  uk::viscosity,
                                  uk::gas_flow,
                                  uk::liquid_flow,
                                  uk::joule_thomson,
                                  per_time(uk::pressure),
                                  ratio(uk::power, uk::temperature),
                                  ratio(uk::number, uk::temperature),
                                  ratio(uk::rotation, uk::pressure)};
  for (const UnitKind& kind : all) {
    INFO(kind.name);
    REQUIRE_FALSE(example_values(kind).empty());
    for (const std::string& value : example_values(kind)) {
      INFO(value);
      CHECK_NOTHROW(parse_quantity(value, kind));
    }
    for (const std::string& unit : example_units(kind)) CHECK_NOTHROW(from_si(1.0, kind, unit));
    CHECK(from_si(2.5, kind, kind.si) == 2.5);
    CHECK(from_si(2.5, kind, "") == 2.5);
  }
  CHECK(example_units(uk::length).front() == "mm");
  CHECK(example_units(UnitKind{"bore", "m"}).front() == "mm");  // a name of one's own: by dimension
}

TEST_CASE("values are printed in the unit asked for") {
  CHECK(format_quantity(454.45, uk::temperature, "degC") == "181.3 degC");
  CHECK(format_quantity(454.45, uk::temperature, "") == "454.4 K");  // 454.45 lies below its decimal text
  CHECK(format_quantity(4.0, uk::temperature_difference, "degC") == "4 degC");
  CHECK(format_quantity(14e5, uk::pressure, "bar gauge") == "14 bar gauge");
  CHECK(format_quantity(101325, uk::pressure, "") == "101325 Pa abs");
  CHECK(format_quantity(0.07, uk::percentage, "%") == "7 %");
  CHECK(format_quantity(0.07, uk::percentage, "") == "0.07");
  CHECK(format_quantity(0.85, uk::number, "") == "0.85");
  CHECK(format_quantity(12, uk::count, "") == "12");
  CHECK(format_quantity(6000, uk::power, "kW") == "6 kW");
  CHECK(format_quantity(1.0 / 3, uk::length, "mm", 6) == "333.333 mm");
  CHECK(format_quantity(2 * pi, uk::rotation, "rpm") == "60 rpm");
  CHECK(format_quantity(101325.0 / 8.314462618 / 273.15 / 60, uk::gas_flow, "Nm3/min") == "1 Nm3/min");
}

TEST_CASE("numbers keep their digits before the point") {
  CHECK(format_number(0) == "0");
  CHECK(format_number(-0.0) == "0");
  CHECK(format_number(9.99996) == "10");
  CHECK(format_number(123456.7) == "123457");
  CHECK(format_number(0.00123456) == "0.001235");
  CHECK(format_number(1.23456e-9) == "1.235e-09");
  CHECK(format_number(1.23456e12) == "1.235e+12");
  CHECK(format_number(std::nan("")) == "nan");
  CHECK(format_number(-INFINITY) == "-inf");
  CHECK(format_number(2.5, 1) == "2");  // ties to even, as the C library prints
}

TEST_CASE("the unit is kept as written") {
  CHECK(parse_quantity("35 W/m²/K", uk::film_coefficient).unit == "W/m²/K");
  CHECK(parse_quantity("20 °C", uk::temperature).unit == "°C");
  CHECK(parse_quantity("14 bar gauge", uk::pressure).unit == "bar gauge");
  CHECK(parse_quantity("0.5", uk::number).unit.empty());
}

TEST_CASE("several threads may read units at once") {
  std::vector<std::thread> threads;
  std::vector<double> sums(4, 0.0);
  for (std::size_t t = 0; t < sums.size(); ++t)
    threads.emplace_back([&sums, t] {
      for (int i = 0; i < 500; ++i) sums[t] += parse_quantity("250 mm", uk::length).value;
    });
  for (std::thread& t : threads) t.join();
  for (const double sum : sums) CHECK(sum == 125.0);  // 0.25 sums without rounding
}
