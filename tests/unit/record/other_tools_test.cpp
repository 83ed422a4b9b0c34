// Records as other people's tools see them.
#include <catch2/catch.hpp>

#include "unit/record/scratch.h"

using namespace gaskettle;
using namespace gaskettle::test;

namespace {

bool has(const std::string& command) {
  if (run(command).status == 0) return true;
  WARN("not checked, for want of: " << command);
  return false;
}

bool has_xarray() { return has("/usr/bin/python3 -c 'import xarray, h5netcdf'"); }

// Runs Python checks on a record; `ds(group)` opens it, or a group of it, in the one line that users are promised.
Ran python(const std::string& path, const std::string& checks) {
  return run(
      "/usr/bin/python3 -W error -c \"import xarray, numpy as np\ndef ds(group=None):\n  return xarray.open_dataset('" +
      path + "', engine='h5netcdf', group=group)\n" + checks + "\"");
}

}  // namespace

TEST_CASE("xarray opens a record in one line", "[record][tools]") {
  if (!has_xarray()) return;
  const Scratch scratch;
  write_example(example_settings(scratch / "out.h5"));
  const Ran ran = python(scratch / "out.h5", R"(
root = ds()
assert dict(root.sizes) == {'time': 4, 'shell.depth': 3}, root.sizes
t = root['chamber.temperature']
assert t.dims == ('time',) and t.dtype == np.float64
assert t.attrs == {'units': 'K', 'long_name': 'gas temperature'}, t.attrs
assert list(t.values) == [300, 301, 302, 303]
assert root.time.dtype == np.float64 and root.time.attrs['units'] == 's'
assert list(root.time.values) == [0, 0.5, 1, 1.5]
assert t.sel(time=1.0) == 302 and np.interp(0.25, root.time, t) == 300.5
assert root['chamber.mole_fraction.N₂'].attrs['units'] == '1'
p = root['shell.profile']
assert p.dims == ('time', 'shell.depth') and p.sel({'shell.depth': 0.03}).values[-1] == 323
assert root.attrs['gaskettle_record'] == 1 and root.attrs['title'] == 'an example'
)");
  INFO(ran.output);
  CHECK(ran.status == 0);
}

TEST_CASE("xarray opens the groups of a record", "[record][tools]") {
  if (!has_xarray()) return;
  const Scratch scratch;
  write_example(example_settings(scratch / "out.h5"));
  const Ran ran = python(scratch / "out.h5", R"(
e = ds('/events')
assert dict(e.sizes) == {'event': 1} and e.time.dims == ('event',)
assert e.part.values[0] == 'relief' and e.what.values[0] == 'opened – wide'
assert e.time.values[0] == 1 and e.before.values[0] == 0 and e.after.values[0] == 1
o = ds('/outcome')
assert o.attrs == {'partial': 0, 'closure_energy': 1.25e-9, 'ended': 'end time', 'steps': 42}, o.attrs
t = ds('/outcome/targets')
assert list(t.name.values) == ['hot', 'very hot'] and t.time.dims == ('target',)
assert t.time.values[0] == 1.5 and np.isnan(t.time.values[1])
l = ds('/outcome/limits')
assert l.name.values[0] == 'pressure' and l.margin.values[0] == 5e5 and l.margin.dims == ('limit',)
assert l.extreme.values[0] == 2.5e6 and l.extreme_time.values[0] == 1 and np.isnan(l.crossed_time.values[0])
p = ds('/provenance')
assert p.model_text.item() == 'gaskettle: 1\n' and p.attrs['program_version'] == '1.2.3'
)");
  INFO(ran.output);
  CHECK(ran.status == 0);
}

TEST_CASE("xarray opens a record of nothing", "[record][tools]") {
  if (!has_xarray()) return;
  const Scratch scratch;
  RecordWriter::Settings settings;
  settings.path = scratch / "empty.h5";
  RecordWriter(settings).finish({});
  const Ran ran = python(settings.path, R"(
for group in (None, '/events', '/outcome', '/outcome/targets', '/outcome/limits', '/provenance'):
  d = ds(group).load()
  assert all(n == 0 for n in d.sizes.values()), (group, d.sizes)
)");
  INFO(ran.output);
  CHECK(ran.status == 0);
}

TEST_CASE("ncdump and h5dump list a record", "[record][tools]") {
  const Scratch scratch;
  write_example(example_settings(scratch / "out.h5"));
  if (has("which ncdump")) {
    const Ran ran = run("ncdump -h " + (scratch / "out.h5"));
    CHECK(ran.status == 0);
    CHECK_THAT(ran.output, Catch::Contains("double chamber.temperature(time) ;"));
    CHECK_THAT(ran.output, Catch::Contains("chamber.temperature:units = \"K\" ;"));
    CHECK_THAT(ran.output, Catch::Contains("double shell.profile(time, shell.depth) ;"));
    CHECK_THAT(ran.output, Catch::Contains("string what(event) ;"));
    CHECK_THAT(run("ncdump -v what " + (scratch / "out.h5")).output, Catch::Contains("opened – wide"));
  }
  if (has("which h5dump")) {
    const Ran ran = run("h5dump -d /energy.heater " + (scratch / "out.h5"));
    CHECK(ran.status == 0);
    CHECK_THAT(ran.output, Catch::Contains("1000, 2000, 3000"));
  }
}

TEST_CASE("many channels share the time scale", "[record][tools]") {
  // Above 4095 uses, the list of references on `time` (16 bytes each) passes the 64 kB of older attributes.
  const Scratch scratch;
  RecordWriter::Settings settings;
  settings.path = scratch / "wide.h5";
  settings.expected_rows = 2;
  for (int i = 0; i < 4500; ++i) settings.channels.push_back({"part.q" + std::to_string(i), "1", ""});
  RecordWriter writer(settings);
  writer.append(0, std::vector<double>(4500, 1.0));
  writer.append(1, std::vector<double>(4500, 2.0));
  writer.finish({});
  if (!has_xarray()) return;
  const Ran ran = run("/usr/bin/python3 -c \"import h5py\nf = h5py.File('" + settings.path +
                      "', 'r')\nassert f['time'].attrs['REFERENCE_LIST'].shape == (4500,)\n"
                      "q = f['part.q4499']\nassert q.dims[0][0].name == '/time' and q[1] == 2\"");
  INFO(ran.output);
  CHECK(ran.status == 0);
}
