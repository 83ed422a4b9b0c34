// Each command as a user types it.
#include <algorithm>
#include <catch2/catch.hpp>
#include <cmath>
#include <sstream>

#include "record/record_reader.h"
#include "system/program.h"

using namespace gaskettle;
using namespace gaskettle::testing;

namespace {
const std::string ram = shipped("models/stirred_ram.yaml");

std::vector<std::string> lines(const std::string& text) {
  std::vector<std::string> list;
  std::istringstream in(text);
  for (std::string line; std::getline(in, line);) list.push_back(line);
  return list;
}
std::vector<std::string> fields(const std::string& line) {
  std::vector<std::string> list;
  std::istringstream in(line);
  for (std::string field; std::getline(in, field, ',');) list.push_back(field);
  return list;
}
std::string out_of(const std::vector<std::string>& arguments) {
  const Folder folder;
  const Ran ran = gaskettle_in(folder, arguments);
  CAPTURE(arguments, ran.err);
  CHECK(ran.status == 0);
  CHECK(ran.err.empty());
  CHECK(folder.files().empty());
  return ran.out;
}
}  // namespace

// ---- help ----

TEST_CASE("help of the program and of each command goes to standard output", "[commands]") {
  const std::string help = out_of({"--help"});
  for (const std::string command : {"run", "check", "new", "export", "gas", "explain"}) {
    CAPTURE(command);
    CHECK(contains(help, command));
    const std::string own = out_of({command, "--help"});
    CHECK(contains(own, "--help"));
  }
  CHECK(contains(help, "Exit status"));
  CHECK(contains(out_of({"run", "--help"}), "--set"));
  CHECK(contains(out_of({"run", "--help"}), "--overwrite"));
  CHECK(contains(out_of({"export", "--help"}), "--channels"));
  CHECK(contains(out_of({"gas", "--help"}), "--density"));
  CHECK(contains(out_of({"--version"}), "."));
}

// ---- run ----

TEST_CASE("run prints its answer in the order it promises, and nothing else", "[commands]") {
  const Folder folder;
  const Ran ran = gaskettle_in(folder, {"run", shipped("models/bakeout_chamber.yaml")});
  CHECK(ran.status == 0);
  CHECK(ran.err.empty());  // no progress line on a file or pipe
  CHECK_FALSE(contains(ran.out, "\r"));
  CHECK_FALSE(contains(ran.out, "\x1b"));
  std::size_t last = 0;
  for (const std::string heading :
       {"CAUTION", "limits were kept", "\nTargets\n", "\nLimits\n", "\nRelief devices\n", "\nGas models\n", "\nEvents",
        "\nWhere the energy went\n", "\nWhere the effort was lost", "\nBookkeeping", "\nRecord: "}) {
    CAPTURE(heading);
    const std::size_t here = ran.out.find(heading);
    REQUIRE(here != std::string::npos);
    CHECK(here >= last);
    last = here;
  }
  CHECK(contains(ran.out, "not a design approval"));
  CHECK(contains(ran.out, "Not a relief sizing under ISO 4126 or API 520"));
  CHECK(contains(ran.out, "Gas may be discharged"));
  CHECK(folder.files() == std::vector<std::string>{"bakeout_chamber.h5"});
}

TEST_CASE("cautions appear where they apply", "[commands]") {
  const Folder folder;
  const auto cautions = [&](const std::string& model) {
    write_text(folder / "m.yaml", model);
    const Ran ran = gaskettle_in(folder, {"run", "m.yaml", "--overwrite"}),
              checked = gaskettle_in(folder, {"check", "m.yaml"});
    CHECK(ran.status == 0);
    CHECK(checked.status == 0);
    const auto of = [](const std::string& text) { return text.substr(0, text.find("\n\n")); };
    CHECK(of(ran.out) == of(checked.out));
    return of(ran.out);
  };
  const std::string head = "gaskettle: 1\ntitle: t\n", run = "run: {until: 10 s}\n";
  const std::string plain = cautions(
      head + "gas_spaces: {can: {volume: 1 l, gas: nitrogen, temperature: 20 degC, pressure: 2 bar abs}}\n" + run);
  CHECK(contains(plain, "No limit was checked"));
  CHECK_FALSE(contains(plain, "xygen"));
  CHECK_FALSE(contains(plain, "discharged"));
  CHECK_FALSE(contains(plain, "ISO 4126"));
  const std::string rich =
      cautions(head +
               "gas_spaces: {can: {volume: 1 l, gas: {oxygen: 0.24, nitrogen: 0.76}, temperature: 20 degC, pressure: 2 "
               "bar abs}}\n"
               "ports: {vent: {from: can, to: atmosphere, orifice: {bore: 1 mm, discharge_coefficient: 0.8}}}\n"
               "limits: {high: {of: can.pressure, below: 3 bar abs}}\n" +
               run);
  CHECK(contains(rich, "Oxygen above 23.5 %"));
  CHECK(contains(rich, "discharged"));
  CHECK_FALSE(contains(rich, "No limit was checked"));
  const Ran fire = gaskettle_in(folder, {"check", shipped("models/blocked_in_bottle.yaml")});
  CHECK(contains(fire.out, "In fire the wall may lose strength"));
}

TEST_CASE("run writes where it is told, replaces its own records, and nothing else", "[commands]") {
  const Folder folder;
  CHECK(gaskettle_in(folder, {"run", ram}).status == 0);
  CHECK(folder.files() == std::vector<std::string>{"stirred_ram.h5"});
  CHECK(gaskettle_in(folder, {"run", ram}).status == 0);  // the same model and settings
  const std::string before = file_text(folder / "stirred_ram.h5");
  const Ran other = gaskettle_in(folder, {"run", ram, "--set", "pistons.ram.mass=500 kg"});
  CHECK(other.status == 2);
  CHECK(contains(other.err, "--overwrite"));
  CHECK(other.out.empty());
  CHECK(file_text(folder / "stirred_ram.h5") == before);
  CHECK(gaskettle_in(folder, {"run", ram, "--set", "pistons.ram.mass=500 kg", "--overwrite"}).status == 0);
  CHECK(file_text(folder / "stirred_ram.h5") != before);

  write_text(folder / "notes.txt", "not a record");
  const Ran notes = gaskettle_in(folder, {"run", ram, "-o", "notes.txt"});
  CHECK(notes.status == 2);
  CHECK(file_text(folder / "notes.txt") == "not a record");
  CHECK(gaskettle_in(folder, {"run", ram, "-o", "notes.txt", "--overwrite"}).status == 0);

  std::filesystem::create_directory(folder / "sub");
  CHECK(gaskettle_in(folder, {"run", ram, "-o", "sub/here.h5"}).status == 0);
  CHECK(std::filesystem::exists(folder / "sub/here.h5"));
  CHECK(gaskettle_in(folder, {"run", ram, "-o", "sub"}).status == 2);
  // A model is never replaced by its record.
  write_text(folder / "mine.yaml", file_text(ram));
  CHECK(gaskettle_in(folder, {"run", "mine.yaml", "-o", "mine.yaml"}).status == 2);
  CHECK(file_text(folder / "mine.yaml") == file_text(ram));
}

TEST_CASE("run finds a configuration's model from any folder", "[commands]") {
  const Folder folder;
  for (const std::string& where : {folder.path(), std::string("/"), shipped("configs")}) {
    CAPTURE(where);
    const Ran ran =
        gaskettle_in(where, {"run", shipped("configs/heavy_load.yaml"), "-o", folder / "heavy.h5", "--overwrite"});
    CHECK(ran.status == 0);
  }
  const Ran relative = gaskettle_in(shipped("configs"), {"run", "heavy_load.yaml", "-o", folder / "heavy.h5"});
  CAPTURE(relative.err);
  CHECK(relative.status == 0);
}

TEST_CASE("settings of the command line go over those of the file", "[commands]") {
  // The stroke time is proportional to 1 / torque: everything else the same.
  const Folder folder;
  const auto time = [&](std::vector<std::string> more) {
    std::vector<std::string> arguments = {"run", ram, "--json", "--overwrite"};
    arguments.insert(arguments.end(), more.begin(), more.end());
    const Ran ran = gaskettle_in(folder, arguments);
    CAPTURE(ran.err);
    REQUIRE(ran.status == 0);
    return ran.json()["targets"][0]["time"].get<double>();
  };
  const double once = time({});
  CHECK(time({"--set", "stirrers.mixer.torque=2.4 N m"}) == Approx(once / 2).epsilon(1e-6));
  CHECK(time({"--set", "stirrers.mixer.torque=9 N m", "--set", "stirrers.mixer.torque=2.4 N m"}) ==
        Approx(once / 2).epsilon(1e-6));
}

// ---- check ----

TEST_CASE("check says what the plant is and writes nothing", "[commands]") {
  const std::string text = out_of({"check", shipped("models/bakeout_chamber.yaml")});
  for (const std::string part : {"gas mass", "p V", "stored energy", "heat capacity", "Biot number", "conduction nodes",
                                 "Time constants", "Defaults in use", "not a design approval"}) {
    CAPTURE(part);
    CHECK(contains(text, part));
  }
  const Json facts = Json::parse(out_of({"check", shipped("models/bakeout_chamber.yaml"), "--json"}));
  CHECK(facts.is_object());
  CHECK_FALSE(facts["cautions"].empty());
  // m = p V / (R T) of nitrogen, by hand: 901300 Pa * 0.50894 m3 / (296.80 J/kg/K * 293.15 K) = 5.272 kg.
  CHECK(contains(text, "5.272 kg"));
}

TEST_CASE("check and run refuse the same input with the same words", "[commands]") {
  const Folder folder;
  write_text(folder / "bad.yaml",
             "gaskettle: 1\ntitle: t\ngas_spaces: {can: {volume: 1 m, gas: nitrogn, temperature: 20, pressure: 14 "
             "bar}}\nrun: {until: 1 s}\n");
  const Ran run = gaskettle_in(folder, {"run", "bad.yaml"}), check = gaskettle_in(folder, {"check", "bad.yaml"});
  CHECK(run.status == 2);
  CHECK(check.status == 2);
  CHECK(run.err == check.err);
  CHECK(lines(run.err).size() == 4);
  for (const std::string& line : lines(run.err)) CHECK(line.rfind("bad.yaml:3:", 0) == 0);
  CHECK(contains(run.err, "nitrogen"));
  CHECK(contains(run.err, "14 bar abs"));
  CHECK(contains(run.err, "14 bar gauge"));
}

// ---- new ----

TEST_CASE("new lists the shipped models and prints them byte for byte", "[commands]") {
  const std::string list = out_of({"new"});
  int count = 0;
  for (const auto& entry : std::filesystem::directory_iterator(shipped("models"))) {
    const std::string name = entry.path().stem().string();
    CAPTURE(name);
    CHECK(contains(list, name));
    CHECK(out_of({"new", name}) == file_text(entry.path().string()));
    ++count;
  }
  CHECK(count >= 6);
  const Folder folder;
  write_text(folder / "mine.yaml", out_of({"new", "stirred_ram"}));
  CHECK(gaskettle_in(folder, {"run", "mine.yaml"}).status == 0);
  const Ran wrong = gaskettle_in(folder, {"new", "stired_ram"});
  CHECK(wrong.status == 2);
  CHECK(contains(wrong.err, "stirred_ram"));
}

// ---- export ----

TEST_CASE("export prints columns with units, chosen channels, and even steps", "[commands]") {
  const Folder folder;
  REQUIRE(gaskettle_in(folder, {"run", ram}).status == 0);
  const RecordReader record(folder / "stirred_ram.h5");
  const Ran all = gaskettle_in(folder, {"export", "stirred_ram.h5"});
  REQUIRE(all.status == 0);
  CHECK(all.err.empty());
  const std::vector<std::string> rows = lines(all.out);
  CHECK(rows.size() == record.rows() + 1);
  CHECK(fields(rows[0]).size() == record.channel_names().size() + 1);
  CHECK(fields(rows[0])[0] == "time [s]");
  CHECK(contains(rows[0], "cylinder.temperature [K]"));
  CHECK(contains(rows[0], "mixer.speed [rad s-1]"));

  const Ran two = gaskettle_in(
      folder, {"export", "stirred_ram.h5", "--channels", "ram.position,cylinder.pressure", "--every", "10 s"});
  REQUIRE(two.status == 0);
  const std::vector<std::string> few = lines(two.out);
  CHECK(few[0] == "time [s],ram.position [m],cylinder.pressure [Pa]");
  REQUIRE(few.size() == 7);  // 0 to 50 s of a run of 57.1 s
  const std::vector<double> t = record.time(), x = record.channel("ram.position");
  for (std::size_t i = 1; i < few.size(); ++i) {
    const double time = std::stod(fields(few[i])[0]);
    CHECK(time == 10.0 * static_cast<double>(i - 1));
    const auto row = static_cast<std::size_t>(std::lower_bound(t.begin(), t.end(), time) - t.begin());
    REQUIRE(t[row] == time);  // a regular row of the record, printed with all its digits
    CHECK(std::stod(fields(few[i])[1]) == x[row]);
  }

  const Ran wrong = gaskettle_in(folder, {"export", "stirred_ram.h5", "--channels", "ram.postion"});
  CHECK(wrong.status == 2);
  CHECK(contains(wrong.err, "ram.position"));
  CHECK(wrong.out.empty());
  CHECK(gaskettle_in(folder, {"export", "stirred_ram.h5", "--every", "10"}).status == 2);
  CHECK(gaskettle_in(folder, {"export", "stirred_ram.h5", "--every", "-1 s"}).status == 2);
  CHECK(gaskettle_in(folder, {"export", ram}).status == 2);  // not a record
  CHECK(gaskettle_in(folder, {"export", "stirred_ram.h5", "-o", "out.csv"}).status == 0);
  CHECK(file_text(folder / "out.csv") == all.out);
  CHECK(gaskettle_in(folder, {"export", "stirred_ram.h5", "-o", "no/out.csv"}).status == 2);
}

// ---- gas ----

TEST_CASE("gas prints nitrogen at 300 K as it is published", "[commands]") {
  const Json gas =
      Json::parse(out_of({"gas", "nitrogen", "--temperature", "300 K", "--pressure", "1 bar abs", "--json"}));
  const Json ideal = gas.at("ideal");
  const auto value = [&](const char* key) { return ideal.at(key).get<double>(); };
  const double M = 0.0280134;
  CHECK(value("temperature") == 300.0);
  CHECK(value("pressure") == Approx(1e5).epsilon(1e-14));
  CHECK(value("molar_mass") == Approx(M).epsilon(1e-9));
  // M. W. Chase, NIST-JANAF Thermochemical Tables, 4th ed. 1998, N2 (N-023), at 300 K: cp 29.125 and S 191.789 J/K/mol,
  // H - H(298.15) 0.054 kJ/mol; printed to the last digit, the energy zero being h = 0 at 298.15 K in both.
  CHECK(value("cp") * M == Approx(29.125).margin(0.003));
  CHECK(value("entropy") * M == Approx(191.789).margin(0.005));
  CHECK(value("enthalpy") * M == Approx(54.0).margin(0.6));
  // Ideal gas relations with R = 8.314462618 J/mol/K (CODATA 2018): to the digits of the data file's own R (8.314510).
  const double R = 8.314462618 / M;
  CHECK(value("density") == Approx(1e5 / (R * 300.0)).epsilon(1e-5));
  CHECK(value("cp") - value("cv") == Approx(R).epsilon(1e-5));
  CHECK(value("energy") == Approx(value("enthalpy") - R * 300.0).epsilon(1e-5));
  CHECK(value("sound_speed") == Approx(std::sqrt(value("cp") / value("cv") * R * 300.0)).epsilon(1e-5));
  CHECK(value("joule_thomson") == 0.0);
  // E. W. Lemmon and R. T. Jacobsen, Int. J. Thermophys. 25 (2004) 21, table 5, dilute nitrogen at 300 K: 17.8771 uPa s
  // and 25.9361 mW/m/K, both to 2 %.
  CHECK(value("viscosity") == Approx(17.8771e-6).epsilon(0.02));
  CHECK(value("conductivity") == Approx(25.9361e-3).epsilon(0.02));

  const std::string text = out_of({"gas", "nitrogen", "--temperature", "300 K", "--pressure", "1 bar abs"});
  for (const auto& [key, ignored] : ideal.items()) {
    CAPTURE(key);
    CHECK(contains(text, key));
  }
}

TEST_CASE("gas takes a density by mass or mole, formulas, and other units", "[commands]") {
  const auto ideal = [](const std::vector<std::string>& how) {
    std::vector<std::string> arguments = {"gas", "N2", "--json"};
    arguments.insert(arguments.end(), how.begin(), how.end());
    return Json::parse(out_of(arguments)).at("ideal");
  };
  const Json p = ideal({"--temperature", "300 K", "--pressure", "1 bar abs"});
  const auto pressure = [](const Json& j) { return j.at("pressure").get<double>(); };
  // p = rho R T, R = 296.803 J/kg/K
  CHECK(pressure(ideal({"--temperature", "300 K", "--density", "11 kg/m3"})) ==
        Approx(11.0 * 296.803 * 300.0).epsilon(1e-5));
  CHECK(pressure(ideal({"--temperature", "300 K", "--density", "400 mol/m3"})) ==
        Approx(400.0 * 8.314463 * 300.0).epsilon(1e-5));
  CHECK(pressure(ideal({"--temperature", "26.85 degC", "--pressure", "0 bar gauge"})) ==
        Approx(101325.0).epsilon(1e-12));
  CHECK(ideal({"--temperature", "26.85 degC", "--pressure", "1000 mbar abs"})["cp"].get<double>() ==
        Approx(p["cp"].get<double>()).epsilon(1e-12));
  const Folder folder;
  const Ran wrong = gaskettle_in(folder, {"gas", "nitrogn", "--temperature", "300 K", "--pressure", "1 bar abs"});
  CHECK(wrong.status == 2);
  CHECK(contains(wrong.err, "nitrogen"));
}

// ---- explain ----

TEST_CASE("explain knows every section and key", "[commands][explain]") {
  // The keys of the model format; those of a section that are its own maps are written with a dot.
  const std::vector<std::pair<std::string, std::vector<std::string>>> keys = {
      {"", {"gaskettle", "title", "notes", "gas_model", "gases", "materials", "run"}},
      {"surroundings", {"temperature", "pressure", "gravity", "wind", "gas"}},
      {"gases", {"molar_mass", "cp", "viscosity", "conductivity"}},
      {"materials", {"density", "specific_heat", "conductivity", "emissivity"}},
      {"gas_spaces",
       {"volume", "shape", "cylinder", "bore", "length", "ends", "axis", "sphere", "gas", "temperature", "pressure",
        "mass", "count"}},
      {"walls",
       {"around", "area", "layers", "material", "thickness", "contact", "bridges", "temperature", "inside", "outside",
        "film", "emissivity", "flux", "to", "space"}},
      {"bodies",
       {"in", "mass", "material", "specific_heat", "area", "film", "emissivity", "half_thickness", "count",
        "temperature"}},
      {"heaters",
       {"in", "wall", "after_layer", "body", "rating", "power", "heat_capacity", "conductance", "area", "emissivity",
        "temperature"}},
      {"stirrers", {"in", "power", "torque", "speed", "power_number", "diameter"}},
      {"pistons", {"closes",      "bore",      "area",     "at",        "mass",
                   "motion",      "velocity",  "position", "flow",      "stops",
                   "restitution", "tilt",      "spring",   "stiffness", "free_at",
                   "friction",    "breakaway", "kinetic",  "viscous",   "stribeck_velocity",
                   "heat_to",     "force",     "back",     "pressure",  "space"}},
      {"ports",
       {"from", "to", "orifice", "bore", "area", "discharge_coefficient", "flow", "iso6358", "C", "b", "iec60534",
        "opening", "one_way"}},
      {"relief_devices",
       {"protects", "to", "flow_area", "discharge_coefficient", "set", "reseat", "blowdown", "action", "full_lift_at",
        "balanced", "burst"}},
      {"sensors", {"reads", "time_constant", "offset", "range", "resolution"}},
      {"controllers",
       {"drives", "holds", "at", "action", "by", "on_off", "dead_band", "pi", "gain", "reset_time", "pid"}},
      {"targets", {"when", "reaches", "direction", "after", "settles_within", "of", "for"}},
      {"limits", {"of", "minus", "rate_of", "below", "above", "design", "accumulation"}},
      {"run", {"until", "record_every", "rtol", "method", "stop_when"}},
  };
  const std::string overview = out_of({"explain"});
  for (const auto& [section, list] : keys) {
    const std::string of_section = section.empty() ? overview : out_of({"explain", section});
    CAPTURE(section);
    if (!section.empty()) CHECK(contains(overview, "\n  " + section + " "));
    for (const std::string& key : list) {
      CAPTURE(key);
      // Its own entry, the last word of a dotted line; in the overview the first word of an indented one.
      const bool listed =
          section.empty() ? contains(of_section, "\n  " + key + " ") : contains(of_section, "." + key + "\n");
      CHECK(listed);
      CHECK_FALSE(out_of({"explain", key}).empty());
    }
  }
}

TEST_CASE("explain knows every gas, material, film, unit and quantity", "[commands][explain]") {
  for (const std::string gas :
       {"nitrogen", "oxygen", "argon", "helium", "hydrogen", "carbon_dioxide", "methane", "air", "water", "N2"}) {
    CAPTURE(gas);
    CHECK(contains(out_of({"explain", gas}), "g/mol"));
  }
  for (const std::string material : {"carbon_steel", "stainless_steel", "aluminium", "copper", "brass", "mineral_wool",
                                     "glass_wool", "calcium_silicate"}) {
    CAPTURE(material);
    CHECK(contains(out_of({"explain", material}), "source:"));
  }
  for (const std::string film : {"still_air", "wind", "enclosed", "stirred"}) {
    CAPTURE(film);
    CHECK(contains(out_of({"explain", film}), "source:"));
  }
  for (const std::string unit :
       {"pressure", "temperature", "speed of rotation", "gas flow", "film coefficient", "length"}) {
    CAPTURE(unit);
    CHECK(contains(out_of({"explain", unit}), "in records:"));
  }
  for (const std::string quantity :
       {"wall_loss", "boundary_work", "stored", "lifting", "throttling", "mixing", "sudden"}) {
    CAPTURE(quantity);
    CHECK_FALSE(out_of({"explain", quantity}).empty());
  }
  for (const std::string list : {"gases", "materials", "films", "units", "quantities"})
    CHECK(lines(out_of({"explain", list})).size() > 5);
  // Words a reader of a model or record looks up: a unit as it is written, a channel by its quantity.
  for (const std::string word : {"bar", "rpm", "W/m2/K", "degC", "mole_fraction", "specific_entropy",
                                 "outer_temperature", "profile", "schedule", "ramp", "sine", "supply"}) {
    const Folder folder;
    CAPTURE(word);
    CHECK(gaskettle_in(folder, {"explain", word}).status == 0);
  }
}

TEST_CASE("explain suggests the nearest word", "[commands][explain]") {
  const Folder folder;
  for (const auto& [wrong, right] :
       std::vector<std::pair<std::string, std::string>>{{"nitrogne", "nitrogen"},
                                                        {"heatres", "heaters"},
                                                        {"stired", "stirred"},
                                                        {"relief_device", "relief_devices"},
                                                        {"carbon_stel", "carbon_steel"}}) {
    const Ran ran = gaskettle_in(folder, {"explain", wrong});
    CAPTURE(wrong, ran.err);
    CHECK(ran.status == 2);
    CHECK(ran.out.empty());
    CHECK(contains(ran.err, right));
  }
}
