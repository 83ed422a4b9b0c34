// Mistaken and hostile models through the program itself: what it says, where, how often, and that it writes nothing.
//
// Each file of tests/bad_models states what must be said of it in comment lines at its top, one a problem:
//   # expect: LINE:COLUMN: part of the message
// Files that cannot carry comments are made here.
#include <sys/wait.h>
#include <unistd.h>

#include <algorithm>
#include <catch2/catch.hpp>
#include <chrono>
#include <cstdlib>
#include <filesystem>
#include <fstream>
#include <iterator>
#include <regex>
#include <sstream>
#include <stdexcept>
#include <string>
#include <vector>

namespace fs = std::filesystem;

namespace {

std::string text_of(const fs::path& path) {
  std::ifstream in(path, std::ios::binary);
  return {std::istreambuf_iterator<char>(in), std::istreambuf_iterator<char>()};
}

std::vector<std::string> lines_of(const std::string& text) {
  std::vector<std::string> lines;
  std::istringstream in(text);
  for (std::string line; std::getline(in, line);) lines.push_back(line);
  return lines;
}

/// A folder for one run; `work` inside it is where the program stands and must leave nothing.
class Folder {
public:
  Folder() {
    std::string pattern = (fs::temp_directory_path() / "gaskettle_bad_XXXXXX").string();
    if (mkdtemp(pattern.data()) == nullptr) throw std::runtime_error("no scratch folder");
    path_ = pattern;
    fs::create_directory(path_ / "work");
  }
  ~Folder() {
    std::error_code ignored;
    fs::remove_all(path_, ignored);
  }
  Folder(const Folder&) = delete;
  Folder& operator=(const Folder&) = delete;
  fs::path operator/(const std::string& name) const { return path_ / name; }
  /// A file of any bytes, outside of where the program stands.
  std::string file(const std::string& name, const std::string& bytes) const {
    std::ofstream(path_ / name, std::ios::binary) << bytes;
    return (path_ / name).string();
  }

private:
  fs::path path_;
};

struct Answer {
  int status = -1;  // 128 and more: ended by a signal, as the shell tells it
  std::string out, err;
  double seconds = 0.0;
  bool wrote_something = false;
};

Answer run(const Folder& folder, const std::string& file, const std::string& more = "") {
  const auto quoted = [](const std::string& s) { return "'" + s + "'"; };
  const fs::path work = folder / "work", out = folder / "out", err = folder / "err";
  const std::string command = "cd " + quoted(work.string()) + " && " + quoted(GASKETTLE_PROGRAM) + " run " +
                              quoted(file) + " " + more + " </dev/null >" + quoted(out.string()) + " 2>" +
                              quoted(err.string());
  Answer a;
  const auto began = std::chrono::steady_clock::now();
  const int status = std::system(command.c_str());
  a.seconds = std::chrono::duration<double>(std::chrono::steady_clock::now() - began).count();
  a.status = WIFEXITED(status) ? WEXITSTATUS(status) : 128;
  a.out = text_of(out);
  a.err = text_of(err);
  a.wrote_something = !fs::is_empty(work);
  return a;
}

/// What holds for every refusal: its status, nothing printed as an answer, nothing written, no waiting.
void check_refused(const Answer& a) {
  CHECK(a.status == 2);
  CHECK(a.out.empty());
  CHECK_FALSE(a.wrote_something);
  CHECK(a.seconds < 10.0);
}

/// Every line is a problem in `file` with line and column, but for a last one that counts those left out.
void check_form(const std::string& file, const std::vector<std::string>& lines) {
  static const std::regex rest(R"(:[1-9][0-9]*:[1-9][0-9]*: error: .+)");
  static const std::regex counted(R"(\.\.\. and [0-9]+ more problems)");
  for (std::size_t i = 0; i < lines.size(); ++i) {
    INFO(lines[i]);
    const bool last = i + 1 == lines.size();
    const bool placed = lines[i].rfind(file, 0) == 0 && std::regex_match(lines[i].substr(file.size()), rest);
    CHECK((placed || (last && std::regex_match(lines[i], counted))));
  }
}

std::vector<std::string> expectations(const std::string& text) {
  const std::string mark = "# expect: ";
  std::vector<std::string> list;
  for (const std::string& line : lines_of(text))
    if (line.rfind(mark, 0) == 0) list.push_back(line.substr(mark.size()));
  return list;
}

/// Whether a line of the program says what "LINE:COLUMN: fragment" expects.
bool says(const std::string& line, const std::string& file, const std::string& expected) {
  const std::size_t space = expected.find(": ");
  const std::string start = file + ":" + expected.substr(0, space) + ": error: ";
  return line.rfind(start, 0) == 0 && line.find(expected.substr(space + 2), start.size()) != std::string::npos;
}

void check_file(const std::string& file) {
  const std::vector<std::string> expected = expectations(text_of(file));
  REQUIRE_FALSE(expected.empty());
  const Folder folder;
  const Answer a = run(folder, file);
  INFO(a.err);
  check_refused(a);
  std::vector<std::string> lines = lines_of(a.err);
  check_form(file, lines);
  CHECK(lines.size() == expected.size());
  for (const std::string& e : expected) {
    INFO("expected " << e);
    const auto found =
        std::find_if(lines.begin(), lines.end(), [&](const std::string& line) { return says(line, file, e); });
    CHECK(found != lines.end());
    if (found != lines.end()) lines.erase(found);
  }
  for (const std::string& line : lines) UNSCOPED_INFO("not expected: " << line);
  CHECK(lines.empty());
}

const std::string good_start =
    "gaskettle: 1\n"
    "gas_spaces:\n"
    "  chamber: {volume: 0.5 m3, gas: nitrogen, pressure: 9 bar gauge, temperature: 20 degC}\n"
    "run: {until: 10 s}\n";

std::string repeated(const std::string& text, int times) {
  std::string all;
  for (int i = 0; i < times; ++i) all += text;
  return all;
}

/// One line, at this place, that holds these words.
void check_one(const std::string& bytes, const std::string& place, const std::string& words) {
  const Folder folder;
  const std::string file = folder.file("model.yaml", bytes);
  const Answer a = run(folder, file);
  INFO(a.err);
  check_refused(a);
  const std::vector<std::string> lines = lines_of(a.err);
  REQUIRE(lines.size() == 1);
  CHECK(says(lines[0], file, place + ": " + words));
}

}  // namespace

TEST_CASE("a good model runs: what these tests refuse is refused for its mistake") {
  const Folder folder;
  const Answer a = run(folder, folder.file("good.yaml", good_start));
  INFO(a.err);
  CHECK(a.status == 0);
  CHECK(fs::exists(folder / "work/good.h5"));
  CHECK_FALSE(a.out.empty());
}

TEST_CASE("every bad model is refused with all of its mistakes, each once and at its place") {
  std::vector<std::string> files;
  for (const auto& entry : fs::directory_iterator(fs::path(GASKETTLE_SOURCE_DIR) / "tests/bad_models"))
    if (entry.path().extension() == ".yaml") files.push_back(entry.path().string());
  std::sort(files.begin(), files.end());
  REQUIRE(files.size() >= 64);
  for (const std::string& file : files) {
    DYNAMIC_SECTION(fs::path(file).stem().string()) { check_file(file); }
  }
}

TEST_CASE("check refuses as run does, and says the same") {
  const std::string file = std::string(GASKETTLE_SOURCE_DIR) + "/tests/bad_models/references_to_nothing.yaml";
  const Folder folder;
  const Answer a = run(folder, file);
  const fs::path err = folder / "check";
  const int status =
      std::system((std::string("'") + GASKETTLE_PROGRAM + "' check '" + file + "' 2>'" + err.string() + "'").c_str());
  CHECK(WEXITSTATUS(status) == 2);
  CHECK(text_of(err) == a.err);
}

TEST_CASE("after a hundred problems the rest are counted") {
  std::string bytes = good_start + "bodies:\n";
  for (int i = 0; i < 220; ++i)
    bytes +=
        "  b" + std::to_string(i) + ": {in: chamber, material: aluminium, mass: 40, area: 2 m2, film: 20 W/m2/K}\n";
  const Folder folder;
  const std::string file = folder.file("model.yaml", bytes);
  const Answer a = run(folder, file);
  check_refused(a);
  const std::vector<std::string> lines = lines_of(a.err);
  check_form(file, lines);
  REQUIRE(lines.size() == 101);
  CHECK(lines[0].rfind(file + ":6:", 0) == 0);  // in the order of the file
  CHECK(lines[99].rfind(file + ":105:", 0) == 0);
  CHECK(lines[100] == "... and 120 more problems");
}

TEST_CASE("a file of mistakes only takes no long time") {
  std::string keys = good_start, parts = good_start + "sensors:\n";
  for (int i = 0; i < 20'000; ++i) {
    keys += "key" + std::to_string(i) + ": 1\n";
    parts += "  s" + std::to_string(i) + ": {reads: chamber.temprature}\n";
  }
  for (const std::string& bytes : {keys, parts}) {
    const Folder folder;
    const Answer a = run(folder, folder.file("model.yaml", bytes));
    check_refused(a);
    REQUIRE(lines_of(a.err).size() == 101);
    CHECK(lines_of(a.err)[100] == "... and 19900 more problems");
  }
}

TEST_CASE("what is no file to read is said without a line") {
  const Folder folder;
  const auto said = [&](const std::string& file) {
    const Answer a = run(folder, file);
    check_refused(a);
    REQUIRE(lines_of(a.err).size() == 1);
    return a.err;
  };
  const std::string none = (folder / "none.yaml").string(), here = (folder / "work").string();
  CHECK(said(none) == none + ": error: cannot read '" + none + "': No such file or directory\n");
  CHECK(said(here) == here + ": error: cannot read '" + here + "': it is a folder, not a file\n");
  CHECK_THAT(said("/dev/zero"), Catch::Contains("longer than"));
  CHECK_THAT(said("/dev/null"), Catch::Contains("there is nothing in it"));
}

TEST_CASE("bytes that are no model are refused where they stand") {
  check_one("", "1:1", "there is nothing in it");
  check_one("\n\n# only this\n", "1:1", "there is nothing in it");
  check_one(good_start + "title: caf\xE9\n", "5:11", "is not UTF-8");
  check_one("gaskettle: 1\ntitle: a" + std::string(1, '\0') + "b\n", "2:9", "U+0000");
  check_one(
      "\xFF\xFE"
      "g\0a\0",
      "1:1", "is not UTF-8");
  check_one(
      "\x7F"
      "ELF\x02\x01\x01",
      "1:1", "control or invisible character U+007F");
  check_one("\x89HDF\r\n\x1A\n", "1:1", "is not UTF-8");
  check_one("gaskettle: 1\ntitle: \x1B[31mred\n", "2:8", "U+001B");
}

TEST_CASE("sizes, depths and repetitions are bounded") {
  check_one(good_start + "title: " + std::string(200'000, 'x') + "\n", "5:8", "this text is 200000 bytes long");
  // The map of the model itself is the first of 64, so the 64th bracket is one too many.
  check_one(good_start + "title: " + repeated("[", 70) + repeated("]", 70) + "\n", "5:71", "more than 64 deep");
  check_one(good_start + "notes: " + repeated("{a: ", 70) + "1" + repeated("}", 70) + "\n", "5:260",
            "more than 64 deep");
  // Values after a4: some 83 thousand and as many kept for aliases; one more a4 passes 200 thousand.
  const Folder folder;
  const Answer open = run(folder, folder.file("open.yaml", good_start + "title: " + repeated("[", 100'000) + "\n"));
  check_refused(open);
  CHECK(lines_of(open.err).size() == 1);
  std::string bomb = good_start + "a0: &a0 [x, x, x, x, x, x, x, x, x, x]\n";
  for (int i = 1; i < 12; ++i) {
    const std::string before = "*a" + std::to_string(i - 1);
    bomb += "a" + std::to_string(i) + ": &a" + std::to_string(i) + " [" + repeated(before + ", ", 9) + "x]\n";
  }
  check_one(bomb, "10:10", "each alias counted as what it repeats");
}

TEST_CASE("long and odd text of a user does not break the messages") {
  const Folder folder;
  // YAML itself bounds a key to 1024 characters, not a value.
  const std::string key(1000, 'k'), value(20'000, 'v');
  const std::string file = folder.file(
      "model.yaml",
      good_start + key + ": 1\n\"two\\nlines\": 2\n\"tab\\tkey\": 3\nsensors: {s: {reads: " + value + "}}\n");
  const Answer a = run(folder, file);
  check_refused(a);
  const std::vector<std::string> lines = lines_of(a.err);
  check_form(file, lines);
  REQUIRE(lines.size() == 4);
  for (const std::string& line : lines) CHECK(line.size() < 2000);
}

TEST_CASE("settings on the command line are refused by name") {
  const Folder folder;
  const std::string file = folder.file("model.yaml", good_start);
  const auto said = [&](const std::string& set) {
    const Answer a = run(folder, file, "--set '" + set + "'");
    check_refused(a);
    REQUIRE(lines_of(a.err).size() == 1);
    CHECK(a.err.rfind("--set ", 0) == 0);
    return a.err;
  };
  CHECK_THAT(said("gas_spaces.chambr.pressure=3 bar gauge"),
             Catch::Contains("has no 'chambr'; did you mean 'chamber'?"));
  CHECK_THAT(said("gas_spaces.chamber.pressure=3 bar"), Catch::Contains("3 bar abs or 3 bar gauge"));
  CHECK_THAT(said("gas_spaces.chamber.presure=3 bar gauge"), Catch::Contains("unknown key 'presure'"));
  CHECK_THAT(said("run.until"), Catch::Contains("is not PATH=VALUE"));
  CHECK_THAT(said("run.until="), Catch::Contains("a value is due"));
  CHECK_THAT(said("run.until=-10 s"), Catch::Contains("must be greater than zero"));
  CHECK_THAT(said("run.until=[1"), Catch::Contains("is not closed"));
}
