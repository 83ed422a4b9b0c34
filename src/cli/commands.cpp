#include "cli/commands.h"

#include <fmt/format.h>
#include <fmt/ranges.h>

#include <cmath>
#include <fstream>
#include <iostream>
#include <sstream>

#include "cli/loading.h"
#include "cli/shipped_models.h"
#include "gas/catalogue.h"
#include "record/csv_export.h"
#include "report/gas_state.h"
#include "report/plant_facts.h"
#include "report/reference.h"

namespace gaskettle {

int command_check(const CheckArguments& arguments) {
  const std::unique_ptr<Loaded> loaded = load_plant(arguments.file, arguments.set);
  if (!loaded->plant) {
    std::cerr << loaded->problems.text();
    return exit_refused;
  }
  std::cout << (arguments.json ? facts_json(*loaded->plant, arguments.file)
                               : facts_text(*loaded->plant, arguments.file));
  return exit_done;
}

int command_new(const std::string& kind) {
  if (kind.empty()) {
    std::cout << "Models to start from; 'gaskettle new NAME > my_model.yaml' writes one:\n";
    for (const ShippedModel& m : shipped_models()) {
      const std::string text(m.text);
      const std::size_t title = text.find("title:");
      const std::string line =
          title == std::string::npos ? "" : text.substr(title + 7, text.find('\n', title) - title - 7);
      std::cout << fmt::format("  {:<18} {}\n", m.name, line);
    }
    return exit_done;
  }
  std::vector<std::string> names;
  for (const ShippedModel& m : shipped_models()) {
    if (m.name == kind) {
      std::cout << m.text;
      return exit_done;
    }
    names.emplace_back(m.name);
  }
  const std::string near = nearest_name(kind, names);
  std::cerr << fmt::format("error: there is no model '{}'{}; 'gaskettle new' lists them\n", kind,
                           near.empty() ? "" : "; did you mean '" + near + "'?");
  return exit_refused;
}

namespace {
double seconds_of(const std::string& text) { return text.empty() ? 0.0 : parse_quantity(text, unit_kinds::time).value; }

std::vector<std::string> split(const std::string& list) {
  std::vector<std::string> names;
  std::istringstream in(list);
  for (std::string name; std::getline(in, name, ',');)
    if (!name.empty()) names.push_back(name);
  return names;
}
}  // namespace

int command_export(const ExportArguments& arguments) {
  try {
    const double every = seconds_of(arguments.every);
    const RecordReader reader(arguments.record);
    if (arguments.output.empty()) {
      export_csv(reader, std::cout, split(arguments.channels), every);
      return exit_done;
    }
    std::ostringstream text;
    export_csv(reader, text, split(arguments.channels), every);
    std::ofstream out(arguments.output);
    out << text.str();
    if (!out) {
      std::cerr << "error: cannot write " << arguments.output << "\n";
      return exit_refused;
    }
    return exit_done;
  } catch (const std::runtime_error& e) {
    std::cerr << "error: " << e.what() << "\n";
    return exit_refused;
  }
}

namespace {
/// Density in kg/m3, from a mass or molar density.
double density_of(const std::string& text, const Species& species) {
  try {
    return parse_quantity(text, unit_kinds::density).value;
  } catch (const UnitError&) {
    return parse_quantity(text, unit_kinds::molar_density).value * species.molar_mass;
  }
}
}  // namespace

int command_gas(const GasArguments& arguments) {
  const auto species = find_gas(arguments.name);
  if (!species) {
    const std::string near = nearest_name(arguments.name, gas_names());
    std::cerr << fmt::format("error: there is no gas '{}'{}; 'gaskettle explain gases' lists them\n", arguments.name,
                             near.empty() ? "" : "; did you mean '" + near + "'?");
    return exit_refused;
  }
  try {
    const double temperature = parse_quantity(arguments.temperature, unit_kinds::temperature).value;
    if (!(temperature > 0.0)) throw UnitError("the temperature must be above absolute zero");
    double pressure = 0.0;
    if (!arguments.density.empty()) {
      const double density = density_of(arguments.density, *species);
      if (!(density > 0.0)) throw UnitError("the density must be above zero");
      pressure = density * species->gas_constant * temperature;
    } else {
      const Quantity q = parse_quantity(arguments.pressure, unit_kinds::pressure);
      pressure = q.value + (q.gauge ? 101325.0 : 0.0);
    }
    if (!(pressure > 0.0)) throw UnitError("the pressure must be above zero");
    const GasStateReport state = ideal_gas_state(*species, temperature, pressure);
    std::cout << (arguments.json ? gas_state_json(state) : gas_state_text(*species, state));
    return exit_done;
  } catch (const UnitError& e) {
    std::cerr << "error: " << e.what() << "\n";
    return exit_refused;
  }
}

int command_explain(const std::string& word) {
  if (const auto text = explain(word)) {
    std::cout << *text;
    return exit_done;
  }
  const std::string near = nearest_word(word);
  std::cerr << fmt::format(
      "error: nothing is known of '{}'{}\n", word,
      near.empty() ? "; 'gaskettle explain' gives the overview" : "; did you mean '" + near + "'?");
  return exit_refused;
}

}  // namespace gaskettle
