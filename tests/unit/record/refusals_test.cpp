#include <catch2/catch.hpp>
#include <fstream>
#include <limits>

#include "record/record_reader.h"
#include "unit/record/scratch.h"

using namespace gaskettle;
using namespace gaskettle::test;

namespace {

void write_text(const std::string& path, const std::string& text) { std::ofstream(path) << text; }

std::string message_of(const RecordWriter::Settings& settings) {
  try {
    RecordWriter writer(settings);
    writer.abandon();
  } catch (const RecordError& error) {
    return error.what();
  }
  return "";
}

}  // namespace

TEST_CASE("times must increase strictly", "[record]") {
  const Scratch scratch;
  RecordWriter writer(example_settings(scratch / "out.h5"));
  append_example_row(writer, 1);
  const std::vector<double> row(3, 1.0);
  CHECK_THROWS_WITH(writer.append(0.5, row, row), Catch::Contains("increase strictly"));
  CHECK_THROWS_AS(writer.append(0.25, row, row), RecordError);
  CHECK_THROWS_AS(writer.append(std::numeric_limits<double>::quiet_NaN(), row, row), RecordError);
  CHECK_THROWS_AS(writer.append(std::numeric_limits<double>::infinity(), row, row), RecordError);
  CHECK(writer.rows() == 1);  // a refused row leaves no trace
  append_example_row(writer, 2);
  writer.finish({});
  CHECK(RecordReader(scratch / "out.h5").time() == std::vector<double>{0.5, 1.0});
}

TEST_CASE("rows of the wrong width are refused", "[record]") {
  const Scratch scratch;
  RecordWriter writer(example_settings(scratch / "out.h5"));
  CHECK_THROWS_WITH(writer.append(0, std::vector<double>(2), std::vector<double>(3)), Catch::Contains("3 channels"));
  CHECK_THROWS_AS(writer.append(0, std::vector<double>(3)), RecordError);
}

TEST_CASE("nothing is added to a finished record", "[record]") {
  const Scratch scratch;
  RecordWriter writer(example_settings(scratch / "out.h5"));
  writer.finish({});
  CHECK_THROWS_AS(append_example_row(writer, 0), RecordError);
  CHECK_THROWS_AS(writer.flush(), RecordError);
  CHECK_THROWS_AS(writer.finish({}), RecordError);
  CHECK_THROWS_AS(writer.abandon(), RecordError);
}

TEST_CASE("names that cannot stand in a record are refused", "[record]") {
  const Scratch scratch;
  auto settings = example_settings(scratch / "out.h5");
  const std::string bad = GENERATE("", "a/b", "time", "events", ".", "energy.heater", "shell.profile", "shell.depth");
  settings.channels.insert(settings.channels.begin(), {bad, "1", ""});
  CHECK(message_of(settings) != "");
  CHECK_FALSE(std::filesystem::exists(settings.path + ".partial"));
}

TEST_CASE("two profiles may share depths but not disagree on them", "[record]") {
  const Scratch scratch;
  auto settings = example_settings(scratch / "out.h5");
  settings.profiles.push_back(settings.profiles[0]);
  settings.profiles[1].name = "shell.strain";
  CHECK(message_of(settings) == "");
  settings.profiles[1].depth[2] = 0.04;
  CHECK_THAT(message_of(settings), Catch::Contains("shell.depth"));
}

TEST_CASE("what stands at the path is replaced only where that is safe", "[record]") {
  const Scratch scratch;
  auto settings = example_settings(scratch / "out.h5");

  SECTION("a record of the same model and settings is replaced") {
    write_example(settings, 4);
    write_example(settings, 2);
    CHECK(RecordReader(settings.path).rows() == 2);
  }
  SECTION("the old record stands until the new one is complete") {
    write_example(settings, 4);
    RecordWriter writer(settings);
    append_example_row(writer, 0);
    writer.flush();
    CHECK(RecordReader(settings.path).rows() == 4);
  }
  SECTION("the record of another model is refused, and replaced when told to") {
    write_example(settings, 4);
    settings.identity = "another";
    CHECK_THAT(message_of(settings), Catch::Contains("another model") && Catch::Contains("--overwrite"));
    CHECK(RecordReader(settings.path).identity() == "example");
    settings.overwrite = true;
    write_example(settings, 1);
    CHECK(RecordReader(settings.path).identity() == "another");
  }
  SECTION("a record without an identity matches none") {
    settings.identity = "";
    write_example(settings, 4);
    CHECK_THAT(message_of(settings), Catch::Contains("--overwrite"));
  }
  SECTION("any other file is refused, and replaced when told to") {
    write_text(settings.path, "dear diary");
    CHECK_THAT(message_of(settings), Catch::Contains("not a record"));
    settings.overwrite = true;
    write_example(settings);
    CHECK(RecordReader(settings.path).rows() == 4);
  }
  SECTION("a folder is refused even when told to overwrite") {
    std::filesystem::create_directory(settings.path);
    settings.overwrite = true;
    CHECK_THAT(message_of(settings), Catch::Contains("not a regular file"));
  }
  SECTION("a stranger's file at the temporary name is refused") {
    write_text(settings.path + ".partial", "dear diary");
    CHECK_THAT(message_of(settings), Catch::Contains(".partial"));
    CHECK(std::filesystem::file_size(settings.path + ".partial") == 10);
  }
  SECTION("the remains of a run killed at its very beginning are replaced") {
    write_text(settings.path + ".partial", GENERATE("", "\x89HDF\r\n\x1a\n and no more"));
    CHECK(message_of(settings) == "");
  }
  SECTION("two writers of one record do not meet") {
    const RecordWriter first(settings);
    CHECK_THAT(message_of(settings), Catch::Contains("another run is writing"));
  }
}

TEST_CASE("folders that cannot be written to are named", "[record]") {
  const Scratch scratch;
  CHECK_THAT(message_of(example_settings(scratch / "none/out.h5")),
             Catch::Contains("does not exist") && Catch::Contains(scratch / "none"));
  write_text(scratch / "file", "");
  CHECK_THAT(message_of(example_settings(scratch / "file/out.h5")), Catch::Contains("does not exist"));
  CHECK_THAT(message_of(example_settings("/proc/out.h5")), Catch::Contains("/proc/out.h5"));
  CHECK_THAT(message_of(example_settings("")), Catch::Contains("file name"));
}

TEST_CASE("what cannot be read as a record says why", "[record]") {
  const Scratch scratch;
  CHECK_THROWS_WITH(RecordReader(scratch / "none.h5"), Catch::Contains("no such file"));
  CHECK_THROWS_WITH(RecordReader(scratch / ""), Catch::Contains("folder"));
  write_text(scratch / "text.h5", "dear diary");
  CHECK_THROWS_WITH(RecordReader(scratch / "text.h5"), Catch::Contains("text.h5") && Catch::Contains("HDF5"));
  write_example(example_settings(scratch / "out.h5"), 3000);
  std::filesystem::resize_file(scratch / "out.h5", 10000);
  CHECK_THROWS_WITH(RecordReader(scratch / "out.h5"), Catch::Contains("end is missing"));
}

TEST_CASE("an abandoned record leaves nothing and keeps the one before", "[record]") {
  const Scratch scratch;
  const auto settings = example_settings(scratch / "out.h5");
  write_example(settings, 4);
  RecordWriter writer(settings);
  append_example_row(writer, 0);
  writer.abandon();
  CHECK_FALSE(std::filesystem::exists(settings.path + ".partial"));
  CHECK(RecordReader(settings.path).rows() == 4);
}
