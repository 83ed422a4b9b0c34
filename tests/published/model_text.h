/// Pieces of model files for the checks that run whole plants.
#pragma once
#include <cstdio>
#include <initializer_list>
#include <stdexcept>
#include <string>
#include <utility>

#include "support/run_model.h"

namespace model_text {

/// Universal gas constant of the 2019 SI, J/(mol K): what the program turns a molar mass into R with.
inline constexpr double universal_gas_constant = 8.31446261815324;

inline std::string number(double x) {
  char text[32];
  std::snprintf(text, sizeof text, "%.17g", x);
  return text;
}

/// `text` with every $NAME replaced by its number, to all digits. Longer names first where one begins another.
inline std::string fill(std::string text, std::initializer_list<std::pair<const char*, double>> numbers) {
  for (const auto& [name, x] : numbers) {
    const std::string key = std::string("$") + name;
    for (std::size_t at = text.find(key); at != std::string::npos; at = text.find(key, at))
      text.replace(at, key.size(), number(x));
  }
  if (const std::size_t left = text.find('$'); left != std::string::npos)
    throw std::logic_error("no number for " + text.substr(left, 12));
  return text;
}

/// `text` with a placeholder word replaced wherever it stands.
inline std::string put(std::string text, const std::string& word, const std::string& by) {
  for (std::size_t at = text.find(word); at != std::string::npos; at = text.find(word, at + by.size()))
    text.replace(at, word.size(), by);
  return text;
}

/// The head of a model with one gas of constant cp, `book_gas`, that has the R and cp (J/kg/K) of a textbook.
inline std::string book_gas(double R, double cp) {
  return fill("gaskettle: 1\ngases:\n  book_gas: {molar_mass: $M kg/mol, cp: $cp J/kg/K}\n",
              {{"M", universal_gas_constant / R}, {"cp", cp}});
}

/// A body that holds the gas of `vessel` at the temperature it starts at: 1e11 W/K from gas to body and 1e15 J/K in it
/// leave 1e-8 K a kilowatt and 1e-9 K a megajoule.
inline constexpr const char* bath =
    "bodies: {bath: {in: vessel, mass: 1e9 kg, specific_heat: 1e6 J/kg/K, area: 100 m2, film: 1e9 W/m2/K}}\n";

/// When a target was reached, s; throws where there is no such target.
inline double reached(const gaskettle::testing::ModelRun& run, const std::string& target) {
  for (const gaskettle::Target& t : run.result.targets)
    if (t.name == target) return t.time;
  throw std::logic_error("no target " + target);
}

}  // namespace model_text
