// The real program as its users start it: arguments, a folder, two output streams, an exit status.
#pragma once
#include <fcntl.h>
#include <signal.h>
#include <sys/wait.h>
#include <unistd.h>

#include <chrono>
#include <cstdlib>
#include <filesystem>
#include <fstream>
#include <iterator>
#include <nlohmann/json.hpp>
#include <stdexcept>
#include <string>
#include <thread>
#include <utility>
#include <vector>

namespace gaskettle::testing {

using Json = nlohmann::json;

inline std::string file_text(const std::string& path) {
  std::ifstream in(path, std::ios::binary);
  if (!in) throw std::runtime_error("cannot read " + path);
  return {std::istreambuf_iterator<char>(in), {}};
}

inline void write_text(const std::string& path, const std::string& text) {
  std::ofstream out(path, std::ios::binary);
  out << text;
  if (!out.flush()) throw std::runtime_error("cannot write " + path);
}

/// A file of the project: "models/gas_spring.yaml".
inline std::string shipped(const std::string& path) { return std::string(GASKETTLE_SOURCE_DIR) + "/" + path; }

/// A folder that goes away with its content.
class Folder {
public:
  Folder() {
    std::string pattern = (std::filesystem::temp_directory_path() / "gaskettle_system_XXXXXX").string();
    if (!mkdtemp(pattern.data())) throw std::runtime_error("no folder to work in");
    path_ = pattern;
  }
  ~Folder() {
    std::error_code ignored;
    std::filesystem::remove_all(path_, ignored);
  }
  Folder(const Folder&) = delete;
  Folder& operator=(const Folder&) = delete;
  const std::string& path() const { return path_; }
  std::string operator/(const std::string& name) const { return path_ + "/" + name; }
  std::vector<std::string> files() const {
    std::vector<std::string> names;
    for (const auto& entry : std::filesystem::directory_iterator(path_))
      names.push_back(entry.path().filename().string());
    return names;
  }

private:
  std::string path_;
};

struct Ran {
  int status = -1;  ///< exit status; -signal where it was killed
  std::string out, err;
  Json json() const { return Json::parse(out); }
};

/// A started program (the first argument is its file); both streams go to files, so they are no terminal.
class Running {
public:
  Running(const std::vector<std::string>& command, const std::string& folder) {
    child_ = fork();
    if (child_ < 0) throw std::runtime_error("cannot start a process");
    if (child_ > 0) return;
    std::vector<char*> words;
    for (const std::string& w : command) words.push_back(const_cast<char*>(w.c_str()));
    words.push_back(nullptr);
    redirect("/dev/null", STDIN_FILENO, O_RDONLY);
    redirect(streams_.path() + "/out", STDOUT_FILENO, O_WRONLY | O_CREAT);
    redirect(streams_.path() + "/err", STDERR_FILENO, O_WRONLY | O_CREAT);
    if (chdir(folder.c_str()) == 0) execvp(words[0], words.data());
    _exit(127);
  }
  ~Running() {
    if (child_ > 0) {
      ::kill(child_, SIGKILL);
      waitpid(child_, nullptr, 0);
    }
  }
  Running(const Running&) = delete;
  Running& operator=(const Running&) = delete;

  void send(int signal) const { ::kill(child_, signal); }
  bool ended() {
    int state = 0;
    if (child_ > 0 && waitpid(child_, &state, WNOHANG) == child_) note(state);
    return child_ <= 0;
  }
  /// Waits for the end, at most so long; what still runs then is killed.
  Ran wait(double seconds = 300) {
    const auto until = std::chrono::steady_clock::now() + std::chrono::duration<double>(seconds);
    while (!ended()) {
      if (std::chrono::steady_clock::now() > until) ::kill(child_, SIGKILL);
      std::this_thread::sleep_for(std::chrono::milliseconds(2));
    }
    return {status_, file_text(streams_ / "out"), file_text(streams_ / "err")};
  }

private:
  static void redirect(const std::string& path, int stream, int how) {
    const int file = open(path.c_str(), how, 0600);
    if (file < 0 || dup2(file, stream) < 0) _exit(126);
  }
  void note(int state) {
    child_ = 0;
    status_ = WIFEXITED(state) ? WEXITSTATUS(state) : -WTERMSIG(state);
  }
  Folder streams_;
  pid_t child_ = 0;
  int status_ = -1;
};

inline Ran run_command(const std::vector<std::string>& command, const std::string& folder) {
  return Running(command, folder).wait();
}

/// gaskettle ARGUMENTS, in this folder.
inline Ran gaskettle_in(const std::string& folder, std::vector<std::string> arguments) {
  arguments.insert(arguments.begin(), GASKETTLE_PROGRAM);
  return run_command(arguments, folder);
}
inline Ran gaskettle_in(const Folder& folder, std::vector<std::string> arguments) {
  return gaskettle_in(folder.path(), std::move(arguments));
}

inline bool contains(const std::string& text, const std::string& part) { return text.find(part) != std::string::npos; }

/// The entry of a JSON list that has this name.
inline Json named(const Json& list, const std::string& name) {
  for (const Json& entry : list)
    if (entry.at("name") == name) return entry;
  throw std::runtime_error("no entry named " + name);
}

inline long count_events(const Json& answer, const std::string& part, const std::string& what) {
  long n = 0;
  for (const Json& e : answer.at("events"))
    if (e.at("part") == part && e.at("what") == what) ++n;
  return n;
}

}  // namespace gaskettle::testing
