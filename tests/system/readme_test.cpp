// The README's commands and printed answer are what the program does today.
#include <sys/wait.h>
#include <unistd.h>

#include <array>
#include <catch2/catch.hpp>
#include <cstdio>
#include <filesystem>
#include <fstream>
#include <sstream>
#include <string>
#include <vector>

namespace {
namespace fs = std::filesystem;

std::string text_of(const fs::path& file) {
  std::ifstream in(file);
  REQUIRE(in);
  std::ostringstream out;
  out << in.rdbuf();
  return out.str();
}

/// Contents of the fenced blocks of one language, in order.
std::vector<std::string> blocks(const std::string& readme, const std::string& language) {
  std::vector<std::string> found;
  const std::string open = "\n```" + language + "\n";
  for (std::size_t at = readme.find(open); at != std::string::npos; at = readme.find(open, at + 1)) {
    const std::size_t begin = at + open.size();
    found.push_back(readme.substr(begin, readme.find("\n```", begin) + 1 - begin));
  }
  return found;
}

std::vector<std::string> lines_of(const std::string& text) {
  std::vector<std::string> lines;
  std::istringstream in(text);
  for (std::string line; std::getline(in, line);) lines.push_back(line);
  return lines;
}

/// A folder that looks like the source tree to the README's commands, and takes what they write.
struct Workplace {
  fs::path folder = fs::temp_directory_path() / ("gaskettle_readme_" + std::to_string(::getpid()));
  Workplace() {
    fs::create_directories(folder / "build");
    for (const char* name : {"models", "configs"})
      fs::create_directory_symlink(fs::path(GASKETTLE_SOURCE_DIR) / name, folder / name);
    fs::create_symlink(GASKETTLE_PROGRAM, folder / "build/gaskettle");
  }
  ~Workplace() { fs::remove_all(folder); }
  std::pair<int, std::string> run(const std::string& command) const {
    const std::string line = "cd '" + folder.string() + "' && " + command;
    FILE* pipe = popen(("bash -c '" + quoted(line) + "'").c_str(), "r");
    REQUIRE(pipe != nullptr);
    std::string out;
    std::array<char, 4096> buffer{};
    for (std::size_t n = 0; (n = fread(buffer.data(), 1, buffer.size(), pipe)) > 0;) out.append(buffer.data(), n);
    const int status = pclose(pipe);
    return {WEXITSTATUS(status), out};
  }
  static std::string quoted(const std::string& text) {
    std::string out;
    for (const char c : text) out += c == '\'' ? std::string("'\\''") : std::string(1, c);
    return out;
  }
};

const std::string& readme() {
  static const std::string text = text_of(fs::path(GASKETTLE_SOURCE_DIR) / "README.md");
  return text;
}
}  // namespace

TEST_CASE("every gaskettle command shown in the README runs") {
  const Workplace here;
  int commands = 0;
  for (const std::string& block : blocks(readme(), "sh"))
    for (const std::string& line : lines_of(block)) {
      if (line.rfind("build/gaskettle", 0) != 0) continue;
      CAPTURE(line);
      const auto [status, out] = here.run(line);
      CHECK(status == 0);
      CHECK_FALSE(out.empty());
      ++commands;
    }
  CHECK(commands >= 7);
}

TEST_CASE("the model and the answer printed in the README are the program's") {
  const std::vector<std::string> models = blocks(readme(), "yaml"), answers = blocks(readme(), "text");
  REQUIRE(models.size() == 1);
  REQUIRE(answers.size() == 1);
  CHECK(models[0] == text_of(fs::path(GASKETTLE_SOURCE_DIR) / "models/stirred_ram.yaml"));
  const Workplace here;
  const auto [status, out] = here.run("build/gaskettle run models/stirred_ram.yaml");
  CHECK(status == 0);
  const std::vector<std::string> shown = lines_of(answers[0]), printed = lines_of(out);
  REQUIRE(shown.size() == printed.size());
  bool bookkeeping = false;
  for (std::size_t i = 0; i < shown.size(); ++i) {
    bookkeeping = bookkeeping || shown[i].rfind("Bookkeeping", 0) == 0;
    // Rounding, counts and seconds below that line differ between machines and builds.
    if (!bookkeeping) CHECK(shown[i] == printed[i]);
  }
}

TEST_CASE("the README's notebook lines open the record") {
  const std::vector<std::string> python = blocks(readme(), "python");
  REQUIRE(python.size() == 1);
  std::string script;
  for (const std::string& line : lines_of(python[0]))
    if (line.find(".plot()") == std::string::npos) script += line + "\n";
  script +=
      "assert float(run['cylinder.temperature'][-1]) > 390.0\nassert 'target reached' in [str(w) for w in "
      "events['what'].values]\n";
  const Workplace here;
  REQUIRE(here.run("build/gaskettle run models/stirred_ram.yaml").first == 0);
  std::ofstream(here.folder / "notebook.py") << script;
  const auto [status, out] = here.run("/usr/bin/python3 notebook.py 2>&1");
  INFO(out);
  CHECK(status == 0);
}
