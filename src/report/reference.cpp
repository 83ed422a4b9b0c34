#include "report/reference.h"

#include <fmt/format.h>
#include <fmt/ranges.h>

#include <algorithm>
#include <set>
#include <vector>

#include "base/problems.h"
#include "gas/catalogue.h"
#include "laws/films.h"
#include "model/materials.h"
#include "model/terms.h"
#include "plant/model.h"
#include "report/presenter.h"
#include "report/reference_words.h"

namespace gaskettle {

namespace {
const std::vector<KeyDoc>& keys() {
  static const std::vector<KeyDoc> list = describe_model();
  return list;
}

const std::vector<UnitKind>& kinds() {
  using namespace unit_kinds;
  static const std::vector<UnitKind> list = {length,
                                             area,
                                             volume,
                                             mass,
                                             time,
                                             temperature,
                                             temperature_difference,
                                             pressure,
                                             pressure_difference,
                                             force,
                                             torque,
                                             power,
                                             energy,
                                             angle,
                                             frequency,
                                             rotation,
                                             velocity,
                                             acceleration,
                                             heat_capacity,
                                             specific_heat,
                                             conductivity,
                                             film_coefficient,
                                             unit_kinds::conductance,
                                             contact_resistance,
                                             heat_flux,
                                             density,
                                             molar_mass,
                                             stiffness,
                                             viscous_coefficient,
                                             sonic_conductance,
                                             viscosity,
                                             gas_flow,
                                             liquid_flow,
                                             percentage};
  return list;
}

std::string key_text(const KeyDoc& k) {
  const std::string full = k.section.empty() ? k.key : k.section + "." + k.key;
  std::string out = full + "\n";
  if (!k.meaning.empty()) out += wrapped(k.meaning, 96, "    ");
  std::string type = "    " + k.type + (k.varies ? ", may vary in time" : "") + (k.required ? ", required" : "");
  if (!k.fallback.empty()) type += ", default " + k.fallback;
  out += type + "\n";
  if (!k.units.empty()) out += "    units: " + k.units + "\n";
  return out;
}

std::string section_text(const std::string& prefix) {
  std::string out;
  for (const KeyDoc& k : keys()) {
    const std::string full = k.section.empty() ? k.key : k.section + "." + k.key;
    if (full == prefix || full.rfind(prefix + ".", 0) == 0) out += key_text(k);
  }
  return out;
}

std::string gas_text(const GasEntry& g) {
  const Species& s = g.species;
  std::string out = fmt::format(
      "{} ({})\n  molar mass {:.6g} g/mol, published range {:.0f} to {:.0f} K\n  cp, h, s: {}\n", s.name,
      fmt::join(g.aliases, ", "), 1000.0 * s.molar_mass, s.lowest_temperature(), s.highest_temperature(), s.source);
  out += s.transport_source.empty() ? "  no viscosity or conductivity\n"
                                    : "  viscosity, conductivity: " + s.transport_source + "\n";
  return out;
}

std::string material_text(const Material& m) {
  std::string k;
  for (const auto& [t, value] : m.conductivity)
    k += fmt::format("{}{:.4g} W/m/K at {:.0f} degC", k.empty() ? "" : ", ", value, t - 273.15);
  return fmt::format(
      "{}\n  density {:.5g} kg/m3, specific heat {:.4g} J/kg/K, emissivity {:.2g}\n  conductivity {}\n  source: {}\n",
      m.name, m.density, m.specific_heat, m.emissivity, k, m.source);
}

std::string film_text(const FilmEntry& f) {
  return fmt::format("{} ({} faces)\n", f.name,
                     f.inside && f.outside ? "inner and outer" : (f.inside ? "inner" : "outer")) +
         wrapped(std::string(f.meaning), 96, "  ") + wrapped("range: " + std::string(f.range), 96, "  ") +
         wrapped("source: " + std::string(f.source), 96, "  ");
}

std::string unit_text(const UnitKind& k) {
  return fmt::format("{}: {}  (in records: {})\n", k.name, fmt::join(example_units(k), ", "), k.si);
}

std::string quantity_text() {
  std::string out = "Energy ledger (record: energy.TERM, J, and energy.TERM.PART)\n";
  std::vector<std::vector<std::string>> rows;
  for (int i = 0; i < ledger_term_count; ++i) rows.push_back({ledger_names[i], ledger_meanings[i]});
  out += table(rows) + "\nEntropy audit (record: entropy.MECHANISM, J/K)\n";
  rows.clear();
  for (int m = 0; m < mechanism_count; ++m) rows.push_back({mechanism_names[m], mechanism_meanings[m]});
  out += table(rows) + "\nChannels (record: PART.QUANTITY)\n";
  rows.clear();
  for (const Word& w : channel_words()) rows.push_back({w.name, w.units, w.meaning});
  return out + table(rows);
}

std::string overview() {
  std::vector<std::vector<std::string>> rows;
  std::set<std::string> seen;
  for (const KeyDoc& k : keys())
    if (k.section.empty() && seen.insert(k.key).second) rows.push_back({k.key, k.meaning});
  std::string text = "Sections and keys of a model file:\n" + table(rows);
  rows.clear();
  for (const Word& w : varying_words()) rows.push_back({w.name, w.meaning});
  return text + "\nWritten in place of a plain value or part:\n" + table(rows) +
         "\n'gaskettle explain SECTION' lists its keys; 'explain gases', 'materials', 'films', 'units',\n"
         "'quantities' list those with sources; 'explain KEY' finds a key anywhere.\n";
}

std::vector<std::string> all_words() {
  std::vector<std::string> words = {"gases", "materials", "films", "units", "quantities"};
  for (const KeyDoc& k : keys()) words.push_back(k.key);
  for (const std::string& g : gas_names()) words.push_back(g);
  for (const Material& m : material_catalogue()) words.push_back(m.name);
  for (const FilmEntry& f : film_catalogue()) words.emplace_back(f.name);
  for (const UnitKind& u : kinds()) words.push_back(u.name);
  for (const Word& w : channel_words()) words.emplace_back(w.name);
  for (const Word& w : varying_words()) words.emplace_back(w.name);
  for (const KeyDoc& k : keys()) words.push_back(k.section.substr(0, k.section.find('.')));
  for (const char* l : ledger_names) words.emplace_back(l);
  for (const char* m : mechanism_names) words.emplace_back(m);
  return words;
}
}  // namespace

std::string nearest_word(const std::string& word) { return nearest_name(word, all_words()); }

std::optional<std::string> explain(const std::string& word) {
  std::string out;
  if (word.empty()) return overview();
  if (word == "gases")
    for (const GasEntry& g : gas_catalogue()) out += gas_text(g);
  if (word == "materials")
    for (const Material& m : material_catalogue()) out += material_text(m);
  if (word == "films")
    for (const FilmEntry& f : film_catalogue()) out += film_text(f);
  if (word == "units")
    for (const UnitKind& u : kinds()) out += unit_text(u);
  if (word == "quantities") out += quantity_text();
  for (const GasEntry& g : gas_catalogue())
    if (g.species.name == word || std::find(g.aliases.begin(), g.aliases.end(), word) != g.aliases.end())
      out += gas_text(g);
  for (const Material& m : material_catalogue())
    if (m.name == word) out += material_text(m);
  for (const FilmEntry& f : film_catalogue())
    if (f.name == word) out += film_text(f);
  for (const UnitKind& u : kinds())
    if (u.name == word) out += unit_text(u);
  for (int i = 0; i < ledger_term_count; ++i)
    if (word == ledger_names[i]) out += fmt::format("energy.{}: {}\n", word, ledger_meanings[i]);
  for (int m = 0; m < mechanism_count; ++m)
    if (word == mechanism_names[m])
      out += fmt::format("entropy.{}: entropy generated by {}\n", word, mechanism_meanings[m]);
  for (const UnitKind& u : kinds()) {
    const std::vector<std::string> units = example_units(u);
    if (std::find(units.begin(), units.end(), word) != units.end() ||
        (u.flavour == UnitFlavour::pressure && is_plain_pressure_unit(word)))
      out += unit_text(u);
  }
  for (const Word& w : channel_words())
    if (word == w.name) out += fmt::format("PART.{}: {}  (in a record: {})\n", w.name, w.meaning, w.units);
  for (const Word& w : varying_words())
    if (word == w.name) out += fmt::format("{}: {}\n    {}\n", w.name, w.meaning, w.units);
  out += section_text(word);
  if (word.find('.') == std::string::npos)
    for (const KeyDoc& k : keys())
      if (k.key == word && !k.section.empty()) out += key_text(k);
  return out.empty() ? std::nullopt : std::optional<std::string>(out);
}

}  // namespace gaskettle
