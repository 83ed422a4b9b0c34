// The record of a real run as its readers see it: notebooks, netCDF and HDF5 tools, and our own reader.
#include <catch2/catch.hpp>
#include <cmath>
#include <limits>

#include "record/record_reader.h"
#include "system/program.h"

using namespace gaskettle;
using namespace gaskettle::testing;

namespace {
// Small, but with a part of every kind, two gases, and events of several kinds.
const std::string everything = R"(gaskettle: 1
title: a part of every kind
gas_spaces:
  chamber: {volume: 200 l, gas: {nitrogen: 0.9, argon: 0.1}, temperature: 20 degC, pressure: 2 bar abs}
  cushion: {volume: 5 l, gas: nitrogen, temperature: 20 degC, pressure: 1.2 bar abs}
walls:
  shell:
    around: chamber
    area: 2 m2
    layers: [{material: carbon_steel, thickness: 5 mm}, {material: mineral_wool, thickness: 30 mm}]
    inside: {film: 20 W/m2/K, emissivity: 0.8}
    outside: {film: still_air, emissivity: 0.9}
bodies: {rack: {in: chamber, material: aluminium, mass: 5 kg, area: 0.5 m2, film: 20 W/m2/K}}
heaters: {element: {in: chamber, rating: 2 kW, heat_capacity: 1 kJ/K, conductance: 20 W/K, area: 0.1 m2, emissivity: 0.8}}
stirrers: {fan: {in: chamber, power_number: 0.4, diameter: 200 mm, speed: 1200 rpm}}
pistons: {ram: {closes: cushion, bore: 100 mm, at: 300 mm, mass: 20 kg, motion: inertial, stops: [100 mm, 500 mm], friction: {breakaway: 20 N, kinetic: 15 N}}}
ports:
  fill: {from: {supply: {gas: nitrogen, pressure: 6 bar abs, temperature: 15 degC}}, to: chamber, orifice: {bore: 3 mm, discharge_coefficient: 0.8}, opening: {schedule: [[0 s, 0], [5 s, 1]]}}
relief_devices:
  valve: {protects: chamber, set: 3 bar gauge, reseat: 2.6 bar gauge, flow_area: 60 mm2, discharge_coefficient: 0.8, action: pop}
sensors: {probe: {reads: chamber.temperature, time_constant: 4 s}}
controllers: {heat: {drives: element.power, holds: probe, at: 42 degC, by: {on_off: {dead_band: 2 K}}}}
targets:
  warm: {when: chamber.temperature, reaches: 40 degC}
  far: {when: chamber.temperature, reaches: 400 degC}
limits:
  high: {of: chamber.pressure, below: 10 bar abs}
  low: {of: chamber.temperature, below: 30 degC}
run: {until: 2 min, record_every: 0.5 s}
)";

struct Recorded {
  Folder folder;
  Json answer;
  std::string path;
  Recorded() : path(folder / "everything.h5") {
    write_text(folder / "everything.yaml", everything);
    const Ran ran = gaskettle_in(folder, {"run", "everything.yaml", "--json", "--set", "bodies.rack.mass=6 kg"});
    INFO(ran.err);
    REQUIRE(ran.status == 3);
    answer = ran.json();
  }
};

/// One run serves all that only look at it.
const Recorded& recorded() {
  static const Recorded run;
  return run;
}

bool has(const std::vector<std::string>& command) {
  const Folder folder;
  if (run_command(command, folder.path()).status == 0) return true;
  WARN("not checked, for want of: " << command[0] << " " << command.back());
  return false;
}

Ran python(const std::string& text) {
  const Folder folder;
  return run_command({"/usr/bin/python3", "-W", "error", "-c", text}, folder.path());
}
}  // namespace

TEST_CASE("a record opens in one line in a notebook, with every fixed name", "[record]") {
  if (!has({"/usr/bin/python3", "-c", "import xarray, h5netcdf"})) return;
  const Ran ran = python("import xarray, numpy as np\npath = '" + recorded().path + R"('
ds = xarray.open_dataset(path, engine="h5netcdf")
names = '''chamber.temperature chamber.pressure chamber.volume chamber.mass chamber.energy chamber.specific_entropy
chamber.density chamber.mole_fraction.nitrogen chamber.mole_fraction.argon cushion.temperature cushion.pressure
ram.position ram.velocity shell.temperature shell.outer_temperature shell.loss shell.profile rack.temperature
element.temperature element.power fan.power fan.torque fan.speed fill.flow fill.opening valve.flow valve.opening
probe.reading heat.output heat.setpoint
energy.shaft energy.heater energy.flux energy.enthalpy_in energy.returned energy.enthalpy_out energy.wall_loss
energy.boundary_work energy.lifting energy.spring energy.atmosphere energy.back energy.applied energy.friction
energy.kinetic energy.impact energy.stored energy.heater.element energy.shaft.fan energy.wall_loss.shell
energy.enthalpy_in.fill energy.enthalpy_out.valve energy.lifting.ram energy.friction.ram
mass.in.nitrogen mass.out.nitrogen mass.in.argon mass.out.argon
entropy.film entropy.conduction entropy.radiation entropy.heater entropy.stirrer entropy.friction entropy.impact
entropy.sudden entropy.throttling entropy.mixing entropy.generated'''.split()
missing = [n for n in names if n not in ds]
assert not missing, missing
units = {'chamber.temperature': 'K', 'chamber.pressure': 'Pa', 'chamber.volume': 'm3', 'chamber.mass': 'kg',
         'chamber.energy': 'J', 'ram.position': 'm', 'ram.velocity': 'm s-1', 'shell.loss': 'W', 'fan.torque': 'N m',
         'fan.speed': 'rad s-1', 'fill.flow': 'kg s-1', 'valve.opening': '1', 'energy.heater': 'J', 'entropy.film': 'J K-1',
         'mass.in.nitrogen': 'kg', 'chamber.density': 'kg m-3', 'chamber.mole_fraction.argon': '1', 'heat.output': 'W'}
for n, u in units.items():
    assert ds[n].attrs['units'] == u, (n, ds[n].attrs)
for n in ds.data_vars:
    assert ds[n].dims[0] == 'time' and ds[n].dtype == np.float64 and ds[n].attrs['long_name'], n
    assert np.isfinite(ds[n].values).all(), n
assert ds['shell.profile'].ndim == 2 and ds['shell.profile'].dims[1] == 'shell.depth'
t = ds.time.values
assert ds.time.attrs['units'] == 's' and t.dtype == np.float64 and t[0] == 0 and t[-1] == 120
assert (np.diff(t) > 0).all()
# Looking up and interpolating by time work, and every regular row is there.
assert np.allclose(ds.sel(time=np.arange(241) * 0.5).time, np.arange(241) * 0.5, rtol=0, atol=0)
g = ds['chamber.temperature']
assert abs(np.interp(60.25, t, g.values) - 0.5 * float(g.sel(time=60.0) + g.sel(time=60.5))) < 1e-9
# The ledger in the columns themselves, row by row.
e = {n: ds['energy.' + n].values for n in 'heater shaft flux enthalpy_in returned enthalpy_out wall_loss boundary_work stored'.split()}
residual = e['heater'] + e['shaft'] + e['flux'] + e['enthalpy_in'] + e['returned'] - e['enthalpy_out'] - e['wall_loss'] - e['boundary_work'] - e['stored']
assert abs(residual).max() < 1e-10 * abs(e['heater']).max(), abs(residual).max()
parts = sum(ds['energy.' + n].values for n in 'lifting spring atmosphere back applied friction kinetic impact'.split())
assert np.allclose(parts, e['boundary_work'], rtol=1e-12, atol=1e-9)
# The profile ends where the faces' own channels stand.
assert np.array_equal(ds['shell.profile'].values[:, 0], ds['shell.temperature'].values)
assert np.array_equal(ds['shell.profile'].values[:, -1], ds['shell.outer_temperature'].values)
)");
  INFO(ran.out << ran.err);
  CHECK(ran.status == 0);
}

TEST_CASE("groups of a record hold events, outcome and provenance", "[record]") {
  if (!has({"/usr/bin/python3", "-c", "import xarray, h5netcdf"})) return;
  const Ran ran = python("import xarray, numpy as np\npath = '" + recorded().path + R"('
def group(name): return xarray.open_dataset(path, engine="h5netcdf", group=name)
e = group("/events")
assert set('time part what before after'.split()) <= set(e.variables) and e.sizes['event'] > 3
assert e.time.attrs['units'] == 's' and (np.diff(e.time.values) >= 0).all()
assert {'valve', 'heat', 'warm', 'low'} <= set(e.part.values.tolist()), set(e.part.values.tolist())
t = group("/outcome/targets")
assert t.name.values.tolist() == ['warm', 'far'] and np.isnan(t.time.values[1]) and t.time.values[0] > 0
l = group("/outcome/limits")
assert l.name.values.tolist() == ['high', 'low']
assert np.isnan(l.crossed_time.values[0]) and l.crossed_time.values[1] > 0
assert l.margin.values[0] > 0 > l.margin.values[1] and l.extreme.values[1] > 303.15
o = group("/outcome").attrs
assert o['partial'] == 0 and o['ended'] == 'end time' and o['closure_energy'] <= 1e-10 and o['closure_mass'] <= 1e-10
assert o['steps'] > 0 and 'rejected' in o and 'rate_calls' in o and 'jacobians' in o
p = group("/provenance")
a = dict(p.attrs)
assert 'a part of every kind' in str(p.model_text.item())
assert 'bodies.rack.mass=6 kg' in a['overrides'], a['overrides']
for key in 'program_version source_revision build gas_data_version rtol started cautions'.split(): assert a[key], key
)");
  INFO(ran.out << ran.err);
  CHECK(ran.status == 0);
}

TEST_CASE("netCDF and HDF5 tools list a record", "[record]") {
  const Folder folder;
  if (has({"sh", "-c", "command -v ncdump"})) {
    const Ran ran = run_command({"ncdump", "-h", recorded().path}, folder.path());
    CHECK(ran.status == 0);
    CHECK(contains(ran.out, "double chamber.temperature(time)"));
    CHECK(contains(ran.out, "chamber.temperature:units = \"K\""));
    CHECK(contains(ran.out, "group: events"));
    CHECK(contains(ran.out, "group: outcome"));
    CHECK(contains(ran.out, "group: provenance"));
  }
  if (has({"sh", "-c", "command -v h5dump"})) {
    const Ran ran = run_command({"h5dump", "-H", recorded().path}, folder.path());
    CHECK(ran.status == 0);
    CHECK(contains(ran.out, "DATASET \"shell.profile\""));
    CHECK(contains(ran.out, "GROUP \"events\""));
  }
}

TEST_CASE("every event stands between two rows, and a jump is a jump", "[record]") {
  const RecordReader record(recorded().path);
  const std::vector<double>& t = record.time();
  const std::vector<double> opening = record.channel("valve.opening"), power = record.channel("element.power");
  bool lifted = false, switched = false;
  for (const EventRow& e : record.events()) {
    CAPTURE(e.part, e.what, e.time);
    const auto at = std::lower_bound(t.begin(), t.end(), e.time);
    REQUIRE(at != t.end());
    CHECK(*at == e.time);
    if (e.time == 0.0) continue;
    REQUIRE(at != t.begin());
    CHECK(at[-1] == std::nextafter(e.time, 0.0));
    const auto row = static_cast<std::size_t>(at - t.begin());
    if (e.part == "valve" && e.what == "lifts") {
      lifted = true;
      CHECK(opening[row - 1] == 0.0);
      CHECK(opening[row] == 1.0);
    }
    if (e.part == "heat" && e.what == "switches off") {
      switched = true;
      CHECK(power[row - 1] == 2000.0);
      CHECK(power[row] == 0.0);
    }
  }
  CHECK(lifted);
  CHECK(switched);
}

TEST_CASE("the JSON answer has the record's numbers", "[record]") {
  const Json& a = recorded().answer;
  const RecordReader record(recorded().path);
  const Outcome outcome = record.outcome();
  // Both are written from the same doubles, and the shortest decimals that read back the same: equal to the last bit.
  for (const TargetRow& t : outcome.targets) {
    const Json j = named(a["targets"], t.name);
    if (std::isnan(t.time))
      CHECK(j["time"].is_null());
    else
      CHECK(j["time"].get<double>() == t.time);
  }
  for (const LimitRow& l : outcome.limits) {
    const Json j = named(a["limits"], l.name);
    CHECK(j["extreme"].get<double>() == l.extreme);
    CHECK(j["extreme_time"].get<double>() == l.extreme_time);
    CHECK(j["margin"].get<double>() == l.margin);
    CHECK(j["kept"].get<bool>() == std::isnan(l.crossed_time));
  }
  const std::vector<EventRow> events = record.events();
  REQUIRE(events.size() == a["events"].size());
  for (std::size_t i = 0; i < events.size(); ++i) {
    CHECK(a["events"][i]["time"].get<double>() == events[i].time);
    CHECK(a["events"][i]["part"] == events[i].part);
    CHECK(a["events"][i]["what"] == events[i].what);
  }
  for (const auto& [name, value] : a["end"].items()) {
    CAPTURE(name);
    REQUIRE(record.has_channel(name));
    CHECK(record.channel(name).back() == value.get<double>());
  }
  for (const std::string term :
       {"heater", "shaft", "wall_loss", "enthalpy_in", "enthalpy_out", "boundary_work", "stored"}) {
    CAPTURE(term);
    // Sums in another order: rounding.
    CHECK(record.channel("energy." + term).back() ==
          Approx(a["energy"][term].get<double>()).epsilon(1e-11).margin(1e-9));
  }
  for (const auto& [name, value] : outcome.attributes)
    if (name == "closure_energy" || name == "closure_mass") CHECK(a[name].get<double>() == std::get<double>(value));
  CHECK_FALSE(a["cautions"].empty());
}

TEST_CASE("the model of a record runs again and gives the same numbers", "[record]") {
  std::string text;
  for (const auto& [name, value] : RecordReader(recorded().path).provenance())
    if (name == "model_text") text = value;
  CHECK(text == everything);
  const Folder folder;
  write_text(folder / "again.yaml", text);
  const Ran ran = gaskettle_in(folder, {"run", "again.yaml", "--json", "--set", "bodies.rack.mass=6 kg"});
  REQUIRE(ran.status == 3);
  const RecordReader first(recorded().path), second(folder / "again.h5");
  CHECK(first.time() == second.time());
  for (const std::string& name : first.channel_names()) {
    CAPTURE(name);
    CHECK(first.channel(name) == second.channel(name));
  }
}

TEST_CASE("every shipped model's record opens in a notebook", "[record][models]") {
  if (!has({"/usr/bin/python3", "-c", "import xarray, h5netcdf"})) return;
  const Folder folder;
  std::string paths;
  for (const auto& entry : std::filesystem::directory_iterator(shipped("models"))) {
    const std::string stem = entry.path().stem().string();
    REQUIRE(gaskettle_in(folder, {"run", entry.path().string()}).err.empty());
    paths += "'" + folder / (stem + ".h5") + "', ";
  }
  const Ran ran = python("import xarray, numpy as np\nfor path in [" + paths + R"(]:
    ds = xarray.open_dataset(path, engine="h5netcdf")
    assert (np.diff(ds.time.values) > 0).all(), path
    for n in ds.data_vars:
        assert np.isfinite(ds[n].values).all() and 'units' in ds[n].attrs, (path, n)
    assert any(n.endswith('.pressure') for n in ds) and 'entropy.generated' in ds
)");
  INFO(ran.out << ran.err);
  CHECK(ran.status == 0);
}
