#include "gas/catalogue.h"

#include <algorithm>
#include <cmath>

#include "gas/critical_data.h"
#include "gas/nasa9_data.h"
#include "gas/transport_data.h"

namespace gaskettle {

namespace {

constexpr double fit_lowest = 200.0, fit_join = 1000.0, fit_highest = 6000.0;  // K, all fits of the source

/// Adds the NASA ranges of a gas, or its handbook fit where there are none.
std::optional<TransportCurve> transport_of(std::string_view gas, TransportKind kind, std::string& source) {
  const double unit = kind == TransportKind::viscosity ? 1e-7 : 1e-4;
  std::vector<TransportRange> ranges;
  for (const NasaTransportRow& r : nasa_transport())
    if (r.gas == gas && r.kind == kind)
      ranges.push_back({r.lowest, r.highest, unit * std::exp(r.d), r.a, r.b, r.c, 0.0, 0.0});
  if (!ranges.empty()) {
    source = "NASA Glenn transport data (R. A. Svehla, NASA TM-4647, 1995)";
    return TransportCurve(ranges);
  }
  for (const HandbookTransportRow& r : handbook_transport())
    if (r.gas == gas && r.kind == kind) {
      source = "Perry's Chemical Engineers' Handbook, 8th ed. 2008, tables 2-312 and 2-314";
      return TransportCurve({{r.lowest, r.highest, r.c1, r.c2, 0.0, 0.0, r.c3, r.c4}});
    }
  return std::nullopt;
}

std::optional<CriticalPoint> critical_of(std::string_view gas) {
  for (const CriticalRow& r : critical_rows())
    if (r.gas == gas) return CriticalPoint{r.temperature, r.pressure, r.molar_density, r.acentric_factor, r.source};
  return std::nullopt;
}

GasEntry entry_of(const Nasa9Gas& data) {
  GasEntry entry;
  Species& s = entry.species;
  s.name = data.name;
  s.formula = data.formula;
  s.source = "B. J. McBride, M. J. Zehe, S. Gordon, NASA/TP-2002-211556, 2002";
  s.molar_mass = data.molar_mass_g * 1e-3;
  s.gas_constant = molar_gas_constant / s.molar_mass;
  s.heat = HeatCapacityCurve(data.lower, data.upper, fit_lowest, fit_join, fit_highest);
  s.viscosity_curve = transport_of(s.name, TransportKind::viscosity, s.transport_source);
  s.conductivity_curve = transport_of(s.name, TransportKind::conductivity, s.transport_source);
  s.critical = critical_of(s.name);
  for (const std::string alias : {data.formula, data.other_name})
    if (!alias.empty()) entry.aliases.push_back(alias);
  return entry;
}

std::vector<GasEntry> build() {
  std::vector<GasEntry> all;
  for (const Nasa9Gas& data : nasa9_gases()) all.push_back(entry_of(data));
  return all;
}

}  // namespace

const std::vector<GasEntry>& gas_catalogue() {
  static const std::vector<GasEntry> catalogue = build();
  return catalogue;
}

std::optional<Species> find_gas(std::string_view name_or_alias) {
  for (const GasEntry& e : gas_catalogue())
    if (e.species.name == name_or_alias ||
        std::find(e.aliases.begin(), e.aliases.end(), name_or_alias) != e.aliases.end())
      return e.species;
  return std::nullopt;
}

std::vector<std::string> gas_names() {
  std::vector<std::string> names, aliases;
  for (const GasEntry& e : gas_catalogue()) {
    names.push_back(e.species.name);
    aliases.insert(aliases.end(), e.aliases.begin(), e.aliases.end());
  }
  names.insert(names.end(), aliases.begin(), aliases.end());
  return names;
}

std::string gas_data_version() { return "1"; }

}  // namespace gaskettle
