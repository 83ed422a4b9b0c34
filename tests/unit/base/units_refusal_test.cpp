// What is refused, and that the message says what would be right.
#include <catch2/catch.hpp>
#include <cmath>
#include <random>

#include "base/units.h"

using namespace gaskettle;
namespace uk = gaskettle::unit_kinds;

namespace {

std::string message(const std::string& text, const UnitKind& kind) {
  try {
    const Quantity q = parse_quantity(text, kind);
    return "taken as " + std::to_string(q.value);
  } catch (const UnitError& e) {
    return e.what();
  }
}

struct Refusal {
  std::string text;
  const UnitKind& kind;
  std::vector<std::string> says;
};

void check(const std::vector<Refusal>& cases) {
  for (const Refusal& c : cases) {
    const std::string m = message(c.text, c.kind);
    INFO(c.text << " -> " << m);
    CHECK(m.find("taken as") == std::string::npos);
    for (const std::string& part : c.says) {
      INFO("should say: " << part);
      CHECK(m.find(part) != std::string::npos);
    }
  }
}

}  // namespace

TEST_CASE("a unit of another dimension") {
  check({{"12 kg", uk::length, {"12 kg is not a length", "250 mm"}},
         {"3 m", uk::area, {"is not an area", "2.2 m2"}},
         {"3 m2", uk::volume, {"is not a volume"}},
         {"3 N", uk::mass, {"is not a mass", "40 kg"}},
         {"3 Hz", uk::time, {"is not a time"}},
         {"3 W", uk::temperature, {"is not a temperature", "20 degC"}},
         {"3 m", uk::pressure, {"is not a pressure", "14 bar abs", "14 bar gauge"}},
         {"3 kg", uk::force, {"is not a force"}},
         {"3 N", uk::torque, {"is not a torque", "3 N m"}},
         {"3 J", uk::power, {"is not a power", "6 kW"}},
         {"3 W", uk::energy, {"is not an energy"}},
         {"3 m", uk::angle, {"is not an angle", "30 deg"}},
         {"5 %", uk::angle, {"is not an angle"}},
         {"3 m", uk::velocity, {"is not a velocity"}},
         {"3 m/s", uk::acceleration, {"is not an acceleration"}},
         {"3 J/kg/K", uk::heat_capacity, {"is not a heat capacity"}},
         {"3 J/mol/K", uk::specific_heat, {"is not a specific heat"}},
         {"3 W/m2/K", uk::conductivity, {"is not a thermal conductivity"}},
         {"3 W/m/K", uk::film_coefficient, {"is not a film coefficient", "35 W/m2/K"}},
         {"3 W/mK", uk::conductance, {"is not a thermal conductance", "12 W/K"}},
         {"3 W", uk::heat_flux, {"is not a heat flux"}},
         {"3 mol/m3", uk::density, {"is not a density"}},
         {"3 kg", uk::molar_mass, {"is not a molar mass"}},
         {"3 N", uk::stiffness, {"is not a stiffness"}},
         {"3 N/m", uk::viscous_coefficient, {"is not a viscous coefficient"}},
         {"3 l/min", uk::sonic_conductance, {"is not a sonic conductance", "dm3/s/bar"}},
         {"3 Pa", uk::viscosity, {"is not a viscosity"}},
         {"3 kg/s", uk::liquid_flow, {"is not a volume flow"}},
         {"3 W", uk::gas_flow, {"is not a gas flow", "2 g/s"}},
         {"3 m/s", uk::percentage, {"is not a percentage", "7 %"}}});
}

TEST_CASE("a reciprocal is not taken for the unit itself") {
  check({{"5 s", uk::frequency, {"is not a frequency"}},
         {"5 m2 K/W", uk::film_coefficient, {"is not a film coefficient"}},
         {"5 K/W", uk::conductance, {"is not a thermal conductance"}},
         {"5 W/m2/K", uk::contact_resistance, {"is not a contact resistance"}}});
}

TEST_CASE("a value without its unit, and a unit on a pure number") {
  check({{"12", uk::length, {"12 has no unit", "a length needs one", "250 mm"}},
         {"0", uk::power, {"has no unit"}},
         {"7", uk::percentage, {"7 has no unit", "7 %"}},
         {"0.07", uk::percentage, {"has no unit", "7 %"}},
         {"12", uk::temperature, {"has no unit", "20 degC"}},
         {"12", uk::gas_flow, {"has no unit", "2 g/s"}},
         {"5 mm", uk::number, {"carries a unit", "a pure number", "for example 5"}},
         {"5 %", uk::number, {"percent", "write 0.05"}},
         {"5 m", uk::count, {"carries a unit"}},
         {"2.5", uk::count, {"is not a whole number"}},
         {"0", uk::count, {"is not a whole number"}},
         {"-3", uk::count, {"is not a whole number"}},
         {"1e12", uk::count, {"is not a whole number"}},
         {"", uk::length, {"a length is missing", "250 mm"}},
         {"   ", uk::area, {"an area is missing"}}});
}

TEST_CASE("pressures") {
  check({{"14 bar", uk::pressure, {"14 bar abs", "14 bar gauge"}},
         {"200 psi", uk::pressure, {"200 psi abs", "200 psi gauge"}},
         {"-1 bar abs", uk::pressure, {"below vacuum"}},
         {"14 bar gauge", uk::pressure_difference, {"neither abs nor gauge", "0.2 bar"}},
         {"14 barg", uk::pressure_difference, {"neither abs nor gauge"}},
         {"14 bar abs", uk::pressure_difference, {"neither abs nor gauge"}},
         {"14 bar gauge", uk::length, {"is a pressure, not a length"}},
         {"14 barg abs", uk::pressure, {"twice", "14 bar gauge"}},
         {"14 gauge", uk::pressure, {"14 bar gauge"}},
         {"14 m gauge", uk::pressure, {"14 bar gauge"}}});
}

TEST_CASE("temperatures") {
  check({{"-274 degC", uk::temperature, {"below absolute zero"}},
         {"-1 K", uk::temperature, {"below absolute zero"}},
         {"-460 degF", uk::temperature, {"below absolute zero"}},
         {"20 C", uk::temperature, {"degC"}},
         {"68 F", uk::temperature, {"degF"}},
         {"4 C", uk::temperature_difference, {"degC"}}});
}

TEST_CASE("speeds of rotation and frequencies are kept apart") {
  const std::vector<std::string> spellings{"rpm", "rev/min", "rev/s", "rad/s"};
  check({{"25 Hz", uk::rotation, spellings},
         {"25 1/s", uk::rotation, spellings},
         {"1500 1/min", uk::rotation, spellings},
         {"25 s-1", uk::rotation, spellings},
         {"25 m/s", uk::rotation, spellings},
         {"25 deg/s", uk::rotation, spellings},
         {"25 rad/s", uk::frequency, {"is a speed of rotation", "2 Hz"}},
         {"25 rpm", uk::frequency, {"is a speed of rotation", "2 Hz"}}});
}

TEST_CASE("a volume flow of gas that does not say its state") {
  const auto three = [](const std::string& flow) {
    return std::vector<std::string>{flow + " normal", flow + " anr", flow + " actual"};
  };
  check({{"30 l/min", uk::gas_flow, three("30 l/min")},
         {"2 m3/h", uk::gas_flow, three("2 m3/h")},
         {"50 sccm", uk::gas_flow, three("50 cm3/min")},
         {"50 SCCM", uk::gas_flow, three("50 cm3/min")},
         {"50 scfm", uk::gas_flow, three("50 ft3/min")},
         {"50 slpm", uk::gas_flow, three("50 l/min")},
         {"50 nl/min", uk::gas_flow, three("50 nl/min")},  // nanolitres: no word of state either
         {"2 g/s normal", uk::gas_flow, {"goes with a volume flow only"}},
         {"2 mol/s anr", uk::gas_flow, {"goes with a volume flow only"}},
         {"2 l/min normal", uk::liquid_flow, {"30 l/min"}}});
}

TEST_CASE("numbers in other notations") {
  check({{"1,5 bar", uk::pressure_difference, {"decimal point", "0.2 bar"}},
         {"1,500 mm", uk::length, {"separators", "250 mm"}},
         {"1'500 mm", uk::length, {"separators"}},
         {"1_500 mm", uk::length, {"separators"}},
         {"1 500 mm", uk::length, {"two numbers"}},
         {"1 1/2 in", uk::length, {"two numbers"}},
         {"0x10 K", uk::temperature, {"hexadecimal"}},
         {"1.2.3 m", uk::length, {"two decimal points"}},
         {"1e999 K", uk::temperature, {"outside the range"}},
         {"1e-999 K", uk::temperature, {"outside the range"}},
         {"1e308 km", uk::length, {"too large"}},
         {"inf K", uk::temperature, {"not a finite number"}},
         {"-.inf", uk::number, {"not a finite number"}},
         {"nan", uk::number, {"not a finite number"}},
         {"ten mm", uk::length, {"does not begin with a number"}},
         {"mm", uk::length, {"does not begin with a number"}},
         {"- 5 mm", uk::length, {"does not begin with a number"}},
         {"e5 m", uk::length, {"does not begin with a number"}},
         {"1 min 30 s", uk::time, {"not one number and one unit"}},
         {"5 m 3 cm", uk::length, {"not one number and one unit"}},
         {std::string(300, '1') + " m", uk::length, {"too long", "302 characters", "250 mm"}}});
  CHECK(message(std::string(300, '1') + " m", uk::length).size() < 200);
}

TEST_CASE("text that the units library would read in its own ways") {
  // Dates, offsets, logarithms, numbers inside units.
  check({{"5 s since 2000-01-01", uk::time, {"8 s"}},
         {"5 K @ 273.15", uk::temperature, {"20 degC"}},
         {"5 K from 273", uk::temperature, {"20 degC"}},
         {"5 K after 273", uk::temperature, {"20 degC"}},
         {"5 K ref 273", uk::temperature, {"20 degC"}},
         {"5 lg(re 1 W)", uk::power, {"6 kW"}},
         {"5 ln(re W)", uk::power, {"6 kW"}},
         {"5 lb(re 1 W)", uk::power, {"6 kW"}},
         {"5 dBZ", uk::volume, {"0.5 m3"}},
         {"5 m 10", uk::length, {"250 mm"}},
         {"5 m0.5", uk::length, {"250 mm"}},
         {"5 m999999999", uk::length, {"250 mm"}},
         {"5 m^", uk::length, {"250 mm"}},
         {"5 /s", uk::frequency, {"2 Hz"}},
         {"5 m/", uk::length, {"250 mm"}},
         {"5 (m", uk::length, {"250 mm"}},
         {"5 m)", uk::length, {"250 mm"}},
         {"5 " + std::string(150, '('), uk::length, {"250 mm"}},
         {"5 Nm3", uk::torque, {"3 N m"}}});
}

TEST_CASE("an unknown unit is named, with a near one") {
  check({{"5 furlogs", uk::length, {"furlogs", "250 mm"}},
         {"5 bat abs", uk::pressure, {"bat", "14 bar abs"}},
         {"5 min gauge2", uk::pressure, {"14 bar"}},
         {"5 KW", uk::power, {"KW", "6 kW"}}});
  CHECK(message("5 k\xff\x01W", uk::power).find('\xff') == std::string::npos);  // messages are printable
}

TEST_CASE("converting back needs a unit of the kind") {
  CHECK_THROWS_AS(from_si(1.0, uk::length, "kg"), UnitError);
  CHECK_THROWS_AS(from_si(1.0, uk::pressure, "bar"), UnitError);
  CHECK_THROWS_AS(from_si(1.0, uk::number, "m"), UnitError);
  CHECK_THROWS_AS(from_si(1.0, uk::rotation, "Hz"), UnitError);
}

TEST_CASE("any bytes give a finite value or a message") {
  // Half of the strings are raw bytes, half are shuffled pieces of real units,
  // which get further into the reader.
  const std::vector<std::string> pieces{"1",  "5 ",     "m",   "kg",    "bar",     " gauge", "/",   "(",    ")",
                                        "²",  "°C",     "-",   ".",     "*",       "^",      "**",  "K",    "mK",
                                        "Nm", "rpm",    "rev", "e5",    "%",       " ",      "1/s", "per ", " since ",
                                        "@",  "lg(re ", "9",   "l/min", " normal", "N",      "\t",  ","};
  const std::vector<UnitKind> kinds{uk::number,
                                    uk::percentage,
                                    uk::count,
                                    uk::length,
                                    uk::temperature,
                                    uk::pressure,
                                    uk::rotation,
                                    uk::gas_flow,
                                    uk::conductivity,
                                    uk::frequency,
                                    uk::pressure_difference,
                                    uk::temperature_difference};
  std::mt19937_64 random(20240611);
  int taken = 0;
  for (int i = 0; i < 20000; ++i) {
    std::string text;
    const std::size_t length = random() % 24;
    for (std::size_t k = 0; k < length; ++k)
      text += i % 2 == 0 ? std::string(1, static_cast<char>(random() % 256)) : pieces[random() % pieces.size()];
    if (i % 4 > 1) text.insert(0, "3 ");
    const UnitKind& kind = kinds[random() % kinds.size()];
    try {
      const Quantity q = parse_quantity(text, kind);
      ++taken;
      if (!std::isfinite(q.value)) FAIL("not finite: " << text);
      if (!std::isfinite(from_si(q.value, kind, q.unit))) FAIL("not finite back: " << text);
    } catch (const UnitError& e) {
      if (std::string(e.what()).empty()) FAIL("no message: " << text);
    }
  }
  CHECK(taken > 20);  // the pieces do reach the far end of the reader
}
