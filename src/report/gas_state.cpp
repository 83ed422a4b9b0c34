#include "report/gas_state.h"

#include <fmt/format.h>

#include <array>
#include <cmath>
#include <nlohmann/json.hpp>

#include "gas/mixture.h"
#include "report/presenter.h"

namespace gaskettle {

GasStateReport ideal_gas_state(const Species& species, double temperature, double pressure) {
  const GasMixture mixture({species});
  const std::array<double, GasMixture::max_species> pure = {1.0};
  const GasState<double> s = mixture.from_temperature(pure.data(), temperature, pressure);
  GasStateReport r;
  r.temperature = temperature;
  r.pressure = pressure;
  r.density = s.density;
  r.energy = s.energy;
  r.enthalpy = s.enthalpy;
  r.entropy = s.entropy;
  r.cv = s.cv;
  r.cp = s.cp;
  r.sound_speed = mixture.sound_speed(s);
  r.viscosity = species.viscosity(temperature);
  r.conductivity = species.conductivity(temperature);
  r.molar_mass = species.molar_mass;
  return r;  // Joule-Thomson: exactly zero for an ideal gas
}

std::string gas_state_text(const Species& species, const GasStateReport& r) {
  std::vector<std::vector<std::string>> rows = {{species.name, "ideal", ""}};
  const auto row = [&](const char* name, double x, const char* unit) {
    rows.push_back({name, std::isfinite(x) ? fmt::format("{:.7g}", x) : "-", unit});
  };
  row("temperature", r.temperature, "K");
  row("pressure", r.pressure, "Pa abs");
  row("density", r.density, "kg/m3");
  row("energy", r.energy, "J/kg (ideal gas at 298.15 K: h = 0)");
  row("enthalpy", r.enthalpy, "J/kg");
  row("entropy", r.entropy, "J/kg/K");
  row("cv", r.cv, "J/kg/K");
  row("cp", r.cp, "J/kg/K");
  row("sound_speed", r.sound_speed, "m/s");
  row("viscosity", r.viscosity, "Pa s (dilute gas)");
  row("conductivity", r.conductivity, "W/m/K (dilute gas)");
  row("joule_thomson", r.joule_thomson, "K/Pa");
  row("molar_mass", r.molar_mass, "kg/mol");
  std::string out = table(rows, {1});
  if (r.temperature < species.lowest_temperature() || r.temperature > species.highest_temperature())
    out += fmt::format("  warning: outside the published range {:.0f} to {:.0f} K; cp is held there\n",
                       species.lowest_temperature(), species.highest_temperature());
  return out + "  source: " + species.source + "\n";
}

std::string gas_state_json(const GasStateReport& r) {
  const auto number = [](double x) {
    return std::isfinite(x) ? nlohmann::ordered_json(x) : nlohmann::ordered_json(nullptr);
  };
  const nlohmann::ordered_json ideal = {{"temperature", r.temperature},
                                        {"pressure", r.pressure},
                                        {"density", r.density},
                                        {"energy", r.energy},
                                        {"enthalpy", r.enthalpy},
                                        {"entropy", r.entropy},
                                        {"cv", r.cv},
                                        {"cp", r.cp},
                                        {"sound_speed", r.sound_speed},
                                        {"viscosity", number(r.viscosity)},
                                        {"conductivity", number(r.conductivity)},
                                        {"joule_thomson", r.joule_thomson},
                                        {"molar_mass", r.molar_mass}};
  return nlohmann::ordered_json{{"ideal", ideal}}.dump(2) + "\n";
}

}  // namespace gaskettle
