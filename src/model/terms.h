/// The terms of the energy ledger and the mechanisms of the entropy audit.
#pragma once
#include <array>
#include <string>

namespace gaskettle {

/// Energy ledger, J, cumulative from 0 at the start:
///   heater + shaft + flux + enthalpy_in + returned
///     = enthalpy_out + wall_loss + boundary_work + stored
/// with boundary_work the sum of the terms from `lifting` on: work done BY the gas.
enum class LedgerTerm {
  heater,
  shaft,
  flux,
  enthalpy_in,
  returned,  // supplied
  enthalpy_out,
  wall_loss,  // carried away
  lifting,
  spring,
  atmosphere,
  back,
  applied,
  friction,
  kinetic,
  impact  // boundary work
};
inline constexpr int ledger_term_count = 15;
inline constexpr int first_work_term = static_cast<int>(LedgerTerm::lifting);
inline constexpr std::array<const char*, ledger_term_count> ledger_names = {
    "heater", "shaft",      "flux", "enthalpy_in", "returned", "enthalpy_out", "wall_loss", "lifting",
    "spring", "atmosphere", "back", "applied",     "friction", "kinetic",      "impact"};
inline constexpr std::array<const char*, ledger_term_count> ledger_meanings = {
    "electrical energy of heaters (negative: taken out by coolers)",
    "shaft work of stirrers",
    "absorbed by outer faces from sun, fire or jacket",
    "enthalpy carried in by feeds (ideal gas at 298.15 K counts as 0)",
    "friction heat that stays in gas or wall",
    "enthalpy carried out by vents and relief devices (ideal gas at 298.15 K counts as 0)",
    "heat lost from outer faces to what they see (negative: taken up)",
    "work done lifting pistons and the loads on them",
    "work done on springs",
    "work done pushing back the atmosphere",
    "work done against stated back pressures",
    "work done against applied forces and drives",
    "work done against piston friction",
    "kinetic energy given to pistons and loads",
    "kinetic energy lost at stops and in arriving loads"};

/// +1 for terms on the supply side, -1 for the others.
inline int ledger_sign(LedgerTerm term) {
  return static_cast<int>(term) <= static_cast<int>(LedgerTerm::returned) ? 1 : -1;
}

/// What generates entropy.
enum class Mechanism {
  film,
  conduction,
  radiation,
  heater,
  stirrer,
  flux,
  friction,
  impact,
  sudden,
  throttling,
  mixing
};
inline constexpr int mechanism_count = 11;
inline constexpr std::array<const char*, mechanism_count> mechanism_names = {
    "film",     "conduction", "radiation", "heater",     "stirrer", "flux",
    "friction", "impact",     "sudden",    "throttling", "mixing"};
inline constexpr std::array<const char*, mechanism_count> mechanism_meanings = {
    "heat crossing films between gas, walls, bodies and surroundings",
    "heat conducted in walls and bodies",
    "heat radiated between surfaces",
    "electrical power turned into heat",
    "shaft power turned into heat",
    "sun, fire or jacket heat absorbed",
    "piston friction",
    "impact at stops and of arriving loads",
    "sudden load changes and slips of balanced pistons",
    "throttling in ports and relief devices",
    "mixing of gas of another temperature or kind"};

}  // namespace gaskettle
