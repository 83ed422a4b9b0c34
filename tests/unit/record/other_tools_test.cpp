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

// Runs Python with `ds` as the record (or a group of it) opened in one line.
Ran python(const std::string& path, const std::string& group, const std::string& checks) {
  const std::string how = group.empty() ? "" : ", group='" + group + "'";
  return run("/usr/bin/python3 -W error -c \"import xarray, numpy as np\nds = xarray.open_dataset('" + path +
             "', engine='h5netcdf'" + how + ")\n" + checks + "\"");
}

}  // namespace

TEST_CASE("xarray opens a record in one line", "[record][tools]") {
  if (!has_xarray()) return;
  const Scratch scratch;
  write_example(example_settings(scratch / "out.h5"));
  const Ran ran = python(scratch / "out.h5", "", R"(
assert dict(ds.sizes) == {'time': 4, 'shell.depth': 3}, ds.sizes
t = ds['chamber.temperature']
assert t.dims == ('time',) and t.dtype == np.float64
assert t.attrs == {'units': 'K', 'long_name': 'gas temperature'}, t.attrs
assert list(t.values) == [300, 301, 302, 303]
assert ds.time.dtype == np.float64 and ds.time.attrs['units'] == 's'
assert list(ds.time.values) == [0, 0.5, 1, 1.5]
assert t.sel(time=1.0) == 302 and np.interp(0.25, ds.time, t) == 300.5
assert ds['chamber.mole_fraction.N₂'].attrs['units'] == '1'
p = ds['shell.profile']
assert p.dims == ('time', 'shell.depth') and p.sel({'shell.depth': 0.03}).values[-1] == 323
assert ds.attrs['gaskettle_record'] == 1 and ds.attrs['title'] == 'an example'
)");
  INFO(ran.output);
  CHECK(ran.status == 0);
}

TEST_CASE("xarray opens the groups of a record", "[record][tools]") {
  if (!has_xarray()) return;
  const Scratch scratch;
  write_example(example_settings(scratch / "out.h5"));
  const auto [group, checks] = GENERATE(table<std::string, std::string>({
      {"/events",
       "assert dict(ds.sizes) == {'event': 1}\n"
       "assert ds.part.values[0] == 'relief' and ds.what.values[0] == 'opened – wide'\n"
       "assert ds.time.values[0] == 1 and ds.time.dims == ('event',) and ds.after.values[0] == 1"},
      {"/outcome",
       "assert ds.attrs == {'partial': 0, 'closure_energy': 1.25e-9, 'ended': 'end time', 'steps': 42}, ds.attrs"},
      {"/outcome/targets",
       "assert list(ds.name.values) == ['hot', 'very hot'] and ds.time.dims == ('target',)\n"
       "assert ds.time.values[0] == 1.5 and np.isnan(ds.time.values[1])"},
      {"/outcome/limits",
       "assert ds.name.values[0] == 'pressure' and ds.margin.values[0] == 5e5 and ds.margin.dims == ('limit',)"},
      {"/provenance",
       "assert ds.model_text.item() == 'gaskettle: 1\\n' and ds.attrs['program_version'] == '1.2.3'"},
  }));
  const Ran ran = python(scratch / "out.h5", group, checks);
  INFO(group << ": " << ran.output);
  CHECK(ran.status == 0);
}

TEST_CASE("xarray opens a record of nothing", "[record][tools]") {
  if (!has_xarray()) return;
  const Scratch scratch;
  RecordWriter::Settings settings;
  settings.path = scratch / "empty.h5";
  RecordWriter(settings).finish({});
  const std::string group = GENERATE("", "/events", "/outcome", "/outcome/targets", "/outcome/limits", "/provenance");
  const Ran ran = python(settings.path, group, "ds.load()\nassert all(n == 0 for n in ds.sizes.values())");
  INFO(group << ": " << ran.output);
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
  const Ran ran = python(settings.path, "", "assert len(ds) == 4500 and ds['part.q4499'].values[1] == 2");
  INFO(ran.output);
  CHECK(ran.status == 0);
}
