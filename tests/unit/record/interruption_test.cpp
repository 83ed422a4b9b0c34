// Runs that are killed, run out of room, or are very long. Each writes in a process of its own.
#include <sched.h>
#include <signal.h>
#include <sys/mount.h>
#include <sys/resource.h>
#include <sys/wait.h>

#include <catch2/catch.hpp>
#include <fstream>
#include <iostream>

#include "record/record_reader.h"
#include "unit/record/scratch.h"

using namespace gaskettle;
using namespace gaskettle::test;

namespace {

// Wait status of a process that does `action`, whose result is its exit status. It ends through exit(), so that
// the file library's own closing is part of what is tested, and is killed where that hangs.
template <class Action>
int status_of(Action action) {
  std::cout.flush();
  std::cerr.flush();
  const pid_t child = fork();
  if (child < 0) throw std::runtime_error("cannot fork");
  if (child == 0) {
    alarm(60);
    int result = 99;
    try {
      result = action();
    } catch (const std::exception&) {
    }
    std::exit(result);
  }
  int status = 0;
  waitpid(child, &status, 0);
  return status;
}

// The largest file allowed stands in for the disk: a write beyond it fails with EFBIG instead of ENOSPC.
void set_largest_file(rlim_t bytes) {
  signal(SIGXFSZ, SIG_IGN);
  rlimit limit = {};
  getrlimit(RLIMIT_FSIZE, &limit);
  limit.rlim_cur = bytes;
  setrlimit(RLIMIT_FSIZE, &limit);
}

// A disk of two pages of 4 kB that only this process sees and that ends with it; needs unprivileged name spaces.
bool mount_small_disk(const std::string& folder) {
  const std::string user = std::to_string(getuid());
  const std::string group = std::to_string(getgid());
  std::filesystem::create_directory(folder);
  if (unshare(CLONE_NEWUSER | CLONE_NEWNS) != 0) return false;
  // Without a user in the new name space no file can be made.
  std::ofstream("/proc/self/setgroups") << "deny";
  std::ofstream("/proc/self/uid_map") << "0 " + user + " 1";
  std::ofstream("/proc/self/gid_map") << "0 " + group + " 1";
  return mount("none", folder.c_str(), "tmpfs", 0, "size=8k") == 0 && getuid() == 0;
}

// The address sanitizer holds freed memory back to catch its use.
#ifdef __SANITIZE_ADDRESS__
constexpr bool freed_memory_is_kept = true;
#else
constexpr bool freed_memory_is_kept = false;
#endif

std::size_t resident_bytes() {
  std::size_t total = 0, resident = 0;
  std::ifstream("/proc/self/statm") >> total >> resident;
  return resident * static_cast<std::size_t>(sysconf(_SC_PAGESIZE));
}

}  // namespace

TEST_CASE("a killed run leaves a readable partial record", "[record]") {
  const Scratch scratch;
  const auto settings = example_settings(scratch / "out.h5");
  // Rows before the flush and after it: none, some in the buffer, some blocks in the file.
  const auto before = GENERATE(0, 1, 1500);
  const auto after = GENERATE(0, 10, 5000);
  const int status = status_of([&] {
    RecordWriter writer(settings);
    for (int i = 0; i < before; ++i) append_example_row(writer, i);
    writer.add_event({0.0, "heater", "on", 0.0, 1.0});
    writer.flush();
    for (int i = before; i < before + after; ++i) append_example_row(writer, i);
    for (int i = 0; i < after; ++i) writer.add_event({1.0, "heater", "off", 1.0, 0.0});
    raise(SIGKILL);
    return 0;
  });
  REQUIRE(WIFSIGNALED(status));
  REQUIRE(WTERMSIG(status) == SIGKILL);
  CHECK_FALSE(std::filesystem::exists(settings.path));
  const RecordReader record(settings.path + ".partial");
  CHECK(record.partial());
  REQUIRE(record.rows() >= static_cast<std::size_t>(before));
  REQUIRE(record.events().size() >= 1);
  CHECK(record.events()[0].what == "on");
  if (before > 0) CHECK(record.channel("chamber.temperature")[static_cast<std::size_t>(before) - 1] == 299.0 + before);
  // The same run may start again.
  write_example(settings, 1);
  CHECK(RecordReader(settings.path).rows() == 1);
}

TEST_CASE("a writer that goes out of scope leaves all its rows, marked partial", "[record]") {
  const Scratch scratch;
  const auto settings = example_settings(scratch / "out.h5");
  {
    RecordWriter writer(settings);
    for (int i = 0; i < 3; ++i) append_example_row(writer, i);
  }
  const RecordReader record(settings.path + ".partial");
  CHECK(record.partial());
  CHECK(record.rows() == 3);
}

TEST_CASE("a full disk is reported and the program still ends", "[record]") {
  const Scratch scratch;
  const auto settings = example_settings(scratch / "out.h5");
  const int status = status_of([&] {
    RecordWriter writer(settings);
    append_example_row(writer, 0);
    writer.flush();
    set_largest_file(400'000);
    try {
      for (int i = 1; i < 100'000; ++i) append_example_row(writer, i);
    } catch (const RecordError& error) {
      set_largest_file(RLIM_INFINITY);
      const std::string text = error.what();
      if (text.find("File too large") == std::string::npos || text.find(settings.path) != 0) return 1;
      try {
        writer.finish({});
      } catch (const RecordError&) {
        return 0;
      }
      return 2;
    }
    return 3;
  });
  REQUIRE(WIFEXITED(status));
  CHECK(WEXITSTATUS(status) == 0);
  CHECK_FALSE(std::filesystem::exists(settings.path));
  const RecordReader record(settings.path + ".partial");
  CHECK(record.partial());
  CHECK(record.rows() >= 1);
}

TEST_CASE("a disk with no room for the beginning is reported and the program still ends", "[record]") {
  const Scratch scratch;
  const int no_small_disk = 77;
  const int status = status_of([&] {
    const std::string disk = scratch / "disk";
    if (!mount_small_disk(disk)) return no_small_disk;
    try {
      const RecordWriter writer(example_settings(disk + "/out.h5"));
    } catch (const RecordError& error) {
      const bool told = std::string(error.what()).find("No space left") != std::string::npos;
      return told && !std::filesystem::exists(disk + "/out.h5.partial") ? 0 : 1;
    }
    return 2;
  });
  REQUIRE(WIFEXITED(status));
  if (WEXITSTATUS(status) == no_small_disk) {
    WARN("not checked: no small disk can be mounted here");
    return;
  }
  CHECK(WEXITSTATUS(status) == 0);
}

TEST_CASE("a million rows pass through bounded memory", "[record]") {
  const Scratch scratch;
  const int status = status_of([&] {
    RecordWriter::Settings settings;
    settings.path = scratch / "long.h5";
    for (int i = 0; i < 10; ++i) settings.channels.push_back({"part.q" + std::to_string(i), "1", ""});
    settings.expected_rows = 1'000'000;
    RecordWriter writer(settings);
    std::vector<double> row(10, 1.0);
    std::size_t at_first = 0;
    for (int i = 0; i < 1'000'000; ++i) {
      row[9] = i;
      writer.append(i, row);
      if (i == 10'000) at_first = resident_bytes();
    }
    const std::size_t growth = resident_bytes() - at_first;
    writer.finish({});
    // The rows are 88 MB. What may grow is the index of their chunks: 245 a channel of some 24 bytes, below 1 MB.
    return growth < 10'000'000 || freed_memory_is_kept ? 0 : 1;
  });
  REQUIRE(WIFEXITED(status));
  REQUIRE(WEXITSTATUS(status) == 0);
  const RecordReader record(scratch / "long.h5");
  CHECK(record.rows() == 1'000'000);
  CHECK(record.channel("part.q9", 999'999, 1)[0] == 999'999);
}
