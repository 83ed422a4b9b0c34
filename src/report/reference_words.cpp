#include "report/reference_words.h"

#include <algorithm>
#include <array>

namespace gaskettle {

const std::vector<Word>& channel_words() {
  static const std::vector<Word> words = {
      {"temperature", "of a gas, a wall's inner face, a body or an element", "K"},
      {"pressure", "of a gas, absolute", "Pa"},
      {"volume", "of a gas space", "m3"},
      {"mass", "of the gas in a space", "kg"},
      {"energy", "internal energy of the gas in a space; ideal gas at 298.15 K has h = 0", "J"},
      {"specific_entropy", "of a gas", "J kg-1 K-1"},
      {"density", "of a gas", "kg m-3"},
      {"mole_fraction", "PART.mole_fraction.GAS, of one gas in a space", "1"},
      {"position", "of a piston; grows with the space it closes", "m"},
      {"velocity", "of a piston", "m s-1"},
      {"outer_temperature", "of a wall's outer face", "K"},
      {"loss", "heat leaving a wall's outer face", "W"},
      {"profile", "temperature over the depth of a wall (a second dimension, PART.depth)", "K"},
      {"core_temperature", "of a body with a half_thickness", "K"},
      {"power", "electrical power of a heater; shaft power of a stirrer", "W"},
      {"torque", "of a stirrer's shaft", "N m"},
      {"speed", "of a stirrer's shaft", "rad s-1"},
      {"flow", "mass flow of a port (positive from 'from' to 'to') or relief device", "kg s-1"},
      {"opening", "of a port or relief device, 0 shut to 1 open", "1"},
      {"released", "mass that has left through a relief device", "kg"},
      {"reading", "of a sensor", "as what it reads"},
      {"output", "of a controller", "as what it drives"},
      {"setpoint", "of a controller", "as what it holds"},
      {"boundary_work", "energy.boundary_work: work done by the gas on its moving boundaries", "J"},
      {"stored", "energy.stored: gained by gas, walls, bodies and elements since the start", "J"},
      {"generated", "entropy.generated: entropy generated, all mechanisms", "J K-1"}};
  return words;
}

const std::vector<Word>& varying_words() {
  static const std::vector<Word> words = {
      {"schedule", "points in time, joined by straight lines or held; the end values hold outside",
       "{schedule: [[0 s, 20 degC], [60 s, 80 degC]], held: true, repeat: 3}   (held and repeat may be left out; "
       "repeat: forever)"},
      {"ramp", "from the start value (a setpoint: from what the controller reads) at a rate, then it stays",
       "{ramp: {to: 150 degC, at: 2 K/min}}"},
      {"sine", "about a mean; frequency in cycles a second",
       "{sine: {mean: 20 degC, amplitude: 5 K, frequency: 0.01 Hz}}"},
      {"csv", "a column of a file: not built yet", "{csv: {file: log.csv, column: T}}"},
      {"supply", "an end of a port: gas without end at a stated state, each of which may vary",
       "{supply: {gas: nitrogen, pressure: 16 bar abs, temperature: 15 degC}}"},
      {"atmosphere", "an end of a port or relief device: the surroundings, whose gas flows in", "to: atmosphere"}};
  return words;
}

bool is_plain_pressure_unit(const std::string& word) {
  static constexpr std::array units = {"bar", "mbar", "hPa", "kPa", "MPa", "Pa", "psi", "atm"};
  return std::find(units.begin(), units.end(), word) != units.end();
}

}  // namespace gaskettle
